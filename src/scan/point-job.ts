import type { Case } from '../case.ts';
import { withDefaults } from '../onset/cautions/index.ts';
import type { Outcome } from '../onset/outcome.ts';
import type { PointError, ScanPoint } from '../results/scan-variables.ts';
import { search } from '../search/index.ts';
import { SimulationFailure, simulateNow } from '../simulate.ts';
import { Abandoned, type Job } from './serve.ts';
import { pointId, pointIdWithoutCase, type Study, type StudySource, studyFrom } from './study.ts';

/** What a worker hands back for a point. */
export interface PointResult {
  /** the {@link ScanPoint} as JSON: written as it is, never parsed on the way */
  readonly json: string;
  readonly failed: boolean;
}

/** Computes the points of a scan, each by its number in the plan. */
export const pointJob: Job<StudySource, number, PointResult> = (source) => {
  const study = studyFrom(source);
  return (index, interrupted) => {
    const point = pointOf(study, index, interrupted);
    return { json: JSON.stringify(point), failed: point.error !== null };
  };
};

function pointOf(study: Study, index: number, interrupted: () => boolean): ScanPoint {
  const { plan, at, defaults } = study;
  const values = plan.values(index);
  const read = at(values);
  if (!read.ok) {
    const text = read.problems.map(({ path, expected, found }) => `${path}: expected ${expected}, found ${found}`).join('; ');
    return { index, id: pointIdWithoutCase(study, values), values, outcome: null, error: { code: 'invalid-case', text }, found: null };
  }
  const settings = read.case;
  const simulate = (each: Case): Outcome => {
    const outcome = simulateNow(each, { interrupted });
    if (outcome.final.stop === 'interrupted') throw new Abandoned();
    return outcome;
  };
  const own = attempt(() => {
    const outcome = simulate(settings);
    return { ...outcome, cautions: withDefaults(outcome.cautions, settings, defaults) };
  });
  const { find } = plan;
  const found = find === null ? { value: null, error: null } : attempt(() => search(settings, find, simulate));
  return {
    index,
    id: pointId(settings, find),
    values,
    outcome: own.value,
    error: own.error ?? found.error,
    found: found.value,
  };
}

/** What cannot be completed is an answer too; everything else is a fault and passes. */
function attempt<T>(work: () => T): { readonly value: T | null; readonly error: PointError | null } {
  try {
    return { value: work(), error: null };
  } catch (thrown) {
    if (!(thrown instanceof SimulationFailure)) throw thrown;
    return { value: null, error: { code: 'simulation-failed', text: thrown.message } };
  }
}
