import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';
import { seconds } from '../onset/words.ts';
import type { SimulationFailure } from '../simulate.ts';
import type { Found, SearchRange, Simulate } from './found.ts';
import { lowestChange, type Result } from './lowest-change.ts';
import type { Measure } from './narrow.ts';
import { capacitanceOf } from './open-gap.ts';
import { changesOf, failed, inItsOwnWords, type Judgement, Runs } from './runs.ts';
import { sweepPoints } from './sweep.ts';

/** The coarse sweep: neighbours at most a decade apart, with at most so many points. */
const SWEEP_RATIO = 10;
const SWEEP_POINTS = 12;

/** Trip delay: the longest that keeps the energy into the gap below `gapEnergy`, below the lowest change. `value` and `lower` stayed
 *  below it, `upper` reached it.
 *
 *  What counts is the energy of the whole discharge. A run that ends before its trip has acted has not shown all of it; one that ends
 *  after it, with charge left across the gap, counts as staying below if the energy so stored cannot make up the difference. A
 *  discharge that stands without tripping reaches any energy. No closed form: `theory` is null.
 *
 *  @param range [s] with `gapEnergy` [J]
 *  @throws SimulationFailure when every run failed */
export function tripDelay(settings: Case, range: SearchRange & { readonly gapEnergy: number }, simulate: Simulate): Found {
  const { from, to, tolerance, gapEnergy } = range;
  const { trip } = settings.supply;
  if (trip === null) return found({ state: 'undecided', lower: null, upper: null, note: 'the case has no trip' }, 0, []);
  const runs = new Runs(
    {
      settings: (delay) => ({ ...settings, supply: { ...settings.supply, trip: { ...trip, delay } } }),
      judge: (outcome, derived, failure) => judge(outcome, derived, failure, gapEnergy),
    },
    simulate,
  );
  for (const delay of sweepPoints([from, to], SWEEP_RATIO, SWEEP_POINTS)) runs.at(delay);
  runs.refuseIfAllFailed();
  const changes = changesOf(runs.all);
  // a discharge with the trip pending takes a steady power
  const excess: Measure = ({ answer, outcome }) => (answer === 'undecided' ? null : outcome.energy.gap_J / gapEnergy - 1);
  return found(lowestChange(runs, tolerance, [excess], seconds), runs.made, changes);
}

function found(result: Result, runs: number, changes: Found['changes']): Found {
  const { state, lower, upper, note } = result;
  return {
    what: 'trip-delay',
    state,
    value: state === 'found' ? (lower?.value ?? null) : null,
    unit: 's',
    lower: lower?.value ?? null,
    upper: upper?.value ?? null,
    theory: null,
    runs,
    changes,
    note,
  };
}

function judge(outcome: Outcome, settings: Case, failure: SimulationFailure | null, gapEnergy: number): Judgement {
  const { energy, final, verdict } = outcome;
  if (energy.gap_J >= gapEnergy) return 'breaks-down';
  if (failure !== null) return failed(failure);
  if (verdict.state === 'holds' || final.stop === 'died-out' || final.stop === 'tripped-out') return 'holds';
  // a discharge that stands takes any energy in time: its trip will never act, or the run would not have ended
  if (final.stop === 'steady') return verdict.self_sustaining ? 'breaks-down' : 'holds';
  if (verdict.state === 'undecided') return inItsOwnWords(outcome);
  if (final.stop === 'until' && energy.after_trip_J !== null) {
    const stored = 0.5 * capacitanceOf(settings) * final.gap_voltage_V ** 2;
    return energy.gap_J + stored < gapEnergy ? 'holds' : { doubt: 'the run ends before the discharge does: extend observe.until' };
  }
  return { doubt: 'the run ends before the trip has acted and before the energy is reached' };
}
