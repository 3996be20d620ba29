/** Tool of the oracles: two-point boundary value problems y′ = f(y), with conditions at either end, by fourth-order collocation.
 *
 *  Contains: the three-point Lobatto scheme (Simpson with a Hermite midpoint; Hairer & Wanner, Solving Ordinary Differential
 *  Equations II, table IV.5.8, Lobatto IIIA of order 4), Newton with step halving on the whole mesh, a banded elimination with row
 *  exchanges, and re-meshing. It shares nothing with the program's solver: no cells, no fluxes at faces, no time.
 *  Does not contain: physics; problems whose right-hand side depends on x. */

export interface BoundaryProblem {
  readonly size: number;
  /** f(y) */
  readonly rate: (y: Float64Array, out: Float64Array) => void;
  /** ∂f_r/∂y_c at [r*size + c] */
  readonly rateJacobian: (y: Float64Array, out: Float64Array) => void;
  /** conditions g(y) = 0, each with its gradient, at the left and at the right end: `size` in all */
  readonly left: readonly Condition[];
  readonly right: readonly Condition[];
}

export interface Condition {
  readonly value: (y: Float64Array) => number;
  readonly gradient: (y: Float64Array, out: Float64Array) => void;
}

/** y at node i is values.subarray(i*size, (i+1)*size) */
export interface MeshFunction {
  readonly x: Float64Array;
  readonly values: Float64Array;
}

/** Solves on the given mesh from the given start. Throws when Newton fails. */
export function solveOnMesh(problem: BoundaryProblem, start: MeshFunction, scale: Float64Array): MeshFunction {
  const { size } = problem;
  const values = start.values.slice();
  const unknowns = values.length;
  let residual = new Float64Array(unknowns);
  assembleResidual(problem, start.x, values, residual);
  for (let iteration = 0; iteration < 60; iteration++) {
    const matrix = new BandedMatrix(unknowns, 2 * size, 2 * size);
    assembleMatrix(problem, start.x, values, matrix);
    matrix.factor();
    const step = residual.slice();
    matrix.solve(step);
    const length = scaledNorm(step, size, scale);
    if (!Number.isFinite(length)) throw new Error('collocation: singular matrix');
    // natural monotonicity test: the next simplified step must be shorter (Deuflhard, Newton Methods for Nonlinear Problems, 2004)
    let damping = 1;
    for (;;) {
      const trial = values.slice();
      for (let i = 0; i < unknowns; i++) trial[i] -= damping * step[i];
      const trialResidual = new Float64Array(unknowns);
      assembleResidual(problem, start.x, trial, trialResidual);
      const next = trialResidual.slice();
      matrix.solve(next);
      const nextLength = scaledNorm(next, size, scale);
      if (nextLength <= (1 - damping / 4) * length || (length < 1e-9 && nextLength < 1e-8)) {
        values.set(trial);
        residual = trialResidual;
        break;
      }
      damping /= 2;
      if (damping < 1e-4) throw new Error(`collocation: Newton stalled with a step of ${length}`);
    }
    if (length < 1e-11 || (damping === 1 && length < 1e-8)) return { x: start.x, values };
  }
  throw new Error('collocation: Newton did not converge');
}

/** The Hermite midpoint that the scheme itself uses, of interval i */
export function midpoint(problem: BoundaryProblem, { x, values }: MeshFunction, i: number, out: Float64Array): void {
  const n = problem.size;
  const h = x[i + 1] - x[i];
  const a = values.subarray(i * n, (i + 1) * n);
  const b = values.subarray((i + 1) * n, (i + 2) * n);
  const fa = new Float64Array(n);
  const fb = new Float64Array(n);
  problem.rate(a, fa);
  problem.rate(b, fb);
  for (let r = 0; r < n; r++) out[r] = (a[r] + b[r]) / 2 + (h / 8) * (fa[r] - fb[r]);
}

/** Cubic Hermite interpolation of a solution onto another mesh */
export function transfer(problem: BoundaryProblem, from: MeshFunction, x: Float64Array): MeshFunction {
  const n = problem.size;
  const values = new Float64Array(x.length * n);
  const fa = new Float64Array(n);
  const fb = new Float64Array(n);
  let i = 0;
  for (let k = 0; k < x.length; k++) {
    while (i < from.x.length - 2 && x[k] > from.x[i + 1]) i++;
    const h = from.x[i + 1] - from.x[i];
    const s = (x[k] - from.x[i]) / h;
    const a = from.values.subarray(i * n, (i + 1) * n);
    const b = from.values.subarray((i + 1) * n, (i + 2) * n);
    problem.rate(a, fa);
    problem.rate(b, fb);
    const s2 = s * s;
    const s3 = s2 * s;
    for (let r = 0; r < n; r++) {
      values[k * n + r] = a[r] * (1 - 3 * s2 + 2 * s3) + b[r] * (3 * s2 - 2 * s3) + h * (fa[r] * (s - 2 * s2 + s3) + fb[r] * (s3 - s2));
    }
  }
  return { x, values };
}

/** A mesh of `intervals` whose density follows slope and curvature of the solution, each component against its own range. */
export function adaptedMesh(problem: BoundaryProblem, solution: MeshFunction, intervals: number): Float64Array {
  const n = problem.size;
  const { x, values } = solution;
  const count = x.length - 1;
  const total = x[count] - x[0];
  const range = new Float64Array(n);
  for (let r = 0; r < n; r++) {
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    for (let i = 0; i <= count; i++) {
      low = Math.min(low, values[i * n + r]);
      high = Math.max(high, values[i * n + r]);
    }
    range[r] = Math.max(high - low, 1e-6 * Math.max(Math.abs(high), Math.abs(low)), 1e-300);
  }
  const slope = new Float64Array(count * n);
  const weight = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const h = x[i + 1] - x[i];
    for (let r = 0; r < n; r++) slope[i * n + r] = (values[(i + 1) * n + r] - values[i * n + r]) / h / range[r];
  }
  for (let i = 0; i < count; i++) {
    let sum = 1 / (total * total);
    for (let r = 0; r < n; r++) {
      const s = slope[i * n + r];
      const left = i > 0 ? slope[(i - 1) * n + r] : s;
      const right = i < count - 1 ? slope[(i + 1) * n + r] : s;
      const curvature = Math.abs(right - left) / (2 * (x[i + 1] - x[i]));
      sum += s * s + 4 * curvature;
    }
    weight[i] = Math.sqrt(sum);
  }
  for (let pass = 0; pass < 3; pass++) {
    const copy = weight.slice();
    for (let i = 0; i < count; i++) weight[i] = (copy[Math.max(0, i - 1)] + 2 * copy[i] + copy[Math.min(count - 1, i + 1)]) / 4;
  }
  const cumulative = new Float64Array(count + 1);
  for (let i = 0; i < count; i++) cumulative[i + 1] = cumulative[i] + weight[i] * (x[i + 1] - x[i]);
  const mesh = new Float64Array(intervals + 1);
  let i = 0;
  for (let k = 0; k <= intervals; k++) {
    const target = (cumulative[count] * k) / intervals;
    while (i < count - 1 && cumulative[i + 1] < target) i++;
    mesh[k] = x[i] + ((target - cumulative[i]) / (cumulative[i + 1] - cumulative[i])) * (x[i + 1] - x[i]);
  }
  mesh[0] = x[0];
  mesh[intervals] = x[count];
  return mesh;
}

/** Each interval cut in two */
export function halved(x: Float64Array): Float64Array {
  const fine = new Float64Array(2 * x.length - 1);
  for (let i = 0; i < x.length; i++) fine[2 * i] = x[i];
  for (let i = 0; i + 1 < x.length; i++) fine[2 * i + 1] = (x[i] + x[i + 1]) / 2;
  return fine;
}

function scaledNorm(vector: Float64Array, size: number, scale: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < vector.length; i++) {
    const value = Math.abs(vector[i]) / scale[i % size];
    if (!(value <= largest)) largest = value; // a NaN stays visible
  }
  return largest;
}

function assembleResidual(problem: BoundaryProblem, x: Float64Array, values: Float64Array, out: Float64Array): void {
  const n = problem.size;
  const nodes = x.length;
  const at = (i: number): Float64Array => values.subarray(i * n, (i + 1) * n);
  let row = 0;
  for (const condition of problem.left) out[row++] = condition.value(at(0));
  let fa = new Float64Array(n);
  let fb = new Float64Array(n);
  const fm = new Float64Array(n);
  const m = new Float64Array(n);
  problem.rate(at(0), fa);
  for (let i = 0; i + 1 < nodes; i++) {
    const h = x[i + 1] - x[i];
    const a = at(i);
    const b = at(i + 1);
    problem.rate(b, fb);
    for (let r = 0; r < n; r++) m[r] = (a[r] + b[r]) / 2 + (h / 8) * (fa[r] - fb[r]);
    problem.rate(m, fm);
    for (let r = 0; r < n; r++) out[row++] = b[r] - a[r] - (h / 6) * (fa[r] + 4 * fm[r] + fb[r]);
    [fa, fb] = [fb, fa];
  }
  for (const condition of problem.right) out[row++] = condition.value(at(nodes - 1));
}

function assembleMatrix(problem: BoundaryProblem, x: Float64Array, values: Float64Array, matrix: BandedMatrix): void {
  const n = problem.size;
  const nodes = x.length;
  const at = (i: number): Float64Array => values.subarray(i * n, (i + 1) * n);
  const gradient = new Float64Array(n);
  let row = 0;
  for (const condition of problem.left) {
    condition.gradient(at(0), gradient);
    for (let c = 0; c < n; c++) matrix.set(row, c, gradient[c]);
    row++;
  }
  let fa = new Float64Array(n);
  let fb = new Float64Array(n);
  const m = new Float64Array(n);
  let ja = new Float64Array(n * n);
  let jb = new Float64Array(n * n);
  const jm = new Float64Array(n * n);
  problem.rate(at(0), fa);
  problem.rateJacobian(at(0), ja);
  for (let i = 0; i + 1 < nodes; i++) {
    const h = x[i + 1] - x[i];
    const a = at(i);
    const b = at(i + 1);
    problem.rate(b, fb);
    problem.rateJacobian(b, jb);
    for (let r = 0; r < n; r++) m[r] = (a[r] + b[r]) / 2 + (h / 8) * (fa[r] - fb[r]);
    problem.rateJacobian(m, jm);
    for (let r = 0; r < n; r++) {
      for (let c = 0; c < n; c++) {
        let ma = 0;
        let mb = 0;
        for (let k = 0; k < n; k++) {
          ma += jm[r * n + k] * ja[k * n + c];
          mb += jm[r * n + k] * jb[k * n + c];
        }
        const own = r === c ? 1 : 0;
        const atMiddle = jm[r * n + c] / 2;
        matrix.set(row + r, i * n + c, -own - (h / 6) * (ja[r * n + c] + 4 * (atMiddle + (h / 8) * ma)));
        matrix.set(row + r, (i + 1) * n + c, own - (h / 6) * (jb[r * n + c] + 4 * (atMiddle - (h / 8) * mb)));
      }
    }
    row += n;
    [fa, fb] = [fb, fa];
    [ja, jb] = [jb, ja];
  }
  for (const condition of problem.right) {
    condition.gradient(at(nodes - 1), gradient);
    for (let c = 0; c < n; c++) matrix.set(row, (nodes - 1) * n + c, gradient[c]);
    row++;
  }
}

/** A square banded matrix and its elimination with row exchanges: row r holds columns r − below … r + above + below. */
export class BandedMatrix {
  readonly #size: number;
  readonly #below: number;
  readonly #width: number;
  readonly #entries: Float64Array;
  readonly #pivots: Int32Array;

  constructor(size: number, below: number, above: number) {
    this.#size = size;
    this.#below = below;
    this.#width = 2 * below + above + 1;
    this.#entries = new Float64Array(size * this.#width);
    this.#pivots = new Int32Array(size);
  }

  set(row: number, column: number, value: number): void {
    this.#entries[row * this.#width + column - row + this.#below] = value;
  }

  factor(): void {
    const { below, width, n, e } = this.#parts();
    for (let k = 0; k < n; k++) {
      const lastRow = Math.min(n - 1, k + below);
      const lastColumn = Math.min(n - 1, k + width - 1 - below);
      let pivot = k;
      for (let r = k + 1; r <= lastRow; r++) {
        if (Math.abs(e[r * width + k - r + below]) > Math.abs(e[pivot * width + k - pivot + below])) pivot = r;
      }
      this.#pivots[k] = pivot;
      if (pivot !== k) {
        for (let c = k; c <= lastColumn; c++) {
          const upper = k * width + c - k + below;
          const lower = pivot * width + c - pivot + below;
          const kept = e[upper];
          e[upper] = e[lower];
          e[lower] = kept;
        }
      }
      const diagonal = e[k * width + below];
      for (let r = k + 1; r <= lastRow; r++) {
        const place = r * width + k - r + below;
        const factor = e[place] / diagonal;
        e[place] = factor;
        if (factor === 0) continue;
        for (let c = k + 1; c <= lastColumn; c++) e[r * width + c - r + below] -= factor * e[k * width + c - k + below];
      }
    }
  }

  /** overwrites the right-hand side by the solution */
  solve(b: Float64Array): void {
    const { below, width, n, e } = this.#parts();
    for (let k = 0; k < n; k++) {
      const pivot = this.#pivots[k];
      if (pivot !== k) {
        const kept = b[k];
        b[k] = b[pivot];
        b[pivot] = kept;
      }
      const lastRow = Math.min(n - 1, k + below);
      for (let r = k + 1; r <= lastRow; r++) b[r] -= e[r * width + k - r + below] * b[k];
    }
    for (let k = n - 1; k >= 0; k--) {
      const lastColumn = Math.min(n - 1, k + width - 1 - below);
      let sum = b[k];
      for (let c = k + 1; c <= lastColumn; c++) sum -= e[k * width + c - k + below] * b[c];
      b[k] = sum / e[k * width + below];
    }
  }

  #parts(): { below: number; width: number; n: number; e: Float64Array } {
    return { below: this.#below, width: this.#width, n: this.#size, e: this.#entries };
  }
}
