/** The steady current below V_s over the seed's, against Townsend's closed form with attachment (physics.md, "steady current below V_s"). */
import { describe, expect, it } from 'vitest';
import { simulateNow } from '../../src/simulate.ts';
import {
  alphaIn,
  breakdownVoltageOf,
  caseOf,
  etaOf,
  feedbackAt,
  leftOfMinimum,
  type PlainGap,
  rightOfMinimum,
  stepTo,
  withoutDiffusion,
} from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';

const SEED = 1e-15;
const SHARES = [0.3, 0.6, 0.8, 0.9, 0.95, 0.98, 0.99];

const GAPS: readonly (readonly [string, PlainGap])[] = [
  ['without attachment', rightOfMinimum],
  ['without diffusion', withoutDiffusion(rightOfMinimum)],
  ['left of the Paschen minimum', leftOfMinimum],
  ['with attachment', { ...rightOfMinimum, attachment: 0.4 }],
  ['with attachment over a long gap', { ...rightOfMinimum, attachment: 0.4, spacing: 0.05 }],
];

/** I/I0 = [α e^{(α−η)d} − η]/(α−η)/(1 − q) */
function amplification(gap: PlainGap, voltage: number): number {
  const alpha = alphaIn(gap, voltage / gap.spacing);
  const eta = etaOf(gap);
  const net = alpha - eta;
  return (alpha * Math.exp(net * gap.spacing) - eta) / net / (1 - feedbackAt(gap, voltage));
}

describe('the steady current below the breakdown voltage', () => {
  for (const [name, gap] of GAPS) {
    it(`is the closed form within 0.5 % up to 99 % of V_s ${name}`, () => {
      const least = breakdownVoltageOf(gap);
      const rows = SHARES.map((share) => {
        const voltage = share * least;
        const settings = caseOf(gap, {
          seed: { cathodeCurrent: SEED },
          supply: { programme: stepTo(voltage) },
          observe: { until: 0.05 },
        });
        const outcome = simulateNow(settings);
        const exact = amplification(gap, voltage);
        expect(outcome.final.stop).toBe('steady');
        expect(outcome.verdict.state).toBe('holds');
        return [share, exact, outcome.final.current_A / SEED, outcome.final.current_A / SEED / exact - 1];
      });
      printTable(`steady amplification ${name}, V_s = ${least.toPrecision(6)} V`, ['V/V_s', 'closed form', 'run', 'error'], rows);
      for (const row of rows) expect(Math.abs(row[3]), `at ${row[0]} of V_s`).toBeLessThan(5e-3);
    });
  }

  it('is the closed form within 0.5 % where electrons attach within a cell or a small part of one', () => {
    const rows = [10, 50, 200, 1000].map((attachment) => {
      const gap = { ...rightOfMinimum, attachment };
      const settings = caseOf(gap, { seed: { cathodeCurrent: SEED }, supply: { programme: stepTo(200) }, observe: { until: 0.05 } });
      const outcome = simulateNow(settings);
      const exact = amplification(gap, 200);
      expect(outcome.verdict.state).toBe('holds');
      return [etaOf(gap) * gap.spacing, exact, outcome.final.current_A / SEED, outcome.final.current_A / SEED / exact - 1];
    });
    printTable('steady current with strong attachment', ['ηd', 'closed form', 'run', 'error'], rows);
    for (const row of rows) expect(Math.abs(row[3]), `at ηd = ${row[0]}`).toBeLessThan(5e-3);
  });
});
