/** Short runs with electrons as particles: what is conserved, that the same seed gives the same run, what is recorded and warned of. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { readCase } from '../../src/casefile/index.ts';
import { prognosisCautions } from '../../src/onset/prognosis.ts';
import { simulateNow } from '../../src/simulate.ts';

function caseOf(overrides: readonly string[] = []): Case {
  const text = `
title: Thin argon
gap: { geometry: planar, spacing: 5 mm, area: 4 cm^2 }
gas: { name: argon, pressure: 1.2 Torr }
electrodes: { left: { ion_yield: 0.1 } }
seed: { cathode_current: 10 pA }
supply: { voltage: { step: 180 V }, series_resistance: 100 kohm, parallel_capacitance: 20 pF }
electrons: { closure: kinetic, particles: 640 }
observe: { until: 20 us }
`;
  const read = readCase(text, 'thin.yaml', () => ({ ok: false, reason: 'no tables' }), overrides);
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  return read.case;
}

describe('a run with particles', () => {
  const outcome = simulateNow(caseOf());

  it('conserves charge and energy to rounding', () => {
    expect(outcome.numerics.charge_defect).toBeLessThan(1e-12);
    const { source_J, gap_J } = outcome.energy;
    expect(source_J).toBeGreaterThan(gap_J);
  });

  it('is the same for the same seed, and another for another', () => {
    const wall = ({ numerics, ...rest }: ReturnType<typeof simulateNow>): unknown => ({ ...rest, numerics: { ...numerics, wall_s: 0 } });
    expect(wall(simulateNow(caseOf()))).toEqual(wall(outcome));
    const other = simulateNow(caseOf(['electrons.seed=2']));
    expect(other.kinetics?.breakdown_voltage_V).not.toBe(outcome.kinetics?.breakdown_voltage_V);
  });

  it('says what particles found beside what the local field does with the net yield', () => {
    const { kinetics, theory } = outcome;
    expect(kinetics?.breakdown_voltage_V).toBe(theory.static_breakdown_voltage_V);
    expect(kinetics?.emitted_per_ion).toBe(0.1);
    expect(kinetics?.net_per_ion).toBeCloseTo(0.1 * (1 - (kinetics?.returned_fraction ?? 0)), 1);
  });

  it('records the ionisation that particles make, and warns of energies beyond the cross-sections', () => {
    let ions = 0;
    let carried = 0;
    simulateNow(caseOf(), {
      snapshot: (s) => {
        ions = s.ionisationRate.reduce((sum, rate) => sum + rate, 0);
        carried = s.electronFlux[s.electronFlux.length - 1];
      },
    });
    expect(ions).toBeGreaterThan(0);
    expect(carried).toBeGreaterThan(0);
    const codes = (voltage: string): string[] =>
      prognosisCautions(caseOf([`supply.voltage.step=${voltage}`, 'gas.pressure=0.02 Torr']), [])
        .filter(({ code }) => code === 'outside-range')
        .map(({ text }) => text);
    expect(codes('900 V')).toEqual([]);
    expect(codes('1.5 kV')[0]).toContain('cross-sections are known up to 1000 eV');
  });
});
