import { rootBetween } from '../numerics/roots.ts';
import { exponentialRatio } from './feedback.ts';

/** One way in which an avalanche makes the cathode emit again. */
export interface FeedbackTerm {
  /** electrons from the cathode per ionisation in the gap */
  readonly yield: number;
  /** τ [s/m]: delay per length between the start of the parent electron and the emission that an ionisation there causes:
   *  1/W_e + 1/W_i for ions, 1/W_e for photons */
  readonly delay: number;
}

/** τ of emission by positive ions.
 *  @example ionDelay(1e5, 1e3) // 0.00101 */
export function ionDelay(electronSpeed: number, ionSpeed: number): number {
  return 1 / electronSpeed + 1 / ionSpeed;
}

/** τ of emission by photons that are not trapped.
 *  @example photonDelay(1e5) // 0.00001 */
export function photonDelay(electronSpeed: number): number {
  return 1 / electronSpeed;
}

/** Feedback discounted by e^{−λ × delay}: Σ_k γ_k α (e^{κ_k d} − 1)/κ_k, κ_k = α − η − λ τ_k; q at λ = 0, falling in λ.
 *  @example discountedFeedback(300, 0, 0.01, [{ yield: 0.07, delay: 0.001 }], 0) // 1.33598758 */
export function discountedFeedback(alpha: number, eta: number, spacing: number, terms: readonly FeedbackTerm[], lambda: number): number {
  let sum = 0;
  for (const term of terms) {
    if (term.yield > 0) sum += term.yield * alpha * spacing * exponentialRatio((alpha - eta - lambda * term.delay) * spacing);
  }
  return sum;
}

/** The growth rate of the current in a uniform field without space charge or diffusion: I ~ e^{λt}.
 *  1 = Σ_k γ_k α (e^{κ_k d} − 1)/κ_k; the left side falls with λ, so there is one real root, and it leads every complex one.
 *  @returns λ [1/s], negative below threshold; null when nothing feeds back
 *  Source: Davidson; Raether, Electron Avalanches and Breakdown in Gases, 1964 (from memory H)
 *  @example growthRate(300, 0, 0.01, [{ yield: 0.07, delay: 0.001 }]) // 40958.4426 */
export function growthRate(alpha: number, eta: number, spacing: number, terms: readonly FeedbackTerm[]): number | null {
  const active = terms.filter((term) => term.yield > 0 && term.delay > 0);
  if (alpha <= 0 || active.length === 0) return null;
  // logarithm: nearly straight in λ, and finite where the sum itself would overflow
  const excess = (lambda: number): number => logDiscountedFeedback(alpha, eta, spacing, active, lambda);
  const scale = 1 / (spacing * Math.max(...active.map((term) => term.delay)));
  let low = -scale;
  let high = scale;
  while (excess(low) < 0) low *= 2;
  while (excess(high) > 0) high *= 2;
  return rootBetween(excess, low, high);
}

/** The slope of the growth rate at threshold, ion feedback without attachment: λ d τ = (q − 1)/(1 + γ − 1/(α d)).
 *  @returns λ d τ per unit of q − 1
 *  Source: expansion of the growth-rate equation about q = 1
 *  @example thresholdSlope(300, 0.01, 0.07) // 1.35746606 */
export function thresholdSlope(alpha: number, spacing: number, ionYield: number): number {
  return 1 / (1 + ionYield - 1 / (alpha * spacing));
}

/** −∂/∂λ of the discounted feedback [s]: the mean delay of the emission it stands for.
 *  @example discountedDelay(300, 0, 0.01, [{ yield: 0.07, delay: 0.001 }], 0) // 1.0e-5 */
export function discountedDelay(alpha: number, eta: number, spacing: number, terms: readonly FeedbackTerm[], lambda: number): number {
  let sum = 0;
  for (const term of terms) {
    const u = (alpha - eta - lambda * term.delay) * spacing;
    sum += term.yield * alpha * term.delay * spacing * spacing * slopeOfRatio(u);
  }
  return sum;
}

/** d/du of (eᵘ − 1)/u */
function slopeOfRatio(u: number): number {
  if (Math.abs(u) < 1e-3) return 1 / 2 + u * (1 / 3 + u * (1 / 8 + u / 30));
  return (Math.exp(u) - exponentialRatio(u)) / u;
}

function logDiscountedFeedback(alpha: number, eta: number, spacing: number, terms: readonly FeedbackTerm[], lambda: number): number {
  const logs = terms.map((term) => {
    const u = (alpha - eta - lambda * term.delay) * spacing;
    const ratio = u > 30 ? u - Math.log(u) : Math.log(exponentialRatio(u));
    return Math.log(term.yield * alpha * spacing) + ratio;
  });
  const largest = Math.max(...logs);
  return largest + Math.log(logs.reduce((sum, value) => sum + Math.exp(value - largest), 0));
}
