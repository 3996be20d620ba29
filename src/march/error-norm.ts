import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';

/** How large a step's error is: 1 where it is just acceptable.
 *
 *  The root mean square over the gap of each species' relative error, the density that it is relative to being |n| plus a share of the mean |n|
 *  (a cell that holds a thousandth of the rest need not be right to a thousandth of itself), plus what the seed alone would
 *  keep in the gap; and the relative error of the voltage. The seed's share makes the first electrons' run across the empty
 *  gap count for what it is worth; it is proportional to the seed, so nothing here sets an absolute density. */
export interface ErrorScale {
  readonly tolerance: number;
  /** densities the seed alone would keep, one a species [1/m³] */
  readonly seedDensities: readonly number[];
  /** below this the voltage's error is taken relative to it [V] */
  readonly smallVoltage: number;
}

/** Share of the mean density in the weight; a choice that gave the least work at equal accuracy on steps to a glow. */
const MEAN_SHARE = 0.3;

export function errorNorm(grid: Grid, layout: Layout, scale: ErrorScale, y: Float64Array, error: Float64Array): number {
  let worst = Math.abs(error[layout.voltage]) / Math.max(Math.abs(y[layout.voltage]), scale.smallVoltage);
  for (let k = 0; k < layout.species; k++) {
    worst = Math.max(worst, speciesNorm(grid.widths, k * layout.row + layout.first, scale.seedDensities[k], grid.spacing, y, error));
  }
  return Number.isNaN(worst) ? Infinity : worst / scale.tolerance;
}

function speciesNorm(
  widths: Float64Array,
  base: number,
  seedDensity: number,
  spacing: number,
  y: Float64Array,
  error: Float64Array,
): number {
  let mean = 0;
  for (let i = 0; i < widths.length; i++) mean += widths[i] * Math.abs(y[base + i]);
  const floor = MEAN_SHARE * (mean / spacing) + seedDensity;
  let sum = 0;
  for (let i = 0; i < widths.length; i++) {
    const r = error[base + i] / (Math.abs(y[base + i]) + floor);
    sum += widths[i] * r * r;
  }
  const norm = Math.sqrt(sum / spacing);
  return Number.isNaN(norm) ? Infinity : norm;
}
