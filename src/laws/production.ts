import { expOfNegative } from '../numerics/exponential.ts';
import { TOWNSEND } from '../units/constants.ts';

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

/** E/N around zero over which attachment by the flux along the drift fades out and back in [V m²]: η, unlike α, need not vanish there, and
 *  electrons that diffuse through a place without field have no direction of drift. A choice of the program, not a datum. */
const ATTACHMENT_WIDTH = 0.3 * TOWNSEND;

/** How far a flux of electrons counts as along their drift in a field E [V/m], −1 … 1: −sign(E) beyond a few tenths of a townsend.
 *  @param density N [1/m³] */
export function alongDrift(E: number, density: number): number {
  const width = ATTACHMENT_WIDTH * density;
  return -E / Math.sqrt(E * E + width * width);
}

/** d alongDrift / dE [m/V] */
export function alongDriftSlope(E: number, density: number): number {
  const width = ATTACHMENT_WIDTH * density;
  const q = E * E + width * width;
  return (-width * width) / (q * Math.sqrt(q));
}
