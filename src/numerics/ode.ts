/** Collocation at the Radau points, three stages, order 5, L-stable.
 *  Source: Hairer and Wanner, Solving Ordinary Differential Equations II, 2nd ed. 1996, table IV.5.6 and section IV.8; from memory (H),
 *  checked by its measured order */
const ROOT6: number = Math.sqrt(6);
const NODES: readonly [number, number, number] = [(4 - ROOT6) / 10, (4 + ROOT6) / 10, 1];
const STAGES: readonly (readonly [number, number, number])[] = [
  [(88 - 7 * ROOT6) / 360, (296 - 169 * ROOT6) / 1800, (-2 + 3 * ROOT6) / 225],
  [(296 + 169 * ROOT6) / 1800, (88 + 7 * ROOT6) / 360, (-2 - 3 * ROOT6) / 225],
  [(16 - ROOT6) / 36, (16 + ROOT6) / 36, 1 / 9],
];
/** weights of the stages in the error estimate, eq. IV.8.19 */
const ESTIMATE: readonly [number, number, number] = [(-13 - 7 * ROOT6) / 3, (-13 + 7 * ROOT6) / 3, -1 / 3];
/** the real eigenvalue of the inverse of STAGES, 3.6378 */
const EIGENVALUE: number = 30 / (6 + Math.cbrt(81) - Math.cbrt(9));

/** s of the largest |s (s − c1)(s − c2)(s − 1)| in a step */
const FARTHEST = 0.861;

const MOST_ITERATIONS = 10;
/** tries between two corners before the solver gives up; smooth problems take hundreds */
const MOST_TRIES = 100_000;
/** Newton stops when the last correction is this share of the tolerance */
const NEWTON_SHARE = 0.01;

/** The solution of a scalar initial value problem, at any time between its ends. */
export class ScalarSolution {
  /** rising; step n runs from times[n] to times[n + 1] */
  readonly #times: Float64Array;
  /** [step, 4]: divided differences of the collocation polynomial in s = (t − t_n)/h */
  readonly #pieces: Float64Array;
  readonly steps: number;
  readonly rejected: number;

  constructor(times: readonly number[], pieces: readonly number[], rejected: number) {
    this.#times = Float64Array.from(times);
    this.#pieces = Float64Array.from(pieces);
    this.steps = times.length - 1;
    this.rejected = rejected;
  }

  /** y(t); held at its ends outside. */
  at(t: number): number {
    const times = this.#times;
    let low = 0;
    let high = times.length - 1;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (times[middle] <= t) low = middle;
      else high = middle;
    }
    const s = (t - times[low]) / (times[low + 1] - times[low]);
    return piece(this.#pieces, 4 * low, Math.min(1, Math.max(0, s)));
  }
}

function piece(d: ArrayLike<number>, at: number, s: number): number {
  return d[at] + s * (d[at + 1] + (s - NODES[0]) * (d[at + 2] + (s - NODES[1]) * d[at + 3]));
}

/** Integrates y′ = rate(t, y), stiff or not, with the step set by the estimated error, and keeps the collocation polynomials.
 *
 *  Two estimates, both of order h⁴, keep the end of a step and the polynomial inside it to the tolerance; at the ends the solution is much better. The derivative by y is a one-sided difference over `nudge`.
 *  @param corners  times at which rate has a kink in t: steps end there
 *  @param tolerance  absolute error of y per step
 *  @throws Error when the step shrinks to the spacing of doubles or 1e5 steps do not reach the next corner: the rate is not finite, or not continuous in y
 *  @example solveScalar((t, y) => -1e6 * (y - Math.cos(t)), 0, 2, 0, 1e-8).at(1) // 0.540303 */
export function solveScalar(
  rate: (t: number, y: number) => number,
  from: number,
  to: number,
  start: number,
  tolerance: number,
  corners: readonly number[] = [],
): ScalarSolution {
  const stops = [...new Set(corners.filter((t) => t > from && t < to))].sort((a, b) => a - b);
  stops.push(to);
  const times = [from];
  const pieces: number[] = [];
  const stages: [number, number, number] = [0, 0, 0];
  let rejected = 0;
  let t = from;
  let y = start;
  let slope = rate(t, y);
  let h = (to - from) / 100;
  if (Math.abs(slope) > 0) h = Math.min(h, Math.sqrt(tolerance) / Math.abs(slope));
  let tries = 0;

  for (let next = 0; next < stops.length; ) {
    const left = stops[next] - t;
    // a remainder below half a step is shared with this one
    const lands = h >= left;
    const step = lands ? left : Math.min(h, left / 2);
    if (!(t + step > t) || ++tries > MOST_TRIES) throw new Error(`no step small enough at t = ${t}, y = ${y}`);
    const nudge = 1e-9 * Math.max(1, Math.abs(y));
    const derivative = (rate(t, y + nudge) - slope) / nudge;

    predict(pieces, times, step, y, stages);
    let factor = 0.25;
    if (solveStages(rate, t, y, step, derivative, tolerance, stages)) {
      const combined = (ESTIMATE[0] * stages[0] + ESTIMATE[1] * stages[1] + ESTIMATE[2] * stages[2]) / step;
      const damping = EIGENVALUE / step - derivative;
      const error = (slope + combined) / damping;
      const polynomial = [y, ...differences(stages)];
      const between = Math.abs(defect(rate, t, step, polynomial) / damping);
      const ratio = Math.max(Math.abs(error), between) / tolerance;
      factor = Number.isFinite(ratio) ? Math.min(6, Math.max(0.2, 0.9 * ratio ** -0.25)) : 0.25;
      if (ratio <= 1) {
        pieces.push(...polynomial);
        t = lands ? stops[next] : t + step;
        times.push(t);
        y += stages[2];
        slope = rate(t, y);
        if (lands) {
          next++;
          tries = 0;
        }
        // a step cut short by a corner says little about the next one
        h = Math.max(step * factor, lands ? Math.min(h, to - t) : 0);
        continue;
      }
    }
    rejected++;
    h = step * Math.min(0.9, factor);
  }
  return new ScalarSolution(times, pieces, rejected);
}

/** Divided differences on 0, c1, c2, 1 from the stage increments. */
function differences(z: readonly [number, number, number]): [number, number, number] {
  const first = z[0] / NODES[0];
  const second = (z[1] - z[0]) / (NODES[1] - NODES[0]);
  const third = (z[2] - z[1]) / (NODES[2] - NODES[1]);
  const firstSecond = (second - first) / NODES[1];
  const secondThird = (third - second) / (NODES[2] - NODES[0]);
  return [first, firstSecond, secondThird - firstSecond];
}

/** What the polynomial leaves of the equation where it is farthest from its nodes, between the last two.
 *
 *  The estimate at the end of a step says nothing about the polynomial in a stiff problem: the stages sit on the slow solution however long the step,
 *  while the cubic between them does not. There the defect is the derivative by y times the polynomial's error. */
function defect(rate: (t: number, y: number) => number, t: number, h: number, d: readonly number[]): number {
  const s = FARTHEST;
  const [a, b] = [s - NODES[0], s - NODES[1]];
  const slope = d[1] + d[2] * (s + a) + d[3] * (a * b + s * (a + b));
  return slope / h - rate(t + s * h, piece(d, 0, s));
}

/** First guess of the stage increments: the last polynomial carried on. */
function predict(pieces: readonly number[], times: readonly number[], step: number, y: number, z: [number, number, number]): void {
  z.fill(0);
  const last = times.length - 2;
  if (last < 0) return;
  const ratio = step / (times[last + 1] - times[last]);
  if (ratio > 10) return; // cubic extrapolation that far is worse than none
  for (let i = 0; i < 3; i++) z[i] = piece(pieces, 4 * last, 1 + NODES[i] * ratio) - y;
}

/** Simplified Newton for z_i = h Σ a_ij rate(t + c_j h, y + z_j). @returns whether it converged */
function solveStages(
  rate: (t: number, y: number) => number,
  t: number,
  y: number,
  h: number,
  derivative: number,
  tolerance: number,
  z: [number, number, number],
): boolean {
  let previous = Infinity;
  for (let iteration = 0; iteration < MOST_ITERATIONS; iteration++) {
    const f0 = rate(t + NODES[0] * h, y + z[0]);
    const f1 = rate(t + NODES[1] * h, y + z[1]);
    const f2 = rate(t + h, y + z[2]);
    const residual = STAGES.map((a, i) => h * (a[0] * f0 + a[1] * f1 + a[2] * f2) - z[i]) as [number, number, number];
    const change = solve3(
      STAGES.map((a, i) => a.map((value, j) => (i === j ? 1 : 0) - h * derivative * value)),
      residual,
    );
    for (let i = 0; i < 3; i++) z[i] += change[i];
    const size = Math.max(Math.abs(change[0]), Math.abs(change[1]), Math.abs(change[2]));
    if (!Number.isFinite(size) || size > 2 * previous) return false;
    // below the rounding of y itself nothing is left to gain
    if (size <= Math.max(NEWTON_SHARE * tolerance, 4e-16 * Math.abs(y))) return true;
    previous = size;
  }
  return false;
}

/** Elimination with row exchange. */
function solve3(m: number[][], b: [number, number, number]): [number, number, number] {
  for (let k = 0; k < 3; k++) {
    let pivot = k;
    for (let r = k + 1; r < 3; r++) if (Math.abs(m[r][k]) > Math.abs(m[pivot][k])) pivot = r;
    [m[k], m[pivot]] = [m[pivot], m[k]];
    [b[k], b[pivot]] = [b[pivot], b[k]];
    for (let r = k + 1; r < 3; r++) {
      const share = m[r][k] / m[k][k];
      for (let c = k; c < 3; c++) m[r][c] -= share * m[k][c];
      b[r] -= share * b[k];
    }
  }
  for (let r = 2; r >= 0; r--) {
    for (let c = r + 1; c < 3; c++) b[r] -= m[r][c] * b[c];
    b[r] /= m[r][r];
  }
  return b;
}
