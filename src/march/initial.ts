import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';
import type { FastElectrons } from '../laws/fast-electrons.ts';

/** Share of the gap over which electrons released at t = 0 are spread, and the fewest cells. */
const SPREAD = 0.02;
const SPREAD_CELLS = 6;

/** What is released at t = 0. */
export interface Released {
  readonly electrons: number;
  readonly leftIsCathode: boolean;
  /** α in the field at t = 0+ [1/m] */
  readonly alpha: number;
}

/** The state at t = 0: electrons just released at the cathode as a smooth packet (cos² fading over the first cells), and a voltage.
 *
 *  A packet that starts inside the gap would miss the multiplication on its way there; so it starts as the same electrons are a
 *  moment after leaving the cathode: grown by e^{αx}, with the ions they have left behind. */
export function initialState(grid: Grid, layout: Layout, released: Released, voltage: number): Float64Array {
  const y = new Float64Array(layout.size);
  y[layout.voltage] = voltage;
  const { electrons, leftIsCathode, alpha } = released;
  if (!(electrons > 0)) return y;
  const d = grid.spacing;
  const n = grid.cells;
  const sixth = leftIsCathode ? grid.faces[SPREAD_CELLS] : d - grid.faces[n - SPREAD_CELLS];
  const reach = Math.max(SPREAD * d, sixth);
  // counted from the cathode
  const cell = (j: number): number => (leftIsCathode ? j : n - 1 - j);
  const distance = (j: number): number => (leftIsCathode ? grid.centres[j] : d - grid.centres[n - 1 - j]);
  let last = 0;
  let sum = 0;
  for (let j = 0; j < n && distance(j) < reach; j++) {
    last = j;
    sum += packet(distance(j) / reach) * grid.widths[cell(j)] * grid.area;
  }
  let beyond = 0; // electrons per area that have passed
  for (let j = last; j >= 0; j--) {
    const i = cell(j);
    const density = (packet(distance(j) / reach) * electrons) / sum;
    const growth = Math.exp(alpha * distance(j));
    y[layout.first + i] = density * growth;
    const passed = beyond + 0.5 * density * grid.widths[i];
    y[layout.row + layout.first + i] = alpha * growth * passed;
    beyond += density * grid.widths[i];
  }
  return y;
}

function packet(s: number): number {
  return Math.cos(0.5 * Math.PI * s) ** 2;
}

/** Adds electrons released at the cathode that are followed as particles: at once they have crossed the gap, and left the ions they made and what has become
 *  slow of them and theirs. */
export function releaseParticles(grid: Grid, layout: Layout, fast: FastElectrons, electrons: number, y: Float64Array): void {
  const { cells, first, row } = layout;
  const perArea = electrons / grid.area;
  for (let i = 0; i < cells; i++) {
    const carried = (fast.steady[i + 1] + fast.growing[i + 1] - fast.steady[i] - fast.growing[i]) / grid.widths[i];
    y[row + first + i] += perArea * fast.made[i];
    y[first + i] += perArea * (fast.made[i] - carried);
  }
}
