import { expOfNegative } from '../numerics/exponential.ts';
import { Monotone } from '../numerics/monotone.ts';
import type { Form } from './forms.ts';

/** A coefficient that can be evaluated: y(x) and dy/dx for x = E/N [V m²], x ≥ 0; finite and never NaN up to 1e5 Td and beyond. */
export interface Curve {
  /** true when y is the same everywhere: `fill` need then be called only once */
  readonly constant: boolean;
  valueAt(x: number): number;
  slopeAt(x: number): number;
  /** value[i] = factor y(x[i]) for i < n */
  fill(x: Float64Array, n: number, factor: number, value: Float64Array): void;
  /** value[i] = factor y(x[i]), slope[i] = y'(x[i]) for i < n */
  fillWithSlope(x: Float64Array, n: number, factor: number, value: Float64Array, slope: Float64Array): void;
}

/** Builds the evaluator of a form. */
export function curveOf(form: Form): Curve {
  switch (form.kind) {
    case 'constant':
      return new Constant(form.value);
    case 'exponential':
      return new Exponential(form.A, form.B);
    case 'root':
      return new Pointwise(rootForm(form.C, form.D));
    case 'exponential-sum':
      return new ExponentialSum(form.terms);
    case 'power':
      return new Pointwise(powerForm(form.factor, form.exponent, form.floor));
    case 'linear':
      return new Pointwise({
        y: (x) => Math.max(0, form.a + form.b * x),
        dy: (x) => (form.a + form.b * x > 0 ? form.b : 0),
      });
    case 'linear-drift':
      return new Pointwise({
        y: (x) => form.w0 / Math.max(x, form.floor) + form.w1,
        dy: (x) => (x > form.floor ? -form.w0 / (x * x) : 0),
      });
    case 'falling':
      return new Pointwise(fallingForm(form.low, form.scale, form.power, form.fall));
    case 'table':
      return new Pointwise(form.law === 'growth' ? growthTable(form.x, form.y) : plainTable(form.x, form.y));
    case 'joined':
      return new Pointwise(
        joinedForm(
          form.pieces.map((p) => ({ from: p.from, curve: curveOf(p.form) })),
          form.blend,
        ),
      );
    case 'mixed':
      return form.mean === 'sum'
        ? new WeightedSum(form.parts.map(({ fraction, form: part }) => ({ weight: fraction, curve: curveOf(part) })))
        : new Pointwise(
            harmonicMean(
              form.parts.map(({ fraction, form: part, beside }) => ({
                weight: fraction,
                curve: curveOf(part),
                beside: curveOf(beside ?? { kind: 'constant', value: 1 }),
              })),
            ),
          );
  }
}

class Constant implements Curve {
  readonly constant = true;
  readonly #value: number;
  constructor(value: number) {
    this.#value = value;
  }
  valueAt(): number {
    return this.#value;
  }
  slopeAt(): number {
    return 0;
  }
  fill(_x: Float64Array, n: number, factor: number, value: Float64Array): void {
    value.fill(factor * this.#value, 0, n);
  }
  fillWithSlope(_x: Float64Array, n: number, factor: number, value: Float64Array, slope: Float64Array): void {
    value.fill(factor * this.#value, 0, n);
    slope.fill(0, 0, n);
  }
}

/** A exp(−B/x). */
class Exponential implements Curve {
  readonly constant = false;
  readonly #A: number;
  readonly #B: number;
  constructor(A: number, B: number) {
    this.#A = A;
    this.#B = Math.max(B, Number.MIN_VALUE); // B = 0 at x = 0 would be 0/0
  }
  valueAt(x: number): number {
    return x > 0 ? this.#A * expOfNegative(-this.#B / x) : 0;
  }
  slopeAt(x: number): number {
    return x > 0 ? slopeOrZero((this.#A * expOfNegative(-this.#B / x) * this.#B) / (x * x)) : 0;
  }
  fill(x: Float64Array, n: number, factor: number, value: Float64Array): void {
    const A = factor * this.#A;
    const B = -this.#B;
    for (let i = 0; i < n; i++) value[i] = A * expOfNegative(B / x[i]); // x = 0: exp(−∞) = 0
  }
  fillWithSlope(x: Float64Array, n: number, factor: number, value: Float64Array, slope: Float64Array): void {
    const A = this.#A;
    const B = this.#B;
    for (let i = 0; i < n; i++) {
      const r = 1 / x[i];
      const y = A * expOfNegative(-B * r);
      value[i] = factor * y;
      slope[i] = y > 0 ? y * B * r * r : 0;
    }
  }
}

/** Σ aₖ exp(−bₖ/x), not below zero. */
class ExponentialSum implements Curve {
  readonly constant = false;
  readonly #a: Float64Array;
  readonly #b: Float64Array;
  constructor(terms: readonly { readonly amplitude: number; readonly scale: number }[]) {
    this.#a = Float64Array.from(terms, (t) => t.amplitude);
    this.#b = Float64Array.from(terms, (t) => Math.max(t.scale, Number.MIN_VALUE));
  }
  valueAt(x: number): number {
    if (!(x > 0)) return 0;
    let y = 0;
    for (let k = 0; k < this.#a.length; k++) y += this.#a[k] * expOfNegative(-this.#b[k] / x);
    return Math.max(0, y);
  }
  slopeAt(x: number): number {
    if (!(x > 0)) return 0;
    let y = 0;
    let d = 0;
    for (let k = 0; k < this.#a.length; k++) {
      const t = this.#a[k] * expOfNegative(-this.#b[k] / x);
      y += t;
      d += slopeOrZero((t * this.#b[k]) / (x * x));
    }
    return y > 0 ? d : 0;
  }
  fill(x: Float64Array, n: number, factor: number, value: Float64Array): void {
    value.fill(0, 0, n);
    for (let k = 0; k < this.#a.length; k++) {
      const a = this.#a[k];
      const b = this.#b[k];
      for (let i = 0; i < n; i++) value[i] += a * expOfNegative(-b / x[i]);
    }
    for (let i = 0; i < n; i++) value[i] = value[i] > 0 ? factor * value[i] : 0;
  }
  fillWithSlope(x: Float64Array, n: number, factor: number, value: Float64Array, slope: Float64Array): void {
    value.fill(0, 0, n);
    slope.fill(0, 0, n);
    for (let k = 0; k < this.#a.length; k++) {
      const a = this.#a[k];
      const b = this.#b[k];
      for (let i = 0; i < n; i++) {
        const r = 1 / x[i];
        const t = a * expOfNegative(-b * r);
        value[i] += t;
        if (t !== 0) slope[i] += t * b * r * r;
      }
    }
    for (let i = 0; i < n; i++) {
      if (value[i] > 0) value[i] *= factor;
      else {
        value[i] = 0;
        slope[i] = 0;
      }
    }
  }
}

/** Σ wₖ yₖ. */
class WeightedSum implements Curve {
  readonly constant: boolean;
  readonly #parts: readonly { readonly weight: number; readonly curve: Curve }[];
  #value = new Float64Array(0);
  #slope = new Float64Array(0);
  constructor(parts: readonly { readonly weight: number; readonly curve: Curve }[]) {
    this.#parts = parts;
    this.constant = parts.every(({ curve }) => curve.constant);
  }
  valueAt(x: number): number {
    let y = 0;
    for (const { weight, curve } of this.#parts) y += weight * curve.valueAt(x);
    return y;
  }
  slopeAt(x: number): number {
    let y = 0;
    for (const { weight, curve } of this.#parts) y += weight * curve.slopeAt(x);
    return y;
  }
  fill(x: Float64Array, n: number, factor: number, value: Float64Array): void {
    this.#makeRoom(n);
    value.fill(0, 0, n);
    for (const { weight, curve } of this.#parts) {
      curve.fill(x, n, factor * weight, this.#value);
      for (let i = 0; i < n; i++) value[i] += this.#value[i];
    }
  }
  fillWithSlope(x: Float64Array, n: number, factor: number, value: Float64Array, slope: Float64Array): void {
    this.#makeRoom(n);
    value.fill(0, 0, n);
    slope.fill(0, 0, n);
    for (const { weight, curve } of this.#parts) {
      curve.fillWithSlope(x, n, factor * weight, this.#value, this.#slope);
      for (let i = 0; i < n; i++) {
        value[i] += this.#value[i];
        slope[i] += weight * this.#slope[i];
      }
    }
  }
  #makeRoom(n: number): void {
    if (this.#value.length >= n) return;
    this.#value = new Float64Array(n);
    this.#slope = new Float64Array(n);
  }
}

interface Pair {
  readonly y: (x: number) => number;
  readonly dy: (x: number) => number;
}

/** Any other form, point by point. */
class Pointwise implements Curve {
  readonly constant = false;
  readonly valueAt: (x: number) => number;
  readonly slopeAt: (x: number) => number;
  constructor(pair: Pair) {
    this.valueAt = pair.y;
    this.slopeAt = pair.dy;
  }
  fill(x: Float64Array, n: number, factor: number, value: Float64Array): void {
    for (let i = 0; i < n; i++) value[i] = factor * this.valueAt(x[i]);
  }
  fillWithSlope(x: Float64Array, n: number, factor: number, value: Float64Array, slope: Float64Array): void {
    for (let i = 0; i < n; i++) {
      value[i] = factor * this.valueAt(x[i]);
      slope[i] = this.slopeAt(x[i]);
    }
  }
}

/** 0·∞ at vanishing x means 0: the exponential wins. */
function slopeOrZero(slope: number): number {
  return Number.isFinite(slope) ? slope : 0;
}

function rootForm(C: number, D: number): Pair {
  return {
    y: (x) => (x > 0 ? C * Math.exp(-D / Math.sqrt(x)) : 0),
    dy: (x) => (x > 0 ? slopeOrZero((C * Math.exp(-D / Math.sqrt(x)) * D) / (2 * x * Math.sqrt(x))) : 0),
  };
}

function powerForm(factor: number, exponent: number, floor: number): Pair {
  return {
    y: (x) => factor * Math.max(x, floor) ** exponent,
    dy: (x) => (x > floor ? factor * exponent * x ** (exponent - 1) : 0),
  };
}

function fallingForm(low: number, scale: number, power: number, fall: number): Pair {
  return {
    y: (x) => low * (1 + (x / scale) ** power) ** -fall,
    dy: (x) => {
      if (!(x > 0)) return 0;
      const u = (x / scale) ** power;
      return (-low * fall * (1 + u) ** (-fall - 1) * power * u) / x;
    },
  };
}

/** Σ (w/b) / Σ (w/(b y)); 0 where a part is 0. */
function harmonicMean(parts: readonly { readonly weight: number; readonly curve: Curve; readonly beside: Curve }[]): Pair {
  const at = (x: number): { y: number; dy: number } => {
    let above = 0;
    let below = 0;
    let dAbove = 0;
    let dBelow = 0;
    for (const { weight, curve, beside } of parts) {
      const y = curve.valueAt(x);
      if (!(y > 0)) return { y: 0, dy: 0 };
      const b = beside.valueAt(x);
      const share = weight / b;
      const dShare = (-share * beside.slopeAt(x)) / b;
      above += share;
      dAbove += dShare;
      below += share / y;
      dBelow += dShare / y - (share * curve.slopeAt(x)) / (y * y);
    }
    const y = above / below;
    return { y, dy: (dAbove - y * dBelow) / below };
  };
  return { y: (x) => at(x).y, dy: (x) => at(x).dy };
}

/** ln y against 1/x, monotone cubic; K exp(−B/x) of the first two rows below them, the last value above. */
function growthTable(xs: readonly number[], ys: readonly number[]): Pair {
  const first = ys.findIndex((y) => y > 0);
  if (first < 0 || first > ys.length - 2) return { y: () => 0, dy: () => 0 };
  const x = xs.slice(first);
  const y = ys.slice(first);
  // 1/x falls as x rises: the spline runs over −1/x, which rises
  const spline = new Monotone(
    x.map((v) => -1 / v),
    y.map((v) => Math.log(v)),
  );
  const B = Math.max(0, Math.log(y[1] / y[0]) / (1 / x[0] - 1 / x[1]));
  const lnK = Math.log(y[0]) + B / x[0];
  const last = x[x.length - 1];
  const top = y[y.length - 1];
  const at = (v: number): number => {
    if (!(v > 0)) return 0;
    if (v >= last) return top;
    return Math.exp(v <= x[0] ? lnK - B / v : spline.valueAt(-1 / v));
  };
  return {
    y: at,
    dy: (v) => {
      if (!(v > 0) || v >= last) return 0;
      return slopeOrZero((at(v) * (v <= x[0] ? B : spline.slopeAt(-1 / v))) / (v * v));
    },
  };
}

/** y against ln x, monotone cubic; end values outside. */
function plainTable(x: readonly number[], y: readonly number[]): Pair {
  // a first row at x = 0 has no logarithm: it stands in for everything below the next row
  const rows = x[0] > 0 ? { x, y } : { x: [x[1] * 1e-6, ...x.slice(1)], y };
  const spline = new Monotone(
    rows.x.map((v) => Math.log(v)),
    [...rows.y],
  );
  const low = rows.x[0];
  const high = rows.x[rows.x.length - 1];
  return {
    y: (v) => (v <= low ? y[0] : v >= high ? y[y.length - 1] : spline.valueAt(Math.log(v))),
    dy: (v) => (v <= low || v >= high ? 0 : spline.slopeAt(Math.log(v)) / v),
  };
}

/** Pieces joined at their borders by a cubic weight over a relative width `blend` of x on either side. */
function joinedForm(pieces: readonly { readonly from: number; readonly curve: Curve }[], blend: number): Pair {
  const weight = (x: number, joint: number): { w: number; dw: number } => {
    const half = Math.max(blend * joint, Number.MIN_VALUE);
    const s = (x - joint + half) / (2 * half);
    if (s <= 0) return { w: 0, dw: 0 };
    if (s >= 1) return { w: 1, dw: 0 };
    return { w: s * s * (3 - 2 * s), dw: (6 * s * (1 - s)) / (2 * half) };
  };
  return {
    y: (x) => {
      let y = pieces[0].curve.valueAt(x);
      for (let k = 1; k < pieces.length; k++) {
        const { w } = weight(x, pieces[k].from);
        if (w === 0) break;
        y += w * (pieces[k].curve.valueAt(x) - y);
      }
      return y;
    },
    dy: (x) => {
      let y = pieces[0].curve.valueAt(x);
      let d = pieces[0].curve.slopeAt(x);
      for (let k = 1; k < pieces.length; k++) {
        const { w, dw } = weight(x, pieces[k].from);
        if (w === 0) break;
        const yk = pieces[k].curve.valueAt(x);
        d += w * (pieces[k].curve.slopeAt(x) - d) + dw * (yk - y);
        y += w * (yk - y);
      }
      return d;
    },
  };
}
