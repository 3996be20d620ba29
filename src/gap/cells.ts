import type { PlanarGap } from './geometry.ts';
import { type Grid, makeGrid } from './grid.ts';

/** Cells of a run that names no number. */
export const DEFAULT_CELLS = 140;

/** Share of all cells that crowd into the cathode's neighbourhood, over that of the rest. */
const CROWDING = 0.7;

/** The grid of a gap: cells crowd towards each wall that is a cathode at some time, over the thickness of a cathode layer.
 *  @param layer expected thickness of the cathode layer, about the distance at the Paschen minimum [m] */
export function cellsFor(gap: PlanarGap, cells: number | null, cathodes: { left: boolean; right: boolean }, layer: number): Grid {
  const d = gap.spacing;
  const length = Math.min(Math.max(layer, 0.005 * d), 0.5 * d);
  const left = cathodes.left || !cathodes.right;
  return makeGrid(gap, cells ?? DEFAULT_CELLS, { left, right: cathodes.right, length, ratio: 1 + CROWDING * (d / length) });
}
