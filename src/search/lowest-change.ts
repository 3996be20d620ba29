import type { Found } from './found.ts';
import { type Measure, narrow } from './narrow.ts';
import type { Runs, Sample } from './runs.ts';

/** What a search has come to, before it is put into units and words of its kind. */
export interface Result {
  readonly state: Found['state'];
  /** the last bracket; an end is null where no run bounds the answer */
  readonly lower: Sample | null;
  readonly upper: Sample | null;
  readonly note: string | null;
}

/** The lowest change from holding to breaking down among the runs made so far, narrowed down.
 *
 *  Everything made below it must hold: a range that breaks down at its lowest value, or holds again only above a stretch that
 *  does not, has no such change.
 *  @param name a value in words
 *  @param measures see narrow */
export function lowestChange(runs: Runs, tolerance: number, measures: readonly Measure[], name: (value: number) => string): Result {
  const samples = runs.all;
  const firstBroken = samples.findIndex((s) => s.answer === 'breaks-down');
  if (firstBroken < 0) return withoutBreakdown(samples, name);
  const upper = samples[firstBroken];
  if (firstBroken === 0) {
    const again = samples.find((s) => s.answer === 'holds');
    if (again === undefined) return { state: 'none-holds', lower: null, upper, note: null };
    const note = `breaks down at ${name(upper.value)}, the lowest of the range, already, and holds again at ${name(again.value)}: start lower`;
    return { state: 'undecided', lower: null, upper, note };
  }
  const lower = samples.slice(0, firstBroken).findLast((s) => s.answer === 'holds');
  if (lower === undefined) return { state: 'undecided', lower: null, upper, note: whyUndecided(samples[firstBroken - 1], name) };
  const bracket = narrow(runs, lower, upper, tolerance, measures);
  const doubtful = runs.all.find((s) => s.value < bracket.upper.value && s.answer === 'undecided');
  const decided = bracket.narrow && (doubtful === undefined || doubtful.value > bracket.lower.value);
  return {
    state: decided ? 'found' : 'undecided',
    lower: bracket.lower,
    upper: bracket.upper,
    note: decided || doubtful === undefined ? null : whyUndecided(doubtful, name),
  };
}

function withoutBreakdown(samples: readonly Sample[], name: (value: number) => string): Result {
  const doubtful = samples.findIndex((s) => s.answer === 'undecided');
  if (doubtful < 0) return { state: 'none-breaks-down', lower: samples.at(-1) ?? null, upper: null, note: null };
  return { state: 'undecided', lower: samples[doubtful - 1] ?? null, upper: null, note: whyUndecided(samples[doubtful], name) };
}

/** Where and why a run decided nothing, one clause. */
export function whyUndecided({ value, doubt }: Sample, name: (value: number) => string): string {
  return `undecided at ${name(value)}: ${doubt}`;
}
