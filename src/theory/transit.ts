/** Drift speed W = (μN) E/N [m/s] from mobility × density [1/(m V s)] and reduced field [V m²].
 *  @example driftSpeed(1e24, 1e-19) // 100000 */
export function driftSpeed(mobilityTimesDensity: number, reducedField: number): number {
  return mobilityTimesDensity * reducedField;
}

/** Time to cross the gap at a constant drift speed [s].
 *  @example transitTime(0.01, 1e5) // 1e-7 */
export function transitTime(spacing: number, speed: number): number {
  return spacing / speed;
}
