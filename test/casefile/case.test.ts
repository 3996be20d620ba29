import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { caseJsonSchema, caseTemplate, hashCase } from '../../src/casefile/index.ts';
import { BOLTZMANN, ELEMENTARY_CHARGE } from '../../src/units/constants.ts';
import { GOOD, good, OWN_GAS } from './help.ts';

const TORR = 101325 / 760;

describe('a case is read into SI with every default resolved', () => {
  it('the example of the design page', () => {
    const { case: c } = good(`title: Counter bias at 1.2 Torr
gap:        { geometry: planar, spacing: 6 mm, area: 12 cm^2, longest_path: 40 mm }
gas:        { name: argon, pressure: 1.2 Torr, temperature: 295 K }
electrodes:
  left:  { material: nickel }
  right: { material: nickel }
seed:       { cathode_current: 1 pA }
supply:
  voltage: { step: 420 V, rise_time: 1 us }
  series_resistance: 100 kohm
  parallel_capacitance: 20 pF
  current_limit: 5 mA
  trip: { current: 1 mA, delay: 20 us }
  initial_gap_voltage: 0 V
electrons:  { closure: local-field }
observe:
  until: 5 ms
  currents: [1 nA, 1 uA, 100 uA]
numerics:   { cells: 150, tolerance: 1e-3 }
`);
    expect(c.title).toBe('Counter bias at 1.2 Torr');
    expect(c.gap).toEqual({ geometry: 'planar', spacing: 0.006, area: 0.0012, longestPath: 0.04, longestPathGiven: true });
    expect(c.gas.pressure).toBeCloseTo(1.2 * TORR, 10);
    expect(c.gas.density).toBeCloseTo((1.2 * TORR) / (BOLTZMANN * 295), -10);
    expect(c.electrodes.left).toMatchObject({ material: 'nickel' });
    expect(c.electrodes.left.ionYield.typical).toBeGreaterThan(0);
    expect(c.seed).toEqual({ cathodeCurrent: 1e-12, electrons: 0 });
    expect(c.supply).toEqual({
      programme: { kind: 'step', voltage: 420, riseTime: 1e-6 },
      seriesResistance: 1e5,
      parallelCapacitance: 2e-11,
      currentLimit: 0.005,
      trip: { current: 0.001, delay: 2e-5, senses: 'gap', action: 'open' },
      initialGapVoltage: 0,
    });
    expect(c.observe).toEqual({ until: 0.005, currents: [1e-9, 1e-6, 1e-4] });
    expect(c.numerics).toEqual({ cells: 150, tolerance: 1e-3 });
    expect(c.sha256).toMatch(/^[0-9a-f]{64}$/);
  });

  it('what is left out takes its default, and the default is listed', () => {
    const { case: c, defaults, notes } = good(GOOD.replace('title: Test\n', ''));
    expect(c.title).toBe('case.yaml');
    expect(c.gap).toMatchObject({ longestPath: 0.006, longestPathGiven: false });
    expect(c.gas.temperature).toBe(293.15);
    expect(c.electrodes.right).toEqual(c.electrodes.left);
    expect(c.supply).toMatchObject({ parallelCapacitance: 0, currentLimit: null, trip: null, initialGapVoltage: 0 });
    expect(c.supply.programme).toEqual({ kind: 'step', voltage: 420, riseTime: 0 });
    expect(c.observe.currents).toEqual([]);
    expect(c.numerics).toEqual({ cells: null, tolerance: 1e-3 });
    expect(c.gas.coefficients.attachment).toBeNull();
    expect(notes).toEqual([]);
    expect(Object.fromEntries(defaults.map((d) => [d.path, d.value]))).toEqual({
      title: 'case.yaml',
      'gap.longest_path': 'gap.spacing',
      'gas.data': 'phelps-petrovic',
      'gas.temperature': '293.15 K',
      'electrodes.right': 'same as left',
      'electrons.closure': 'local-field',
      'seed.electrons': '0',
      'supply.voltage.rise_time': '0 s',
      'supply.parallel_capacitance': '0 F',
      'supply.current_limit': 'none',
      'supply.trip': 'none',
      'supply.initial_gap_voltage': '0 V',
      'observe.currents': 'none',
      'numerics.cells': "the program's choice",
      'numerics.tolerance': '1e-3',
    });
  });

  it('the case is frozen to its leaves', () => {
    const { case: c } = good(GOOD);
    expect(Object.isFrozen(c) && Object.isFrozen(c.supply.programme) && Object.isFrozen(c.observe.currents)).toBe(true);
  });

  it('a given yield wins over the material, and levels come out rising and once', () => {
    const { case: c } = good(
      GOOD.replace('ion_yield: 0.02', 'material: nickel, ion_yield: 3 %').replace('5 ms', '5 ms\n  currents: [1 uA, 1 nA, 1000 nA]'),
    );
    expect(c.electrodes.left).toMatchObject({
      material: 'nickel',
      ionYield: { typical: 0.03, low: 0.03, high: 0.03, status: 'given', source: 'case file' },
    });
    expect(c.observe.currents).toEqual([1e-9, 1e-6]);
  });

  it('a seed of starting electrons only, a ramp and 0 ohm are accepted', () => {
    const text = GOOD.replace('1 pA', '0 A\n  electrons: 100')
      .replace('step: 420 V', 'ramp: { from: 0 V, to: -600 V, rate: 100 V/s }')
      .replace('100 kohm', '0 ohm');
    const { case: c } = good(text);
    expect(c.seed).toEqual({ cathodeCurrent: 0, electrons: 100 });
    expect(c.supply.programme).toEqual({ kind: 'ramp', from: 0, to: -600, rate: 100 });
    expect(c.supply.seriesResistance).toBe(0);
  });

  it('0 ohm takes a trip to zero with a current limit, and a trip that opens', () => {
    const trip = 'trip: { current: 1 mA, delay: 1 us, action: zero }';
    expect(good(GOOD.replace('100 kohm', `0 ohm\n  current_limit: 1 mA\n  ${trip}`)).case.supply.trip?.action).toBe('zero');
    expect(good(GOOD.replace('100 kohm', `0 ohm\n  ${trip.replace('zero', 'open')}`)).case.supply.trip?.action).toBe('open');
  });

  it('a resolved case is a flat record of paths and SI values', () => {
    const { resolved } = good(OWN_GAS);
    expect(resolved).toMatchObject({
      'gap.spacing': 0.006,
      'gas.name': null,
      'supply.voltage.step': 420,
      'supply.trip': null,
      'electrodes.right.ion_yield': 0.02,
      'gas.coefficients.ionisation.form': 'exponential',
      'numerics.cells': null,
    });
    for (const value of Object.values(resolved)) expect(value === null || ['number', 'string'].includes(typeof value)).toBe(true);
  });

  it('every entry can be found again in the text', () => {
    const { locate } = good(GOOD);
    expect(locate('gap.spacing')).toEqual({ file: 'case.yaml', line: 4, column: 12 });
    expect(locate('supply.voltage.step')).toEqual({ file: 'case.yaml', line: 14, column: 20 });
    expect(locate('gas.temperature')).toEqual({ file: 'case.yaml', line: 6, column: 1 });
  });
});

describe("a case's own gas data become N-based SI once", () => {
  const kT = BOLTZMANN * 293.15;

  it('data against pressure are turned with p = N k T at 293.15 K by default', () => {
    const { case: c, defaults, notes } = good(OWN_GAS);
    const { ionisation, electronMobility, electronEnergy, ionMobility, ionEnergy } = c.gas.coefficients;
    if (ionisation.form.kind !== 'exponential' || electronMobility.form.kind !== 'constant' || ionMobility.form.kind !== 'constant')
      throw new Error('form');
    expect(ionisation.form.A / (((12 * 100) / TORR) * kT)).toBeCloseTo(1, 13);
    expect(ionisation.form.B / (((180 * 100) / TORR) * kT)).toBeCloseTo(1, 13);
    // 1 V/(cm Torr) is 3.036 Td at 20 °C: common practice
    expect(ionisation.form.B / 1e-21 / 180).toBeCloseTo(3.036, 3);
    expect(electronMobility.form.value / ((3.3e5 * 1e-4 * TORR) / kT)).toBeCloseTo(1, 13);
    expect(ionMobility.form.value / ((1.5e3 * 1e-4 * TORR) / kT)).toBeCloseTo(1, 13);
    expect(electronEnergy.form).toEqual({ kind: 'constant', value: 0 });
    expect(ionEnergy.form).toEqual({ kind: 'constant', value: kT / ELEMENTARY_CHARGE });
    expect(ionisation).toMatchObject({ status: 'given', source: 'case file', range: null });
    expect(c.gas).toMatchObject({ name: null, breakdownUncertainty: 0.2, kineticCrossSection: null });
    expect(defaults.map((d) => d.path)).toEqual(
      expect.arrayContaining(['gas.coefficients.reference_temperature', 'gas.coefficients.electron_energy', 'gas.coefficients.ion_energy']),
    );
    expect(notes).toContain('gas.coefficients.ionisation: given against pressure, turned into values against density at 293.15 K');
  });

  it('the reference temperature scales p-based data, and a coefficient may carry its own', () => {
    const at = (text: string): number => {
      const { form } = good(text).case.gas.coefficients.ionisation;
      return form.kind === 'exponential' ? form.A : Number.NaN;
    };
    const base = at(OWN_GAS);
    const shared = OWN_GAS.replace('    electron_mobility', '    reference_temperature: 273.15 K\n    electron_mobility');
    expect(at(shared) / base).toBeCloseTo(273.15 / 293.15, 13);
    expect(at(shared.replace('180 V/(cm Torr)', '180 V/(cm Torr), reference_temperature: 300 K')) / base).toBeCloseTo(300 / 293.15, 13);
    expect(good(shared).defaults.some((d) => d.path === 'gas.coefficients.reference_temperature')).toBe(false);
  });

  it('the same gas written against pressure and against density is the same gas', () => {
    const { form } = good(OWN_GAS).case.gas.coefficients.ionisation;
    if (form.kind !== 'exponential') throw new Error('form');
    const byDensity = OWN_GAS.replace('12 1/(cm Torr)', `${form.A} m^2`).replace('180 V/(cm Torr)', `${form.B} V m^2`);
    expect(good(byDensity).case.gas.coefficients.ionisation.form).toEqual(form);
    expect(good(byDensity).case.sha256).toBe(good(OWN_GAS).case.sha256);
  });

  it('the root form keeps alpha/p = C exp(-D sqrt(p/E))', () => {
    const { form } = good(OWN_GAS.replace(/\{ form: exp.*\}/, '{ form: root, C: 29.22 1/(cm Torr), D: 26.64 (V/(cm Torr))^0.5 }')).case.gas
      .coefficients.ionisation;
    if (form.kind !== 'root') throw new Error('form');
    const field = 300; // V/(cm Torr)
    const x = ((field * 100) / TORR) * kT;
    const alphaOverP = (form.C * Math.exp(-form.D / Math.sqrt(x)) * TORR) / kT / 100;
    expect(alphaOverP / (29.22 * Math.exp(-26.64 / Math.sqrt(field)))).toBeCloseTo(1, 12);
  });

  it('a reduced mobility K0 refers to 2.6868e25 1/m^3', () => {
    const { form } = good(OWN_GAS.replace('1.5e3 cm^2 Torr/(V s)', '{ K0: 1.5 cm^2/(V s) }')).case.gas.coefficients.ionMobility;
    if (form.kind !== 'constant') throw new Error('form');
    expect(form.value / (1.5e-4 * 2.6868e25)).toBeCloseTo(1, 4);
  });

  it('validity becomes the range of the coefficient', () => {
    const within = OWN_GAS.replace('180 V/(cm Torr)', '180 V/(cm Torr), valid_from: 100 V/(cm Torr), valid_to: 600 V/(cm Torr)');
    const { range } = good(within).case.gas.coefficients.ionisation;
    expect((range?.from ?? 0) / 1e-21).toBeCloseTo(303.6, 0);
    expect((range?.to ?? 0) / (range?.from ?? 1)).toBeCloseTo(6, 12);
    expect(good(OWN_GAS.replace('180 V/(cm Torr)', '180 V/(cm Torr), valid_from: 100 Td')).case.gas.coefficients.ionisation.range).toEqual({
      from: 1e-19,
      to: Number.MAX_VALUE,
    });
  });

  it('tables carry rows against E/N, in SI, and the range of their rows', () => {
    const text = OWN_GAS.replace(/\{ form: exp.*\}/, '{ table: { file: alpha.csv, reduced_field: EN, coefficient: aN } }').replace(
      '3.3e5 cm^2 Torr/(V s)',
      '{ table: { file: mu.csv, reduced_field: { column: Ep, unit: V/(cm Torr) }, coefficient: { column: mup, unit: cm^2 Torr/(V s) } } }',
    );
    const {
      case: c,
      tables,
      resolved,
    } = good(text, [], {
      'alpha.csv': '# own data\nEN [Td], aN [m^2]\n50,1.5e-22\n100,9e-22\n200,3e-21\n',
      'mu.csv': 'Ep,mup\n1,3.3e5\n10,3e5\n',
    });
    expect(c.gas.coefficients.ionisation.form).toMatchObject({ kind: 'table', law: 'growth', y: [1.5e-22, 9e-22, 3e-21] });
    expect(c.gas.coefficients.ionisation.range?.to).toBeCloseTo(2e-19, 30);
    const { form } = c.gas.coefficients.electronMobility;
    if (form.kind !== 'table') throw new Error('form');
    expect(form.law).toBe('plain');
    expect(form.x[0] / ((100 / TORR) * kT)).toBeCloseTo(1, 12);
    expect(form.y[1] / ((30 * TORR) / kT)).toBeCloseTo(1, 12);
    expect(tables.map((t) => [t.path, t.file])).toEqual([
      ['gas.coefficients.ionisation.table', 'alpha.csv'],
      ['gas.coefficients.electron_mobility.table', 'mu.csv'],
    ]);
    expect(resolved['gas.coefficients.ionisation.table']).toMatch(/^sha256:[0-9a-f]{64}$/);
  });

  it('a coefficient beside a gas name replaces the built-in one only', () => {
    const own = good(GOOD.replace('  name: argon', '  name: argon\n  coefficients: { electron_energy: 3 V }')).case.gas;
    const builtIn = good(GOOD).case.gas;
    expect(own.coefficients.electronEnergy).toMatchObject({ form: { kind: 'constant', value: 3 }, status: 'given' });
    expect(own.coefficients.ionisation).toEqual(builtIn.coefficients.ionisation);
    expect(own).toMatchObject({ name: 'argon', breakdownUncertainty: builtIn.breakdownUncertainty });
  });

  it('attachment brings negative ions, which move as the positive ones unless told otherwise', () => {
    const attaching = OWN_GAS.replace(
      '    ion_mobility',
      '    attachment: { form: exponential, A: 1 1/(cm Torr), B: 50 V/(cm Torr) }\n    recombination: 1e-7 cm^3/s\n    ion_mobility',
    );
    const { case: c, defaults } = good(attaching);
    const k = c.gas.coefficients;
    expect(k.negativeIonMobility).toEqual(k.ionMobility);
    expect(k.negativeIonEnergy).toEqual(k.ionEnergy);
    expect(k.electronIonRecombination?.form).toEqual({ kind: 'constant', value: 1e-13 });
    expect(k.ionIonRecombination?.form).toEqual({ kind: 'constant', value: 1e-13 });
    expect(defaults).toContainEqual({ path: 'gas.coefficients.negative_ion_mobility', value: 'as ion_mobility' });
    const told = good(attaching.replace('    ion_mobility', '    negative_ion_mobility: { K0: 2 cm^2/(V s) }\n    ion_mobility'));
    expect(told.case.gas.coefficients.negativeIonMobility).not.toEqual(k.ionMobility);
    expect(told.defaults.some((d) => d.path === 'gas.coefficients.negative_ion_mobility')).toBe(false);
  });

  it('without attachment, recombination is that of electrons only', () => {
    const { case: c } = good(OWN_GAS.replace('    ion_mobility', '    recombination: 1e-7 cm^3/s\n    ion_mobility'));
    expect(c.gas.coefficients).toMatchObject({ attachment: null, ionIonRecombination: null, negativeIonMobility: null });
    expect(c.gas.coefficients.electronIonRecombination?.form).toEqual({ kind: 'constant', value: 1e-13 });
  });
});

describe('the hash of a case', () => {
  const hash = (text: string, overrides: string[] = []): string => good(text, overrides).case.sha256;

  it('does not depend on title, comments, order, spelling of units or written defaults', () => {
    const reordered = `# a comment
observe: { until: 5000 us, currents: [] }
supply: { series_resistance: 0.1 Mohm, voltage: { rise_time: 0 s, step: 0.42 kV }, parallel_capacitance: 0 F }
seed: { electrons: 0, cathode_current: 1e-3 nA }
electrodes: { right: { ion_yield: 2 % }, left: { ion_yield: 0.02 } }
gas: { pressure: 1.2 Torr, name: argon, temperature: 20 °C }
gap: { area: 1200 mm^2, spacing: 0.6 cm, longest_path: 6 mm, geometry: planar }
`;
    // longest_path: given or not is part of the case (it decides a caution), so both give it
    expect(hash(reordered)).toBe(hash(GOOD.replace('12 cm^2', '12 cm^2\n  longest_path: 6 mm')));
  });

  it('depends on every value', () => {
    const all = [
      hash(GOOD),
      hash(GOOD.replace('6 mm', '6.000001 mm')),
      hash(GOOD.replace('argon', 'nitrogen')),
      hash(GOOD.replace('420 V', '421 V')),
      hash(GOOD.replace('0.02', '0.03')),
      hash(GOOD, ['numerics.tolerance=1e-4']),
      hash(GOOD, ['supply.trip={current: 1 mA, delay: 0 s}']),
      hash(GOOD, ['gas.temperature=300 K']),
      hash(GOOD, ['observe.currents=[1 nA]']),
      hash(GOOD, ['seed.electrons=1']),
    ];
    expect(new Set(all).size).toBe(all.length);
  });

  it('covers the contents of tables, not their names or comments', () => {
    const text = GOOD.replace('step: 420 V', 'table: { file: bias.csv, time: t, voltage: bias }');
    const rows = Array.from({ length: 200 }, (_, i) => `${i},${i % 7}`).join('\n');
    const first = good(text, [], { 'bias.csv': `t [s],bias [V]\n${rows}` }).case.sha256;
    const renamed = good(text.replace('bias.csv', 'b.csv'), [], { 'b.csv': `# same\n t [s] , bias [V]\n${rows}\n` }).case.sha256;
    const changed = good(text, [], { 'bias.csv': `t [s],bias [V]\n${rows.replace('100,2', '100,3')}` }).case.sha256;
    expect(renamed).toBe(first);
    expect(changed).not.toBe(first);
  });

  it('is the SHA-256 of the resolved case, so it can be taken again', () => {
    const { case: c } = good(GOOD);
    expect(hashCase(c)).toBe(c.sha256);
    expect(hashCase({ ...c, title: 'other' })).toBe(c.sha256);
  });
});

describe('what ships with the reader', () => {
  it('the template validates as it stands, with its comments as entries too', () => {
    expect(good(caseTemplate()).case.gas.name).toBe('argon');
    // every optional entry that fits beside the others, uncommented
    const full = caseTemplate().replace(
      /^( *)# ((?: {2})*(?:data|coefficients|ionisation|electron_mobility|ion_mobility|reference_temperature|right|electrons|current_limit|trip|initial_gap_voltage|numerics):)/gm,
      '$1$2',
    );
    // two lines of introduction, a mixture, three other yields, the ramp and the table; scan and history
    const [gap, studies] = full.split(/(?=^# scan:)/m);
    expect(gap.match(/^ *# /gm)?.length).toBe(8);
    const { case: c, defaults } = good(gap);
    expect(c.supply.trip).not.toBeNull();
    expect(c.gas.coefficients.ionisation.status).toBe('given');
    expect(defaults).toEqual([]);
    const mixture = gap.replace(/^ {2}(name|data): .*\n/gm, '').replace('# mixture:', 'mixture:');
    expect(good(mixture).case.gas.mixture?.map((part) => part.gas)).toEqual(['argon', 'nitrogen']);
    for (const [, left] of gap.matchAll(/^ {2}# left: (.*?) *(?:#.*)?$/gm)) {
      const other = gap.replace(/^ {2}left: .*$/m, `  left: ${left}`).replace(/^ {2}right: .*$/m, '');
      const { ionYield } = good(other, [], { 'yield.csv': 'EN [Td],gamma\n100,0.01\n500,0.02\n' }).case.electrodes.left;
      expect(ionYield.high).toBeGreaterThan(ionYield.low);
    }
    const all = good(gap + studies.replace(/^# /gm, ''));
    expect(all.scan?.find?.what).toBe('hold-off');
    expect(all.window?.history.pressure.kind).toBe('bay');
    for (const more of ['find', 'pump', 'gas_load', 'outgassing'])
      expect(
        good(
          gap +
            studies
              .replace(/^# /gm, '')
              .replace(`# ${more}:`, `${more}:`)
              .replace(/^ {2}find: .*hold-off.*/m, ''),
        ).scan,
      ).not.toBeNull();
    for (const arm of ['ascent', 'table', 'dataset']) {
      const other = studies
        .replace(/^# /gm, '')
        .replace(/^ {4}bay:\n( {6}.*\n)*/m, '')
        .replace(`# ${arm}: {`, `${arm}: {`);
      const set = { ok: true, values: Float64Array.of(1, 2), units: null } as const;
      const sets = { 'log.h5:/bay/pressure': { ...set, units: 'Pa' }, 'log.h5:/bay/time': { ...set, units: 's' } };
      expect(good(gap + other, [], { 'bay.csv': 't [s],p [Pa]\n0,1\n1,2\n' }, sets).window?.history.pressure.kind).toBe(arm);
    }
  });

  it('the shipped JSON Schema is the one generated from the validator', () => {
    const shipped = readFileSync(new URL('../../src/casefile/case.schema.json', import.meta.url), 'utf8');
    expect(shipped, 'npm run schema writes it anew').toBe(`${JSON.stringify(caseJsonSchema(), null, 2)}\n`);
  });

  it('the JSON Schema closes every mapping and names the keys of a case', () => {
    const schema = caseJsonSchema() as {
      properties: Record<string, { required?: string[]; additionalProperties?: boolean }>;
      required: string[];
    };
    expect(schema.required.sort()).toEqual(['electrodes', 'gap', 'gas', 'observe', 'seed', 'supply']);
    expect(schema.properties.gap).toMatchObject({ additionalProperties: false, required: ['geometry', 'spacing', 'area'] });
  });
});
