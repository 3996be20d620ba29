import { createHash, type Hash } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import type { Axis, Find } from '../study.ts';
import { ResultFileError, resultFileError } from './errors.ts';
import type { GridValues, Hdf5Writer } from './hdf5.ts';
import { createHdf5, Hdf5Error } from './hdf5.ts';
import { checkComplete, openHdf5 } from './hdf5-reader.ts';
import { columnOf, pageOf } from './scan-read.ts';
import type { Headline, PlanText, ScanPoint, ScanTexts } from './scan-variables.ts';
import { axisNames, headlinesOf, planVariable, pointsGroup, pointVariable, scanFormat, scanTexts } from './scan-variables.ts';

/** What a scan file says about its points. */
export interface ScanAbout extends ScanTexts {
  readonly title: string;
  /** of the program */
  readonly version: string;
  /** hash of everything that decides the results */
  readonly study: string;
  readonly axes: readonly Axis[];
  readonly find: Find['what'] | null;
  /** `grid`: one dimension for each axis; `list`: one dimension `point`, the axes are coordinates on it */
  readonly layout:
    | { readonly kind: 'grid' }
    | { readonly kind: 'list'; readonly values: readonly Float64Array[]; readonly indices: Int32Array };
  /** points of the whole plan */
  readonly total: number;
  /** null: the whole plan */
  readonly shard: { readonly k: number; readonly n: number } | null;
}

/** Points whose headlines are written together. */
const BLOCK = 8192;
/** A page of points ends at either of these. */
const PAGE_POINTS = 256;
const PAGE_BYTES = 1 << 20;
/** quick: the higher levels save little */
const COMPRESSION = 4;
/** [ms] of wall time between two looks at the event loop */
const SLICE = 50;
const longestTitle = 1000;

/** Writes a whole scan file at `path` and reads it back with the other library; what is there already is written over. Memory is bounded by a block of
 *  headlines and a page of points, whatever the size of the scan.
 *  @param points  JSON of each point of the layout, in its order
 *  @param interrupted  polled about every 50 ms
 *  @returns false when it was interrupted; the file is then incomplete
 *  @throws ResultFileError */
export async function writeScanFile(
  path: string,
  about: ScanAbout,
  points: Iterable<string>,
  interrupted: () => boolean,
): Promise<boolean> {
  let file: Hdf5Writer | undefined;
  try {
    file = await createHdf5(path);
    // first and to disk: a part file is recognised as such even if the process is killed
    file.attribute('format', scanFormat);
    file.flush();
    const shape = declare(file, about);
    const digests = await fill(file, about, shape, points, interrupted);
    if (digests === null) return false;
    file.flush();
    file.close();
    file = undefined;
    checkComplete(path);
    readBack(path, shape, about, digests);
    return true;
  } catch (thrown) {
    if (thrown instanceof Hdf5Error) throw new ResultFileError('system', path, `cannot be written: ${thrown.message}`);
    throw resultFileError(path, thrown);
  } finally {
    closeQuietly(file);
  }
}

/** Attributes, texts, axes and empty headlines. @returns the shape of the headlines */
function declare(file: Hdf5Writer, about: ScanAbout): readonly number[] {
  const { axes, layout, find, shard } = about;
  const names = axisNames(
    axes.map(({ path }) => path),
    find,
  );
  file.attribute('title', shorten(about.title));
  file.attribute('program', 'gapwake');
  file.attribute('version', about.version);
  for (const { key, name, longName } of scanTexts) {
    file.text(name, about[key]);
    file.attribute('long_name', longName, name);
  }
  const plan: PlanText = {
    study: about.study,
    layout: layout.kind,
    total: about.total,
    shard,
    find,
    axes: axes.map(({ path, unit }, i) => ({ path, unit, name: names[i] as string })),
  };
  file.text(planVariable, JSON.stringify(plan));
  file.attribute('long_name', 'what is scanned: study, layout, points in all, shard, search, axes, JSON', planVariable);

  const { scales, shape } = layout.kind === 'grid' ? gridScales(file, axes, names) : listScales(file, layout, axes, names);
  const chunk = chunkOf(shape);
  for (const headline of headlinesOf(find)) {
    const { name, kind, longName } = headline;
    file.grid(name, { scales, shape, chunk, type: ({ number: 'float64', count: 'int32', flag: 'int8', mask: 'int32' } as const)[kind] });
    file.attribute('units', kind === 'flag' || kind === 'mask' ? '1' : headline.units, name);
    file.attribute('long_name', longName, name);
    if (kind === 'flag' || kind === 'mask') {
      const { meanings } = headline;
      if (kind === 'flag') file.numbers('flag_values', Int8Array.from(meanings.keys()), name);
      else
        file.numbers(
          'flag_masks',
          Int32Array.from(meanings, (_, bit) => 1 << bit),
          name,
        );
      file.attribute('flag_meanings', meanings.join(' '), name);
    }
    if (layout.kind === 'list' && names.length > 0) file.attribute('coordinates', names.join(' '), name);
  }
  return shape;
}

interface Scales {
  readonly scales: readonly string[];
  readonly shape: readonly number[];
}

function gridScales(file: Hdf5Writer, axes: readonly Axis[], names: readonly string[]): Scales {
  for (const [i, { path, unit, values }] of axes.entries()) {
    const name = names[i] as string;
    file.scale(name, { data: values });
    file.attribute('units', unit, name);
    file.attribute('long_name', path, name);
  }
  return { scales: names, shape: axes.map(({ values }) => values.length) };
}

function listScales(
  file: Hdf5Writer,
  { values, indices }: Extract<ScanAbout['layout'], { kind: 'list' }>,
  axes: readonly Axis[],
  names: readonly string[],
): Scales {
  const list: Scales = { scales: [pointVariable], shape: [indices.length] };
  file.scale(pointVariable, { data: indices });
  file.attribute('units', '1', pointVariable);
  file.attribute('long_name', 'index of the point in the plan', pointVariable);
  for (const [i, { path, unit }] of axes.entries()) {
    const name = names[i] as string;
    file.grid(name, { ...list, chunk: chunkOf(list.shape), type: 'float64' });
    file.put(name, [[0, indices.length]], values[i] as Float64Array);
    file.attribute('units', unit, name);
    file.attribute('long_name', path, name);
  }
  return list;
}

/** Pages and headlines. @returns digests of all that was written, by name; null when it was interrupted */
async function fill(
  file: Hdf5Writer,
  about: ScanAbout,
  shape: readonly number[],
  points: Iterable<string>,
  interrupted: () => boolean,
): Promise<ReadonlyMap<string, string> | null> {
  const columns = headlinesOf(about.find).map((headline) => new Column(headline));
  const pages = new Pages(file);
  const iterator = points[Symbol.iterator]();
  let due = performance.now() + SLICE;
  for (const { size, ranges } of blocksOf(shape)) {
    for (let i = 0; i < size; i++) {
      const { value: json, done } = iterator.next();
      if (done) throw new RangeError('fewer points than planned');
      pages.add(json);
      const point = JSON.parse(json) as ScanPoint;
      for (const column of columns) column.set(i, point);
      if (performance.now() < due) continue;
      await new Promise<void>((resume) => setImmediate(resume));
      if (interrupted()) return null;
      due = performance.now() + SLICE;
    }
    for (const column of columns) column.moveTo(file, ranges, size);
  }
  pages.flush();
  return new Map([[pointsGroup, pages.digest()], ...columns.map((column): [string, string] => [column.name, column.digest()])]);
}

/** A headline's values of one block. */
class Column {
  readonly name: string;
  readonly #headline: Headline;
  readonly #values: GridValues;
  readonly #codes: ReadonlyMap<string, number>;
  readonly #hash: Hash = createHash('sha256');

  constructor(headline: Headline) {
    this.name = headline.name;
    this.#headline = headline;
    this.#values =
      headline.kind === 'number' ? new Float64Array(BLOCK) : headline.kind === 'flag' ? new Int8Array(BLOCK) : new Int32Array(BLOCK);
    this.#codes = new Map('meanings' in headline ? headline.meanings.map((word, i): [string, number] => [word, i]) : []);
  }

  set(i: number, point: ScanPoint): void {
    const headline = this.#headline;
    if (headline.kind === 'flag') this.#values[i] = this.#code(headline.of(point));
    else if (headline.kind === 'mask') this.#values[i] = headline.of(point).reduce((bits, word) => bits | (1 << this.#code(word)), 0);
    else this.#values[i] = headline.of(point) ?? (headline.kind === 'count' ? -1 : Number.NaN);
  }

  #code(word: string): number {
    const code = this.#codes.get(word);
    if (code === undefined) throw new RangeError(`${this.name}: no code for ${word}`);
    return code;
  }

  moveTo(file: Hdf5Writer, ranges: readonly (readonly [number, number])[], size: number): void {
    const values = this.#values.subarray(0, size);
    this.#hash.update(bytesOf(values));
    file.put(this.name, ranges, values);
  }

  digest(): string {
    return this.#hash.digest('hex');
  }
}

/** Points as lines of JSON, many in one dataset: compressed together they take a tenth of the room. Compressed here and not by the format, whose
 *  independent reader takes a tenth of a microsecond for every byte of a compressed dataset. */
class Pages {
  readonly #file: Hdf5Writer;
  readonly #hash: Hash = createHash('sha256');
  #lines: string[] = [];
  #characters = 0;
  #count = 0;

  constructor(file: Hdf5Writer) {
    this.#file = file;
  }

  add(json: string): void {
    this.#lines.push(json);
    this.#characters += json.length;
    if (this.#lines.length === PAGE_POINTS || this.#characters >= PAGE_BYTES) this.flush();
  }

  flush(): void {
    if (this.#lines.length === 0) return;
    const text = `${this.#lines.join('\n')}\n`;
    this.#hash.update(text);
    const name = `${pointsGroup}/${String(this.#count++).padStart(6, '0')}`;
    this.#file.bytes(name, new Uint8Array(gzipSync(text, { level: COMPRESSION })));
    this.#file.attribute('long_name', 'points of the scan, one JSON object a line, compressed by gzip', name);
    this.#lines = [];
    this.#characters = 0;
  }

  digest(): string {
    return this.#hash.digest('hex');
  }
}

/** Rectangles that cover a grid in the order of its points, each at most {@link BLOCK} large: whole along the last axes, a stretch of one axis, a single
 *  place on those before. */
function* blocksOf(
  shape: readonly number[],
): Generator<{ readonly size: number; readonly ranges: readonly (readonly [number, number])[] }> {
  const { axis, rows, inner } = splitOf(shape);
  const outer = shape.slice(0, axis);
  const length = shape[axis] as number;
  const place = outer.map(() => 0);
  for (let left = outer.reduce((product, n) => product * n, 1); left > 0; left--) {
    for (let from = 0; from < length; from += rows) {
      const to = Math.min(from + rows, length);
      const ranges = [
        ...place.map((at) => [at, at + 1] as const),
        [from, to] as const,
        ...shape.slice(axis + 1).map((n) => [0, n] as const),
      ];
      yield { size: (to - from) * inner, ranges };
    }
    for (let i = place.length - 1; i >= 0; i--) {
      place[i] = (place[i] as number) + 1;
      if ((place[i] as number) < (outer[i] as number)) break;
      place[i] = 0;
    }
  }
}

/** The first axis behind which the rest fits into a block; how many places of it do; how large the rest is. */
function splitOf(shape: readonly number[]): { readonly axis: number; readonly rows: number; readonly inner: number } {
  let inner = 1;
  let axis = shape.length - 1;
  for (; axis > 0 && inner * (shape[axis] as number) <= BLOCK; axis--) inner *= shape[axis] as number;
  return { axis, rows: Math.max(1, Math.floor(BLOCK / inner)), inner };
}

function chunkOf(shape: readonly number[]): number[] {
  const { axis, rows } = splitOf(shape);
  return shape.map((n, i) => (i < axis ? 1 : i === axis ? Math.min(rows, n) : n));
}

/** Reads everything with the other library and compares it with what was to be written. */
function readBack(path: string, shape: readonly number[], about: ScanAbout, digests: ReadonlyMap<string, string>): void {
  const file = openHdf5(path);
  const check = (name: string, parts: Iterable<Uint8Array | string>): void => {
    const hash = createHash('sha256');
    for (const part of parts) hash.update(part);
    if (hash.digest('hex') !== digests.get(name))
      throw new ResultFileError('damaged', path, `${name} does not read back as it was written`);
  };
  for (const headline of headlinesOf(about.find)) {
    const { name } = headline;
    const values = columnOf(file, headline, shape);
    check(name, [bytesOf(values)]);
  }
  check(
    pointsGroup,
    (function* () {
      for (const page of file.members(pointsGroup)) yield pageOf(path, file, page);
    })(),
  );
}

function bytesOf(values: GridValues): Uint8Array {
  return new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
}

function closeQuietly(file: Hdf5Writer | undefined): void {
  try {
    file?.close();
  } catch {
    // the file is incomplete anyway
  }
}

/** The whole title is in the case. */
function shorten(title: string): string {
  return title.length <= longestTitle ? title : `${title.slice(0, longestTitle - 1)}…`;
}
