import type { Case } from '../../case.ts';
import { limitsOf, prospects } from '../../theory/predict.ts';
import type { Found, Simulate } from '../found.ts';
import { holdOff } from '../hold-off.ts';
import { capacitanceOf } from '../open-gap.ts';
import { scaled } from '../scaled.ts';
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
/** How often a run that ends before breakdown is given five times as long. */
const EXTENSIONS = 2;
/** Ranges that are searched where the expected stretch does not hold the answer, as factors on the expectation: the first for what a seed or a long programme
 *  changes, the second for a pulse shorter than the lag or a resistance that starves the gap. */
const RANGES = [
  [0.75, 1.35],
  [1 / 3, 30],
] as const;

/** Answers one request by simulating.
 *  @param settings  the case, as it was read
 *  @throws SimulationFailure when a run, or every run of a search, fails */
export function answerOf(settings: Case, request: Request, simulate: Simulate): Answer {
  const there = alongPath(atDensity(settings, request.density), request.path, request.polarity);
  return request.kind === 'lag' ? lagOf(there, request, simulate) : holdOffOf(withYields(there, request.yields), request, simulate);
}

/** The hold-off voltage of a path. Two runs at the ends of the expected stretch confirm it; if they do not, it is searched for. */
function holdOffOf(gap: Case, { expected, spread, polarity }: HoldOffRequest, simulate: Simulate): HoldOffAnswer {
  const until = programmeEnds(gap) + CHARGING_TIMES * chargingTime(gap) + LAGS * slowestLag(gap, polarity * expected);
  const given: Case = { ...gap, observe: { ...gap.observe, until } };
  let runs = 0;
  // a discharge that sustains itself without having settled does not hold
  const decided: Simulate = (settings) => {
    runs++;
    const outcome = simulate(settings);
    const { verdict } = outcome;
    return verdict.state === 'undecided' && verdict.self_sustaining
      ? { ...outcome, verdict: { ...verdict, state: 'breaks-down' } }
      : outcome;
  };
  const answer = (lower: number | null, upper: number | null, note: string | null): HoldOffAnswer => ({
    kind: 'hold-off',
    lower,
    upper,
    note,
    runs,
  });

  if (spread <= HOLD_OFF_TOLERANCE) {
    const [lower, upper] = [expected * Math.exp(-spread / 2), expected * Math.exp(spread / 2)];
    const at = (voltage: number): string => decided(scaled(given, voltage)).verdict.state;
    if (at(lower) === 'holds' && at(upper) === 'breaks-down') return answer(lower, upper, null);
  }
  let found: Found | null = null;
  for (const [from, to] of RANGES) {
    found = holdOff(given, { from: from * expected, to: to * expected, tolerance: HOLD_OFF_TOLERANCE }, decided);
    if (found.state === 'found') break;
  }
  return answer(found?.lower ?? null, found?.upper ?? null, found?.note ?? null);
}

/** The lag of a gap that is expected to break down, along one path. */
function lagOf(gap: Case, { voltage, polarity }: LagRequest, simulate: Simulate): LagAnswer {
  const driven = scaled(gap, voltage);
  const threshold = limitsOf(gap, polarity).threshold.breakdown ?? 0;
  // behind a resistance the gap is charged past its threshold before the lag begins
  const charging = voltage > threshold ? Math.min(CHARGING_TIMES, 1.2 * Math.log(voltage / (voltage - threshold))) : CHARGING_TIMES;
  let until = programmeEnds(driven) + charging * chargingTime(driven) + LAGS * slowestLag(gap, polarity * voltage);
  for (let runs = 1; ; runs++, until *= 5) {
    const { verdict, onset } = simulate({ ...driven, observe: { ...driven.observe, until } });
    const ended = onset.formative_lag_s !== null || verdict.state === 'holds' || runs > EXTENSIONS;
    if (ended) return { kind: 'lag', lag: onset.formative_lag_s, runs };
  }
}

/** The longest lag that matters near a voltage [s]: by theory, just above it, or just above threshold where that is higher. */
function slowestLag(gap: Case, voltage: number): number {
  const sign = Math.sign(voltage);
  const threshold = limitsOf(gap, sign).threshold.breakdown ?? 0;
  const least = Math.max(Math.abs(voltage), threshold) * (1 + HOLD_OFF_TOLERANCE / 2);
  return timeToBreakdown(gap, sign * least) ?? IDLE_TRANSITS * (prospects(gap, voltage).ionTransit ?? 0);
}

/** Time constant with which the gap and what is across it charge through the series resistance [s]. */
function chargingTime(settings: Case): number {
  return settings.supply.seriesResistance * capacitanceOf(settings);
}
