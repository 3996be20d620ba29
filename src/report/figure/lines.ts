import { type Element, el } from '../element.ts';
import { type Box, boxOf, type Figure, type FrameSpec, frame, grid, HEADING, LINE, round } from './frame.ts';
import type { Scale } from './scale.ts';

/** One curve; x and y in the units of the axes. */
export interface Curve {
  readonly name: string;
  /** `s1` … `s6`: colour and dashes */
  readonly style: string;
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
  /** rings at the points instead of a line through them */
  readonly points?: boolean;
  /** name under which the page writes its value at the linked time beside its name */
  readonly reading?: string;
}

export interface LineSpec extends FrameSpec {
  readonly curves: readonly Curve[];
  /** areas named in the key: the class that fills them */
  readonly areas?: readonly { readonly name: string; readonly fill: string }[];
  /** dots named in the key, by their classes */
  readonly dots?: readonly { readonly name: string; readonly dot: string }[];
  /** drawn under the curves, in the plot's pixels */
  readonly under?: (box: Box, x: Scale, y: Scale) => readonly (Element | null)[];
  /** drawn over the curves, in the plot's pixels */
  readonly over?: (box: Box, x: Scale, y: Scale) => readonly (Element | null)[];
}

/** A figure of curves, named at its right or, where there is no room, under its title. */
export function lineFigure(spec: LineSpec, xScale: (length: number) => Scale, yScale: (length: number) => Scale): Figure {
  const above = spec.right < KEY_WIDTH;
  // one curve that the heading names needs no key
  const curvesNamed = spec.curves.length === 1 && spec.curves[0].reading === undefined ? [] : spec.curves;
  const named: readonly Keyed[] = [...curvesNamed, ...(spec.areas ?? []), ...(spec.dots ?? [])];
  const keyRows = above ? keyRowsAbove(named, spec.width - spec.left).length : 0;
  const box = boxOf(spec, keyRows);
  const [x, y] = [xScale(box.width), yScale(box.height)];
  const curves = spec.curves.map((curve) =>
    curve.points
      ? el('path', { class: `rings ${curve.style}`, d: ringsOf(curve, box, x, y) })
      : el('path', { class: `curve ${curve.style}`, d: pathOf(curve, box, x, y) }),
  );
  const key = above ? keyAbove(named, spec.left, spec.width) : keyBeside(named, box);
  return frame(
    spec,
    box,
    x,
    y,
    y.title,
    [...(spec.under?.(box, x, y) ?? []), grid(box, x, y), ...curves, ...(spec.over?.(box, x, y) ?? [])],
    key,
  );
}

/** room for names and values beside a plot [px] */
export const KEY_WIDTH = 100;

/** What a key names: a curve, or an area by what fills it. */
type Keyed =
  | Pick<Curve, 'name' | 'style' | 'reading' | 'points'>
  | { readonly name: string; readonly fill: string }
  | { readonly name: string; readonly dot: string };

/** What stands for it in the key, 22 px wide. */
function sample(entry: Keyed, left: number, y: number): Element {
  if ('fill' in entry) return el('rect', { class: `area ${entry.fill}`, x: left, y: y - 5, width: 22, height: 10 });
  if ('dot' in entry) return el('circle', { class: entry.dot, cx: left + 11, cy: y, r: 4 });
  if (entry.points) return el('path', { class: `rings ${entry.style}`, d: ring(left + 11, y) });
  return el('path', { class: `curve ${entry.style}`, d: `M${left} ${y}h22` });
}

function readingOf(entry: Keyed): string | undefined {
  return 'reading' in entry ? entry.reading : undefined;
}

function keyBeside(entries: readonly Keyed[], box: Box): Element[] {
  const left = box.left + box.width + 10;
  let below = box.top + 8;
  return entries.map((entry) => {
    const y = below;
    const { name } = entry;
    const reading = readingOf(entry);
    below += reading === undefined ? LINE + 5 : 2 * LINE + 6;
    return el(
      'g',
      { class: 'key' },
      sample(entry, left, y),
      el('text', { x: left + 27, y: y + 4 }, name),
      reading === undefined ? null : el('text', { class: 'reading', x: left + 27, y: y + 4 + LINE, 'data-reading': reading }, ''),
    );
  });
}

const SAMPLE = 28;

function keyRowsAbove(entries: readonly Keyed[], width: number): Keyed[][] {
  const rows: Keyed[][] = [];
  let used = Number.POSITIVE_INFINITY;
  for (const entry of entries) {
    const needs = widthOf(entry);
    if (used + needs > width) {
      rows.push([]);
      used = 0;
    }
    rows[rows.length - 1].push(entry);
    used += needs;
  }
  return rows;
}

function widthOf(entry: Keyed): number {
  return SAMPLE + 7.1 * ([...entry.name].length + (readingOf(entry) === undefined ? 2 : 14));
}

function keyAbove(entries: readonly Keyed[], left: number, width: number): Element[] {
  return keyRowsAbove(entries, width - left).flatMap((row, k) => {
    let x = left;
    const y = HEADING + (k + 1) * LINE - 4;
    return row.map((entry) => {
      const { name } = entry;
      const reading = readingOf(entry);
      const key = el(
        'g',
        { class: 'key' },
        sample(entry, x, y - 4),
        el(
          'text',
          { x: x + SAMPLE, y },
          `${name} `,
          reading === undefined ? null : el('tspan', { class: 'reading', 'data-reading': reading }, ''),
        ),
      );
      x += widthOf(entry);
      return key;
    });
  });
}

function ringsOf({ x: xs, y: ys }: Curve, box: Box, x: Scale, y: Scale): string {
  return Array.from(xs, (v, i) => [box.left + x.at(v) * box.width, box.top + box.height * (1 - y.at(ys[i]))])
    .filter(([px, py]) => Number.isFinite(px) && Number.isFinite(py))
    .map(([px, py]) => ring(round(px), round(py)))
    .join('');
}

function ring(x: number, y: number): string {
  return `M${round(x - 3.5)} ${y}a3.5 3.5 0 1 0 7 0a3.5 3.5 0 1 0 -7 0`;
}

/** The curve as a path; it breaks where a value cannot be shown. */
export function pathOf({ x: xs, y: ys }: Pick<Curve, 'x' | 'y'>, box: Box, x: Scale, y: Scale): string {
  let d = '';
  let pen = false;
  for (let i = 0; i < xs.length; i++) {
    const px = box.left + x.at(xs[i]) * box.width;
    const py = box.top + box.height * (1 - y.at(ys[i]));
    if (!Number.isFinite(px) || !Number.isFinite(py)) {
      pen = false;
      continue;
    }
    // far outside values would only make renderers lose digits
    const held = Math.max(box.top - 1e4, Math.min(box.top + box.height + 1e4, py));
    d += `${pen ? 'L' : 'M'}${round(px)} ${round(held)}`;
    pen = true;
  }
  return d;
}
