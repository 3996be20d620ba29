import { afterEach, describe, expect, test } from 'vitest';
import { type Answer, createPool, type Pool } from '../../src/scan/pool.ts';
import { bundledWorker } from './bundle.ts';
import type { Harm, Task } from './fault-worker.ts';

const script = bundledWorker('test/scan/fault-worker.ts');

let pools: Pool<Task, number>[] = [];
afterEach(async () => {
  await Promise.all(pools.map((pool) => pool.close()));
  pools = [];
});

function poolOf(workers = 2, job = 'square', memory = 1024, ahead = 0): Pool<Task, number> {
  const pool = createPool<Task, number>({ job, setup: { offset: 100 }, workers, script: script(), memory, ahead });
  pools.push(pool);
  return pool;
}

/** Runs tasks and collects their answers by `n`. */
async function answers(pool: Pool<Task, number>, tasks: readonly Task[]): Promise<Map<number, Answer<number>>> {
  const found = new Map<number, Answer<number>>();
  const source = tasks.values();
  await pool.run(
    () => source.next().value,
    ({ n }, answer) => {
      expect(found.has(n), `task ${n} is answered once`).toBe(false);
      found.set(n, answer);
    },
  );
  return found;
}

const plain = (count: number, from = 0): Task[] => Array.from({ length: count }, (_, i) => ({ n: from + i }));

describe('a pool', () => {
  test('answers every task once, whatever the number of workers', async () => {
    for (const workers of [1, 3]) {
      const found = await answers(poolOf(workers), plain(50));
      expect(found.size).toBe(50);
      for (const [n, answer] of found) expect(answer).toMatchObject({ ok: true, result: n * n + 100 });
    }
  });

  test('may be asked again, and keeps its threads', async () => {
    const pool = poolOf();
    expect((await answers(pool, plain(3))).size).toBe(3);
    expect((await answers(pool, plain(4, 10))).size).toBe(4);
    expect((await answers(pool, [])).size).toBe(0);
  });

  // as many are in flight as there are workers, or twice as many: one less before each is taken
  test.each([
    ['takes a task only when a worker is there for it', 2, 0, 1],
    ['takes one more for each worker, ahead, where tasks are quick', 1, 60, 1],
  ])('%s', async (_, workers, ahead, inFlight) => {
    const pool = poolOf(workers, 'square', 1024, ahead);
    let [taken, settled, most] = [0, 0, 0];
    await pool.run(
      () => {
        if (taken === 200) return undefined;
        most = Math.max(most, taken - settled);
        return { n: taken++ };
      },
      () => {
        settled++;
      },
    );
    expect(settled).toBe(200);
    expect(most).toBe(inFlight);
  });

  test('ends with what its caller throws', async () => {
    const full = new Error('the disk is full');
    await expect(
      poolOf().run(
        () => ({ n: 1 }),
        () => {
          throw full;
        },
      ),
    ).rejects.toBe(full);
    await expect(
      poolOf().run(
        () => {
          throw full;
        },
        () => {},
      ),
    ).rejects.toBe(full);
  });

  test('says so when no worker can be started', async () => {
    await expect(answers(poolOf(2, 'broken'), plain(3))).rejects.toThrow(/^a worker could not be started: Error: cannot begin$/);
    await expect(answers(poolOf(2, 'no such job'), plain(3))).rejects.toThrow(/could not be started.*no job/);
  });
});

describe('a worker that dies', () => {
  const deaths: readonly (readonly [harm: Harm, code: string, text: RegExp])[] = [
    ['exit', 'worker-died', /died twice: it ended with exit code 5/],
    ['memory', 'out-of-memory', /ran out of memory, twice/],
    ['throw-null', 'worker-died', /died twice: it threw nothing/],
    ['throw-later', 'worker-died', /died twice: it threw late/],
  ];

  test.each(deaths)('by %s is replaced: its task is tried again, then recorded, and all others are done', async (harm, code, text) => {
    const tasks: Task[] = plain(12);
    tasks[3] = { n: 3, harm };
    const found = await answers(poolOf(2, 'square', 32), tasks);
    expect(found.size).toBe(12);
    for (const [n, answer] of found) if (n !== 3) expect(answer).toMatchObject({ ok: true, result: n * n + 100 });
    expect(found.get(3)).toMatchObject({ ok: false, error: { code, text: expect.stringMatching(text) } });
  });

  test('does not harm the task that waited behind: it is done as if nothing had been', async () => {
    const tasks = Array.from({ length: 40 }, (_, n) => (n % 4 === 2 ? { n, harm: 'exit' as const } : { n }));
    const found = await answers(poolOf(2, 'square', 1024, 60), tasks);
    expect(found.size).toBe(40);
    for (const [n, answer] of found) expect(answer.ok, `task ${n}`).toBe(n % 4 !== 2);
  });

  test('once only costs nothing but the attempt', async () => {
    const once = new SharedArrayBuffer(4);
    const found = await answers(poolOf(1), [{ n: 0 }, { n: 1, harm: 'exit', once }, { n: 2 }]);
    expect([0, 1, 2].map((n) => found.get(n)?.ok)).toEqual([true, true, true]);
    expect(new Int32Array(once)[0]).toBe(2);
  });

  test('again and again, one for each task, ends all the same', async () => {
    const found = await answers(
      poolOf(2),
      Array.from({ length: 6 }, (_, n) => ({ n, harm: 'exit' as const })),
    );
    expect([...found.values()].every((answer) => !answer.ok)).toBe(true);
    expect(found.size).toBe(6);
  });
});

test('an Error thrown by a job is recorded at once: the same again would fail the same way', async () => {
  const once = new SharedArrayBuffer(4);
  const found = await answers(poolOf(1), [{ n: 0, harm: 'error', once }, { n: 1 }]);
  expect(found.get(0)).toEqual({ ok: false, error: { code: 'internal-fault', text: 'TypeError: a fault of the program' } });
  expect(found.get(1)).toMatchObject({ ok: true });
  expect(new Int32Array(once)[0]).toBe(1);
});

describe('an interruption', () => {
  test('ends at once when tasks give up; what was given up is not settled', async () => {
    const pool = poolOf(2);
    const done: number[] = [];
    let n = 0;
    const run = pool.run(
      () => (n < 4 ? { n: n++ } : { n: n++, harm: 'spin' }),
      (task) => done.push(task.n),
    );
    while (done.length < 4) await new Promise((resume) => setTimeout(resume, 5));
    const start = performance.now();
    pool.interrupt();
    await run;
    expect(performance.now() - start).toBeLessThan(900);
    expect(done.sort()).toEqual([0, 1, 2, 3]);
  });

  test('ends workers that do not listen, about a second later', async () => {
    const pool = poolOf(2);
    let n = 0;
    const run = pool.run(
      () => ({ n: n++, harm: 'stubborn' }),
      () => {},
    );
    await new Promise((resume) => setTimeout(resume, 300));
    const start = performance.now();
    pool.interrupt();
    await run;
    expect(performance.now() - start).toBeGreaterThan(900);
    expect(performance.now() - start).toBeLessThan(3000);
  });
});
