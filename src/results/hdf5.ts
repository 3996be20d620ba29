import type { Dataset, File } from 'h5wasm/node';

/** The one place that touches h5wasm, so that its traps are met once. Those that would corrupt a file silently:
 *  - without the throwing error handler a failed call only prints;
 *  - a dtype with digits ('<f8') is stored with half its bytes, and plain numbers are guessed as 32-bit integers that wrap:
 *    only typed arrays go in, and no dtype is passed for them;
 *  - after a failed write, close() reports success on an incomplete file: whoever sees an error must discard the file;
 *  - newer file versions than the default open neither in jsfive nor in common tools: no `libver` is passed;
 *  - an attribute above 64 kB is written and cannot be read back.
 *
 *  Every method throws an {@link Hdf5Error} of one line; the library's own messages run to pages. */
export interface Hdf5Writer {
  /** Text attribute of the file or, with `dataset`, of one of its datasets; at most 32 kB. */
  attribute(name: string, text: string, dataset?: string): void;
  /** Attribute of a dataset that is a short list of whole numbers of the dataset's own kind, as `flag_values` is. */
  numbers(name: string, values: Int8Array | Int32Array, dataset: string): void;
  /** One-dimensional dimension scale: fixed with `data`, growing by {@link Hdf5Writer.append} without. */
  scale(name: string, options: { readonly data: Float64Array | Int32Array } | { readonly chunk: number }): void;
  /** Fixed, compressed dataset over `scales`, filled by {@link Hdf5Writer.put}. */
  grid(name: string, options: GridOptions): void;
  /** Fills a rectangle of a grid: a range [from, to) for each of its dimensions. */
  put(name: string, ranges: readonly (readonly [number, number])[], values: GridValues): void;
  /** Growing dataset over (scales[0]) or (scales[0], scales[1]); only the first grows. `chunk` rows are stored together. */
  variable(name: string, options: VariableOptions): void;
  /** Adds whole rows at the end of a growing scale or variable. */
  append(name: string, rows: Float64Array | Float32Array): void;
  /** Text of any length. Ends at a NUL, which the format cannot hold. */
  text(name: string, text: string): void;
  /** Bytes as they are, in one piece; `group/name` makes the group. */
  bytes(name: string, bytes: Uint8Array): void;
  /** Hands everything to the operating system. */
  flush(): void;
  /** Releases the file, whatever happened before; never throws twice. */
  close(): void;
}

interface VariableOptions {
  readonly scales: readonly [string] | readonly [string, string];
  /** values in a row: 1 for one dimension */
  readonly rowLength: number;
  readonly chunk: number;
  /** float32 is also compressed */
  readonly precision: 'float64' | 'float32';
}

export type GridValues = Float64Array | Int32Array | Int8Array;

interface GridOptions {
  readonly scales: readonly string[];
  readonly shape: readonly number[];
  readonly chunk: readonly number[];
  readonly type: 'float64' | 'int32' | 'int8';
}

export class Hdf5Error extends Error {
  override readonly name = 'Hdf5Error';
}

const longestAttribute = 32_000;

/** Creates (or empties) an HDF5 file. The parent folder must exist. */
export async function createHdf5(path: string): Promise<Hdf5Writer> {
  // Loaded here: starting the library takes longer than most commands, which never write.
  const h5 = await import('h5wasm/node');
  (await h5.ready).activate_throwing_error_handler();
  const file = guarded(() => new h5.File(path, 'w'));
  return writerOn(file);
}

function writerOn(file: File): Hdf5Writer {
  const growing = new Map<string, { readonly dataset: Dataset; readonly rowLength: number; rows: number }>();
  const grids = new Map<string, Dataset>();
  const groups = new Set<string>();
  const describe = (target: File | Dataset, name: string, text: string): void => {
    const bytes = Buffer.byteLength(text);
    if (bytes > longestAttribute) throw new Hdf5Error(`the attribute ${name} is ${bytes} bytes long; at most ${longestAttribute} fit`);
    // A fixed-length string cannot have length 0; one NUL reads back as the empty string.
    target.create_attribute(name, text === '' ? '\0' : text, null, `S${Math.max(bytes, 1)}`);
  };
  let open = true;

  return {
    attribute: (name, text, dataset) =>
      guarded(() => {
        const target = dataset === undefined ? file : (file.get(dataset) as Dataset | null);
        if (target === null) throw new Hdf5Error(`there is no dataset ${dataset}`);
        describe(target, name, text);
      }),

    numbers: (name, values, dataset) =>
      guarded(() => {
        const target = file.get(dataset) as Dataset | null;
        if (target === null) throw new Hdf5Error(`there is no dataset ${dataset}`);
        target.create_attribute(name, values);
      }),

    scale: (name, options) =>
      guarded(() => {
        const dataset =
          'data' in options
            ? file.create_dataset({ name, data: options.data })
            : file.create_dataset({ name, data: new Float64Array(0), shape: [0], maxshape: [null], chunks: [options.chunk] });
        if (!('data' in options)) growing.set(name, { dataset, rowLength: 1, rows: 0 });
        dataset.make_scale(name);
      }),

    grid: (name, { scales, shape, chunk, type }) =>
      guarded(() => {
        // the library takes no shape without data: it begins empty and is brought to its size
        const data = { float64: new Float64Array(0), int32: new Int32Array(0), int8: new Int8Array(0) }[type];
        const compression = { compression: 'gzip' as const, compression_opts: 4 };
        const dataset = file.create_dataset({
          name,
          data,
          shape: [0, ...shape.slice(1)],
          maxshape: [...shape],
          chunks: [...chunk],
          ...compression,
        });
        dataset.resize([...shape]);
        for (const [axis, scale] of scales.entries()) dataset.attach_scale(axis, scale);
        grids.set(name, dataset);
      }),

    put: (name, ranges, values) =>
      guarded(() => {
        const dataset = grids.get(name);
        if (!dataset) throw new Hdf5Error(`${name} is no grid`);
        const size = ranges.reduce((product, [from, to]) => product * (to - from), 1);
        if (size !== values.length) throw new Hdf5Error(`${name}: ${values.length} values for a rectangle of ${size}`);
        dataset.write_slice(
          ranges.map(([from, to]): [number, number] => [from, to]),
          values,
        );
      }),

    variable: (name, { scales, rowLength, chunk, precision }) =>
      guarded(() => {
        const inner = scales.length === 2 ? [rowLength] : [];
        const dataset = file.create_dataset({
          name,
          data: precision === 'float32' ? new Float32Array(0) : new Float64Array(0),
          shape: [0, ...inner],
          maxshape: [null, ...inner],
          chunks: [chunk, ...inner],
          ...(precision === 'float32' ? { compression: 'gzip' as const, compression_opts: 4 } : {}),
        });
        for (const [axis, scale] of scales.entries()) dataset.attach_scale(axis, scale);
        growing.set(name, { dataset, rowLength, rows: 0 });
      }),

    append: (name, values) =>
      guarded(() => {
        const target = growing.get(name);
        if (!target) throw new Hdf5Error(`${name} does not grow`);
        const { dataset, rowLength, rows } = target;
        const end = rows + values.length / rowLength;
        if (!Number.isInteger(end)) throw new Hdf5Error(`${name}: ${values.length} values are not whole rows of ${rowLength}`);
        if (end === rows) return;
        const inner = dataset.shape?.slice(1) ?? [];
        dataset.resize([end, ...inner]);
        dataset.write_slice([[rows, end], ...inner.map((): [] => [])], values);
        target.rows = end;
      }),

    // Variable length: both common readers then give text, where a fixed length gives one of them bytes.
    text: (name, text) => guarded(() => void file.create_dataset({ name, data: text, dtype: 'S' })),

    bytes: (name, bytes) =>
      guarded(() => {
        const group = name.slice(0, name.lastIndexOf('/'));
        if (group !== '' && !groups.has(group)) {
          file.create_group(group);
          groups.add(group);
        }
        file.create_dataset({ name, data: bytes });
      }),

    flush: () => guarded(() => file.flush()),

    close: () => {
      if (!open) return;
      open = false;
      guarded(() => file.close());
    },
  };
}

/** Runs one call of the library; what it throws becomes one line. */
function guarded<T>(call: () => T): T {
  try {
    return call();
  } catch (thrown) {
    if (thrown instanceof Hdf5Error) throw thrown;
    const text = thrown instanceof Error ? thrown.message : String(thrown);
    const cause = /error message = '([^']*)'/.exec(text)?.[1] ?? text.split('\n').find((line) => line.trim() !== '') ?? 'unknown';
    throw new Hdf5Error(cause.trim().slice(0, 200));
  }
}
