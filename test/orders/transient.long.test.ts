/** Orders of a whole run of the open case: crossing times and peak current against cells at a time error far below, and against the tolerance at
 *  cells that do not change. */
import { describe, expect, it } from 'vitest';
import type { Outcome } from '../../src/onset/outcome.ts';
import { simulateNow } from '../../src/simulate.ts';
import { caseOf, rightOfMinimum, stepTo } from '../help/plain-gap.ts';
import { ordersOf, printTable } from '../help/table.ts';

function openCaseRun(cells: number, tolerance: number): Outcome {
  return simulateNow(
    caseOf(rightOfMinimum, {
      seed: { cathodeCurrent: 1e-10 },
      supply: { programme: stepTo(230.202), seriesResistance: 1e4, parallelCapacitance: 100e-12 },
      observe: { until: 1e-4, currents: [1e-5, 1e-3] },
      numerics: { cells, tolerance },
    }),
  );
}

const READ: readonly { readonly name: string; readonly of: (o: Outcome) => number }[] = [
  { name: '10 µA at', of: (o) => o.currents[0].time_s ?? Number.NaN },
  { name: '1 mA at', of: (o) => o.currents[1].time_s ?? Number.NaN },
  { name: 'collapse at', of: (o) => o.onset.collapse_time_s ?? Number.NaN },
  { name: 'peak current', of: (o) => o.peak.current_A },
];

describe('a run of the open case', () => {
  it('converges in space at least as the second order, on itself', () => {
    const cells = [50, 100, 200, 400, 800];
    const runs = cells.map((n) => openCaseRun(n, 1e-7));
    const rows = READ.map(({ name, of }) => {
      const changes = runs.slice(1).map((r, i) => of(r) / of(runs[i]) - 1);
      const orders = ordersOf(cells.slice(0, 4), changes.map(Math.abs)).map((p) => -p);
      return { name, changes, orders };
    });
    printTable(
      'open case, changes as the cells double from 50 to 800, tolerance 1e-7',
      ['', '→ 100', '→ 200', '→ 400', '→ 800', 'order', 'order', 'order'],
      rows.map((r) => [r.name, ...r.changes, ...r.orders]),
    );
    for (const { name, changes, orders } of rows) {
      // between the third order of the drift and the second of the rest
      expect(orders[1], name).toBeGreaterThan(1.85);
      expect(orders[1], name).toBeLessThan(3.15);
      expect(Math.abs(changes[3]), name).toBeLessThan(1e-4);
    }
  });

  it('converges in time with the tolerance: a hundred times tighter, at least forty times closer, to 1e-5 of the lag', () => {
    const tolerances = [1e-2, 1e-3, 1e-4, 1e-5];
    const exact = openCaseRun(100, 1e-7);
    const runs = tolerances.map((tolerance) => openCaseRun(100, tolerance));
    const rows = READ.map(({ name, of }) => ({ name, errors: runs.map((r) => Math.abs(of(r) / of(exact) - 1)) }));
    printTable(
      'open case, errors against tolerance, 100 cells',
      ['', ...tolerances.map((t) => t.toExponential()), 'steps'],
      rows.map((r) => [r.name, ...r.errors, runs.map((o) => o.numerics.steps).join(' ')]),
    );
    for (const { name, errors } of rows) {
      expect(errors[1] / errors[3], name).toBeGreaterThan(40);
      expect(errors[3], name).toBeLessThan(2e-4);
    }
    for (const { name, errors } of rows.slice(0, 3)) expect(errors[3], name).toBeLessThan(2e-5);
  });
});
