import type { Case } from '../case.ts';
import { Circuit } from '../supply/circuit.ts';
import { OpenGap } from '../supply/open-gap.ts';
import { VACUUM_PERMITTIVITY } from '../units/constants.ts';

/** The gap voltage of largest magnitude that the supply would give this gap without conduction [V], with its sign; trips aside. */
export function highestOpenGapVoltage(settings: Case): number {
  const { gap, supply, observe } = settings;
  const circuit = new Circuit(supply);
  const start = circuit.begin(0, supply.initialGapVoltage);
  const capacitance = supply.parallelCapacitance + (VACUUM_PERMITTIVITY * gap.area) / gap.spacing;
  let highest = start;
  followOpenGap(circuit, new OpenGap(circuit, capacitance, start), 0, observe.until, (voltage) => {
    if (Math.abs(voltage) > Math.abs(highest)) highest = voltage;
  });
  return highest;
}

/** Calls `look` with every voltage [V] at which the open-gap voltage turns, changes its slope or ends, in order of time.
 *  Advances `open` from its own time `from` to `until` [s]. */
export function followOpenGap(circuit: Circuit, open: OpenGap, from: number, until: number, look: (voltage: number) => void): void {
  for (let t = from; t < until; ) {
    const to = Math.min(circuit.nextCorner(t), until);
    const turned = turnOfOpenGap(circuit, (s) => open.at(circuit, s), t, to);
    if (turned !== null) look(turned);
    open.advance(circuit, to);
    look(open.voltage);
    t = to;
  }
}

/** The open-gap voltage where it turns between two times with no corner between, null where it does not turn [V].
 *
 *  On a straight piece of the programme V_supply − V_open decays towards one value, so it changes its sign once at most, and there
 *  V_open turns. It is flat there, so its value is good to the square of the error in time: false position with halving (Illinois),
 *  because a table may have a million pieces. */
export function turnOfOpenGap(circuit: Circuit, openGapAt: (t: number) => number, from: number, to: number): number | null {
  const drop = (t: number): number => circuit.supplyVoltage(t) - openGapAt(t);
  let [a, b, dropA, dropB] = [from, to, drop(from), drop(to)];
  if (dropA === 0 || Math.sign(dropA) === Math.sign(dropB)) return null;
  const small = 1e-7 * Math.max(Math.abs(dropA), Math.abs(dropB));
  for (let k = 0; k < 40 && Math.abs(dropB) > small; k++) {
    const t = (a * dropB - b * dropA) / (dropB - dropA);
    const dropT = drop(t);
    if (Math.sign(dropT) === Math.sign(dropB)) dropA /= 2;
    else [a, dropA] = [b, dropB];
    [b, dropB] = [t, dropT];
  }
  return openGapAt(b);
}
