import { minimumBetween, rootBetween } from '../numerics/roots.ts';
import { type Multiplication, SCANNED_FIELDS, uniformFeedback } from './multiplication.ts';

/** The voltages between which a gap sustains itself. */
export interface Threshold {
  /** V_s [V]: the smallest at which the feedback reaches 1 from below; null when none does up to 1e4 Td */
  readonly breakdown: number | null;
  /** [V]: where the feedback falls back below 1 above V_s; null when it does not up to 1e4 Td */
  readonly upper: number | null;
}

/** The static breakdown voltage of a uniform field, for any curves: V_s from q(V) = 1.
 *  The whole range 1e-4 … 1e4 Td is looked through first, so that a curve with several crossings gives the lowest; then the
 *  crossing is closed in to 1e-12. A feedback already above 1 at 1e-4 Td counts as reaching 1 there, since α(0) = 0.
 *  @param gas  coefficients against E/N
 *  @param density  N [1/m³]
 *  @param spacing  d [m]
 *  Source: Townsend's criterion (see feedback)
 *  @example threshold({ ionisation: (x) => (x > 0 ? 1e-20 * Math.exp(-5e-19 / x) : 0), attachment: () => 0, ionYield: () => 0.01 }, 1e23, 0.01).breakdown // 646.623819 */
export function threshold(gas: Multiplication, density: number, spacing: number): Threshold {
  const column = density * spacing;
  // bounded whatever q is, and with the same root and sign as q − 1
  const excess = (logField: number): number => {
    const q = uniformFeedback(gas, Math.exp(logField), column);
    return q > 1e300 ? 1 : (q - 1) / (q + 1);
  };
  const voltage = (logField: number): number => Math.exp(logField) * column;
  const scanned = LOG_FIELDS.map(excess);

  const rise = firstRise(excess, scanned);
  if (rise === null) return { breakdown: null, upper: null };
  const breakdown = voltage(rise.below === null ? rise.above : rootBetween(excess, rise.below, rise.above));
  const fall = LOG_FIELDS.findIndex((u, i) => u > rise.above && scanned[i] < 0);
  if (fall === -1) return { breakdown, upper: null };
  const upper = rootBetween(excess, Math.max(rise.above, LOG_FIELDS[fall - 1]), LOG_FIELDS[fall]);
  return { breakdown, upper: voltage(upper) };
}

const LOG_FIELDS: Float64Array = SCANNED_FIELDS.map(Math.log);

/** Where the excess first reaches zero: a place just below (null at the start of the scan) and one at or above it.
 *  A maximum that reaches zero between scanned points although none of them does counts too. */
function firstRise(excess: (u: number) => number, scanned: Float64Array): { below: number | null; above: number } | null {
  if (scanned[0] >= 0) return { below: null, above: LOG_FIELDS[0] };
  for (let i = 1; i < scanned.length; i++) {
    if (scanned[i] >= 0) return { below: LOG_FIELDS[i - 1], above: LOG_FIELDS[i] };
    const isPeak = scanned[i] > -0.05 && scanned[i] >= scanned[i - 1] && scanned[i] > scanned[i + 1];
    if (!isPeak) continue;
    const peak = minimumBetween((u) => -excess(u), LOG_FIELDS[i - 1], LOG_FIELDS[i + 1]);
    if (excess(peak) > 0) return { below: LOG_FIELDS[i - 1], above: peak };
  }
  return null;
}
