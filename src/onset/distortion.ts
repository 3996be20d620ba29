import { cathodeDistortion } from '../observables/walls.ts';
import type { RunContext } from './context.ts';
import { highestOpenGapVoltage } from './highest-voltage.ts';

/** Field distortion at which space charge has set in. */
export const SPACE_CHARGE_DISTORTION = 0.1;

/** How far space charge has changed the cathode's field: relative to its Laplace value, or to the Laplace field at V_s/4 where that
 *  is larger (at a quarter of the largest |V_open| where no voltage sustains a discharge). */
export class Distortion {
  readonly #context: RunContext;
  readonly #floors: { readonly positive: number; readonly negative: number };

  constructor(context: RunContext) {
    this.#context = context;
    const { settings, threshold } = context;
    const floor = (breakdown: number | null): number => (breakdown ?? Math.abs(highestOpenGapVoltage(settings))) / 4 / settings.gap.spacing;
    this.#floors = { positive: floor(threshold.positive), negative: floor(threshold.negative) };
  }

  of(y: Float64Array): number {
    const { system, settings } = this.#context;
    const floor = y[system.layout.voltage] < 0 ? this.#floors.negative : this.#floors.positive;
    return cathodeDistortion(system.layout, settings.gap.spacing, floor, y);
  }
}
