import type { Shard } from './plan.ts';
import { shareOf, spread } from './plan.ts';
import type { PointResult } from './point-job.ts';
import { createPool } from './pool.ts';
import { pointId, pointIdWithoutCase, type Study } from './study.ts';

/** What a scan would be: nothing is written. */
export interface Preview {
  /** points of the plan, and of the share that is asked for */
  readonly total: number;
  readonly count: number;
  readonly shard: Shard | null;
  readonly workers: number;
  readonly first: readonly { readonly index: number; readonly id: string; readonly values: readonly number[] }[];
  readonly pilot: Pilot;
  /** [s] of wall time for all of it with these workers; null when no point of the pilot came to its end */
  readonly estimate: number | null;
}

/** A few points, computed to see how long they take. */
export interface Pilot {
  readonly points: number;
  /** of these, not finished when the pilot's time was over */
  readonly unfinished: number;
  readonly failed: number;
  /** [s] a point takes in its worker; null when none finished */
  readonly mean: number | null;
  readonly least: number | null;
  readonly largest: number | null;
}

const FIRST = 5;
const FEWEST_PILOTS = 8;
/** [ms] after which the pilot ends, whatever is finished */
const LONGEST_PILOT = 20_000;
/** [ms] until which compiling is a large part of what points take, and passes that are enough */
const WARM_UP = 2000;
const MOST_PASSES = 5;

/** Counts a scan's points, names the first and computes a few spread over the plan. The first points of a worker take several times as long as later ones,
 *  because its code is not yet compiled: a quick pilot is repeated, and its last pass counts. */
export async function preview(
  study: Study,
  shard: Shard | null,
  options: { readonly workers?: number; readonly script?: URL; readonly stop: AbortSignal },
): Promise<Preview> {
  const { plan } = study;
  const share = shareOf(plan, shard);
  const pool = createPool<number, PointResult>({
    job: 'scan-point',
    setup: study.source,
    ...(options.workers === undefined ? {} : { workers: options.workers }),
    ...(options.script === undefined ? {} : { script: options.script }),
  });
  const positions = spread(share, Math.max(FEWEST_PILOTS, 2 * pool.workers));
  let seconds: number[] = [];
  let failed = 0;
  const pass = async (): Promise<void> => {
    const indices = positions.map((position) => share.indexAt(position)).values();
    seconds = [];
    failed = 0;
    await pool.run(
      () => indices.next().value,
      (_, answer) => {
        if (!answer.ok || answer.result.failed) failed++;
        if (answer.ok) seconds.push(answer.seconds);
      },
    );
  };
  const interrupt = (): void => pool.interrupt();
  const timeOver = setTimeout(interrupt, LONGEST_PILOT);
  options.stop.addEventListener('abort', interrupt);
  try {
    const start = performance.now();
    for (let passes = 0; passes < MOST_PASSES && (passes === 0 || performance.now() - start < WARM_UP); passes++) await pass();
  } finally {
    clearTimeout(timeOver);
    options.stop.removeEventListener('abort', interrupt);
    await pool.close();
  }
  const mean = seconds.length === 0 ? null : seconds.reduce((sum, each) => sum + each, 0) / seconds.length;
  return {
    total: plan.count,
    count: share.count,
    shard,
    workers: pool.workers,
    first: Array.from({ length: Math.min(FIRST, share.count) }, (_, position) => {
      const index = share.indexAt(position);
      const values = plan.values(index);
      const read = study.at(values);
      return { index, id: read.ok ? pointId(read.case, plan.find) : pointIdWithoutCase(study, values), values };
    }),
    pilot: {
      points: positions.length,
      unfinished: positions.length - seconds.length,
      failed,
      mean,
      least: seconds.length === 0 ? null : Math.min(...seconds),
      largest: seconds.length === 0 ? null : Math.max(...seconds),
    },
    estimate: mean === null ? null : (mean * share.count) / Math.min(pool.workers, share.count),
  };
}
