/** The rows of `npm run checks` as tests: those that take a second or two at most. */
import { describe, expect, it } from 'vitest';
import { gases } from '../../src/gases/index.ts';
import { compare, comparedText, counts, kindOf } from './check.ts';
import { sources } from './index.ts';

const all = sources.flatMap(({ checks }) => checks);

describe('the table of checks', () => {
  it('has 60 rows and more that count, 25 and more of them by runs of the solver', () => {
    expect(all.filter(counts).length).toBeGreaterThanOrEqual(60);
    expect(all.filter((check) => counts(check) && check.simulated).length).toBeGreaterThanOrEqual(25);
  });

  it('names every row once, within its source', () => {
    for (const { source, checks } of sources) expect(new Set(checks.map(({ check }) => check)).size, source).toBe(checks.length);
    expect(new Set(sources.map(({ source }) => source)).size).toBe(sources.length);
  });

  it('has a reason for each tolerance, and 1 in the band of every row that counts', () => {
    for (const check of all) {
      expect(check.reason.length, check.check).toBeGreaterThan(10);
      expect(check.allowed.high, check.check).toBeGreaterThan(check.allowed.low);
      if (!counts(check)) continue;
      expect(check.allowed.low, check.check).toBeLessThan(1);
      expect(check.allowed.high, check.check).toBeGreaterThan(1);
    }
  });

  it('quotes the uncertainties that the data state', () => {
    const stated = ['air', 'oxygen', 'carbon dioxide', 'water vapour', 'sulphur hexafluoride'].map(
      (gas) => gases[gas].breakdownUncertainty,
    );
    expect(stated).toEqual([0.15, 0.3, 0.25, 0.3, 0.3]);
  });

  it('calls rows that nobody is sure of plausibility, and those that are not independent not independent', () => {
    for (const check of all) {
      const kind = kindOf(check);
      if (check.knownLimit) expect(kind).toBe('known limit');
      else if (check.independentOf === null) expect(kind).toBe('not independent');
      else expect(kind === 'plausibility', check.check).toBe(/\((M|L)\)/.test(check.status));
    }
  });

  it('fails a row that is out of its band, on either side, when it is no number and when it cannot be computed', () => {
    const row = { ...all[0], published: 100, allowed: { low: 0.9, high: 1.1 } };
    for (const [value, passes] of [
      [89.9, false],
      [90.1, true],
      [109.9, true],
      [110.1, false],
      [Number.NaN, false],
    ] as const)
      expect(compare({ ...row, compute: () => value }).passes, String(value)).toBe(passes);
    const broken = (): number => {
      throw new Error('no minimum');
    };
    expect(compare({ ...row, compute: broken })).toMatchObject({ passes: false, fault: 'no minimum' });
  });
});

describe.each(
  sources.map(({ source, checks }) => ({ source, rows: checks.filter(({ slow }) => !slow) })).filter(({ rows }) => rows.length > 0),
)('$source', ({ rows }) => {
  it.each(rows)('$check', (check) => {
    const compared = compare(check);
    expect(compared.passes, comparedText(check, compared)).toBe(true);
  });
});
