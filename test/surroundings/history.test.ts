import { describe, expect, it } from 'vitest';
import { airAt } from '../../src/surroundings/atmosphere.ts';
import { FLOW_GASES } from '../../src/surroundings/flow-gas.ts';
import { type HistorySettings, historyOf, sampleHistory } from '../../src/surroundings/history.ts';

const rows = { times: [10, 20, 40], values: [100, 50, 10] };
const table: HistorySettings = { duration: 60, pressure: { kind: 'table', rows }, temperature: 295 };

describe('a history', () => {
  it('from a table is linear between rows and held at its ends, and says so', () => {
    const history = historyOf(table);
    expect([0, 10, 15, 22, 30, 40, 60].map((t) => history.pressureAt(t))).toEqual([100, 100, 75, 46, 30, 10, 10]);
    expect(history.temperatureAt(17)).toBe(295);
    expect(history.corners).toEqual([10, 20, 40]);
    expect(history.notes).toEqual(['The rows of the pressure span 10 to 40 s; outside them their end values are held.']);
    const notes = (times: number[]): readonly string[] =>
      historyOf({ ...table, pressure: { kind: 'table', rows: { ...rows, times } } }).notes;
    expect(notes([0, 20, 60])).toEqual([]);
    expect(notes([5, 20, 60])).toHaveLength(1);
    expect(notes([0, 20, 59])).toHaveLength(1);
  });

  it('is the same from a data set', () => {
    const arrays = { times: Float64Array.from(rows.times), values: Float32Array.from(rows.values) };
    const [a, b] = [historyOf(table), historyOf({ ...table, pressure: { kind: 'dataset', rows: arrays } })];
    const times = Float64Array.from({ length: 100 }, (_, i) => 0.6 * i);
    expect(sampleHistory(b, times)).toEqual(sampleHistory(a, times));
  });

  it('from an ascent has the pressure of the standard atmosphere and its own temperature', () => {
    const history = historyOf({
      duration: 10800,
      pressure: { kind: 'ascent', ascent: { from: 0, to: 35000, rate: 5 } },
      temperature: { times: [0, 5000, 10800], values: [300, 290, 260] },
    });
    expect(history.pressureAt(2000)).toBe(airAt(10000).pressure);
    expect(history.pressureAt(9000)).toBe(airAt(35000).pressure);
    expect(history.temperatureAt(2500)).toBe(295);
    expect(history.notes.some((note) => note.startsWith('The ascent ends at 7000 s'))).toBe(true);
    // 11, 20 and 32 km of geopotential height, the row of the temperature, the arrival
    expect(history.corners.map(Math.round)).toEqual([2204, 4013, 5000, 6432, 7000]);
  });

  it('that ends before its ascent says where', () => {
    const history = historyOf({ duration: 3600, pressure: { kind: 'ascent', ascent: { from: 0, to: 35000, rate: 5 } }, temperature: 295 });
    expect(history.notes).toContain('The history ends at 18000 m, before the ascent does.');
  });

  it('from a bay starts at its pressure, and notes what was assumed', () => {
    const history = historyOf({
      duration: 3600,
      pressure: {
        kind: 'bay',
        bay: {
          volume: 0.012,
          start: 101325,
          gas: FLOW_GASES.air,
          outside: { kind: 'table', rows: { times: [0, 100], values: [101325, 0] } },
          vents: [{ diameter: 5e-3, length: 2e-3, count: 4, dischargeCoefficient: 0.7 }],
          pump: null,
          gasLoad: 0,
          outgassing: [{ area: 0.4, rateAtOneHour: 1e-6, exponent: 1 }],
        },
      },
      temperature: 295,
    });
    expect(Math.abs(history.pressureAt(0) / 101325 - 1)).toBeLessThan(1e-12);
    expect(history.pressureAt(3600)).toBeLessThan(1);
    expect(history.pressureAt(1e9)).toBe(history.pressureAt(3600));
    expect(history.corners).toEqual([60, 100]);
    expect(history.notes.map((note) => note.split(/[:;]| span| given/)[0])).toEqual([
      'Bay',
      'Vents',
      'Outgassing',
      'Pressures',
      'The rows of the outside pressure',
    ]);
    const { pressures, temperatures } = sampleHistory(history, [0, 10, 20, 3600]);
    expect(Array.from(pressures)).toEqual([0, 10, 20, 3600].map((t) => history.pressureAt(t)));
    expect(Array.from(temperatures)).toEqual([295, 295, 295, 295]);
  });

  it('refuses no duration and rows that do not match', () => {
    expect(() => historyOf({ ...table, duration: 0 })).toThrow(RangeError);
    expect(() => historyOf({ ...table, duration: Number.NaN })).toThrow(RangeError);
    expect(() => historyOf({ ...table, pressure: { kind: 'table', rows: { times: [0], values: [] } } })).toThrow(RangeError);
    expect(() => historyOf({ ...table, temperature: { times: [], values: [] } })).toThrow(RangeError);
  });
});
