import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';

/** Simulates one case: the only thing a search asks of the world. @throws SimulationFailure */
export type Simulate = (settings: Case) => Outcome;

/** Where to look for an answer, and how closely. */
export interface SearchRange {
  /** ends of the searched quantity, SI, 0 < from < to */
  readonly from: number;
  readonly to: number;
  /** relative width of the bracket at the end, > 0 */
  readonly tolerance: number;
}

/** What a run says about one value of the searched quantity. `holds` is the safe answer and `breaks-down` the unsafe one:
 *  for a trip delay, that the gap's energy stays below the limit or reaches it; for a series resistance, that the discharge
 *  does not or does sustain itself at the end. */
export type Answer = 'holds' | 'breaks-down' | 'undecided';

/** A stretch of the searched quantity between two neighbouring runs over which the answer changes. SI. */
export interface Change {
  readonly lower: number;
  readonly upper: number;
  /** the answer at `lower`; at `upper` it is another */
  readonly below: Answer;
  readonly above: Answer;
}

/** The `found` block of a scan's point; SI, unit beside it. */
export interface Found {
  readonly what: 'hold-off' | 'trip-delay' | 'series-resistance';
  /** `none-breaks-down`: nothing in the range breaks down; `none-holds`: nothing in it holds */
  readonly state: 'found' | 'none-breaks-down' | 'none-holds' | 'undecided';
  /** the safe end of the bracket; null unless found */
  readonly value: number | null;
  readonly unit: 'V' | 's' | 'ohm';
  /** the last bracket, each end a run that was made; an end is null where no run bounds the answer on that side */
  readonly lower: number | null;
  readonly upper: number | null;
  /** the closed form beside it; null where there is none */
  readonly theory: number | null;
  /** simulations made */
  readonly runs: number;
  /** every change of the answer that the coarse sweep met, rising; more than one: the answer is not monotone */
  readonly changes: readonly Change[];
  /** one sentence on what the state does not say: why it is undecided and what would decide it; null where there is nothing to add */
  readonly note: string | null;
}
