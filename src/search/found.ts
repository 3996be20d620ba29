import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';

/** Simulates one case: the only thing a search asks of the world. @throws SimulationFailure */
export type Simulate = (settings: Case) => Outcome;

/** A stretch of the searched quantity between two neighbouring runs over which the answer changes. SI. */
export interface Change {
  readonly lower: number;
  readonly upper: number;
  /** the answer at `lower`; at `upper` it is another */
  readonly below: 'holds' | 'breaks-down' | 'undecided';
  readonly above: 'holds' | 'breaks-down' | 'undecided';
}

/** The `found` block of a scan's point; SI, unit beside it. */
export interface Found {
  readonly what: 'hold-off' | 'trip-delay' | 'series-resistance';
  /** `none-breaks-down`: nothing in the range breaks down; `none-holds`: nothing in it holds */
  readonly state: 'found' | 'none-breaks-down' | 'none-holds' | 'undecided';
  /** the safe end of the bracket; null unless found */
  readonly value: number | null;
  readonly unit: 'V' | 's' | 'ohm';
  /** the last bracket; null when there is none */
  readonly lower: number | null;
  readonly upper: number | null;
  /** the closed form beside it; null where there is none */
  readonly theory: number | null;
  /** simulations made */
  readonly runs: number;
  /** every change of the answer that the coarse sweep met, rising; more than one: the answer is not monotone */
  readonly changes: readonly Change[];
}
