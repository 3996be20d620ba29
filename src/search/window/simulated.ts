import type { Case } from '../../case.ts';
import type { Simulate } from '../found.ts';
import { scaled } from '../scaled.ts';
import { limitsOf, prospects } from '../../theory/predict.ts';
import { alongPath, atDensity, programmeEnds, withYields } from './instant-case.ts';
import type { Answer, HoldOffAnswer, HoldOffRequest, LagAnswer, LagRequest, Request } from './request.ts';
import { chargingTime, timeToBreakdown } from './threshold.ts';

/** Relative width of the stretch in which a hold-off voltage is known. */
export const HOLD_OFF_TOLERANCE = 2e-3;

/** Time that a run is given, in lags by theory: a gap just above threshold must be seen to break down. */
const LAGS = 3;
/** Charging times after which the gap is within 0.1 % of the supply. */
const CHARGING_TIMES = 7;
/** Ion transits that a run is given where nothing breaks down at any voltage. */
const IDLE_TRANSITS = 100;
/** How often a run that ends undecided is given five times as long. */
const EXTENSIONS = 2;
/** How far from the expectation an answer is looked for, as a factor either way: space charge of a strong seed lowers a threshold by some per cent, a pulse
 *  shorter than the lag or a resistance that starves the gap raises it. */
const FURTHEST = 30;

/** Answers one request by simulating.
 *  @param settings  the case, as it was read
 *  @throws whatever `simulate` throws */
export function answerOf(settings: Case, request: Request, simulate: Simulate): Answer {
  const there = alongPath(atDensity(settings, request.density), request.path, request.polarity);
  return request.kind === 'lag' ? lagOf(there, request, simulate) : holdOffOf(withYields(there, request.yields), request, simulate);
}

/** Closes in on the voltage at which the gap ceases to hold: from the expected stretch outwards until one end holds and the other breaks down, then halving. */
function holdOffOf(gap: Case, { expected, spread, polarity }: HoldOffRequest, simulate: Simulate): HoldOffAnswer {
  let runs = 0;
  const holds = (voltage: number): boolean => {
    const answer = decided(gap, polarity * voltage, simulate);
    runs += answer.runs;
    return answer.holds;
  };
  let lower: number | null = null;
  let upper: number | null = null;
  let [below, above] = [expected * Math.exp(-spread / 2), expected * Math.exp(spread / 2)];
  for (let step = spread; lower === null && below > expected / FURTHEST; step *= 3, below *= Math.exp(-step)) {
    if (holds(below)) lower = below;
    else upper = below;
  }
  for (let step = spread; upper === null && above < expected * FURTHEST; step *= 3, above *= Math.exp(step)) {
    if (holds(above)) lower = above;
    else upper = above;
  }
  while (lower !== null && upper !== null && Math.log(upper / lower) > HOLD_OFF_TOLERANCE * 1.001) {
    const middle = Math.sqrt(lower * upper);
    if (holds(middle)) lower = middle;
    else upper = middle;
  }
  return { kind: 'hold-off', lower, upper, runs };
}

/** Whether the gap holds when its programme reaches a voltage. A discharge that sustains itself without having settled does not hold; a run that is still
 *  undecided when it has been given its time does not either. */
function decided(gap: Case, voltage: number, simulate: Simulate): { readonly holds: boolean; readonly runs: number } {
  const driven = scaled(gap, Math.abs(voltage));
  let until = programmeEnds(driven) + CHARGING_TIMES * chargingTime(driven) + LAGS * slowestLag(gap, voltage);
  for (let runs = 1; ; runs++, until *= 5) {
    const { verdict } = simulate({ ...driven, observe: { ...driven.observe, until } });
    if (verdict.state !== 'undecided' || verdict.self_sustaining || runs > EXTENSIONS) return { holds: verdict.state === 'holds', runs };
  }
}

/** The longest lag that matters near a voltage [s]: by theory, just above it, or just above threshold where that is higher. */
function slowestLag(gap: Case, voltage: number): number {
  const sign = Math.sign(voltage);
  const threshold = limitsOf(gap, sign).threshold.breakdown ?? 0;
  const least = Math.max(Math.abs(voltage), threshold) * (1 + HOLD_OFF_TOLERANCE / 2);
  return timeToBreakdown(gap, sign * least) ?? IDLE_TRANSITS * (prospects(gap, voltage).ionTransit ?? 0);
}

/** The lag of a gap that is expected to break down, along one path. */
function lagOf(gap: Case, { voltage, polarity }: LagRequest, simulate: Simulate): LagAnswer {
  const driven = scaled(gap, voltage);
  const threshold = limitsOf(gap, polarity).threshold.breakdown ?? 0;
  // a gap charges past its threshold before the lag begins
  const charging = chargingTime(driven) * (voltage > threshold ? Math.log(voltage / (voltage - threshold)) : CHARGING_TIMES);
  let until = programmeEnds(driven) + 1.2 * Math.min(charging, CHARGING_TIMES * chargingTime(driven)) + LAGS * slowestLag(gap, polarity * voltage);
  for (let runs = 1; ; runs++, until *= 5) {
    const { verdict, onset } = simulate({ ...driven, observe: { ...driven.observe, until } });
    if (verdict.state !== 'undecided' || onset.formative_lag_s !== null || runs > EXTENSIONS) return { kind: 'lag', lag: onset.formative_lag_s, runs };
  }
}
