import type { Case } from '../case.ts';
import { curveOf } from '../gases/curves.ts';
import { yieldAt } from '../surfaces/yield-law.ts';
import { TOWNSEND } from '../units/constants.ts';
import { feedback } from './feedback.ts';

/** What multiplies charge in a gas in front of one cathode, as functions of the reduced field x = E/N [V m²], x ≥ 0. */
export interface Multiplication {
  /** α/N [m²] */
  readonly ionisation: (x: number) => number;
  /** η/N [m²]; 0 where the gas does not attach */
  readonly attachment: (x: number) => number;
  /** γ, electrons per ion that lands on the cathode */
  readonly ionYield: (x: number) => number;
}

/** What multiplies charge in this case, in front of the wall that is the cathode at this polarity (positive: the left one). */
export function multiplicationOf(settings: Case, polarity: number): Multiplication {
  const { ionisation, attachment } = settings.gas.coefficients;
  const alpha = curveOf(ionisation.form);
  const eta = attachment === null ? null : curveOf(attachment.form);
  const cathode = polarity < 0 ? settings.electrodes.right : settings.electrodes.left;
  return {
    ionisation: (x) => alpha.valueAt(x),
    attachment: (x) => (eta === null ? 0 : eta.valueAt(x)),
    ionYield: (x) => yieldAt(cathode.ionYield, x),
  };
}

/** The reduced fields [V m²] that the searches for thresholds look through: 1e-4 … 1e4 Td in steps of 2.3 %. Beyond 1e4 Td no
 *  local coefficient means anything. */
export const SCANNED_FIELDS: Float64Array = Float64Array.from({ length: 801 }, (_, i) => TOWNSEND * 10 ** (-4 + i / 100));

/** The feedback q of a uniform field x over the column N d [1/m²].
 *  @example uniformFeedback({ ionisation: () => 3e-20, attachment: () => 0, ionYield: () => 0.07 }, 1e-19, 1e20) // 1.33598758 */
export function uniformFeedback(gas: Multiplication, x: number, column: number): number {
  return feedback(gas.ionisation(x), gas.attachment(x), column, gas.ionYield(x));
}

/** The column N d [1/m²] at which the field x just sustains itself (q = 1); null where no length does.
 *  N d = ln[1 + (a − h)/(γ a)]/(a − h) with a = α/N, h = η/N: the criterion solved for d.
 *  Where attachment outweighs, the feedback of a long gap tends to γ a/(h − a): below 1 the field never sustains itself.
 *  @example sustainingColumn({ ionisation: () => 3e-20, attachment: () => 0, ionYield: () => 0.07 }, 1e-19) // 9.08972895e19 */
export function sustainingColumn(gas: Multiplication, x: number): number | null {
  const a = gas.ionisation(x);
  const net = a - gas.attachment(x);
  const ratio = 1 / (gas.ionYield(x) * a);
  if (!Number.isFinite(ratio)) return null;
  const u = net * ratio;
  if (u <= -1) return null;
  return Math.abs(u) < 1e-8 ? ratio * (1 - u / 2) : Math.log1p(u) / net;
}
