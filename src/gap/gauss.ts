import { ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY } from '../units/constants.ts';
import type { Grid } from './grid.ts';
import type { Layout } from './layout.ts';

/** Gauss's law over the cells: E(f+1) − E(f) = (e/ε0) Σ q n Δx. */
export interface Gauss {
  /** E at all faces of y from its densities and its E(0). */
  fillField(y: Float64Array): void;
  /** E(0) and E at all faces of y from its densities and voltage, so that Σ weights·E = −V. */
  settle(y: Float64Array): void;
  /** Σ weights·E of densities and E(0) in y, without storing E. */
  integral(y: Float64Array): number;
}

export function gaussOf(grid: Grid, layout: Layout, charges: readonly number[]): Gauss {
  const { cells, field, leftField, row, first } = layout;
  const { widths, faceWeights } = grid;
  const c = ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY;
  const negative = charges.length > 2 ? 2 * row + first : -1;

  const fillField = (y: Float64Array): void => {
    let e = y[leftField];
    y[field] = e;
    for (let i = 0; i < cells; i++) {
      let rho = y[row + first + i] - y[first + i];
      if (negative >= 0) rho -= y[negative + i];
      e += c * widths[i] * rho;
      y[field + i + 1] = e;
    }
  };
  const integral = (y: Float64Array): number => {
    let e = y[leftField];
    let sum = faceWeights[0] * e;
    for (let i = 0; i < cells; i++) {
      let rho = y[row + first + i] - y[first + i];
      if (negative >= 0) rho -= y[negative + i];
      e += c * widths[i] * rho;
      sum += faceWeights[i + 1] * e;
    }
    return sum;
  };
  return {
    fillField,
    integral,
    settle(y) {
      y[leftField] = 0;
      y[leftField] = -(y[layout.voltage] + integral(y)) / grid.spacing;
      fillField(y);
    },
  };
}
