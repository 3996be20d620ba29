import { exponentialRatio, feedback } from './feedback.ts';

/** How many times the seed current a gap below threshold passes on in the end.
 *  I/I₀ = [α e^{(α−η)d} − η]/(α − η) / (1 − q) = [1 + α d (e^u − 1)/u]/(1 − q), u = (α − η) d
 *  @param alpha  α [1/m]   @param eta  η [1/m]   @param spacing  d [m]   @param ionYield  γ
 *  @returns I/I₀, negative ions included; null at and above threshold (q ≥ 1), where no steady state without space charge exists
 *  Source: Townsend; with attachment Geballe & Harrison 1953 (from memory M), re-derived
 *  @example steadyAmplification(200, 0, 0.01, 0.07) // 13.3674197 */
export function steadyAmplification(alpha: number, eta: number, spacing: number, ionYield: number): number | null {
  const q = feedback(alpha, eta, spacing, ionYield);
  if (q >= 1) return null;
  return (1 + alpha * spacing * exponentialRatio((alpha - eta) * spacing)) / (1 - q);
}
