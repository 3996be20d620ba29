/** Which way the voltage of a dark discharge goes as its current begins to bend the field: `falls` makes the discharge leap
 *  towards the glow behind any small resistance, `rises` lets it settle.
 *  V − V_s ~ j² with the sign of −α″(E): bending the field at constant voltage raises ∫α dx when α is convex there. For
 *  α = A N exp(−B N/E) this is E < B N/2 (falls) against E > B N/2 (rises). Constant yield, no attachment.
 *  @param ionisation  α/N [m²] of E/N [V m²]
 *  @param reducedField  E/N at V_s [V m²]
 *  Source: von Engel & Steenbeck 1934; Šijačić & Ebert, Phys. Rev. E 66, 066410, 2002 (order j² read, sign rule from memory H)
 *  @example lowCurrentSlope((x) => Math.exp(-1 / x), 0.49) // 'falls' */
export function lowCurrentSlope(ionisation: (x: number) => number, reducedField: number): 'falls' | 'rises' {
  const step = 3e-3 * reducedField;
  const curvature = ionisation(reducedField + step) - 2 * ionisation(reducedField) + ionisation(reducedField - step);
  return curvature > 0 ? 'falls' : 'rises';
}
