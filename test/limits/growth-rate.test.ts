/** The growth rate that a run reports, and that of the discrete equations, against the exact root of Davidson's equation (Raether,
 *  Electron Avalanches and Breakdown in Gases, 1964; from memory H, derived again in the oracle) and, with diffusion, against the
 *  eigenvalue of the linear problem. */
import { describe, expect, it } from 'vitest';
import { simulateNow } from '../../src/simulate.ts';
import { discreteGrowthRate } from '../help/discrete-growth.ts';
import { BRANCHES, breakdownVoltageOf, caseOf, type PlainGap, stepTo, uniformAt, withoutDiffusion } from '../help/plain-gap.ts';
import { ordersOf, printTable } from '../help/table.ts';
import { diffusiveGrowthRate } from '../oracles/diffusive-growth-rate.ts';
import { exactGrowthRate } from '../oracles/growth-rate.ts';

/** λ of a run on default settings in which a seed grows freely from t = 0 until the current is about `last` [A]. */
function simulatedRate(gap: PlainGap, voltage: number, seed: number, rate: number, last: number): number | null {
  const until = Math.log(last / seed) / rate + (6 * gap.spacing) / uniformAt(gap, voltage).ionSpeed;
  const settings = caseOf(gap, { seed: { cathodeCurrent: seed }, supply: { programme: stepTo(voltage) }, observe: { until } });
  return simulateNow(settings).onset.growth_rate_per_s;
}

// a faster growth needs a smaller seed to have some decades left after the three transits that the fit waits
const CASES = [
  { over: 0.01, seed: 1e-14 },
  { over: 0.02, seed: 1e-14 },
  { over: 0.05, seed: 1e-14 },
  { over: 0.1, seed: 1e-14 },
  { over: 0.2, seed: 1e-16 },
  { over: 0.5, seed: 1e-26 },
];

for (const [branch, open] of BRANCHES) {
  const gap = withoutDiffusion(open);
  const exactAt = (over: number): { voltage: number; exact: number } => {
    const voltage = (1 + over) * breakdownVoltageOf(gap);
    return { voltage, exact: exactGrowthRate(uniformAt(gap, voltage)) };
  };

  describe(`the growth rate of a run on default settings, ${branch}`, () => {
    it('is the exact root within 0.5 % from 1 to 50 % overvoltage', () => {
      const rows = CASES.map(({ over, seed }) => {
        const { voltage, exact } = exactAt(over);
        const found = simulatedRate(gap, voltage, seed, exact, 3e-6) ?? Number.NaN;
        return [over, seed, exact, found, found / exact - 1];
      });
      printTable(`growth rate, D = 0, ${branch}`, ['overvoltage', 'seed A', 'exact 1/s', 'run 1/s', 'error'], rows);
      for (const row of rows) expect(Math.abs(row[4]), `overvoltage ${row[0]}`).toBeLessThan(5e-3);
    });

    it('is the same with a seed of 1e-10 A, or null where so few decades do not determine it', () => {
      for (const { over } of CASES) {
        const { voltage, exact } = exactAt(over);
        const found = simulatedRate(gap, voltage, 1e-10, exact, 3e-6);
        if (found !== null) expect(Math.abs(found / exact - 1), `overvoltage ${over}`).toBeLessThan(5e-3);
      }
    });

    it('follows the eigenvalue with diffusion within 0.5 %', () => {
      for (const over of [0.02, 0.1]) {
        const voltage = (1 + over) * breakdownVoltageOf(open);
        const exact = diffusiveGrowthRate(uniformAt(open, voltage));
        const found = simulatedRate(open, voltage, 1e-16, exact, 1e-8) ?? Number.NaN;
        expect(Math.abs(found / exact - 1), `overvoltage ${over}`).toBeLessThan(5e-3);
      }
    });
  });

  describe(`the growth rate of the discrete equations, ${branch}`, () => {
    const cells = [20, 40, 80, 160, 320];
    const errorsOf = (which: PlainGap, voltage: number, exact: number): number[] =>
      cells.map((n) => {
        const settings = caseOf(which, { seed: { cathodeCurrent: 0 }, supply: { programme: stepTo(voltage) }, numerics: { cells: n } });
        return discreteGrowthRate(settings, exact) / exact - 1;
      });
    const report = (title: string, errors: readonly number[]): number[] => {
      const orders = ordersOf(cells, errors.map(Math.abs)).map((p) => -p);
      printTable(
        `${title}, ${branch}`,
        ['cells', 'error', 'order'],
        cells.map((n, i) => [n, errors[i], i === 0 ? '' : orders[i - 1]]),
      );
      return orders;
    };

    it('tends to the exact root without diffusion, nearly as the third order of the drift scheme', () => {
      const { voltage, exact } = exactAt(0.1);
      const errors = errorsOf(gap, voltage, exact);
      const orders = report('growth rate against cells, 10 % overvoltage, D = 0', errors);
      for (const order of orders) expect(Math.abs(order - 2.85)).toBeLessThan(0.15);
      expect(Math.abs(errors[4])).toBeLessThan(2e-6);
    });

    it('tends to the eigenvalue with strong diffusion as the second order of the diffusion scheme', () => {
      const hot = { ...open, electronEnergy: 6, ionEnergy: 1 };
      const voltage = 1.5 * breakdownVoltageOf(hot);
      const errors = errorsOf(hot, voltage, diffusiveGrowthRate(uniformAt(hot, voltage)));
      const orders = report('growth rate against cells, 50 % overvoltage, strong diffusion', errors);
      expect(Math.abs(orders[3] - 2)).toBeLessThan(0.15);
      expect(Math.abs(errors[4])).toBeLessThan(2e-5);
    });
  });
}
