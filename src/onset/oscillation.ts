import type { Turn } from './swings.ts';

/** Periods that must be alike, and how closely. */
const PERIODS = 3;
const ALIKE = 0.02;
/** How many periods the last maximum may lie back for the oscillation to last to the end. */
const RECENT = 1.5;

/** Period and amplitude (half the swing) of the gap voltage where it repeats at the end of a run: the last periods alike.
 *
 *  @param turns maxima and minima by turns, in order of time
 *  @param end of the run [s] */
export function oscillationOf(turns: readonly Turn[], end: number): { period_s: number; amplitude_V: number } | null {
  const maxima = turns.filter((t) => t.kind > 0).slice(-PERIODS - 1);
  const minima = turns.filter((t) => t.kind < 0).slice(-PERIODS);
  if (maxima.length <= PERIODS || minima.length < PERIODS) return null;
  const periods = differences(maxima.map((t) => t.time));
  const period = mean(periods);
  const high = mean(maxima.map((t) => t.value));
  const low = mean(minima.map((t) => t.value));
  const swing = high - low;
  const repeats =
    periods.every((p) => Math.abs(p - period) <= ALIKE * period) &&
    maxima.every((t) => Math.abs(t.value - high) <= ALIKE * swing) &&
    minima.every((t) => Math.abs(t.value - low) <= ALIKE * swing);
  if (!repeats || end - maxima[PERIODS].time > RECENT * period) return null;
  return { period_s: period, amplitude_V: swing / 2 };
}

function differences(values: readonly number[]): number[] {
  return values.slice(1).map((v, i) => v - values[i]);
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, v) => sum + v, 0) / values.length;
}
