import type { GapSystem } from './gap-system.ts';
import type { Scheme } from './scheme.ts';

/** One step of a linearly implicit scheme, with error estimate and dense output. All work arrays are made once. */
export class Stepper {
  readonly scheme: Scheme;
  readonly #system: GapSystem;
  readonly #size: number;
  readonly #stages: readonly Float64Array[];
  readonly #r: Float64Array;
  readonly #zero: Float64Array;
  readonly #stage: Float64Array;
  readonly #K: Float64Array;
  readonly #L: Float64Array;
  #denseReady = false;
  /** stage i starts at stage i − 1's start plus its increment */
  readonly #continues: readonly boolean[];
  readonly #endContinues: boolean;
  /** state and rates at the start of the step, state at its end, difference of the embedded solution */
  start: Float64Array;
  readonly startRates: Float64Array;
  end: Float64Array;
  readonly error: Float64Array;
  /** where the last attempt began [s] and how far it went [s] */
  time = 0;
  span = 0;
  /** the two ends of the last attempt, for dense output; they stay valid after `proceed` until the next attempt */
  #from: Float64Array;
  #to: Float64Array;
  #before: Float64Array;
  /** linear solves and factorisations so far */
  solves = 0;
  factorisations = 0;

  constructor(system: GapSystem, scheme: Scheme) {
    this.scheme = scheme;
    this.#system = system;
    const n = system.layout.unknowns;
    this.#size = n;
    this.#continues = scheme.a.map((row, i) => i > 1 && continues(scheme.a[i - 1], row));
    this.#endContinues = continues(scheme.a[scheme.a.length - 1], scheme.m);
    this.#stages = scheme.c.map(() => new Float64Array(n));
    this.#r = new Float64Array(n);
    this.#zero = new Float64Array(n);
    this.#stage = new Float64Array(system.layout.size);
    this.#K = new Float64Array(n);
    this.#L = new Float64Array(n);
    this.start = new Float64Array(system.layout.size);
    this.startRates = new Float64Array(n);
    this.end = new Float64Array(system.layout.size);
    this.#before = new Float64Array(system.layout.size);
    this.#from = this.start;
    this.#to = this.end;
    this.error = this.#stages[scheme.c.length - 1];
  }

  /** Linearises at `start`, the state at time t, after it was set or changed from outside. */
  begin(t: number): void {
    this.#system.linearise(t, this.start, this.startRates);
  }

  /** Makes the end of the last attempt the start of the next, at time t. */
  proceed(t: number): void {
    const spare = this.#before;
    this.#before = this.start;
    this.start = this.end;
    this.end = spare;
    this.#system.linearise(t, this.start, this.startRates);
  }

  /** From `start` over h into `end`; `start` and its linearisation stay, so a rejected step is simply tried again.
   *  @returns the cell whose equations could not be solved, or −1 */
  attempt(t: number, h: number): number {
    const { a, g, c, d, m, gamma } = this.scheme;
    const system = this.#system;
    const n = this.#size;
    this.time = t;
    this.span = h;
    this.#from = this.start;
    this.#to = this.end;
    this.#denseReady = false;
    const bad = system.factor(this.start, 1 / (h * gamma));
    this.factorisations++;
    if (bad >= 0) return bad;
    const stages = this.#stages;
    const r = this.#r;
    for (let i = 0; i < c.length; i++) {
      if (i === 0) r.set(this.startRates);
      else {
        // the last stage of a stiffly accurate scheme starts where the one before did, plus its increment
        if (this.#continues[i]) {
          accumulate(this.#stage, stages[i - 1], n);
          combine(r, this.#zero, stages, g[i], 1 / h, i, n);
        } else {
          combineTwice(this.#stage, this.start, a[i], r, g[i], 1 / h, stages, i, n);
        }
        system.addRates(t + c[i] * h, this.#stage, r);
      }
      system.addTimeSlope(r, d[i] * h);
      system.solve(r, stages[i]);
      this.solves++;
    }
    if (this.#endContinues) sum(this.end, this.#stage, stages[c.length - 1], n);
    else combine(this.end, this.start, stages, m, 1, c.length, n);
    system.settle(this.end);
    return -1;
  }

  /** One unknown of `stateAt`, by its index among the integrated unknowns. */
  unknownAt(theta: number, index: number): number {
    const { k, l } = this.scheme;
    let K = 0;
    let L = 0;
    for (let j = 0; j < k.length; j++) {
      const u = this.#stages[j][index];
      K += k[j] * u;
      L += l[j] * u;
    }
    const rest = 1 - theta;
    return rest * this.#from[index] + theta * (this.#to[index] + rest * (K + theta * L));
  }

  /** The state at time + θ·span of the last attempt, 0 ≤ θ ≤ 1, into `out`. Third order. */
  stateAt(theta: number, out: Float64Array): void {
    const n = this.#size;
    if (!this.#denseReady) {
      const { k, l } = this.scheme;
      this.#K.fill(0);
      this.#L.fill(0);
      combine(this.#K, this.#K, this.#stages, k, 1, k.length, n);
      combine(this.#L, this.#L, this.#stages, l, 1, l.length, n);
      this.#denseReady = true;
    }
    const rest = 1 - theta;
    const from = this.#from;
    const to = this.#to;
    for (let i = 0; i < n; i++) {
      out[i] = rest * from[i] + theta * (to[i] + rest * (this.#K[i] + theta * this.#L[i]));
    }
    this.#system.settle(out);
  }
}

/** Is `row` the row before it with a 1 added at its end? */
function continues(before: readonly number[], row: readonly number[]): boolean {
  return row.length === before.length + 1 && row[row.length - 1] === 1 && before.every((v, j) => v === row[j]);
}

function accumulate(target: Float64Array, increment: Float64Array, n: number): void {
  for (let i = 0; i < n; i++) target[i] += increment[i];
}

function sum(out: Float64Array, one: Float64Array, other: Float64Array, n: number): void {
  for (let i = 0; i < n; i++) out[i] = one[i] + other[i];
}

/** state ← base + Σ aⱼ Uⱼ and r ← factor Σ gⱼ Uⱼ over j < count ≤ 4, each U read once. */
function combineTwice(
  state: Float64Array,
  base: Float64Array,
  a: readonly number[],
  r: Float64Array,
  g: readonly number[],
  factor: number,
  U: readonly Float64Array[],
  count: number,
  n: number,
): void {
  const [a0 = 0, a1 = 0, a2 = 0, a3 = 0] = a;
  const g0 = factor * (g[0] ?? 0);
  const g1 = factor * (g[1] ?? 0);
  const g2 = factor * (g[2] ?? 0);
  const g3 = factor * (g[3] ?? 0);
  const [u0, u1, u2, u3] = U;
  switch (count) {
    case 1:
      for (let i = 0; i < n; i++) {
        const p = u0[i];
        state[i] = base[i] + a0 * p;
        r[i] = g0 * p;
      }
      return;
    case 2:
      for (let i = 0; i < n; i++) {
        const p = u0[i];
        const q = u1[i];
        state[i] = base[i] + a0 * p + a1 * q;
        r[i] = g0 * p + g1 * q;
      }
      return;
    case 3:
      for (let i = 0; i < n; i++) {
        const p = u0[i];
        const q = u1[i];
        const s = u2[i];
        state[i] = base[i] + a0 * p + a1 * q + a2 * s;
        r[i] = g0 * p + g1 * q + g2 * s;
      }
      return;
    case 4:
      for (let i = 0; i < n; i++) {
        const p = u0[i];
        const q = u1[i];
        const s = u2[i];
        const t = u3[i];
        state[i] = base[i] + a0 * p + a1 * q + a2 * s + a3 * t;
        r[i] = g0 * p + g1 * q + g2 * s + g3 * t;
      }
      return;
    default:
      throw new RangeError(`${count} stages`);
  }
}

/** out ← base + factor Σ weightⱼ Uⱼ over j < count. */
function combine(
  out: Float64Array,
  base: Float64Array,
  U: readonly Float64Array[],
  weights: readonly number[],
  factor: number,
  count: number,
  n: number,
): void {
  const w = (j: number): number => (j < count ? factor * (weights[j] ?? 0) : 0);
  const w0 = w(0);
  const w1 = w(1);
  const w2 = w(2);
  const w3 = w(3);
  const w4 = w(4);
  const w5 = w(5);
  const u0 = U[0];
  switch (count) {
    case 1:
      for (let i = 0; i < n; i++) out[i] = base[i] + w0 * u0[i];
      return;
    case 2: {
      const u1 = U[1];
      for (let i = 0; i < n; i++) out[i] = base[i] + w0 * u0[i] + w1 * u1[i];
      return;
    }
    case 3: {
      const u1 = U[1];
      const u2 = U[2];
      for (let i = 0; i < n; i++) out[i] = base[i] + w0 * u0[i] + w1 * u1[i] + w2 * u2[i];
      return;
    }
    case 4: {
      const u1 = U[1];
      const u2 = U[2];
      const u3 = U[3];
      for (let i = 0; i < n; i++) out[i] = base[i] + w0 * u0[i] + w1 * u1[i] + w2 * u2[i] + w3 * u3[i];
      return;
    }
    default: {
      const u1 = U[1];
      const u2 = U[2];
      const u3 = U[3];
      const u4 = U[4];
      if (count === 5) {
        for (let i = 0; i < n; i++) {
          out[i] = base[i] + w0 * u0[i] + w1 * u1[i] + w2 * u2[i] + w3 * u3[i] + w4 * u4[i];
        }
        return;
      }
      const u5 = U[5];
      for (let i = 0; i < n; i++) {
        out[i] = base[i] + w0 * u0[i] + w1 * u1[i] + w2 * u2[i] + w3 * u3[i] + w4 * u4[i] + w5 * u5[i];
      }
    }
  }
}
