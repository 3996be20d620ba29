import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { hashCase, hashScan, hashWindow } from '../../src/casefile/index.ts';
import { DIMENSIONS, type DimensionName, parseQuantity } from '../../src/units/index.ts';
import { following, GOOD, good, OWN_GAS, varied } from './help.ts';

const ENTRIES: readonly (readonly [path: string, unit: string, from: number, to: number])[] = [
  ['gas.pressure', 'Pa', 1e-3, 1e6],
  ['gas.temperature', 'K', 4, 3000],
  ['gap.spacing', 'm', 1e-6, 100],
  ['gap.area', 'm^2', 1e-9, 1e4],
  ['electrodes.left.ion_yield', '1', 0, 10],
  ['electrodes.right.ion_yield', '1', 0, 10],
  ['seed.cathode_current', 'A', 1e-30, 1],
  ['seed.electrons', '1', 0, 1e9],
  ['supply.voltage.step', 'V', 1e-3, 1e7],
  ['supply.voltage.rise_time', 's', 0, 1e3],
  ['supply.series_resistance', 'ohm', 0, 1e18],
  ['supply.parallel_capacitance', 'F', 0, 1e3],
  ['supply.current_limit', 'A', 1e-12, 1e3],
  ['supply.initial_gap_voltage', 'V', -1e7, 1e7],
  ['observe.until', 's', 1e-12, 1e9],
  ['numerics.tolerance', '1', 1e-8, 0.1],
];

/** A few different entries with a value in their bounds. */
const point = fc.uniqueArray(
  fc
    .constantFrom(...ENTRIES)
    .chain(([path, unit, min, max]) => fc.double({ min, max, noNaN: true }).map((value) => ({ path, unit, value: value + 0 || 0, max }))),
  { minLength: 1, maxLength: 4, selector: (entry) => entry.path },
);

const text = (value: number, unit: string): string => (unit === '1' ? `${value}` : `${value} ${unit}`);

describe('the case at a point of a scan', () => {
  it('is the case that a file with these values gives, to the bit', () => {
    fc.assert(
      fc.property(point, (entries) => {
        // the axis itself only has to be right; the values are given to `at`
        const axes = entries.map(({ path, unit, max }) => `{ path: ${path}, values: [${text(max, unit)}] }`);
        const scanned = good(varied(axes).replace('gap:', 'gap:\n  longest_path: 1 km'));
        const result = scanned.at(entries.map((entry) => entry.value));
        const set = entries.map(({ path, unit, value }) => `${path}=${text(value, unit)}`);
        const plain = good(GOOD.replace('gap:', 'gap:\n  longest_path: 1 km'), set);
        if (!result.ok) throw new Error(JSON.stringify(result.problems));
        expect(result.case.sha256).toBe(plain.case.sha256);
        expect(result.case).toEqual(plain.case);
      }),
      { numRuns: 100 },
    );
  });

  it('is the same whatever points were asked for before', () => {
    const axes: readonly (readonly [path: string, first: number, second: number])[] = [
      ['gap.spacing', 0.01, 0.02],
      ['gas.pressure', 100, 200],
      ['electrodes.left.ion_yield', 0.02, 0.05],
      ['supply.voltage.step', 300, 400],
    ];
    const [least, most] = [axes.map(([, first]) => first), axes.map(([, , second]) => second)];
    const units = ['m', 'Pa', '1', 'V'];
    const source = varied(
      axes.map(([path, first, second], k) => `{ path: ${path}, values: [${text(first, units[k])}, ${text(second, units[k])}] }`),
    );
    const { at } = good(source);
    fc.assert(
      fc.property(fc.array(fc.constantFrom(0, 1), { minLength: 4, maxLength: 4 }), (places) => {
        const values = places.map((place, k) => (place === 0 ? least[k] : most[k]));
        const [asked, alone] = [at(values), good(source).at(values)];
        if (!asked.ok || !alone.ok) throw new Error('no case');
        expect(asked.case).toEqual(alone.case);
      }),
      { numRuns: 60 },
    );
  });

  it('shares what is not varied', () => {
    const { at } = good(varied(['{ path: supply.voltage.step, values: [300 V, 400 V] }']));
    const [a, b] = [at([300]), at([400])];
    if (!a.ok || !b.ok) throw new Error('no case');
    expect(b.case.supply).not.toEqual(a.case.supply);
    for (const part of ['gap', 'gas', 'electrodes'] as const) expect(b.case[part]).toBe(a.case[part]);
  });

  it('holds exactly the number given', () => {
    const { at } = good(varied(['{ path: gas.pressure, values: [1 Torr] }', '{ path: gas.temperature, values: [20 °C] }']));
    fc.assert(
      fc.property(
        fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
        fc.double({ min: 4, max: 3000, noNaN: true }),
        (pressure, temperature) => {
          const result = at([pressure, temperature]);
          expect(result.ok && [result.case.gas.pressure, result.case.gas.temperature]).toEqual([pressure, temperature]);
        },
      ),
    );
    expect(at(Float64Array.of(159.986842, 295))).toMatchObject({ ok: true, case: { gas: { pressure: 159.986842, temperature: 295 } } });
  });

  it('any double survives being written in the SI unit of any quantity', () => {
    const units = (Object.keys(DIMENSIONS) as DimensionName[]).filter((name) => name !== 'number');
    fc.assert(
      fc.property(fc.constantFrom(...units), fc.double({ noNaN: true, noDefaultInfinity: true }), (name, value) => {
        const read = parseQuantity(`${value} ${DIMENSIONS[name].unit}`, name);
        expect(read).toEqual({ ok: true, value: value === 0 ? 0 : value });
      }),
    );
  });

  it('without axes it is the case itself', () => {
    const { at, case: c } = good(GOOD);
    expect(at([])).toEqual({ ok: true, case: c });
  });

  it('varying the left electrode varies the right one too where that is left out', () => {
    const entry = '{ path: electrodes.left.ion_yield, values: [0.05] }';
    const yields = (more: string): unknown => {
      const result = good(varied([entry]).replace('left: { ion_yield: 0.02 }', `left: { ion_yield: 0.02 }${more}`)).at([0.05]);
      return result.ok && [result.case.electrodes.left.ionYield.typical, result.case.electrodes.right.ionYield.typical];
    };
    expect(yields('')).toEqual([0.05, 0.05]);
    expect(yields('\n  right: { ion_yield: 0.03 }')).toEqual([0.05, 0.03]);
  });

  it('setting one arm of an either-or removes the other, as --set does', () => {
    const nickel = varied(['{ path: electrodes.left.ion_yield, values: [0.05] }']).replace('ion_yield: 0.02', 'material: nickel');
    const result = good(nickel).at([0.05]);
    const set = good(GOOD.replace('ion_yield: 0.02', 'material: nickel'), ['electrodes.left.ion_yield=0.05']).case;
    expect(result).toEqual({ ok: true, case: set });
    expect(set.electrodes.left.material).toBeNull();

    const rows = `${OWN_GAS}scan: { vary: [{ path: gas.coefficients.ion_mobility.K0, values: [1 cm^2/(V s)] }] }`;
    const mobile = good(rows).at([2e-4]);
    expect(mobile).toEqual({ ok: true, case: good(OWN_GAS, ['gas.coefficients.ion_mobility.K0=2 cm^2/(V s)']).case });
  });

  it('does not change the case, nor what other points give', () => {
    const { at, case: before } = good(varied(['{ path: gas.pressure, values: [1 Torr] }']));
    const frozen = structuredClone(before);
    const first = at([100]);
    at([200]);
    at([-1]);
    expect(at([100])).toEqual(first);
    expect(before).toEqual(frozen);
    expect(first.ok && Object.isFrozen(first.case) && Object.isFrozen(first.case.gas.coefficients)).toBe(true);
  });

  it('tables are read once and stay the same data', () => {
    let reads = 0;
    const table = 'EN [Td], aN [m^2]\n50,1.5e-22\n100,9e-22\n200,3e-21\n';
    const own = OWN_GAS.replace(/\{ form: exp.*\}/, '{ table: { file: alpha.csv, reduced_field: EN, coefficient: aN } }');
    const { at } = good(`${own}scan: { vary: [{ path: gas.pressure, values: [1 Pa, 2 Pa] }] }`, [], {
      get 'alpha.csv'() {
        reads++;
        return table;
      },
    } as Record<string, string>);
    const before = reads;
    const [a, b] = [at([1]), at([2])];
    expect(reads).toBe(before);
    expect(a.ok && b.ok && a.case.gas.coefficients.ionisation.form).toEqual(b.ok && b.case.gas.coefficients.ionisation.form);
    expect(b).toEqual({ ok: true, case: good(own, ['gas.pressure=2 Pa'], { 'alpha.csv': table }).case });
  });

  it('a value that makes no case is a problem at the entry that varies it', () => {
    const { at } = good(varied(['{ path: gas.pressure, values: [1 Torr] }', '{ path: gap.spacing, values: [1 mm] }']));
    expect(at([-1, 0.001])).toEqual({
      ok: false,
      problems: [
        {
          code: 'out-of-range',
          file: 'case.yaml',
          line: 20,
          column: 7,
          path: 'gas.pressure',
          expected: 'a pressure from 1e-3 Pa to 1e6 Pa, e.g. 1.2 Torr',
          found: '-1 Pa',
          nearest: null,
        },
      ],
    });
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY])
      expect(at([value, 0.001])).toMatchObject({ ok: false, problems: [{ path: 'gas.pressure', line: 20 }] });
    expect(at([-1, -1])).toMatchObject({ ok: false, problems: [{ line: 20 }, { line: 21 }] });
  });

  it('too few or too many values are a fault of the caller', () => {
    const { at } = good(varied(['{ path: gas.pressure, values: [1 Torr] }']));
    expect(() => at([])).toThrow(RangeError);
    expect(() => at([1, 2])).toThrow('2 values for 1 varied entries');
  });
});

describe('hashes', () => {
  const PRESSURES = '{ path: gas.pressure, from: 1 Pa, to: 3 Pa, points: 3 }';
  const BAY = '{ bay: { volume: 1 L, start: 1 kPa, gas_load: 1 Pa m^3/s } }';

  it('the hash of a run does not depend on scan or history', () => {
    const { sha256 } = good(GOOD).case;
    expect(good(varied([PRESSURES])).case.sha256).toBe(sha256);
    expect(good(following(BAY)).case.sha256).toBe(sha256);
    expect(hashCase(good(varied([PRESSURES])).case)).toBe(sha256);
  });

  it('the hash of a scan depends on its case and on every setting, not on how it is written', () => {
    const hash = (text: string, overrides: string[] = []): string => {
      const { case: c, scan } = good(text, overrides);
      if (scan === null) throw new Error('no scan');
      return hashScan(c, scan);
    };
    const base = hash(varied([PRESSURES]));
    expect(base).toMatch(/^[0-9a-f]{64}$/);
    expect(hash(varied(['{ path: gas.pressure, values: [1 Pa, 2e-3 kPa, 3 Pa] }'], '  zip: false # a grid\n'))).toBe(base);
    const others = [
      hash(varied([PRESSURES]), ['gap.spacing=7 mm']),
      hash(varied([PRESSURES]), ['scan.vary.0.points=4']),
      hash(varied([PRESSURES]), ['scan.vary.0.to=4 Pa']),
      hash(varied([PRESSURES]), ['scan.zip=true']),
      hash(varied(['{ path: gas.temperature, from: 10 K, to: 30 K, points: 3 }'])),
      hash(varied([PRESSURES], '  find: { what: hold-off, from: 1 V, to: 2 V }\n')),
      hash(varied([PRESSURES], '  find: { what: hold-off, from: 1 V, to: 2 V, tolerance: 1 % }\n')),
      // a long axis, of which one value differs
      hash(varied(['{ path: gas.pressure, from: 1 Pa, to: 3 Pa, points: 1000 }'])),
      hash(varied(['{ path: gas.pressure, from: 1 Pa, to: 3 Pa, points: 1000, spacing: log }'])),
    ];
    expect(new Set([base, ...others]).size).toBe(others.length + 1);
  });

  it('the hash of a window depends on its case and on every setting', () => {
    const hash = (text: string, overrides: string[] = [], tables: Record<string, string> = {}): string => {
      const { case: c, window } = good(text, overrides, tables);
      if (window === null) throw new Error('no window');
      return hashWindow(c, window);
    };
    const base = hash(following(BAY));
    expect(hash(following(BAY.replace('1 kPa', '1000 Pa'), '  duration: 180 min\n  margin: 1.5\n  voltage: 420 V\n'))).toBe(base);
    const table = following('{ table: { file: p.csv, time: t, pressure: p } }', '');
    const others = [
      hash(following(BAY), ['gap.spacing=7 mm']),
      hash(following(BAY), ['history.pressure.bay.volume=2 L']),
      hash(following(BAY), ['history.margin=2']),
      hash(following(BAY), ['history.voltage=-420 V']),
      hash(table, [], { 'p.csv': 't [s],p [Pa]\n0,1\n10,2\n' }),
      hash(table, [], { 'p.csv': 't [s],p [Pa]\n0,1\n10,3\n' }),
    ];
    expect(new Set([base, ...others]).size).toBe(others.length + 1);
  });
});
