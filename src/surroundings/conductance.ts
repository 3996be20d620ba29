import { apertureFlow } from './aperture.ts';
import type { FlowGas } from './flow-gas.ts';
import { tubeFlow } from './tube.ts';

/** Equal round openings through a wall. */
export interface Vent {
  /** [m] */
  readonly diameter: number;
  /** [m], ≥ 0; 0 is a thin hole */
  readonly length: number;
  readonly count: number;
  /** 0…1, of the jet in viscous flow */
  readonly dischargeCoefficient: number;
}

/** Flow through a vent from one pressure to another, at any pressures.
 *
 *  The bore and the exit are two resistances in series: `tubeFlow` from the higher pressure to p_x and `apertureFlow` from p_x to the lower one, p_x such
 *  that both are equal. So free molecules pass with W = 1/(1 + 3L'/8a); a choked jet leaves a long tube at less than the upstream pressure; creeping gas
 *  sees the length L + 3πa/8 (Dagan, Weinbaum and Pfeffer 1982).
 *  Uncertainty: 1 % for free molecules, 10 % in transition, that of the discharge coefficient in a jet; a bore's friction as in `tubeFlow`.
 *  @param from, to  [Pa], ≥ 0
 *  @returns [Pa m³/s] at the gas temperature, the same on both sides; positive out of `from`, exactly antisymmetric, zero at equal pressures
 *  Source: orifice and tube in series: Dushman 1962; exit loss of viscous flow: Santeler, J. Vac. Sci. Technol. A 4, 348, 1986; from memory (M)
 *  @example ventFlow(FLOW_GASES.air, 293.15, { diameter: 0.01, length: 0.01, count: 1, dischargeCoefficient: 0.7 }, 1e-6, 0) // 4.6745e-9 */
export function ventFlow(gas: FlowGas, temperature: number, vent: Vent, from: number, to: number): number {
  if (from < to) return -ventFlow(gas, temperature, vent, to, from);
  const drop = from - to;
  if (!(drop > 0)) return 0;
  const { diameter, length, count, dischargeCoefficient } = vent;
  const exit = (share: number): number => apertureFlow(gas, temperature, diameter, dischargeCoefficient, to, share * drop);
  if (length === 0) return count * exit(1);
  const bore = (share: number): number => tubeFlow(gas, temperature, diameter, length, to + (1 - share) * drop, share * drop);
  // u: the share of the drop along the bore. The flow is read where it depends least on the root: from the resistance with more than half the drop.
  if (bore(0.5) > exit(0.5)) return count * exit(1 - crossing((u) => bore(u) - exit(1 - u)));
  return count * bore(1 - crossing((v) => exit(v) - bore(1 - v)));
}

/** Root in [0, ½] of a rising function, to 1e-15; the nearer end where the function has one sign.
 *  Source: Ridders, IEEE Trans. Circuits Syst. 26, 979, 1979; from memory (H) */
function crossing(f: (u: number) => number): number {
  let [low, high] = [0, 0.5];
  let [below, above] = [f(low), f(high)];
  if (below >= 0) return low;
  if (above <= 0) return high;
  let guess = low;
  while (high - low > 1e-15) {
    const middle = (low + high) / 2;
    const between = f(middle);
    const last = guess;
    guess = middle - ((middle - low) * between) / Math.sqrt(between * between - below * above);
    const value = f(guess);
    if (value === 0 || Math.abs(guess - last) <= 1e-15) return guess;
    if (between < 0) [low, below] = [middle, between];
    else [high, above] = [middle, between];
    if (value < 0 && guess > low) [low, below] = [guess, value];
    if (value > 0 && guess < high) [high, above] = [guess, value];
  }
  return guess;
}
