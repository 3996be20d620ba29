import type { Case } from '../case.ts';
import { measureNode, type NodeGap } from '../kinetics/gap-response.ts';
import type { GapYield } from '../kinetics/gap-yield.ts';
import { collisionsOf } from '../kinetics/of-case.ts';
import { type SingleElectrons, singleElectrons } from '../kinetics/single-electrons.ts';
import { Abandoned, type Job } from './serve.ts';

/** A gap whose electrons are to be followed at several voltages. */
export interface GapSetup {
  readonly gas: Case['gas'];
  /** what a `NodeGap` holds beside its collisions */
  readonly gap: Omit<NodeGap, 'table'>;
}

export type GapTask =
  /** many electrons at the voltage of a number */
  | { readonly kind: 'node'; readonly node: number; readonly particles: number }
  /** single ones at a voltage [V] */
  | { readonly kind: 'single'; readonly voltage: number; readonly emission: number };

export type GapAnswer = { readonly kind: 'node'; readonly found: GapYield } | { readonly kind: 'single'; readonly found: SingleElectrons };

/** Electrons of one voltage; what they give does not depend on the worker. */
export const gapJob: Job<GapSetup, GapTask, GapAnswer> = ({ gas, gap }) => {
  const prepared: NodeGap = { ...gap, table: collisionsOf({ gas }) };
  return (task, interrupted) => {
    if (interrupted()) throw new Abandoned();
    return task.kind === 'node'
      ? { kind: 'node', found: measureNode(prepared, task.particles, task.node) }
      : { kind: 'single', found: singleElectrons(prepared, task.voltage, task.emission) };
  };
};
