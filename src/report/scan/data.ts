/** What the figures of a scan are drawn from: plain data, the same in Node and in the page. SI. */
export interface ScanTable {
  readonly axes: readonly ScanAxisValues[];
  /** `grid`: the points span the axes, the last fastest; `list`: point i has the i-th value of each axis */
  readonly layout: 'grid' | 'list';
  readonly count: number;
  readonly columns: readonly ScanColumn[];
  /** one sentence for each point: why this verdict, or why there is none */
  readonly reasons: readonly string[];
  /** theory over the ends of the yields' spread, where one entry is varied */
  readonly band: YieldBand | null;
}

export interface ScanAxisValues {
  readonly path: string;
  /** UDUNITS; `1` for pure numbers */
  readonly unit: string;
  readonly values: readonly number[];
}

export interface ScanColumn {
  readonly name: string;
  readonly longName: string;
  readonly units: string;
  /** `flag`: the values are places in `meanings`; `mask`: bits of them */
  readonly kind: 'number' | 'count' | 'flag' | 'mask';
  readonly meanings: readonly string[];
  /** NaN where it does not apply */
  readonly values: Float64Array;
}

/** Theory beside the column it is about, at each point. */
export interface YieldBand {
  readonly column: string;
  readonly typical: readonly (number | null)[];
  readonly low: readonly (number | null)[];
  readonly high: readonly (number | null)[];
}

/** Which part of a table is shown. */
export interface ScanView {
  readonly x: number;
  /** null: curves over x */
  readonly y: number | null;
  /** index of the value of every axis; those of x and y do not matter for what is shown */
  readonly fixed: readonly number[];
}

export function columnOf(table: Pick<ScanTable, 'columns'>, name: string): ScanColumn | null {
  return table.columns.find((column) => column.name === name) ?? null;
}

/** The column that matters most: what was searched for, or else the lag. */
export function mainColumn(table: ScanTable): string {
  return columnOf(table, 'found_value') === null ? 'formative_lag' : 'found_value';
}

/** Columns that can be drawn: numbers that apply somewhere. */
export function drawable(table: ScanTable): ScanColumn[] {
  return table.columns.filter(({ kind, values }) => (kind === 'number' || kind === 'count') && values.some((v) => Number.isFinite(v)));
}

/** The place in the table of a point of a grid. */
export function placeOf(axes: readonly ScanAxisValues[], indices: readonly number[]): number {
  return axes.reduce((place, { values }, k) => place * values.length + indices[k], 0);
}

/** The indices of a point along each axis of a grid. */
export function indicesOf(axes: readonly ScanAxisValues[], place: number): number[] {
  const indices = axes.map(() => 0);
  let rest = place;
  for (let k = axes.length - 1; k >= 0; k--) {
    indices[k] = rest % axes[k].values.length;
    rest = Math.floor(rest / axes[k].values.length);
  }
  return indices;
}

/** The points that a view of curves shows, in the order of their x. */
export function pointsAlong({ axes, layout, count }: ScanTable, { x, fixed }: ScanView): number[] {
  const values = axes[x].values;
  const places =
    layout === 'list'
      ? Array.from({ length: count }, (_, i) => i)
      : values.map((_, i) =>
          placeOf(
            axes,
            fixed.map((at, k) => (k === x ? i : at)),
          ),
        );
  const xOf = (place: number): number => (layout === 'list' ? values[place] : values[indicesOf(axes, place)[x]]);
  return places.sort((a, b) => xOf(a) - xOf(b));
}

/** The value of an axis at a point. */
export function axisValue({ axes, layout }: Pick<ScanTable, 'axes' | 'layout'>, place: number, axis: number): number {
  return axes[axis].values[layout === 'list' ? place : indicesOf(axes, place)[axis]];
}

/** The words of a flag or a mask at a point, or its number; null where it does not apply. */
export function meaningAt({ kind, meanings, values }: ScanColumn, place: number): string | number | null {
  const value = values[place];
  if (!Number.isFinite(value)) return null;
  if (kind === 'flag') return meanings[value] ?? '?';
  if (kind === 'mask') return meanings.filter((_, bit) => Math.floor(value / 2 ** bit) % 2 === 1).join(', ') || 'none';
  return kind === 'count' && value < 0 ? null : value;
}
