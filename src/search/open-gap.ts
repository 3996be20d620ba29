import type { Case } from '../case.ts';
import { followOpenGap } from '../onset/highest-voltage.ts';
import { Circuit } from '../supply/circuit.ts';
import { OpenGap } from '../supply/open-gap.ts';
import { VACUUM_PERMITTIVITY } from '../units/constants.ts';
import type { Judgement } from './runs.ts';

/** C_p + C_gap [F]. */
export function capacitanceOf({ gap, supply }: Case): number {
  return supply.parallelCapacitance + (VACUUM_PERMITTIVITY * gap.area) / gap.spacing;
}

/** What the supply would do to a gap that does not conduct; trips aside. */
export interface Drive {
  /** open-gap voltages from t = 0 until the end of the run [V] */
  readonly highest: number;
  readonly lowest: number;
  /** the larger of the two as a magnitude */
  readonly largest: number;
  /** open-gap voltage at the end of the run [V] */
  readonly last: number;
  /** the largest |V| that the supply drives at the end of the run or later [V] */
  readonly later: number;
}

/** Follows the open gap of a case until its run ends. */
export function driveOf(settings: Case): Drive {
  const { supply, observe } = settings;
  const circuit = new Circuit(supply);
  const start = circuit.begin(0, supply.initialGapVoltage);
  let [highest, lowest, last] = [start, start, start];
  followOpenGap(circuit, new OpenGap(circuit, capacitanceOf(settings), start), 0, observe.until, (voltage) => {
    highest = Math.max(highest, voltage);
    lowest = Math.min(lowest, voltage);
    last = voltage;
  });
  return { highest, lowest, largest: Math.max(highest, -lowest), last, later: circuit.largestSupplyFrom(observe.until) };
}

/** Whether the run ends before the supply has driven the gap to its full voltage (a slow charge, a long ramp): a hold then says
 *  nothing about that voltage.
 *  @param share of the full voltage that may be missing */
export function isUnfinished({ largest, later }: Drive, share: number): boolean {
  return later > (1 + share) * largest;
}

/** What an unfinished run leaves open. */
export const STILL_CHARGING: Judgement = { doubt: 'the run ends before the gap has been driven to its full voltage: extend observe.until' };
