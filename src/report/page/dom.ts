import { shortNumber, type Element as Tree, visible } from '../element.ts';
import type { Raster } from '../figure/map.ts';

const SVG = 'http://www.w3.org/2000/svg';

/** A tree as nodes of the document. Text becomes text nodes; nothing is read as markup. */
export function toNode(tree: Tree, svg: boolean = tree.tag === 'svg'): Element {
  const node = svg ? document.createElementNS(SVG, tree.tag) : document.createElement(tree.tag);
  for (const [name, value] of Object.entries(tree.attributes)) if (name !== 'xmlns') node.setAttribute(name, shortNumber(value));
  for (const child of tree.children)
    node.append(typeof child === 'string' ? document.createTextNode(visible(child)) : toNode(child, svg || child.tag === 'svg'));
  return node;
}

/** A raster as a picture, through a canvas. */
export function canvasAddress({ width, height, pixels, palette }: Raster): string {
  const canvas = document.createElement('canvas');
  canvas.width = width;
  canvas.height = height;
  const context = canvas.getContext('2d');
  if (context === null) return '';
  const image = context.createImageData(width, height);
  // four bytes at once
  const colours = new Uint32Array(new Uint8ClampedArray(palette.flatMap((rgb) => [...rgb, 255])).buffer);
  const out = new Uint32Array(image.data.buffer);
  for (let i = 0; i < pixels.length; i++) out[i] = colours[pixels[i]];
  context.putImageData(image, 0, 0);
  return canvas.toDataURL('image/png');
}
