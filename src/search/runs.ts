import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';
import { SimulationFailure } from '../simulate.ts';
import type { Answer, Change, Simulate } from './found.ts';

/** One value of the searched quantity and what its run said. */
export interface Sample {
  readonly value: number;
  readonly settings: Case;
  /** of a failed run: up to its last good state */
  readonly outcome: Outcome;
  readonly answer: Answer;
  /** why it is undecided, a clause; null where it is not */
  readonly doubt: string | null;
  /** why the run could not be completed; null where it could */
  readonly failure: SimulationFailure | null;
}

/** An answer, and where there is none the reason, as a clause. */
export type Judgement = 'holds' | 'breaks-down' | { readonly doubt: string };

interface Run {
  readonly outcome: Outcome;
  readonly failure: SimulationFailure | null;
}

/** What a search makes of its case and of an outcome. */
export interface Question {
  /** the case with the searched quantity at this value */
  settings(value: number): Case;
  /** the same in a run shorter by far that is likely to break down already, which decides as well; null where there is none */
  shortened?(settings: Case): Case | null;
  /** @param failure of a run that could not be completed; `outcome` is then what was found up to its last good state */
  judge(outcome: Outcome, settings: Case, failure: SimulationFailure | null): Judgement;
}

/** The runs of one search: each value is simulated once, failures are kept as undecided. */
export class Runs {
  readonly #question: Question;
  readonly #simulate: Simulate;
  /** by value, rising */
  readonly #samples: Sample[] = [];
  #made = 0;
  /** a shortened run that did not break down was made for nothing: then no more of them */
  #shortenedHelps = true;

  constructor(question: Question, simulate: Simulate) {
    this.#question = question;
    this.#simulate = simulate;
  }

  /** simulations made */
  get made(): number {
    return this.#made;
  }

  /** Every sample so far, rising in value. */
  get all(): readonly Sample[] {
    return this.#samples;
  }

  /** The sample at a value, simulated unless it has been. */
  at(value: number): Sample {
    const known = this.#samples.find((s) => s.value === value);
    if (known !== undefined) return known;
    const settings = this.#question.settings(value);
    const { outcome, failure } = this.#inShort(settings) ?? this.once(settings);
    const judgement = this.#question.judge(outcome, settings, failure);
    const answer = typeof judgement === 'string' ? judgement : 'undecided';
    const sample: Sample = { value, settings, outcome, failure, answer, doubt: typeof judgement === 'string' ? null : judgement.doubt };
    const after = this.#samples.findIndex((s) => s.value > value);
    this.#samples.splice(after < 0 ? this.#samples.length : after, 0, sample);
    return sample;
  }

  /** The shortened run of a case; null where there is none or it did not break down. */
  #inShort(settings: Case): Run | null {
    const shortened = this.#shortenedHelps ? (this.#question.shortened?.(settings) ?? null) : null;
    if (shortened === null) return null;
    const run = this.once(shortened);
    if (run.failure === null && run.outcome.verdict.state === 'breaks-down') return run;
    this.#shortenedHelps = false;
    return null;
  }

  /** A run beside the samples, counted. */
  once(settings: Case): Run {
    this.#made++;
    try {
      return { outcome: this.#simulate(settings), failure: null };
    } catch (thrown) {
      if (!(thrown instanceof SimulationFailure)) throw thrown;
      return { outcome: thrown.outcome, failure: thrown };
    }
  }

  /** Samples strictly between two values. */
  between(lower: number, upper: number): readonly Sample[] {
    return this.#samples.filter((s) => s.value > lower && s.value < upper);
  }

  /** @throws SimulationFailure the last one, where every run failed: there is then nothing to report */
  refuseIfAllFailed(): void {
    const last = this.#samples.at(-1);
    if (last?.failure && this.#samples.every((s) => s.failure !== null)) throw last.failure;
  }
}

/** What a failed run leaves open. */
export function failed(failure: SimulationFailure): Judgement {
  return { doubt: `the run failed: ${failure.message}` };
}

/** What a run gives as its own reason, as a clause. */
export function inItsOwnWords({ verdict }: Outcome): Judgement {
  return { doubt: verdict.reason.replace(/\.$/, '') };
}

/** Neighbours whose answers differ, rising. */
export function changesOf(samples: readonly Sample[]): Change[] {
  return samples.slice(1).flatMap((above, i) => {
    const below = samples[i];
    if (below.answer === above.answer) return [];
    return [{ lower: below.value, upper: above.value, below: below.answer, above: above.answer }];
  });
}
