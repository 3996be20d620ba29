import type { Case } from '../case.ts';
import { type CollisionTable, collisionTable } from './collision-table.ts';
import { crossSectionSets } from './sets.ts';

/** The collisions of electrons in the gas of a case: its built-in cross-sections at its density and temperature, scattering isotropic.
 *  @throws Error for a gas without built-in cross-sections */
export function collisionsOf({ gas }: Pick<Case, 'gas'>): CollisionTable {
  const set = gas.name === null ? undefined : crossSectionSets[gas.name];
  if (set === undefined) throw new Error(`no cross-sections for ${gas.name ?? 'a gas without name'}`);
  return collisionTable(set, { density: gas.density, temperature: gas.temperature }, 'isotropic');
}
