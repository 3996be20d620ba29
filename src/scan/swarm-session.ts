import { crossSectionSets } from '../kinetics/sets.ts';
import { type BatchSums, combine, type NoPlan, type SwarmPlan, type SwarmPoint, swarmGas } from '../kinetics/swarm.ts';
import { setOfUser } from '../kinetics/user-set.ts';
import { createPool, type Pool } from './pool.ts';
import type { SwarmAnswer, SwarmSetup, SwarmTask } from './swarm-job.ts';

export interface SwarmRequest {
  readonly setup: SwarmSetup;
  /** E/N [V m²], above 0 */
  readonly fields: readonly number[];
  /** relative standard error wanted of mean energy and flux drift; twice that of α, four times that of diffusion */
  readonly accuracy: number;
  readonly workers?: number;
}

export interface SwarmWatch {
  readonly stop: AbortSignal;
  /** after every batch: points that are done, and of how many */
  progress?(done: number, total: number): void;
}

/** A point, or why there is none. */
export type SwarmResult =
  /** `accurate`: whether the accuracy asked for was reached */
  { readonly kind: 'point'; readonly point: SwarmPoint; readonly accurate: boolean } | NoPlan;

export type SwarmEnd =
  | { readonly kind: 'complete'; readonly results: readonly SwarmResult[] }
  | { readonly kind: 'interrupted'; readonly done: number };

/** Batches that a point starts with: fewer would make the error itself uncertain; and steps in which more are added. */
const FIRST = 16;
const STEP = 8;
/** times as many batches in one step of refining: their error is not known well enough for more */
const GROWTH = 4;
const MOST = 512;
/** flights of a batch at an accuracy of 0.5 %; coarser needs fewer */
const BATCH_FLIGHTS = 2e6;
const LEAST_FLIGHTS = 2e5;
/** flights of one point, real and null: a minute or so of one core */
const MOST_FLIGHTS = 6e8;

interface Work {
  readonly field: number;
  plan: SwarmPlan | NoPlan | null;
  readonly batches: BatchSums[];
  wanted: number;
  point: SwarmPoint | null;
  accurate: boolean;
}

/** Computes swarms in rounds: a pilot for every point, some batches, and more of them where the error is too large. How many, and their random numbers,
 *  depend on nothing but the request: the same answer for any number of workers.
 *  @throws Error when a worker fails */
export async function runSwarm({ setup, fields, accuracy, workers }: SwarmRequest, watch: SwarmWatch): Promise<SwarmEnd> {
  const gas = swarmGas(
    'own' in setup.gas ? setOfUser(setup.gas.own) : crossSectionSets[setup.gas.builtIn],
    setup.temperature,
    setup.angular,
  );
  const flights = Math.min(BATCH_FLIGHTS, Math.max(LEAST_FLIGHTS, (BATCH_FLIGHTS * 0.005) / accuracy));
  const pool = createPool<SwarmTask, SwarmAnswer>({ job: 'swarm', setup, ...(workers === undefined ? {} : { workers }) });
  const stop = (): void => pool.interrupt();
  watch.stop.addEventListener('abort', stop);
  const works: Work[] = fields.map((field) => ({ field, plan: null, batches: [], wanted: FIRST, point: null, accurate: false }));
  const done = (): number => works.filter(({ plan, point }) => point !== null || (plan !== null && plan.kind !== 'plan')).length;
  try {
    await round(pool, works, (work, point) => (work.plan === null ? [{ point, reducedField: work.field, flights, batch: null }] : []));
    for (;;) {
      if (watch.stop.aborted) return { kind: 'interrupted', done: done() };
      watch.progress?.(done(), works.length);
      const open = works.filter((work) => work.plan?.kind === 'plan' && work.point === null);
      if (open.length === 0) break;
      await round(
        pool,
        works,
        (work, point) => {
          const { plan } = work;
          if (plan?.kind !== 'plan' || work.point !== null) return [];
          return Array.from({ length: work.wanted - work.batches.length }, (_, k) => ({
            point,
            reducedField: work.field,
            flights,
            batch: { number: work.batches.length + k, plan },
          }));
        },
        () => watch.progress?.(done(), works.length),
      );
      if (watch.stop.aborted) continue;
      for (const work of open) {
        if (work.plan?.kind !== 'plan') continue;
        const point = combine(gas, work.field, work.plan, work.batches);
        const more = batchesFor(point, work.plan, accuracy);
        if (more <= work.batches.length) {
          work.point = point;
          work.accurate = true;
          continue;
        }
        const affordable = Math.floor(MOST_FLIGHTS / (point.flights / point.batches) / STEP) * STEP;
        work.wanted = Math.min(more, GROWTH * work.batches.length, MOST, affordable);
        if (work.wanted <= work.batches.length) work.point = point;
      }
    }
  } finally {
    watch.stop.removeEventListener('abort', stop);
    await pool.close();
  }
  return {
    kind: 'complete',
    results: works.map(({ plan, point, accurate }) => {
      if (point !== null) return { kind: 'point', point, accurate };
      if (plan === null || plan.kind === 'plan') throw new Error('a point was left undone');
      return plan;
    }),
  };
}

/** Hands tasks to the pool and puts their answers where they belong, by number and not by time. */
async function round(
  pool: Pool<SwarmTask, SwarmAnswer>,
  works: readonly Work[],
  tasksOf: (work: Work, point: number) => SwarmTask[],
  heard?: () => void,
): Promise<void> {
  const tasks = works.flatMap(tasksOf);
  let next = 0;
  await pool.run(
    () => tasks[next++],
    ({ point, batch }, answer) => {
      if (!answer.ok) throw new Error(answer.error.text);
      const { result } = answer;
      if (result.kind === 'pilot') works[point].plan = result.plan;
      else if (batch !== null) works[point].batches[batch.number] = result.sums;
      heard?.();
    },
  );
}

/** How many batches a point would need, by the errors it has; a multiple of the step. */
function batchesFor(point: SwarmPoint, plan: SwarmPlan, accuracy: number): number {
  const wishes = [
    [point.meanEnergy, 1],
    [point.fluxDrift, 1],
    [point.transverseDiffusion, 4],
    [point.longitudinalDiffusion, 4],
    ...(plan.changes ? ([[point.ionisation.value > point.attachment.value ? point.ionisation : point.attachment, 2]] as const) : []),
  ] as const;
  const excess = Math.max(...wishes.map(([{ value, error }, times]) => error / Math.abs(value) / (times * accuracy)));
  if (!(excess > 1)) return point.batches;
  return Math.ceil((point.batches * excess ** 2 * 1.1) / STEP) * STEP;
}
