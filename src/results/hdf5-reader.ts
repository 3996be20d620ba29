import { closeSync, openSync, readFileSync, readSync, statSync } from 'node:fs';
import { Dataset, File, Group } from 'jsfive';
import { ResultFileError, resultFileError } from './errors.ts';

/** The one place that touches jsfive: it throws strings, warns on the console, returns plain arrays with holes and allocates whatever a
 *  file declares. Here sizes are checked first, arrays are typed, and every failure is a {@link ResultFileError}. */
export interface Hdf5Reader {
  readonly names: ReadonlySet<string>;
  /** Text attribute of the file, or null. */
  attribute(name: string): string | null;
  /** Values of a 64-bit dataset of the given shape (`null`: any length). */
  float64(name: string, shape: readonly (number | null)[]): Float64Array;
  /** Values of a 32-bit dataset of the given shape. */
  float32(name: string, shape: readonly (number | null)[]): Float32Array;
  int32(name: string, shape: readonly (number | null)[]): Int32Array;
  int8(name: string, shape: readonly (number | null)[]): Int8Array;
  /** Bytes of any number. */
  bytes(name: string): Uint8Array;
  /** Names in a group, sorted; none when there is no such group. */
  members(group: string): string[];
  /** A text, without padding. */
  text(name: string): string;
}

/** number formats and their bytes */
const widths = { '<f8': 8, '<f4': 4, '<i4': 4, '<i1': 1, '<u1': 1 } as const;
/** Largest file read: the reader holds all of it in memory. */
const largestFile = 2 ** 30;
/** Deflate packs at most 1032 bytes into one (zlib's technical notes): a file that declares more is damaged. */
const largestCompression = 1032;
/** Values in one chunk; the writer stays below 2^17. */
const largestChunk = 2 ** 22;

/** Opens a complete HDF5 file. @throws ResultFileError */
export function openHdf5(path: string): Hdf5Reader {
  const { file, size } = openFile(path, largestFile);
  const names = new Set(decoding(path, () => file.keys));

  const damaged = (what: string): ResultFileError => new ResultFileError('damaged', path, `the file is damaged: ${what}`);

  const dataset = (name: string): Dataset => {
    if (!names.has(name.split('/', 1)[0] ?? '')) throw damaged(`${name} is missing`);
    const found = file.get(name);
    if (!(found instanceof Dataset)) throw damaged(`${name} is not a variable`);
    return found;
  };

  /** Plain array of the values, once shape and type are as expected and can be in a file of this size. */
  const values = (name: string, shape: readonly (number | null)[], dtype: keyof typeof widths): number[] => {
    const found = dataset(name);
    const declared = found.shape;
    if (found.dtype !== dtype) throw damaged(`${name} has another number format than expected`);
    if (declared.length !== shape.length || shape.some((length, axis) => length !== null && declared[axis] !== length)) {
      throw damaged(`${name} has the shape (${declared.join(', ')}), expected (${shape.map((length) => length ?? 'any').join(', ')})`);
    }
    return storedNumbers(path, size, name, found, widths[dtype]);
  };

  return {
    names,
    attribute: (name) =>
      decoding(path, () => {
        const value = file.attrs[name];
        return typeof value === 'string' ? withoutPadding(value) : null;
      }),
    float64: (name, shape) => decoding(path, () => Float64Array.from(values(name, shape, '<f8'))),
    float32: (name, shape) => decoding(path, () => Float32Array.from(values(name, shape, '<f4'))),
    int32: (name, shape) => decoding(path, () => Int32Array.from(values(name, shape, '<i4'))),
    int8: (name, shape) => decoding(path, () => Int8Array.from(values(name, shape, '<i1'))),
    bytes: (name) => decoding(path, () => Uint8Array.from(values(name, [null], '<u1'))),
    members: (group) =>
      decoding(path, () => {
        if (!names.has(group)) return [];
        const found = file.get(group);
        if (!(found instanceof Group)) throw damaged(`${group} is not a group`);
        return found.keys.sort();
      }),
    text: (name) =>
      decoding(path, () => {
        const found = dataset(name);
        if (product(found.shape) !== 1) throw damaged(`${name} is not one text`);
        const [value] = found.value;
        if (typeof value !== 'string') throw damaged(`${name} is not a text`);
        return withoutPadding(value);
      }),
  };
}

/** A complete HDF5 file of at most `largest` bytes, with its size. @throws ResultFileError */
export function openFile(path: string, largest: number): { readonly file: File; readonly size: number } {
  const size = checkComplete(path);
  if (size > largest) throw new ResultFileError('too-large', path, `is ${size} bytes long; at most ${largest} are read`);
  const file = decoding(path, () => {
    const bytes = readFileSync(path);
    const whole = bytes.byteLength === bytes.buffer.byteLength;
    // A small file is a slice of a pool of Node's: jsfive counts from the start of the buffer.
    return new File((whole ? bytes.buffer : bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength)) as ArrayBuffer);
  });
  return { file, size };
}

/** Plain array of the values of a numeric dataset, once what it declares can be in a file of this size.
 *  @param width  bytes of a value */
export function storedNumbers(path: string, size: number, name: string, found: Dataset, width: number): number[] {
  const damaged = (what: string): ResultFileError => new ResultFileError('damaged', path, `the file is damaged: ${what}`);
  const count = product(found.shape);
  const chunk = found._dataobjects.chunks;
  if (count * width > size * (chunk ? largestCompression : 1)) throw damaged(`${name} declares more values than the file can hold`);
  if (chunk && !(product(chunk) <= largestChunk)) throw damaged(`${name} declares chunks of ${product(chunk)} values`);
  const read = found.value;
  if (read.length !== count) throw damaged(`${name} holds ${read.length} values, expected ${count}`);
  // An indexed loop: array methods would skip the holes this looks for.
  for (let i = 0; i < count; i++) if (typeof read[i] !== 'number') throw damaged(`${name} has values that were never written`);
  return read as number[];
}

/** Checks, by its first bytes alone, that this is an HDF5 file of 64-bit addressing and none of it is missing.
 *  Equation of the check: the end-of-file address of the superblock (HDF5 file format specification, section II.A) ≤ size of the file.
 *  @returns the size of the file [bytes]
 *  @throws ResultFileError */
export function checkComplete(path: string): number {
  const head = Buffer.alloc(56);
  let size = 0;
  try {
    // Before opening: a pipe that nobody writes would wait for ever.
    const status = statSync(path);
    if (status.isDirectory()) throw new ResultFileError('not-a-file', path, 'is a folder, not a file');
    if (!status.isFile()) throw new ResultFileError('not-a-file', path, 'is not a regular file');
    size = status.size;
    const descriptor = openSync(path, 'r');
    try {
      readSync(descriptor, head, 0, head.length, 0);
    } finally {
      closeSync(descriptor);
    }
  } catch (thrown) {
    throw resultFileError(path, thrown);
  }
  if (!head.subarray(0, 8).equals(signature)) throw notAResult(path);
  // A cut inside the header leaves zeros, which read as version 0 with an end at 0; nothing complete is that short.
  if (size < shortestFile) throw cutShort(path, size);
  const version = head[8] as number;
  const [offsetSize, lengthSize, endAt] = version === 0 ? [head[13], head[14], 40] : [head[9], head[10], 28];
  // Other versions and widths are legal HDF5, and never written by this program.
  if ((version !== 0 && version !== 2 && version !== 3) || offsetSize !== 8 || lengthSize !== 8) throw notAResult(path);
  const end = Number(head.readBigUInt64LE(endAt));
  if (end > size) throw cutShort(path, size, end);
  return size;
}

const signature = Buffer.from([0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a]);
/** Superblock version 0 with its root entry. */
const shortestFile = 96;

export function notAResult(path: string): ResultFileError {
  return new ResultFileError('foreign', path, 'is not a gapwake result');
}

function cutShort(path: string, size: number, end?: number): ResultFileError {
  const expected = end === undefined ? '' : ` of ${end}`;
  return new ResultFileError('damaged', path, `the file is cut short: only ${size}${expected} bytes are there`);
}

/** Runs jsfive: silent on the console, and with every failure typed. */
export function decoding<T>(path: string, decode: () => T): T {
  const warn = console.warn;
  console.warn = () => {};
  try {
    return decode();
  } catch (thrown) {
    if (thrown instanceof ResultFileError) throw thrown;
    if (typeof (thrown as { syscall?: unknown } | null)?.syscall === 'string') throw resultFileError(path, thrown);
    throw new ResultFileError('damaged', path, 'the file is damaged: its contents cannot be decoded');
  } finally {
    console.warn = warn;
  }
}

export function withoutPadding(text: string): string {
  let end = text.length;
  while (end > 0 && text.charCodeAt(end - 1) === 0) end--;
  return text.slice(0, end);
}

function product(lengths: readonly number[]): number {
  return lengths.reduce((result, length) => result * length, 1);
}
