import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { planOf, shardOf, shareOf, spread } from '../../src/scan/plan.ts';
import type { Axis, ScanSettings } from '../../src/study.ts';

const axis = (path: string, ...values: number[]): Axis => ({ path, unit: 'V', values: Float64Array.from(values) });
const settings = (axes: readonly Axis[], zip = false): ScanSettings => ({ axes, zip, find: null });
const long = (length: number): Axis => ({ path: 'a', unit: 'V', values: Float64Array.from({ length }, (_, i) => i) });

describe('a plan', () => {
  test('is a grid whose last axis runs fastest', () => {
    const plan = planOf(settings([axis('a', 1, 2), axis('b', 10, 20, 30)]));
    expect(plan.count).toBe(6);
    expect(Array.from({ length: 6 }, (_, i) => plan.values(i))).toEqual([
      [1, 10],
      [1, 20],
      [1, 30],
      [2, 10],
      [2, 20],
      [2, 30],
    ]);
    expect(plan.places(4)).toEqual([1, 1]);
  });

  test('walks zipped axes together', () => {
    const plan = planOf(settings([axis('a', 1, 2, 3), axis('b', 10, 20, 30)], true));
    expect(plan.count).toBe(3);
    expect([0, 1, 2].map((i) => plan.values(i))).toEqual([
      [1, 10],
      [2, 20],
      [3, 30],
    ]);
  });

  test('that varies nothing is one point', () => {
    const plan = planOf(settings([]));
    expect({ count: plan.count, grid: plan.grid, values: plan.values(0) }).toEqual({ count: 1, grid: false, values: [] });
  });

  test('of a million points is no larger than its axes', () => {
    const plan = planOf(settings([long(1000), long(1000)]));
    expect(plan.values(999_999)).toEqual([999, 999]);
    expect(plan.values(123_456)).toEqual([123, 456]);
    expect(() => planOf(settings([long(1001), long(1000)]))).toThrow(RangeError);
  });
});

describe('shards', () => {
  const plans = fc.tuple(fc.integer({ min: 1, max: 60 }), fc.integer({ min: 1, max: 60 }));

  test('share every point out once, as evenly as can be', () => {
    fc.assert(
      fc.property(plans, fc.integer({ min: 1, max: 40 }), ([a, b], most) => {
        const plan = planOf(settings([long(a), long(b)]));
        const n = Math.min(most, plan.count);
        const owners = new Int32Array(plan.count);
        const sizes: number[] = [];
        for (let k = 1; k <= n; k++) {
          const share = shareOf(plan, { k, n });
          sizes.push(share.count);
          let before = -1;
          for (let position = 0; position < share.count; position++) {
            const index = share.indexAt(position);
            const right = index > before && index < plan.count && share.positionOf(index) === position && shardOf(index, n) === k;
            if (!right) throw new Error(`shard ${k}/${n} gives ${index} at ${position}`);
            before = index;
            owners[index] = (owners[index] as number) + 1;
          }
        }
        expect(owners.every((count) => count === 1)).toBe(true);
        expect(Math.max(...sizes) - Math.min(...sizes)).toBeLessThanOrEqual(1);
      }),
      { numRuns: 100 },
    );
  });

  test('know which points are not theirs', () => {
    const plan = planOf(settings([long(100)]));
    const share = shareOf(plan, { k: 2, n: 7 });
    const mine = new Set(Array.from({ length: share.count }, (_, position) => share.indexAt(position)));
    for (let index = 0; index < 100; index++) expect(share.positionOf(index) !== null, `${index}`).toBe(mine.has(index));
  });

  // the point of dealing without a pattern: no shard is one column of the grid, whatever its length is to the number of shards
  test.each([
    [8, 8],
    [8, 7],
    [8, 9],
    [8, 16],
    [4, 12],
  ])('of %i over an axis of %i points have their share of every column', (n, length) => {
    const rows = 400;
    const plan = planOf(settings([long(rows), long(length)]));
    for (let k = 1; k <= n; k++) {
      const share = shareOf(plan, { k, n });
      const columns = new Float64Array(length);
      for (let position = 0; position < share.count; position++) {
        const column = share.indexAt(position) % length;
        columns[column] = (columns[column] as number) + 1;
      }
      // a binomial count of 400 draws with p = 1/n: five standard deviations
      const mean = rows / n;
      for (const count of columns) expect(Math.abs(count - mean)).toBeLessThan(5 * Math.sqrt(mean));
    }
  });

  test('are the whole plan when there is one', () => {
    const share = shareOf(planOf(settings([long(9)])), { k: 1, n: 1 });
    expect(Array.from({ length: share.count }, (_, position) => share.indexAt(position))).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8]);
  });
});

test('a few points are spread over all of a share', () => {
  const share = shareOf(planOf(settings([long(100)])), null);
  expect(spread(share, 4)).toEqual([12, 37, 62, 87]);
  expect(spread(shareOf(planOf(settings([long(3)])), null), 8)).toEqual([0, 1, 2]);
});
