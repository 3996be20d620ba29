import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';
import { netCharges, undershoot } from '../observables/charge.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';
import type { EnergyWatch } from './energy-watch.ts';

/** Keeps the books of charge: what entered and left through the walls against what is in the gap, and what the supply gave
 *  against what capacitances and gap took. */
export class NumericsWatch implements Observer {
  readonly #system: GapSystem;
  readonly #energy: EnergyWatch;
  readonly #initialCharge: number;
  #supplied = 0;
  #stored = 0;
  #defect = 0;
  worstUndershoot = 0;

  constructor(system: GapSystem, energy: EnergyWatch, initial: Float64Array) {
    this.#system = system;
    this.#energy = energy;
    this.#initialCharge = ELEMENTARY_CHARGE * netCharges(system.grid, system.layout, system.equations.charges, initial);
  }

  look(step: Step): boolean {
    const { layout, grid, equations, circuit } = this.#system;
    const { y } = step.end;
    this.worstUndershoot = Math.max(this.worstUndershoot, undershoot(layout, y));
    if (!(step.end.time > step.start.time)) return false;
    const inGap = ELEMENTARY_CHARGE * netCharges(grid, layout, equations.charges, y) - this.#initialCharge;
    const walls = y[layout.leftWallCharge] - y[layout.rightWallCharge];
    const a = step.start.y;
    this.#supplied += y[layout.supplyCharge] - a[layout.supplyCharge];
    this.#stored +=
      circuit.parallelCapacitance * (y[layout.voltage] - a[layout.voltage]) + y[layout.terminalCharge] - a[layout.terminalCharge];
    this.#defect = Math.max(this.#defect, Math.abs(inGap - walls), Math.abs(this.#supplied - this.#stored));
    return false;
  }

  /** Largest defect relative to the charge passed; 0 where none passed. */
  chargeDefect(): number {
    return this.#energy.passed > 0 ? this.#defect / this.#energy.passed : 0;
  }
}
