import type { Runs, Sample } from './runs.ts';

/** A number that crosses zero where the answer changes, rising from below; null where a run does not tell.
 *  It only guides where to look: the bracket rests on answers. */
export type Measure = (sample: Sample) => number | null;

/** Two runs with different answers and nothing but undecided ones between them. */
export interface Bracket {
  readonly lower: Sample;
  readonly upper: Sample;
  /** whether upper/lower − 1 is within the tolerance */
  readonly narrow: boolean;
}

/** How far below and above an estimate the two runs are placed that shall enclose it, in tolerances. The wider half is above, where
 *  a discharge close to threshold takes longer to show. */
const BELOW = 0.3;
const ABOVE = 0.5;
/** No run closer than this to one already made [tolerances]. */
const APART = 0.1;
/** An undecided stretch this wide leaves no room for the bracket [tolerances]. */
const TOO_WIDE = 0.8;
/** Guided runs that may fail to halve the bracket before only halving is trusted. */
const PATIENCE = 3;

/** Narrows a bracket until its ends are within the tolerance, or an undecided stretch between them is all that is left.
 *
 *  Regula falsi on the first measure that gives an estimate, or one-sided from the two lowest runs above; two runs then enclose the
 *  estimate at once. Halving (in ratio) where there is none and where guided steps do not help, so that the runs are bounded: about
 *  log2 of the bracket's width over the tolerance, and three more. */
export function narrow(runs: Runs, from: Sample, to: Sample, tolerance: number, measures: readonly Measure[]): Bracket {
  let lower = from;
  let upper = to;
  let wasted = 0;
  for (;;) {
    const width = Math.log(upper.value / lower.value);
    if (upper.value <= (1 + tolerance) * lower.value) return { lower, upper, narrow: true };
    const stretch = stretchToSearch(runs.between(lower.value, upper.value), lower, upper, tolerance);
    if (stretch === null) return { lower, upper, narrow: false };

    const guided = wasted < PATIENCE ? aim(runs, lower, upper, stretch, tolerance, measures) : null;
    const trial = guided ?? middle(stretch, lower, upper, tolerance);
    if (!(trial > stretch.from && trial < stretch.to)) return { lower, upper, narrow: false };
    const sample = runs.at(trial);
    if (sample.answer === lower.answer) lower = sample;
    else if (sample.answer === upper.answer) upper = sample;
    if (guided !== null && Math.log(upper.value / lower.value) > width / 2) wasted++;
  }
}

interface Stretch {
  readonly from: number;
  readonly to: number;
  /** a place to try first, close to what is undecided, where that is narrow; else null */
  readonly beside: number | null;
}

/** Where to look next: the bracket, or the wider of the gaps on either side of what is undecided in it; null when both are narrow
 *  and the undecided stretch itself is too wide. */
function stretchToSearch(undecided: readonly Sample[], lower: Sample, upper: Sample, tolerance: number): Stretch | null {
  if (undecided.length === 0) return { from: lower.value, to: upper.value, beside: null };
  const first = undecided[0].value;
  const last = undecided[undecided.length - 1].value;
  const below = first / lower.value;
  const above = upper.value / last;
  if (Math.max(below, above) <= 1 + tolerance && last / first > 1 + TOO_WIDE * tolerance) return null;
  const small = last / first <= 1 + BELOW * tolerance;
  return below >= above
    ? { from: lower.value, to: first, beside: small ? first * (1 - BELOW * tolerance) : null }
    : { from: last, to: upper.value, beside: small ? last * (1 + BELOW * tolerance) : null };
}

/** The middle of a stretch (in ratio); beside an undecided stretch the place that makes the bracket just narrow enough, if that is
 *  easier to reach. */
function middle({ from, to }: Stretch, lower: Sample, upper: Sample, tolerance: number): number {
  const half = Math.sqrt(from * to);
  if (from > lower.value) return Math.max(half, lower.value * (1 + tolerance));
  if (to < upper.value) return Math.min(half, upper.value / (1 + tolerance));
  return half;
}

/** The place beside what is undecided, else the next of the two that enclose the estimated crossing; null without either or where a
 *  run is near already. */
function aim(runs: Runs, lower: Sample, upper: Sample, stretch: Stretch, tolerance: number, measures: readonly Measure[]): number | null {
  const apart = 1 + APART * tolerance;
  const isFree = (place: number): boolean => place > stretch.from * apart && place * apart < stretch.to;
  if (stretch.beside !== null && isFree(stretch.beside)) return stretch.beside;
  const crossing = crossingBetween(runs, lower, upper, measures);
  if (crossing === null) return null;
  const below = crossing * (1 - BELOW * tolerance);
  const trial = lower.value < below ? below : crossing * (1 + ABOVE * tolerance);
  return isFree(trial) ? trial : null;
}

/** Where a measure crosses zero between the ends of a bracket; null where none tells. */
export function crossingBetween(runs: Runs, lower: Sample, upper: Sample, measures: readonly Measure[]): number | null {
  for (const measure of measures) {
    const crossing = crossingBy(measure, runs, lower);
    if (crossing !== null && crossing > lower.value && crossing < upper.value) return crossing;
  }
  return null;
}

function crossingBy(measure: Measure, runs: Runs, lower: Sample): number | null {
  const above = runs.all.filter((s) => s.value > lower.value);
  // what says nothing of the nearest run says nothing of the change
  if (above.length === 0 || measure(above[0]) === null) return null;
  const known = [lower, ...above].flatMap((s) => {
    const m = measure(s);
    return m === null ? [] : [{ value: s.value, m }];
  });
  const positive = known.findIndex((k) => k.m > 0);
  // between the signs where there are both, else beyond the two lowest
  const second = known[positive > 0 ? positive : 1];
  const first = known[positive > 0 ? positive - 1 : 0];
  if (first === undefined || second === undefined || !(second.m > first.m)) return null;
  return first.value - (first.m * (second.value - first.value)) / (second.m - first.m);
}
