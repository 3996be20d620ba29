import { deflateRawSync } from 'node:zlib';
import { type Packed, predicted, shuffled } from './packed.ts';

/** Every digit kept. */
export function packExact(values: Float64Array): Packed {
  return { kind: 'exact', length: values.length, data: squeezed(shuffled(values)) };
}

/** Seven digits kept: half the room, for long tables. */
export function packSingle(values: Float64Array): Packed {
  return { kind: 'single', length: values.length, data: squeezed(shuffled(Float32Array.from(values))) };
}

export function packTexts(texts: readonly string[]): Packed {
  return { kind: 'texts', data: squeezed(Buffer.from(JSON.stringify(texts))) };
}

/** values a page may hold in full resolution before steps become coarser */
const MANY = 4e5;
/** 0.03 % of a value over 16 decades with the coarse steps, where eyes tell one part in a few hundred */
const LEVELS = { fine: 65536, coarse: 16384 };

/** A field over (time, x) in even steps between its extremes. */
export function packEven(values: Float32Array, columns: number): Packed {
  let [low, high] = [0, 0];
  for (const v of values) {
    if (v < low) low = v;
    if (v > high) high = v;
  }
  const count = levelsFor(values);
  const step = (high - low) / (count - 1) || 1;
  const levels = Uint16Array.from(values, (v) => (Number.isFinite(v) ? Math.round((v - low) / step) : 0));
  return packed('even', values, columns, low, high, count, levels);
}

/** A field over (time, x) in even steps of its logarithm over at most `decades` below its largest value; zero and what is smaller stay zero. */
export function packLog(values: Float32Array, columns: number, decades: number): Packed {
  let [least, most] = [Number.POSITIVE_INFINITY, 0];
  for (const v of values) {
    if (v > most && v < Number.POSITIVE_INFINITY) most = v;
    if (v > 0 && v < least) least = v;
  }
  const count = levelsFor(values);
  const high = Math.log(most > 0 ? most : 1);
  const low = Math.max(Math.log(least < most ? least : 1e-3 * (most || 1)), high - decades * Math.LN10);
  const step = (high - low) / (count - 2);
  const levels = Uint16Array.from(values, (v) => {
    const above = v > 0 ? Math.round((Math.log(Math.min(v, most)) - low) / step) : -1;
    return above < 0 ? 0 : above + 1;
  });
  return packed('log', values, columns, low, high, count, levels);
}

function levelsFor(values: Float32Array): number {
  return values.length > MANY ? LEVELS.coarse : LEVELS.fine;
}

function packed(
  kind: 'even' | 'log',
  values: Float32Array,
  columns: number,
  low: number,
  high: number,
  count: number,
  levels: Uint16Array,
): Packed {
  return { kind, rows: values.length / columns, columns, low, high, levels: count, data: squeezed(predicted(levels, columns)) };
}

function squeezed(bytes: Uint8Array): string {
  return deflateRawSync(bytes, { level: 9 }).toString('base64');
}
