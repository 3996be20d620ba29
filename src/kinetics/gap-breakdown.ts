import type { CollisionTable } from './collision-table.ts';
import { gapYieldOf, particleFeedback, uniformGap } from './gap-yield.ts';
import type { Measured } from './statistics.ts';

/** A planar gap without space charge, for its breakdown voltage by particles. */
export interface ParticleGap {
  readonly table: CollisionTable;
  /** [m] */
  readonly distance: number;
  /** electrons emitted per ion that reaches the cathode, those that fall back included */
  readonly emission: number;
  /** [eV] */
  readonly emissionEnergy: number;
  /** electrons emitted at each voltage of the last steps */
  readonly particles: number;
  readonly seed: number;
  /** [V] between which it is looked for */
  readonly from: number;
  readonly to: number;
}

/** step of the search upwards; particles of it; steps of the refinement, in which a bracket of 20 % shrinks to well below the noise */
const STRIDE = 1.2;
const ROUGH = 1600;
const REFINEMENTS = 6;
const CLOSE = 1e-3;
const CELLS = 40;

/** The lowest voltage at which feedback by particles reaches 1 from below: emission × ions per emitted electron = 1 in the uniform field V/d.
 *
 *  Searched upwards in steps of 20 %, then by straight lines through ln q; every voltage with the same random numbers, so that q is smooth in V. Its error
 *  is that of ln q over the slope.
 *  @returns null where there is none between the ends, or q is above 1 at the lower one; and when interrupted */
export function particleBreakdown(gap: ParticleGap, interrupted: () => boolean = () => false): Measured | null {
  const logFeedback = (voltage: number, particles: number): Measured | null => {
    const { table, distance, emissionEnergy, seed } = gap;
    const found = gapYieldOf({ table, field: uniformGap(voltage, distance, CELLS), emissionEnergy, particles, seed }, interrupted);
    if (found === null) return null;
    const q = particleFeedback(found, gap.emission);
    return { value: q.value > 0 ? Math.log(q.value) : -50, error: q.value > 0 ? q.error / q.value : 1 };
  };
  let low = gap.from;
  let below = logFeedback(low, ROUGH);
  if (below === null || below.value >= 0) return null;
  let high = low;
  let above = below;
  while (above.value < 0) {
    [low, below] = [high, above];
    if (high >= gap.to) return null;
    high = Math.min(gap.to, high * STRIDE);
    const next = logFeedback(high, ROUGH);
    if (next === null) return null;
    above = next;
  }
  let best = high;
  let at = above;
  for (let k = 0; k < REFINEMENTS; k++) {
    const slope = (above.value - below.value) / (high - low);
    // inside of the bracket by a twentieth, so that it shrinks from both sides
    const margin = 0.05 * (high - low);
    best = Math.min(high - margin, Math.max(low + margin, low - below.value / slope));
    const next = logFeedback(best, gap.particles);
    if (next === null) return null;
    at = next;
    if (Math.abs(at.value) < 0.3 * at.error || high - low < CLOSE * best) break;
    if (at.value < 0) [low, below] = [best, at];
    else [high, above] = [best, at];
  }
  const slope = (above.value - below.value) / (high - low);
  return { value: best - at.value / slope, error: at.error / Math.abs(slope) };
}
