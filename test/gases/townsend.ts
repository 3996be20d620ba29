/** Closed forms of breakdown in a uniform field from the data of a gas, written out here: nothing is taken from src but the data. */
import { curveOf } from '../../src/gases/curves.ts';
import { gasData } from '../../src/gases/index.ts';

/** N d of 1 Torr cm at 20 °C [1/m²] */
export const TORR_CM: number = 101325 / 760 / (1.380649e-23 * 293.15) / 100;

export interface Point {
  /** [V], [Torr cm], [Td] */
  readonly voltage: number;
  readonly pd: number;
  readonly td: number;
}

/** The breakdown point at E/N [Td]: γ α/(α − η) (e^{(α − η) d} − 1) = 1 solved for N d; null where none. `yieldAt` may depend on E/N [V m²]. */
export function breakdownAt(gas: string, set: string | undefined, yieldAt: (x: number) => number, td: number): Point | null {
  const coefficients = gasData(gas, set)?.coefficients;
  if (!coefficients) throw new Error(`no data for ${gas}, ${set}`);
  const x = td * 1e-21;
  const a = curveOf(coefficients.ionisation.form).valueAt(x);
  const net = a - (coefficients.attachment ? curveOf(coefficients.attachment.form).valueAt(x) : 0);
  const argument = net / (yieldAt(x) * a);
  if (!(a > 0) || !(argument > -1) || net === 0) return null;
  const column = Math.log1p(argument) / net;
  return { voltage: x * column, pd: column / TORR_CM, td };
}

/** The minimum of the breakdown voltage over E/N, in steps of 0.5 % from 20 to 8000 Td: V to 1e-5, pd and E/N to the step. */
export function minimum(gas: string, set: string | undefined, yieldAt: (x: number) => number): Point {
  let best: Point = { voltage: Number.POSITIVE_INFINITY, pd: Number.NaN, td: Number.NaN };
  for (let td = 20; td < 8000; td *= 1.005) {
    const point = breakdownAt(gas, set, yieldAt, td);
    if (point !== null && point.voltage < best.voltage) best = point;
  }
  return best;
}

/** The E/N [Td] at which ionisation overtakes attachment. */
export function criticalField(gas: string): number {
  const { ionisation, attachment } = gasData(gas)?.coefficients ?? {};
  if (!ionisation || !attachment) throw new Error(`${gas} does not attach electrons`);
  const [a, e] = [curveOf(ionisation.form), curveOf(attachment.form)];
  let low = 55;
  let high = 1000;
  while (high / low > 1 + 1e-9) {
    const middle = Math.sqrt(low * high);
    if (a.valueAt(middle * 1e-21) < e.valueAt(middle * 1e-21)) low = middle;
    else high = middle;
  }
  return high;
}
