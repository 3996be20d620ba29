/** A surface that gives off gas. */
export interface OutgassingSurface {
  /** [m²] */
  readonly area: number;
  /** q1, gas given off per area after one hour in vacuum [Pa m/s] */
  readonly rateAtOneHour: number;
  /** a: about 1 for water on metals (0.7 to 1.3), 0.5 for diffusion out of polymers (0.4 to 0.7); from memory (M) */
  readonly exponent: number;
}

const HOUR = 3600;

/** Time below which the rate is held [s], our choice: the law diverges at t = 0, for a ≥ 1 with its integral; published curves begin minutes after pumping
 *  starts, and until then the gas filling the volume outweighs what its walls give off. */
export const OUTGASSING_HELD_UNTIL = 60;

/** Gas given off by surfaces whose time in vacuum counts from t = 0, the start of the history.
 *  Q = Σ A q1 (t/1 h)^{−a}, held before 60 s
 *  @param t  [s]
 *  @returns [Pa m³/s]
 *  Source: Dayton, Trans. 6th Nat. Symp. Vac. Technol. 101, 1960; Elsey, Vacuum 25, 299 and 347, 1975; from memory (H). Rates of technical surfaces spread
 *  over a factor of ten; after tens of hours they fall faster than the law
 *  @example outgassing([{ area: 2, rateAtOneHour: 1e-6, exponent: 1 }], 36000) // 2e-7 */
export function outgassing(surfaces: readonly OutgassingSurface[], t: number): number {
  const hours = Math.max(t, OUTGASSING_HELD_UNTIL) / HOUR;
  let sum = 0;
  for (const { area, rateAtOneHour, exponent } of surfaces) sum += area * rateAtOneHour * hours ** -exponent;
  return sum;
}
