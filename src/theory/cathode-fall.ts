import { integral, minimumBetween, rootBetween } from '../numerics/roots.ts';
import { VACUUM_PERMITTIVITY } from '../units/constants.ts';
import { SCANNED_FIELDS } from './multiplication.ts';

/** A cathode layer in which the field falls linearly from its value at the cathode to zero. */
export interface CathodeLayer {
  /** E/N at the cathode [V m²] */
  readonly cathodeReducedField: number;
  /** N d_c [1/m²]; times k T it is (p d)_c */
  readonly column: number;
  /** V_c = ½ E_c d_c [V] */
  readonly voltage: number;
}

/** The layer that sustains itself with a given reduced field at the cathode.
 *  N d_c ∫₀¹ (α/N)(x_c s) ds = ln(1 + 1/γ),  V_c = ½ x_c N d_c; no attachment
 *  @param ionisation  α/N [m²] of E/N [V m²]
 *  @param ionYield  γ of E/N [V m²] at the cathode
 *  @returns null when the field does not ionise
 *  Source: von Engel & Steenbeck 1934 (the linear field); the integral is resolved here
 *  @example cathodeLayer((x) => (x > 0 ? Math.exp(-1 / x) : 0), () => 0.01, 1.639)?.voltage // 13.923769 */
export function cathodeLayer(
  ionisation: (x: number) => number,
  ionYield: (x: number) => number,
  cathodeReducedField: number,
): CathodeLayer | null {
  const mean = integral((s) => ionisation(cathodeReducedField * s), 0, 1);
  const column = Math.log1p(1 / ionYield(cathodeReducedField)) / mean;
  if (!Number.isFinite(column)) return null;
  return { cathodeReducedField, column, voltage: 0.5 * cathodeReducedField * column };
}

/** The layer of lowest voltage: the normal cathode fall. Null when no minimum lies inside 1e-4 … 1e4 Td.
 *  For α/N = A exp(−B/x), L = ln(1 + 1/γ): V_n = 3.017 (B/A) L, N d_n = 3.681 L/A, x_c = 1.639 B (textbooks round to 3 and 3.78).
 *  Source: von Engel & Steenbeck 1934; constants re-solved
 *  @example normalCathodeLayer((x) => (x > 0 ? 1e-20 * Math.exp(-5e-19 / x) : 0), () => 0.01)?.voltage // 696.2 */
export function normalCathodeLayer(ionisation: (x: number) => number, ionYield: (x: number) => number): CathodeLayer | null {
  const voltageAt = (x: number): number => cathodeLayer(ionisation, ionYield, x)?.voltage ?? Number.POSITIVE_INFINITY;
  const lowest = lowestScanned(ionisation, ionYield);
  if (lowest === null) return null;
  const best = minimumBetween(
    (u) => voltageAt(Math.exp(u)),
    Math.log(SCANNED_FIELDS[lowest - 1]),
    Math.log(SCANNED_FIELDS[lowest + 1]),
    LAYER_PLACE,
  );
  return cathodeLayer(ionisation, ionYield, Math.exp(best));
}

/** How closely the field of the lowest layer is sought, relative to its logarithm: the voltage follows as the square. */
const LAYER_PLACE = 1e-7;

/** Index of the scanned field whose layer has the lowest voltage, V ∝ x² ln(1 + 1/γ)/∫₀ˣ α dx; null when it is the first or the last. The
 *  integral is the running trapezoid over the scan (2.3 % steps): close enough to say which. */
function lowestScanned(ionisation: (x: number) => number, ionYield: (x: number) => number): number | null {
  const fields = SCANNED_FIELDS;
  let lowest = 0;
  let least = Number.POSITIVE_INFINITY;
  let before = ionisation(fields[0]);
  let integral = 0.5 * before * fields[0];
  for (let i = 1; i < fields.length; i++) {
    const here = ionisation(fields[i]);
    integral += 0.5 * (before + here) * (fields[i] - fields[i - 1]);
    before = here;
    const voltage = (fields[i] * fields[i] * Math.log1p(1 / ionYield(fields[i]))) / integral;
    if (voltage < least) {
      least = voltage;
      lowest = i;
    }
  }
  return lowest < 2 || lowest >= fields.length - 1 ? null : lowest;
}

/** The abnormal layer of a given voltage, thinner than the normal one and with a stronger field at the cathode; null below the
 *  normal fall or beyond 1e4 Td.
 *  @example abnormalCathodeLayer((x) => (x > 0 ? 1e-20 * Math.exp(-5e-19 / x) : 0), () => 0.01, 1000)?.voltage // 1000 */
export function abnormalCathodeLayer(
  ionisation: (x: number) => number,
  ionYield: (x: number) => number,
  voltage: number,
): CathodeLayer | null {
  const normal = normalCathodeLayer(ionisation, ionYield);
  if (normal === null || voltage < normal.voltage) return null;
  const excess = (u: number): number => (cathodeLayer(ionisation, ionYield, Math.exp(u))?.voltage ?? 0) - voltage;
  const [low, high] = [Math.log(normal.cathodeReducedField), Math.log(SCANNED_FIELDS[SCANNED_FIELDS.length - 1])];
  if (excess(low) >= 0) return normal;
  return excess(high) < 0 ? null : cathodeLayer(ionisation, ionYield, Math.exp(rootBetween(excess, low, high)));
}

/** Current density of a layer [A/m²]: the ions that make its field, at their drift speed at the cathode, and the electrons they free.
 *  j = (1 + γ) ε0 (E_c/d_c) W_i(E_c), which is 4 ε0 μ_i V²(1 + γ)/d_c³ for a constant mobility
 *  @param density  N [1/m³]   @param ionSpeed  W_i at the cathode [m/s]
 *  Source: von Engel & Steenbeck 1934 (from memory H)
 *  @example layerCurrentDensity({ cathodeReducedField: 1e-18, column: 1e21, voltage: 500 }, 0.01, 1e23, 1000) // 0.0894272969 */
export function layerCurrentDensity(layer: CathodeLayer, ionYield: number, density: number, ionSpeed: number): number {
  const field = layer.cathodeReducedField * density;
  const thickness = layer.column / density;
  return ((1 + ionYield) * VACUUM_PERMITTIVITY * field * ionSpeed) / thickness;
}
