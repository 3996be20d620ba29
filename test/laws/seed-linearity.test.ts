/** Far below space charge the equations are linear: the current is proportional to the seed (common practice; Townsend). */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { simulateNow } from '../../src/simulate.ts';
import { breakdownVoltageOf, caseOf, rightOfMinimum, stepTo } from '../help/plain-gap.ts';

interface Trace {
  readonly times: number[];
  readonly currents: number[];
}

function trace(settings: Case): Trace {
  const times: number[] = [];
  const currents: number[] = [];
  simulateNow(settings, {
    snapshot: (s) => {
      times.push(s.time);
      currents.push(s.conductionCurrent);
    },
  });
  return { times, currents };
}

const least = breakdownVoltageOf(rightOfMinimum);

/** the space charge of the larger seed must stay below 1e-7 of the field: 1e-12 A × the growth below 1e-11 A */
const CASES: readonly (readonly [string, Case['supply']['programme'], number])[] = [
  ['on the way to a steady current at 90 % of V_s', stepTo(0.9 * least), 1e-4],
  ['while it grows at 5 % overvoltage', stepTo(1.05 * least), 1e-5],
  ['on a rise of the voltage', { kind: 'step', voltage: least, riseTime: 3e-5 }, 4e-5],
];

describe('the current over the seed current', () => {
  for (const [name, programme, until] of CASES) {
    it(`is the same for 1e-18 and 1e-12 A within 1e-6, at equal steps, ${name}`, () => {
      const settings = (seed: number): Case =>
        caseOf(rightOfMinimum, { seed: { cathodeCurrent: seed }, supply: { programme }, observe: { until } });
      const small = trace(settings(1e-18));
      const large = trace(settings(1e-12));
      expect(large.times.length).toBe(small.times.length);
      expect(large.times.length).toBeGreaterThan(10);
      small.times.forEach((t, i) => {
        expect(Math.abs(large.times[i] - t)).toBeLessThanOrEqual(1e-6 * t);
        const ratio = large.currents[i] / 1e-12 / (small.currents[i] / 1e-18);
        if (small.currents[i] !== 0) expect(Math.abs(ratio - 1), `at ${t} s`).toBeLessThan(1e-6);
      });
    });
  }

  it('is the same for twelve decades of released electrons', () => {
    const settings = (electrons: number): Case =>
      caseOf(rightOfMinimum, {
        seed: { cathodeCurrent: 0, electrons },
        supply: { programme: stepTo(1.05 * least) },
        observe: { until: 2e-5 },
      });
    const small = trace(settings(1e-13));
    const large = trace(settings(0.1));
    expect(large.times.length).toBe(small.times.length);
    small.times.forEach((t, i) => {
      expect(Math.abs(large.currents[i] / small.currents[i] / 1e12 - 1), `at ${t} s`).toBeLessThan(1e-6);
    });
  });
});
