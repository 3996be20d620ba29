import type { Case } from '../../case.ts';
import type { Outcome } from '../../onset/outcome.ts';
import { limitsOf, prospects } from '../../theory/predict.ts';
import type { Simulate } from '../found.ts';
import { holdOff } from '../hold-off.ts';
import { capacitanceOf } from '../open-gap.ts';
import { largestVoltage, scaled } from '../scaled.ts';
import { alongPath, atDensity, programmeEnds, withYields } from './instant-case.ts';
import type { Answer, HoldOffAnswer, HoldOffRequest, LagAnswer, LagRequest, Request } from './request.ts';
import { timeToBreakdown } from './threshold.ts';

/** Relative width of the stretch in which a hold-off voltage is known. */
export const HOLD_OFF_TOLERANCE = 2e-3;

/** Time that a run is given, in lags by theory: one more than the search asks for. */
const LAGS = 4;
/** Charging times after which the gap is within 0.1 % of the supply. */
const CHARGING_TIMES = 7;
/** Ion transits that a run is given where nothing breaks down at any voltage. */
const IDLE_TRANSITS = 100;
/** How often a run that ends undecided is given five times as long. */
const EXTENSIONS = 2;
/** How far from the expectation the answer is walked to, in ln V: what seeds, diffusion and slow programmes change. */
const FURTHEST_WALK = 0.2;
/** Range that is searched where walking does not find it, as factors on the expectation: a pulse shorter than the lag or a resistance that starves the gap. */
const RANGE = { from: 0.3, to: 30 };

/** Answers one request by simulating.
 *  @param settings  the case, as it was read
 *  @throws SimulationFailure when a run, or every run of a search, fails */
export function answerOf(settings: Case, request: Request, simulate: Simulate): Answer {
  const there = alongPath(atDensity(settings, request.density), request.path, request.polarity);
  return request.kind === 'lag' ? lagOf(there, request, simulate) : holdOffOf(withYields(there, request.yields), request, simulate);
}

/** The hold-off voltage of a path: by runs on either side of the expected one, which are usually enough; else by a search. */
function holdOffOf(gap: Case, request: HoldOffRequest, simulate: Simulate): HoldOffAnswer {
  const { expected, polarity } = request;
  let runs = 0;
  // a discharge that sustains itself without having settled does not hold
  const unsettled = ({ verdict }: Outcome): boolean => verdict.state === 'undecided' && verdict.self_sustaining;
  const enough = (outcome: Outcome): boolean => outcome.verdict.state !== 'undecided' || unsettled(outcome);
  const decided: Simulate = (settings) => {
    const { outcome, runs: made } = inTime(gap, settings, polarity * largestVoltage(settings.supply), simulate, enough);
    runs += made;
    return unsettled(outcome) ? { ...outcome, verdict: { ...outcome.verdict, state: 'breaks-down' } } : outcome;
  };
  let silent: string | null = null;
  const near = walk(request, (voltage) => {
    const { verdict, final } = decided(scaled(gap, voltage));
    // where even a run just below the threshold ends by itself without an answer, the solver is at its end: searching on would take long and tell nothing
    if (verdict.state === 'undecided' && final.stop !== 'until' && voltage < expected) silent = verdict.reason;
    return silent === null ? verdict.state === 'holds' : null;
  });
  if (near !== null) return { kind: 'hold-off', ...near, note: null, runs };
  if (silent !== null) return { kind: 'hold-off', lower: null, upper: null, note: silent, runs };
  const until = timeFor(gap, polarity * expected);
  const range = { from: RANGE.from * expected, to: RANGE.to * expected, tolerance: HOLD_OFF_TOLERANCE };
  const { lower, upper, note } = holdOff({ ...gap, observe: { ...gap.observe, until } }, range, decided);
  return { kind: 'hold-off', lower, upper, note, runs };
}

/** Walks outwards from the expected stretch until its lower end holds and its upper end does not, then halves it; null when that is too far or
 *  below the expectation nothing is answered. */
function walk(
  { expected, spread }: HoldOffRequest,
  holds: (voltage: number) => boolean | null,
): { readonly lower: number; readonly upper: number } | null {
  const at = (log: number): number => expected * Math.exp(log);
  let lower = -spread / 2;
  let upper = spread / 2;
  let reached = false;
  for (let step = spread; ; lower -= step, step *= 2) {
    const there = holds(at(lower));
    if (there === true) break;
    if (there === null || lower < -FURTHEST_WALK) return null;
    upper = lower;
    reached = true;
  }
  for (let step = spread; !reached && holds(at(upper)); upper += step, step *= 2) {
    if (upper > FURTHEST_WALK) return null;
    lower = upper;
  }
  while (upper - lower > HOLD_OFF_TOLERANCE * 1.001) {
    const middle = (lower + upper) / 2;
    if (holds(at(middle))) lower = middle;
    else upper = middle;
  }
  return { lower: at(lower), upper: at(upper) };
}

/** Runs for as long as it takes at this voltage, which is the shorter the higher it is; for longer, a few times, while that is not enough. */
function inTime(
  gap: Case,
  settings: Case,
  voltage: number,
  simulate: Simulate,
  enough: (outcome: Outcome) => boolean,
): { readonly outcome: Outcome; readonly runs: number } {
  let until = timeFor(gap, voltage);
  for (let runs = 1; ; runs++, until *= 5) {
    const outcome = simulate({ ...settings, observe: { ...settings.observe, until } });
    // a run that ended by itself ends the same way however long it is given
    if (enough(outcome) || outcome.final.stop !== 'until' || runs > EXTENSIONS) return { outcome, runs };
  }
}

/** Time for a path to break down when its programme reaches a voltage, a few lags included [s]. */
function timeFor(gap: Case, voltage: number): number {
  const threshold = limitsOf(gap, Math.sign(voltage)).threshold.breakdown ?? 0;
  const over = Math.abs(voltage) / threshold;
  // behind a resistance the gap is charged past its threshold before the lag begins
  const charging = over > 1 ? Math.min(CHARGING_TIMES, 1.2 * Math.log(over / (over - 1))) : CHARGING_TIMES;
  return programmeEnds(gap) + charging * gap.supply.seriesResistance * capacitanceOf(gap) + LAGS * slowestLag(gap, voltage);
}

/** The lag of a gap that is expected to break down, along one path; null where a weak supply holds it at its threshold, so that no space charge forms. */
function lagOf(gap: Case, { voltage, polarity }: LagRequest, simulate: Simulate): LagAnswer {
  const enough = ({ onset, verdict }: Outcome): boolean => onset.formative_lag_s !== null || verdict.state !== 'undecided';
  const { outcome, runs } = inTime(gap, scaled(gap, voltage), polarity * voltage, simulate, enough);
  return { kind: 'lag', lag: outcome.onset.formative_lag_s, runs };
}

/** The longest lag that matters near a voltage [s]: by theory, just above it, or just above threshold where that is higher. */
function slowestLag(gap: Case, voltage: number): number {
  const sign = Math.sign(voltage);
  const threshold = limitsOf(gap, sign).threshold.breakdown ?? 0;
  const least = Math.max(Math.abs(voltage), threshold) * (1 + HOLD_OFF_TOLERANCE / 2);
  return timeToBreakdown(gap, sign * least) ?? IDLE_TRANSITS * (prospects(gap, voltage).ionTransit ?? 0);
}
