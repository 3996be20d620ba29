/** Root of f between a and b, where f changes sign; relative accuracy of the place about 1e-14.
 *  Bisection with inverse quadratic steps. Source: Brent, Algorithms for Minimization without Derivatives, 1973, ch. 4.
 *  @throws RangeError when f has the same sign at both ends
 *  @example rootBetween((x) => x * x - 2, 1, 2) // 1.41421356 */
export function rootBetween(f: (x: number) => number, a: number, b: number): number {
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (!(fa < 0 !== fb < 0)) throw new RangeError(`no change of sign between ${a} (${fa}) and ${b} (${fb})`);
  let c = a;
  let fc = fa;
  let step = b - a;
  let lastStep = step;
  for (let i = 0; i < 200; i++) {
    if (fb < 0 === fc < 0) {
      c = a;
      fc = fa;
      step = b - a;
      lastStep = step;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      [a, b, c] = [b, c, b];
      [fa, fb, fc] = [fb, fc, fb];
    }
    const tolerance = 4 * Number.EPSILON * Math.abs(b) + Number.MIN_VALUE;
    const half = (c - b) / 2;
    if (Math.abs(half) <= tolerance || fb === 0) return b;
    if (Math.abs(lastStep) >= tolerance && Math.abs(fa) > Math.abs(fb)) {
      const s = fb / fa;
      let p: number;
      let q: number;
      if (a === c) {
        p = 2 * half * s;
        q = 1 - s;
      } else {
        const u = fa / fc;
        const r = fb / fc;
        p = s * (2 * half * u * (u - r) - (b - a) * (r - 1));
        q = (u - 1) * (r - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      else p = -p;
      if (2 * p < Math.min(3 * half * q - Math.abs(tolerance * q), Math.abs(lastStep * q))) {
        lastStep = step;
        step = p / q;
      } else {
        step = half;
        lastStep = half;
      }
    } else {
      step = half;
      lastStep = half;
    }
    a = b;
    fa = fb;
    b += Math.abs(step) > tolerance ? step : Math.sign(half) * tolerance;
    fb = f(b);
  }
  return b;
}

/** Place of the minimum of f between a and b, where f has one minimum, to `near` relative to the ends (by default about as
 *  closely as doubles allow). Golden section. Source: Kiefer 1953 (common practice).
 *  @example minimumBetween((x) => (x - 0.3) ** 2, 0, 1) // 0.3 */
export function minimumBetween(f: (x: number) => number, a: number, b: number, near = 1e-9): number {
  const shrink = (Math.sqrt(5) - 1) / 2;
  let left = b - shrink * (b - a);
  let right = a + shrink * (b - a);
  let fLeft = f(left);
  let fRight = f(right);
  while (Math.abs(b - a) > near * (Math.abs(a) + Math.abs(b)) + Number.MIN_VALUE) {
    if (fLeft <= fRight) {
      b = right;
      right = left;
      fRight = fLeft;
      left = b - shrink * (b - a);
      fLeft = f(left);
    } else {
      a = left;
      left = right;
      fLeft = fRight;
      right = a + shrink * (b - a);
      fRight = f(right);
    }
  }
  return (a + b) / 2;
}

/** abscissae in (0, 1) and weights of the five-point Gauss rule on [−1, 1]; Abramowitz & Stegun 1964, table 25.4 */
const GAUSS_NODES = [0, 0.538469310105683, 0.906179845938664];
const GAUSS_WEIGHTS = [0.568888888888889, 0.478628670499366, 0.236926885056189];

/** ∫ₐᵇ f dx by the five-point Gauss rule on 40 panels: 1e-12 for the smooth, flat-footed curves used here.
 *  @example integral((x) => x * x, 0, 3) // 9 */
export function integral(f: (x: number) => number, a: number, b: number): number {
  const panels = 40;
  const half = (b - a) / (2 * panels);
  let sum = 0;
  for (let k = 0; k < panels; k++) {
    const middle = a + (2 * k + 1) * half;
    sum += GAUSS_WEIGHTS[0] * f(middle);
    for (let i = 1; i < 3; i++) sum += GAUSS_WEIGHTS[i] * (f(middle - half * GAUSS_NODES[i]) + f(middle + half * GAUSS_NODES[i]));
  }
  return sum * half;
}
