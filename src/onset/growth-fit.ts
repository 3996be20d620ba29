import { expOfNegative } from '../numerics/exponential.ts';
import { minimumBetween } from '../numerics/roots.ts';

/** Fewest samples that a fit of three parameters is made from. */
const LEAST_SAMPLES = 6;
/** How finely λ is looked for before the search closes in, and how closely it then does. */
const LOOKS = 60;
const RATE_PLACE = 1e-7;

/** Least-squares fit of I = a + b e^{λt}, every sample weighted by its own size so that each decade counts alike.
 *
 *  For a given λ the best a and b are linear; λ minimises what remains, found by golden section between bounds from the data.
 *  (A line through ln I is 4 to 26 % off where the seed's own current is still felt.)
 *  @param t times [s], rising
 *  @param current as many values above zero [A]
 *  @returns λ [1/s], above zero, or null where the samples do not determine it */
export function fitGrowth(t: readonly number[], current: readonly number[]): number | null {
  const n = t.length;
  if (n < LEAST_SAMPLES) return null;
  const mean = Math.log(current[n - 1] / current[0]) / (t[n - 1] - t[0]);
  if (!(mean > 0)) return null;
  // with a below 0 the current rises faster than e^{λt} at first, with a above 0 more slowly; the end is nearest to λ
  const tail = Math.log(current[n - 1] / current[n - 2]) / (t[n - 1] - t[n - 2]);
  const low = 0.3 * Math.min(mean, tail > 0 ? tail : mean);
  const high = 3 * Math.max(mean, tail);
  const remains = (lambda: number): number => remainder(t, current, lambda);
  // a coarse look first: what remains has one valley, but a wide flat side
  const ratio = (high / low) ** (1 / LOOKS);
  let best = low;
  let least = Infinity;
  for (let k = 0; k <= LOOKS; k++) {
    const lambda = low * ratio ** k;
    const r = remains(lambda);
    if (r < least) {
      least = r;
      best = lambda;
    }
  }
  return Number.isFinite(least) ? minimumBetween(remains, best / ratio, best * ratio, RATE_PLACE) : null;
}

/** Σ ((a + b e^{λt})/I − 1)² at the best a and b; Infinity where these are not determined. */
function remainder(t: readonly number[], current: readonly number[], lambda: number): number {
  const end = t[t.length - 1];
  let s11 = 0;
  let s12 = 0;
  let s22 = 0;
  let r1 = 0;
  let r2 = 0;
  for (let i = 0; i < t.length; i++) {
    const u = 1 / current[i];
    const v = u * expOfNegative(lambda * (t[i] - end));
    s11 += u * u;
    s12 += u * v;
    s22 += v * v;
    r1 += u;
    r2 += v;
  }
  const determinant = s11 * s22 - s12 * s12;
  if (!(Math.abs(determinant) > 1e-14 * s11 * s22)) return Infinity;
  const a = (r1 * s22 - r2 * s12) / determinant;
  const b = (s11 * r2 - s12 * r1) / determinant;
  let sum = 0;
  for (let i = 0; i < t.length; i++) sum += ((a + b * expOfNegative(lambda * (t[i] - end))) / current[i] - 1) ** 2;
  return sum;
}
