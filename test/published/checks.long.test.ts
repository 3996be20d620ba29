/** The rows of `npm run checks` that take longer. */
import { describe, expect, it } from 'vitest';
import { compare, comparedText } from './check.ts';
import { sources } from './index.ts';

describe.each(
  sources.map(({ source, checks }) => ({ source, rows: checks.filter(({ slow }) => slow) })).filter(({ rows }) => rows.length > 0),
)('$source', ({ rows }) => {
  it.each(rows)('$check', (check) => {
    const compared = compare(check);
    expect(compared.passes, comparedText(check, compared)).toBe(true);
  });
});
