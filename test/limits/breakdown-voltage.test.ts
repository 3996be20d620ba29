/** The breakdown voltage as runs show it, where the current of a released electron neither grows nor dies, against the closed form. */
import { describe, expect, it } from 'vitest';
import { simulateNow } from '../../src/simulate.ts';
import {
  breakdownVoltageOf,
  caseOf,
  leftOfMinimum,
  type PlainGap,
  rightOfMinimum,
  stepTo,
  uniformAt,
  withoutDiffusion,
} from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';

const GAPS: readonly (readonly [string, PlainGap])[] = [
  ['right of the Paschen minimum', rightOfMinimum],
  ['left of the Paschen minimum', leftOfMinimum],
  ['without diffusion', withoutDiffusion(rightOfMinimum)],
  ['with attachment', { ...rightOfMinimum, attachment: 0.4 }],
  ['at a low yield', { ...rightOfMinimum, ionYield: 0.005 }],
];

/** ln of the current's growth between 10 and 30 ion transits after a millionth of an electron left the cathode. */
function growth(gap: PlainGap, voltage: number): number {
  const transit = gap.spacing / uniformAt(gap, voltage).ionSpeed;
  const trace: { time: number; current: number }[] = [];
  const settings = caseOf(gap, {
    seed: { cathodeCurrent: 0, electrons: 1e-6 },
    supply: { programme: stepTo(voltage) },
    observe: { until: 30 * transit },
  });
  simulateNow(settings, { snapshot: (s) => trace.push({ time: s.time, current: s.conductionCurrent }) });
  const early = trace.findLast(({ time }) => time < 10 * transit);
  return Math.log(trace[trace.length - 1].current / (early?.current ?? Number.NaN));
}

describe('the voltage at which a tiny current neither grows nor decays', () => {
  for (const [name, gap] of GAPS) {
    it(`is the static breakdown voltage within 0.1 % ${name}`, () => {
      const exact = breakdownVoltageOf(gap);
      let low = 0.97 * exact;
      let high = 1.02 * exact;
      expect(growth(gap, low)).toBeLessThan(0);
      expect(growth(gap, high)).toBeGreaterThan(0);
      while (high - low > 2e-4 * exact) {
        const middle = (low + high) / 2;
        if (growth(gap, middle) < 0) low = middle;
        else high = middle;
      }
      const found = (low + high) / 2;
      printTable(
        `breakdown voltage by growth and decay ${name}`,
        ['closed form V', 'runs V', 'error'],
        [[exact, found, found / exact - 1]],
      );
      expect(Math.abs(found / exact - 1)).toBeLessThan(1e-3);
    });
  }
});
