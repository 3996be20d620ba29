import { describe, expect, it } from 'vitest';
import { formatProblem } from '../../src/casefile/index.ts';
import { GOOD, good, OWN_GAS, problem, problems } from './help.ts';

describe('--set PATH=VALUE', () => {
  it('replaces a value, and gives the same case as the file would', () => {
    expect(good(GOOD, ['gap.spacing=7 mm']).case).toEqual(good(GOOD.replace('6 mm', '7 mm')).case);
    expect(good(GOOD, ['supply={voltage: {step: 9 V}, series_resistance: 1 ohm}']).case.supply).toMatchObject({ seriesResistance: 1 });
    expect(good(GOOD, ['title="a=b: c"']).case.title).toBe('a=b: c');
    expect(good(GOOD, ['title=a=b']).case.title).toBe('a=b');
  });

  it('adds what is not there, with the mappings on the way', () => {
    expect(good(GOOD, ['numerics.cells=99']).case.numerics.cells).toBe(99);
    expect(good(GOOD, ['supply.trip.current=1 mA', 'supply.trip.delay=2 us']).case.supply.trip).toMatchObject({
      current: 1e-3,
      delay: 2e-6,
    });
  });

  it('is applied left to right', () => {
    expect(good(GOOD, ['gap.spacing=7 mm', 'gap.spacing=8 mm']).case.gap.spacing).toBe(0.008);
    expect(good(GOOD, ['numerics.cells=99', 'numerics=']).case.numerics.cells).toBeNull();
    expect(good(GOOD, ['numerics=', 'numerics.cells=99']).case.numerics.cells).toBe(99);
  });

  it('removes a key with an empty value or null', () => {
    const text = GOOD.replace('5 ms', '5 ms\n  currents: [1 nA, 1 uA]');
    for (const value of ['', ' ', 'null', '~']) expect(good(text, [`observe.currents=${value}`]).case.observe.currents).toEqual([]);
    expect(good(GOOD, ['numerics.cells=']).case).toEqual(good(GOOD).case);
  });

  it('reaches list items by index; the index after the last appends', () => {
    const text = GOOD.replace('5 ms', '5 ms\n  currents: [1 nA, 1 uA]');
    expect(good(text, ['observe.currents.1=2 uA']).case.observe.currents).toEqual([1e-9, 2e-6]);
    expect(good(text, ['observe.currents.2=2 uA']).case.observe.currents).toEqual([1e-9, 1e-6, 2e-6]);
    expect(good(text, ['observe.currents.0=']).case.observe.currents).toEqual([1e-6]);
    expect(problem(text, ['observe.currents.3=2 uA'])).toMatchObject({ code: 'set', expected: 'an index from 0 to 2 in observe.currents' });
    expect(problem(text, ['observe.currents.first=2 uA'])).toMatchObject({ code: 'set' });
  });

  it('setting one arm of an either-or removes the others', () => {
    const ramp = ['supply.voltage.ramp={from: 0 V, to: 9 V, rate: 1 V/s}'];
    expect(good(GOOD.replace('420 V', '420 V, rise_time: 1 us'), ramp).case.supply.programme).toEqual({
      kind: 'ramp',
      from: 0,
      to: 9,
      rate: 1,
    });
    const deep = ['supply.voltage.ramp.from=0 V', 'supply.voltage.ramp.to=9 V', 'supply.voltage.ramp.rate=1 V/s'];
    expect(good(GOOD, deep).case.supply.programme).toEqual({ kind: 'ramp', from: 0, to: 9, rate: 1 });
    expect(good(GOOD, [...deep, 'supply.voltage.step=5 V']).case.supply.programme).toEqual({ kind: 'step', voltage: 5, riseTime: 0 });
    expect(good(GOOD.replace('420 V', '420 V, rise_time: 1 us'), ['supply.voltage.step=5 V']).case.supply.programme).toEqual({
      kind: 'step',
      voltage: 5,
      riseTime: 1e-6,
    });
    expect(good(GOOD, ['electrodes.left.material=nickel']).case).toEqual(good(GOOD.replace('ion_yield: 0.02', 'material: nickel')).case);
    expect(
      good(OWN_GAS, ['gas.coefficients.ion_mobility.value=1e24 1/(m V s)', 'gas.coefficients.ion_mobility.K0=2 cm^2/(V s)']).case.gas
        .coefficients.ionMobility.form.kind,
    ).toBe('constant');
    const table = ['gas.coefficients.ionisation.table={file: a.csv, reduced_field: x, coefficient: y}'];
    expect(good(OWN_GAS, table, { 'a.csv': 'x [Td],y [m^2]\n1,1e-22\n2,2e-22\n' }).case.gas.coefficients.ionisation.form.kind).toBe(
      'table',
    );
  });

  it('below an alias it changes this use only', () => {
    const text = GOOD.replace('left: { ion_yield: 0.02 }', 'left: &e { ion_yield: 0.02 }\n  right: *e');
    const { left, right } = good(text, ['electrodes.right.ion_yield=0.05']).case.electrodes;
    expect([left.ionYield.typical, right.ionYield.typical]).toEqual([0.02, 0.05]);
    // the entries that are not set stay as the anchor has them
    const alike = OWN_GAS.replace('ionisation: {', 'ionisation: &i {').replace(
      '    electron_mobility',
      '    attachment: *i\n    electron_mobility',
    );
    const before = good(alike).case.gas.coefficients;
    const after = good(alike, ['gas.coefficients.attachment.A=6 1/(cm Torr)']).case.gas.coefficients;
    expect(after.ionisation).toEqual(before.ionisation);
    if (before.ionisation.form.kind !== 'exponential') throw new Error('form');
    expect(after.attachment?.form).toEqual({ ...before.ionisation.form, A: before.ionisation.form.A / 2 });
  });

  it('problems are placed at the argument', () => {
    const found = problem(GOOD, ['gap.spacing=5 V']);
    expect(found).toMatchObject({ file: '--set gap.spacing', line: null, column: null, path: 'gap.spacing', code: 'wrong-dimension' });
    expect(formatProblem(found)).toMatch(/^--set gap\.spacing: expected a length above 0.*, found 5 V, a voltage$/);
    expect(formatProblem(problem(GOOD, ['gap={geometry: planar, spacing: 1 V, area: 1 cm^2}']))).toMatch(
      /^--set gap: gap\.spacing: expected a length/,
    );
    expect(problem(GOOD, ['gap.sizee=5 V'])).toMatchObject({ file: '--set gap.sizee', code: 'unknown-key' });
    expect(problem(GOOD, ['gap.spacing='])).toMatchObject({ file: '--set gap.spacing', code: 'missing-key' });
    expect(problem(GOOD, ['gas.mixture=[]'])).toMatchObject({ file: '--set gas.mixture', code: 'wrong-type' });
    expect(problem(GOOD, ['seed.gas_ionisation=[]'])).toMatchObject({ file: '--set seed.gas_ionisation', code: 'not-supported-yet' });
    // a mistake of the file beside one of an argument keeps its own place
    expect(problems(GOOD.replace('12 cm^2', '12'), ['gap.spacing=5']).map((p) => `${p.file}:${p.line}`)).toEqual([
      'case.yaml:5',
      '--set gap.spacing:null',
    ]);
  });

  it('what is no PATH=VALUE with one flow value is refused', () => {
    for (const override of [
      'gap.spacing',
      '=5',
      'gap..spacing=5 mm',
      'title=a: b',
      'title=- a',
      'title=[a',
      'title=!x a',
      'title=&a b',
      'title=*a',
      'title=|\n  a',
      'title=a\n---\nb',
      '',
    ]) {
      expect(problem(GOOD, [override]), override).toMatchObject({ code: 'set', line: null });
    }
    expect(problem(GOOD, ['title=a: b'])).toMatchObject({ file: '--set title', found: 'a: b' });
  });

  it('no key escapes into the prototype of anything', () => {
    expect(problems(GOOD, ['__proto__.polluted=1'])).toMatchObject([{ code: 'unknown-key' }]);
    expect(problems(`${GOOD}__proto__: { gap: 1 }\nconstructor: 1\n`).map((p) => p.code)).toEqual(['unknown-key', 'unknown-key']);
    expect(({} as Record<string, unknown>).polluted).toBeUndefined();
  });
});
