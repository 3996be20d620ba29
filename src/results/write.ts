import { ResultFileError, resultFileError } from './errors.ts';
import type { Hdf5Writer } from './hdf5.ts';
import { createHdf5, Hdf5Error } from './hdf5.ts';
import { checkComplete } from './hdf5-reader.ts';
import type { Output } from './output.ts';
import { claimOutput } from './output.ts';
import type { FieldKey, RunTexts, ScalarKey, Snapshot, Variable } from './variables.ts';
import { fieldVariables, negativeIonFields, runFormat, scalarVariables, textVariables, timeVariable, xVariable } from './variables.ts';

/** What does not change during a run. */
export interface RunLayout {
  /** [m] cell centres, rising */
  readonly x: Float64Array;
  /** whether snapshots carry the density and flux of negative ions */
  readonly negativeIons: boolean;
}

/** What is known at the end. */
export interface RunDocuments extends RunTexts {
  readonly title: string;
  /** version of the program */
  readonly version: string;
}

/** Writes a run file. Only one block of snapshots is held in memory. After a ResultFileError nothing is left on disk and the writer is done. */
export interface RunWriter {
  /** Copies a snapshot. @throws ResultFileError when the disk refuses; RangeError when the snapshot is wrong (an error of the program) */
  append(snapshot: Snapshot): void;
  /** Completes the file and gives it its name; also for a run that was interrupted. @throws ResultFileError */
  finish(documents: RunDocuments): void;
  /** Removes what was written; an older result of the same name stays. Does nothing after finish() or a second time. */
  abandon(): void;
}

/** Values of a field that are compressed together; rows are stored in blocks of about this size. */
const blockValues = 32_768;
const longestBlock = 64;
/** Rows of a scalar stored together. */
const scalarChunk = 512;
/** Smallest normal 32-bit number: below it digits are lost, so that such values (traces of nothing) are written as zero. */
const smallestFloat32 = 2 ** -126;
const longestTitle = 1000;

/** A run file that is claimed, locked and open, before its layout is known: whatever speaks against it is known before a run begins. */
export interface PreparedRunFile {
  /** @throws ResultFileError */
  begin(layout: RunLayout): RunWriter;
  /** Removes what was written; does nothing after {@link PreparedRunFile.begin}, whose writer then answers for the file. */
  abandon(): void;
}

/** Claims a run file at `path`.
 *  @throws ResultFileError when it cannot be written there: no such folder, no permission, a foreign file of this name, another writer */
export async function prepareRunFile(path: string): Promise<PreparedRunFile> {
  const output = claimOutput(path);
  let file: Hdf5Writer | undefined;
  try {
    file = await createHdf5(output.partPath);
    // First and to disk: a part file is recognised as such even if the process is killed.
    file.attribute('format', runFormat);
    file.flush();
  } catch (thrown) {
    discard(output, file);
    throw typed(path, thrown);
  }
  return preparedRunFile(path, output, file);
}

function preparedRunFile(path: string, output: Output, file: Hdf5Writer): PreparedRunFile {
  let begun = false;
  return {
    begin: ({ x, negativeIons }) => {
      begun = true;
      const fields = fieldVariables.filter(({ key }) => negativeIons || !negativeIonFields.has(key));
      const blockRows = Math.max(1, Math.min(longestBlock, Math.floor(blockValues / x.length)));
      try {
        declare(file, x, fields, blockRows);
      } catch (thrown) {
        discard(output, file);
        throw typed(path, thrown);
      }
      return runWriter(path, output, file, new Block(fields, x.length, blockRows));
    },
    abandon: () => {
      if (!begun) discard(output, file);
    },
  };
}

/** Starts a run file at `path`.
 *  @throws ResultFileError as {@link prepareRunFile} */
export async function openRunFile(path: string, layout: RunLayout): Promise<RunWriter> {
  return (await prepareRunFile(path)).begin(layout);
}

/** Dimensions and variables. */
function declare(file: Hdf5Writer, x: Float64Array, fields: readonly Variable<FieldKey>[], blockRows: number): void {
  file.scale(timeVariable.name, { chunk: scalarChunk });
  file.scale(xVariable.name, { data: x });
  for (const { name } of scalarVariables) {
    file.variable(name, { scales: [timeVariable.name], rowLength: 1, chunk: scalarChunk, precision: 'float64' });
  }
  for (const { name } of fields) {
    file.variable(name, { scales: [timeVariable.name, xVariable.name], rowLength: x.length, chunk: blockRows, precision: 'float32' });
  }
  for (const { name, units, longName } of [timeVariable, xVariable, ...scalarVariables, ...fields]) {
    file.attribute('units', units, name);
    file.attribute('long_name', longName, name);
  }
  file.flush();
}

function runWriter(path: string, output: Output, file: Hdf5Writer, block: Block): RunWriter {
  let done = false;
  const attempt = (work: () => void): void => {
    if (done) throw new Error('the run file is already closed');
    try {
      work();
    } catch (thrown) {
      if (!(thrown instanceof Hdf5Error || thrown instanceof ResultFileError)) throw thrown;
      done = true;
      discard(output, file);
      throw typed(path, thrown);
    }
  };
  return {
    append: (snapshot) =>
      attempt(() => {
        block.add(snapshot);
        if (block.full) block.moveTo(file);
      }),
    finish: (documents) =>
      attempt(() => {
        block.moveTo(file);
        file.attribute('title', shorten(documents.title));
        file.attribute('program', 'gapwake');
        file.attribute('version', documents.version);
        for (const { key, name, longName } of textVariables) {
          file.text(name, documents[key]);
          file.attribute('long_name', longName, name);
        }
        file.flush();
        file.close();
        // The library does not always say that a disk was full.
        checkComplete(output.partPath);
        output.publish();
        done = true;
      }),
    abandon: () => {
      if (done) return;
      done = true;
      discard(output, file);
    },
  };
}

/** Leaves nothing behind. */
function discard(output: Output, file: Hdf5Writer | undefined): void {
  try {
    file?.close();
  } catch {
    // The file is removed anyway.
  }
  output.discard();
}

function typed(path: string, thrown: unknown): ResultFileError {
  if (thrown instanceof Hdf5Error) return new ResultFileError('system', path, `cannot be written: ${thrown.message}`);
  return resultFileError(path, thrown);
}

/** Snapshots not yet written. */
class Block {
  readonly #rows: number;
  readonly #cells: number;
  readonly #time: Float64Array;
  readonly #scalars: ReadonlyMap<Variable<ScalarKey>, Float64Array>;
  readonly #fields: ReadonlyMap<Variable<FieldKey>, Float32Array>;
  #filled = 0;
  #lastTime = Number.NEGATIVE_INFINITY;

  constructor(fields: readonly Variable<FieldKey>[], cells: number, rows: number) {
    this.#rows = rows;
    this.#cells = cells;
    this.#time = new Float64Array(rows);
    this.#scalars = new Map(scalarVariables.map((variable) => [variable, new Float64Array(rows)]));
    this.#fields = new Map(fields.map((variable) => [variable, new Float32Array(rows * cells)]));
  }

  get full(): boolean {
    return this.#filled === this.#rows;
  }

  add(snapshot: Snapshot): void {
    if (!(Number.isFinite(snapshot.time) && snapshot.time >= this.#lastTime)) {
      throw new RangeError(`snapshot at ${snapshot.time} s after one at ${this.#lastTime} s`);
    }
    for (const [{ key, name }, rows] of this.#fields) {
      const values = snapshot[key];
      if (values?.length !== this.#cells) throw new RangeError(`${name}: ${values?.length} values for ${this.#cells} cells`);
      const start = this.#filled * this.#cells;
      for (let cell = 0; cell < this.#cells; cell++) {
        const value = values[cell] as number;
        const stored = Math.abs(value) < smallestFloat32 ? 0 : Math.fround(value);
        if (!Number.isFinite(stored)) throw new RangeError(`${name} is ${value} in cell ${cell} at ${snapshot.time} s`);
        rows[start + cell] = stored;
      }
    }
    for (const [{ key }, rows] of this.#scalars) rows[this.#filled] = snapshot[key];
    this.#time[this.#filled] = snapshot.time;
    this.#lastTime = snapshot.time;
    this.#filled++;
  }

  moveTo(file: Hdf5Writer): void {
    if (this.#filled === 0) return;
    file.append(timeVariable.name, this.#time.subarray(0, this.#filled));
    for (const [{ name }, rows] of this.#scalars) file.append(name, rows.subarray(0, this.#filled));
    for (const [{ name }, rows] of this.#fields) file.append(name, rows.subarray(0, this.#filled * this.#cells));
    file.flush();
    this.#filled = 0;
  }
}

/** The whole title is in the outcome. */
function shorten(title: string): string {
  return title.length <= longestTitle ? title : `${title.slice(0, longestTitle - 1)}…`;
}
