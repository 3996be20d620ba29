import { gunzipSync } from 'node:zlib';
import { ResultFileError } from './errors.ts';
import type { GridValues } from './hdf5.ts';
import { type Hdf5Reader, openHdf5 } from './hdf5-reader.ts';
import { checkFormat } from './read.ts';
import type { Headline, PlanText, ScanAxis, ScanPoint, ScanTexts } from './scan-variables.ts';
import { headlinesOf, planVariable, pointsGroup, pointVariable, scanFormat, scanTexts } from './scan-variables.ts';

/** A scan read back from its file. The file is held in memory as it is; points are decoded a page at a time, columns when asked for. */
export interface ScanFile extends ScanTexts {
  readonly path: string;
  readonly title: string;
  /** version of the program that wrote the file */
  readonly version: string;
  /** hash of everything that decides the results */
  readonly study: string;
  /** `grid`: the points span the axes, the last fastest; `list`: point i has the i-th value of each axis */
  readonly layout: 'grid' | 'list';
  readonly axes: readonly (ScanAxis & { readonly values: Float64Array })[];
  readonly find: 'hold-off' | 'trip-delay' | 'series-resistance' | null;
  /** points in this file, and in the whole plan */
  readonly count: number;
  readonly total: number;
  /** which share of the plan this is; null: the whole */
  readonly shard: { readonly k: number; readonly n: number } | null;
  /** the columns that {@link ScanFile.column} gives */
  readonly headlines: readonly Headline[];
  /** A headline over all points, in the order of the plan. Flags are indices into their meanings, masks have a bit for each. @throws ResultFileError */
  column(name: string): GridValues;
  /** JSON of every point, in the order of the plan. @throws ResultFileError */
  lines(): Generator<string>;
  /** The same, parsed. @throws ResultFileError */
  points(): Generator<ScanPoint>;
}

/** Opens a scan file.
 *  @throws ResultFileError when it is missing, foreign, of another kind, newer, cut short or damaged */
export function readScanFile(path: string): ScanFile {
  const file = openHdf5(path);
  checkFormat(path, file, scanFormat);
  const damaged = (what: string): ResultFileError => new ResultFileError('damaged', path, `the file is damaged: ${what}`);
  const { study, layout, total, shard, find, axes: declared } = planFrom(file.text(planVariable), damaged);
  const count = layout === 'list' ? file.int32(pointVariable, [null]).length : null;
  const axes = declared.map((axis) => ({ ...axis, values: file.float64(axis.name, [count]) }));
  const shape = count === null ? axes.map(({ values }) => values.length) : [count];
  const headlines = headlinesOf(find);
  const texts = Object.fromEntries(scanTexts.map(({ key, name }) => [key, file.text(name)])) as unknown as ScanTexts;

  const lines = function* (): Generator<string> {
    for (const page of file.members(pointsGroup)) {
      for (const line of pageOf(path, file, page).split('\n')) if (line !== '') yield line;
    }
  };
  return {
    path,
    title: file.attribute('title') ?? '',
    version: file.attribute('version') ?? '',
    study,
    layout,
    axes,
    find,
    count: shape.reduce((product, length) => product * length, 1),
    total,
    shard,
    headlines,
    ...texts,
    column: (name) => {
      const headline = headlines.find((each) => each.name === name);
      if (headline === undefined) throw new RangeError(`a scan has no column ${name}`);
      return columnOf(file, headline, shape);
    },
    lines,
    points: function* () {
      for (const line of lines()) yield pointOf(line, damaged);
    },
  };
}

/** Values of a headline, in the number format of its kind. @throws ResultFileError */
export function columnOf(file: Hdf5Reader, { kind, name }: Headline, shape: readonly number[]): GridValues {
  if (kind === 'number') return file.float64(name, shape);
  return kind === 'flag' ? file.int8(name, shape) : file.int32(name, shape);
}

/** longest text of a page, whatever its compressed bytes declare */
const longestPage = 2 ** 26;

/** Lines of JSON, a point each. @throws ResultFileError */
export function pageOf(path: string, file: Hdf5Reader, page: string): string {
  const bytes = file.bytes(`${pointsGroup}/${page}`);
  try {
    return gunzipSync(bytes, { maxOutputLength: longestPage }).toString();
  } catch {
    throw new ResultFileError('damaged', path, `the file is damaged: the points ${page} cannot be decompressed`);
  }
}

type Damaged = (what: string) => ResultFileError;

function pointOf(line: string, damaged: Damaged): ScanPoint {
  try {
    return JSON.parse(line) as ScanPoint;
  } catch {
    throw damaged('a point is no JSON');
  }
}

function planFrom(json: string, damaged: Damaged): PlanText {
  const isText = (value: unknown): boolean => typeof value === 'string';
  const isCount = (value: unknown): boolean => Number.isSafeInteger(value) && (value as number) > 0;
  try {
    const plan = JSON.parse(json) as PlanText;
    const { study, layout, total, shard, find, axes } = plan;
    const sound =
      isText(study) &&
      (layout === 'grid' || layout === 'list') &&
      isCount(total) &&
      (shard === null || (isCount(shard.k) && isCount(shard.n))) &&
      (find === null || find === 'hold-off' || find === 'trip-delay' || find === 'series-resistance') &&
      axes.every(({ path, unit, name }) => isText(path) && isText(unit) && isText(name)) &&
      (layout === 'list' || axes.length > 0);
    if (sound) return plan;
  } catch {
    // the same as any other text that is no plan
  }
  throw damaged('what it says of its plan is not understood');
}
