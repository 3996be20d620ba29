/** Electrons and ions feel the density of the gas, not its temperature (physics.md: N = p/(kT) is all that enters). */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { gases } from '../../src/gases/index.ts';
import { simulateNow } from '../../src/simulate.ts';
import { caseOf, rightOfMinimum, stepTo } from '../help/plain-gap.ts';
import { BOLTZMANN } from '../oracles/open-case.ts';

function argonAt(temperature: number): Case {
  const base = caseOf(rightOfMinimum, {
    supply: { programme: stepTo(300), seriesResistance: 1e4, parallelCapacitance: 100e-12 },
    observe: { until: 3e-4, currents: [1e-6, 1e-3] },
  });
  const density = 1e23;
  return {
    ...base,
    gas: { ...gases.argon, temperature, density, pressure: density * BOLTZMANN * temperature },
  };
}

describe('the same density of argon', () => {
  it('gives identical results at 250 and 350 K', () => {
    const [cold, hot] = [250, 350].map((temperature) => simulateNow(argonAt(temperature)));
    expect(cold.verdict.state).toBe('breaks-down');
    expect(hot.verdict).toEqual(cold.verdict);
    expect(hot.onset).toEqual(cold.onset);
    expect(hot.peak).toEqual(cold.peak);
    expect(hot.final).toEqual(cold.final);
    expect(hot.energy).toEqual(cold.energy);
    expect(hot.currents).toEqual(cold.currents);
    expect(hot.theory.static_breakdown_voltage_V).toBe(cold.theory.static_breakdown_voltage_V);
    // what depends on the temperature is the pressure of that density
    expect(hot.theory.pd_Pa_m / cold.theory.pd_Pa_m).toBeCloseTo(350 / 250, 12);
  });
});
