/** A run on default settings against the same run with four times the cells and a hundredth of the tolerance. */
import type { Case } from '../../src/case.ts';
import type { Outcome } from '../../src/onset/outcome.ts';
import { simulateNow } from '../../src/simulate.ts';

export interface Comparison {
  readonly coarse: Outcome;
  readonly fine: Outcome;
  /** relative differences; NaN where only one of the two has a value, 0 where neither has */
  readonly lag: number;
  readonly onsetVoltage: number;
  readonly peak: number;
  readonly voltage: number;
  readonly current: number;
  readonly crossings: readonly number[];
  readonly energy: number;
}

function relative(a: number | null, b: number | null): number {
  if (a === null || b === null) return a === b ? 0 : Number.NaN;
  return b === 0 ? (a === 0 ? 0 : Number.POSITIVE_INFINITY) : a / b - 1;
}

export function againstFine(settings: Case): Comparison {
  const coarse = simulateNow(settings);
  const fine = simulateNow({ ...settings, numerics: { cells: 4 * coarse.numerics.cells, tolerance: 1e-5 } });
  // what has died away is compared with what there was
  const most = fine.peak;
  const faded = (a: number, b: number, scale: number): number => (Math.abs(b) < 1e-3 * Math.abs(scale) ? (a - b) / scale : a / b - 1);
  const end = Math.max(coarse.final.time_s, fine.final.time_s);
  // a steady run ends early: what it would have fed until the later end is the steady power
  const fed = (o: Outcome): number => o.energy.gap_J + (end - o.final.time_s) * o.final.current_A * o.final.gap_voltage_V;
  return {
    coarse,
    fine,
    lag: relative(coarse.onset.formative_lag_s, fine.onset.formative_lag_s),
    onsetVoltage: relative(coarse.onset.gap_voltage_V, fine.onset.gap_voltage_V),
    peak: relative(coarse.peak.current_A, fine.peak.current_A),
    voltage: faded(coarse.final.gap_voltage_V, fine.final.gap_voltage_V, most.gap_voltage_V),
    current: faded(coarse.final.current_A, fine.final.current_A, most.current_A),
    crossings: coarse.currents.map((c, i) => relative(c.time_s, fine.currents[i].time_s)),
    energy: relative(fed(coarse), fed(fine)),
  };
}

/** The comparison as a line of a table. */
export function lineOf(name: string, c: Comparison): (string | number)[] {
  const crossing = c.crossings.reduce((most, e) => (Math.abs(e) > Math.abs(most) ? e : most), 0);
  return [name, c.lag, c.onsetVoltage, c.peak, c.voltage, c.current, crossing, c.energy, c.coarse.numerics.steps, c.fine.numerics.steps];
}

export const HEAD: readonly string[] = ['', 'lag', 'V at onset', 'peak I', 'final V', 'final I', 'crossings', 'energy', 'steps', 'fine'];
