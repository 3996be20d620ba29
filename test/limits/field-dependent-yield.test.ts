/** A yield that depends on the field at the cathode: the breakdown voltage where γ(E/N)(e^{αd} − 1) = 1, solved here by bisection. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { holdOff } from '../../src/search/hold-off.ts';
import { simulateNow } from '../../src/simulate.ts';
import { predict } from '../../src/theory/predict.ts';
import { breakdownVoltageOf, caseOf, rightOfMinimum, stepTo, uniformAt } from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';

const gap = rightOfMinimum;
const constant = breakdownVoltageOf(gap);

/** The case with γ = 0.07 × (a + b E/N), which is 0.07 × `there` at the constant yield's breakdown voltage and rises or falls with the field. */
function withLaw(b: number, there: number): { settings: Case; yieldAt: (voltage: number) => number } {
  const settings = caseOf(gap, {
    seed: { cathodeCurrent: 1e-14 },
    supply: { programme: stepTo(constant) },
    observe: { until: 0.2 },
    numerics: { cells: 60 },
  });
  const column = settings.gas.density * gap.spacing;
  const a = there - (b * constant) / column;
  const { left } = settings.electrodes;
  const surface = { ...left, ionYield: { ...left.ionYield, law: { kind: 'reduced-field', form: { kind: 'linear', a, b } } } } as const;
  return {
    settings: { ...settings, electrodes: { left: surface, right: surface } },
    yieldAt: (voltage) => gap.ionYield * (a + (b * voltage) / column),
  };
}

function exactThreshold(yieldAt: (voltage: number) => number): number {
  const excess = (voltage: number): number => yieldAt(voltage) * Math.expm1(uniformAt(gap, voltage).alpha * gap.spacing) - 1;
  let [low, high] = [0.5 * constant, 2 * constant];
  for (let k = 0; k < 60; k++) {
    const middle = (low + high) / 2;
    if (excess(middle) < 0) low = middle;
    else high = middle;
  }
  return low;
}

describe('a yield that depends on the field', () => {
  for (const [name, b, there] of [
    ['rises with it', 2e18, 0.5],
    ['falls with it', -1e18, 1.5],
  ] as const) {
    it(`breaks down where the criterion with the yield of that field says, where it ${name}`, () => {
      const { settings, yieldAt } = withLaw(b, there);
      const exact = exactThreshold(yieldAt);
      const theory = predict(settings, constant).static_breakdown_voltage_V;
      const found = holdOff(settings, { from: 0.5 * constant, to: 2 * constant, tolerance: 1e-3 }, (c) => simulateNow(c));
      printTable(
        `breakdown voltage with a yield that ${name}`,
        ['constant yield V', 'bisection V', 'theory V', 'hold-off V', 'runs'],
        [[constant, exact, theory ?? Number.NaN, found.value ?? Number.NaN, found.runs]],
      );
      expect(theory).toBeCloseTo(exact, 6);
      expect(found.state).toBe('found');
      expect(Math.abs((found.value ?? 0) / exact - 1)).toBeLessThan(1e-3);
      // and not where the constant yield has it
      expect(Math.abs(exact / constant - 1)).toBeGreaterThan(0.02);
    });
  }
});
