import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';

/** Charge carriers of either sign in the gap, Σ n A Δx over all species (a number, not a charge). */
export function carriers(grid: Grid, layout: Layout, y: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < layout.species; k++) {
    const base = k * layout.row + layout.first;
    for (let i = 0; i < layout.cells; i++) sum += grid.widths[i] * y[base + i];
  }
  return sum * grid.area;
}

/** Σ q n A Δx, the net number of positive elementary charges in the gap. */
export function netCharges(grid: Grid, layout: Layout, charges: readonly number[], y: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < layout.species; k++) {
    const base = k * layout.row + layout.first;
    let s = 0;
    for (let i = 0; i < layout.cells; i++) s += grid.widths[i] * y[base + i];
    sum += charges[k] * s;
  }
  return sum * grid.area;
}

/** The least and the largest density of one species [1/m³]. */
export function densityRange(layout: Layout, species: number, y: Float64Array): { least: number; most: number } {
  const base = species * layout.row + layout.first;
  let least = Infinity;
  let most = -Infinity;
  for (let i = 0; i < layout.cells; i++) {
    const n = y[base + i];
    if (n < least) least = n;
    if (n > most) most = n;
  }
  return { least, most };
}
