import { hex, type Rgb, SCALE } from '../colour.ts';
import { type Element, el } from '../element.ts';
import { type Box, boxOf, type Figure, type FrameSpec, frame } from './frame.ts';
import type { Scale } from './scale.ts';

/** A picture of colour numbers, row by row from the top. */
export interface Raster {
  readonly width: number;
  readonly height: number;
  /** 0 … 255 into `palette` */
  readonly pixels: Uint8Array;
  readonly palette: readonly Rgb[];
}

/** Turns a raster into the address of a picture: done differently in Node and in the browser. */
export type Picture = (raster: Raster) => string;

export interface MapSpec extends FrameSpec {
  /** name and unit of what the colours mean */
  readonly heading: string;
  readonly yName: string;
  /** number of the colour at a share of both axes */
  readonly paint: (x: number, y: number) => number;
  readonly palette: readonly Rgb[];
  /** what stands at the right: the meaning of the colours */
  readonly beside: (box: Box) => readonly (Element | null)[];
  /** drawn over the picture, in the plot's pixels, clipped to it */
  readonly over?: (box: Box, x: Scale, y: Scale) => readonly (Element | null)[];
}

/** A figure of a quantity over two axes, as colours. */
export function mapFigure(spec: MapSpec, xScale: (length: number) => Scale, yScale: (length: number) => Scale, picture: Picture): Figure {
  const box = boxOf(spec);
  const [x, y] = [xScale(box.width), yScale(box.height)];
  const { width, height } = { width: Math.round(box.width), height: Math.round(box.height) };
  const pixels = new Uint8Array(width * height);
  for (let j = 0; j < height; j++)
    for (let i = 0; i < width; i++) pixels[j * width + i] = spec.paint((i + 0.5) / width, 1 - (j + 0.5) / height);
  const href = picture({ width, height, pixels, palette: spec.palette });
  const image = el('image', {
    x: box.left,
    y: box.top,
    width: box.width,
    height: box.height,
    preserveAspectRatio: 'none',
    href,
  });
  const yName = el(
    'text',
    { class: 'name', transform: `translate(12 ${box.top + box.height / 2}) rotate(-90)`, 'text-anchor': 'middle' },
    spec.yName,
  );
  const over = spec.over?.(box, x, y) ?? [];
  return frame(spec, box, x, y, spec.heading, [image, ...over], [yName, ...spec.beside(box)]);
}

/** The number of the colour of a value on a colour axis; 0 below it and for what is no number. */
export function colourNumber(colour: Scale, value: number): number {
  const share = colour.at(value);
  return share > 0 ? Math.min(255, Math.round(share * 255)) : 0;
}

/** Colours with the values they stand for. */
export function colourBar(id: string, left: number, top: number, height: number, colour: Scale): Element[] {
  const name = `${id}-colours`;
  const stops = Array.from({ length: 33 }, (_, k) => {
    const share = k / 32;
    return el('stop', { offset: share, 'stop-color': hex(SCALE[Math.round(255 * share)]) });
  });
  const y = (at: number): number => top + height * (1 - at);
  const ticks = colour.ticks.filter(({ at }) => at > -1e-6 && at < 1 + 1e-6);
  return [
    el('linearGradient', { id: name, x1: 0, y1: 1, x2: 0, y2: 0 }, stops),
    el('rect', { class: 'edge', x: left, y: top, width: 12, height, fill: `url(#${name})` }),
    el(
      'g',
      { class: 'axis' },
      ticks.map(({ at, label }) => el('path', { d: `M${left + 12} ${Math.round(100 * y(at)) / 100}h${label === '' ? 3 : 5}` })),
      ticks.filter(({ label }) => label !== '').map(({ at, label }) => el('text', { x: left + 20, y: y(at) + 4 }, label)),
    ),
  ];
}
