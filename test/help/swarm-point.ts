/** A swarm by the engine alone: a pilot and batches one after the other. */
import type { CrossSectionSet } from '../../src/kinetics/cross-sections.ts';
import { batchOf, combine, pilotOf, type SwarmPoint, swarmGas } from '../../src/kinetics/swarm.ts';

/** @param temperature  [K]
 *  @param td           E/N [Td] */
export function swarmPoint(set: CrossSectionSet, temperature: number, td: number, batches: number, flights: number): SwarmPoint {
  const gas = swarmGas(set, temperature, 'isotropic');
  const field = td * 1e-21;
  const plan = pilotOf(gas, field, 1, 0, flights);
  if (plan.kind !== 'plan') throw new Error(plan.kind);
  const sums = Array.from({ length: batches }, (_, batch) => batchOf(gas, field, plan, 1, 0, batch)).filter((batch) => batch !== null);
  return combine(gas, field, plan, sums);
}
