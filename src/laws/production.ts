/** Ions made per cell from the flux form S = α|Γ_e|: the mean of the two face values, times φ(z), z = (α − η)Δx.
 *
 *  φ(z) = tanh(z/2)/(z/2) makes the growth of a steady flux over a cell exact, exp(z), whatever the cell's width; it tends
 *  to 1 as z², so the order of the scheme is unchanged. tanh by its continued fraction, (60 + z²)/(60 + 6z²), right to
 *  z⁶/8400.
 *  Derived here from Γ(x+Δx) = Γ(x) e^z; continued fraction: Abramowitz and Stegun, Handbook of Mathematical Functions,
 *  1964, 4.5.70 (from memory). */
export function cellFactor(z: number): number {
  const q = z * z;
  return (60 + q) / (60 + 6 * q);
}

/** dφ/dz */
export function cellFactorSlope(z: number): number {
  const q = 60 + 6 * z * z;
  return (-600 * z) / (q * q);
}
