import { describe, expect, test } from 'vitest';
import { orderOf } from '../../src/scan/order.ts';
import { planOf, shareOf } from '../../src/scan/plan.ts';
import type { Axis } from '../../src/study.ts';

const long = (length: number): Axis => ({ path: 'a', unit: 'V', values: Float64Array.from({ length }, (_, i) => i) });
const planFor = (...lengths: number[]) => planOf({ axes: lengths.map(long), zip: false, find: null });
const whole = (plan: ReturnType<typeof planFor>) => shareOf(plan, null);

/** Takes every point, each told to take what `seconds` says. */
function walk(
  lengths: readonly number[],
  seconds: (values: readonly number[]) => number,
  finished: (position: number) => boolean = () => false,
): number[] {
  const plan = planFor(...lengths);
  const order = orderOf(plan, whole(plan), finished, 2);
  const taken: number[] = [];
  for (let position = order.next(); position !== undefined; position = order.next()) {
    taken.push(position);
    order.took(position, seconds(plan.values(position)));
    if (taken.length > plan.count) throw new Error('points are given twice');
  }
  return taken;
}

describe('the order', () => {
  test.each([[[1]], [[7]], [[40, 25]], [[5, 2000]], [[100, 100]]])('of %j gives every point once', (lengths) => {
    const taken = walk(lengths, ([a = 0]) => a);
    expect(taken.toSorted((a, b) => a - b)).toEqual(Array.from({ length: lengths.reduce((p, n) => p * n, 1) }, (_, i) => i));
  });

  test('leaves out what is finished', () => {
    const taken = walk(
      [10, 10],
      () => 1,
      (position) => position % 3 === 0,
    );
    expect(taken.length).toBe(66);
    expect(taken.some((position) => position % 3 === 0)).toBe(false);
  });

  test('begins all over the plan', () => {
    const first = walk([40, 25], () => 1).slice(0, 16);
    const rows = first.map((position) => Math.floor(position / 25));
    expect(Math.max(...rows)).toBeGreaterThan(35);
    expect(Math.min(...rows)).toBeLessThan(5);
    // no two of them close together
    const sorted = rows.toSorted((a, b) => a - b);
    for (const [i, row] of sorted.entries()) if (i > 1) expect(row - (sorted[i - 2] as number)).toBeGreaterThan(0);
  });

  test('then takes the longest first, by what their neighbours took', () => {
    // the rows from 30 on oscillate and take a hundred times as long
    const slow = ([a = 0]: readonly number[]): number => (a >= 30 ? 1 : 0.01);
    const taken = walk([40, 25], slow);
    const isSlow = (position: number): boolean => position >= 30 * 25;
    const lastSlow = taken.findLastIndex(isSlow);
    // 250 slow points, a quarter of all; those not seen as slow at once are near the edge
    expect(taken.slice(16, 266).filter(isSlow).length).toBeGreaterThan(0.75 * 250);
    expect(lastSlow).toBeLessThan(500);
  });

  test('of a million points costs little', () => {
    const plan = planFor(1000, 1000);
    const start = performance.now();
    const order = orderOf(plan, whole(plan), () => false, 2);
    for (let i = 0; i < 2000; i++) order.took(order.next() as number, 1);
    expect(performance.now() - start).toBeLessThan(2000);
  });
});
