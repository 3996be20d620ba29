import { readFileSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { isGapwakeResult, readResultFormat, readRunFile } from '../../src/results/read.ts';
import { readScanFile } from '../../src/results/scan-read.ts';
import { axisNames, headlinesOf } from '../../src/results/scan-variables.ts';
import { writeScanFile } from '../../src/results/scan-write.ts';
import { folder } from './folder.ts';
import { about, axis, point, writePoints } from './points.ts';

const range = (n: number): number[] => Array.from({ length: n }, (_, i) => i);
const error = (code: string, message: RegExp): Error =>
  expect.objectContaining({ name: 'ResultFileError', code, message: expect.stringMatching(message) }) as unknown as Error;

describe('a scan file', () => {
  // shapes whose blocks end on the last axis, on one before, and in the middle of the first
  test.each([[[1]], [[3, 4]], [[2, 3, 2]], [[9000]], [[3, 4100]], [[2, 130, 70]], [[1, 9001, 1]]])(
    'of the shape %j gives back every point and column',
    async (lengths) => {
      const path = join(folder(), 'scan.h5');
      const axes = lengths.map((length, i) => axis(`gap.a${i}`, 'm', range(length)));
      const what = about(axes);
      const points = range(what.total).map((index) => point(index));
      await writePoints(path, what, points);

      const file = readScanFile(path);
      expect({ layout: file.layout, count: file.count, total: file.total, shard: file.shard, find: file.find }).toEqual({
        layout: 'grid',
        count: what.total,
        total: what.total,
        shard: null,
        find: null,
      });
      expect(file.axes).toEqual(axes.map((each, i) => ({ ...each, name: `gap_a${i}` })));
      const lines = [...file.lines()];
      expect(lines.length).toBe(points.length);
      expect(lines.every((line, i) => line === JSON.stringify(points[i]))).toBe(true);
      for (const headline of file.headlines) {
        const column = file.column(headline.name);
        const expected = points.map((each) => {
          if (headline.kind === 'flag') return headline.meanings.indexOf(headline.of(each));
          if (headline.kind === 'mask') return headline.of(each).reduce((bits, word) => bits + 2 ** headline.meanings.indexOf(word), 0);
          return headline.of(each) ?? (headline.kind === 'count' ? -1 : Number.NaN);
        });
        expect(Array.from(column), headline.name).toEqual(expected);
      }
    },
  );

  test('of points in a list gives their numbers and coordinates, and what was found', async () => {
    const path = join(folder(), 'scan.h5');
    const axes = [axis('gas.pressure', 'Pa', [100, 200, 300]), axis('supply.voltage.step', 'V', [1, 2])];
    const indices = Int32Array.from([1, 2, 5]);
    const values = [Float64Array.from([100, 200, 300]), Float64Array.from([2, 1, 2])];
    const shard = { k: 2, n: 2 };
    const what = about(axes, { layout: { kind: 'list', indices, values }, find: 'hold-off', shard });
    const points = [...indices].map((index, i) =>
      point(
        index,
        'hold-off',
        values.map((each) => each[i] as number),
      ),
    );
    await writePoints(path, what, points);
    const file = readScanFile(path);
    expect(file).toMatchObject({
      layout: 'list',
      count: 3,
      total: 6,
      shard,
      find: 'hold-off',
      study: 'c'.repeat(64),
      version: '1.2.3',
      title: 'Made up',
    });
    expect(file.axes.map((each) => [...each.values])).toEqual(values.map((each) => [...each]));
    expect([...file.points()]).toEqual(points);
    expect([...file.column('found_value')]).toEqual([151, 152, 155]);
    expect([...file.column('found_runs')]).toEqual([12, 12, 12]);
    expect(file.caseText).toBe('title: Made up\n');
  });

  test('is a gapwake result of its kind', async () => {
    const path = join(folder(), 'scan.h5');
    await writePoints(path, about([axis('gap.area', 'm^2', [1])]), [point(0)]);
    expect(readResultFormat(path)).toEqual({ kind: 'scan', version: 1 });
    expect(isGapwakeResult(path)).toBe(true);
    expect(() => readRunFile(path)).toThrow(error('other-kind', /^holds a scan, expected a run$/));
    expect(() => readScanFile(path).column('no such column')).toThrow(RangeError);
  });

  test('with fewer points than its axes say is not finished', async () => {
    const path = join(folder(), 'scan.h5');
    await expect(writePoints(path, about([axis('gap.area', 'm^2', [1, 2])]), [point(0)])).rejects.toThrow(/fewer points than planned/);
  });

  test('that was interrupted says so', async () => {
    const path = join(folder(), 'scan.h5');
    const slow = function* (): Generator<string> {
      for (let index = 0; index < 5; index++) {
        for (const end = performance.now() + 60; performance.now() < end; );
        yield JSON.stringify(point(index));
      }
    };
    expect(await writeScanFile(path, about([axis('gap.area', 'm^2', range(5))]), slow(), () => true)).toBe(false);
  });

  test('cut short or changed is refused, not misread', async () => {
    const path = join(folder(), 'scan.h5');
    await writePoints(
      path,
      about([axis('gap.area', 'm^2', range(40))]),
      range(40).map((index) => point(index)),
    );
    const bytes = readFileSync(path);
    for (const length of [0, 60, 500, 5000, bytes.length - 1]) {
      writeFileSync(path, bytes);
      truncateSync(path, length);
      expect(() => readScanFile(path), `${length} bytes`).toThrow(expect.objectContaining({ name: 'ResultFileError' }) as Error);
    }
    const page = bytes.indexOf(Buffer.from([0x1f, 0x8b, 0x08]));
    const flipped = Buffer.from(bytes);
    flipped[page + 40] = (flipped[page + 40] as number) ^ 1;
    writeFileSync(path, flipped);
    expect(() => [...readScanFile(path).lines()]).toThrow(error('damaged', /the points 000000 cannot be decompressed/));
    const plan = bytes.indexOf('"layout":"grid"');
    for (const text of ['"layout":"gridd', '"layout":7     ']) {
      const changed = Buffer.from(bytes);
      changed.write(text, plan);
      writeFileSync(path, changed);
      expect(() => readScanFile(path)).toThrow(error('damaged', /what it says of its plan is not understood/));
    }
  });
});

test('names of axes are told apart from each other and from the headlines, in letters that every reader takes', () => {
  expect(axisNames(['gas.pressure', 'observe.currents.0', 'verdict', 'point', 'a.b', 'a_b', '0.x'], null)).toEqual([
    'gas_pressure',
    'observe_currents_0',
    'verdict_',
    'point_',
    'a_b',
    'a_b_',
    'x0_x',
  ]);
  expect(axisNames(['found_value'], null)).toEqual(['found_value']);
  expect(axisNames(['found_value'], 'hold-off')).toEqual(['found_value_']);
});

test('no headline has a name twice', () => {
  const names = headlinesOf('trip-delay').map(({ name }) => name);
  expect(new Set(names).size).toBe(names.length);
});
