import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';

/** Share of the gap over which electrons released at t = 0 are spread, and the fewest cells. */
const SPREAD = 0.02;
const SPREAD_CELLS = 6;

/** The state at t = 0: electrons just released at the cathode as a smooth packet (cos² fading over the first cells), and a voltage. */
export function initialState(grid: Grid, layout: Layout, electrons: number, leftIsCathode: boolean, voltage: number): Float64Array {
  const y = new Float64Array(layout.size);
  y[layout.voltage] = voltage;
  if (!(electrons > 0)) return y;
  const d = grid.spacing;
  const n = grid.cells;
  const sixth = leftIsCathode ? grid.faces[SPREAD_CELLS] : d - grid.faces[n - SPREAD_CELLS];
  const reach = Math.max(SPREAD * d, sixth);
  let sum = 0;
  for (let i = 0; i < n; i++) {
    const x = leftIsCathode ? grid.centres[i] : d - grid.centres[i];
    if (x >= reach) continue;
    const weight = Math.cos((0.5 * Math.PI * x) / reach) ** 2;
    y[layout.first + i] = weight;
    sum += weight * grid.widths[i] * grid.area;
  }
  for (let i = 0; i < n; i++) y[layout.first + i] *= electrons / sum;
  return y;
}
