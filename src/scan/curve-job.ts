import type { Case } from '../case.ts';
import { type CurvePoint, curvePointOf } from '../theory/kinetic.ts';
import { Abandoned, type Job } from './serve.ts';

/** A point of a breakdown curve: the density as a multiple of the case's. */
export interface CurveTask {
  readonly multiple: number;
}

/** Points of the breakdown curve of a case by particles; what they give does not depend on the worker. */
export const curveJob: Job<Case, CurveTask, CurvePoint> =
  (settings) =>
  ({ multiple }, interrupted) => {
    if (interrupted()) throw new Abandoned();
    return curvePointOf(settings, multiple);
  };
