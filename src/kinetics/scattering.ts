import type { Sharing } from './cross-sections.ts';

/** Directions after a collision. */
export type Angular =
  /** every direction equally likely, in the frame of the centre of mass */
  | 'isotropic'
  /** forward at high energy: scattering by a screened Coulomb potential,
   *  dσ/dΩ ∝ (1 − ξ²)/(1 − ξ cos χ)², ξ = 4ε/(1 + 4ε), ε = energy/27.21 eV,
   *  cos χ = 1 − 2R(1 − ξ)/(1 + ξ(1 − 2R)), R uniform in (0, 1).
   *  A. Okhrimovskyy, A. Bogaerts and R. Gijbels, Electron anisotropic scattering in gases: a formula for Monte Carlo simulations,
   *  Phys. Rev. E 65, 037402, 2002 (from memory, H). For elastic scattering, excitation and the faster electron of an ionisation. */
  | 'screened-coulomb';

/** hartree [eV], CODATA 2018 27.211386245988(53) */
const HARTREE = 27.211386245988;

/** ξ of screened Coulomb scattering at an energy [eV]. */
export function screening(energy: number): number {
  const e = (4 * energy) / HARTREE;
  return e / (1 + e);
}

/** Cosine of the angle of scattering for a uniform random number in (0, 1). */
export function screenedCosine(xi: number, uniform: number): number {
  return 1 - (2 * uniform * (1 - xi)) / (1 + xi * (1 - 2 * uniform));
}

/** Momentum transfer over the integral of screened Coulomb scattering:
 *  (1 − ξ)/(2ξ²) [(1 + ξ) ln((1 + ξ)/(1 − ξ)) − 2ξ]; 1 − 2ξ/3 for small ξ. */
export function screenedMomentumShare(xi: number): number {
  if (xi < 1e-3) return 1 - (2 * xi) / 3;
  return ((1 - xi) / (2 * xi * xi)) * ((1 + xi) * Math.log((1 + xi) / (1 - xi)) - 2 * xi);
}

/** Energy [eV] of the ejected electron when an ionisation leaves `left` to both, for a uniform random number in (0, 1). */
export function ejectedEnergy(sharing: Sharing, left: number, threshold: number, uniform: number): number {
  if (sharing.kind === 'uniform') return left * uniform;
  if (sharing.kind === 'equal') return 0.5 * left;
  const width = sharing.width ?? threshold;
  return Math.min(0.5 * left, width * Math.tan(uniform * Math.atan(left / (2 * width))));
}
