import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';

/** Thickness of the cathode layer [m]: the least-squares line through the field's magnitude from the cathode to where it has
 *  fallen to half, extended to zero. Null where that lies beyond the gap or the field does not fall to half.
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
  let count = 0;
  let sx = 0;
  let sy = 0;
  let sxx = 0;
  let sxy = 0;
  const add = (x: number, e: number): void => {
    count++;
    sx += x;
    sy += e;
    sxx += x * x;
    sxy += x * e;
  };
  let half = false;
  for (let j = 0; j <= cells; j++) {
    const e = at(j);
    if (e <= wall / 2) {
      const previous = at(j - 1);
      const share = (previous - wall / 2) / (previous - e);
      add(position(j - 1) + share * (position(j) - position(j - 1)), wall / 2);
      half = true;
      break;
    }
    add(position(j), e);
  }
  if (!half || count < 2) return null;
  const slope = (count * sxy - sx * sy) / (count * sxx - sx * sx);
  if (!(slope < 0)) return null;
  const thickness = (sx - sy / slope) / count;
  if (!(thickness > 0 && thickness <= d)) return null;
  let within = 0;
  while (within < cells && position(within + 1) <= thickness) within++;
  return { thickness, cells: within };
}
