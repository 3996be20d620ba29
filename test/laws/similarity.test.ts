/** Similarity: a gap k times as small in k times as dense a gas does the same k times as fast, at the same voltages and currents.
 *
 *  d/k, A/k², N·k, t/k (rise, delay, until; ramp rate ·k), C_p/k, β/k, starting electrons/k; V, I, R, limits and seed current unchanged
 *  (von Engel, Ionized Gases, 1965, on similar discharges, from memory M; here it follows from the equations: lengths and times scale as 1/N,
 *  densities as N², so a two-body loss keeps the similarity only with β/N constant). */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import type { Coefficient } from '../../src/gases/gas.ts';
import type { Outcome } from '../../src/onset/outcome.ts';
import { simulateNow } from '../../src/simulate.ts';
import type { Programme } from '../../src/supply/settings.ts';
import { caseOf, rightOfMinimum } from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';
import { coefficient } from '../theory/make-case.ts';

function scaled(programme: Programme, k: number): Programme {
  switch (programme.kind) {
    case 'step':
      return { ...programme, riseTime: programme.riseTime / k };
    case 'ramp':
      return { ...programme, rate: programme.rate * k };
    case 'table':
      return { ...programme, times: programme.times.map((t) => t / k) };
  }
}

function similar(settings: Case, k: number, scaleRecombination: boolean): Case {
  const { gap, gas, seed, supply, observe } = settings;
  const slower = (c: Coefficient | null): Coefficient | null =>
    c === null || c.form.kind !== 'constant' || !scaleRecombination ? c : coefficient({ kind: 'constant', value: c.form.value / k });
  return {
    ...settings,
    gap: { ...gap, spacing: gap.spacing / k, area: gap.area / k ** 2, longestPath: gap.longestPath / k },
    gas: {
      ...gas,
      pressure: gas.pressure * k,
      density: gas.density * k,
      coefficients: {
        ...gas.coefficients,
        electronIonRecombination: slower(gas.coefficients.electronIonRecombination),
        ionIonRecombination: slower(gas.coefficients.ionIonRecombination),
      },
    },
    seed: { ...seed, electrons: seed.electrons / k },
    supply: {
      ...supply,
      programme: scaled(supply.programme, k),
      parallelCapacitance: supply.parallelCapacitance / k,
      trip: supply.trip === null ? null : { ...supply.trip, delay: supply.trip.delay / k },
    },
    observe: { ...observe, until: observe.until / k },
  };
}

/** Everything of an outcome that similarity speaks of, in the units of the gap that is 1/k as large. */
function findings(outcome: Outcome, k: number): Map<string, number | null> {
  const { onset, peak, final, energy, currents } = outcome;
  const time = (t: number | null): number | null => (t === null ? null : t * k);
  return new Map<string, number | null>([
    ['threshold time', time(onset.threshold_time_s)],
    ['space-charge time', time(onset.space_charge_time_s)],
    ['collapse time', time(onset.collapse_time_s)],
    ['onset voltage', onset.gap_voltage_V],
    ['growth rate', onset.growth_rate_per_s === null ? null : onset.growth_rate_per_s / k],
    ['peak current', peak.current_A],
    ['peak time', time(peak.time_s)],
    ['peak voltage', peak.gap_voltage_V],
    ['final time', time(final.time_s)],
    ['final voltage', final.gap_voltage_V],
    ['final current', final.current_A],
    ['cathode field', final.cathode_field_V_per_m / k],
    ['cathode layer', time(final.cathode_layer_m)],
    ['gap energy', energy.gap_J * k],
    ['source energy', energy.source_J * k],
    ['energy after trip', energy.after_trip_J === null ? null : energy.after_trip_J * k],
    ...currents.map((c): [string, number | null] => [`crossing of ${c.level_A} A`, time(c.time_s)]),
  ]);
}

/** The largest relative difference of two sets of findings, and where it is. */
function difference(a: Map<string, number | null>, b: Map<string, number | null>): { name: string; size: number } {
  let worst = { name: '', size: 0 };
  for (const [name, value] of a) {
    const other = b.get(name) ?? null;
    const size =
      value === null && other === null ? 0 : value === null || other === null ? Number.POSITIVE_INFINITY : Math.abs(other / value - 1);
    if (size > worst.size || Number.isNaN(size)) worst = { name, size };
  }
  return worst;
}

const observe = { until: 3e-4, currents: [1e-8, 1e-6, 1e-4, 1e-3] };
const recombining = {
  electronIonRecombination: coefficient({ kind: 'constant', value: 1e-13 }),
  ionIonRecombination: coefficient({ kind: 'constant', value: 3e-13 }),
};

const CASES: readonly (readonly [string, Case])[] = [
  [
    'a step with a rise time to a glow',
    caseOf(rightOfMinimum, {
      supply: { programme: { kind: 'step', voltage: 240, riseTime: 1e-5 }, seriesResistance: 1e4, parallelCapacitance: 100e-12 },
      observe,
    }),
  ],
  [
    'a ramp with a current limit and a trip that opens',
    caseOf(rightOfMinimum, {
      seed: { cathodeCurrent: 1e-12, electrons: 40 },
      supply: {
        programme: { kind: 'ramp', from: 0, to: 300, rate: 3e6 },
        seriesResistance: 1e4,
        parallelCapacitance: 200e-12,
        currentLimit: 4e-3,
        trip: { current: 1e-3, delay: 3e-6, senses: 'gap', action: 'open' },
      },
      observe,
    }),
  ],
  [
    'a table with both polarities, attachment and recombination',
    caseOf(
      { ...rightOfMinimum, attachment: 0.4 },
      {
        seed: { cathodeCurrent: 1e-9 },
        supply: {
          programme: { kind: 'table', times: [0, 2e-5, 1.2e-4, 1.6e-4, 3e-4], voltages: [0, 320, 300, -320, -300] },
          seriesResistance: 2e4,
          parallelCapacitance: 50e-12,
        },
        observe,
        coefficients: recombining,
      },
    ),
  ],
];

describe('a similar gap', () => {
  const rows: (string | number)[][] = [];
  for (const [name, settings] of CASES) {
    for (const k of [4, 0.3]) {
      it(`with k = ${k} does the same within 1e-6: ${name}`, () => {
        const base = findings(simulateNow(settings), 1);
        const { name: where, size } = difference(base, findings(simulateNow(similar(settings, k, true)), k));
        rows.push([name, k, size, where]);
        expect(size, where).toBeLessThan(1e-6);
      });
    }
  }

  it('is not similar when recombination is left unscaled: it then does what k times the recombination does', () => {
    const settings = caseOf(rightOfMinimum, {
      supply: { programme: { kind: 'step', voltage: 240, riseTime: 0 }, seriesResistance: 1e4 },
      observe,
      coefficients: { electronIonRecombination: coefficient({ kind: 'constant', value: 2e-13 }) },
    });
    const k = 4;
    const { coefficients } = settings.gas;
    const faster = {
      ...settings,
      gas: {
        ...settings.gas,
        coefficients: { ...coefficients, electronIonRecombination: coefficient({ kind: 'constant', value: k * 2e-13 }) },
      },
    };
    const base = findings(simulateNow(settings), 1);
    const unscaled = findings(simulateNow(similar(settings, k, false)), k);
    const expected = findings(simulateNow(faster), 1);
    const current = (f: Map<string, number | null>): number => f.get('final current') ?? Number.NaN;
    rows.push([
      'recombination unscaled: final current',
      k,
      current(unscaled) / current(base) - 1,
      `expected ${(current(expected) / current(base) - 1).toExponential(2)}`,
    ]);
    const { name: where, size } = difference(expected, unscaled);
    expect(size, where).toBeLessThan(1e-6);
    expect(Math.abs(current(unscaled) / current(base) - 1)).toBeGreaterThan(1e-3);
  });

  it('prints how similar it was', () => {
    printTable('similarity', ['', 'k', 'largest difference', 'in'], rows);
    expect(rows.length).toBe(2 * CASES.length + 1);
  });
});
