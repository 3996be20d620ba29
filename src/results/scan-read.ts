import { ResultFileError } from './errors.ts';
import type { GridValues } from './hdf5.ts';
import { type Hdf5Reader, openHdf5 } from './hdf5-reader.ts';
import { checkFormat } from './read.ts';
import type { Headline, ScanAxis, ScanPoint, ScanTexts } from './scan-variables.ts';
import { headlinesOf, pointsGroup, pointVariable, scanFormat, scanTexts } from './scan-variables.ts';

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
  const attribute = (name: string, pattern: RegExp): string => {
    const text = file.attribute(name) ?? '';
    if (!pattern.test(text)) throw damaged(`its ${name} is not understood`);
    return text;
  };

  const layout = attribute('layout', /^(grid|list)$/) as ScanFile['layout'];
  const find = attribute('find', /^(nothing|hold-off|trip-delay|series-resistance)$/);
  const what = find === 'nothing' ? null : (find as NonNullable<ScanFile['find']>);
  const share = file.attribute('shard') === null ? null : attribute('shard', /^[1-9][0-9]{0,6}\/[1-9][0-9]{0,6}$/).split('/');
  const count = layout === 'list' ? file.int32(pointVariable, [null]).length : null;
  const axes = axesOf(file.text('axes_json'), damaged).map((axis) => ({ ...axis, values: file.float64(axis.name, [count]) }));
  const shape = count === null ? axes.map(({ values }) => values.length) : [count];
  const headlines = headlinesOf(what);
  const texts = Object.fromEntries(scanTexts.map(({ key, name }) => [key, file.text(name)])) as unknown as ScanTexts;

  const lines = function* (): Generator<string> {
    for (const page of file.members(pointsGroup)) {
      const text = Buffer.from(file.bytes(`${pointsGroup}/${page}`)).toString();
      for (const line of text.split('\n')) if (line !== '') yield line;
    }
  };
  return {
    path,
    title: file.attribute('title') ?? '',
    version: file.attribute('version') ?? '',
    study: attribute('study', /^[0-9a-f]{64}$/),
    layout,
    axes,
    find: what,
    count: shape.reduce((product, length) => product * length, 1),
    total: Number(attribute('total', /^[1-9][0-9]{0,8}$/)),
    shard: share === null ? null : { k: Number(share[0]), n: Number(share[1]) },
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

type Damaged = (what: string) => ResultFileError;

function pointOf(line: string, damaged: Damaged): ScanPoint {
  try {
    return JSON.parse(line) as ScanPoint;
  } catch {
    throw damaged('a point is no JSON');
  }
}

function axesOf(json: string, damaged: Damaged): ScanAxis[] {
  const isText = (value: unknown): value is string => typeof value === 'string';
  try {
    const axes = JSON.parse(json) as ScanAxis[];
    if (Array.isArray(axes) && axes.every((axis) => isText(axis?.path) && isText(axis.unit) && isText(axis.name))) return axes;
  } catch {
    // the same as any other text that is not a list of axes
  }
  throw damaged('its axes are not understood');
}
