/** Runs with electrons as particles against what their own avalanches say by other paths, and the breakdown curve against the local field's. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { readCase } from '../../src/casefile/index.ts';
import { gapYieldOf } from '../../src/kinetics/gap-yield.ts';
import { collisionsOf } from '../../src/kinetics/of-case.ts';
import type { Snapshot } from '../../src/onset/snapshot-watch.ts';
import { simulateNow } from '../../src/simulate.ts';
import { curvePointOf, kineticGapOf } from '../../src/theory/kinetic.ts';

const TEXT = `
title: Thin argon
gap: { geometry: planar, spacing: 10 mm, area: 8 cm^2 }
gas: { name: argon, pressure: 0.8 Torr }
electrodes: { left: { ion_yield: 0.07 } }
seed: { cathode_current: 1e-18 A }
supply: { voltage: { step: 190 V }, series_resistance: 0 ohm }
electrons: { closure: kinetic, particles: 6000 }
observe: { until: 60 us }
`;

function caseOf(...overrides: string[]): Case {
  const read = readCase(TEXT, 'thin.yaml', () => ({ ok: false, reason: 'no tables' }), overrides);
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  return read.case;
}

describe('a run with electrons as particles', () => {
  it('grows in the dark at the rate at which its avalanches and the transit of ions make it grow, right and left of the minimum', () => {
    for (const overrides of [
      [],
      ['gas.pressure=0.5 Torr', 'supply.voltage.step=230 V'],
      ['gas.pressure=2 Torr', 'supply.voltage.step=220 V', 'observe.until=250 us'],
    ]) {
      const outcome = simulateNow(caseOf(...overrides));
      const { growth_rate_per_s: theory } = outcome.theory;
      const { growth_rate_per_s: simulated } = outcome.onset;
      // both have the same avalanches; the root takes the electrons' transit into account, 0.5 % of the ions', and no diffusion of ions
      expect(Math.abs((simulated ?? 0) / (theory ?? 1) - 1), JSON.stringify([overrides, simulated, theory])).toBeLessThan(0.015);
    }
  }, 300_000);

  it('amplifies the seed below threshold by (1 − r + M)/(1 − q), which its avalanches give', () => {
    const { final, theory, kinetics } = simulateNow(caseOf('supply.voltage.step=145 V', 'observe.until=2 ms', 'seed.cathode_current=1 pA'));
    expect(final.stop).toBe('steady');
    expect(theory.feedback).toBeLessThan(0.95);
    const expected = (1 - (kinetics?.returned_fraction ?? 0) + (kinetics?.ions_per_electron ?? 0)) / (1 - (kinetics?.feedback ?? 0));
    expect(final.current_A / 1e-12 / expected).toBeCloseTo(1, 2);
    expect((theory.steady_amplification ?? 0) / expected).toBeCloseTo(1, 9);
  }, 300_000);

  it('ends as a glow in whose field each emitted electron makes 1/γ ions, followed anew on other random numbers', () => {
    let last: { field: Float64Array; x: Float64Array } | null = null;
    let centres = new Float64Array(0);
    const settings = caseOf(
      'seed.cathode_current=50 pA',
      'supply.series_resistance=20 kohm',
      'supply.parallel_capacitance=20 pF',
      'observe.until=1 ms',
    );
    const outcome = simulateNow(settings, {
      begin: (layout) => {
        centres = Float64Array.from(layout.x);
      },
      snapshot: (s: Snapshot) => {
        last = { field: Float64Array.from(s.electricField), x: centres };
      },
    });
    expect(outcome.final.stop).toBe('steady');
    expect(outcome.numerics.charge_defect).toBeLessThan(1e-12);
    if (last === null) throw new Error('no snapshot');
    const { field, x } = last as { field: Float64Array; x: Float64Array };
    // cells around the centres of the snapshot
    const faces = Float64Array.from({ length: x.length + 1 }, (_, f) => (f === 0 ? 0 : f === x.length ? 0.01 : (x[f - 1] + x[f]) / 2));
    const force = field.map((E) => -E);
    const found = gapYieldOf({ table: collisionsOf(settings), field: { faces, force }, emissionEnergy: 2, particles: 16000, seed: 99 });
    const feedback = 0.07 * (found?.ionsPerElectron.value ?? 0);
    const error = 0.07 * (found?.ionsPerElectron.error ?? 0);
    // 2 %: what the last answer joined in the run was known to, see Particles
    expect(Math.abs(feedback - 1), `${feedback} ± ${error}`).toBeLessThan(3 * error + 0.02);
  }, 300_000);

  it('is a mirror image with the voltage reversed, within noise', () => {
    const [left, right] = [190, -190].map((voltage) => simulateNow(caseOf(`supply.voltage.step=${voltage} V`)));
    expect((right.onset.growth_rate_per_s ?? 0) / (left.onset.growth_rate_per_s ?? 1)).toBeCloseTo(1, 3);
    expect(right.theory.static_breakdown_voltage_V).toBe(left.theory.static_breakdown_voltage_V);
  }, 300_000);
});

/** Argon, from 0.2 to 10 Torr cm, by 4000 of 20000 electrons a voltage. */
describe('the breakdown curve by particles', () => {
  const settings = caseOf('gas.pressure=1 Torr', 'electrons.particles=20000');

  // α/N of argon by particles is within 10 % of the published fit from 100 Td on (swarm-values.long.test.ts); 10 % in α is 4 % in V at 2 to 10 Torr cm,
  // where αd is 2.6 or more and V goes as the 0.4th power of α or less
  it('agrees with the local field with the same net yield right of the minimum', () => {
    for (const pd of [3, 5, 10]) {
      const point = curvePointOf(settings, pd);
      const ratio = (point.breakdown_voltage_V ?? 0) / (point.local_field_breakdown_voltage_V ?? 1);
      expect(Math.abs(ratio - 1), `${pd} Torr cm: ${JSON.stringify(point)}`).toBeLessThan(0.04);
    }
  }, 300_000);

  // there electrons leave the cathode without energy and ionise only after having fallen through the first volts: αd of the field counts a way on which
  // nothing is ionised yet
  it('lies a fifth or more above it near the minimum and left of it', () => {
    for (const pd of [1, 0.5]) {
      const { breakdown_voltage_V: V, local_field_breakdown_voltage_V: local } = curvePointOf(settings, pd);
      expect((V ?? Number.NaN) / (local ?? Number.NaN)).toBeGreaterThan(1.15);
      expect((V ?? Number.NaN) / (local ?? Number.NaN)).toBeLessThan(1.35);
    }
  }, 300_000);

  // seen by an independent program: below a certain pd no voltage breaks the gap down, and just above it the curve is double-valued. q rises to 1.16 at 600 V
  // at 0.21 Torr cm and to 0.97 at 400 V at 0.2 Torr cm (6000 electrons a voltage, ± 0.02)
  it('goes on to thinner gas than the local field with the net yield, turns back there and ends', () => {
    const last = curvePointOf(settings, 0.21);
    expect(last.local_field_breakdown_voltage_V).toBeNull();
    expect(last.breakdown_voltage_V).toBeGreaterThan(320);
    expect(last.breakdown_voltage_V).toBeLessThan(440);
    expect(last.upper_breakdown_voltage_V).toBeGreaterThan(680);
    expect(last.upper_breakdown_voltage_V).toBeLessThan(950);
    expect(curvePointOf(settings, 0.17).breakdown_voltage_V).toBeNull();
  }, 300_000);

  // seen by an independent program: several per cent at 1 Torr cm
  it('moves by several per cent with the energy of emission at 1 Torr cm', () => {
    const [slow, fast] = [1, 5].map((energy) => {
      const there = caseOf('gas.pressure=1 Torr', 'electrons.particles=8000', `electrons.emission_energy=${energy} eV`);
      return kineticGapOf(there, 1)?.threshold.breakdown ?? Number.NaN;
    });
    expect(fast / slow - 1).toBeGreaterThan(0.01);
    expect(fast / slow - 1).toBeLessThan(0.15);
  }, 300_000);
});
