/** When the current of a growing discharge passes given levels, against the exact linear transient (the renewal equation of the oracle). */
import { describe, expect, it } from 'vitest';
import { simulateNow } from '../../src/simulate.ts';
import { BRANCHES, breakdownVoltageOf, caseOf, rightOfMinimum, stepTo, transientAt, withoutDiffusion } from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';
import { linearTransient } from '../oracles/linear-transient.ts';

const SEED = 1e-20;
/** five to ten decades above the seed, and far below any space charge, which bends the field by 1e-4 at 3e-9 A on the left branch */
const LEVELS = [1e-15, 1e-14, 1e-12, 1e-10];

describe('the times at which the current passes four levels', () => {
  for (const [branch, open] of BRANCHES) {
    it(`are those of the linear transient within 0.2 % from 1 to 100 % overvoltage, ${branch}`, () => {
      const gap = withoutDiffusion(open);
      const rows = [0.01, 0.03, 0.1, 0.3, 1].map((over) => {
        const voltage = (1 + over) * breakdownVoltageOf(gap);
        const exact = linearTransient(transientAt(gap, voltage, SEED));
        const times = LEVELS.map((level) => exact.crossingTime(level, 1));
        const outcome = simulateNow(
          caseOf(gap, {
            seed: { cathodeCurrent: SEED },
            supply: { programme: stepTo(voltage) },
            observe: { until: 1.02 * times[3], currents: LEVELS },
          }),
        );
        return [over, times[3] / exact.loopTime, ...outcome.currents.map((c, i) => (c.time_s ?? Number.NaN) / times[i] - 1)];
      });
      printTable(
        `errors of crossing times at ${LEVELS.join(', ')} A, D = 0, ${branch}`,
        ['overvoltage', 'loops', ...LEVELS.map((level) => level.toExponential())],
        rows,
      );
      for (const row of rows) for (const error of row.slice(2)) expect(Math.abs(error), `overvoltage ${row[0]}`).toBeLessThan(2e-3);
    });
  }

  it('are those of the linear transient within 0.2 % for electrons released at the cathode and no seed current', () => {
    const gap = withoutDiffusion(rightOfMinimum);
    const voltage = 1.2 * breakdownVoltageOf(gap);
    const exact = linearTransient({ ...transientAt(gap, voltage, 0), electrons: 1e-4 });
    const levels = [1e-12, 1e-11, 1e-10, 1e-9];
    const times = levels.map((level) => exact.crossingTime(level, 1));
    const outcome = simulateNow(
      caseOf(gap, {
        seed: { cathodeCurrent: 0, electrons: 1e-4 },
        supply: { programme: stepTo(voltage) },
        observe: { until: 1.02 * times[3], currents: levels },
      }),
    );
    const errors = outcome.currents.map((c, i) => (c.time_s ?? Number.NaN) / times[i] - 1);
    printTable(
      'errors of crossing times after electrons were released, 20 % overvoltage',
      ['level A', 'loops', 'error'],
      levels.map((level, i) => [level, times[i] / exact.loopTime, errors[i]]),
    );
    for (const error of errors) expect(Math.abs(error)).toBeLessThan(2e-3);
  });
});
