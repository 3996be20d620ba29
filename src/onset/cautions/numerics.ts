import { percent } from '../words.ts';
import type { Evidence, Raise } from './evidence.ts';

/** Tolerance above which times and currents may be several per cent off. */
const COARSE_TOLERANCE = 1e-2;
/** Cells that a cathode layer needs. */
const CATHODE_CELLS = 10;
/** Undershoot of a density while space charge matters, relative to its peak. At 1 % the open case at 100 % overvoltage is still
 *  right to 0.3 % against three times the cells. */
const UNDERSHOOT = 2e-2;

/** Where the numbers themselves may be off. */
export function ofNumerics({ settings, found }: Evidence, raise: Raise): void {
  const { tolerance } = settings.numerics;
  if (tolerance > COARSE_TOLERANCE) {
    raise(
      'tolerance',
      `A numerics.tolerance of ${tolerance} is coarse: times and currents may be several per cent off. The default is 1e-3.`,
      tolerance,
    );
  }
  if (found === null) return;
  if (found.layerCells !== null && found.layerCells < CATHODE_CELLS) {
    raise('cathode-cells', `The cathode layer was resolved by only ${found.layerCells} cells: raise numerics.cells.`, found.layerCells);
  }
  if (found.undershoot > UNDERSHOOT) {
    raise(
      'undershoot',
      `A density fell below zero by ${percent(found.undershoot)} of its peak at a steep front: raise numerics.cells or lower numerics.tolerance.`,
      found.undershoot,
    );
  }
}
