import type { Polarity, YieldEnd } from './instant-case.ts';

/** What a window asks of simulations. Plain data, made of rounded numbers: the same history asks the same questions, so that answers can be kept. */
export type Request = HoldOffRequest | LagRequest;

/** The voltage at which a gap ceases to hold. */
export interface HoldOffRequest {
  readonly kind: 'hold-off';
  /** [1/m³] */
  readonly density: number;
  readonly polarity: Polarity;
  readonly yields: YieldEnd;
  /** the path to run along [m] */
  readonly path: number;
  /** where it is expected [V], and the relative width of the stretch around it to look at first */
  readonly expected: number;
  readonly spread: number;
}

/** How long a gap takes to break down. */
export interface LagRequest {
  readonly kind: 'lag';
  readonly density: number;
  readonly polarity: Polarity;
  readonly path: number;
  /** largest |V| of the programme [V], > 0 */
  readonly voltage: number;
}

export type Answer = HoldOffAnswer | LagAnswer | FailedAnswer;

export interface HoldOffAnswer {
  readonly kind: 'hold-off';
  /** the highest voltage known to hold [V]; null when none was found to */
  readonly lower: number | null;
  /** the lowest known to break down [V]; null when none was found to */
  readonly upper: number | null;
  /** what the search could not decide, one sentence; null where there is nothing to add */
  readonly note: string | null;
  /** simulations made */
  readonly runs: number;
}

export interface LagAnswer {
  readonly kind: 'lag';
  /** formative lag [s]; null when the run did not break down */
  readonly lag: number | null;
  readonly runs: number;
}

/** A simulation could not be completed. */
export interface FailedAnswer {
  readonly kind: 'failed';
  /** one sentence */
  readonly reason: string;
  readonly runs: number;
}

/** Answers requests, in their order; however many at once. */
export type Evaluate = (requests: readonly Request[]) => Promise<readonly Answer[]>;

/** A name for a request: equal for equal questions; no white space. */
export function requestKey(request: Request): string {
  const { kind, density, polarity, path } = request;
  const about = `${kind}:${density}:${polarity}:${path}`;
  return kind === 'lag' ? `${about}:${request.voltage}` : `${about}:${request.yields}:${request.expected}:${request.spread}`;
}
