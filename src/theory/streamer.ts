/** The streamer integral of a uniform field, ∫(α − η) dx: ln of the number of electrons in one avalanche.
 *  At 18 … 20 the avalanche's own space charge rivals the applied field and a streamer can start.
 *  Source: Raether 1964; Meek & Craggs (limit from memory H)
 *  @example streamerIntegral(2000, 100, 0.01) // 19 */
export function streamerIntegral(alpha: number, eta: number, spacing: number): number {
  return (alpha - eta) * spacing;
}
