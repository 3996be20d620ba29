import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';
import { polaritiesOf } from '../onset/polarity.ts';
import { percent, roughly } from '../onset/words.ts';
import type { SimulationFailure } from '../simulate.ts';
import { Voltage } from '../supply/programme.ts';
import { prospects } from '../theory/predict.ts';
import { TOWNSEND } from '../units/constants.ts';
import { formatQuantity } from '../units/format.ts';
import type { Answer, Found, SearchRange, Simulate } from './found.ts';
import { lowestChange, type Result } from './lowest-change.ts';
import { crossingBetween, type Measure } from './narrow.ts';
import { capacitanceOf, driveOf, isUnfinished, STILL_CHARGING } from './open-gap.ts';
import { changesOf, failed, inItsOwnWords, type Judgement, Runs, type Sample } from './runs.ts';
import { largestVoltage, scaled } from './scaled.ts';
import { sweepPoints } from './sweep.ts';

/** The coarse sweep: neighbours at most this ratio apart, with at most so many points. */
const SWEEP_RATIO = 1.35;
const SWEEP_POINTS = 7;
/** Where theory puts the answer, runs this many tolerances below and above it confirm that. */
const BELOW_THEORY = 0.25;
const ABOVE_THEORY = 0.65;
/** Where the gap breaks down below theory already (a strong seed), the next run is this share below theory. */
const BELOW_SEEDED = 0.02;
/** Formative lags at the tolerance's overvoltage that the run must leave time for. */
const LAGS = 3;
/** A supply that has come down below this share of the breakdown voltage when the run ends has ended the matter itself. */
const ENDED = 0.8;
/** A shortened run: charging times of the circuit and times of rise by theory that it lasts, and the share of the full one that it may
 *  take to be worth while. */
const CHARGING_TIMES = 5;
const RISES = 2;
const WORTHWHILE = 0.5;
/** What counts as the flat top of a pulse, as a share of its largest voltage. */
const TOP = 0.9;

/** Hold-off voltage: the highest voltage that holds, below the lowest change from holding to breaking down, with the whole voltage
 *  programme scaled (see `scaled`). `value` and `lower` held, `upper` broke down, and upper/lower − 1 ≤ tolerance.
 *
 *  - A gap whose longer path breaks down first does not hold from that path's V_s on, whatever the gap itself does.
 *  - A run that ends before the gap has been driven to its full voltage decides nothing.
 *  - `observe.until` must leave room for three formative lags at the tolerance's overvoltage: below that, runs just above the answer
 *    end before they break down, and the answer would be the run's length. Where the supply has come down by then (a pulse), its
 *    end is part of the question and no such limit applies.
 *  - A run that fails counts as undecided, unless it had broken down before.
 *
 *  `theory`: the lowest V_s of the paths from the spacing to the longest, at whichever polarity of the programme meets its own first.
 *  It knows no seed, no resistance and no time.
 *
 *  @param range [V], the largest |V| of the programme
 *  @throws SimulationFailure when every run failed */
export function holdOff(settings: Case, range: SearchRange, simulate: Simulate): Found {
  const { to, tolerance } = range;
  const answer = (result: Result, runs: Runs | null, theory: number | null, changes: Found['changes']): Found => ({
    what: 'hold-off',
    state: result.state,
    value: result.state === 'found' ? (result.lower?.value ?? null) : null,
    unit: 'V',
    lower: result.lower?.value ?? null,
    upper: result.upper?.value ?? null,
    theory,
    runs: runs?.made ?? 0,
    changes,
    note: result.note,
  });
  if (!(largestVoltage(settings.supply) > 0)) {
    const note = 'the supply never leaves 0 V: there is nothing to scale';
    return answer({ state: 'undecided', lower: null, upper: null, note }, null, null, []);
  }

  const theory = theoryOf(settings);
  const runs = new Runs(
    {
      settings: (voltage) => scaled(settings, voltage),
      judge: (outcome, derived, failure) => judge(outcome, derived, failure, tolerance),
      shortened,
    },
    simulate,
  );
  sweep(runs, range, theory);
  runs.refuseIfAllFailed();
  const changes = changesOf(runs.all);

  const top = topEndsAt(scaled(settings, to));
  const measures = untilMatters(scaled(settings, theory ?? to)) ? [growth, promptness(0)] : [promptness(1 / top)];
  const result = lowestChange(runs, tolerance, measures, (voltage) => formatQuantity(voltage, 'V', 5));
  const { lower, upper } = result;
  if (lower === null || upper === null) return answer(result, runs, theory, changes);
  const likely = crossingBetween(runs, lower, upper, measures);
  const threshold = theory !== null && theory > lower.value && theory < upper.value ? theory : (likely ?? lower.value);
  return answer(withTimeEnough(result, { lower, upper, threshold }, runs, settings, tolerance), runs, theory, changes);
}

/** Runs over the whole range: its ends, a pair around theory, and enough between them to meet changes that theory knows nothing of. */
function sweep(runs: Runs, { from, to, tolerance }: SearchRange, theory: number | null): void {
  const marks = [from, to];
  const mark = (voltage: number): Answer | null => {
    if (!(voltage > from && voltage < to)) return null;
    marks.push(voltage);
    return runs.at(voltage).answer;
  };
  if (theory !== null) {
    const below = mark(theory * (1 - BELOW_THEORY * tolerance));
    mark(theory * (below === 'breaks-down' ? 1 - BELOW_SEEDED : 1 + ABOVE_THEORY * tolerance));
  }
  for (const voltage of sweepPoints(marks, SWEEP_RATIO, SWEEP_POINTS)) runs.at(voltage);
}

/** The lowest V_s over paths, as the largest |V| of the programme [V]; null where no voltage breaks down. */
function theoryOf(settings: Case): number | null {
  const { programme, initialGapVoltage } = settings.supply;
  const supply = Voltage.of(programme);
  const voltages = [initialGapVoltage, supply.at(0), ...supply.cornersAfter(0).map((t) => supply.at(t))];
  const highest = voltages.reduce((a, b) => Math.max(a, b), 0);
  const lowest = voltages.reduce((a, b) => Math.min(a, b), 0);
  const largest = Math.max(highest, -lowest);
  return polaritiesOf(settings, highest, lowest).reduce<number | null>((least, p) => {
    if (p.lowest === null || p.largest === 0) return least;
    return Math.min(least ?? Infinity, (p.lowest.voltage * largest) / p.largest);
  }, null);
}

function judge(outcome: Outcome, settings: Case, failure: SimulationFailure | null, tolerance: number): Judgement {
  const { state } = outcome.verdict;
  if (state === 'breaks-down') return state;
  if (failure !== null) return failed(failure);
  const drive = driveOf(settings);
  if (state === 'undecided') return firesOverLongerPath(outcome, settings, drive) ? 'breaks-down' : inItsOwnWords(outcome);
  return isUnfinished(drive, tolerance) ? STILL_CHARGING : 'holds';
}

/** The case in a run that ends soon after theory expects space charge. What broke down stays so, and what follows (a source too weak
 *  for the glow fires thousands of times) costs a hundred times more. Null where that saves little or nothing. */
function shortened(settings: Case): Case | null {
  const { supply, observe } = settings;
  if (!untilMatters(settings)) return null;
  const { highest, lowest } = driveOf(settings);
  const rise = prospects(settings, highest >= -lowest ? highest : lowest).timeToSpaceCharge;
  if (rise === null) return null;
  const lastCorner = Voltage.of(supply.programme).cornersAfter(0).at(-1) ?? 0;
  const charged = lastCorner + CHARGING_TIMES * supply.seriesResistance * capacitanceOf(settings);
  const until = charged + RISES * rise;
  return until < WORTHWHILE * observe.until ? { ...settings, observe: { ...observe, until } } : null;
}

/** Did the voltage reach that of a longer path which breaks down below the gap itself? */
function firesOverLongerPath(outcome: Outcome, settings: Case, { highest, lowest, largest }: ReturnType<typeof driveOf>): boolean {
  // a supply that tripped early never got there
  const reached = outcome.theory.reduced_field_Td * TOWNSEND * settings.gas.density * settings.gap.spacing;
  if (reached < 0.999 * largest) return false;
  return polaritiesOf(settings, highest, lowest).some(
    (p) => p.lowest !== null && p.lowest.voltage < (p.breakdown ?? Infinity) && p.largest >= p.lowest.voltage,
  );
}

/** Is the gap still under a voltage that could break it down when the run ends? */
function untilMatters(settings: Case): boolean {
  const { last, later } = driveOf(settings);
  const rest = Math.max(Math.abs(last), later);
  const theory = polaritiesOf(settings, rest, -rest).reduce((least, p) => Math.min(least, p.lowest?.voltage ?? Infinity), Infinity);
  return Number.isFinite(theory) ? rest >= ENDED * theory : rest > 0;
}

/** When the supply last leaves the top of its programme [s]; Infinity when it stays there. */
function topEndsAt(settings: Case): number {
  const supply = Voltage.of(settings.supply.programme);
  const level = TOP * supply.largestFrom(-Infinity);
  const times = [0, ...supply.cornersAfter(0)];
  const last = times.findLastIndex((t) => Math.abs(supply.at(t)) >= level);
  if (last < 0 || last === times.length - 1) return Infinity;
  const [t, next] = [times[last], times[last + 1]];
  const [high, low] = [Math.abs(supply.at(t)), Math.abs(supply.at(next))];
  return t + ((next - t) * (high - level)) / (high - low);
}

/** λ [1/s], which is 0 at threshold and nearly straight around it. */
const growth: Measure = ({ answer, outcome }) => (answer === 'holds' ? null : outcome.onset.growth_rate_per_s);

/** 1/time from threshold to space charge, less what it is at the change [1/s]: nearly straight in the voltage, as the growth rate is. */
function promptness(atChange: number): Measure {
  return ({ answer, outcome }) => {
    const { threshold_time_s: from, space_charge_time_s: to } = outcome.onset;
    return answer !== 'breaks-down' || from === null || to === null || !(to > from) ? null : 1 / (to - from) - atChange;
  };
}

interface Enclosed {
  readonly lower: Sample;
  readonly upper: Sample;
  /** where between them the change is likely to be [V] */
  readonly threshold: number;
}

/** Holds the run's length against the lag: a bracket found in too short a run is undecided, and the note says how long it takes. */
function withTimeEnough(result: Result, at: Enclosed, runs: Runs, settings: Case, tolerance: number): Result {
  const { lower, upper, threshold } = at;
  if (!untilMatters(upper.settings)) return result;
  const { until } = settings.observe;
  const needed = (sample: Sample): number | null => {
    if (sample.outcome.verdict.state !== 'breaks-down') return null;
    const lag = lagOf(sample, lower, runs, until);
    // the lag is nearly inverse to the overvoltage
    return lag === null ? null : (LAGS * lag * (sample.value / threshold - 1)) / tolerance;
  };
  if (result.state !== 'found') {
    const time = needed(upper) ?? lagInTheory(settings, threshold, tolerance);
    if (time === null || time <= until) return result;
    return { ...result, note: [result.note, tooShort(time, tolerance)].filter((text) => text !== null).join('; ') };
  }
  const time = needed(upper);
  if (time === null || time <= until) return result;
  // a run at the tolerance's overvoltage itself leaves the least to the estimate
  const last = runs.at(lower.value * (1 + tolerance));
  const least = last.answer === 'breaks-down' ? needed(last) : null;
  if (least !== null && least <= until) return { ...result, upper: last };
  return { ...result, state: 'undecided', note: tooShort(least ?? time, tolerance) };
}

function tooShort(time: number, tolerance: number): string {
  return `observe.until is too short: hold-off to ${percent(tolerance)} takes about ${roughly(time)}, three formative lags at that overvoltage`;
}

/** From threshold to breakdown [s]; null where the run does not tell. */
function lagOf(sample: Sample, held: Sample, runs: Runs, until: number): number | null {
  const { onset, final, peak } = sample.outcome;
  if (onset.formative_lag_s !== null) return onset.formative_lag_s;
  // a strong seed breaks the gap down below threshold: no later than the current's peak, or than the run's early end
  const latest = Math.min(final.time_s, peak.time_s);
  if (LAGS * latest <= until) return latest;
  // half way (in decades) between what the gap held and what it came to
  const level = Math.sqrt(Math.abs(held.outcome.peak.current_A * peak.current_A));
  const { settings } = sample;
  const { outcome } = runs.once({ ...settings, observe: { until: Math.min(until, 1.01 * peak.time_s), currents: [level] } });
  return outcome.currents[0]?.time_s ?? latest;
}

/** Three lags at the tolerance's overvoltage by theory [s]; null without a seed current. */
function lagInTheory(settings: Case, threshold: number, tolerance: number): number | null {
  const voltage = threshold * (1 + tolerance);
  const lag = prospects(scaled(settings, voltage), voltage).timeToSpaceCharge;
  return lag === null ? null : LAGS * lag;
}
