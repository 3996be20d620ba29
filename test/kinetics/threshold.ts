/** The threshold of a gap by the parts that a case uses for it, with its error. */
import { coarseThreshold, GapResponse, type NodeGap, passes } from '../../src/kinetics/gap-response.ts';
import type { Measured } from '../../src/kinetics/statistics.ts';

/** @param particles  electrons for one answer
 *  @param from       and `to`: between which it is looked for [V] */
export function thresholdOf(gap: NodeGap, emission: number, particles: number, from: number, to: number): Measured | null {
  const { rise } = coarseThreshold(gap, () => emission, from, to, Number.POSITIVE_INFINITY);
  const response = new GapResponse({ ...gap, particles, reference: () => 1, attention: { from, to } });
  const value = passes((voltage) => emission * response.ionsAt(voltage), rise);
  if (value === null) return null;
  const { ionsPerElectron: ions } = response.at(value);
  const slope = Math.log(response.ionsAt(1.02 * value) / response.ionsAt(0.98 * value)) / (0.04 * value);
  return { value, error: ions.error / ions.value / Math.abs(slope) };
}
