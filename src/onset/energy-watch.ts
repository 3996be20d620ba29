import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';

/** Nodes and weights of three-point Gauss–Legendre quadrature on [0, 1]: exact to degree 5. */
const NODES: readonly number[] = [0.5 - Math.sqrt(0.15), 0.5, 0.5 + Math.sqrt(0.15)];
const WEIGHTS: readonly number[] = [5 / 18, 8 / 18, 5 / 18];

/** ∫V dQ over a step for V and Q cubic in time (Hermite), V and Q given at both ends with their rates. Exact for the cubics.
 *
 *  The charges come from the integrated unknowns, not from sampled currents; so V dQ_s − V dQ = C V dV holds to rounding and the
 *  energy balance closes whatever the steps. */
export function voltTimesCharge(V0: number, V1: number, dV0: number, dV1: number, Q1: number, dQ0: number, dQ1: number, h: number): number {
  let sum = 0;
  for (let k = 0; k < 3; k++) {
    const s = NODES[k];
    const r = 1 - s;
    const V = r * r * ((1 + 2 * s) * V0 + s * h * dV0) + s * s * ((3 - 2 * s) * V1 - r * h * dV1);
    const dQ = 6 * s * r * Q1 + h * (r * (1 - 3 * s) * dQ0 + s * (3 * s - 2) * dQ1);
    sum += WEIGHTS[k] * V * dQ;
  }
  return sum;
}

/** Energies [J] since t = 0: into the gas, out of the source, into the series resistance; and the charge passed [C]. */
export class EnergyWatch implements Observer {
  readonly #system: GapSystem;
  gap = 0;
  source = 0;
  resistor = 0;
  /** ∫|I| dt + ∫|I_s| dt [C] */
  passed = 0;

  constructor(system: GapSystem) {
    this.#system = system;
  }

  look(step: Step): boolean {
    const { start: a, end: b } = step;
    const h = b.time - a.time;
    if (!(h > 0)) return false;
    const { layout, gapCapacitance, circuit } = this.#system;
    const V0 = a.y[layout.voltage];
    const V1 = b.y[layout.voltage];
    const supplied = b.y[layout.supplyCharge] - a.y[layout.supplyCharge];
    const conducted = b.y[layout.terminalCharge] - a.y[layout.terminalCharge] - gapCapacitance * (V1 - V0);
    this.gap += voltTimesCharge(V0, V1, a.voltageRate, b.voltageRate, conducted, a.current, b.current, h);
    this.passed += Math.abs(supplied) + Math.abs(conducted);
    if (circuit.feed === 'open') return false;
    // an ideal supply is the gap's voltage, any other is straight over a step
    const s0 = a.supplyVoltage;
    const s1 = b.supplyVoltage;
    const slope = (s1 - s0) / h;
    const ds0 = circuit.feed === 'ideal' ? a.voltageRate : slope;
    const ds1 = circuit.feed === 'ideal' ? b.voltageRate : slope;
    this.source += voltTimesCharge(s0, s1, ds0, ds1, supplied, a.supplyCurrent, b.supplyCurrent, h);
    this.resistor += voltTimesCharge(
      s0 - V0,
      s1 - V1,
      ds0 - a.voltageRate,
      ds1 - b.voltageRate,
      supplied,
      a.supplyCurrent,
      b.supplyCurrent,
      h,
    );
    return false;
  }
}
