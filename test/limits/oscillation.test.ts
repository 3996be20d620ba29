/** A source too weak to feed the glow that its capacitance strikes: relaxation oscillation, on default settings against a far finer run. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { simulateNow } from '../../src/simulate.ts';
import { caseOf, rightOfMinimum, stepTo } from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';

const weak = (seriesResistance: number, parallelCapacitance: number, until: number): Case =>
  caseOf(rightOfMinimum, {
    seed: { cathodeCurrent: 1e-10 },
    supply: { programme: stepTo(300), seriesResistance, parallelCapacitance },
    observe: { until, currents: [1e-6, 1e-3] },
  });

const CASES: readonly (readonly [string, Case])[] = [
  ['1 MΩ and 50 pF', weak(1e6, 50e-12, 1e-3)],
  ['5 MΩ and 20 pF', weak(5e6, 20e-12, 1.6e-3)],
  ['200 kΩ and 50 pF', weak(2e5, 50e-12, 3e-4)],
  // the steady state is only weakly unstable here: an implicit step much longer than the period would settle in it
  ['200 kΩ and 20 pF, near the edge of oscillation', weak(2e5, 20e-12, 4e-4)],
];

describe('a weak source', () => {
  const rows: (string | number)[][] = [];
  for (const [name, settings] of CASES) {
    it(`oscillates with period, amplitude and peak current of a far finer run within 1 %, behind ${name}`, () => {
      const coarse = simulateNow(settings);
      const fine = simulateNow({ ...settings, numerics: { cells: null, tolerance: 1e-5 } });
      const period = (coarse.oscillation?.period_s ?? Number.NaN) / (fine.oscillation?.period_s ?? Number.NaN) - 1;
      const amplitude = (coarse.oscillation?.amplitude_V ?? Number.NaN) / (fine.oscillation?.amplitude_V ?? Number.NaN) - 1;
      const peak = coarse.peak.current_A / fine.peak.current_A - 1;
      rows.push([name, fine.oscillation?.period_s ?? Number.NaN, fine.oscillation?.amplitude_V ?? Number.NaN, period, amplitude, peak]);
      expect(fine.final.stop).toBe('until');
      expect(coarse.final.stop).toBe('until');
      expect(coarse.verdict.state).toBe('breaks-down');
      for (const difference of [period, amplitude, peak]) expect(Math.abs(difference)).toBeLessThan(0.01);
    });
  }

  it('prints what differs', () => {
    printTable('relaxation oscillation', ['', 'period s', 'amplitude V', 'period', 'amplitude', 'peak I'], rows);
    expect(rows.length).toBe(CASES.length);
  });
});
