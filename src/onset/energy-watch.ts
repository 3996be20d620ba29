import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';

/** ∫ Lᵢ L′ⱼ dθ of the cubics Lᵢ that are 1 at θ = i/3 and 0 at the other thirds of [0, 1] (computed exactly). */
const WEIGHTS: readonly (readonly number[])[] = [
  [-1 / 2, 57 / 80, -3 / 10, 7 / 80],
  [-57 / 80, 0, 81 / 80, -3 / 10],
  [3 / 10, -81 / 80, 0, 57 / 80],
  [-7 / 80, 3 / 10, -57 / 80, 1 / 2],
];

/** ∫V dQ of two cubics in time given at the thirds of a step; exact. */
export function voltTimesCharge(V: Float64Array, Q: Float64Array): number {
  let sum = 0;
  // differences of Q, so that a charge counted over a long run loses nothing
  for (let i = 0; i < 4; i++) for (let j = 1; j < 4; j++) sum += V[i] * WEIGHTS[i][j] * (Q[j] - Q[0]);
  return sum;
}

/** Energies [J] since t = 0: into the gas, out of the source, into the series resistance; and the charge passed [C].
 *
 *  Voltages and charges are unknowns of the equations, so their dense output, cubic in time, obeys every linear law of the circuit
 *  to rounding: dQ_s = dQ + C dV. The integrals of those cubics are exact, and the balance of energy closes whatever the steps.
 *  (Their rates at the ends of a step must not enter: behind a small capacitance dV/dt is a small difference of large currents,
 *  and times a long step worth nothing.) */
export class EnergyWatch implements Observer {
  readonly #system: GapSystem;
  readonly #gapVoltage: Float64Array = new Float64Array(4);
  readonly #supplyVoltage: Float64Array = new Float64Array(4);
  readonly #drop: Float64Array = new Float64Array(4);
  readonly #conducted: Float64Array = new Float64Array(4);
  readonly #supplied: Float64Array = new Float64Array(4);
  gap = 0;
  source = 0;
  resistor = 0;
  /** ∫|I| dt + ∫|I_s| dt [C] */
  passed = 0;

  constructor(system: GapSystem) {
    this.#system = system;
  }

  look(step: Step): boolean {
    const { start, end } = step;
    const h = end.time - start.time;
    if (!(h > 0)) return false;
    const { circuit } = this.#system;
    this.#take(0, step, start.time, start.supplyVoltage);
    for (const i of [1, 2]) {
      // an ideal supply is the gap's voltage, any other is straight over a step
      this.#take(i, step, start.time + (i / 3) * h, start.supplyVoltage + (i / 3) * (end.supplyVoltage - start.supplyVoltage));
    }
    this.#take(3, step, end.time, end.supplyVoltage);
    this.gap += voltTimesCharge(this.#gapVoltage, this.#conducted);
    this.passed += Math.abs(this.#supplied[3] - this.#supplied[0]) + Math.abs(this.#conducted[3] - this.#conducted[0]);
    if (circuit.feed === 'open') return false;
    this.source += voltTimesCharge(this.#supplyVoltage, this.#supplied);
    this.resistor += voltTimesCharge(this.#drop, this.#supplied);
    return false;
  }

  #take(i: number, step: Step, t: number, supplyVoltage: number): void {
    const { layout, gapCapacitance, circuit } = this.#system;
    const V = step.unknownAt(t, layout.voltage);
    const supply = circuit.feed === 'ideal' ? V : supplyVoltage;
    this.#gapVoltage[i] = V;
    this.#supplyVoltage[i] = supply;
    this.#drop[i] = supply - V;
    this.#conducted[i] = step.unknownAt(t, layout.terminalCharge) - gapCapacitance * V;
    this.#supplied[i] = step.unknownAt(t, layout.supplyCharge);
  }
}
