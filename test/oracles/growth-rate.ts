/** Oracle: the growth rate of the current of a uniform field without diffusion.
 *
 *  Contains: the largest real root λ of
 *      γ_i α (e^{κ_i d} − 1)/κ_i + γ_ph α (e^{κ_ph d} − 1)/κ_ph = 1,
 *      κ_i = α − η − λ(1/W_e + 1/W_i),  κ_ph = α − η − λ/W_e,
 *  by bisection on the sum itself, and the gain q = the sum at λ = 0. The current follows e^{λt} once the start is forgotten.
 *  Does not contain: diffusion (see diffusive-growth-rate.ts), space charge, a field that changes, complex roots.
 *  Source of the equation: Davidson; Raether, Electron Avalanches and Breakdown in Gases, 1964 (from memory H, re-derived here:
 *  an electron that leaves at t makes α e^{(α−η)x} dx ions at x at t + x/W_e, whose ions land at t + x/W_e + x/W_i). */

export interface UniformGap {
  /** [1/m] */
  readonly alpha: number;
  /** attachment [1/m], default 0 */
  readonly eta?: number;
  /** [m] */
  readonly spacing: number;
  /** electrons per ion that lands on the cathode */
  readonly ionYield: number;
  /** electrons per ionisation in the gap whose photons reach the cathode at once, default 0 */
  readonly photonYield?: number;
  /** drift speeds [m/s] */
  readonly electronSpeed: number;
  readonly ionSpeed: number;
}

/** ∫₀ᵈ e^{κx} dx by the series where it is exact to round-off, else by its closed form */
function integralOfExponential(kappa: number, d: number): number {
  const u = kappa * d;
  if (Math.abs(u) < 1e-3) return d * (1 + (u / 2) * (1 + (u / 3) * (1 + (u / 4) * (1 + u / 5))));
  return (Math.exp(u) - 1) / kappa;
}

/** The electrons that one cathode electron brings forth, discounted by e^{−λ × delay}. */
export function discountedGain(gap: UniformGap, lambda: number): number {
  const { alpha, spacing, ionYield, electronSpeed, ionSpeed } = gap;
  const net = alpha - (gap.eta ?? 0);
  const byIons = ionYield * alpha * integralOfExponential(net - lambda * (1 / electronSpeed + 1 / ionSpeed), spacing);
  const byPhotons = (gap.photonYield ?? 0) * alpha * integralOfExponential(net - lambda / electronSpeed, spacing);
  return byIons + byPhotons;
}

/** λ [1/s]; negative below threshold. Bisected to the last bit. */
export function exactGrowthRate(gap: UniformGap): number {
  const transit = gap.spacing * (1 / gap.electronSpeed + (gap.ionYield > 0 ? 1 / gap.ionSpeed : 0));
  let low = -1 / transit;
  let high = 1 / transit;
  while (discountedGain(gap, low) < 1) low *= 2;
  while (discountedGain(gap, high) > 1) high *= 2;
  for (;;) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) return middle;
    if (discountedGain(gap, middle) > 1) low = middle;
    else high = middle;
  }
}
