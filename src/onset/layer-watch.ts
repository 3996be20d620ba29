import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';
import { cathodeLayer } from '../observables/cathode-layer.ts';
import { cathodeField } from '../observables/walls.ts';
import type { SustainWatch } from './sustain-watch.ts';

/** Follows the strongest field at the cathode and how well the layer in front of it is resolved. */
export class LayerWatch implements Observer {
  readonly #system: GapSystem;
  readonly #sustain: SustainWatch;
  /** magnitude [V/m] */
  largestField = 0;
  /** fewest cells in the layer of a discharge that sustains itself; null where there was none */
  fewestCells: number | null = null;

  /** @param sustain looks before this one */
  constructor(system: GapSystem, sustain: SustainWatch) {
    this.#system = system;
    this.#sustain = sustain;
  }

  look(step: Step): boolean {
    const { layout, grid } = this.#system;
    const { y } = step.end;
    this.largestField = Math.max(this.largestField, Math.abs(cathodeField(layout, y)));
    if (!(this.#sustain.selfSustaining && this.#sustain.distorted)) return false;
    const cells = cathodeLayer(grid, layout, y)?.cells ?? null;
    if (cells !== null && cells < (this.fewestCells ?? Infinity)) this.fewestCells = cells;
    return false;
  }
}
