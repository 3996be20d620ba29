/** Windows computed by workers: any number of them, interrupted and resumed, with the same bytes at the end. */
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, onTestFinished, test } from 'vitest';
import { runWindow, type WindowEnd, type WindowProgress, type WindowRequest } from '../../src/scan/window-session.ts';
import { VERSION } from '../../src/version.ts';
import { bundledWorker } from '../scan/bundle.ts';
import { climbing, outcomeOf, readWindow } from './cases.ts';

const script = bundledWorker('test/scan/worker.ts');
const never = (): AbortSignal => new AbortController().signal;
const texts = { caseText: 'title: Climbing\n', coefficientsJson: '[]', tablesJson: '[]' };

function folder(): string {
  const path = mkdtempSync(join(tmpdir(), 'gapwake-window-'));
  onTestFinished(() => rmSync(path, { recursive: true, force: true }));
  return path;
}

const request = (path: string, more: Partial<WindowRequest> = {}, text = climbing()): WindowRequest => ({
  ...readWindow(text),
  path,
  restart: false,
  workers: 2,
  script: script(),
  texts,
  ...more,
});

async function complete(end: Promise<WindowEnd>): Promise<Extract<WindowEnd, { kind: 'complete' }>> {
  const found = await end;
  if (found.kind !== 'complete') throw new Error(`interrupted after ${found.done}`);
  return found;
}

/** Follows until so many answers are there and then stops. */
async function stoppedAfter(answers: number, what: WindowRequest): Promise<WindowEnd> {
  const stop = new AbortController();
  return runWindow(what, {
    stop: stop.signal,
    progress: ({ done }: WindowProgress) => {
      if (done >= answers) stop.abort();
    },
  });
}

describe('a window', () => {
  test('has the same bytes with 1 and 2 workers, and those of simulations made here', async () => {
    const at = folder();
    const [one, two] = await Promise.all(
      [1, 2].map((workers) => complete(runWindow(request(join(at, `${workers}.h5`), { workers }), { stop: never() }))),
    );
    expect(two.file.outcomeJson).toBe(one.file.outcomeJson);
    const here = { ...(await outcomeOf(climbing())), version: VERSION };
    expect(JSON.stringify(one.file.outcome)).toBe(JSON.stringify(here));
    expect(one.file.outcome.windows.map(({ state }) => state)).toContain('breaks-down');
    expect(readdirSync(at).sort()).toEqual(['1.h5', '2.h5']);
  }, 120_000);

  test('that was stopped, again and again, recomputes nothing and ends in the same bytes', async () => {
    const at = folder();
    const whole = await complete(runWindow(request(join(at, 'whole.h5')), { stop: never() }));
    const path = join(at, 'broken.h5');
    let before: string[] = [];
    for (const answers of [1, 5, 9, 20]) {
      const end = await stoppedAfter(answers, request(path));
      if (end.kind === 'complete') break;
      expect(existsSync(path)).toBe(false);
      const lines = readFileSync(end.journalPath, 'utf8').split('\n').slice(1, -1);
      expect(lines.slice(0, before.length)).toEqual(before);
      expect(new Set(lines.map((line) => line.split(' ')[1])).size).toBe(lines.length);
      expect(lines.length).toBe(end.done);
      before = lines;
    }
    expect(before.length).toBeGreaterThan(8);
    const end = await complete(runWindow(request(path), { stop: never() }));
    expect(end.computed + before.length).toBe(whole.computed);
    expect(end.file.outcomeJson).toBe(whole.file.outcomeJson);
    expect(readdirSync(at).sort()).toEqual(['broken.h5', 'whole.h5']);
  }, 120_000);

  test('that is complete is answered from as it stands; --restart computes it again', async () => {
    const path = join(folder(), 'a.h5');
    const first = await complete(runWindow(request(path), { stop: never() }));
    const again = await complete(runWindow(request(path), { stop: never() }));
    expect(again.computed).toBe(0);
    expect(again.file.outcomeJson).toBe(first.file.outcomeJson);
    const anew = await complete(runWindow(request(path, { restart: true }), { stop: never() }));
    expect(anew.computed).toBe(first.computed);
    expect(anew.file.outcomeJson).toBe(first.file.outcomeJson);
  }, 120_000);

  test('of another case is refused while unfinished answers lie in its place', async () => {
    const path = join(folder(), 'a.h5');
    const end = await stoppedAfter(2, request(path));
    expect(end.kind).toBe('interrupted');
    const other = request(path, {}, climbing('voltage: 250 V'));
    await expect(runWindow(other, { stop: never() })).rejects.toMatchObject({
      code: 'other-study',
      message: expect.stringMatching(/--restart/),
    });
    const anew = await complete(runWindow({ ...other, restart: true }, { stop: never() }));
    expect(anew.file.outcome.worst?.supply_V).toBe(250);
  }, 120_000);

  test('does not replace a file that is no result', async () => {
    const path = join(folder(), 'a.h5');
    writeFileSync(path, 'precious');
    await expect(runWindow(request(path), { stop: never() })).rejects.toMatchObject({ code: 'foreign' });
    expect(readFileSync(path, 'utf8')).toBe('precious');
  });
});
