/** (eᵘ − 1)/u, and 1 at u = 0.
 *  @example exponentialRatio(1) // 1.71828183 */
export function exponentialRatio(u: number): number {
  return Math.abs(u) < 1e-8 ? 1 + u / 2 : Math.expm1(u) / u;
}

/** Electrons that one electron from the cathode brings forth there: the feedback of the gap.
 *  q = γ α (e^{(α−η)d} − 1)/(α − η), continuous at α = η; 1 is the threshold of a self-sustained discharge.
 *  @param alpha  ionisation coefficient α [1/m], ≥ 0
 *  @param eta  attachment coefficient η [1/m], ≥ 0
 *  @param spacing  d [m]
 *  @param ionYield  γ, electrons per ion that lands on the cathode
 *  @returns q; Infinity where it exceeds the largest double
 *  Source: Townsend's criterion; e.g. Raizer, Gas Discharge Physics, 1991, ch. 7 (from memory H)
 *  @example feedback(300, 0, 0.01, 0.07) // 1.33598758 */
export function feedback(alpha: number, eta: number, spacing: number, ionYield: number): number {
  return ionYield === 0 || alpha === 0 ? 0 : ionYield * alpha * spacing * exponentialRatio((alpha - eta) * spacing);
}
