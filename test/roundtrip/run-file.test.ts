import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Dataset } from 'h5wasm/node';
import { describe, expect, test, vi } from 'vitest';
import { isGapwakeResult, readResultFormat, readRunFile } from '../../src/results/read.ts';
import type { FieldKey, ScalarKey, Snapshot } from '../../src/results/variables.ts';
import { fieldVariables, scalarVariables } from '../../src/results/variables.ts';
import { openRunFile } from '../../src/results/write.ts';
import { folder } from './folder.ts';
import { cellCentres, documents, snapshot } from './snapshots.ts';

async function writeRun(path: string, count: number, cells: number, negativeIons: boolean): Promise<Snapshot[]> {
  const writer = await openRunFile(path, { x: cellCentres(cells), negativeIons });
  const snapshots = Array.from({ length: count }, (_, index) => snapshot(index, cells, negativeIons));
  for (const each of snapshots) writer.append(each);
  writer.finish(documents);
  return snapshots;
}

/** Largest difference between what was appended and what is read, relative to each value. */
function worstDifference(read: { get(time: number, x: number): number }, key: FieldKey, snapshots: readonly Snapshot[]): number {
  let worst = 0;
  for (const [index, { [key]: values = new Float64Array() }] of snapshots.entries()) {
    for (const [cell, value] of values.entries()) worst = Math.max(worst, Math.abs(read.get(index, cell) - value) / Math.abs(value));
  }
  return worst;
}

describe('a run file reads back as it was written', () => {
  // 64 rows make a block: below, at, above and well above one.
  for (const [count, cells, negativeIons] of [
    [1, 1, false],
    [63, 30, true],
    [64, 30, false],
    [65, 7, true],
    [600, 20, true],
  ] as const) {
    test(`${count} snapshots of ${cells} cells, ${negativeIons ? 'with' : 'without'} negative ions`, async () => {
      const path = join(folder(), 'run.h5');
      const snapshots = await writeRun(path, count, cells, negativeIons);
      const result = readRunFile(path);

      expect(result.time).toEqual(Float64Array.from(snapshots, ({ time }) => time));
      expect(result.x).toEqual(cellCentres(cells));
      for (const { key } of scalarVariables) {
        expect(result.scalars[key], key).toEqual(Float64Array.from(snapshots, ({ [key]: value }) => value));
      }
      for (const { key } of fieldVariables) {
        const field = result.fields[key];
        if (!negativeIons && key.startsWith('negative')) {
          expect(field, key).toBeNull();
          continue;
        }
        expect(field?.shape, key).toEqual([count, cells]);
        // half a unit in the last place of a 32-bit number, IEEE 754
        expect(worstDifference(field as NonNullable<typeof field>, key, snapshots), key).toBeLessThanOrEqual(2 ** -24);
      }
      const { title, version, ...texts } = documents;
      expect(result).toMatchObject({ path, title, version, ...texts, outcome: { verdict: { state: 'holds' } } });
    });
  }

  test('every key of a snapshot is a variable of the file', () => {
    const { time: _, ...rest } = snapshot(0, 1, true);
    const keys: (ScalarKey | FieldKey)[] = [...scalarVariables, ...fieldVariables].map(({ key }) => key);
    expect(keys.sort()).toEqual(Object.keys(rest).sort());
  });

  test('a run interrupted before its first snapshot leaves a file without instants', async () => {
    const path = join(folder(), 'run.h5');
    await writeRun(path, 0, 12, false);
    const result = readRunFile(path);
    expect(result.time.length).toBe(0);
    expect(result.fields.electronDensity?.shape).toEqual([0, 12]);
    expect(result.scalars.gapVoltage.length).toBe(0);
  });

  test('an interrupted run keeps the snapshots it has', async () => {
    const path = join(folder(), 'run.h5');
    const writer = await openRunFile(path, { x: cellCentres(5), negativeIons: false });
    for (let index = 0; index < 70; index++) writer.append(snapshot(index, 5, false));
    writer.finish({ ...documents, outcomeJson: '{"final":{"stop":"interrupted"}}' });
    const result = readRunFile(path);
    expect(result.time.length).toBe(70);
    expect(result.outcome).toEqual({ final: { stop: 'interrupted' } });
  });

  test('the writer copies a snapshot, so that the solver may reuse its arrays', async () => {
    const path = join(folder(), 'run.h5');
    const writer = await openRunFile(path, { x: cellCentres(3), negativeIons: false });
    const reused = snapshot(0, 3, false);
    writer.append(reused);
    const before = Float32Array.from(reused.potential);
    reused.potential.fill(0);
    writer.finish(documents);
    expect(readRunFile(path).fields.potential?.data).toEqual(before);
  });

  test('values too small for 32 bits become zero, larger ones keep their sign and size, NaN scalars stay', async () => {
    const path = join(folder(), 'run.h5');
    const writer = await openRunFile(path, { x: cellCentres(4), negativeIons: false });
    writer.append({ ...snapshot(0, 4, false), gapEnergy: Number.NaN, electronFlux: Float64Array.of(1e-40, -1e-45, -1.25e-37, 2.5e38) });
    writer.finish(documents);
    const { fields, scalars } = readRunFile(path);
    expect(fields.electronFlux?.data).toEqual(Float32Array.of(0, 0, -1.25e-37, 2.5e38));
    expect(scalars.gapEnergy).toEqual(Float64Array.of(Number.NaN));
  });

  test('long texts, long titles and empty texts are kept', async () => {
    const path = join(folder(), 'run.h5');
    const writer = await openRunFile(path, { x: cellCentres(1), negativeIons: false });
    const tablesJson = JSON.stringify({ 'α.csv': '0.1,0.2 é\n'.repeat(300_000) });
    writer.finish({ ...documents, title: 'é'.repeat(50_000), version: '', caseText: '', tablesJson });
    const result = readRunFile(path);
    expect(result.tablesJson === tablesJson).toBe(true);
    expect(result.caseText).toBe('');
    expect(result.version).toBe('');
    expect(result.title).toBe(`${'é'.repeat(999)}…`);
  });

  test('reading is silent on the console, whose functions are as before', async () => {
    const path = join(folder(), 'odd.h5');
    // An attribute of a compound type, of which the decoding library warns.
    const h5 = await import('h5wasm/node');
    await h5.ready;
    const file = new h5.File(path, 'w');
    file.create_attribute('odd', new Map([['a', new Float64Array(1)]]));
    file.close();

    const warn = vi.spyOn(console, 'warn').mockImplementation(() => {});
    const log = vi.spyOn(console, 'log').mockImplementation(() => {});
    const installed = console.warn;
    expect(isGapwakeResult(path)).toBe(false);
    expect(console.warn).toBe(installed);
    expect([...warn.mock.calls, ...log.mock.calls]).toEqual([]);
    vi.restoreAllMocks();
  });

  test('only the result is left in the folder, and says what it is', async () => {
    const place = folder();
    await writeRun(join(place, 'run.h5'), 3, 4, false);
    expect(readdirSync(place)).toEqual(['run.h5']);
    expect(readResultFormat(join(place, 'run.h5'))).toEqual({ kind: 'run', version: 1 });
  });
});

describe('a wrong snapshot is an error of the program', () => {
  test.each([
    ['time that goes back', { time: -1 }, /snapshot at -1 s/],
    ['time that is no number', { time: Number.NaN }, /snapshot at NaN s/],
    ['a profile of another length', { potential: new Float64Array(3) }, /potential: 3 values for 4 cells/],
    ['a value that is no number', { potential: Float64Array.of(0, Number.NaN, 0, 0) }, /potential is NaN in cell 1/],
    ['a value beyond 32 bits', { ionFlux: Float64Array.of(0, 0, 0, 1e39) }, /ion_flux is 1e\+39 in cell 3/],
  ])('%s', async (_, wrong, message) => {
    const place = folder();
    const writer = await openRunFile(join(place, 'run.h5'), { x: cellCentres(4), negativeIons: false });
    writer.append(snapshot(0, 4, false));
    expect(() => writer.append({ ...snapshot(1, 4, false), ...wrong })).toThrow(message);
    writer.abandon();
    expect(readdirSync(place)).toEqual([]);
  });
});

describe('a damaged file gives one clear error', () => {
  /** 'read', or the code and the message of the error. */
  const attempt = (path: string): string => {
    try {
      readRunFile(path);
      return 'read';
    } catch (thrown) {
      expect(thrown, String(thrown)).toMatchObject({ name: 'ResultFileError', path });
      const { message, code } = thrown as { message: string; code: string };
      expect(message).toMatch(/^[^\n]{5,200}$/);
      return `${code}: ${message}`;
    }
  };

  test('cut short at any length', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    await writeRun(path, 70, 20, true);
    const whole = readFileSync(path);
    const cut = join(place, 'cut.h5');
    const lengths = [0, 1, 7, 8, 9, 40, 47, 48, 55, 56, 95, 96, 97, whole.length - 1];
    for (let length = 100; length < whole.length; length += 997) lengths.push(length);
    for (const length of lengths) {
      writeFileSync(cut, whole.subarray(0, length));
      const expected = length < 8 ? 'foreign: is not a gapwake result' : `damaged: the file is cut short: only ${length}`;
      expect(attempt(cut).startsWith(expected), `${length} bytes: ${attempt(cut)}`).toBe(true);
    }
  });

  test('filled with zeros from any point on', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    await writeRun(path, 70, 20, true);
    const whole = readFileSync(path);
    const holed = join(place, 'holed.h5');
    const seen = new Set<string>();
    for (let from = 0; from < whole.length; from += 1999) {
      writeFileSync(holed, Buffer.concat([whole.subarray(0, from), Buffer.alloc(whole.length - from)]));
      seen.add(attempt(holed).split(':', 1)[0] as string);
    }
    expect(seen).toContain('damaged');
  });

  test('with single bytes changed it is read or refused, and never hangs', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    await writeRun(path, 5, 4, false);
    const whole = readFileSync(path);
    const changed = join(place, 'changed.h5');
    const seen = new Set<string>();
    // The headers are where a byte does most harm; a stride prime to their layout reaches every kind of field.
    for (let at = 8; at < whole.length; at += at < 4096 ? 29 : 2003) {
      const bytes = Buffer.from(whole);
      bytes[at] = (bytes[at] as number) ^ 0xff;
      writeFileSync(changed, bytes);
      seen.add(attempt(changed).split(':', 1)[0] as string);
    }
    expect(seen).toContain('damaged');
    expect(seen).toContain('read');
  });

  test('declared sizes are checked before anything is allocated', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    await writeRun(path, 5, 4, false);
    // Dataspace message, version 2: one dimension of 5 without maximum; now five hundred million instants.
    const bytes = readFileSync(path);
    const dataspace = Buffer.from([2, 1, 1, 1, 5, 0, 0, 0, 0, 0, 0, 0, 255, 255, 255, 255, 255, 255, 255, 255]);
    let found = 0;
    for (let at = bytes.indexOf(dataspace); at >= 0; at = bytes.indexOf(dataspace, at + 1)) {
      bytes.writeUInt32LE(500_000_000, at + 4);
      found++;
    }
    expect(found).toBe(1 + scalarVariables.length);
    const huge = join(place, 'huge.h5');
    writeFileSync(huge, bytes);
    const started = performance.now();
    expect(() => readRunFile(huge)).toThrow(/more values than the file can hold/);
    expect(performance.now() - started).toBeLessThan(2000);
  });

  test('instants that were declared and never written', async () => {
    const path = join(folder(), 'run.h5');
    await writeRun(path, 3, 4, false);
    const h5 = await import('h5wasm/node');
    await h5.ready;
    const file = new h5.File(path, 'a');
    // Beyond the first block: within it the library fills with zeros.
    for (const name of ['time', ...scalarVariables.map((variable) => variable.name)]) (file.get(name) as Dataset).resize([2000]);
    file.close();
    expect(() => readRunFile(path)).toThrow(/time has values that were never written/);
  });

  test('an outcome that is not JSON', async () => {
    const path = join(folder(), 'run.h5');
    const writer = await openRunFile(path, { x: cellCentres(1), negativeIons: false });
    writer.finish({ ...documents, outcomeJson: '[1' });
    expect(() => readRunFile(path)).toThrow(/its outcome is not a JSON object/);
  });
});
