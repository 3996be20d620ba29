import { describe, expect, it } from 'vitest';
import { sweepPoints } from '../../src/search/sweep.ts';

describe('the points of a coarse sweep', () => {
  it('halve the widest gap first, in ratio', () => {
    expect(sweepPoints([1, 16], 2, 4)).toEqual([1, 2, 4, 16]);
  });

  it('end once no neighbours are further apart than the ratio asked for', () => {
    const points = sweepPoints([100, 900], 1.35, 100);
    const ratios = points.slice(1).map((p, i) => p / points[i]);
    expect(Math.max(...ratios)).toBeLessThanOrEqual(1.35);
    expect(points.length).toBe(9);
  });

  it('keep every mark, in order and once', () => {
    expect(sweepPoints([5, 1, 5, 1.2], 100, 3)).toEqual([1, 1.2, 5]);
  });
});
