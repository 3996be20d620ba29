/** How closely switches are located: the state just past one must not ask for it again. */
const CLOSEST = 1e-9;

/** Where g rises (or falls) through zero in [0, 1], by the Illinois variant of regula falsi with bisection as a guard.
 *
 *  Source: Dowell and Jarratt, BIT 11, 168, 1971.
 *  @param first, last g(0) and g(1), of opposite signs (a zero counts as either)
 *  @returns θ within `near` of the root, or where |g| is `near` times the smaller end */
export function locate(g: (theta: number) => number, first: number, last: number, near: number = CLOSEST): number {
  let a = 0;
  let b = 1;
  let fa = first;
  let fb = last;
  if (fa === 0) return 0;
  if (fa * fb > 0) return 1;
  const enough = near * Math.min(Math.abs(first), Math.abs(last));
  let side = 0;
  for (let k = 0; k < 80 && b - a > near; k++) {
    let theta = k % 8 === 7 ? (a + b) / 2 : b - (fb * (b - a)) / (fb - fa);
    if (!(theta > a && theta < b)) theta = (a + b) / 2;
    const f = g(theta);
    if (f === 0) return theta;
    if (f * fb > 0) {
      b = theta;
      fb = f;
      if (side === 1) fa /= 2;
      side = 1;
    } else {
      a = theta;
      fa = f;
      if (side === -1) fb /= 2;
      side = -1;
    }
    if (Math.abs(f) < enough) return theta;
  }
  return b;
}
