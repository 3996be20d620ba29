import { describe, expect, it } from 'vitest';
import { voltTimesCharge } from '../../src/onset/energy-watch.ts';
import { openCase } from '../oracles/open-case.ts';
import { voltageCurrentCurve } from '../oracles/steady-gap.ts';
import { outcomeOf, ramp } from './set-up.ts';

describe('∫V dQ over a step', () => {
  it('is exact for cubics in time', () => {
    const V = (s: number): number => 3 - 2 * s + 5 * s ** 2 - 4 * s ** 3;
    const Q = (s: number): number => 7 + s - 6 * s ** 2 + 2 * s ** 3;
    // V Q′ = (3 − 2s + 5s² − 4s³)(1 − 12s + 6s²), term by term
    const expected = 3 - (2 + 36) / 2 + (5 + 24 + 18) / 3 - (4 + 60 + 12) / 4 + (48 + 30) / 5 - 24 / 6;
    const thirds = (f: (s: number) => number): Float64Array => Float64Array.from([0, 1 / 3, 2 / 3, 1], f);
    expect(voltTimesCharge(thirds(V), thirds(Q))).toBeCloseTo(expected, 12);
  });
});

describe('the energy of a run', () => {
  it('is that of the glow it passes through, even on a slow ramp whose steps are a million times longer than the gap’s own times', () => {
    const [rate, until] = [100, 4.8];
    const { energy, final } = outcomeOf({ supply: { programme: ramp(500, rate) }, observe: { until } });
    expect(final.stop).toBe('until');
    // oracle: steady states along the load line, each reached when the supply has V + R I
    const currents = Array.from({ length: 25 }, (_, k) => 1.95e-3 + (k * (final.current_A - 1.95e-3)) / 24);
    const states = voltageCurrentCurve(openCase, currents, { accuracy: 1e-5 });
    const supply = states.map((s) => s.voltage + openCase.seriesResistance * s.current);
    let [gap, source] = [0, 0];
    for (let k = 1; k < states.length; k++) {
      const span = (supply[k] - supply[k - 1]) / rate;
      gap += (span / 2) * (states[k].voltage * states[k].current + states[k - 1].voltage * states[k - 1].current);
      source += (span / 2) * (supply[k] * states[k].current + supply[k - 1] * states[k - 1].current);
    }
    // from breakdown, at 209.6 V, to the first of these states it grows at the power of that state
    const lead = (supply[0] - 209.57) / rate;
    gap += lead * states[0].voltage * states[0].current;
    source += lead * supply[0] * states[0].current;
    expect(Math.abs(energy.gap_J / gap - 1)).toBeLessThan(5e-3);
    expect(Math.abs(energy.source_J / source - 1)).toBeLessThan(5e-3);
  });
});
