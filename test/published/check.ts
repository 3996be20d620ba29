/** A published number beside what the program gives for it: the rows of `npm run checks`, which are tests too. */
import type { Status } from '../../src/gases/gas.ts';

/** `common practice`: a fact of the trade without one source */
export type PublishedStatus = Exclude<Status, 'given'> | 'common practice';

/** What the program's value may be, as a multiple of the published one. */
export interface Band {
  readonly low: number;
  readonly high: number;
}

export interface Check {
  /** what is compared; unique */
  readonly check: string;
  readonly published: number;
  readonly unit: string;
  readonly allowed: Band;
  /** why the tolerance is what it is */
  readonly reason: string;
  readonly status: PublishedStatus;
  /** what the computed side does not contain; null where both sides come from one law or table, or a number was chosen with the published one in view: such a
   *  row guards the code and counts for nothing */
  readonly independentOf: string | null;
  /** the allowed band is where a stated fault of the model puts it, away from 1: pinned so that the statement stays true; counts for nothing */
  readonly knownLimit?: true;
  /** runs the time-dependent solver */
  readonly simulated: boolean;
  /** takes more than a second or two: among the long tests */
  readonly slow?: true;
  readonly compute: () => number;
}

/** One published source and the checks against it. */
export interface Source {
  readonly source: string;
  readonly checks: readonly Check[];
}

/** within a share either way */
export function within(share: number): Band {
  return { low: 1 - share, high: 1 + share };
}

/** within a factor either way */
export function factor(most: number): Band {
  return { low: 1 / most, high: most };
}

/** Where other published values of the same quantity lie, and a share beyond: the spread of the sources as the tolerance. */
export function spread(published: number, lowest: number, highest: number, share: number): Band {
  return { low: (lowest / published) * (1 - share), high: (highest / published) * (1 + share) };
}

/** How far a published number carries: what nobody has read with good confidence is no more than plausible. */
export type Kind = 'check' | 'plausibility' | 'not independent' | 'known limit';

export function kindOf({ independentOf, status, knownLimit }: Check): Kind {
  if (knownLimit) return 'known limit';
  if (independentOf === null) return 'not independent';
  return status === 'from memory (M)' || status === 'from memory (L)' ? 'plausibility' : 'check';
}

/** Whether a row counts: the two sides are independent and the agreement is real. */
export function counts(check: Check): boolean {
  const kind = kindOf(check);
  return kind === 'check' || kind === 'plausibility';
}

export interface Compared {
  /** NaN where the program gave none */
  readonly value: number;
  /** value/published − 1 */
  readonly difference: number;
  readonly passes: boolean;
  /** why there is no value */
  readonly fault: string | null;
}

/** Computes a row. A row whose computation fails is out of its tolerance, and the others go on. */
export function compare(check: Check): Compared {
  let value = Number.NaN;
  let fault: string | null = null;
  try {
    value = check.compute();
  } catch (thrown) {
    fault = thrown instanceof Error ? thrown.message : String(thrown);
  }
  const ratio = value / check.published;
  return { value, difference: ratio - 1, passes: ratio >= check.allowed.low && ratio <= check.allowed.high, fault };
}

export function toleranceText({ allowed: { low, high } }: Check): string {
  const percent = (share: number): string => `${share > 0 ? '+' : ''}${Number((100 * share).toPrecision(2))}`;
  if (Math.abs(low * high - 1) < 1e-9 && high > 1.4) return `factor ${Number(high.toPrecision(3))}`;
  if (Math.abs(low + high - 2) < 1e-9) return `±${Number((100 * (high - 1)).toPrecision(2))} %`;
  if (high > 2.5 || low < 0.2) return `${low} to ${high} times`;
  return `${percent(low - 1)} to ${percent(high - 1)} %`;
}

/** What a failing test says. */
export function comparedText({ published, unit, allowed, check }: Check, { value, fault }: Compared): string {
  return `${check}: ${fault ?? value}, published ${published} ${unit}, allowed ${allowed.low} to ${allowed.high} times`;
}
