/** Arrays as they lie in a page: squeezed by what neighbours have in common, deflated, in base64. The squeezing and its reverse stand here together;
 *  deflating is done by whoever has the means (`pack.ts` in Node, `page/unpack.ts` in the browser). */
export type Packed =
  /** every digit kept */
  | { readonly kind: 'exact'; readonly length: number; readonly data: string }
  /** seven digits kept */
  | { readonly kind: 'single'; readonly length: number; readonly data: string }
  /** texts, as JSON */
  | { readonly kind: 'texts'; readonly data: string }
  /** quantised in `levels` even steps from `low` to `high` */
  | QuantisedHead<'even'>
  /** the same for the logarithm; level 0: at or below zero, or too small to matter */
  | QuantisedHead<'log'>;

export type Quantised = QuantisedHead<'even'> | QuantisedHead<'log'>;

interface QuantisedHead<Kind extends string> {
  readonly kind: Kind;
  readonly rows: number;
  readonly columns: number;
  readonly low: number;
  readonly high: number;
  readonly levels: number;
  readonly data: string;
}

/** Numbers as bytes, first bytes first: those of neighbours are alike. */
export function shuffled(values: Float64Array | Float32Array): Uint8Array {
  const size = values.BYTES_PER_ELEMENT;
  const bytes = new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
  const out = new Uint8Array(bytes.length);
  for (let i = 0; i < values.length; i++) for (let b = 0; b < size; b++) out[b * values.length + i] = bytes[size * i + b];
  return out;
}

export function unshuffled(bytes: Uint8Array): Float64Array {
  return new Float64Array(inOrder(bytes, 8));
}

export function unshuffledSingle(bytes: Uint8Array): Float64Array {
  return Float64Array.from(new Float32Array(inOrder(bytes, 4)));
}

function inOrder(bytes: Uint8Array, size: number): ArrayBuffer {
  const n = bytes.length / size;
  const out = new Uint8Array(bytes.length);
  for (let i = 0; i < n; i++) for (let b = 0; b < size; b++) out[size * i + b] = bytes[b * n + i];
  return out.buffer;
}

/** Differences of levels from the plane through the neighbours above and before, small numbers first, low bytes before high ones. */
export function predicted(levels: Uint16Array, columns: number): Uint8Array {
  const n = levels.length;
  const out = new Uint8Array(2 * n);
  for (let i = 0; i < n; i++) {
    const signed = ((levels[i] - guess(levels, i, columns)) << 16) >> 16;
    const folded = signed < 0 ? -2 * signed - 1 : 2 * signed;
    out[i] = folded & 255;
    out[n + i] = folded >> 8;
  }
  return out;
}

export function unpredicted(bytes: Uint8Array, columns: number): Uint16Array {
  const n = bytes.length / 2;
  const levels = new Uint16Array(n);
  for (let i = 0; i < n; i++) {
    const folded = bytes[i] | (bytes[n + i] << 8);
    const signed = folded & 1 ? -((folded + 1) >> 1) : folded >> 1;
    levels[i] = (guess(levels, i, columns) + signed) & 0xffff;
  }
  return levels;
}

function guess(levels: Uint16Array, i: number, columns: number): number {
  const first = i % columns === 0;
  const above = i >= columns ? levels[i - columns] : 0;
  const before = first ? 0 : levels[i - 1];
  const corner = first || i < columns ? 0 : levels[i - columns - 1];
  return above + before - corner;
}

/** The values that levels stand for. */
export function valuesOf(packed: Quantised, levels: Uint16Array): Float32Array {
  const { kind, low, high, levels: count } = packed;
  const out = new Float32Array(levels.length);
  if (kind === 'even') {
    const step = (high - low) / (count - 1);
    for (let i = 0; i < out.length; i++) out[i] = low + step * levels[i];
  } else {
    const table = Float32Array.from({ length: count }, (_, k) => (k === 0 ? 0 : Math.exp(low + ((high - low) * (k - 1)) / (count - 2))));
    for (let i = 0; i < out.length; i++) out[i] = table[levels[i]];
  }
  return out;
}
