import { Dataset, Group } from 'jsfive';
import { ResultFileError } from './errors.ts';
import { decoding, openFile, storedNumbers, withoutPadding } from './hdf5-reader.ts';

/** Values of a dataset in somebody else's file, or why there are none. */
export type NumbersRead =
  | { readonly ok: true; readonly values: Float64Array; readonly units: string | null }
  | { readonly ok: false; readonly reason: string };

const largestFile = 64e6;
const mostValues = 1_000_000;

/** Reads a one-dimensional dataset of finite numbers and its attribute `units` from any HDF5 file of at most 64 MB.
 *
 *  Integers and floats of any width and byte order, contiguous or chunked, with deflate, shuffle and checksum; at most 1e6 values. What the
 *  latest HDF5 layouts, compact storage or other filters hold cannot be read and is said.
 *  @param name  path in the file, `/log/pressure`
 *  @returns `units` is null without such a text. Never throws. */
export function readNumbers(path: string, name: string): NumbersRead {
  try {
    const { file, size } = openFile(path, largestFile);
    return decoding(path, () => {
      const found = datasetAt(file, name);
      if (typeof found === 'string') return { ok: false, reason: found };
      const { shape, dtype } = found;
      const width = typeof dtype === 'string' ? /^[<>|](?:[iu]([1248])|f([248]))$/.exec(dtype) : null;
      if (width === null) return { ok: false, reason: `${name} holds no numbers` };
      if (shape.length !== 1) return { ok: false, reason: `${name} has ${shape.length} dimensions, not one` };
      if (!(shape[0] <= mostValues)) return { ok: false, reason: `${name} has ${shape[0]} values, more than ${mostValues}` };
      const values = Float64Array.from(storedNumbers(path, size, name, found, Number(width[1] ?? width[2])));
      const broken = values.findIndex((value) => !Number.isFinite(value));
      if (broken >= 0) return { ok: false, reason: `${name} holds ${values[broken]} at index ${broken}` };
      return { ok: true, values, units: unitsOf(found) };
    });
  } catch (thrown) {
    if (thrown instanceof ResultFileError) return { ok: false, reason: reasons[thrown.code] ?? thrown.message };
    throw thrown;
  }
}

const reasons: Readonly<Record<string, string>> = {
  missing: 'no such file',
  'too-large': `more than ${largestFile / 1e6} MB`,
  foreign: 'no HDF5 file, or one of an unusual kind',
};

/** The dataset at a path, or what stands in the way. */
function datasetAt(file: Group, name: string): Dataset | string {
  let here: Group | Dataset | null = file;
  const steps = name.split('/').filter((step) => step !== '');
  for (const [depth, step] of steps.entries()) {
    const above: string = `/${steps.slice(0, depth).join('/')}`;
    if (!(here instanceof Group)) return `${above} is no group`;
    const names: string[] = here.keys;
    if (!names.includes(step)) return `no ${step} in ${above}, which has ${names.slice(0, 8).join(', ') || 'nothing'}`;
    here = here.get(step);
  }
  return here instanceof Dataset ? here : `${name || 'an empty path'} is no data set`;
}

/** The text of the attribute `units`; other attributes may be of kinds that cannot be read. */
function unitsOf(dataset: Dataset): string | null {
  try {
    const value = dataset.attrs.units;
    const text = Array.isArray(value) && value.length === 1 ? value[0] : value;
    return typeof text === 'string' ? withoutPadding(text).trim() : null;
  } catch {
    return null;
  }
}
