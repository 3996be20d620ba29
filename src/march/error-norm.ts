import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';

/** What the error of a step is measured against. */
export interface ErrorScale {
  readonly tolerance: number;
  /** densities the seed current alone would keep in the gap, one a species [1/m³] */
  readonly seedDensities: readonly number[];
  /** drift speeds in a typical field [m/s], one a species */
  readonly speeds: readonly number[];
  /** below this the voltage's error is taken relative to it [V] */
  readonly smallVoltage: number;
}

/** Share of the mean density in the weight; a choice that gave the least work at equal accuracy on steps to a glow. */
const MEAN_SHARE = 0.3;
/** Share of the density at which a species would carry the mean flux of all. */
const FLUX_SHARE = 0.1;

/** How large a step's error is: 1 where it is just acceptable.
 *
 *  The root mean square over the gap of each species' relative error, and the relative error of the voltage. A density is weighed by
 *  |n| plus a share of the species' mean (a cell that holds a thousandth of the rest need not be right to a thousandth of itself),
 *  plus a share of the density at which it would carry the mean flux of all species (ions that few electrons have begun to
 *  make, electrons behind a cloud of ions), plus what the seed current would keep. All of these scale with what is in the gap or with
 *  the seed: nothing sets an absolute density, and a discharge that dies away is followed down to the seed. */
export function errorNorm(grid: Grid, layout: Layout, scale: ErrorScale, y: Float64Array, error: Float64Array): number {
  let worst = Math.abs(error[layout.voltage]) / Math.max(Math.abs(y[layout.voltage]), scale.smallVoltage);
  const perSpacing = 1 / grid.spacing;
  let flux = 0;
  for (let k = 0; k < layout.species; k++) {
    flux += scale.speeds[k] * perSpacing * absoluteIntegral(grid.widths, k * layout.row + layout.first, y);
  }
  for (let k = 0; k < layout.species; k++) {
    const base = k * layout.row + layout.first;
    const mean = perSpacing * absoluteIntegral(grid.widths, base, y);
    const floor = MEAN_SHARE * mean + (FLUX_SHARE * flux) / scale.speeds[k] + scale.seedDensities[k];
    if (floor > 0) worst = Math.max(worst, relativeError(grid.widths, base, floor, y, error) * Math.sqrt(perSpacing));
  }
  return Number.isNaN(worst) ? Infinity : worst / scale.tolerance;
}

/** ∫|n| dx [1/m²] */
function absoluteIntegral(widths: Float64Array, base: number, y: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < widths.length; i++) sum += widths[i] * Math.abs(y[base + i]);
  return sum;
}

/** (∫(error/(|n| + floor))² dx)^½ [m^½] */
function relativeError(widths: Float64Array, base: number, floor: number, y: Float64Array, error: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < widths.length; i++) {
    const r = error[base + i] / (Math.abs(y[base + i]) + floor);
    sum += widths[i] * r * r;
  }
  // NaN would lose a comparison and pass for a small error
  return Number.isNaN(sum) ? Infinity : Math.sqrt(sum);
}
