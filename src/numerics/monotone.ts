/** Monotone piecewise cubic through given points: no overshoot between rows.
 *
 *  Source: Fritsch and Butland, SIAM J. Sci. Stat. Comput. 5, 300, 1984 (slopes as weighted harmonic means); from memory. */
export class Monotone {
  readonly #x: Float64Array;
  readonly #y: Float64Array;
  readonly #slope: Float64Array;

  /** @param x strictly rising, at least two
   *  @param y as many values */
  constructor(x: readonly number[], y: readonly number[]) {
    const n = x.length;
    this.#x = Float64Array.from(x);
    this.#y = Float64Array.from(y);
    this.#slope = new Float64Array(n);
    const chord = (i: number): number => (y[i + 1] - y[i]) / (x[i + 1] - x[i]);
    for (let i = 1; i < n - 1; i++) {
      const left = chord(i - 1);
      const right = chord(i);
      if (left * right <= 0) continue;
      const hl = x[i] - x[i - 1];
      const hr = x[i + 1] - x[i];
      const a = (hl + 2 * hr) / (3 * (hl + hr));
      this.#slope[i] = 1 / (a / right + (1 - a) / left);
    }
    this.#slope[0] = n === 2 ? chord(0) : edgeSlope(chord(0), chord(1), x[1] - x[0], x[2] - x[1]);
    this.#slope[n - 1] = n === 2 ? chord(0) : edgeSlope(chord(n - 2), chord(n - 3), x[n - 1] - x[n - 2], x[n - 2] - x[n - 3]);
  }

  /** Value at x within the rows. */
  valueAt(x: number): number {
    const i = this.#interval(x);
    const h = this.#x[i + 1] - this.#x[i];
    const t = (x - this.#x[i]) / h;
    const s = 1 - t;
    return (
      s * s * ((1 + 2 * t) * this.#y[i] + t * h * this.#slope[i]) + t * t * ((3 - 2 * t) * this.#y[i + 1] - s * h * this.#slope[i + 1])
    );
  }

  /** Derivative at x within the rows. */
  slopeAt(x: number): number {
    const i = this.#interval(x);
    const h = this.#x[i + 1] - this.#x[i];
    const t = (x - this.#x[i]) / h;
    return (
      (6 * t * (1 - t) * (this.#y[i + 1] - this.#y[i])) / h + (1 - t) * (1 - 3 * t) * this.#slope[i] + t * (3 * t - 2) * this.#slope[i + 1]
    );
  }

  #interval(x: number): number {
    let low = 0;
    let high = this.#x.length - 1;
    while (high - low > 1) {
      const mid = (low + high) >> 1;
      if (this.#x[mid] <= x) low = mid;
      else high = mid;
    }
    return low;
  }
}

/** Three-point end slope, held to the sign of the end chord. */
function edgeSlope(chord: number, next: number, h: number, hNext: number): number {
  const slope = ((2 * h + hNext) * chord - h * next) / (h + hNext);
  if (slope * chord <= 0) return 0;
  return Math.abs(slope) > 3 * Math.abs(chord) && chord * next <= 0 ? 3 * chord : slope;
}
