import type { Plan, Share } from './plan.ts';

/** In which order the points of a share are computed: a few spread over the plan first, then those that should take longest, by what their nearest
 *  finished neighbours took. A long point that is begun last keeps one worker busy while the others idle.
 *
 *  What a point takes is known best from its neighbours: whether a gap holds, glows or oscillates decides it, and theory does not see the last.
 *  Plans of more than {@link MOST_BLOCKS} points are ordered by blocks of neighbours, so that ordering costs neither memory nor time. */
export interface Order {
  /** Position of the next point that is neither finished nor taken; undefined when there is none. */
  next(): number | undefined;
  /** Tells what a point took [s]. */
  took(position: number, seconds: number): void;
}

const MOST_BLOCKS = 4096;
/** finished points that the estimate goes by, spread over the plan */
const MOST_SAMPLES = 256;
const FIRST_SAMPLES = 16;

/** @param finished  whether the point at a position is done already */
export function orderOf(plan: Plan, share: Share, finished: (position: number) => boolean, workers: number): Order {
  return new LongestFirst(plan, share, finished, Math.min(MOST_SAMPLES, Math.max(FIRST_SAMPLES, 2 * workers)));
}

interface Sample {
  readonly at: readonly number[];
  readonly seconds: number;
}

class LongestFirst implements Order {
  readonly #plan: Plan;
  readonly #share: Share;
  readonly #finished: (position: number) => boolean;
  readonly #blockSize: number;
  /** first position of each block that may still be free */
  readonly #cursors: Int32Array;
  #queue: number[];
  /** of the queue: blocks before it are used up */
  #head = 0;
  #samples: Sample[] = [];
  /** samples at which blocks are put in order, next time */
  #due: number;
  #ordered = false;

  constructor(plan: Plan, share: Share, finished: (position: number) => boolean, first: number) {
    this.#plan = plan;
    this.#share = share;
    this.#finished = finished;
    this.#blockSize = Math.max(1, Math.ceil(share.count / MOST_BLOCKS));
    const blocks = Math.ceil(share.count / this.#blockSize);
    this.#cursors = Int32Array.from({ length: blocks }, (_, block) => block * this.#blockSize);
    this.#queue = spreadOut(blocks);
    this.#due = first;
  }

  next(): number | undefined {
    while (this.#head < this.#queue.length) {
      const block = this.#queue[this.#head] as number;
      const position = this.#nextIn(block);
      if (position === null) {
        this.#head++;
        continue;
      }
      // until something is known, one from each block in turn
      if (!this.#ordered) {
        this.#queue.push(block);
        this.#head++;
      }
      return position;
    }
    return undefined;
  }

  took(position: number, seconds: number): void {
    if (this.#samples.length === MOST_SAMPLES) return;
    this.#samples.push({ at: this.#coordinates(position), seconds });
    if (this.#samples.length < this.#due) return;
    this.#due = Math.min(2 * this.#due, MOST_SAMPLES);
    this.#sort();
  }

  #nextIn(block: number): number | null {
    const end = Math.min((block + 1) * this.#blockSize, this.#share.count);
    let position = this.#cursors[block] as number;
    while (position < end && this.#finished(position)) position++;
    this.#cursors[block] = Math.min(position + 1, end);
    return position < end ? position : null;
  }

  #sort(): void {
    this.#ordered = true;
    const blocks = [...new Set(this.#queue.slice(this.#head))].sort((a, b) => a - b);
    const expected = new Map(blocks.map((block) => [block, this.#expected(block)]));
    // stable: equals stay in the order of the plan
    this.#queue = blocks.sort((a, b) => (expected.get(b) as number) - (expected.get(a) as number));
    this.#head = 0;
  }

  /** What a point of a block takes [s], by the nearest sample. */
  #expected(block: number): number {
    const middle = Math.min(Math.floor((block + 0.5) * this.#blockSize), this.#share.count - 1);
    const at = this.#coordinates(middle);
    let [nearest, seconds] = [Number.POSITIVE_INFINITY, 0];
    for (const sample of this.#samples) {
      let distance = 0;
      for (let axis = 0; axis < at.length; axis++) distance += ((at[axis] as number) - (sample.at[axis] as number)) ** 2;
      if (distance < nearest) [nearest, seconds] = [distance, sample.seconds];
    }
    return seconds;
  }

  /** Place along each axis, from 0 to 1. */
  #coordinates(position: number): number[] {
    const { axes } = this.#plan;
    return this.#plan
      .places(this.#share.indexAt(position))
      .map((place, axis) => place / Math.max(1, (axes[axis]?.values.length as number) - 1));
  }
}

/** 0 … n−1 so that any first few of them lie all over the range: steps of the golden section, made coprime to n. */
function spreadOut(n: number): number[] {
  let step = Math.max(1, Math.round(n * 0.6180339887498949));
  while (greatestCommonDivisor(step, n) !== 1) step++;
  const start = n >> 1;
  return Array.from({ length: n }, (_, i) => (start + i * step) % n);
}

function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestCommonDivisor(b, a % b);
}
