import type { Axis, Find, ScanSettings } from '../study.ts';

/** The points of a scan, numbered from 0. Nothing is held but the axes: a point is computed from its number.
 *
 *  A grid runs through its last axis fastest; zipped axes walk together; a scan that varies nothing is one point. */
export interface Plan {
  readonly axes: readonly Axis[];
  readonly zip: boolean;
  readonly find: Find | null;
  readonly count: number;
  /** whether the points span a grid of at least one axis */
  readonly grid: boolean;
  /** Place of a point along each axis. */
  places(index: number): number[];
  /** SI value of each axis at a point. */
  values(index: number): number[];
}

/** Largest plan. */
export const MOST_POINTS = 1_000_000;

export function planOf({ axes, zip, find }: ScanSettings): Plan {
  const lengths = axes.map(({ values }) => values.length);
  const count = zip ? (lengths[0] ?? 1) : lengths.reduce((product, length) => product * length, 1);
  if (zip && lengths.some((length) => length !== count)) throw new RangeError('zipped axes of different lengths');
  if (!(count >= 1 && count <= MOST_POINTS)) throw new RangeError(`a plan of ${count} points`);
  const places = (index: number): number[] => {
    if (zip) return lengths.map(() => index);
    const result = lengths.map(() => 0);
    let rest = index;
    for (let axis = lengths.length - 1; axis >= 0; axis--) {
      const length = lengths[axis] as number;
      result[axis] = rest % length;
      rest = Math.floor(rest / length);
    }
    return result;
  };
  return {
    axes,
    zip,
    find,
    count,
    grid: !zip && axes.length > 0,
    places,
    values: (index) => places(index).map((place, axis) => axes[axis]?.values[place] as number),
  };
}

/** Which of n equal shares of a plan; k counts from 1. */
export interface Shard {
  readonly k: number;
  readonly n: number;
}

/** The points of a plan that are to be computed here: all of them, or one shard. Position 0, 1, … in rising order of their numbers. */
export interface Share {
  readonly shard: Shard | null;
  readonly count: number;
  indexAt(position: number): number;
  /** null: the point belongs to another shard */
  positionOf(index: number): number | null;
}

/** Deals a plan out to n shards like cards: of every n points in a row each shard gets one, which one changes from deal to deal without a pattern.
 *
 *  Neighbours take about equally long, so a contiguous slice would give all slow points to one shard. A fixed stride would too, whenever it meets the
 *  length of an axis: then a shard is one column of the grid. The last deal may be short, so shares differ by one point at most. */
export function shareOf(plan: Plan, shard: Shard | null): Share {
  const { count } = plan;
  if (shard === null) {
    return { shard, count, indexAt: (position) => position, positionOf: (index) => index };
  }
  const { k, n } = shard;
  const deals = Math.floor(count / n);
  const rest = count - deals * n;
  // the short last deal: its own rotation among all n shards, who of them get one is settled by the same rule
  const last = (k - 1 + n - (mixed(deals) % n)) % n;
  return {
    shard,
    count: deals + (last < rest ? 1 : 0),
    indexAt: (position) => position * n + ((k - 1 + n - (mixed(position) % n)) % n),
    positionOf: (index) => {
      const deal = Math.floor(index / n);
      return (index - deal * n + mixed(deal)) % n === k - 1 ? deal : null;
    },
  };
}

/** An integer hash: equal inputs give equal outputs on every machine, neighbours nothing alike.
 *  The finaliser of MurmurHash3 by A. Appleby (public domain), from memory; any mixing would do. */
function mixed(value: number): number {
  let h = value >>> 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}

/** The shard that a point belongs to. */
export function shardOf(index: number, n: number): number {
  const deal = Math.floor(index / n);
  return ((index - deal * n + mixed(deal)) % n) + 1;
}

/** `count` positions of a share, spread over it evenly. */
export function spread(share: Share, count: number): number[] {
  const n = Math.min(count, share.count);
  return Array.from({ length: n }, (_, i) => Math.floor(((i + 0.5) * share.count) / n));
}
