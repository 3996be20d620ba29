/** Gaps in the built-in gases, each written as a case file and read as one, so that a published check runs through the whole program. */
import type { Case } from '../../src/case.ts';
import { readCase } from '../../src/casefile/index.ts';
import type { Outcome } from '../../src/onset/outcome.ts';
import { simulateNow } from '../../src/simulate.ts';

/** name of a built-in gas */
export type GasName = string;

/** A plane gap of 1 cm unless told otherwise, at 20 °C, between like electrodes. */
export interface GasGap {
  readonly gas: GasName;
  /** [Torr], [cm], [cm²] */
  readonly torr: number;
  readonly spacing?: number;
  readonly area?: number;
  readonly ionYield: number;
  /** seed [A], and electrons released at t = 0 */
  readonly seed?: number;
  readonly electrons?: number;
  /** the supply of the case file, as a flow mapping */
  readonly supply: string;
  /** rows of the supply's table bias.csv: time [s], voltage [V] */
  readonly bias?: readonly (readonly [number, number])[];
  /** [s] */
  readonly until: number;
  readonly numerics?: string;
}

export function caseOf(gap: GasGap): Case {
  const text = `
gap: { geometry: planar, spacing: ${gap.spacing ?? 1} cm, area: ${gap.area ?? 100} cm^2 }
gas: { name: ${gap.gas}, pressure: ${gap.torr} Torr, temperature: 293.15 K }
electrodes: { left: { ion_yield: ${gap.ionYield} } }
seed: { cathode_current: ${gap.seed ?? 0} A, electrons: ${gap.electrons ?? 0} }
supply: ${gap.supply}
observe: { until: ${gap.until} s }
numerics: ${gap.numerics ?? '{}'}
`;
  const bias = ['t [s], v [V]', ...(gap.bias ?? []).map(([t, v]) => `${t}, ${v}`)].join('\n');
  const read = readCase(text, 'gap.yaml', () => ({ ok: true, text: bias }));
  if (!read.ok) throw new Error(JSON.stringify(read.problems, null, 1));
  return read.case;
}

/** One look at a run: time [s], conduction current [A], gap voltage [V]. */
export interface Look {
  readonly time: number;
  readonly current: number;
  readonly voltage: number;
}

export function runOf(gap: GasGap): { readonly outcome: Outcome; readonly trace: readonly Look[] } {
  const trace: Look[] = [];
  const outcome = simulateNow(caseOf(gap), {
    snapshot: (s) => trace.push({ time: s.time, current: s.conductionCurrent, voltage: s.gapVoltage }),
  });
  return { outcome, trace };
}

const TORR = 101325 / 760;
/** N of 1 Torr at 20 °C, and N0 of the reduced mobility [1/m³] */
export const PER_TORR: number = TORR / (1.380649e-23 * 293.15);
export const LOSCHMIDT = 2.6867801e25;

/** About the time in which an ion of K0 = 1 cm²/(V s) crosses a gap of 1 cm [s]; sets how long a run lasts, nothing else. */
export function roughTransit(torr: number, voltage: number): number {
  return 0.01 ** 2 / (((1e-4 * LOSCHMIDT) / (torr * PER_TORR)) * voltage);
}

/** Lets a seed of 1e-18 A, far from any space charge, feed back on itself, and reads the current at a third, two thirds and the end of 12 rough transits.
 *  I = a + b e^{λt} there, with λ of either sign, so the ratio of the two rises is e^{4λT}.
 *  @returns 4λT; 5 where it breaks down, −5 where the current has settled */
function growth(gap: { gas: GasName; torr: number; ionYield: number; numerics: string }, voltage: number): number {
  const until = 12 * roughTransit(gap.torr, voltage);
  const { outcome, trace } = runOf({
    ...gap,
    seed: 1e-18,
    // the corners make a look fall on the two earlier instants
    supply: '{ voltage: { table: { file: bias.csv, time: t, voltage: v } }, series_resistance: 10 kohm }',
    bias: [0, until / 3, (2 * until) / 3].map((t) => [t, voltage] as const),
    until,
  });
  if (outcome.verdict.state === 'breaks-down') return 5;
  const [a, b, c] = [until / 3, (2 * until) / 3, until].map((t) => trace.findLast((s) => s.time <= t * (1 + 1e-9))?.current ?? Number.NaN);
  if (Math.abs(c - b) < 1e-3 * Math.abs(c)) return -5;
  return Math.min(5, Math.max(-5, Math.log((c - b) / (b - a))));
}

/** The voltage at which a tiny current neither grows nor dies [V], to the share `precision`.
 *  Contains the model in time and no breakdown criterion.
 *  @param guess where to begin [V] */
export function breakdownInTime(
  gap: { gas: GasName; torr: number; ionYield: number },
  guess: number,
  precision: number,
  numerics = '{ cells: 60 }',
): number {
  const grows = (voltage: number): number => growth({ ...gap, numerics }, voltage);
  let low = 0.93 * guess;
  let high = 1.07 * guess;
  let atLow = grows(low);
  let atHigh = grows(high);
  while (atLow >= 0) {
    [high, atHigh] = [low, atLow];
    low *= 0.85;
    atLow = grows(low);
  }
  while (atHigh < 0) {
    [low, atLow] = [high, atHigh];
    high *= 1.15;
    atHigh = grows(high);
  }
  // secant within the bracket; halved where one end stays
  let stayed = 0;
  while (high / low - 1 > precision) {
    const secant = low + ((high - low) * -atLow) / (atHigh - atLow);
    const margin = 0.4 * precision * low;
    const middle = Math.min(Math.max(secant, low + margin), high - margin);
    const g = grows(middle);
    if (g < 0) {
      [low, atLow] = [middle, g];
      if (stayed === 1) atHigh /= 2;
      stayed = 1;
    } else {
      [high, atHigh] = [middle, g];
      if (stayed === -1) atLow /= 2;
      stayed = -1;
    }
  }
  return (low + high) / 2;
}

/** The minimum of the simulated breakdown curve of a gas: V [V] and pd [Torr cm], by a parabola in ln pd through the lowest point and its neighbours. */
export function simulatedMinimum(
  gas: GasName,
  ionYield: number,
  pds: readonly number[],
  guess: number,
  precision: number,
): {
  readonly voltage: number;
  readonly pd: number;
  readonly reducedField: number;
  readonly curve: readonly (readonly [number, number])[];
} {
  let last = guess;
  const curve = pds.map((pd) => {
    last = breakdownInTime({ gas, torr: pd, ionYield }, last, precision);
    return [pd, last] as const;
  });
  const k = curve.reduce((best, [, v], i) => (v < curve[best][1] ? i : best), 0);
  if (k === 0 || k === curve.length - 1) throw new Error(`${gas}: the minimum is not inside ${pds.join(', ')}`);
  const [a, b, c] = [curve[k - 1], curve[k], curve[k + 1]].map(([pd, v]) => ({ x: Math.log(pd), y: v }));
  const left = (b.y - a.y) / (b.x - a.x);
  const right = (c.y - b.y) / (c.x - b.x);
  const bend = (right - left) / (c.x - a.x);
  const x = (a.x + b.x) / 2 - left / (2 * bend);
  const pd = Math.exp(x);
  const voltage = b.y + left * (x - b.x) + bend * (x - a.x) * (x - b.x);
  return { voltage, pd, reducedField: voltage / pd, curve };
}
