import type { Layout } from '../gap/layout.ts';
import type { FaceValues } from '../laws/gap-equations.ts';

/** Field at the wall that is the cathode at the gap voltage of y, positive when it draws electrons off [V/m]. */
export function cathodeField(layout: Layout, y: Float64Array): number {
  return y[layout.voltage] >= 0 ? -y[layout.field] : y[layout.field + layout.cells];
}

/** How far space charge has changed the cathode's field, relative to the larger of its Laplace value |V|/d and a floor.
 *  @param floor [V/m] */
export function cathodeDistortion(layout: Layout, spacing: number, floor: number, y: Float64Array): number {
  const laplace = Math.abs(y[layout.voltage]) / spacing;
  return Math.abs(cathodeField(layout, y) - laplace) / Math.max(laplace, floor);
}

/** Share of the seed in what the cathode emits, 0 … 1; 1 when it emits nothing. */
export function seedShare(values: FaceValues, leftIsCathode: boolean, cells: number): number {
  const seed = leftIsCathode ? values.seedLeft : values.seedRight;
  const ions = leftIsCathode ? -values.flux[1][0] * values.emissionLeft : values.flux[1][cells] * values.emissionRight;
  const all = seed + Math.max(0, ions);
  return all > 0 ? seed / all : 1;
}
