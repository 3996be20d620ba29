import { el, markup } from './element.ts';
import type { Figure } from './figure/frame.ts';
import { figureStyle, LIGHT } from './figure/style.ts';

/** A figure as the text of an SVG file. */
export interface FigureFile {
  /** without ending */
  readonly name: string;
  readonly svg: string;
}

/** One figure as a file of its own: light, on paper, in a font that converters have. */
export function svgFile({ root }: Figure): string {
  const style = `.figure text{font-family:'DejaVu Sans',sans-serif}\n${figureStyle(LIGHT)}`;
  const paper = el('rect', { width: '100%', height: '100%', fill: '#ffffff' });
  const [title, description, ...rest] = root.children;
  const children = [title, description, el('style', {}, style), paper, ...rest];
  return `<?xml version="1.0" encoding="UTF-8"?>\n${markup({ ...root, children })}\n`;
}
