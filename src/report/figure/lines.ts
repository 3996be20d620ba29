import { type Element, el } from '../element.ts';
import { type Box, boxOf, type Figure, type FrameSpec, frame, grid, HEADING, LINE, round } from './frame.ts';
import type { Scale } from './scale.ts';

/** One curve; x and y in the units of the axes. */
export interface Curve {
  readonly name: string;
  /** `s1` … `s4`: colour and dashes */
  readonly style: string;
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
  /** name under which the page writes its value at the linked time beside its name */
  readonly reading?: string;
}

export interface LineSpec extends FrameSpec {
  readonly curves: readonly Curve[];
  /** drawn over the curves, in the plot's pixels */
  readonly over?: (box: Box, x: Scale, y: Scale) => readonly (Element | null)[];
}

/** A figure of curves, named at its right or, where there is no room, under its title. */
export function lineFigure(spec: LineSpec, xScale: (length: number) => Scale, yScale: (length: number) => Scale): Figure {
  const above = spec.right < KEY_WIDTH;
  // one curve that the heading names needs no key
  const named = spec.curves.length === 1 && spec.curves[0].reading === undefined ? [] : spec.curves;
  const keyRows = above ? keyRowsAbove(named, spec.width - spec.left).length : 0;
  const box = boxOf(spec, keyRows);
  const [x, y] = [xScale(box.width), yScale(box.height)];
  const curves = spec.curves.map((curve) => el('path', { class: `curve ${curve.style}`, d: pathOf(curve, box, x, y) }));
  const key = above ? keyAbove(named, spec.left, spec.width) : keyBeside(named, box);
  return frame(spec, box, x, y, y.title, [grid(box, x, y), ...curves, ...(spec.over?.(box, x, y) ?? [])], key);
}

/** room for names and values beside a plot [px] */
export const KEY_WIDTH = 100;

function keyBeside(curves: readonly Curve[], box: Box): Element[] {
  const left = box.left + box.width + 10;
  return curves.map(({ name, style, reading }, i) => {
    const y = box.top + 8 + i * (reading === undefined ? LINE + 5 : 2 * LINE + 8);
    return el(
      'g',
      { class: 'key' },
      el('path', { class: `curve ${style}`, d: `M${left} ${y}h22` }),
      el('text', { x: left + 27, y: y + 4 }, name),
      reading === undefined ? null : el('text', { class: 'reading', x: left + 27, y: y + 4 + LINE, 'data-reading': reading }, ''),
    );
  });
}

const SAMPLE = 28;

function keyRowsAbove(curves: readonly Curve[], width: number): Curve[][] {
  const rows: Curve[][] = [];
  let used = Number.POSITIVE_INFINITY;
  for (const curve of curves) {
    const needs = SAMPLE + 7.1 * ([...curve.name].length + (curve.reading === undefined ? 2 : 14));
    if (used + needs > width) {
      rows.push([]);
      used = 0;
    }
    rows[rows.length - 1].push(curve);
    used += needs;
  }
  return rows;
}

function keyAbove(curves: readonly Curve[], left: number, width: number): Element[] {
  return keyRowsAbove(curves, width - left).flatMap((row, k) => {
    let x = left;
    const y = HEADING + (k + 1) * LINE - 4;
    return row.map(({ name, style, reading }) => {
      const key = el(
        'g',
        { class: 'key' },
        el('path', { class: `curve ${style}`, d: `M${x} ${y - 4}h22` }),
        el(
          'text',
          { x: x + SAMPLE, y },
          `${name} `,
          reading === undefined ? null : el('tspan', { class: 'reading', 'data-reading': reading }, ''),
        ),
      );
      x += SAMPLE + 7.1 * ([...name].length + (reading === undefined ? 2 : 14));
      return key;
    });
  });
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
