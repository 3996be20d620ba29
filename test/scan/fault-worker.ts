/** A worker that does harm on request: the script of no program, only of tests. */
import { type PointResult, pointJob } from '../../src/scan/point-job.ts';
import { Abandoned, type Job, serve } from '../../src/scan/serve.ts';
import type { StudySource } from '../../src/scan/study.ts';

export type Harm = 'exit' | 'memory' | 'throw-null' | 'throw-later' | 'error' | 'spin' | 'stubborn';

export interface Task {
  readonly n: number;
  readonly harm?: Harm;
  /** harm is done only while this counter is below 1; it counts every start */
  readonly once?: SharedArrayBuffer;
}

function doHarm(harm: Exclude<Harm, 'throw-later'>, interrupted: () => boolean): void {
  switch (harm) {
    case 'exit':
      process.exit(5);
      break;
    case 'memory': {
      const held: number[][] = [];
      for (;;) held.push(Array.from({ length: 1e5 }, (_, i) => i + Math.random()));
    }
    case 'throw-null':
      throw null;
    case 'error':
      throw new TypeError('a fault of the program');
    case 'spin':
      while (!interrupted());
      throw new Abandoned();
    case 'stubborn':
      for (;;);
  }
}

const square: Job<{ readonly offset: number }, Task, number> =
  ({ offset }) =>
  async ({ n, harm, once }, interrupted) => {
    const starts = once === undefined ? 0 : Atomics.add(new Int32Array(once), 0, 1);
    if (harm === 'throw-later') {
      // nobody awaits what throws here
      setImmediate(() => {
        throw 'late';
      });
      await new Promise<void>(() => {});
    } else if (harm !== undefined && starts === 0) doHarm(harm, interrupted);
    return n * n + offset;
  };

/** The real job, with harm at the points whose numbers are in the title of the case: `exit 3, memory 5`. */
const harmedPoint: Job<StudySource, number, PointResult> = (source) => {
  const perform = pointJob(source);
  const harms = new Map(
    [...source.text.matchAll(/(exit|memory|throw-null) (\d+)/g)].map(([, harm, index]) => [
      Number(index),
      harm as 'exit' | 'memory' | 'throw-null',
    ]),
  );
  return (index, interrupted) => {
    const harm = harms.get(index);
    if (harm !== undefined) doHarm(harm, interrupted);
    return perform(index, interrupted);
  };
};

serve({
  square: async () => square,
  broken: async () => () => {
    throw new Error('cannot begin');
  },
  'scan-point': async () => harmedPoint,
});
