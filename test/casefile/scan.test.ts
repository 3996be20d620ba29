import { describe, expect, it } from 'vitest';
import { formatProblem } from '../../src/casefile/index.ts';
import { GOOD, good, OWN_GAS, problem, problems, searching, varied } from './help.ts';

const TORR = 101325 / 760;
const PRESSURE = '{ path: gas.pressure, from: 0.1 Torr, to: 10 Torr, points: 25, spacing: log }';
const STEP = '{ path: supply.voltage.step, values: [350 V, 0.4 kV, 450 V] }';

describe('a scan is read into axes of SI values', () => {
  it('a case without one has none', () => {
    expect(good(GOOD)).toMatchObject({ scan: null, window: null });
  });

  it('values keep their order; linear and log spacing meet their ends exactly', () => {
    const { scan } = good(varied([PRESSURE, STEP, '{ path: gap.spacing, from: 6 mm, to: 2 mm, points: 5 }']));
    const [pressure, step, spacing] = scan?.axes ?? [];
    expect(scan).toMatchObject({ zip: false, find: null });
    expect(pressure).toMatchObject({ path: 'gas.pressure', unit: 'Pa' });
    expect(pressure.values).toBeInstanceOf(Float64Array);
    expect(pressure.values).toHaveLength(25);
    // as the parser makes the doubles of 0.1 Torr and 10 Torr
    expect([pressure.values[0], pressure.values[24]]).toEqual([0.1 * TORR, 10 * TORR]);
    expect(pressure.values[12] / TORR).toBeCloseTo(1, 14);
    for (let i = 1; i < 25; i++) expect(pressure.values[i] / pressure.values[i - 1]).toBeCloseTo(100 ** (1 / 24), 12);
    expect(step).toEqual({ path: 'supply.voltage.step', unit: 'V', values: Float64Array.of(350, 400, 450) });
    expect(Array.from(spacing.values, (v) => Number(v.toPrecision(12)))).toEqual([0.006, 0.005, 0.004, 0.003, 0.002]);
    expect([spacing.values[0], spacing.values[4]]).toEqual([0.006, 0.002]);
  });

  it('round numbers stay round on a linear axis', () => {
    const { scan } = good(varied(['{ path: supply.voltage.step, from: 200 V, to: 300 V, points: 11 }']));
    expect(Array.from(scan?.axes[0].values ?? [])).toEqual([200, 210, 220, 230, 240, 250, 260, 270, 280, 290, 300]);
  });

  it('a log axis may be negative', () => {
    const { scan } = good(varied(['{ path: supply.voltage.step, from: -100 V, to: -1 kV, points: 3, spacing: log }']));
    expect(scan?.axes[0].values[1]).toBeCloseTo(-Math.sqrt(1e5), 9);
  });

  it('plain numbers have the unit 1, per cent included', () => {
    const { scan } = good(varied(['{ path: electrodes.left.ion_yield, values: [1 %, 0.02] }']));
    expect(scan?.axes[0]).toEqual({ path: 'electrodes.left.ion_yield', unit: '1', values: Float64Array.of(0.01, 0.02) });
  });

  it('an entry of several kinds takes the one its values have', () => {
    const at = (value: string): unknown =>
      good(
        `${OWN_GAS}scan: { vary: [{ path: gas.coefficients.ion_mobility, values: [${value}] }, { path: gas.coefficients.ionisation.A, values: [9 1/(cm Torr)] }] }`,
      ).scan?.axes.map((axis) => axis.unit);
    expect(at('1e24 1/(m V s)')).toEqual(['1/(m V s)', '1/(m Pa)']);
    expect(at('1.5e3 cm^2 Torr/(V s)')).toEqual(['m^2 Pa/(V s)', '1/(m Pa)']);
  });

  it('list items are reached by index', () => {
    const text = varied(['{ path: observe.currents.1, values: [1 uA, 2 uA] }']).replace('5 ms', '5 ms\n  currents: [1 nA]');
    const { at } = good(text);
    expect(at([2e-6])).toMatchObject({ ok: true, case: { observe: { currents: [1e-9, 2e-6] } } });
  });

  it('defaults are zip: false, spacing: linear and a tolerance of 0.1 %, and are listed', () => {
    const { scan, defaults } = good(
      varied(['{ path: gap.spacing, from: 6 mm, to: 7 mm, points: 2 }'], '  find: { what: hold-off, from: 200 V, to: 900 V }\n'),
    );
    expect(scan?.find).toEqual({ what: 'hold-off', from: 200, to: 900, tolerance: 1e-3 });
    expect(defaults).toEqual(
      expect.arrayContaining([
        { path: 'scan.vary.0.spacing', value: 'linear' },
        { path: 'scan.zip', value: 'false' },
        { path: 'scan.find.tolerance', value: '0.1 %' },
      ]),
    );
  });

  it('the three searches', () => {
    const tripped = (text: string): string => text.replace('100 kohm', '100 kohm\n  trip: { current: 1 mA, delay: 20 us }');
    expect(good(searching('{ what: series-resistance, from: 100 ohm, to: 100 Mohm, tolerance: 1 % }')).scan).toEqual({
      axes: [],
      zip: false,
      find: { what: 'series-resistance', from: 100, to: 1e8, tolerance: 0.01 },
    });
    expect(good(tripped(searching('{ what: trip-delay, gap_energy: 1 mJ, from: 1 us, to: 1 s }'))).scan?.find).toEqual({
      what: 'trip-delay',
      gapEnergy: 1e-3,
      from: 1e-6,
      to: 1,
      tolerance: 1e-3,
    });
  });

  it('the settings are frozen', () => {
    const { scan } = good(varied([PRESSURE], '  find: { what: hold-off, from: 200 V, to: 900 V }\n'));
    expect(Object.isFrozen(scan) && Object.isFrozen(scan?.axes) && Object.isFrozen(scan?.axes[0]) && Object.isFrozen(scan?.find)).toBe(
      true,
    );
  });

  it('a plan of a million points is read at once, as axes', () => {
    const start = performance.now();
    const { scan } = good(
      varied([
        '{ path: gas.pressure, from: 0.1 Torr, to: 10 Torr, points: 1000, spacing: log }',
        '{ path: supply.voltage.step, from: 300 V, to: 500 V, points: 1000 }',
      ]),
    );
    const line = good(varied(['{ path: gas.pressure, from: 0.1 Torr, to: 10 Torr, points: 1000000, spacing: log }']));
    // generous: it takes a tenth of a second
    expect(performance.now() - start).toBeLessThan(2000);
    expect(scan?.axes.map((axis) => axis.values.length)).toEqual([1000, 1000]);
    const values = line.scan?.axes[0].values ?? new Float64Array(0);
    expect(values).toHaveLength(1_000_000);
    expect(values.every((v, i) => i === 0 || v > values[i - 1])).toBe(true);
    expect(line.resolved).toMatchObject({ 'scan.vary.0.points': 1_000_000, 'scan.vary.0.from': 0.1 * TORR, 'scan.vary.0.to': 10 * TORR });
  });

  it('--set reaches into it, and one form of an entry removes the other', () => {
    const { scan } = good(varied([PRESSURE]), ['scan.vary.0.values=[1 Torr, 2 Torr]', 'scan.zip=true']);
    expect(scan).toMatchObject({ zip: true, axes: [{ values: Float64Array.of(TORR, 2 * TORR) }] });
    expect(good(varied([STEP]), ['scan.vary.0.from=1 V', 'scan.vary.0.to=3 V', 'scan.vary.0.points=3']).scan?.axes[0].values).toEqual(
      Float64Array.of(1, 2, 3),
    );
    expect(good(varied([STEP]), ['scan=']).scan).toBeNull();
    expect(problem(varied([STEP]), ['scan.vary.0.values=[5 mm]'])).toMatchObject({
      file: '--set scan.vary.0.values',
      path: 'scan.vary.0.values.0',
      code: 'wrong-dimension',
    });
  });

  it('the flat record holds counts and ends', () => {
    const { resolved } = good(varied([PRESSURE], '  find: { what: hold-off, from: 200 V, to: 900 V }\n'));
    expect(Object.fromEntries(Object.entries(resolved).filter(([path]) => path.startsWith('scan.')))).toEqual({
      'scan.vary.0.path': 'gas.pressure',
      'scan.vary.0.unit': 'Pa',
      'scan.vary.0.points': 25,
      'scan.vary.0.from': 0.1 * TORR,
      'scan.vary.0.to': 10 * TORR,
      'scan.zip': false,
      'scan.find.what': 'hold-off',
      'scan.find.from': 200,
      'scan.find.to': 900,
      'scan.find.tolerance': 1e-3,
    });
  });
});

/** [what is wrong, entry of `vary` at line 20, path, column, code, part of what is expected, part of what is found, nearest] */
type Row = [string, string, string, number, string, string, string, string | null];

const AXES: Row[] = [
  [
    'an unknown path',
    '{ path: gas.presure, values: [1 Pa] }',
    '.path',
    15,
    'unknown-key',
    'the path of a quantity',
    'gas.presure',
    'gas.pressure',
  ],
  ['a path to nowhere', '{ path: zzz.yyy, values: [1 Pa] }', '.path', 15, 'unknown-key', 'the path of a quantity', 'zzz.yyy', null],
  ['an empty path', '{ path: "", values: [1 Pa] }', '.path', 15, 'unknown-key', 'the path of a quantity', 'nothing', null],
  [
    'a path of prototypes',
    '{ path: __proto__.x, values: [1 Pa] }',
    '.path',
    15,
    'unknown-key',
    'the path of a quantity',
    '__proto__.x',
    null,
  ],
  [
    'a mapping',
    '{ path: gas, values: [1 Pa] }',
    '.path',
    15,
    'wrong-type',
    'the path of a quantity',
    'gas, a mapping with the keys name, data, mixture, pressure',
    null,
  ],
  [
    'a list',
    '{ path: observe.currents, values: [1 A] }',
    '.path',
    15,
    'wrong-type',
    'the path of a quantity',
    'observe.currents, a list',
    null,
  ],
  ['a text', '{ path: title, values: [a] }', '.path', 15, 'wrong-type', 'the path of a quantity', 'title, text', null],
  ['a name', '{ path: gap.geometry, values: [planar] }', '.path', 15, 'wrong-type', 'the path of a quantity', 'gap.geometry, text', null],
  [
    'an entry inside a quantity',
    '{ path: gap.spacing.mm, values: [6] }',
    '.path',
    15,
    'unknown-key',
    'the path of a quantity',
    'gap.spacing.mm, an entry inside the quantity gap.spacing',
    'gap.spacing',
  ],
  [
    'the scan itself',
    '{ path: scan.find.from, values: [6 V] }',
    '.path',
    15,
    'unknown-key',
    'outside scan and history',
    'scan.find.from',
    null,
  ],
  ['the history', '{ path: history.margin, values: [2] }', '.path', 15, 'unknown-key', 'outside scan and history', 'history.margin', null],
  ['no path', '{ values: [1 Pa] }', '.path', 7, 'missing-key', 'the path of a quantity', 'nothing', null],
  [
    'a wrong dimension',
    '{ path: gas.pressure, values: [1 Pa, 5 V] }',
    '.values.1',
    46,
    'wrong-dimension',
    'a pressure from 1e-3 Pa',
    '5 V, a voltage',
    null,
  ],
  [
    'a missing unit',
    '{ path: gas.pressure, values: [1 Pa, 5] }',
    '.values.1',
    44,
    'missing-unit',
    'a pressure from 1e-3 Pa',
    '5 without a unit',
    null,
  ],
  [
    'a value below its bounds',
    '{ path: gas.pressure, values: [-1 Torr] }',
    '.values.0',
    38,
    'out-of-range',
    'a pressure from 1e-3 Pa',
    '-1 Torr',
    null,
  ],
  [
    'an unknown unit',
    '{ path: gas.pressure, values: [1 torr] }',
    '.values.0',
    40,
    'unknown-unit',
    'a pressure',
    'unknown unit "torr"',
    'Torr',
  ],
  ['NaN', '{ path: gas.pressure, values: [.nan] }', '.values.0', 38, 'not-finite', 'a quantity', 'NaN', null],
  ['a list among the values', '{ path: gas.pressure, values: [[1 Pa]] }', '.values.0', 38, 'wrong-type', 'a quantity', 'a list', null],
  [
    'an end of wrong dimension',
    '{ path: gas.pressure, from: 1 Pa, to: 5 V, points: 3 }',
    '.to',
    47,
    'wrong-dimension',
    'a pressure',
    '5 V, a voltage',
    null,
  ],
  [
    'an end below its bounds',
    '{ path: gap.spacing, from: 0 mm, to: 5 mm, points: 3 }',
    '.from',
    34,
    'out-of-range',
    'a length above 0',
    '0 mm',
    null,
  ],
  [
    'equal ends',
    '{ path: gas.pressure, from: 1 Pa, to: 1e-3 kPa, points: 3 }',
    '.to',
    45,
    'inconsistent',
    'differs from `from`',
    '1e-3 kPa',
    null,
  ],
  ['one point', '{ path: gas.pressure, from: 1 Pa, to: 5 Pa, points: 1 }', '.points', 59, 'out-of-range', 'from 2 to 1000000', '1', null],
  [
    'a broken number of points',
    '{ path: gas.pressure, from: 1 Pa, to: 5 Pa, points: 2.5 }',
    '.points',
    59,
    'out-of-range',
    'a whole number',
    '2.5',
    null,
  ],
  [
    'too many points',
    '{ path: gas.pressure, from: 1 Pa, to: 5 Pa, points: 1000001 }',
    '.points',
    59,
    'out-of-range',
    'from 2 to 1000000',
    '1000001',
    null,
  ],
  [
    'a log axis from 0',
    '{ path: supply.voltage.step, from: 0 V, to: 5 V, points: 3, spacing: log }',
    '.from',
    42,
    'inconsistent',
    'ends on one side of 0',
    '0',
    null,
  ],
  [
    'a log axis through 0',
    '{ path: supply.voltage.step, from: -1 V, to: 5 V, points: 3, spacing: log }',
    '.to',
    52,
    'inconsistent',
    'ends on one side of 0',
    'ends on both sides',
    null,
  ],
  [
    'an unknown spacing',
    '{ path: gas.pressure, from: 1 Pa, to: 5 Pa, points: 3, spacing: lin }',
    '.spacing',
    71,
    'unknown-name',
    'linear or log',
    'lin',
    null,
  ],
  ['no values', '{ path: gas.pressure }', '', 7, 'either-or', 'either values, or from, to and points', 'none of them', null],
  ['an empty list', '{ path: gas.pressure, values: [] }', '.values', 37, 'wrong-type', 'at least one item', 'a list', null],
  [
    'values and a range',
    '{ path: gas.pressure, values: [1 Pa], from: 1 Pa }',
    '.from',
    51,
    'either-or',
    'either values, or from, to and points',
    'values and from',
    null,
  ],
  [
    'a range without points',
    '{ path: gas.pressure, from: 1 Pa, to: 5 Pa }',
    '.points',
    7,
    'missing-key',
    'points, required without values',
    'nothing',
    null,
  ],
  [
    'a range without an end',
    '{ path: gas.pressure, from: 1 Pa, points: 3 }',
    '.to',
    7,
    'missing-key',
    'to, required without values',
    'nothing',
    null,
  ],
  [
    'an unknown key',
    '{ path: gas.pressure, value: [1 Pa], from: 1 Pa, to: 5 Pa, points: 3 }',
    '.value',
    29,
    'unknown-key',
    'a key of scan.vary.0',
    'value',
    'values',
  ],
  [
    'whole numbers that come out broken',
    '{ path: numerics.cells, from: 50, to: 100, points: 4 }',
    '.points',
    58,
    'inconsistent',
    'makes every value of numerics.cells whole',
    '66.6',
    null,
  ],
  [
    'a broken number of cells',
    '{ path: numerics.cells, values: [50.5] }',
    '.values.0',
    40,
    'out-of-range',
    'a whole number from 20',
    '50.5',
    null,
  ],
  [
    'a value twice',
    '{ path: gas.pressure, values: [1 kPa, 1000 Pa] }',
    '.path',
    15,
    'inconsistent',
    'every value once',
    '1000 Pa again',
    null,
  ],
];

describe('each mistake of a varied entry is placed at its own line', () => {
  for (const [what, entry, path, column, code, expected, found, nearest] of AXES) {
    it(what, () => {
      const one = problem(varied([entry]));
      expect(one).toMatchObject({ file: 'case.yaml', line: 20, path: `scan.vary.0${path}`, code, nearest });
      expect(one.expected).toContain(expected);
      expect(one.found).toContain(found);
      expect(one.column).toBe(column);
    });
  }

  it('an index past the end of a list', () => {
    const text = varied(['{ path: observe.currents.2, values: [1 A] }']).replace('5 ms', '5 ms\n  currents: [1 nA]');
    expect(problem(text)).toMatchObject({
      path: 'scan.vary.0.path',
      line: 21,
      code: 'set',
      expected: 'a case that is right with observe.currents.2 = 1 A',
      found: 'scan.vary.0.path: expected an index from 0 to 1 in observe.currents, found observe.currents.2',
    });
  });

  it('values of two kinds', () => {
    const text = `${OWN_GAS}scan:\n  vary: [{ path: gas.coefficients.ion_mobility, values: [1e24 1/(m V s), 1.5e3 cm^2 Torr/(V s)] }]\n`;
    expect(problem(text)).toMatchObject({
      path: 'scan.vary.0.values.1',
      code: 'inconsistent',
      expected: 'values of one kind',
      found: 'a mobility times a pressure beside a mobility times a density',
    });
    const range = text.replace(/values: .*\]/, 'from: 1e24 1/(m V s), to: 1.5e3 cm^2 Torr/(V s), points: 3 }]');
    expect(problem(range)).toMatchObject({ path: 'scan.vary.0.to', expected: 'values of one kind' });
  });

  it('many wrong values of one list are twenty problems', () => {
    expect(problems(varied([`{ path: gas.pressure, values: [${Array(50).fill('1 V').join(', ')}] }`]))).toHaveLength(20);
  });

  it('all mistakes of all entries are reported at once, beside those of the case', () => {
    const text = varied([
      '{ path: gas.presure, values: [1 Pa] }',
      '{ path: gas.pressure, from: 1 V, to: 2 V, points: 0 }',
      '{ path: gap.area, value: 1 }',
    ]).replace('6 mm', '6');
    expect(problems(text).map((p) => `${p.line}:${p.path}:${p.code}`)).toEqual([
      '4:gap.spacing:missing-unit',
      '20:scan.vary.0.path:unknown-key',
      '21:scan.vary.1.from:wrong-dimension',
      '21:scan.vary.1.to:wrong-dimension',
      '21:scan.vary.1.points:out-of-range',
      '22:scan.vary.2:either-or',
      '22:scan.vary.2.value:unknown-key',
    ]);
  });
});

describe('entries of a scan must fit together', () => {
  it('a path twice', () => {
    expect(problem(varied([PRESSURE, PRESSURE]))).toMatchObject({ path: 'scan.vary.1.path', line: 21, expected: 'every path once' });
  });

  it('lengths that differ with zip: true', () => {
    expect(problem(varied([PRESSURE, STEP], '  zip: true\n'))).toMatchObject({
      path: 'scan.vary.1',
      line: 21,
      code: 'inconsistent',
      expected: '25 values, as many as the first entry has (zip: true)',
      found: '3',
    });
    expect(good(varied([STEP, '{ path: gas.pressure, values: [1 Pa, 1 Pa, 2 Pa] }'], '  zip: true\n')).scan?.zip).toBe(true);
  });

  it('more than a million points in a grid', () => {
    const line = (path: string): string => `{ path: ${path}, from: 1 kV, to: 2 kV, points: 1001 }`;
    const text = varied([line('supply.voltage.step'), line('supply.initial_gap_voltage')]);
    expect(problem(text)).toMatchObject({
      path: 'scan.vary',
      code: 'too-large',
      expected: 'at most 1000000 points in all',
      found: '1002001',
    });
    expect(good(text.replace('1001', '1000').replace('1001', '1000')).scan?.axes).toHaveLength(2);
    expect(good(`${text}  zip: true\n`).scan?.axes).toHaveLength(2);
  });

  it('entries that exclude each other', () => {
    const text = varied([STEP, '{ path: supply.voltage.ramp.to, values: [5 V] }']);
    expect(problem(text)).toMatchObject({
      path: 'scan.vary.1.path',
      line: 21,
      code: 'inconsistent',
      found: 'supply.voltage.ramp.to, which excludes supply.voltage.step',
    });
    const mobility = `${OWN_GAS}scan: { vary: [{ path: gas.coefficients.ion_mobility, values: [1e24 1/(m V s)] }, { path: gas.coefficients.ion_mobility.K0, values: [1 cm^2/(V s)] }] }`;
    expect(problem(mobility)).toMatchObject({ path: 'scan.vary.1.path', code: 'inconsistent' });
  });

  it('more than twenty entries, none, no list', () => {
    expect(problems(varied(Array(21).fill(STEP)))[0]).toMatchObject({ path: 'scan.vary', expected: 'at most 20 items' });
    expect(problem(`${GOOD}scan: { vary: [] }\n`)).toMatchObject({ path: 'scan.vary', line: 18, expected: 'at least one item' });
    expect(problem(`${GOOD}scan: { vary: 5 }\n`)).toMatchObject({ path: 'scan.vary', code: 'wrong-type' });
    expect(problem(`${GOOD}scan: {}\n`)).toMatchObject({ path: 'scan', code: 'missing-key', expected: 'vary, find, or both' });
    expect(problem(`${GOOD}scan: { zip: yes, vary: [${STEP}] }\n`)).toMatchObject({ path: 'scan.zip', code: 'wrong-type', found: 'yes' });
  });

  it('an end that makes no case whatever the other entries are', () => {
    const around = varied(['{ path: gap.spacing, from: 5 mm, to: 50 mm, points: 5 }']).replace('12 cm^2', '12 cm^2\n  longest_path: 25 mm');
    const found = problem(around);
    expect(found).toMatchObject({
      path: 'scan.vary.0.path',
      line: 21,
      code: 'inconsistent',
      expected: 'a case that is right with gap.spacing = 0.05 m',
    });
    expect(found.found).toBe('gap.longest_path: expected a length not below gap.spacing, found 25 mm');
    expect(formatProblem(found)).toContain('case.yaml:21:15: scan.vary.0.path: expected a case that is right with');
    // a delay alone is no trip, at any value
    expect(problems(varied(['{ path: supply.trip.delay, values: [1 us, 2 us] }']))).toMatchObject([
      { path: 'scan.vary.0.path', code: 'missing-key' },
    ]);
    // nickel has no yield in a gas of the case's own; that the file is right does not help
    expect(problem(varied(['{ path: gas.coefficients.ionisation.A, values: [1 1/(cm Torr)] }'])).found).toContain(
      'gas.coefficients.ionisation',
    );
  });

  it('an end that fits beside some of the others is left to its points', () => {
    const text = varied(['{ path: gap.spacing, values: [5 mm, 50 mm] }', '{ path: gap.longest_path, values: [10 mm, 100 mm] }']);
    const { at } = good(text);
    expect([at([0.005, 0.01]).ok, at([0.05, 0.01]).ok, at([0.05, 0.1]).ok]).toEqual([true, false, true]);
    // walking together, each point counts
    expect(good(`${text}  zip: true\n`).scan?.zip).toBe(true);
    expect(problem(`${text.replace('[10 mm, 100 mm]', '[100 mm, 10 mm]')}  zip: true\n`)).toMatchObject({ line: 20, code: 'inconsistent' });
  });
});

/** [what is wrong, the search at line 19, path, code, part of what is expected, part of what is found] */
const FINDS: [string, string, string, string, string, string][] = [
  [
    'an unknown search',
    '{ what: holdoff, from: 1 V, to: 2 V }',
    '.what',
    'unknown-name',
    'hold-off, trip-delay or series-resistance',
    'holdoff',
  ],
  ['no search', '{ from: 1 V, to: 2 V }', '.what', 'missing-key', 'hold-off, trip-delay or series-resistance', 'nothing'],
  [
    'a time for a voltage',
    '{ what: hold-off, from: 1 s, to: 2 V }',
    '.from',
    'wrong-dimension',
    'a voltage above 0 and up to 10 MV',
    '1 s, a time',
  ],
  ['a negative voltage', '{ what: hold-off, from: -1 V, to: 2 V }', '.from', 'out-of-range', 'a voltage above 0', '-1 V'],
  [
    'a voltage for a resistance',
    '{ what: series-resistance, from: 1 ohm, to: 2 V }',
    '.to',
    'wrong-dimension',
    'a resistance above 0',
    '2 V, a voltage',
  ],
  ['a number for a voltage', '{ what: hold-off, from: 1, to: 2 V }', '.from', 'missing-unit', 'a voltage above 0', '1 without a unit'],
  ['ends the wrong way round', '{ what: hold-off, from: 2 V, to: 1 V }', '.to', 'inconsistent', 'an end above from', '1 V'],
  ['equal ends', '{ what: hold-off, from: 2 V, to: 2 V }', '.to', 'inconsistent', 'an end above from', '2 V'],
  ['no end', '{ what: hold-off, from: 2 V }', '.to', 'missing-key', 'a quantity', 'nothing'],
  [
    'an energy it does not take',
    '{ what: hold-off, from: 1 V, to: 2 V, gap_energy: 1 J }',
    '.gap_energy',
    'either-or',
    'only with what: trip-delay',
    'gap_energy with hold-off',
  ],
  [
    'a tolerance too fine',
    '{ what: hold-off, from: 1 V, to: 2 V, tolerance: 1e-6 }',
    '.tolerance',
    'out-of-range',
    'from 1e-5 to 0.1',
    '0.000001',
  ],
  [
    'a tolerance too coarse',
    '{ what: hold-off, from: 1 V, to: 2 V, tolerance: 20 % }',
    '.tolerance',
    'out-of-range',
    'from 1e-5 to 0.1',
    '20 %',
  ],
  ['an unknown key', '{ what: hold-off, from: 1 V, to: 2 V, tol: 1 % }', '.tol', 'unknown-key', 'a key of scan.find', 'tol'],
  [
    'a trip delay without a trip',
    '{ what: trip-delay, gap_energy: 1 J, from: 1 us, to: 1 s }',
    '.what',
    'inconsistent',
    'supply.trip in the case',
    'no supply.trip',
  ],
];

describe('each mistake of a search is placed at its own line', () => {
  for (const [what, find, path, code, expected, found] of FINDS) {
    it(what, () => {
      const one = problem(searching(find));
      expect(one).toMatchObject({ line: 19, path: `scan.find${path}`, code });
      expect(one.expected).toContain(expected);
      expect(one.found).toContain(found);
    });
  }

  it('a trip delay without its energy', () => {
    const text = searching('{ what: trip-delay, from: 1 us, to: 1 s }').replace(
      '100 kohm',
      '100 kohm\n  trip: { current: 1 mA, delay: 1 us }',
    );
    expect(problem(text)).toMatchObject({ path: 'scan.find.gap_energy', code: 'missing-key', found: 'nothing' });
  });

  it('a supply that stays at 0 V has nothing to scale', () => {
    const zero = (text: string): string =>
      text.replace('step: 420 V', 'step: 0 V').replace('100 kohm', '100 kohm\n  initial_gap_voltage: 400 V');
    expect(problem(zero(searching('{ what: hold-off, from: 1 V, to: 2 V }')))).toMatchObject({
      path: 'scan.find.what',
      code: 'inconsistent',
      found: 'a supply at 0 V throughout',
    });
    expect(good(zero(searching('{ what: series-resistance, from: 1 ohm, to: 1 kohm }'))).scan).not.toBeNull();
    const table = zero(searching('{ what: hold-off, from: 1 V, to: 2 V }')).replace(
      'step: 0 V',
      'table: { file: a.csv, time: t, voltage: v }',
    );
    expect(problem(table, [], { 'a.csv': 't [s],v [V]\n0,0\n1,0\n' })).toMatchObject({ path: 'scan.find.what' });
    const ramp = zero(searching('{ what: hold-off, from: 1 V, to: 2 V }')).replace(
      'step: 0 V',
      'ramp: { from: 0 V, to: 0 V, rate: 1 V/s }',
    );
    expect(problem(ramp)).toMatchObject({ path: 'scan.find.what' });
    // and at a point
    const through = zero(
      varied(['{ path: supply.voltage.step, values: [0 V, 5 V] }'], '  find: { what: hold-off, from: 1 V, to: 2 V }\n'),
    ).replace('step: 0 V', 'step: 1 V');
    expect(problem(through)).toMatchObject({ line: 21, path: 'scan.vary.0.path', code: 'inconsistent' });
  });

  it('entries of the wrong type are problems, never faults', () => {
    for (const wrong of ['{ a: 1 }', '[1]', '__proto__', 'null'])
      expect(problems(varied([STEP], `  find: { what: ${wrong}, from: 1 V, to: 2 V }\n`)).map((p) => p.path)).toEqual(['scan.find.what']);
    const trip = searching('{ what: trip-delay, gap_energy: 1 J, from: 1 us, to: 1 s }');
    expect(problems(trip.replace(/supply:\n(.*\n){2}/, 'supply:\n')).map((p) => p.path)).toContain('supply');
    expect(problems(trip.replace('100 kohm', '100 kohm\n  trip: 5')).map((p) => p.path)).toEqual(['supply.trip']);
  });

  it('what is searched for cannot be varied too', () => {
    const resistance = varied(
      ['{ path: supply.series_resistance, values: [1 ohm] }'],
      '  find: { what: series-resistance, from: 1 ohm, to: 1 kohm }\n',
    );
    expect(problem(resistance)).toMatchObject({ line: 20, path: 'scan.vary.0.path', found: 'supply.series_resistance' });
    // the voltage may be: its sign says which electrode is the cathode
    expect(good(varied([STEP], '  find: { what: hold-off, from: 1 V, to: 2 V }\n')).scan?.axes).toHaveLength(1);
  });
});
