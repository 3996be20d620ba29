/** A tree of elements, HTML or SVG, as plain data: the same tree becomes markup in Node and nodes of a document in the browser.
 *  Text is text on both ways; there is no way to put markup into it. */
export interface Element {
  readonly tag: string;
  readonly attributes: Readonly<Record<string, string | number>>;
  readonly children: readonly (Element | string)[];
}

type Child = Element | string | null | readonly Child[];
type Attributes = Readonly<Record<string, string | number | boolean | null | undefined>>;

/** An element; null children and null or false attributes are left out, true is an attribute without a value. */
export function el(tag: string, attributes: Attributes = {}, ...children: readonly Child[]): Element {
  const kept: Record<string, string | number> = {};
  for (const [name, value] of Object.entries(attributes)) {
    if (value === null || value === undefined || value === false) continue;
    kept[name] = value === true ? '' : value;
  }
  return { tag, attributes: kept, children: flat(children) };
}

function flat(children: readonly Child[]): (Element | string)[] {
  return children.flatMap((child): (Element | string)[] => {
    if (child === null) return [];
    if (Array.isArray(child)) return flat(child);
    return [child as Element | string];
  });
}

/** elements of HTML that hold nothing and have no end */
const VOID = new Set(['meta', 'link', 'input', 'br', 'hr']);

/** The tree as markup that HTML and XML readers take alike, but for empty HTML elements. */
export function markup(node: Element | string): string {
  if (typeof node === 'string') return escaped(visible(node));
  const attributes = Object.entries(node.attributes)
    .map(([name, value]) => ` ${name}="${escaped(visible(shortNumber(value)))}"`)
    .join('');
  if (VOID.has(node.tag)) return `<${node.tag}${attributes}>`;
  return `<${node.tag}${attributes}>${node.children.map(markup).join('')}</${node.tag}>`;
}

/** Coordinates to a hundredth of a pixel. */
export function shortNumber(value: string | number): string {
  return typeof value === 'number' ? String(Math.round(value * 100) / 100) : value;
}

function escaped(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');
}

/** Control characters, those that change the writing direction and broken halves of pairs, written out: they could hide or reorder what a reader sees, and
 *  some have no place in XML. Tabs and line ends stay.
 *  @example visible('a\u001b[2Jb') // 'a\\u001b[2Jb' */
export function visible(text: string): string {
  return text.replace(HIDDEN, (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`);
}

const HIDDEN =
  /(?![\t\n])[\p{Cc}\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/gu;

/** JSON that may stand in a script element: nothing in it can end that element or open a comment. */
export function inlineJson(value: unknown): string {
  return JSON.stringify(value).replace(/[<>&\u2028\u2029]/g, (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, '0')}`);
}
