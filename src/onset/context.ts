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

/** V_s for the polarity of a voltage [V]; null where no voltage sustains a discharge. */
export function thresholdFor(context: RunContext, voltage: number): number | null {
  return voltage < 0 ? context.threshold.negative : context.threshold.positive;
}
