import { createHash } from 'node:crypto';
import type { Case } from '../case.ts';
import type { ScanSettings, WindowSettings } from '../study.ts';

/** Words about a number, not the number: they may be corrected without changing what a case computes. */
const WORDS = new Set(['title', 'sha256', 'source', 'status', 'note', 'dataSet']);
/** longer lists (tables) enter by their own hash */
const LONG_LIST = 64;

/** SHA-256 over what a case computes: every value in SI, defaults and coefficients included, tables by hash, keys in canonical order.
 *  Title, spelling, order and comments of the file do not enter, and neither do scan and history: a run's identity is its gap. */
export function hashCase(resolved: Omit<Case, 'sha256'>): string {
  return sha256(canonical(resolved));
}

/** SHA-256 of a scan: what its case computes, its axes with all their values, how they are walked and what is searched for. */
export function hashScan(settings: Case, scan: ScanSettings): string {
  return sha256(canonical({ case: settings.sha256, scan }));
}

/** SHA-256 of a window: what its case computes, and the history with all its rows. */
export function hashWindow(settings: Case, window: WindowSettings): string {
  return sha256(canonical({ case: settings.sha256, window }));
}

/** The hash under which a table's columns enter: lists as JSON; typed columns, which may be long, as their doubles' bytes. */
export function hashColumns(columns: readonly (readonly number[] | Float64Array)[]): string {
  if (!columns.every((column) => column instanceof Float64Array))
    return sha256(JSON.stringify(columns.map((column) => Array.from(column))));
  const hash = createHash('sha256');
  for (const { length, buffer, byteOffset, byteLength } of columns) {
    hash.update(`${length};`);
    hash.update(new Uint8Array(buffer, byteOffset, byteLength));
  }
  return hash.digest('hex');
}

/** texts of what is frozen: the points of a scan share their gas data and tables */
const KNOWN = new WeakMap<object, string>();

function canonical(value: unknown): string {
  if (typeof value !== 'object' || value === null || !Object.isFrozen(value)) return written(value);
  let text = KNOWN.get(value);
  if (text === undefined) {
    text = written(value);
    KNOWN.set(value, text);
  }
  return text;
}

function written(value: unknown): string {
  if (Array.isArray(value)) {
    if (value.length > LONG_LIST && value.every((item) => typeof item === 'number'))
      return JSON.stringify(`sha256:${hashColumns([value])}`);
    return `[${value.map(canonical).join(',')}]`;
  }
  if (value instanceof Float64Array) return JSON.stringify(`sha256:${hashColumns([value])}`);
  if (typeof value === 'object' && value !== null) {
    const entries = Object.entries(value)
      .filter(([key, inner]) => !WORDS.has(key) && inner !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1));
    return `{${entries.map(([key, inner]) => `${JSON.stringify(key)}:${canonical(inner)}`).join(',')}}`;
  }
  return JSON.stringify(value) ?? 'null';
}

function sha256(text: string): string {
  return createHash('sha256').update(text).digest('hex');
}
