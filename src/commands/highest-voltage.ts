import type { Case } from '../case.ts';
import { Circuit } from '../supply/circuit.ts';
import { OpenGap } from '../supply/open-gap.ts';
import { VACUUM_PERMITTIVITY } from '../units/constants.ts';

/** The gap voltage of largest magnitude that the supply would give this gap without conduction [V], with its sign; trips aside.
 *
 *  On a straight piece of the programme V_supply − V_open decays towards one value, so it changes its sign once at most, and there V_open turns. */
export function highestOpenGapVoltage(settings: Case): number {
  const { gap, supply, observe } = settings;
  const circuit = new Circuit(supply);
  const capacitance = supply.parallelCapacitance + (VACUUM_PERMITTIVITY * gap.area) / gap.spacing;
  const start = circuit.begin(0, supply.initialGapVoltage);
  const open = new OpenGap(circuit, capacitance, start);
  let highest = start;
  const look = (voltage: number): void => {
    if (Math.abs(voltage) > Math.abs(highest)) highest = voltage;
  };
  for (let from = 0; from < observe.until; ) {
    const to = Math.min(circuit.nextCorner(from), observe.until);
    const before = Math.sign(circuit.supplyVoltage(from) - open.voltage);
    const drop = (t: number): number => Math.sign(circuit.supplyVoltage(t) - open.at(circuit, t));
    if (before !== 0 && drop(to) !== before) {
      let [low, high] = [from, to];
      for (let k = 0; k < 60; k++) {
        const middle = (low + high) / 2;
        if (drop(middle) === before) low = middle;
        else high = middle;
      }
      look(open.at(circuit, high));
    }
    open.advance(circuit, to);
    look(open.voltage);
    from = to;
  }
  return highest;
}
