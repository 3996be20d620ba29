import { describe, expect, it } from 'vitest';
import type { DatasetRead } from '../../src/casefile/index.ts';
import { FLOW_GASES } from '../../src/surroundings/flow-gas.ts';
import { historyOf } from '../../src/surroundings/history.ts';
import { following, GOOD, good, OWN_GAS, problem, problems } from './help.ts';

const TORR = 101325 / 760;
const ASCENT = '{ ascent: { from: 0 km, to: 35 km, rate: 5 m/s } }';
const BAY = '{ bay: { volume: 12 L, start: 101325 Pa, gas_load: 1e-4 mbar L/s } }';
const TABLE = '{ table: { file: p.csv, time: t, pressure: p } }';
const ROWS = { 'p.csv': 't [min],p [Torr]\n0,760\n60,1\n90,0\n' };

describe('a history is read into SI with every default resolved', () => {
  it('the example of the design page', () => {
    const { window, resolved } = good(`${GOOD.replace('1.2 Torr', '1.2 Torr\n  temperature: 300 K')}history:
  duration: 3 h
  pressure:
    bay:
      volume: 12 L
      start: 101325 Pa
      outside: { pressure: 0 Pa }
      vents:      [ { diameter: 5 mm, length: 2 mm, count: 4, discharge_coefficient: 0.65 } ]
      pump:       { speed: 50 L/s, base_pressure: 1e-6 mbar }
      gas_load:   1e-4 mbar L/s
      outgassing: [ { area: 0.4 m^2, rate_at_1h: 1e-8 Torr L/(s cm^2), exponent: 1.0 } ]
  temperature: 295 K
  voltage: 400 V
  margin: 2
`);
    expect(window).toEqual({
      history: {
        duration: 10800,
        pressure: {
          kind: 'bay',
          bay: {
            volume: 0.012,
            start: 101325,
            gas: FLOW_GASES.argon,
            outside: { kind: 'fixed', pressure: 0 },
            vents: [{ diameter: 0.005, length: 0.002, count: 4, dischargeCoefficient: 0.65 }],
            pump: { speed: 0.05, basePressure: 1e-4 },
            gasLoad: 1e-5,
            outgassing: [{ area: 0.4, rateAtOneHour: expect.closeTo(1e-8 * TORR * 1e-3 * 1e4, 18), exponent: 1 }],
          },
        },
        temperature: 295,
      },
      voltage: 400,
      margin: 2,
    });
    expect(resolved).toMatchObject({ 'history.duration': 10800, 'history.pressure.bay.vents.0.count': 4, 'history.margin': 2 });
  });

  it('what is left out takes its default, and the default is listed', () => {
    const vent =
      '{ bay: { volume: 1 L, start: 1 bar, outside: { pressure: 1 kPa }, vents: [{ diameter: 1 mm, length: 0 mm }], pump: { speed: 1 L/s } } }';
    const { window, defaults } = good(following(vent).replace('step: 420 V', 'step: -420 V'));
    expect(window).toMatchObject({ voltage: -420, margin: 1.5, history: { temperature: 293.15 } });
    const { pressure } = window?.history ?? {};
    expect(pressure?.kind === 'bay' && pressure.bay).toMatchObject({
      vents: [{ diameter: 0.001, length: 0, count: 1, dischargeCoefficient: 0.7 }],
      pump: { speed: 0.001, basePressure: 0 },
      gasLoad: 0,
      outgassing: [],
    });
    expect(Object.fromEntries(defaults.filter(({ path }) => path.startsWith('history.')).map(({ path, value }) => [path, value]))).toEqual({
      'history.temperature': 'gas.temperature',
      'history.voltage': '-420 V, the largest of supply.voltage',
      'history.margin': '1.5',
      'history.pressure.bay.vents.0.count': '1',
      'history.pressure.bay.vents.0.discharge_coefficient': '0.7',
      'history.pressure.bay.pump.base_pressure': '0 Pa',
      'history.pressure.bay.gas_load': '0 Pa m^3/s',
      'history.pressure.bay.outgassing': 'none',
    });
    const bare = good(following(BAY));
    expect(bare.window?.history.pressure).toMatchObject({ bay: { outside: null, vents: [], pump: null } });
    expect(bare.defaults.map(({ path }) => path)).toEqual(
      expect.arrayContaining(['outside', 'vents', 'pump'].map((key) => `history.pressure.bay.${key}`)),
    );
  });

  it('the default voltage is the largest of any programme, with its sign', () => {
    const voltage = (programme: string, tables = {}): unknown =>
      good(following(BAY).replace('step: 420 V', programme), [], tables).window?.voltage;
    expect(voltage('ramp: { from: -600 V, to: 500 V, rate: 1 V/s }')).toBe(-600);
    expect(voltage('ramp: { from: 0 V, to: 500 V, rate: 1 V/s }')).toBe(500);
    expect(voltage('table: { file: v.csv, time: t, voltage: v }', { 'v.csv': 't [s],v [kV]\n0,0\n1,-2\n2,1\n' })).toBe(-2000);
  });

  it('a table gives rows, and the duration where every entry is one', () => {
    const { window, resolved, tables, defaults } = good(following(TABLE, ''), [], ROWS);
    expect(window?.history).toEqual({
      duration: 5400,
      pressure: { kind: 'table', rows: { times: Float64Array.of(0, 3600, 5400), values: Float64Array.of(760 * TORR, TORR, 0) } },
      temperature: 293.15,
    });
    expect(resolved['history.pressure.table']).toMatch(/^sha256:[0-9a-f]{64}$/);
    expect(tables).toEqual([{ path: 'history.pressure.table', file: 'p.csv', text: ROWS['p.csv'] }]);
    expect(defaults).toContainEqual({ path: 'history.duration', value: '5400 s, the last row' });
  });

  it('temperature and voltage may follow tables; the longest gives the duration', () => {
    const more = `  temperature: { table: { file: T.csv, time: t, temperature: T } }
  voltage: { table: { file: v.csv, time: t, voltage: v } }
`;
    const files = { ...ROWS, 'T.csv': 't [h],T [K]\n0,293\n2,260\n', 'v.csv': 't [s],v [V]\n0,0\n60,400\n' };
    const { window, tables } = good(following(TABLE, more), [], files);
    expect(window).toMatchObject({
      history: { duration: 7200, temperature: { times: Float64Array.of(0, 7200), values: Float64Array.of(293, 260) } },
      voltage: { times: Float64Array.of(0, 60), values: Float64Array.of(0, 400) },
    });
    expect(tables.map(({ path }) => path)).toEqual(['history.pressure.table', 'history.temperature.table', 'history.voltage.table']);
  });

  it('ascents up and down, alone and outside a bay', () => {
    expect(good(following(ASCENT)).window?.history.pressure).toEqual({ kind: 'ascent', ascent: { from: 0, to: 35000, rate: 5 } });
    expect(good(following('{ ascent: { from: 86 km, to: 0 m, rate: -100 m/s } }')).window?.history.pressure).toMatchObject({
      ascent: { rate: -100 },
    });
    const bay = BAY.replace('gas_load', `outside: ${ASCENT}, gas_load`);
    expect(good(following(bay)).window?.history.pressure).toMatchObject({ bay: { outside: { kind: 'ascent', ascent: { to: 35000 } } } });
    const outside = BAY.replace('gas_load', `outside: ${TABLE}, gas_load`);
    const { window, tables } = good(following(outside), [], ROWS);
    expect(window?.history.pressure).toMatchObject({
      bay: { outside: { kind: 'table', rows: { times: Float64Array.of(0, 3600, 5400) } } },
    });
    expect(tables.map(({ path }) => path)).toEqual(['history.pressure.bay.outside.table']);
  });

  it("the bay's gas is that of the gap; coefficients of the case's own flow as air, and that is noted", () => {
    const gas = (text: string): unknown => {
      const { window, notes } = good(text);
      return [window?.history.pressure.kind === 'bay' && window.history.pressure.bay.gas, notes.filter((note) => note.includes('bay'))];
    };
    expect(gas(following(BAY).replace('argon', 'nitrogen'))).toEqual([FLOW_GASES.nitrogen, []]);
    expect(gas(`${OWN_GAS}history: { duration: 1 h, pressure: ${BAY} }`)).toEqual([
      FLOW_GASES.air,
      ["history.pressure.bay: flows are those of air, as those of the case's own gas are not known"],
    ]);
  });

  it('what is accepted can be followed, and is frozen', () => {
    const vents = 'outside: { ascent: { from: 0 km, to: 35 km, rate: 5 m/s } }, vents: [{ diameter: 1 cm, length: 1 mm }], gas_load';
    for (const pressure of [ASCENT, BAY, BAY.replace('gas_load', vents)]) {
      const { window } = good(following(pressure));
      if (window === null) throw new Error('no window');
      expect(historyOf(window.history).pressureAt(0)).toBeCloseTo(101325, 3);
      expect(Object.isFrozen(window) && Object.isFrozen(window.history.pressure)).toBe(true);
    }
    expect(historyOf(good(following(TABLE, ''), [], ROWS).window?.history ?? (null as never)).pressureAt(1800)).toBeCloseTo(
      380.5 * TORR,
      6,
    );
  });

  it('--set reaches into it, and one arm of the pressure removes the others', () => {
    const climbing = good(following(BAY), [
      'history.pressure.ascent.from=0 km',
      'history.pressure.ascent.to=1 km',
      'history.pressure.ascent.rate=1 m/s',
    ]);
    expect(climbing.window?.history.pressure.kind).toBe('ascent');
    const bay = following(BAY.replace('gas_load', 'outside: { pressure: 1 Pa }, gas_load'));
    expect(good(bay, ['history.pressure.bay.outside.ascent={from: 0 km, to: 1 km, rate: 1 m/s}']).window?.history.pressure).toMatchObject({
      bay: { outside: { kind: 'ascent' } },
    });
    expect(good(following(BAY), ['history=']).window).toBeNull();
  });
});

/** [what is wrong, pressure at line 19 (null: the bay), more from line 20 on, path, code, part of what is expected, part of what is found] */
type Row = [string, string | null, string, string, string, string, string];

const DURATION = '  duration: 3 h\n';
const bay = (more: string): string => BAY.replace('gas_load: 1e-4 mbar L/s', more);
const vent = (text: string): string => bay(`outside: { pressure: 0 Pa }, vents: [{ ${text} }]`);

const MISTAKES: Row[] = [
  ['no duration with a bay', null, '', 'duration', 'missing-key', 'required unless every entry is a table', 'nothing'],
  ['no duration with an ascent', ASCENT, '', 'duration', 'missing-key', 'required unless every entry is a table', 'nothing'],
  [
    'no duration with a steady voltage',
    TABLE,
    '  voltage: 400 V\n',
    'duration',
    'missing-key',
    'required unless every entry is a table',
    'nothing',
  ],
  ['no duration with a steady temperature', TABLE, '  temperature: 300 K\n', 'duration', 'missing-key', 'required unless', 'nothing'],
  [
    'a table that ends at 0',
    '{ table: { file: past.csv, time: t, pressure: p } }',
    '',
    'duration',
    'missing-key',
    'end at 0 s or before',
    'nothing',
  ],
  ['a duration of zero', null, '  duration: 0 s\n', 'duration', 'out-of-range', 'a time above 0', '0 s'],
  ['a duration in volts', null, '  duration: 5 V\n', 'duration', 'wrong-dimension', 'a time above 0', '5 V, a voltage'],
  ['an unknown key', null, `${DURATION}  durations: 3 h\n`, 'durations', 'unknown-key', 'a key of history', 'durations'],
  ['no pressure', '', DURATION, 'pressure', 'missing-key', 'a mapping with the keys table, dataset, ascent, bay', 'nothing'],
  ['an empty pressure', '{}', DURATION, 'pressure', 'either-or', 'exactly one of table, dataset, ascent and bay', 'none of them'],
  [
    'two pressures',
    `{ ${ASCENT.slice(2, -2)}, ${BAY.slice(2, -2)} }`,
    DURATION,
    'pressure.bay',
    'either-or',
    'exactly one of',
    'ascent and bay',
  ],
  ['a steady pressure', '5 Pa', DURATION, 'pressure', 'wrong-type', 'a mapping with the keys', '5 Pa'],
  ['a margin below 1', null, `${DURATION}  margin: 0.9\n`, 'margin', 'out-of-range', 'from 1 to 100', '0.9'],
  ['a margin with a unit', null, `${DURATION}  margin: 2 V\n`, 'margin', 'wrong-dimension', 'a factor on the voltage', '2 V, a voltage'],
  ['a temperature too low', null, `${DURATION}  temperature: -300 °C\n`, 'temperature', 'out-of-range', 'from 4 K to 3000 K', '-300 °C'],
  [
    'a voltage for a temperature',
    null,
    `${DURATION}  temperature: 5 V\n`,
    'temperature',
    'wrong-dimension',
    'a temperature',
    '5 V, a voltage',
  ],
  ['no voltage', null, `${DURATION}  voltage: 0 V\n`, 'voltage', 'inconsistent', 'differs from 0 V', '0 V'],
  [
    'a list for a voltage',
    null,
    `${DURATION}  voltage: [5 V]\n`,
    'voltage',
    'wrong-type',
    'a voltage, e.g. 400 V, or { table: … }',
    'a list',
  ],
  [
    'an unknown column',
    null,
    `${DURATION}  voltage: { table: { file: v.csv, time: t, voltage: bias } }\n`,
    'voltage.table.voltage',
    'table',
    'a column',
    'bias',
  ],
  [
    '0 V in every row',
    null,
    `${DURATION}  voltage: { table: { file: v.csv, time: t, voltage: v } }\n`,
    'voltage.table.voltage',
    'inconsistent',
    'differs from 0 V',
    'every row',
  ],
  [
    'a table not there',
    '{ table: { file: no.csv, time: t, pressure: p } }',
    '',
    'pressure.table.file',
    'unreadable',
    'a CSV file',
    'no such file',
  ],
  [
    'a pressure below 0 in a table',
    '{ table: { file: low.csv, time: t, pressure: p } }',
    '',
    'pressure.table.pressure',
    'out-of-range',
    'from 0 Pa to 1e6 Pa',
    '-1 in SI',
  ],
  [
    'an ascent above the atmosphere',
    ASCENT.replace('35 km', '87 km'),
    DURATION,
    'pressure.ascent.to',
    'out-of-range',
    'from 0 to 86 km',
    '87 km',
  ],
  [
    'an ascent from below the sea',
    ASCENT.replace('0 km', '-1 km'),
    DURATION,
    'pressure.ascent.from',
    'out-of-range',
    'from 0 to 86 km',
    '-1 km',
  ],
  [
    'a descent with a climb rate',
    ASCENT.replace('0 km', '80 km'),
    DURATION,
    'pressure.ascent.rate',
    'inconsistent',
    'a rate below 0',
    '5 m/s',
  ],
  [
    'a climb with a descent rate',
    ASCENT.replace('5 m/s', '-5 m/s'),
    DURATION,
    'pressure.ascent.rate',
    'inconsistent',
    'a rate above 0',
    '-5 m/s',
  ],
  ['a climb at no rate', ASCENT.replace('5 m/s', '0 m/s'), DURATION, 'pressure.ascent.rate', 'inconsistent', 'a rate above 0', '0 m/s'],
  ['an ascent that stays', ASCENT.replace('35 km', '0 m'), DURATION, 'pressure.ascent.to', 'inconsistent', 'differs from `from`', '0 m'],
  [
    'an ascent without a rate',
    '{ ascent: { from: 0 km, to: 1 km } }',
    DURATION,
    'pressure.ascent.rate',
    'missing-key',
    'a velocity',
    'nothing',
  ],
  [
    'a bay without volume',
    BAY.replace('volume: 12 L, ', ''),
    DURATION,
    'pressure.bay.volume',
    'missing-key',
    'a volume above 0',
    'nothing',
  ],
  ['a bay of no volume', BAY.replace('12 L', '0 L'), DURATION, 'pressure.bay.volume', 'out-of-range', 'a volume above 0', '0 L'],
  [
    'a bay without a start',
    BAY.replace('start: 101325 Pa, ', ''),
    DURATION,
    'pressure.bay.start',
    'missing-key',
    'a pressure from 0 Pa',
    'nothing',
  ],
  ['a start below 0', BAY.replace('101325', '-1'), DURATION, 'pressure.bay.start', 'out-of-range', 'a pressure from 0 Pa', '-1 Pa'],
  [
    'vents without an outside',
    bay('vents: [{ diameter: 1 mm, length: 0 mm }]'),
    DURATION,
    'pressure.bay.outside',
    'missing-key',
    'required with vents',
    'nothing',
  ],
  [
    'an outside of two kinds',
    bay(`outside: { pressure: 0 Pa, ${ASCENT.slice(2, -2)} }`),
    DURATION,
    'pressure.bay.outside.ascent',
    'either-or',
    'exactly one of',
    'pressure and ascent',
  ],
  ['an outside of no kind', bay('outside: {}'), DURATION, 'pressure.bay.outside', 'either-or', 'exactly one of', 'none of them'],
  ['a vent without length', vent('diameter: 1 mm'), DURATION, 'pressure.bay.vents.0.length', 'missing-key', 'a length from 0', 'nothing'],
  [
    'a vent of no diameter',
    vent('diameter: 0 mm, length: 1 mm'),
    DURATION,
    'pressure.bay.vents.0.diameter',
    'out-of-range',
    'a length above 0',
    '0 mm',
  ],
  [
    'half a vent',
    vent('diameter: 1 mm, length: 1 mm, count: 0.5'),
    DURATION,
    'pressure.bay.vents.0.count',
    'out-of-range',
    'a whole number',
    '0.5',
  ],
  [
    'a misspelt vent',
    vent('diametre: 1 mm, length: 1 mm, diameter: 1 mm'),
    DURATION,
    'pressure.bay.vents.0.diametre',
    'unknown-key',
    'a key of history.pressure.bay.vents.0',
    'diametre',
  ],
  [
    'a discharge coefficient above 1',
    vent('diameter: 1 mm, length: 1 mm, discharge_coefficient: 1.1'),
    DURATION,
    'pressure.bay.vents.0.discharge_coefficient',
    'out-of-range',
    'up to 1',
    '1.1',
  ],
  [
    'one vent, no list',
    bay('outside: { pressure: 0 Pa }, vents: { diameter: 1 mm, length: 1 mm }'),
    DURATION,
    'pressure.bay.vents',
    'wrong-type',
    'a list of vents',
    'a mapping',
  ],
  [
    'a pump without speed',
    bay('pump: { base_pressure: 1 Pa }'),
    DURATION,
    'pressure.bay.pump.speed',
    'missing-key',
    'a volume per time',
    'nothing',
  ],
  [
    'a pump speed of a gas flow',
    bay('pump: { speed: 1 mbar L/s }'),
    DURATION,
    'pressure.bay.pump.speed',
    'wrong-dimension',
    'a volume per time',
    '1 mbar L/s',
  ],
  [
    'a negative gas load',
    bay('gas_load: -1 Pa m^3/s'),
    DURATION,
    'pressure.bay.gas_load',
    'out-of-range',
    'a gas flow from 0',
    '-1 Pa m^3/s',
  ],
  [
    'outgassing without an exponent',
    bay('outgassing: [{ area: 1 m^2, rate_at_1h: 1e-6 Pa m/s }]'),
    DURATION,
    'pressure.bay.outgassing.0.exponent',
    'missing-key',
    'about 1 for metals',
    'nothing',
  ],
  [
    'outgassing in the wrong unit',
    bay('outgassing: [{ area: 1 m^2, rate_at_1h: 1e-6 Pa, exponent: 1 }]'),
    DURATION,
    'pressure.bay.outgassing.0.rate_at_1h',
    'wrong-dimension',
    'an outgassing rate',
    '1e-6 Pa, a pressure',
  ],
  ['a gas for the bay', bay('gas: argon'), DURATION, 'pressure.bay.gas', 'unknown-key', 'a key of history.pressure.bay', 'gas'],
];

describe('each mistake of a history is placed at its own line', () => {
  const files = {
    ...ROWS,
    'past.csv': 't [s],p [Pa]\n-2,1\n0,2\n',
    'low.csv': 't [s],p [Pa]\n0,1\n1,-1\n',
    'v.csv': 't [s],v [V]\n0,0\n1,0\n',
  };
  for (const [what, pressure, more, path, code, expected, found] of MISTAKES) {
    it(what, () => {
      const one = problem(following(pressure ?? BAY, more), [], files);
      expect(one).toMatchObject({ file: 'case.yaml', path: `history.${path}`, code });
      expect(one.expected).toContain(expected);
      expect(one.found).toContain(found);
      const first = path.split('.')[0];
      const line = path === 'duration' && more.indexOf('duration') < 0 ? 18 : first === 'pressure' ? 19 : 20;
      expect(one.line).toBeGreaterThanOrEqual(line);
      expect(one.line).toBeLessThanOrEqual(line + 1);
    });
  }

  it('several at once, beside those of the rest', () => {
    const text = following(bay('vents: [{ diameter: 1 V, length: 1 mm }], pump: { speed: 1 }'), '  duration: 0 s\n').replace('6 mm', '6');
    expect(problems(text).map((p) => p.path)).toEqual([
      'gap.spacing',
      'history.pressure.bay.outside',
      'history.pressure.bay.vents.0.diameter',
      'history.pressure.bay.pump.speed',
      'history.duration',
    ]);
  });

  it('a supply at 0 V throughout gives no voltage to follow', () => {
    const zero = following(BAY).replace('step: 420 V', 'step: 0 V').replace('100 kohm', '100 kohm\n  initial_gap_voltage: 400 V');
    expect(problem(zero)).toMatchObject({ path: 'history.voltage', code: 'missing-key', found: 'a supply at 0 V throughout' });
    expect(good(`${zero}  voltage: 5 V\n`).window?.voltage).toBe(5);
  });
});

describe('a data set of an HDF5 file', () => {
  const SET = '{ dataset: { file: log.h5, dataset: /bay/p, time: /bay/t } }';
  const sets = (
    pressures: number[],
    units: string | null,
    times = [0, 1, 2],
    timeUnits: string | null = 's',
  ): Record<string, DatasetRead> => ({
    'log.h5:/bay/p': { ok: true, values: Float64Array.from(pressures), units },
    'log.h5:/bay/t': { ok: true, values: Float64Array.from(times), units: timeUnits },
  });

  it('becomes rows in SI; it counts as a table for the duration', () => {
    const { window, resolved, tables } = good(following(SET, ''), [], {}, sets([3, 2, 1], 'mbar', [0, 1, 2], 'h'));
    expect(window?.history).toMatchObject({
      duration: 7200,
      pressure: { kind: 'dataset', rows: { times: Float64Array.of(0, 3600, 7200), values: Float64Array.of(300, 200, 100) } },
    });
    expect(resolved['history.pressure.dataset']).toMatch(/^sha256:/);
    expect(tables).toEqual([]);
  });

  it('units as UDUNITS and people write them', () => {
    const factor = (units: string, timeUnits: string): unknown => {
      const { pressure } = good(following(SET, ''), [], {}, sets([1, 1, 1], units, [0, 1, 2], timeUnits)).window?.history ?? {};
      return pressure?.kind === 'dataset' && [pressure.rows.values[0], pressure.rows.times[1]];
    };
    expect(factor('hPa', 'min')).toEqual([100, 60]);
    expect(factor('Pascals', 'seconds')).toEqual([1, 1]);
    expect(factor('millibars', 'hours')).toEqual([100, 3600]);
    expect(factor(' Torr ', 'Minutes')).toEqual([TORR, 60]);
    expect(factor('atmosphere', 'days')).toEqual([101325, 86400]);
    expect(factor('bar', 'ms')).toEqual([1e5, 1e-3]);
  });

  it('units may be given where the file has none, or none that can be read', () => {
    const told = SET.replace('/bay/t }', '/bay/t, unit: mbar, time_unit: min }');
    for (const own of [null, 'a.u.', ''])
      expect(good(following(told, ''), [], {}, sets([1, 1, 1], own, [0, 1, 2], null)).window?.history).toMatchObject({
        duration: 120,
        pressure: { rows: { values: Float64Array.of(100, 100, 100) } },
      });
    // the same unit in other words
    expect(good(following(told, ''), [], {}, sets([1, 1, 1], 'hPa', [0, 1, 2], 'minutes')).window).not.toBeNull();
  });

  const rows: [string, Record<string, DatasetRead>, string, string, string, string, string][] = [
    ['no such data set', {}, SET, 'time', 'unreadable', 'a data set of finite numbers', 'no /bay/t in log.h5'],
    [
      'no units',
      sets([1, 1, 1], null),
      SET,
      'dataset',
      'table',
      'the unit of a pressure, e.g. 1.2 Torr, in the file or in the case',
      "no attribute 'units'",
    ],
    [
      'units of another kind',
      sets([1, 1, 1], 'V'),
      SET,
      'dataset',
      'table',
      "the unit of a pressure, e.g. 1.2 Torr in the attribute 'units'",
      'V',
    ],
    [
      'units that nobody knows',
      sets([1, 1, 1], 'pa'),
      SET,
      'dataset',
      'table',
      "in the attribute 'units', or in the case",
      'unknown unit "pa"',
    ],
    [
      'times since a date',
      sets([1, 1, 1], 'Pa', [0, 1, 2], 'seconds since 2020-01-01'),
      SET,
      'time',
      'table',
      "in the attribute 'units', or in the case",
      'unknown unit "seconds"',
    ],
    [
      'a given unit against that of the file',
      sets([1, 1, 1], 'Pa'),
      SET.replace('/bay/t }', '/bay/t, unit: mbar }'),
      'unit',
      'table',
      "no other unit than the file's own, Pa",
      'mbar',
    ],
    [
      'a given unit of another kind',
      sets([1, 1, 1], null),
      SET.replace('/bay/t }', '/bay/t, unit: s }'),
      'unit',
      'table',
      'the unit of a pressure',
      's',
    ],
    ['lengths that differ', sets([1, 1], 'Pa'), SET, 'time', 'table', 'as many times as values, 2', '3'],
    ['times that do not rise', sets([1, 1, 1], 'Pa', [0, 1, 1]), SET, 'time', 'table', 'strictly rising times', '1 s after 1 s, value 3'],
    ['one value', sets([1], 'Pa', [0]), SET, 'time', 'table', 'at least two values', '1'],
    ['a pressure below 0', sets([1, 1, -1], 'Pa'), SET, 'dataset', 'out-of-range', 'values from 0 Pa to 1e6 Pa', '-1 in SI, value 3'],
    [
      'no time',
      sets([1, 1, 1], 'Pa'),
      SET.replace(', time: /bay/t', ''),
      'time',
      'missing-key',
      'the path of a data set of times',
      'nothing',
    ],
    ['no text for a file', sets([1, 1, 1], 'Pa'), SET.replace('log.h5', '5'), 'file', 'wrong-type', 'the name of an HDF5 file', '5'],
  ];
  for (const [what, contents, text, path, code, expected, found] of rows) {
    it(`${what} is refused`, () => {
      const all = problems(following(text), [], {}, contents).filter((p) => p.path === `history.pressure.dataset.${path}`);
      expect(all, JSON.stringify(problems(following(text), [], {}, contents))).toHaveLength(1);
      expect(all[0]).toMatchObject({ code, line: 19, file: 'case.yaml' });
      expect(all[0].expected).toContain(expected);
      expect(all[0].found).toContain(found);
    });
  }

  it('what a file says is escaped and cut', () => {
    const evil = { 'log.h5:/bay/t': { ok: false, reason: `\u001b[2J${'x'.repeat(1000)}` } } as const;
    for (const { found } of problems(following(SET), [], {}, evil)) {
      // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
      expect(found).not.toMatch(/[\u0000-\u001f]/);
      expect(found.length).toBeLessThanOrEqual(200);
    }
  });
});
