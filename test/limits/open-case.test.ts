/** The open case of the project on default settings: a step to 10 % overvoltage behind 10 kΩ with 100 pF across the gap, to a glow.
 *
 *  Expected numbers: the issue that set the case; the transient from one independent code whose drift-form twin a second code
 *  confirms to 3e-5, the steady state from a separate steady solver, errors below 1e-4. The steady state is compared with this
 *  project's collocation oracle as well. */
import { describe, expect, it } from 'vitest';
import { simulateNow } from '../../src/simulate.ts';
import { caseOf, rightOfMinimum, steadyGapOf, stepTo } from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';
import { openCase } from '../oracles/open-case.ts';
import { steadyOnLoadLine } from '../oracles/steady-gap.ts';

const settings = caseOf(rightOfMinimum, {
  seed: { cathodeCurrent: openCase.seedCurrent },
  supply: { programme: stepTo(openCase.supplyVoltage), seriesResistance: openCase.seriesResistance, parallelCapacitance: 100e-12 },
  observe: { until: 2e-3, currents: [1e-6, 1e-5, 1e-4, 1e-3] },
});

describe('the open case', () => {
  const voltages: number[] = [];
  const times: number[] = [];
  const outcome = simulateNow(settings, {
    snapshot: (s) => {
      voltages.push(s.gapVoltage);
      times.push(s.time);
    },
  });
  /** least gap voltage after the peak: the parabola through the three lowest neighbours in time */
  const least = (() => {
    let k = times.findIndex((t) => t > outcome.peak.time_s);
    while (k + 1 < voltages.length && voltages[k + 1] < voltages[k]) k++;
    const [a, b, c] = [times[k - 1] - times[k], 0, times[k + 1] - times[k]];
    const first = (voltages[k] - voltages[k - 1]) / (b - a);
    const second = ((voltages[k + 1] - voltages[k]) / (c - b) - first) / (c - a);
    const at = -(first - second * a) / (2 * second);
    return voltages[k] + at * (first - second * a) + second * at * at;
  })();

  const rows: readonly (readonly [string, number, number, number])[] = [
    ['crosses 1 µA at s', 52.818e-6, outcome.currents[0].time_s ?? Number.NaN, 5e-3],
    ['crosses 10 µA at s', 71.371e-6, outcome.currents[1].time_s ?? Number.NaN, 5e-3],
    ['crosses 100 µA at s', 81.152e-6, outcome.currents[2].time_s ?? Number.NaN, 5e-3],
    ['crosses 1 mA at s', 82.868e-6, outcome.currents[3].time_s ?? Number.NaN, 5e-3],
    ['peak A', 6.709e-3, outcome.peak.current_A, 2e-2],
    ['peak at s', 83.858e-6, outcome.peak.time_s, 5e-3],
    ['lowest V after the peak', 181.165, least, 1e-2],
    ['steady V', 186.414, outcome.final.gap_voltage_V, 1e-2],
    ['steady A', 4.3788e-3, outcome.final.current_A, 1e-2],
    ['steady cathode field V/m', 1.41143e5, outcome.final.cathode_field_V_per_m, 1e-2],
  ];

  it('prints what it finds', () => {
    printTable(
      'open case, default settings',
      ['', 'expected', 'found', 'error', 'bar'],
      rows.map(([name, expected, found, bar]) => [name, expected.toPrecision(6), found.toPrecision(6), found / expected - 1, bar]),
    );
    expect(outcome.numerics.cells).toBeLessThanOrEqual(200);
    expect(outcome.final.stop).toBe('steady');
    expect(outcome.verdict.state).toBe('breaks-down');
    expect(outcome.verdict.regime).toBe('glow');
  });

  for (const [name, expected, found, bar] of rows) {
    it(`${name} within ${100 * bar} %`, () => {
      expect(Math.abs(found / expected - 1)).toBeLessThan(bar);
    });
  }

  it('takes the same energy from the source as a run with 4 × the cells and a hundredth of the tolerance, within 1 %', () => {
    const fine = simulateNow({ ...settings, numerics: { cells: 4 * outcome.numerics.cells, tolerance: 1e-5 } });
    // a steady run may end early: the rest until the later end is the steady power
    const rest = (o: typeof outcome): number => (2e-3 - o.final.time_s) * o.final.current_A;
    const gap = (o: typeof outcome): number => o.energy.gap_J + rest(o) * o.final.gap_voltage_V;
    const source = (o: typeof outcome): number => o.energy.source_J + rest(o) * openCase.supplyVoltage;
    expect(Math.abs(gap(outcome) / gap(fine) - 1)).toBeLessThan(1e-2);
    expect(Math.abs(source(outcome) / source(fine) - 1)).toBeLessThan(1e-2);
  });

  it('ends in the steady state of the collocation oracle within 0.5 %', () => {
    const exact = steadyOnLoadLine(steadyGapOf(rightOfMinimum, openCase.seedCurrent), {
      supplyVoltage: openCase.supplyVoltage,
      resistance: openCase.seriesResistance,
    });
    expect(Math.abs(outcome.final.gap_voltage_V / exact.voltage - 1)).toBeLessThan(5e-3);
    expect(Math.abs(outcome.final.current_A / exact.current - 1)).toBeLessThan(5e-3);
    expect(Math.abs(outcome.final.cathode_field_V_per_m / exact.cathodeField - 1)).toBeLessThan(5e-3);
  });
});
