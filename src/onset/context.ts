import type { Case } from '../case.ts';
import type { GapSystem } from '../march/gap-system.ts';
import type { March } from '../march/march.ts';
import type { Scales } from './scales.ts';

/** What every part of the onset analysis needs to know of a run. */
export interface RunContext extends Scales {
  readonly settings: Case;
  readonly system: GapSystem;
  /** the march, once it exists */
  readonly march: () => March;
}

/** V_s for the polarity of a voltage. */
export function thresholdFor(context: RunContext, voltage: number): number | null {
  return voltage < 0 ? context.threshold.negative : context.threshold.positive;
}

/** Field [V/m] below which distortion is taken relative to it: the Laplace field at V_s/4. */
export function distortionFloor(context: RunContext, voltage: number): number {
  return (thresholdFor(context, voltage) ?? context.largestVoltage) / 4 / context.settings.gap.spacing;
}
