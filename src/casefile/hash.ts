import { createHash } from 'node:crypto';
import type { Case } from '../case.ts';

/** Words about a number, not the number: they may be corrected without changing what a case computes. */
const WORDS = new Set(['title', 'sha256', 'source', 'status', 'note']);
/** longer lists (tables) enter by their own hash */
const LONG_LIST = 64;

/** SHA-256 over what a case computes: every value in SI, defaults and coefficients included, tables by hash, keys in canonical order.
 *  Title, spelling, order and comments of the file do not enter. */
export function hashCase(resolved: Omit<Case, 'sha256'>): string {
  return sha256(canonical(resolved));
}

/** The hash under which a table's columns enter. */
export function hashColumns(columns: readonly (readonly number[])[]): string {
  return sha256(JSON.stringify(columns));
}

function canonical(value: unknown): string {
  if (Array.isArray(value)) {
    if (value.length > LONG_LIST && value.every((item) => typeof item === 'number'))
      return JSON.stringify(`sha256:${hashColumns([value])}`);
    return `[${value.map(canonical).join(',')}]`;
  }
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
