import type { Case } from '../case.ts';
import { measureNode, type NodeGap } from '../kinetics/gap-response.ts';
import type { GapYield } from '../kinetics/gap-yield.ts';
import { collisionsOf } from '../kinetics/of-case.ts';
import { Abandoned, type Job } from './serve.ts';

/** A gap whose electrons are to be followed at several voltages. */
export interface GapSetup {
  readonly gas: Case['gas'];
  /** what a `NodeGap` holds beside its collisions */
  readonly gap: Omit<NodeGap, 'table'>;
}

export interface GapTask {
  readonly node: number;
  readonly particles: number;
}

/** Electrons of one voltage; what they give does not depend on the worker. */
export const gapJob: Job<GapSetup, GapTask, GapYield> = ({ gas, gap }) => {
  const prepared: NodeGap = { ...gap, table: collisionsOf({ gas }) };
  return ({ node, particles }, interrupted) => {
    if (interrupted()) throw new Abandoned();
    return measureNode(prepared, particles, node);
  };
};
