import { describe, expect, test } from 'vitest';
import { eventsOf } from '../../src/report/run/events.ts';
import type { RunReport } from '../../src/report/run/report.ts';
import { visited } from '../../src/report/run/visited.ts';
import { contour } from '../../src/report/scan/contours.ts';
import { TOWNSEND } from '../../src/units/constants.ts';

describe('the reduced fields that a run used a coefficient at', () => {
  const density = 1e22;
  /** two cells of 1 mm over three equal steps of time; the field of the first is 100 Td, that of the second 1000 Td */
  const field = (): Float32Array => Float32Array.from([1, 2, 3].flatMap(() => [-100, 1000].map((td) => td * TOWNSEND * density)));
  const run = (rates: readonly number[]): RunReport =>
    ({
      time: Float64Array.from([0, 1, 2]),
      x: Float64Array.from([0.5e-3, 1.5e-3]),
      fields: { electricField: field(), ionisationRate: Float32Array.from([1, 2, 3].flatMap(() => rates)), electronFlux: null },
      settings: { gas: { density } },
    }) as unknown as RunReport;

  test('are weighed by the ionisation made there, and what lies outside the data is counted', () => {
    const use = visited('ionisation', { from: 50 * TOWNSEND, to: 500 * TOWNSEND }, run([3, 1]));
    expect(use?.inside).toBeCloseTo(0.75, 12);
    // bins are 4 % wide
    expect((use?.from ?? 0) / TOWNSEND / 100).toBeCloseTo(1, 1);
    expect((use?.to ?? 0) / TOWNSEND / 1000).toBeCloseTo(1, 1);
  });

  test('leave out a place where nothing happens', () => {
    const use = visited('ionisation', null, run([1, 0]));
    expect(use?.inside).toBeNull();
    expect((use?.to ?? 0) / TOWNSEND).toBeLessThan(105);
  });

  test('are unknown for what is not used, or has no profile in the file', () => {
    expect(visited('ionisation', null, run([0, 0]))).toBeNull();
    expect(visited('electron_mobility', null, run([1, 1]))).toBeNull();
    expect(visited('left_ion_yield', null, run([1, 1]))).toBeNull();
  });
});

describe('the events of a run', () => {
  const run = (action: 'open' | 'zero', afterTrip: number | null): Parameters<typeof eventsOf>[0] =>
    ({
      outcome: { onset: { threshold_time_s: 1, space_charge_time_s: 3, collapse_time_s: null }, energy: { after_trip_J: afterTrip } },
      time: Float64Array.from([0, 1, 2, 3, 4]),
      scalars: { supplyCurrent: Float64Array.from([0, 1, 0, 0, 0]), supplyVoltage: Float64Array.from([0, 5, 5, 5, 0]) },
      settings: { supply: { trip: { action } } },
    }) as never;

  test('come in the order of time, the trip where the supply went away for good', () => {
    expect(eventsOf(run('open', 1e-6))).toEqual([
      { name: 'threshold', time: 1 },
      { name: 'trip', time: 2 },
      { name: 'space charge', time: 3 },
    ]);
    expect(eventsOf(run('zero', 1e-6)).find(({ name }) => name === 'trip')).toEqual({ name: 'trip', time: 4 });
  });

  test('hold no trip where none acted', () => {
    expect(eventsOf(run('open', null)).map(({ name }) => name)).toEqual(['threshold', 'space charge']);
  });
});

describe('lines of equal value', () => {
  const places = [0, 0.25, 0.5, 0.75, 1];

  test('of a plane are where the plane has that value', () => {
    const pieces = contour(places, places, (i, j) => places[i] + places[j], 0.6);
    expect(pieces.length).toBeGreaterThan(2);
    for (const { x1, y1, x2, y2 } of pieces) {
      expect(x1 + y1).toBeCloseTo(0.6, 12);
      expect(x2 + y2).toBeCloseTo(0.6, 12);
    }
  });

  test('leave out squares with a corner that is no number, and values that are not reached', () => {
    expect(contour(places, places, () => Number.NaN, 0.5)).toEqual([]);
    expect(contour(places, places, (i) => places[i], 2)).toEqual([]);
  });

  test('close around a summit', () => {
    const pieces = contour(places, places, (i, j) => (i === 2 && j === 2 ? 1 : 0), 0.5);
    const ends = pieces.flatMap(({ x1, y1, x2, y2 }) => [`${x1},${y1}`, `${x2},${y2}`]).sort();
    expect(ends.length).toBe(8);
    for (let k = 0; k < 8; k += 2) expect(ends[k]).toBe(ends[k + 1]);
  });
});
