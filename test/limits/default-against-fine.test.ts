/** Default settings against four times the cells and a hundredth of the tolerance: four kinds of run here, two dozen more in the long file. */
import { describe, expect, it } from 'vitest';
import { againstFine, HEAD, lineOf } from '../help/against-fine.ts';
import { QUICK } from '../help/kept-aside.ts';
import { printTable } from '../help/table.ts';

describe('a run on default settings', () => {
  const rows: (string | number)[][] = [];
  for (const [name, settings] of QUICK) {
    it(`has lag, peak current and final voltage of a far finer run within 1 %: ${name}`, () => {
      const c = againstFine(settings);
      rows.push(lineOf(name, c));
      expect(c.coarse.verdict.state).toBe(c.fine.verdict.state);
      expect(c.coarse.verdict.state).toBe('breaks-down');
      for (const [what, difference] of Object.entries({ lag: c.lag, peak: c.peak, voltage: c.voltage })) {
        expect(Math.abs(difference), what).toBeLessThan(0.01);
      }
    });
  }

  it('prints what differs', () => {
    printTable('default settings against 4 × cells and 1e-5', HEAD, rows);
    expect(rows.length).toBe(QUICK.length);
  });
});
