import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, onTestFinished, test } from 'vitest';
import type { ScanFile } from '../../src/results/scan-read.ts';
import { gatherScan, runScan, type ScanEnd, type ScanProgress, type ScanRequest } from '../../src/scan/session.ts';
import { simulateNow } from '../../src/simulate.ts';
import { bundledWorker } from './bundle.ts';
import { GRID, requestFor, scanCase, studyFor, withoutWall } from './studies.ts';

const script = bundledWorker('test/scan/worker.ts');
const harmful = bundledWorker('test/scan/fault-worker.ts');

const never = (): AbortSignal => new AbortController().signal;

function folder(): string {
  const path = mkdtempSync(join(tmpdir(), 'gapwake-scan-'));
  onTestFinished(() => rmSync(path, { recursive: true, force: true }));
  return path;
}

const request = (text: string, path: string, more: Partial<ScanRequest> = {}): ScanRequest =>
  requestFor(text, path, { script: script(), workers: 2, ...more });

const error = (code: string, message: RegExp): Error =>
  expect.objectContaining({ name: 'ResultFileError', code, message: expect.stringMatching(message) }) as unknown as Error;

async function complete(end: Promise<ScanEnd>): Promise<Extract<ScanEnd, { kind: 'complete' }>> {
  const found = await end;
  if (found.kind !== 'complete') throw new Error(`interrupted after ${found.done}`);
  return found;
}

/** Scans until `points` are finished and then stops. */
async function stoppedAfter(points: number, what: ScanRequest): Promise<{ readonly end: ScanEnd; readonly first: ScanProgress }> {
  const stop = new AbortController();
  let first: ScanProgress | undefined;
  const end = await runScan(what, {
    stop: stop.signal,
    progress: (progress) => {
      first ??= progress;
      if (progress.computed >= points) stop.abort();
    },
  });
  return { end, first: first as ScanProgress };
}

/** the uninterrupted scan that all others are compared with */
let reference: string[] = [];
let place = '';
beforeAll(async () => {
  place = mkdtempSync(join(tmpdir(), 'gapwake-scan-reference-'));
  const { file, computed } = await complete(runScan(request(scanCase(GRID), join(place, 'whole.h5'), { workers: 1 }), { stop: never() }));
  expect(computed).toBe(12);
  reference = withoutWall(file.lines());
});
afterAll(() => rmSync(place, { recursive: true }));

describe('a scan', () => {
  test('says at each point what a run of the case with these values says', () => {
    const study = studyFor(scanCase(GRID));
    for (const index of [0, 6, 11]) {
      const read = study.at(study.plan.values(index));
      if (!read.ok) throw new Error('no case');
      const own = simulateNow(read.case);
      const point = JSON.parse(reference[index] as string);
      expect(point).toMatchObject({ index, id: read.case.sha256, values: study.plan.values(index), error: null, found: null });
      expect(point.outcome.case_sha256).toBe(read.case.sha256);
      const { numerics: _, cautions: __, ...said } = own;
      expect(point.outcome).toMatchObject(JSON.parse(JSON.stringify(said)));
      expect(point.outcome.cautions).toEqual(expect.arrayContaining(JSON.parse(JSON.stringify(own.cautions))));
    }
    const states = reference.map((line) => JSON.parse(line).outcome.verdict.state);
    // 200 V is above V_s at 2 Torr only
    expect(new Set(states)).toContain('holds');
    expect(new Set(states)).toContain('breaks-down');
  });

  test.each([1, 2, 5])('has the same bytes with %i workers', async (workers) => {
    const { file } = await complete(runScan(request(scanCase(GRID), join(folder(), 'a.h5'), { workers }), { stop: never() }));
    expect(withoutWall(file.lines())).toEqual(reference);
  });

  test('that was interrupted again and again computes nothing twice, and has the same bytes', async () => {
    const path = join(folder(), 'a.h5');
    const text = scanCase(GRID);
    let done = 0;
    let sessions = 0;
    for (;;) {
      const { end, first } = await stoppedAfter(3, request(text, path));
      sessions++;
      expect(first.done).toBe(done);
      if (end.kind === 'complete') {
        expect(first.done + end.computed).toBe(12);
        expect(withoutWall(end.file.lines())).toEqual(reference);
        break;
      }
      expect(end.done).toBeGreaterThan(done);
      done = end.done;
      expect(existsSync(path)).toBe(false);
      expect(existsSync(join(path, '..', 'a.part'))).toBe(true);
    }
    expect(sessions).toBeGreaterThan(2);
    expect(readdirSync(join(path, '..'))).toEqual(['a.h5']);
  });

  test('that is complete is answered from, and a journal left beside it goes', async () => {
    const path = join(folder(), 'a.h5');
    const text = scanCase(GRID);
    await stoppedAfter(2, request(text, path));
    const journal = readFileSync(join(path, '..', 'a.part'));
    await complete(runScan(request(text, path), { stop: never() }));
    const bytes = readFileSync(path);
    // as if the process had been killed between the last two steps
    writeFileSync(join(path, '..', 'a.part'), journal);
    const { file, computed } = await complete(runScan(request(text, path), { stop: never() }));
    expect(computed).toBe(0);
    expect(withoutWall(file.lines())).toEqual(reference);
    expect(readFileSync(path).equals(bytes)).toBe(true);
    expect(readdirSync(join(path, '..'))).toEqual(['a.h5']);
    const again = await complete(runScan(request(text, path, { restart: true }), { stop: never() }));
    expect(again.computed).toBe(12);
  });

  test('whose comments or spelling were changed goes on; whose numbers, title or search were changed is refused', async () => {
    const path = join(folder(), 'a.h5');
    const text = scanCase(GRID);
    await stoppedAfter(2, request(text, path));
    const journal = readFileSync(join(path, '..', 'a.part'));
    const changes: readonly (readonly [string, string])[] = [
      ['10 kohm', '11 kohm'],
      ['Open case', 'Another title'],
      ['points: 3', 'points: 4'],
      ['260 V', '270 V'],
      ['cells: 40', 'cells: 41'],
    ];
    for (const [from, to] of changes) {
      expect(text).toContain(from);
      await expect(runScan(request(text.replace(from, to), path), { stop: never() }), to).rejects.toEqual(
        error('other-study', /holds unfinished results of another .*--restart deletes them/),
      );
    }
    expect(readFileSync(join(path, '..', 'a.part')).equals(journal)).toBe(true);
    const spelt = text.replace('1 cm', '10 mm').replace('title:', '# a comment\ntitle:');
    expect(spelt).not.toBe(text);
    const { file, computed } = await complete(runScan(request(spelt, path), { stop: never() }));
    expect(computed).toBeLessThan(12);
    expect(withoutWall(file.lines())).toEqual(reference);
  });

  test('of another case takes the place of a complete one, and --restart that of an unfinished one', async () => {
    const path = join(folder(), 'a.h5');
    await complete(runScan(request(scanCase(GRID), path), { stop: never() }));
    const other = scanCase(GRID.replace('260 V', '270 V'));
    await stoppedAfter(1, request(other, path));
    // until it is complete the older result stays
    expect(withoutWall((await complete(runScan(request(scanCase(GRID), path), { stop: never() }))).file.lines())).toEqual(reference);
    const { file, computed } = await complete(runScan(request(other, path, { restart: true }), { stop: never() }));
    expect(computed).toBe(12);
    expect(file.axes[1]?.values[3]).toBe(270);
  });

  test('may walk its entries together, or vary nothing', async () => {
    const zipped = scanCase(
      `{ zip: true, vary: [{ path: gas.pressure, values: [2 Torr, 3 Torr] }, { path: supply.voltage.step, values: [150 V, 230 V] }] }`,
    );
    const { file } = await complete(runScan(request(zipped, join(folder(), 'a.h5')), { stop: never() }));
    expect({ layout: file.layout, count: file.count }).toEqual({ layout: 'list', count: 2 });
    expect(file.axes.map(({ values }) => [...values].map((v) => Math.round(v)))).toEqual([
      [267, 400],
      [150, 230],
    ]);
    const single = scanCase('{ find: { what: hold-off, from: 150 V, to: 260 V, tolerance: 1 % } }', { until: '20 ms' });
    const end = await complete(runScan(request(single, join(folder(), 'b.h5')), { stop: never() }));
    const [point] = [...end.file.points()];
    expect(point).toMatchObject({ index: 0, values: [], error: null, found: { what: 'hold-off', unit: 'V' } });
    // V_s = 209.274 V; what is searched is part of the point's identity
    expect(point?.found?.value).toBeGreaterThan(200);
    expect(point?.id).not.toBe(point?.outcome?.case_sha256);
  });
});

describe('points that fail', () => {
  test('are recorded with their reason while all others are computed', async () => {
    const text = scanCase(GRID, { title: 'exit 2, memory 5, throw-null 7' });
    const { file } = await complete(runScan(request(text, join(folder(), 'a.h5'), { script: harmful(), memory: 64 }), { stop: never() }));
    const points = [...file.points()];
    expect(points.map(({ index }) => index)).toEqual(Array.from({ length: 12 }, (_, i) => i));
    const failed = points.filter((point) => point.error !== null);
    expect(failed.map(({ index, error: e }) => [index, e?.code])).toEqual([
      [2, 'worker-died'],
      [5, 'out-of-memory'],
      [7, 'worker-died'],
    ]);
    for (const { outcome, found } of failed) expect({ outcome, found }).toEqual({ outcome: null, found: null });
    // ids are those that the points have anyway
    for (const { index, id } of failed) expect(id).toBe(JSON.parse(reference[index] as string).id);
    const codes = file.column('error');
    expect([...codes].filter((code) => code !== 0).length).toBe(3);
  });

  test('because their values make no case are told from those that do', async () => {
    // the longest path cannot be shorter than the gap; the ends are right, and so the case is read
    const text = scanCase('{ vary: [{ path: gap.longest_path, values: [1 cm, 5 mm, 2 cm] }] }');
    const { file } = await complete(runScan(request(text, join(folder(), 'a.h5')), { stop: never() }));
    const points = [...file.points()];
    expect(points.map((point) => point.error?.code ?? null)).toEqual([null, 'invalid-case', null]);
    expect(points[1]?.error?.text).toMatch(/gap\.longest_path: expected/);
    expect(new Set(points.map(({ id }) => id)).size).toBe(3);
  });
});

describe('shards', () => {
  const text = scanCase(GRID);

  async function shards(where: string, n: number, source = text): Promise<string[]> {
    const paths: string[] = [];
    for (let k = 1; k <= n; k++) {
      const path = join(where, `s${k}.h5`);
      await complete(runScan(request(source, path, { shard: { k, n } }), { stop: never() }));
      paths.push(path);
    }
    return paths;
  }

  test('joined in any order have the same bytes as the whole, and the whole is no other file', async () => {
    const where = folder();
    const paths = await shards(where, 3);
    const whole = join(where, 'whole.h5');
    const { file } = await complete(gatherScan(request(text, whole), [...paths].reverse(), { stop: never() }));
    expect(withoutWall(file.lines())).toEqual(reference);
    expect({ layout: file.layout, shard: file.shard, count: file.count }).toEqual({ layout: 'grid', shard: null, count: 12 });
    expect(readdirSync(where).sort()).toEqual(['s1.h5', 's2.h5', 's3.h5', 'whole.h5']);
    expect((await complete(runScan(request(text, whole), { stop: never() }))).computed).toBe(0);
  });

  test('are refused when one is missing, twice there, of another plan, or no shard', async () => {
    const where = folder();
    const [a, b, c] = (await shards(where, 3)) as [string, string, string];
    const gather = (paths: readonly string[], source = text): Promise<ScanEnd> =>
      gatherScan(request(source, join(where, 'whole.h5')), paths, { stop: never() });
    await expect(gather([a, c])).rejects.toEqual(error('other-study', /^is one of 3 shards; missing: 2$/));
    await expect(gather([a, b, c, b])).rejects.toEqual(error('other-study', /^is shard 2 of 3, as is .*s2\.h5$/));
    await expect(gather([a, b, c], scanCase(GRID.replace('260', '270')))).rejects.toEqual(error('other-study', /a shard of another case/));
    await expect(gather([a, b, c, join(place, 'whole.h5')])).rejects.toEqual(error('other-study', /is the result of a whole scan/));
    await expect(gather([a, b, join(where, 'none.h5')])).rejects.toEqual(error('missing', /no such file/));
    const other = join(where, 'o2.h5');
    await complete(runScan(request(text, other, { shard: { k: 2, n: 4 } }), { stop: never() }));
    await expect(gather([a, other, c])).rejects.toEqual(error('other-study', /is shard 2 of 4; the files before it are shards of 3/));
    expect(existsSync(join(where, 'whole.h5'))).toBe(false);
    expect(existsSync(join(where, 'whole.part'))).toBe(false);
  });

  test('do not go on with each other, nor with the whole', async () => {
    const path = join(folder(), 'a.h5');
    await stoppedAfter(1, request(text, path, { shard: { k: 1, n: 2 } }));
    await expect(runScan(request(text, path, { shard: { k: 2, n: 2 } }), { stop: never() })).rejects.toEqual(
      error('other-study', /of another part of this study/),
    );
    await expect(runScan(request(text, path), { stop: never() })).rejects.toEqual(error('other-study', /of another part of this study/));
  });
});

test('one writer: a second scan of the same result is refused', async () => {
  const path = join(folder(), 'a.h5');
  const text = scanCase(GRID);
  const stop = new AbortController();
  const first = runScan(request(text, path), { stop: stop.signal });
  await expect(runScan(request(text, path), { stop: never() })).rejects.toEqual(error('locked', /is writing this result/));
  stop.abort();
  await first;
});

test('a result that reads back is a ScanFile with every column', async () => {
  const file: ScanFile = (await complete(runScan(request(scanCase(GRID), join(folder(), 'a.h5')), { stop: never() }))).file;
  const points = [...file.points()];
  for (const headline of file.headlines) {
    const column = file.column(headline.name);
    expect(column.length).toBe(12);
    if (headline.kind !== 'number') continue;
    expect([...column], headline.name).toEqual(points.map((point) => headline.of(point) ?? Number.NaN));
  }
});
