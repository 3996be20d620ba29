import type { Angular } from '../kinetics/scattering.ts';
import { crossSectionSets } from '../kinetics/sets.ts';
import { type BatchSums, batchOf, type NoPlan, pilotOf, type SwarmPlan, swarmGas } from '../kinetics/swarm.ts';
import { setOfUser, type UserSet } from '../kinetics/user-set.ts';
import { Abandoned, type Job } from './serve.ts';

/** Which gas the electrons are in: what a worker is prepared with. */
export interface SwarmSetup {
  readonly gas: { readonly builtIn: string } | { readonly own: UserSet };
  /** [K] */
  readonly temperature: number;
  readonly angular: Angular;
  readonly seed: number;
}

/** A pilot, or one batch of what it planned. `point` tells its random numbers from those of other points. */
export interface SwarmTask {
  readonly point: number;
  /** E/N [V m²] */
  readonly reducedField: number;
  /** of a batch, about */
  readonly flights: number;
  readonly batch: { readonly number: number; readonly plan: SwarmPlan } | null;
}

export type SwarmAnswer =
  | { readonly kind: 'pilot'; readonly plan: SwarmPlan | NoPlan }
  | { readonly kind: 'batch'; readonly sums: BatchSums };

/** Pilots and batches of swarms; what they give does not depend on the worker. */
export const swarmJob: Job<SwarmSetup, SwarmTask, SwarmAnswer> = ({ gas, temperature, angular, seed }) => {
  const prepared = swarmGas('own' in gas ? setOfUser(gas.own) : crossSectionSets[gas.builtIn], temperature, angular);
  return ({ point, reducedField, flights, batch }, interrupted) => {
    if (interrupted()) throw new Abandoned();
    if (batch === null) return { kind: 'pilot', plan: pilotOf(prepared, reducedField, seed, point, flights) };
    const sums = batchOf(prepared, reducedField, batch.plan, seed, point, batch.number, interrupted);
    if (sums === null) throw new Abandoned();
    return { kind: 'batch', sums };
  };
};
