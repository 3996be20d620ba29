import { mkdirSync, mkdtempSync, readFileSync, rmSync, truncateSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import * as hdf5 from 'h5wasm/node';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readCase } from '../../src/casefile/index.ts';
import { datasetReader, tableReader } from '../../src/commands/tables.ts';
import { following } from './help.ts';

let folder = '';

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'gapwake-datasets-'));
  (await hdf5.ready).activate_throwing_error_handler();
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

type Options = Parameters<hdf5.File['create_dataset']>[0];

/** Writes a file in which each dataset lies under its path; units as fixed strings. */
function write(name: string, sets: Readonly<Record<string, Omit<Options, 'name'> & { units?: string; variable?: boolean }>>): void {
  const file = new hdf5.File(join(folder, name), 'w');
  try {
    for (const [path, { units, variable, ...options }] of Object.entries(sets)) {
      const group = path.slice(1, path.lastIndexOf('/'));
      if (group !== '' && file.get(group) === null) file.create_group(group);
      const set = file.create_dataset({ name: path, ...options });
      if (units !== undefined) set.create_attribute('units', units, null, variable ? 'S' : `S${Buffer.byteLength(units)}`);
    }
  } finally {
    file.close();
  }
}

const read = (file: string, path: string): ReturnType<ReturnType<typeof datasetReader>> => datasetReader(folder)(file, path);

describe('data sets of HDF5 files are read', () => {
  it('in every layout and number format that common tools write', () => {
    const rising = Array.from({ length: 5000 }, (_, i) => i);
    const data = Float64Array.from(rising, (i) => Math.fround(i / 8));
    const chunked = { shape: [5000], chunks: [512] };
    write('kinds.h5', {
      '/log/contiguous': { data, units: 'Pa' },
      '/log/chunked': { data, ...chunked, units: 'mbar', variable: true },
      '/log/compressed': { data, ...chunked, compression: 'gzip', compression_opts: 6, units: 'Torr' },
      '/log/growing': { data, shape: [5000], chunks: [4096], maxshape: [null] },
      '/log/float32': { data: Float32Array.from(data), units: 's' },
      '/int8': { data: Int8Array.of(-1, 2) },
      '/uint8': { data: Uint8Array.of(1, 200) },
      '/int16': { data: Int16Array.of(-300, 2) },
      '/uint16': { data: Uint16Array.of(1, 60000) },
      '/int32': { data: Int32Array.from(rising), ...chunked, compression: 'gzip' },
      '/uint32': { data: Uint32Array.of(1, 4e9) },
      '/int64': { data: BigInt64Array.of(-5n, 2n ** 50n) },
      '/uint64': { data: BigUint64Array.of(5n, 2n ** 50n) },
    });
    for (const [path, units] of [
      ['/log/contiguous', 'Pa'],
      ['/log/chunked', 'mbar'],
      ['log/compressed', 'Torr'],
      ['/log/growing', null],
      ['/log/float32', 's'],
    ] as const)
      expect(read('kinds.h5', path), path).toEqual({ ok: true, values: data, units });
    const values = (path: string): unknown => {
      const result = read('kinds.h5', path);
      return result.ok ? Array.from(result.values) : result.reason;
    };
    expect(['/int8', '/uint8', '/int16', '/uint16', '/uint32', '/int64', '/uint64'].map(values)).toEqual([
      [-1, 2],
      [1, 200],
      [-300, 2],
      [1, 60000],
      [1, 4e9],
      [-5, 2 ** 50],
      [5, 2 ** 50],
    ]);
    expect(values('/int32')).toEqual(rising);
  });

  it('as the pressure history of a case', () => {
    write('flight.h5', {
      '/bay/pressure': { data: Float32Array.of(1013, 500, 0.5), units: 'hPa' },
      '/bay/time': { data: Int32Array.of(0, 30, 60), units: 'minutes' },
    });
    const text = following('{ dataset: { file: flight.h5, dataset: /bay/pressure, time: /bay/time } }', '');
    const result = readCase(text, 'case.yaml', tableReader(folder), [], datasetReader(folder));
    if (!result.ok) throw new Error(JSON.stringify(result.problems));
    expect(result.window?.history).toEqual({
      duration: 3600,
      pressure: { kind: 'dataset', rows: { times: Float64Array.of(0, 1800, 3600), values: Float64Array.of(101300, 50000, 50) } },
      temperature: 293.15,
    });
  });

  it('up to a million values within a second or two', () => {
    write('long.h5', { '/a': { data: Float64Array.from({ length: 1_000_000 }, (_, i) => i), shape: [1_000_000], chunks: [65536] } });
    const result = read('long.h5', '/a');
    expect(result.ok && [result.values.length, result.values[999_999]]).toEqual([1_000_000, 999_999]);
  });
});

describe('what cannot be read is refused with its reason', () => {
  const reason = (file: string, path: string): string => {
    const result = read(file, path);
    return result.ok ? 'it was read' : result.reason;
  };

  it('data sets that are no finite numbers in one dimension', () => {
    write('odd.h5', {
      '/nan': { data: Float64Array.of(1, Number.NaN) },
      '/inf': { data: Float32Array.of(1, Number.POSITIVE_INFINITY) },
      '/text': { data: ['a', 'b'] },
      '/plane': { data: Float64Array.of(1, 2, 3, 4), shape: [2, 2] },
      '/one': { data: 5, dtype: '<d' },
      '/long': { data: new Uint8Array(1_000_001) },
      '/empty': { data: new Float64Array(0), shape: [0], maxshape: [null], chunks: [16] },
      '/group/inner': { data: Float64Array.of(1, 2) },
      '/units': { data: Float64Array.of(1, 2) },
    });
    expect(reason('odd.h5', '/nan')).toBe('/nan holds NaN at index 1');
    expect(reason('odd.h5', '/inf')).toBe('/inf holds Infinity at index 1');
    expect(reason('odd.h5', '/text')).toBe('/text holds no numbers');
    expect(reason('odd.h5', '/plane')).toBe('/plane has 2 dimensions, not one');
    expect(reason('odd.h5', '/one')).toBe('/one has 0 dimensions, not one');
    expect(reason('odd.h5', '/long')).toBe('/long has 1000001 values, more than 1000000');
    expect(reason('odd.h5', '/group')).toBe('/group is no data set');
    expect(reason('odd.h5', '/')).toBe('/ is no data set');
    expect(reason('odd.h5', '')).toBe('an empty path is no data set');
    expect(reason('odd.h5', '/group/outer')).toBe('no outer in /group, which has inner');
    expect(reason('odd.h5', '/nan/x')).toBe('/nan is no group');
    expect(reason('odd.h5', '/constructor')).toContain('no constructor in /, which has');
    expect(read('odd.h5', '/empty')).toMatchObject({ ok: true, values: new Float64Array(0) });
  });

  it('chunks that were never written', () => {
    const file = new hdf5.File(join(folder, 'holes.h5'), 'w');
    const set = file.create_dataset({ name: 'a', data: new Float64Array(0), shape: [0], maxshape: [null], chunks: [16] });
    set.resize([64]);
    set.write_slice([[0, 16]], new Float64Array(16));
    file.close();
    expect(reason('holes.h5', '/a')).toContain('never written');
  });

  it('files that are no HDF5, cut short, changed, too large, or no files', () => {
    write('whole.h5', {
      '/a': { data: Float64Array.from({ length: 1000 }, (_, i) => i), shape: [1000], chunks: [100], compression: 'gzip' },
    });
    const bytes = readFileSync(join(folder, 'whole.h5'));
    writeFileSync(join(folder, 'cut.h5'), bytes.subarray(0, bytes.length - 50));
    writeFileSync(join(folder, 'text.h5'), 't [s],p [Pa]\n0,1\n1,2\n');
    writeFileSync(join(folder, 'large.h5'), bytes);
    truncateSync(join(folder, 'large.h5'), 64e6 + 1);
    mkdirSync(join(folder, 'a-folder.h5'));
    expect(reason('missing.h5', '/a')).toBe('no such file');
    expect(reason('text.h5', '/a')).toBe('no HDF5 file, or one of an unusual kind');
    expect(reason('cut.h5', '/a')).toContain('cut short');
    expect(reason('large.h5', '/a')).toBe('more than 64 MB');
    expect(reason('a-folder.h5', '/a')).toContain('a folder');
    expect(reason('/dev/zero', '/a')).toContain('an absolute path');
    expect(reason('', '/a')).toBe('no file name');
    expect(reason('../../../../../../../dev/zero', '/a')).toContain('not a regular file');
    // a byte changed anywhere: a reason or other numbers, never a throw
    let refused = 0;
    for (let at = 0; at < bytes.length; at += 7) {
      const changed = Buffer.from(bytes);
      changed[at] ^= 0x55;
      writeFileSync(join(folder, 'changed.h5'), changed);
      if (!read('changed.h5', '/a').ok) refused++;
    }
    expect(refused).toBeGreaterThan(10);
  });

  it('a case says which entry asked for it', () => {
    const text = following('{ dataset: { file: odd.h5, dataset: /nan, time: /text } }');
    const result = readCase(text, 'case.yaml', tableReader(folder), [], datasetReader(folder));
    expect(result).toMatchObject({
      ok: false,
      problems: [
        { path: 'history.pressure.dataset.dataset', line: 19, code: 'unreadable', found: '/nan holds NaN at index 1' },
        { path: 'history.pressure.dataset.time', line: 19, code: 'unreadable', found: '/text holds no numbers' },
      ],
    });
  });
});
