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
    const drop = (t: number): number => circuit.supplyVoltage(t) - open.at(circuit, t);
    // where V_open turns it equals the supply's voltage
    if (Math.max(Math.abs(circuit.supplyVoltage(from)), Math.abs(circuit.supplyVoltage(to))) > Math.abs(highest)) {
      const turn = signChange(drop, from, to);
      if (turn !== null) look(open.at(circuit, turn));
    }
    open.advance(circuit, to);
    look(open.voltage);
    from = to;
  }
  return highest;
}

/** Where a monotonic function changes its sign, null where it does not. V_open is flat there, so its highest value is found to the square of
 *  the error of this time: false position with halving (Illinois), a dozen evaluations for each of up to a million pieces. */
function signChange(f: (t: number) => number, from: number, to: number): number | null {
  let [a, b, fa, fb] = [from, to, f(from), f(to)];
  if (!(fa * fb < 0)) return null;
  const small = 1e-7 * Math.max(Math.abs(fa), Math.abs(fb));
  for (let k = 0; k < 40; k++) {
    const t = (a * fb - b * fa) / (fb - fa);
    const ft = f(t);
    if (Math.abs(ft) <= small) return t;
    if (ft * fb < 0) [a, fa] = [b, fb];
    else fa /= 2;
    [b, fb] = [t, ft];
  }
  return b;
}
