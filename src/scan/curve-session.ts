import type { Case } from '../case.ts';
import type { CurvePoint } from '../theory/kinetic.ts';
import type { CurveTask } from './curve-job.ts';
import { createPool } from './pool.ts';

/** Densities at which the breakdown curve is computed, as multiples of the case's. */
const MULTIPLES = [1 / 8, 1 / 4, 1 / 2, 1 / Math.SQRT2, 1, Math.SQRT2, 2, 4, 8];

/** The breakdown curve of a case with kinetic electrons around its own density, on all cores; points rise with the density.
 *  @throws Error when a worker fails */
export async function breakdownCurve(settings: Case): Promise<CurvePoint[]> {
  const pool = createPool<CurveTask, CurvePoint>({ job: 'breakdown-curve', setup: settings });
  // the densest take longest
  const tasks: CurveTask[] = MULTIPLES.toReversed().map((multiple) => ({ multiple }));
  const points: CurvePoint[] = [];
  let next = 0;
  try {
    await pool.run(
      () => tasks[next++],
      (_, answer) => {
        if (!answer.ok) throw new Error(answer.error.text);
        points.push(answer.result);
      },
    );
  } finally {
    await pool.close();
  }
  return points.sort((a, b) => a.pd_Pa_m - b.pd_Pa_m);
}
