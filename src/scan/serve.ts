import { parentPort, workerData } from 'node:worker_threads';

/** What a worker does: prepared once, then called for each task.
 *  A job gives an answer for everything it foresees, failures included; what it throws is a fault of the program.
 *  @throws Abandoned when `interrupted` told it to give up: the task is then not settled */
export type Job<Setup, Task, Result> = (setup: Setup) => (task: Task, interrupted: () => boolean) => Result | Promise<Result>;

/** Thrown by a job that gave up because it was told to. */
export class Abandoned extends Error {
  override readonly name = 'Abandoned';
}

/** What a worker is started with. */
export interface WorkerStart {
  readonly job: string;
  readonly setup: unknown;
  /** one 32-bit integer; not 0: give up */
  readonly flag: SharedArrayBuffer;
}

/** What a worker says: it answers tasks one after the other, in the order in which they came. */
export type WorkerMessage =
  | { readonly kind: 'ready' }
  | { readonly kind: 'done'; readonly result: unknown; readonly seconds: number }
  | { readonly kind: 'fault'; readonly text: string }
  | { readonly kind: 'abandoned' };

/** The whole of a worker's script: does the job that the pool asks for. Jobs are loaded when they are asked for.
 *
 *  An Error thrown by a job is reported as a fault and the worker lives on. Anything else that is thrown is let through: it ends the worker, and
 *  the pool starts another. */
export function serve(jobs: Readonly<Record<string, () => Promise<Job<never, never, unknown>>>>): void {
  const port = parentPort;
  if (port === null) throw new Error('a worker script cannot be run by itself');
  const { job, setup, flag } = workerData as WorkerStart;
  const stop = new Int32Array(flag);
  const interrupted = (): boolean => Atomics.load(stop, 0) !== 0;
  const say = (message: WorkerMessage): void => port.postMessage(message);

  const begin = async (): Promise<void> => {
    const load = jobs[job];
    if (load === undefined) throw new Error(`no job ${job}`);
    const perform = (await load())(setup as never);
    const answer = async (task: unknown): Promise<void> => {
      const start = performance.now();
      try {
        const result = await perform(task as never, interrupted);
        say({ kind: 'done', result, seconds: (performance.now() - start) / 1000 });
      } catch (thrown) {
        if (thrown instanceof Abandoned) say({ kind: 'abandoned' });
        else if (thrown instanceof Error) say({ kind: 'fault', text: oneLine(thrown) });
        else throw thrown;
      }
    };
    let last = Promise.resolve();
    port.on('message', (task: unknown) => {
      last = last.then(() => answer(task));
      return last; // so that what it throws is uncaught, whatever it is
    });
    say({ kind: 'ready' });
  };
  // a rejection nobody handles ends the worker, with its cause
  void begin();
}

function oneLine(error: Error): string {
  return `${error.name}: ${error.message.split('\n', 1)[0]?.slice(0, 200) ?? ''}`;
}
