/** λ of I = a + b e^{λt} by least squares, every point weighted by its own size so that each decade counts alike.
 *
 *  a is what the seed alone would carry. Space charge first acts on a growing mode as c e^{2λt}; up to 1 % field distortion and over
 *  two decades that term moves λ by 0.5 %. So the fit is made without and with it, and where the two differ the points do not
 *  determine λ. (A line through ln I is 4 to 26 % off where the seed's own current is still felt.)
 *  @param t times [s], rising; `current` as many values, of one sign
 *  @returns λ [1/s], or null where the points do not determine it */
export function fitGrowth(t: readonly number[], current: readonly number[]): number | null {
  const n = t.length;
  if (n < 8) return null;
  const slope = Math.log(current[n - 1] / current[n - 2]) / (t[n - 1] - t[n - 2]);
  if (!(slope > 0)) return null;
  const short = fit(t, current, 2, slope);
  const long = fit(t, current, 3, slope);
  return Math.abs(long / short - 1) < LARGEST_DOUBT ? long : null;
}

/** Relative difference of the two fits up to which λ counts as determined. */
const LARGEST_DOUBT = 4e-3;

/** The λ whose best a, b (and c) leave the smallest residual. Half of λ fits nearly as well with b and c in each other's place, so the
 *  search stays close to the last slope of ln I, which it is known to within a few per cent. */
function fit(t: readonly number[], current: readonly number[], terms: number, slope: number): number {
  const columns = Array.from({ length: terms }, () => new Float64Array(t.length));
  const rest = new Float64Array(t.length);
  let low = 0.75 * slope;
  let high = 1.1 * slope;
  const golden = (Math.sqrt(5) - 1) / 2;
  let x1 = high - golden * (high - low);
  let x2 = low + golden * (high - low);
  let f1 = residual(t, current, x1, columns, rest);
  let f2 = residual(t, current, x2, columns, rest);
  while (high - low > 1e-8 * high) {
    if (f1 < f2) {
      high = x2;
      x2 = x1;
      f2 = f1;
      x1 = high - golden * (high - low);
      f1 = residual(t, current, x1, columns, rest);
    } else {
      low = x1;
      x1 = x2;
      f1 = f2;
      x2 = low + golden * (high - low);
      f2 = residual(t, current, x2, columns, rest);
    }
  }
  return (low + high) / 2;
}

/** What the best combination of 1, e^{λt}, e^{2λt}, … leaves of the weighted current, which is 1 everywhere: Gram and Schmidt. */
function residual(t: readonly number[], current: readonly number[], lambda: number, columns: Float64Array[], rest: Float64Array): number {
  const last = t.length - 1;
  for (let i = 0; i <= last; i++) {
    const growth = Math.exp(lambda * (t[i] - t[last]));
    let value = current[last] / current[i];
    for (const column of columns) {
      column[i] = value;
      value *= growth;
    }
  }
  rest.fill(1);
  columns.forEach((column, k) => {
    const size = dot(column, column);
    if (!(size > 0)) return;
    for (const other of [...columns.slice(k + 1), rest]) {
      const share = dot(column, other) / size;
      for (let i = 0; i <= last; i++) other[i] -= share * column[i];
    }
  });
  return dot(rest, rest);
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}
