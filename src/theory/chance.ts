/** Probability that one electron leaving the cathode leads to breakdown.
 *  P = 1 − 1/q for q > 1, else 0. Exact for avalanches of Furry's distribution with independent emission by each ion: the
 *  number of successors is then geometric.
 *  @param feedback  q, mean number of successors
 *  Source: Wijsman, Breakdown probability of a low pressure gas discharge, Phys. Rev. 75, 833, 1949 (formula from memory H)
 *  @example breakdownProbability(2) // 0.5 */
export function breakdownProbability(feedback: number): number {
  return feedback > 1 ? 1 - 1 / feedback : 0;
}

/** Probability that an electron born inside the gap leads to breakdown; no attachment.
 *  P(x) = m P₀/(1 + m P₀), m = γ(e^{α(d−x)} − 1), P₀ = 1 − 1/q; it tends to P₀ at x = 0.
 *  @param alpha  α [1/m]   @param spacing  d [m]   @param ionYield  γ
 *  @param position  x, distance from the cathode [m]
 *  Source: Wijsman 1949, with the geometric distribution of the successors (re-derived)
 *  @example breakdownProbabilityAt(300, 0.01, 0.07, 0) // 0.251490050 */
export function breakdownProbabilityAt(alpha: number, spacing: number, ionYield: number, position: number): number {
  const fromCathode = breakdownProbability(ionYield * Math.expm1(alpha * spacing));
  const successors = ionYield * Math.expm1(alpha * (spacing - position)) * fromCathode;
  return Number.isFinite(successors) ? successors / (1 + successors) : 1;
}

/** Mean statistical lag [s]: the wait for the electron that succeeds; the wait is exponentially distributed.
 *  t̄ = 1/(Y P)
 *  @param seedRate  Y, electrons per second leaving the cathode   @param probability  P
 *  @returns null when no electron comes or none can succeed
 *  Source: von Laue, Ann. Phys. 76, 261, 1925; Zuber, Ann. Phys. 76, 231, 1925 (form from memory H)
 *  @example meanStatisticalLag(100, 0.25) // 0.04 */
export function meanStatisticalLag(seedRate: number, probability: number): number | null {
  const rate = seedRate * probability;
  return rate > 0 ? 1 / rate : null;
}

/** How much sooner than the mean a start that survives breaks down [s]: its mean current is larger by 1/P.
 *  Δt = ln(1/P)/λ
 *  @example survivalAdvance(0.5, 1000) // 0.000693147181 */
export function survivalAdvance(probability: number, growthRate: number): number {
  return -Math.log(probability) / growthRate;
}
