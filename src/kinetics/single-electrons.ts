import { avalancheSizes } from './avalanches.ts';
import type { NodeGap } from './gap-response.ts';
import { uniformGap } from './gap-yield.ts';
import { seedChanceOf } from './seed-chance.ts';
import type { Measured } from './statistics.ts';

/** What becomes of single electrons from the cathode of a gap without space charge. */
export interface SingleElectrons {
  /** that one leads to breakdown */
  readonly breakdown: Measured;
  /** that one makes no ion */
  readonly silent: Measured;
}

/** followed one by one */
const ELECTRONS = 1000;

/** @param voltage   [V], above 0
 *  @param emission  electrons freed per ion, above 0 and at most 1 */
export function singleElectrons({ table, distance, emissionEnergy, seed }: NodeGap, voltage: number, emission: number): SingleElectrons {
  const request = { table, field: uniformGap(voltage, distance, 1), emissionEnergy, electrons: ELECTRONS, seed };
  const found = seedChanceOf(request, emission);
  if (found === null) throw new Error('interrupted');
  return { breakdown: found.chance.probability, silent: avalancheSizes(found.avalanches, 0).shares[0] };
}
