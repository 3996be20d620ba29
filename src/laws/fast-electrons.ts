import type { Grid } from '../gap/grid.ts';

/** What the fast electrons of one emitted by the cathode do in a given field, by cells of the grid: ions made and electrons that become slow. All per
 *  electron emitted; x runs from the left wall whichever wall is the cathode. */
export interface FastProfile {
  readonly cathodeIsLeft: boolean;
  readonly ions: Float64Array;
  readonly slow: Float64Array;
  /** electrons that fall back on the cathode */
  readonly returned: number;
  /** the gap voltage and the field at the cathode that it was found for, magnitudes [V], [V/m] */
  readonly voltage: number;
  readonly cathodeField: number;
  /** d ln(ions)/d ln V at the same field at the cathode, and d ln(ions)/d ln E_cathode at the same voltage */
  readonly byVoltage: number;
  readonly byField: number;
}

/** Fast electrons as a source in the gap's equations.
 *
 *  Electrons that the cathode emits, P a second and square metre, and all they make cross the gap in a time that nothing else changes in. So they have no
 *  density of their own, only a flux: it enters at the cathode, less what falls back there, grows by the ions made and shrinks by what becomes slow, and
 *  what is left goes into the anode. Ions made and electrons become slow are sources of the fluid. Charge is conserved whatever the numbers are, because
 *  the flux is the sum of the sources.
 *
 *  Between two looks at the particles the number of ions follows the voltage and the field at the cathode by the exponents of the profile,
 *  φ = (V/V₀)^a (E_c/E₀)^b; the electrons that become slow share the change.
 *
 *  Γ(f) = P (a(f) + φ b(f)), ions made in cell i: P φ s(i). Nothing is allocated after construction.
 *  Source of the method: J.-P. Boeuf and L. C. Pitchford, IEEE Trans. Plasma Sci. 19, 286, 1991; A. Fiala, L. C. Pitchford and J.-P. Boeuf, Phys. Rev. E 49,
 *  5607, 1994 (from memory, M): the idea, not its details. */
export class FastElectrons {
  readonly #grid: Grid;
  /** flux through faces along +x per electron emitted: the part that does not change with φ, and the part that is multiplied by it */
  readonly steady: Float64Array;
  readonly growing: Float64Array;
  /** ions made per metre in each cell per electron emitted */
  readonly made: Float64Array;
  cathodeIsLeft = true;
  #voltage = 0;
  #field = 0;
  byVoltage = 0;
  byField = 0;

  constructor(grid: Grid) {
    this.#grid = grid;
    this.steady = new Float64Array(grid.cells + 1);
    this.growing = new Float64Array(grid.cells + 1);
    this.made = new Float64Array(grid.cells);
  }

  /** Takes over what particles found. */
  set(profile: FastProfile): void {
    const { cells, widths } = this.#grid;
    const { ions, slow, cathodeIsLeft } = profile;
    this.cathodeIsLeft = cathodeIsLeft;
    this.#voltage = profile.voltage;
    this.#field = profile.cathodeField;
    const escaped = 1 - profile.returned;
    let total = 0;
    for (let i = 0; i < cells; i++) total += ions[i];
    this.byVoltage = total > 0 ? profile.byVoltage : 0;
    this.byField = total > 0 ? profile.byField : 0;
    const all = escaped + total;
    // of electrons that become slow, the share that were emitted and the share that were made
    const [emitted, made] = all > 0 ? [escaped / all, total / all] : [1, 0];
    const sign = cathodeIsLeft ? 1 : -1;
    let sumIons = 0;
    let sumSlow = 0;
    for (let k = 0; k <= cells; k++) {
      const f = cathodeIsLeft ? k : cells - k;
      this.steady[f] = sign * (escaped - emitted * sumSlow);
      this.growing[f] = sign * (sumIons - made * sumSlow);
      if (k === cells) break;
      const i = cathodeIsLeft ? k : cells - 1 - k;
      sumIons += ions[i];
      sumSlow += slow[i];
      this.made[i] = ions[i] / widths[i];
    }
  }

  /** φ at a gap voltage [V] and a field at the cathode [V/m], magnitudes. */
  growth(voltage: number, field: number): number {
    if (!this.#follows) return 1;
    const log =
      this.byVoltage * Math.log(Math.max(voltage, FLOOR * this.#voltage) / this.#voltage) +
      this.byField * Math.log(Math.max(field, FLOOR * this.#field) / this.#field);
    return Math.exp(Math.min(LARGEST, Math.max(-LARGEST, log)));
  }

  /** dφ/d|V| [1/V] */
  growthByVoltage(voltage: number, field: number): number {
    return this.#follows && voltage > FLOOR * this.#voltage ? (this.growth(voltage, field) * this.byVoltage) / voltage : 0;
  }

  /** dφ/d|E_cathode| [m/V] */
  growthByField(voltage: number, field: number): number {
    return this.#follows && field > FLOOR * this.#field ? (this.growth(voltage, field) * this.byField) / field : 0;
  }

  get #follows(): boolean {
    return (this.byVoltage !== 0 || this.byField !== 0) && this.#voltage > 0 && this.#field > 0;
  }
}

/** a voltage or field below this share of what the profile was found for counts as this share: particles are asked again long before */
const FLOOR = 0.2;
const LARGEST = 3;
