import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';
import { polaritiesOf } from '../onset/polarity.ts';
import type { SimulationFailure } from '../simulate.ts';
import { Voltage } from '../supply/programme.ts';
import { formatQuantity } from '../units/format.ts';
import type { Found, SearchRange, Simulate } from './found.ts';
import { type Result, whyUndecided } from './lowest-change.ts';
import { narrow } from './narrow.ts';
import { driveOf, isUnfinished, STILL_CHARGING } from './open-gap.ts';
import { changesOf, failed, inItsOwnWords, type Judgement, Runs, type Sample } from './runs.ts';
import { sweepPoints } from './sweep.ts';

/** How far above the answer no run may end self-sustained. */
const REACH = 100;
/** The coarse sweep: two runs a decade, with at most so many points. */
const SWEEP_RATIO = Math.sqrt(10) * (1 + 1e-9);
const SWEEP_POINTS = 25;

/** Series resistance: the least above which no run up to 100 times it ends self-sustained. `value` and `upper` did not, `lower` did;
 *  upper/lower − 1 ≤ tolerance. The sweep goes up to 100 times the end of the range: a resistance that keeps a glow from standing may
 *  turn it into pulses, and a higher one let a weak discharge stand again.
 *
 *  A run ends self-sustained when its discharge sustains itself at the end, when the
 *  gap's voltage repeats there under a supply that stays, when it left the range
 *  of the model as an arc would, or when it broke down, has not died out, and the supply can lift the gap above its breakdown voltage
 *  again: between two pulses a discharge does not sustain itself, and yet comes back. A run that ends before the gap has been charged
 *  to the supply's voltage, or before a discharge has died out, decides nothing. No closed form: `theory` is null.
 *
 *  @param range [ohm]
 *  @throws SimulationFailure when every run failed */
export function seriesResistance(settings: Case, range: SearchRange, simulate: Simulate): Found {
  const { from, to, tolerance } = range;
  const runs = new Runs(
    {
      settings: (seriesResistance) => ({ ...settings, supply: { ...settings.supply, seriesResistance } }),
      judge: (outcome, derived, failure) => judge(outcome, derived, failure, tolerance),
    },
    simulate,
  );
  for (const resistance of sweepPoints([from, to, REACH * to], SWEEP_RATIO, SWEEP_POINTS)) runs.at(resistance);
  runs.refuseIfAllFailed();
  const changes = changesOf(runs.all);
  const { state, lower, upper, note } = leastQuiet(runs, to, tolerance);
  return {
    what: 'series-resistance',
    state,
    value: state === 'found' ? (upper?.value ?? null) : null,
    unit: 'ohm',
    lower: lower?.value ?? null,
    upper: upper?.value ?? null,
    theory: null,
    runs: runs.made,
    changes,
    note,
  };
}

const ohms = (resistance: number): string => formatQuantity(resistance, 'ohm');

/** The lowest change to a stretch of a hundredfold in which nothing ends self-sustained, narrowed down. */
function leastQuiet(runs: Runs, to: number, tolerance: number): Result {
  const samples = runs.all;
  if (samples.every((s) => s.answer === 'holds')) return { state: 'none-breaks-down', lower: null, upper: samples[0], note: null };
  const start = samples.findIndex((s, i) => s.value <= to && isQuietFrom(samples, i));
  if (start < 0) {
    const doubtful = samples.find((s) => s.answer === 'undecided');
    const lower = samples.findLast((s) => s.value <= to && s.answer === 'breaks-down') ?? null;
    if (doubtful !== undefined) return { state: 'undecided', lower, upper: null, note: whyUndecided(doubtful, ohms) };
    const note = samples.some((s) => s.value <= to && s.answer === 'holds')
      ? 'none up to 100 times which nothing ends self-sustained'
      : null;
    return { state: 'none-holds', lower, upper: null, note };
  }
  if (start === 0) {
    const next = samples.find((s) => s.answer !== 'holds');
    const note = `the lowest resistance of the range does already; the next that does not is ${ohms(next?.value ?? Infinity)}`;
    return { state: 'found', lower: null, upper: samples[0], note };
  }
  const lower = samples.slice(0, start).findLast((s) => s.answer === 'breaks-down') ?? null;
  const below = samples.slice(0, start).findLast((s) => s.answer !== 'undecided');
  // undecided right above a quiet one: the change may lie on either side of what is undecided
  if (lower === null || below !== lower) {
    return { state: 'undecided', lower, upper: samples[start], note: whyUndecided(samples[start - 1], ohms) };
  }
  const bracket = narrow(runs, lower, samples[start], tolerance, []);
  const doubtful = runs.between(bracket.lower.value, bracket.upper.value).find((s) => s.answer === 'undecided');
  return {
    state: bracket.narrow ? 'found' : 'undecided',
    lower: bracket.lower,
    upper: bracket.upper,
    note: bracket.narrow || doubtful === undefined ? null : whyUndecided(doubtful, ohms),
  };
}

/** Does no run from this one up to 100 times it end self-sustained? */
function isQuietFrom(samples: readonly Sample[], i: number): boolean {
  const end = REACH * samples[i].value;
  return samples.every((s, k) => k < i || s.value > end || s.answer === 'holds');
}

function judge(outcome: Outcome, settings: Case, failure: SimulationFailure | null, tolerance: number): Judgement {
  const { verdict, final } = outcome;
  if (failure !== null) return failed(failure);
  if (verdict.self_sustaining || repeatsByItself(outcome, settings) || final.stop === 'model-limit') return 'breaks-down';
  if (verdict.state === 'undecided') return inItsOwnWords(outcome);
  const drive = driveOf(settings);
  if (verdict.state === 'holds') return isUnfinished(drive, tolerance) ? STILL_CHARGING : 'holds';
  if (final.stop !== 'until') return 'holds';
  const later = Math.max(drive.later, Math.abs(final.gap_voltage_V));
  const firesAgain = polaritiesOf(settings, later, -later).some((p) => p.breakdown !== null && later >= p.breakdown);
  return firesAgain ? 'breaks-down' : { doubt: 'the run ends before the discharge has died out or settled: extend observe.until' };
}

/** Does the gap's voltage repeat at the end although the supply's does not change any more? */
function repeatsByItself({ oscillation, final }: Outcome, { supply }: Case): boolean {
  return oscillation !== null && Voltage.of(supply.programme).nextCorner(final.time_s - oscillation.period_s) === Infinity;
}
