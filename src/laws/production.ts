import { expOfNegative } from '../numerics/exponential.ts';

/** Ions made per cell from the flux form: α times the mean of the two face fluxes, α the mean of its face values, times φ(z),
 *  z = (α − η)Δx. (Weighing each face's flux by its own α would answer unequally to the field at the two faces and put a term
 *  linear in the current into the voltage of a dark discharge, which should depart from V_s as its square.)
 *
 *  φ(z) = tanh(z/2)/(z/2) makes the growth of a steady flux over a cell exact, exp(z), whatever the cell's width; it tends
 *  to 1 as z², so the order of the scheme is unchanged. Up to |z| = 1 by its continued fraction, (60 + z²)/(60 + 6z²), right to
 *  1e-5 there; beyond, as where electrons attach within less than a cell, by the exponential: with a factor too large there a
 *  flux would come out of a cell with the other sign.
 *  Derived here from Γ(x+Δx) = Γ(x) e^z; continued fraction: Abramowitz and Stegun, Handbook of Mathematical Functions,
 *  1964, 4.5.70 (from memory). */
export function cellFactor(z: number): number {
  const q = z * z;
  return q <= 1 ? (60 + q) / (60 + 6 * q) : (2 * tanhOfHalf(z)) / z;
}

/** dφ/dz */
export function cellFactorSlope(z: number): number {
  const q = z * z;
  if (q <= 1) {
    const d = 60 + 6 * q;
    return (-600 * z) / (d * d);
  }
  const t = tanhOfHalf(z);
  return (1 - t * t) / z - (2 * t) / q;
}

function tanhOfHalf(z: number): number {
  const e = expOfNegative(-Math.abs(z));
  return (Math.sign(z) * (1 - e)) / (1 + e);
}
