import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';

/** Thickness of the cathode layer [m]: the least-squares line through the field's magnitude from the cathode to where it has
 *  fallen to half, extended to zero. Null where that lies beyond the gap or the field does not fall to half.
 *
 *  The field is taken as straight between faces and every length counts alike, so that the grid does not matter.
 *  `cells` counts the cells within it. */
export function cathodeLayer(grid: Grid, layout: Layout, y: Float64Array): { thickness: number; cells: number } | null {
  const { cells, field } = layout;
  const leftIsCathode = y[layout.voltage] >= 0;
  const d = grid.spacing;
  const sign = leftIsCathode ? -1 : 1;
  const at = (j: number): number => sign * y[field + (leftIsCathode ? j : cells - j)];
  const position = (j: number): number => (leftIsCathode ? grid.faces[j] : d - grid.faces[cells - j]);
  const wall = at(0);
  if (!(wall > 0)) return null;
  // ∫E dx and ∫xE dx up to where the field is half
  let area = 0;
  let moment = 0;
  let half: number | null = null;
  for (let j = 0; j < cells && half === null; j++) {
    const x = position(j);
    const e = at(j);
    let width = position(j + 1) - x;
    let next = at(j + 1);
    if (next <= wall / 2) {
      width *= (e - wall / 2) / (e - next);
      next = wall / 2;
      half = x + width;
    }
    area += 0.5 * width * (e + next);
    moment += width * (0.5 * x * (e + next) + (width * (e + 2 * next)) / 6);
  }
  if (half === null) return null;
  // line through the mean field at half/2 with the slope of least squares
  const slope = (12 * (moment - 0.5 * half * area)) / half ** 3;
  const thickness = 0.5 * half - area / half / slope;
  if (!(slope < 0 && thickness > 0 && thickness <= d)) return null;
  let within = 0;
  while (within < cells && position(within + 1) <= thickness) within++;
  return { thickness, cells: within };
}
