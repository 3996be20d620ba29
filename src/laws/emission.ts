import { TOWNSEND } from '../units/constants.ts';

/** Width over which a wall's emission fades in as the field turns from returning electrons to drawing them off.
 *  A choice of the program, not a datum: far below any field at which a gap multiplies. */
export const EMISSION_WIDTH: number = 0.1 * TOWNSEND;

/** Share of a wall's emission that leaves it: 0 where the field returns electrons, 1 where it draws them off, a cubic step between.
 *  @param drawing E/N [V m²] counted positive when it draws electrons off the wall */
export function emissionShare(drawing: number): number {
  const s = drawing / EMISSION_WIDTH;
  if (s <= 0) return 0;
  if (s >= 1) return 1;
  return s * s * (3 - 2 * s);
}

/** d emissionShare / d drawing [1/(V m²)]. */
export function emissionShareSlope(drawing: number): number {
  const s = drawing / EMISSION_WIDTH;
  if (s <= 0 || s >= 1) return 0;
  return (6 * s * (1 - s)) / EMISSION_WIDTH;
}
