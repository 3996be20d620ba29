import { minimumBetween } from '../numerics/roots.ts';
import { threshold } from './breakdown-voltage.ts';
import { type Multiplication, SCANNED_FIELDS, sustainingColumn } from './multiplication.ts';

/** A point of a Paschen curve. */
export interface PaschenPoint {
  /** [V] */
  readonly voltage: number;
  /** N d [1/m²]; times k T it is p d */
  readonly column: number;
  /** E/N [V m²] */
  readonly reducedField: number;
}

/** The lowest voltage at which any spacing breaks down in this gas in front of this cathode; null when there is none inside
 *  1e-4 … 1e4 Td.
 *  Every field x sustains itself over one column z(x), so the curve is (z, x z) and its lowest point the minimum of x z(x):
 *  one search along ln x, the same as varying p d and solving for V_s at each, without the inner solve.
 *  Source: Paschen 1889 (similarity); Townsend's criterion
 *  @example paschenMinimum({ ionisation: (x) => (x > 0 ? 1e-20 * Math.exp(-5e-19 / x) : 0), attachment: () => 0, ionYield: () => 0.01 })?.voltage // 627.259912 */
export function paschenMinimum(gas: Multiplication): PaschenPoint | null {
  return localMinima(gas).reduce<PaschenPoint | null>(
    (best, point) => (best === null || point.voltage < best.voltage ? point : best),
    null,
  );
}

/** A path of a given length and the voltage at which it breaks down. */
export interface PathThreshold {
  /** [V] */
  readonly voltage: number;
  /** [m] */
  readonly path: number;
}

/** The lowest breakdown voltage of all path lengths from the spacing to the longest path, at the same density, each taken as a
 *  uniform field; null when none breaks down. Left of the minimum a longer way round breaks down at a lower voltage.
 *  It lies at either end or at a minimum of the Paschen curve in between.
 *  @param density  N [1/m³]
 *  @param spacing  shortest path [m]
 *  @param longest  longest path [m], ≥ spacing
 *  @example lowestOverPaths({ ionisation: (x) => (x > 0 ? 1e-20 * Math.exp(-5e-19 / x) : 0), attachment: () => 0, ionYield: () => 0.01 }, 1e23, 0.006, 0.05)?.path // 0.0125452 */
export function lowestOverPaths(gas: Multiplication, density: number, spacing: number, longest: number): PathThreshold | null {
  const candidates: PathThreshold[] = [];
  for (const path of longest > spacing ? [spacing, longest] : [spacing]) {
    const voltage = threshold(gas, density, path).breakdown;
    if (voltage !== null) candidates.push({ voltage, path });
  }
  if (longest > spacing) {
    for (const point of localMinima(gas)) {
      const path = point.column / density;
      if (path > spacing && path < longest) candidates.push({ voltage: point.voltage, path });
    }
  }
  return candidates.reduce<PathThreshold | null>((best, next) => (best === null || next.voltage < best.voltage ? next : best), null);
}

/** every minimum of x z(x) along the scanned fields */
function localMinima(gas: Multiplication): PaschenPoint[] {
  const voltageOf = (x: number): number => {
    const column = sustainingColumn(gas, x);
    return column === null ? Number.POSITIVE_INFINITY : x * column;
  };
  const fields = SCANNED_FIELDS;
  const voltages = fields.map(voltageOf);
  const minima: PaschenPoint[] = [];
  for (let i = 1; i + 1 < fields.length; i++) {
    if (!(voltages[i] <= voltages[i - 1] && voltages[i] < voltages[i + 1])) continue;
    const logField = minimumBetween((u) => voltageOf(Math.exp(u)), Math.log(fields[i - 1]), Math.log(fields[i + 1]));
    const reducedField = Math.exp(logField);
    const voltage = voltageOf(reducedField);
    minima.push({ voltage, reducedField, column: voltage / reducedField });
  }
  return minima;
}

/** V_s of α/N = A exp(−B/x) without attachment, closed form; any consistent units (A with N or with p).
 *  V_s = B z/[ln(A z) − ln ln(1 + 1/γ)], z = N d or p d; null left of the vertical asymptote, where no voltage suffices.
 *  Source: Townsend's criterion; e.g. Raizer 1991, eq. 7.3 (from memory H)
 *  @example exponentialBreakdownVoltage(12, 180, 3, 0.07) // 209.274207 */
export function exponentialBreakdownVoltage(A: number, B: number, column: number, ionYield: number): number | null {
  const denominator = Math.log((A * column) / Math.log1p(1 / ionYield));
  return denominator > 0 ? (B * column) / denominator : null;
}

/** The Paschen minimum of α/N = A exp(−B/x): V = e (B/A) L at z = e L/A, where x = B; L = ln(1 + 1/γ).
 *  @example exponentialMinimum(12, 180, 0.01).voltage // 188.177974 */
export function exponentialMinimum(A: number, B: number, ionYield: number): PaschenPoint {
  const loops = Math.log1p(1 / ionYield);
  return { voltage: (Math.E * B * loops) / A, column: (Math.E * loops) / A, reducedField: B };
}

/** The Paschen minimum of α/N = C exp(−D/√x): V = D² e² L/(4C) at z = e² L/C, where x = D²/4.
 *  Source: Ward 1962 for the form of α; the minimum follows from the criterion
 *  @example rootMinimum(29.22, 26.64, 0.07).voltage // 122.35 */
export function rootMinimum(C: number, D: number, ionYield: number): PaschenPoint {
  const loops = Math.log1p(1 / ionYield);
  const square = Math.E * Math.E;
  return { voltage: (D * D * square * loops) / (4 * C), column: (square * loops) / C, reducedField: (D * D) / 4 };
}
