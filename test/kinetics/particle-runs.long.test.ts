/** Short runs with electrons as particles: what is conserved, that the same seed gives the same run, what is recorded and warned of. */
import { describe, expect, it } from 'vitest';
import { prognosisCautions } from '../../src/onset/prognosis.ts';
import { simulateNow } from '../../src/simulate.ts';
import { thinCase } from './thin-case.ts';

describe('a run with particles', () => {
  const outcome = simulateNow(thinCase());

  it('conserves charge and energy to rounding', () => {
    expect(outcome.numerics.charge_defect).toBeLessThan(1e-12);
    const { source_J, gap_J } = outcome.energy;
    expect(source_J).toBeGreaterThan(gap_J);
  });

  it('is the same for the same seed, and another for another', () => {
    const wall = ({ numerics, ...rest }: ReturnType<typeof simulateNow>): unknown => ({ ...rest, numerics: { ...numerics, wall_s: 0 } });
    expect(wall(simulateNow(thinCase()))).toEqual(wall(outcome));
    const other = simulateNow(thinCase(['electrons.seed=2']));
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
    simulateNow(thinCase(), {
      snapshot: (s) => {
        ions = s.ionisationRate.reduce((sum, rate) => sum + rate, 0);
        carried = s.electronFlux[s.electronFlux.length - 1];
      },
    });
    expect(ions).toBeGreaterThan(0);
    expect(carried).toBeGreaterThan(0);
    const codes = (voltage: string): string[] =>
      prognosisCautions(thinCase([`supply.voltage.step=${voltage}`, 'gas.pressure=0.02 Torr']), [])
        .filter(({ code }) => code === 'outside-range')
        .map(({ text }) => text);
    expect(codes('900 V')).toEqual([]);
    expect(codes('1.5 kV')[0]).toContain('cross-sections are known up to 1000 eV');
  });
});
