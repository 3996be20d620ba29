import type { CollisionTable } from './collision-table.ts';
import type { ForceField } from './flights.ts';

/** Energy [eV] below which an electron in each cell can never ionise: what it has and the most that the field can still give it fall short of the lowest
 *  ionisation threshold. Such an electron need not be followed: it drifts and diffuses as a slow one. Negative where the field can always give enough.
 *
 *  The field can give what lies between here and the highest potential that an electron reaches without flying over a barrier higher than its energy.
 *  Thermal motion, which could carry a slow electron over a barrier, is not counted: that is diffusion of slow electrons. */
export function slowBelow(table: CollisionTable, { faces, force }: ForceField): Float64Array {
  const cells = force.length;
  const threshold = table.kinds.reduce(
    (least, kind, p) => (kind === 'ionisation' ? Math.min(least, table.thresholds[p]) : least),
    Number.POSITIVE_INFINITY,
  );
  if (!Number.isFinite(threshold)) return new Float64Array(cells).fill(-1);
  const potential = new Float64Array(cells + 1);
  for (let i = 0; i < cells; i++) potential[i + 1] = potential[i] + force[i] * (faces[i + 1] - faces[i]);
  return Float64Array.from({ length: cells }, (_, cell) => {
    // the larger end of the cell: an electron that is taken for slow is slow wherever in the cell it is
    const here = Math.min(potential[cell], potential[cell + 1]);
    let best = -1;
    for (let k = 0; k <= BARRIERS; k++) {
      const energy = (threshold * k) / BARRIERS;
      const most = highestWithin(potential, cell, here - energy);
      if (energy + most - here < threshold) best = energy + Math.min(threshold / BARRIERS, threshold - (energy + most - here));
      else break;
    }
    return best;
  });
}

const BARRIERS = 16;

/** The highest potential on the way from a cell in either direction as long as it stays above a floor. */
function highestWithin(potential: Float64Array, cell: number, floor: number): number {
  let highest = Math.max(potential[cell], potential[cell + 1]);
  for (let f = cell + 2; f < potential.length && potential[f] >= floor; f++) highest = Math.max(highest, potential[f]);
  for (let f = cell - 1; f >= 0 && potential[f] >= floor; f--) highest = Math.max(highest, potential[f]);
  return highest;
}
