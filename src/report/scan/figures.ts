import { type Rgb, SCALE } from '../colour.ts';
import { type Element, el } from '../element.ts';
import { type Box, type Figure, LINE, round } from '../figure/frame.ts';
import { type Curve, KEY_WIDTH, lineFigure } from '../figure/lines.ts';
import { colourBar, colourNumber, mapFigure, type Picture } from '../figure/map.ts';
import { engineeringLabel, linear, logarithmic, type Room, type Scale } from '../figure/scale.ts';
import { contour, type Piece } from './contours.ts';
import {
  axisValue,
  columnOf,
  indicesOf,
  placeOf,
  pointsAlong,
  type ScanAxisValues,
  type ScanColumn,
  type ScanTable,
  type ScanView,
} from './data.ts';

/** The figures of a scan: curves over one varied entry, maps over two. */

const LEFT = 74;
/** lines of equal value in a map */
const MOST_LEVELS = 7;

/** Colours of the verdicts: pale, dark and in between, so that they differ in lightness too. */
const VERDICTS: Readonly<Record<string, { readonly colour: Rgb; readonly word: string; readonly dot: string }>> = {
  holds: { colour: [211, 222, 228], word: 'holds', dot: 'dot' },
  'breaks-down': { colour: [133, 40, 58], word: 'breaks down', dot: 'dot dot-alarm' },
  undecided: { colour: [222, 170, 40], word: 'undecided', dot: 'dot dot-doubt' },
  failed: { colour: [120, 120, 120], word: 'no answer', dot: 'dot dot-beyond' },
};
/** what a search says of a point, as dots */
const FOUND: Readonly<Record<string, { readonly word: string; readonly dot: string }>> = {
  found: { word: 'found', dot: 'dot' },
  'none-breaks-down': { word: 'all holds', dot: 'dot dot-beyond' },
  'none-holds': { word: 'none holds', dot: 'dot dot-alarm' },
  undecided: { word: 'undecided', dot: 'dot dot-doubt' },
  failed: { word: 'no answer', dot: 'dot dot-beyond' },
};
const UNKNOWN: Rgb = [160, 160, 160];

/** An axis over the values of a varied entry: logarithmic where they are spaced that way. */
function scanAxis({ path, unit, values }: ScanAxisValues, margin: number): (length: number) => Scale {
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const shown = unit === '1' ? '' : unit;
  const room = (length: number): Room => ({ length, apart: margin });
  if (!(high > low)) {
    const half = Math.abs(low) * 0.1 || 0.5;
    return (length) => linear(path, shown, low - half, high + half, room(length), false);
  }
  if (isLogarithmic(values)) return (length) => logarithmic(path, shown, low, high, room(length));
  return (length) => linear(path, shown, low, high, room(length), false);
}

/** The axis under curves: a little wider than the values, so that the outermost points are whole. */
export function curveAxis(axis: ScanAxisValues): (length: number) => Scale {
  const [low, high] = [Math.min(...axis.values), Math.max(...axis.values)];
  if (!(high > low)) return scanAxis(axis, 70);
  const wide = isLogarithmic(axis.values)
    ? [low * (low / high) ** 0.02, high * (high / low) ** 0.02]
    : [low - 0.02 * (high - low), high + 0.02 * (high - low)];
  const unit = axis.unit === '1' ? '' : axis.unit;
  return (length) =>
    isLogarithmic(axis.values)
      ? logarithmic(axis.path, unit, wide[0], wide[1], { length, apart: 70 })
      : linear(axis.path, unit, wide[0], wide[1], { length, apart: 70 }, false);
}

/** Whether steps are more even in the logarithm. */
function isLogarithmic(values: readonly number[]): boolean {
  const sorted = [...values].sort((a, b) => a - b);
  if (!(sorted[0] > 0) || sorted.length < 3) return false;
  const spread = (of: (v: number) => number): number => {
    const steps = sorted.slice(1).map((v, i) => of(v) - of(sorted[i]));
    const positive = steps.filter((step) => step > 0);
    return Math.max(...positive) / Math.min(...positive);
  };
  return sorted[sorted.length - 1] > 2 * sorted[0] && spread(Math.log) < spread((v) => v);
}

/** Whether a quantity is shown on a logarithmic axis: where it is positive and spans a factor of ten. */
function valueScale({ longName: plainName, units, values }: ScanColumn, also: readonly number[], apart: number): (length: number) => Scale {
  let [low, high, positive] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, true];
  for (const list of [values, also])
    for (let i = 0; i < list.length; i++) {
      const v = list[i];
      if (!Number.isFinite(v)) continue;
      low = Math.min(low, v);
      high = Math.max(high, v);
      if (v <= 0) positive = false;
    }
  const longName = capital(plainName);
  const unit = units === '1' ? '' : units;
  if (!(low <= high)) return (length) => linear(longName, unit, 0, 1, { length, apart });
  if (positive && high > 10 * low) return (length) => logarithmic(longName, unit, low, high, { length, apart });
  return (length) => linear(longName, unit, low, high > low ? high : low + (Math.abs(low) || 1) * 0.1, { length, apart });
}

/** A quantity along one varied entry, with theory and its band over the yields where there is one, and the verdict of each point below. */
export function curveFigure(table: ScanTable, view: ScanView, name: string, selected: number | null, width: number): Figure {
  const column = columnOf(table, name) ?? table.columns[0];
  const places = pointsAlong(table, view);
  const xs = places.map((place) => axisValue(table, place, view.x));
  const ys = places.map((place) => column.values[place]);
  const { band } = table;
  const beside = band !== null && band.column === name && places.length === band.typical.length ? band : null;
  const pick = (values: readonly (number | null)[]): number[] => places.map((place) => values[place] ?? Number.NaN);
  const theory = columnOf(table, name === 'found_value' ? 'found_theory' : '');
  const typical = beside !== null ? pick(beside.typical) : theory === null ? null : places.map((place) => theory.values[place]);
  const bandCurves = beside === null ? [] : [pick(beside.low), pick(beside.high)];
  const curves: Curve[] = [
    ...(typical === null ? [] : [{ name: 'theory', style: 's2', x: xs, y: typical }]),
    // points that share an x are no curve
    { name: 'simulated', style: 's1', x: xs, y: ys, points: new Set(xs).size < xs.length },
  ];
  const ofSearch = name.startsWith('found_');
  const state = columnOf(table, ofSearch ? 'found_state' : 'verdict');
  const words = places.map((place) => (state === null ? '' : (state.meanings[state.values[place]] ?? '')));
  const dotOf = (word: string): { readonly word: string; readonly dot: string } =>
    (ofSearch ? FOUND : VERDICTS)[word] ?? { word: 'no answer', dot: 'dot dot-beyond' };
  const also = [...(typical ?? []), ...bandCurves.flat()];
  return lineFigure(
    {
      id: 'curve',
      title: column.longName,
      description: `${column.longName} against ${table.axes[view.x].path}`,
      width,
      height: 400,
      left: LEFT,
      right: width < 480 ? 18 : KEY_WIDTH + 30,
      curves,
      dots: [...new Set(words)].map((word) => ({ name: dotOf(word).word, dot: dotOf(word).dot })),
      footer: ys.every(Number.isFinite) ? [] : ['Bars at the foot: points that have no such value.'],
      areas: beside === null ? [] : [{ name: 'yield’s spread', fill: 'band' }],
      under: (box, x, y) => (beside === null ? [] : [bandArea(xs, bandCurves[0], bandCurves[1], box, x, y)]),
      over: (box, x, y) =>
        places.map((place, i) => {
          const [px, sy] = [box.left + x.at(xs[i]) * box.width, y.at(ys[i])];
          if (!Number.isFinite(px)) return null;
          const kind = dotOf(words[i]).dot;
          // a point without a value is a bar at the foot of the figure: its verdict counts all the same
          const valued = Number.isFinite(sy);
          const py = valued ? box.top + (1 - sy) * box.height : box.top + box.height - 6;
          return el(
            'g',
            {},
            valued
              ? el('circle', { class: kind, cx: round(px), cy: round(py), r: 4, 'data-point': place })
              : el('rect', { class: kind, x: round(px - 2.5), y: round(py - 6), width: 5, height: 12, 'data-point': place }),
            place === selected ? el('circle', { class: 'now', cx: round(px), cy: round(py), r: 8 }) : null,
          );
        }),
    },
    curveAxis(table.axes[view.x]),
    valueScale({ ...column, values: Float64Array.from(ys) }, also, 24),
  );
}

function bandArea(xs: readonly number[], low: readonly number[], high: readonly number[], box: Box, x: Scale, y: Scale): Element | null {
  const at = (i: number, values: readonly number[]): string | null => {
    const [sx, sy] = [x.at(xs[i]), y.at(values[i])];
    return Number.isFinite(sx) && Number.isFinite(sy)
      ? `${round(box.left + sx * box.width)} ${round(box.top + (1 - sy) * box.height)}`
      : null;
  };
  const places = xs.map((_, i) => i).filter((i) => at(i, low) !== null && at(i, high) !== null);
  if (places.length < 2) return null;
  const there = places.map((i) => at(i, low));
  const back = [...places].reverse().map((i) => at(i, high));
  return el('path', { class: 'area band', d: `M${[...there, ...back].join('L')}Z` });
}

/** The verdict over two varied entries, with theory's threshold as a line. */
export function verdictMap(table: ScanTable, view: ScanView, selected: number | null, width: number, picture: Picture): Figure {
  const column = columnOf(table, 'verdict');
  const palette = (column?.meanings ?? []).map((word) => VERDICTS[word]?.colour ?? UNKNOWN);
  const used = new Set<number>();
  const grid = new GridView(table, view);
  grid.each((place) => used.add(column?.values[place] ?? 0));
  const overvoltage = columnOf(table, 'overvoltage');
  return mapFigure(
    {
      ...base('verdict-map', 'Verdict', width),
      heading: 'Verdict',
      yName: grid.yTitle,
      paint: grid.paint((place) => column?.values[place] ?? 0),
      palette,
      beside: (box) => [
        ...[...used].sort().map((value, i) => {
          const word = column?.meanings[value] ?? '';
          const y = box.top + 2 + i * (LINE + 6);
          const left = box.left + box.width + 10;
          return el(
            'g',
            { class: 'key' },
            el('rect', { class: 'edge', x: left, y, width: 14, height: 12, fill: `rgb(${(palette[value] ?? UNKNOWN).join(',')})` }),
            el('text', { x: left + 20, y: y + 11 }, VERDICTS[word]?.word ?? word),
          );
        }),
        overvoltage === null ? null : lineKey(box, 'theory', used.size),
      ],
      over: (box, x, y) => [
        ...(overvoltage === null ? [] : grid.contours((place) => overvoltage.values[place], [0], box, null)),
        grid.ring(selected, box, x, y),
      ],
    },
    grid.xScale,
    grid.yScale,
    picture,
  );
}

function lineKey(box: Box, name: string, row: number): Element {
  const [left, y] = [box.left + box.width + 10, box.top + 8 + row * (LINE + 6)];
  return el('g', { class: 'key' }, el('path', { class: 'level', d: `M${left} ${y}h14` }), el('text', { x: left + 20, y: y + 4 }, name));
}

/** A quantity over two varied entries, with lines of equal value. */
export function quantityMap(
  table: ScanTable,
  view: ScanView,
  name: string,
  selected: number | null,
  width: number,
  picture: Picture,
): Figure {
  const column = columnOf(table, name) ?? table.columns[0];
  const grid = new GridView(table, view);
  const shown: number[] = [];
  grid.each((place) => shown.push(column.values[place]));
  const colour = valueScale({ ...column, values: Float64Array.from(shown) }, [], 22);
  const colours = colour(300);
  const labelled = colours.ticks.filter(({ label, at }) => label !== '' && at > 0.001 && at < 0.999);
  const every = Math.ceil(labelled.length / MOST_LEVELS);
  const levels = labelled.filter((_, i) => i % every === 0).map(({ at }) => colours.from(at));
  // where nothing is: grey, the last colour
  const palette: Rgb[] = [...SCALE.slice(0, 255), UNKNOWN];
  return mapFigure(
    {
      ...base('quantity-map', column.longName, width),
      heading: colours.title,
      yName: grid.yTitle,
      paint: grid.paint((place) => {
        const value = column.values[place];
        return Number.isFinite(value) ? Math.min(254, colourNumber(colours, value)) : 255;
      }),
      palette,
      beside: (box) => [
        ...colourBar('quantity-map', box.left + box.width + 10, box.top, box.height - 26, colour(box.height - 26)),
        el('rect', {
          class: 'edge',
          x: box.left + box.width + 10,
          y: box.top + box.height - 12,
          width: 12,
          height: 12,
          fill: `rgb(${UNKNOWN.join(',')})`,
        }),
        el('text', { x: box.left + box.width + 30, y: box.top + box.height - 2 }, 'none'),
      ],
      over: (box, x, y) => {
        const share = (place: number): number => colours.at(column.values[place]);
        return [
          ...grid.contours(
            share,
            levels.map((level) => colours.at(level)),
            box,
            levels.map((level) => engineeringLabel(level, column.units === '1' ? '' : column.units)),
          ),
          grid.ring(selected, box, x, y),
        ];
      },
    },
    grid.xScale,
    grid.yScale,
    picture,
  );
}

function base(
  id: string,
  title: string,
  width: number,
): { id: string; title: string; description: string; width: number; height: number; left: number; right: number } {
  return {
    id,
    title,
    description: `${title}, as colours over two varied entries`,
    width,
    height: 400,
    left: LEFT + 12,
    right: 114, // room for "breaks down" beside its colour, in the widest of usual fonts
  };
}

/** Two axes of a grid, the others held. */
class GridView {
  readonly #table: ScanTable;
  readonly #view: ScanView & { readonly y: number };
  readonly #columns: readonly number[];
  readonly #rows: readonly number[];
  readonly xScale: (length: number) => Scale;
  readonly yScale: (length: number) => Scale;
  readonly yTitle: string;

  constructor(table: ScanTable, view: ScanView) {
    this.#table = table;
    this.#view = { ...view, y: view.y ?? view.x };
    const rising = (axis: number): number[] =>
      table.axes[axis].values.map((_, i) => i).sort((a, b) => table.axes[axis].values[a] - table.axes[axis].values[b]);
    this.#columns = rising(this.#view.x);
    this.#rows = rising(this.#view.y);
    this.xScale = bordered(table.axes[this.#view.x], 64);
    this.yScale = bordered(table.axes[this.#view.y], 26);
    this.yTitle = this.yScale(300).title;
  }

  #place(column: number, row: number): number {
    const { axes } = this.#table;
    const { x, y, fixed } = this.#view;
    return placeOf(
      axes,
      fixed.map((at, k) => (k === x ? this.#columns[column] : k === y ? this.#rows[row] : at)),
    );
  }

  each(visit: (place: number) => void): void {
    for (let j = 0; j < this.#rows.length; j++) for (let i = 0; i < this.#columns.length; i++) visit(this.#place(i, j));
  }

  /** the point nearest to a share of both axes */
  nearest(sx: number, sy: number): number {
    return this.#place(nearestShare(this.#shares('x'), sx), nearestShare(this.#shares('y'), sy));
  }

  #shares(which: 'x' | 'y'): number[] {
    const scale = (which === 'x' ? this.xScale : this.yScale)(300);
    const values = this.#table.axes[this.#view[which]].values;
    return (which === 'x' ? this.#columns : this.#rows).map((i) => scale.at(values[i]));
  }

  paint(number: (place: number) => number): (sx: number, sy: number) => number {
    const [xs, ys] = [this.#shares('x'), this.#shares('y')];
    return (sx, sy) => number(this.#place(nearestShare(xs, sx), nearestShare(ys, sy)));
  }

  contours(value: (place: number) => number, levels: readonly number[], box: Box, labels: readonly string[] | null): (Element | null)[] {
    const [xs, ys] = [this.#shares('x'), this.#shares('y')];
    const taken: (readonly [number, number])[] = [];
    return levels.flatMap((level, k): (Element | null)[] => {
      const pieces = contour(xs, ys, (i, j) => value(this.#place(i, j)), level);
      if (pieces.length === 0) return [];
      const px = (s: number): number => round(box.left + s * box.width);
      const py = (s: number): number => round(box.top + (1 - s) * box.height);
      const d = pieces.map((p) => `M${px(p.x1)} ${py(p.y1)}L${px(p.x2)} ${py(p.y2)}`).join('');
      const label = labels === null ? null : placeForLabel(pieces, taken, px, py, (4 * labels[k].length + 4) / box.width);
      if (label !== null) taken.push(label);
      return [
        el('path', { class: 'halo', d }),
        el('path', { class: 'level', d }),
        label === null || labels === null
          ? null
          : el('g', { class: 'mark' }, el('text', { x: label[0], y: label[1] - 3, 'text-anchor': 'middle' }, labels[k])),
      ];
    });
  }

  ring(selected: number | null, box: Box, x: Scale, y: Scale): Element | null {
    if (selected === null) return null;
    const { axes } = this.#table;
    const at = indicesOf(axes, selected);
    const { x: xAxis, y: yAxis, fixed } = this.#view;
    if (at.some((i, k) => k !== xAxis && k !== yAxis && i !== fixed[k])) return null;
    const place = {
      cx: round(box.left + x.at(axes[xAxis].values[at[xAxis]]) * box.width),
      cy: round(box.top + (1 - y.at(axes[yAxis].values[at[yAxis]])) * box.height),
      r: 7,
    };
    return el('g', {}, el('circle', { class: 'halo', ...place }), el('circle', { class: 'now', ...place }));
  }
}

/** The name of a column as a heading: without what explains it after a colon or semicolon. */
function capital(text: string): string {
  const [name] = text.split(/[:;]/);
  return `${name.slice(0, 1).toUpperCase()}${name.slice(1)}`;
}

/** Which point of a map is meant at a share of both axes. */
export function pointAt(table: ScanTable, view: ScanView, sx: number, sy: number): number {
  return new GridView(table, view).nearest(sx, sy);
}

/** Half a step of room around the outermost values, so that every point has its own patch. */
function bordered(axis: ScanAxisValues, apart: number): (length: number) => Scale {
  const sorted = [...axis.values].sort((a, b) => a - b);
  const n = sorted.length;
  if (n < 2) return scanAxis(axis, apart);
  const logarithmicSteps = isLogarithmic(axis.values);
  const half = (a: number, b: number): number => (logarithmicSteps ? a * Math.sqrt(a / b) : a + (a - b) / 2);
  const [low, high] = [half(sorted[0], sorted[1]), half(sorted[n - 1], sorted[n - 2])];
  const unit = axis.unit === '1' ? '' : axis.unit;
  return (length) =>
    logarithmicSteps
      ? logarithmic(axis.path, unit, low, high, { length, apart })
      : linear(axis.path, unit, low, high, { length, apart }, false);
}

function nearestShare(shares: readonly number[], share: number): number {
  let [low, high] = [0, shares.length - 1];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (shares[middle] <= share) low = middle;
    else high = middle;
  }
  return shares[high] - share < share - shares[low] ? high : low;
}

/** Where on a line its value can stand: farthest from the labels that are there already, the first near the middle; null where there is no room.
 *  @param half  of the width of the label, as a share of the plot's */
function placeForLabel(
  pieces: readonly Piece[],
  taken: readonly (readonly [number, number])[],
  px: (share: number) => number,
  py: (share: number) => number,
  half: number,
): readonly [number, number] | null {
  let best: readonly [number, number] | null = null;
  let most = -Infinity;
  for (const { x1, x2, y1, y2 } of pieces) {
    const [sx, sy] = [(x1 + x2) / 2, (y1 + y2) / 2];
    // labels are wider than high, and must stay inside
    if (sx < half || sx > 1 - half || sy < 0.03 || sy > 0.93) continue;
    const place = [px(sx), py(sy)] as const;
    const apart = Math.min(120, ...taken.map(([x, y]) => Math.hypot((place[0] - x) / 3, place[1] - y) * 3));
    const worth = apart - 20 * Math.hypot(sx - 0.5, sy - 0.5);
    if (apart >= 48 && worth > most) [best, most] = [place, worth];
  }
  return best;
}
