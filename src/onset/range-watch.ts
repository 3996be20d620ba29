import type { GasCoefficients } from '../gases/gas.ts';
import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';

const IONS: ReadonlySet<string> = new Set(['ionMobility', 'ionEnergy']);

/** How much of the ionisation of a run was made at fields outside the validity of each coefficient. */
export class RangeWatch implements Observer {
  readonly #system: GapSystem;
  readonly #names: readonly string[];
  readonly #from: Float64Array;
  readonly #to: Float64Array;
  readonly #outside: Float64Array;
  #made = 0;

  constructor(system: GapSystem, coefficients: GasCoefficients) {
    this.#system = system;
    // electrons that ionise as particles use none of the electrons' coefficients
    const used =
      system.equations.fast === null ? Object.entries(coefficients) : Object.entries(coefficients).filter(([name]) => IONS.has(name));
    const ranged = used.flatMap(([name, c]) => (c?.range ? [{ name, range: c.range }] : []));
    this.#names = ranged.map((r) => r.name);
    this.#from = Float64Array.from(ranged, (r) => r.range.from * (1 - 1e-9));
    this.#to = Float64Array.from(ranged, (r) => r.range.to * (1 + 1e-9));
    this.#outside = new Float64Array(ranged.length);
  }

  look(step: Step): boolean {
    const span = step.end.time - step.start.time;
    if (!(span > 0)) return false;
    const { at, fast } = this.#system.equations;
    const { faceWeights, cells } = this.#system.grid;
    const electrons = at.flux[0];
    for (let f = 0; f <= cells; f++) {
      const rate = fast === null ? at.alpha[f] * Math.abs(electrons[f]) : at.emitted * at.growth * fast.made[Math.min(f, cells - 1)];
      const made = rate * faceWeights[f] * span;
      if (!(made > 0)) continue;
      this.#made += made;
      const x = at.reducedField[f];
      for (let k = 0; k < this.#outside.length; k++) if (x < this.#from[k] || x > this.#to[k]) this.#outside[k] += made;
    }
    return false;
  }

  /** Coefficients used outside their range, with the share of all ionisation made there, 0 … 1; the largest first. */
  shares(): { name: string; share: number }[] {
    return this.#names
      .map((name, k) => ({ name, share: this.#made > 0 ? this.#outside[k] / this.#made : 0 }))
      .filter((r) => r.share > 0)
      .sort((a, b) => b.share - a.share);
  }
}
