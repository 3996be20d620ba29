import { integral } from '../numerics/roots.ts';
import { VACUUM_PERMITTIVITY } from '../units/constants.ts';
import { exponentialRatio } from './feedback.ts';
import { discountedDelay, discountedFeedback, type FeedbackTerm, growthRate } from './growth-rate.ts';

/** Time from a sudden overvoltage until the cathode emits a given multiple of its constant seed, without space charge.
 *  Γ(t)/Γ_seed → e^{λt}/(λ T) − 1/(q − 1), T = −∂(discounted feedback)/∂λ: the leading mode of the linear response, started by a
 *  seed that is switched on at t = 0, so  t = ln{λ T [ratio + 1/(q − 1)]}/λ.  Near threshold λ T → q − 1 and this is
 *  Schade's ln[1 + (q − 1) ratio]/λ.
 *  @param ratio  Γ/Γ_seed, large: the modes left out die within a few ion transits
 *  @returns [s]; null at or below threshold
 *  Source: residues of the Laplace transform of Davidson's equation (re-derived); Schade, Z. Phys. 104, 487, 1937 (from memory M)
 *  @example riseTime(300, 0, 0.01, [{ yield: 0.07, delay: 0.001 }], 1e6) // 3.06630323e-4 */
export function riseTime(alpha: number, eta: number, spacing: number, terms: readonly FeedbackTerm[], ratio: number): number | null {
  const q = discountedFeedback(alpha, eta, spacing, terms, 0);
  const rate = growthRate(alpha, eta, spacing, terms);
  if (rate === null || !(q > 1) || !(rate > 0)) return null;
  const start = rate * discountedDelay(alpha, eta, spacing, terms, rate);
  return Math.max(0, Math.log(start * (ratio + 1 / (q - 1))) / rate);
}

/** Cathode emission, as a current density, whose growing avalanches change the field at the cathode by a given amount.
 *  ΔE(0) = (1/ε0) ∫ ρ (1 − x/d) dx at constant voltage, ρ of the positive ions of the mode e^{λt}; electrons, which leave a
 *  hundred times faster, are neglected.
 *  @param change  ΔE at the cathode [V/m]   @param rate  λ [1/s]
 *  @returns [A/m²]
 *  Source: Gauss's law with the mode of the growth-rate equation (re-derived)
 *  @example emissionThatDistorts(300, 0, 0.01, 1e5, 1e3, 3e4, 2000) // 2.47433e-4 */
export function emissionThatDistorts(
  alpha: number,
  eta: number,
  spacing: number,
  electronSpeed: number,
  ionSpeed: number,
  rate: number,
  change: number,
): number {
  const growth = alpha - eta - rate / electronSpeed;
  const discount = rate / ionSpeed;
  // ions made at y are spread from y to the cathode, older ones thinner by e^{−λ age}; each weighs 1 − x/d
  const weight = (y: number): number => y * exponentialRatio(-discount * y) - weightedSpread(discount, y) / spacing;
  const ions = integral((y) => alpha * Math.exp(growth * y) * weight(y), 0, spacing) / ionSpeed;
  return (change * VACUUM_PERMITTIVITY) / ions;
}

/** ∫₀ʸ x e^{−s (y − x)} dx */
function weightedSpread(s: number, y: number): number {
  const u = s * y;
  if (Math.abs(u) < 1e-3) return y * y * (1 / 2 - u * (1 / 6 - u * (1 / 24 - u / 120)));
  return (y - y * exponentialRatio(-u)) / s;
}
