/** Default settings against four times the cells and a hundredth of the tolerance, over runs of every kind: steps at 2 to 100 % overvoltage on both
 *  branches with and without diffusion, ramps from 1e3 to 1e8 V/s, trips, stored charge, limits, three gases.
 *
 *  Bars of the project: lag, peak current and final voltage within 1 %; crossing times within 0.5 %, final current and energy within 1 %. */
import { describe, expect, it } from 'vitest';
import { againstFine, HEAD, lineOf } from '../help/against-fine.ts';
import { KEPT_ASIDE } from '../help/kept-aside.ts';
import { printTable } from '../help/table.ts';

describe('a run on default settings', () => {
  const rows: (string | number)[][] = [];
  for (const [name, settings] of KEPT_ASIDE) {
    it(`agrees with a far finer run within the bars: ${name}`, () => {
      const c = againstFine(settings);
      rows.push(lineOf(name, c));
      expect(c.coarse.verdict.state).toBe(c.fine.verdict.state);
      expect(c.coarse.verdict.regime).toBe(c.fine.verdict.regime);
      const within = {
        lag: c.lag,
        'voltage at onset': c.onsetVoltage,
        peak: c.peak,
        'final voltage': c.voltage,
        'final current': c.current,
        energy: c.energy,
      };
      for (const [what, difference] of Object.entries(within)) expect(Math.abs(difference), what).toBeLessThan(0.01);
      c.crossings.forEach((difference, i) => {
        expect(Math.abs(difference), `crossing of ${c.fine.currents[i].level_A} A`).toBeLessThan(0.005);
      });
    });
  }

  it('prints what differs', () => {
    printTable('default settings against 4 × cells and 1e-5', HEAD, rows);
    expect(rows.length).toBe(KEPT_ASIDE.length);
  });
});
