import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import type { WorkerMessage, WorkerStart } from './serve.ts';

/** Threads that do the same job on many tasks. What happens to one task, or to the thread that has it, is an answer; it does not end the rest. */
export interface Pool<Task, Result> {
  /** threads at most */
  readonly workers: number;
  /** Takes a task from `next` whenever a worker is free, until it gives none, and tells `settled` each answer as it comes, in any order. Tasks are
   *  taken only when a worker is there for them: as many as there are workers are in flight, or {@link PoolOptions.ahead} twice as many. May be called
   *  again when it has ended.
   *  After {@link Pool.interrupt} it ends once every task in flight has answered or was given up; those given up are not settled.
   *  @throws whatever `next` or `settled` throw, or Error when no worker can be started */
  run(next: () => Task | undefined, settled: (task: Task, answer: Answer<Result>) => void): Promise<void>;
  /** Takes no more tasks, asks those in flight to give up, and ends their workers where they do not within a second. For good. */
  interrupt(): void;
  /** Ends all workers. */
  close(): Promise<void>;
}

export type Answer<Result> =
  /** `seconds`: what the task took in its worker */
  | { readonly ok: true; readonly result: Result; readonly seconds: number }
  /** the task could not be done: its worker died twice of it, or the program has a fault */
  | { readonly ok: false; readonly error: PoolError };

export interface PoolError {
  readonly code: 'out-of-memory' | 'worker-died' | 'internal-fault';
  /** one sentence */
  readonly text: string;
}

export interface PoolOptions {
  /** name of a job that the script serves */
  readonly job: string;
  /** what the job is prepared with: anything that can be cloned */
  readonly setup: unknown;
  /** default: all cores */
  readonly workers?: number;
  /** default: the program's own worker, `worker.js` beside this module once it is built; see `jobs.ts` */
  readonly script?: URL;
  /** [MB] of JavaScript objects a worker may hold (a run needs less than 100) */
  readonly memory?: number;
  /** [s] a worker whose last task took less is given the next one before it asks, so that it need not wait for this thread; default: never */
  readonly ahead?: number;
}

const MEMORY = 1024;
/** [ms] for tasks in flight to give up */
const GRACE = 1000;

/** A pool; threads are started when there are tasks for them. */
export function createPool<Task, Result>(options: PoolOptions): Pool<Task, Result> {
  return new ThreadPool<Task, Result>(options);
}

/** How many workers a pool has if nobody says. */
export function defaultWorkers(): number {
  return availableParallelism();
}

interface Given<Task> {
  readonly value: Task;
  readonly attempt: number;
}

interface Member<Task> {
  readonly thread: Worker;
  ready: boolean;
  /** given to it and not answered: the first is at work, another waits */
  readonly tasks: Given<Task>[];
  /** tasks it may have */
  room: 1 | 2;
  /** why the thread ended, as far as it said */
  cause: unknown;
}

/** One call of `run`. */
interface Round<Task, Result> {
  readonly next: () => Task | undefined;
  readonly settled: (task: Task, answer: Answer<Result>) => void;
  readonly resolve: () => void;
  readonly reject: (reason: unknown) => void;
  exhausted: boolean;
}

class ThreadPool<Task, Result> implements Pool<Task, Result> {
  readonly workers: number;
  readonly #options: PoolOptions;
  readonly #flag = new SharedArrayBuffer(4);
  readonly #members = new Set<Member<Task>>();
  /** tasks whose worker died, for one more attempt */
  readonly #again: Given<Task>[] = [];
  #round: Round<Task, Result> | null = null;
  #interrupted = false;
  #grace: NodeJS.Timeout | undefined;

  constructor(options: PoolOptions) {
    this.#options = options;
    this.workers = Math.max(1, options.workers ?? defaultWorkers());
  }

  run(next: () => Task | undefined, settled: (task: Task, answer: Answer<Result>) => void): Promise<void> {
    if (this.#round !== null) throw new Error('the pool is at work');
    return new Promise<void>((resolve, reject) => {
      this.#round = { next, settled, resolve, reject, exhausted: false };
      this.#feed();
    });
  }

  interrupt(): void {
    if (this.#interrupted) return;
    this.#interrupted = true;
    Atomics.store(new Int32Array(this.#flag), 0, 1);
    this.#grace = setTimeout(() => {
      for (const { thread } of this.#members) void thread.terminate();
    }, GRACE);
    this.#feed();
  }

  async close(): Promise<void> {
    clearTimeout(this.#grace);
    this.#interrupted = true;
    const threads = [...this.#members].map(({ thread }) => thread);
    this.#members.clear();
    await Promise.all(threads.map((thread) => thread.terminate()));
  }

  /** Gives every free worker a task, starts workers while there are tasks, and ends the round when nothing is left. */
  #feed(): void {
    const round = this.#round;
    if (round === null) return;
    try {
      this.#fill(round, 1);
      while (this.#members.size < this.workers) {
        const task = this.#take(round);
        if (task === null) break;
        this.#start(task);
      }
      this.#fill(round, 2);
    } catch (thrown) {
      this.#end(round, thrown);
      return;
    }
    if ((round.exhausted || this.#interrupted) && [...this.#members].every(({ tasks }) => tasks.length === 0)) this.#end(round);
  }

  /** Gives workers that are ready so many tasks, as far as they have room. */
  #fill(round: Round<Task, Result>, count: number): void {
    for (const { ready, tasks, room, thread } of this.#members) {
      if (!ready || tasks.length >= Math.min(room, count)) continue;
      const task = this.#take(round);
      if (task === null) return;
      tasks.push(task);
      thread.postMessage(task.value);
    }
  }

  #take(round: Round<Task, Result>): Given<Task> | null {
    if (this.#interrupted) return null;
    const again = this.#again.shift();
    if (again !== undefined) return again;
    if (round.exhausted) return null;
    const value = round.next();
    if (value === undefined) {
      round.exhausted = true;
      return null;
    }
    return { value, attempt: 1 };
  }

  #start(task: Given<Task>): void {
    const { job, setup, script = new URL('./worker.js', import.meta.url), memory = MEMORY } = this.#options;
    const start: WorkerStart = { job, setup, flag: this.#flag };
    const thread = new Worker(script, { workerData: start, resourceLimits: { maxOldGenerationSizeMb: memory }, execArgv: [] });
    const member: Member<Task> = { thread, ready: false, tasks: [task], room: 1, cause: undefined };
    this.#members.add(member);
    thread.on('message', (message: WorkerMessage) => this.#hear(member, message));
    thread.on('error', (cause) => {
      member.cause = cause ?? 'nothing';
    });
    thread.on('exit', (code) => this.#lose(member, code));
    // waits there until the thread is ready
    thread.postMessage(task.value);
  }

  #hear(member: Member<Task>, message: WorkerMessage): void {
    if (message.kind === 'ready') {
      member.ready = true;
      return;
    }
    const task = member.tasks.shift();
    if (task !== undefined && message.kind === 'done') {
      member.room = message.seconds < (this.#options.ahead ?? 0) ? 2 : 1;
      this.#settle(task.value, { ok: true, result: message.result as Result, seconds: message.seconds });
    }
    if (task !== undefined && message.kind === 'fault') {
      // the same again would fail the same way
      this.#settle(task.value, { ok: false, error: { code: 'internal-fault', text: message.text } });
    }
    this.#feed();
  }

  /** A thread has ended, whatever the reason: its task gets one more attempt in another; one that only waited has lost nothing. */
  #lose(member: Member<Task>, exitCode: number): void {
    if (!this.#members.delete(member)) return;
    const { cause, ready } = member;
    const [task, ...waiting] = member.tasks;
    if (!ready && !this.#interrupted && this.#round !== null) {
      this.#end(this.#round, new Error(`a worker could not be started: ${causeText(cause, exitCode)}`));
      return;
    }
    if (task !== undefined && !this.#interrupted) {
      this.#again.push(...waiting);
      if (task.attempt === 1) this.#again.push({ value: task.value, attempt: 2 });
      else this.#settle(task.value, { ok: false, error: deathOf(cause, exitCode) });
    }
    this.#feed();
  }

  #settle(task: Task, answer: Answer<Result>): void {
    const round = this.#round;
    if (round === null) return;
    try {
      round.settled(task, answer);
    } catch (thrown) {
      this.#end(round, thrown);
    }
  }

  #end(round: Round<Task, Result>, ...failure: readonly unknown[]): void {
    if (this.#round !== round) return;
    this.#round = null;
    if (failure.length > 0) {
      // nobody waits for what is still in flight
      Atomics.store(new Int32Array(this.#flag), 0, 1);
      this.#interrupted = true;
      round.reject(failure[0]);
    } else round.resolve();
  }
}

function deathOf(cause: unknown, exitCode: number): PoolError {
  if ((cause as { code?: unknown } | undefined)?.code === 'ERR_WORKER_OUT_OF_MEMORY') {
    return { code: 'out-of-memory', text: 'its worker ran out of memory, twice' };
  }
  return { code: 'worker-died', text: `its worker died twice: ${causeText(cause, exitCode)}` };
}

function causeText(cause: unknown, exitCode: number): string {
  if (cause === undefined) return `it ended with exit code ${exitCode}`;
  const text = cause instanceof Error ? `${cause.name}: ${cause.message}` : `it threw ${String(cause)}`;
  return text.split('\n', 1)[0]?.slice(0, 200) ?? '';
}
