import { type Element, el } from '../element.ts';
import type { Scale } from './scale.ts';

/** The plot area inside a figure [px]. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

/** A drawn figure: its SVG and where in it the plot area lies. */
export interface Figure {
  readonly root: Element;
  readonly box: Box;
}

/** A moment marked on a time axis. */
export interface Mark {
  readonly name: string;
  /** share of the axis */
  readonly at: number;
}

/** Approximate width of a text in the figures' 12 px type. */
export function textWidth(text: string): number {
  return 7.1 * [...text].length;
}

/** The height of a line of text, and of the heading. */
export const LINE = 15;
export const HEADING = 21;

/** Rows in which names of marks stand above a plot, so that none covers another. */
export function placeMarks(marks: readonly Mark[], box: Pick<Box, 'left' | 'width'>, right: number): { rows: number; places: Place[] } {
  const ends: number[] = [];
  const places = marks.map((mark): Place => {
    const x = box.left + mark.at * box.width;
    const width = textWidth(mark.name) + 8;
    const leftwards = x + width > right;
    const [from, to] = leftwards ? [x - width, x] : [x, x + width];
    let row = ends.findIndex((end) => end <= from);
    if (row < 0) row = ends.length;
    ends[row] = to;
    return { ...mark, x, row, leftwards };
  });
  return { rows: ends.length, places };
}

interface Place extends Mark {
  readonly x: number;
  readonly row: number;
  readonly leftwards: boolean;
}

export interface FrameSpec {
  /** unique in its document; letters, digits and hyphens */
  readonly id: string;
  /** for readers who do not see the figure, and for tooltips */
  readonly title: string;
  /** what a reader who does not see the figure should know */
  readonly description: string;
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly marks?: readonly Mark[];
  /** names of the marks above the plot, or lines only */
  readonly nameMarks?: boolean;
  /** lines of text under the figure */
  readonly footer?: readonly string[];
}

/** Where the plot area of a figure will lie, below its heading, the rows of its key and those of the names of marks. */
export function boxOf(spec: FrameSpec, keyRows = 0): Box {
  const { width, height, left, right, marks = [], nameMarks = true, footer = [] } = spec;
  const plain = { left, width: width - left - right };
  const rows = nameMarks ? placeMarks(marks, plain, width - 4).rows : 0;
  const top = HEADING + (rows + keyRows) * LINE + 3;
  return { ...plain, top, height: height - top - 40 - (footer.length === 0 ? 0 : footer.length * LINE + 6) };
}

/** Heading, axes and marks around what is drawn inside.
 *  @param heading  above the plot: what the figure shows and its unit
 *  @param inside  clipped to the plot area
 *  @param beside  drawn over it, unclipped: keys, colour bars */
export function frame(
  spec: FrameSpec,
  box: Box,
  x: Scale,
  y: Scale,
  heading: string,
  inside: readonly (Element | null)[],
  beside: readonly (Element | null)[],
): Figure {
  const { id, title, description, width, height, marks = [], nameMarks = true, footer = [] } = spec;
  const bottom = box.top + box.height;
  const end = box.left + box.width;
  const clip = `${id}-clip`;
  const xs = x.ticks.filter((t) => t.at > -1e-6 && t.at < 1 + 1e-6).map((t) => ({ ...t, px: box.left + t.at * box.width }));
  const ys = y.ticks.filter((t) => t.at > -1e-6 && t.at < 1 + 1e-6).map((t) => ({ ...t, px: bottom - t.at * box.height }));
  const root = el(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: `0 0 ${width} ${height}`,
      width,
      height,
      class: 'figure',
      role: 'img',
      'aria-labelledby': `${id}-title ${id}-desc`,
    },
    el('title', { id: `${id}-title` }, title),
    el('desc', { id: `${id}-desc` }, description),
    el('clipPath', { id: clip }, el('rect', { x: box.left, y: box.top, width: box.width, height: box.height })),
    el('rect', { class: 'ground', x: box.left, y: box.top, width: box.width, height: box.height }),
    el('text', { class: 'heading', x: 2, y: 14 }, heading),
    el('g', { 'clip-path': `url(#${clip})` }, inside),
    el(
      'g',
      { class: 'axis' },
      // above what is drawn, so that marks show on maps too
      el('path', {
        d: [
          ...xs.map((t) => `M${round(t.px)} ${bottom}v${t.label === '' ? 3 : 6}`),
          ...ys.map((t) => `M${box.left} ${round(t.px)}h${t.label === '' ? -3 : -6}`),
        ].join(''),
      }),
      el('rect', { class: 'edge', x: box.left, y: box.top, width: box.width, height: box.height }),
      xs
        .filter((t) => t.label !== '')
        .map((t) => el('text', { x: t.px, y: bottom + 18, 'text-anchor': anchorAt(t.px, t.label, box.left, width) }, t.label)),
      ys.filter((t) => t.label !== '').map((t) => el('text', { x: box.left - 9, y: t.px + 4, 'text-anchor': 'end' }, t.label)),
    ),
    el('text', { class: 'name', x: (box.left + end) / 2, y: bottom + 35, 'text-anchor': 'middle' }, x.title),
    markElements(marks, nameMarks, box, width),
    footer.map((line, i) => el('text', { class: 'name', x: 2, y: bottom + 54 + i * LINE }, line)),
    beside,
  );
  return { root, box };
}

/** Grid lines behind a line plot, at the labelled ticks. */
export function grid(box: Box, x: Scale, y: Scale): Element {
  const bottom = box.top + box.height;
  const shown = (ticks: Scale['ticks']): number[] =>
    ticks.filter((t) => t.label !== '' && t.at > 1e-3 && t.at < 1 - 1e-3).map(({ at }) => at);
  return el('path', {
    class: 'grid',
    d: [
      ...shown(x.ticks).map((at) => `M${round(box.left + at * box.width)} ${box.top}V${bottom}`),
      ...shown(y.ticks).map((at) => `M${box.left} ${round(bottom - at * box.height)}h${box.width}`),
    ].join(''),
  });
}

function markElements(marks: readonly Mark[], named: boolean, box: Box, width: number): Element[] {
  const { rows, places } = placeMarks(marks, box, width - 4);
  return places.map(({ name, x, row, leftwards }) => {
    const y = box.top - 5 - (rows - 1 - row) * LINE;
    return el(
      'g',
      { class: 'mark' },
      el('path', { class: 'halo', d: `M${round(x)} ${box.top}v${box.height}` }),
      el('path', { d: `M${round(x)} ${named ? y - 10 : box.top}V${box.top + box.height}` }),
      named ? el('text', { x: leftwards ? x - 4 : x + 4, y, 'text-anchor': leftwards ? 'end' : 'start' }, name) : null,
    );
  });
}

/** Labels at the ends of an axis stay inside of the figure. */
function anchorAt(px: number, label: string, left: number, width: number): string {
  const half = textWidth(label) / 2;
  if (px + half > width - 2) return 'end';
  if (px - half < Math.min(left, 2)) return 'start';
  return 'middle';
}

export function round(value: number): number {
  return Math.round(value * 100) / 100;
}
