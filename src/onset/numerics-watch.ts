import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';
import { densityRange, netCharges } from '../observables/charge.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';
import type { Distortion } from './distortion.ts';
import type { EnergyWatch } from './energy-watch.ts';

/** Field distortion from which on a density below zero can do harm: before, the equations are linear and only shift it. */
const SPACE_CHARGE_MATTERS = 0.01;

/** Keeps the books of charge: what entered and left through the walls against what is in the gap, and what the supply gave
 *  against what capacitances and gap took. */
export class NumericsWatch implements Observer {
  readonly #system: GapSystem;
  readonly #energy: EnergyWatch;
  readonly #distortion: Distortion;
  readonly #initialCharge: number;
  #supplied = 0;
  #stored = 0;
  #defect = 0;
  /** largest density of each species so far [1/m³] */
  readonly #peaks: Float64Array;
  /** most negative density over the largest its species has had by then, as a positive number */
  worstUndershoot = 0;
  /** the same while space charge matters */
  worstInDischarge = 0;

  constructor(system: GapSystem, energy: EnergyWatch, distortion: Distortion, initial: Float64Array) {
    this.#system = system;
    this.#energy = energy;
    this.#distortion = distortion;
    this.#peaks = new Float64Array(system.layout.species);
    this.#initialCharge = ELEMENTARY_CHARGE * netCharges(system.grid, system.layout, system.equations.charges, initial);
  }

  look(step: Step): boolean {
    const { layout, grid, equations, circuit } = this.#system;
    const { y } = step.end;
    this.#lookForUndershoot(y);
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

  #lookForUndershoot(y: Float64Array): void {
    const { layout } = this.#system;
    let worst = 0;
    for (let k = 0; k < layout.species; k++) {
      const { least, most } = densityRange(layout, k, y);
      this.#peaks[k] = Math.max(this.#peaks[k], most);
      if (least < 0 && this.#peaks[k] > 0) worst = Math.max(worst, -least / this.#peaks[k]);
    }
    this.worstUndershoot = Math.max(this.worstUndershoot, worst);
    if (worst > this.worstInDischarge && this.#distortion.of(y) > SPACE_CHARGE_MATTERS) this.worstInDischarge = worst;
  }

  /** Largest defect relative to the charge passed; 0 where none passed. */
  chargeDefect(): number {
    return this.#energy.passed > 0 ? this.#defect / this.#energy.passed : 0;
  }
}
