/** The growth rate of the discrete equations themselves: no time step, no fit. */
import type { Case } from '../../src/case.ts';
import type { Grid } from '../../src/gap/grid.ts';
import { systemOf } from './rig.ts';

/** The eigenvalue nearest to `guess` [1/s] of the equations of a case linearised about the empty gap at its voltage, by inverse
 *  iteration with the program's own (a − J)⁻¹. The case must have no seed and an ideal supply. */
export function discreteGrowthRate(settings: Case, guess: number, grid?: Grid): number {
  const { system, initial } = systemOf(settings, grid);
  const { layout } = system;
  const rates = new Float64Array(layout.size);
  system.linearise(0, initial, rates);
  const shift = guess * 1.003 + 1;
  if (system.factor(initial, shift) >= 0) throw new Error('discrete growth rate: no factorisation');
  let r = new Float64Array(layout.size);
  for (let i = 0; i < layout.cells; i++) r[layout.first + i] = r[layout.row + layout.first + i] = 1;
  let rate = Number.NaN;
  for (let k = 0; k < 200; k++) {
    system.settle(r);
    const U = new Float64Array(layout.size);
    system.solve(r, U);
    let dot = 0;
    let square = 0;
    // densities only: field and charges follow them
    for (let i = 0; i < layout.leftField; i++) {
      dot += U[i] * r[i];
      square += U[i] * U[i];
    }
    const next = shift - dot / square;
    const size = Math.sqrt(square);
    r = U.map((v) => v / size);
    r[layout.voltage] = 0;
    if (Math.abs(next - rate) < 1e-13 * Math.abs(next)) return next;
    rate = next;
  }
  throw new Error('discrete growth rate: no convergence');
}
