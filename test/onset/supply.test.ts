import { describe, expect, it } from 'vitest';
import { openCase } from '../oracles/open-case.ts';
import { steadyAtCurrent, steadyAtVoltage } from '../oracles/steady-gap.ts';
import { openCaseWith, outcomeOf, ramp, step, table, V_S } from './set-up.ts';

describe('polarity', () => {
  const { left } = openCaseWith().electrodes;
  const right = { ...left, ionYield: { ...left.ionYield, typical: 0.02, low: 0.02, high: 0.02 } };

  it.each([
    ['a step', {}],
    ['a step between unlike electrodes', { electrodes: { left, right } }],
    ['a ramp', { supply: { programme: ramp(500, 1e5) }, observe: { until: 8e-3, currents: [1e-6] } }],
    ['a hold', { supply: { programme: step(0.9 * V_S) } }],
    ['a trip', { supply: { trip: { current: 1e-3, delay: 1e-6, senses: 'gap', action: 'open' } as const } }],
    ['starting electrons', { seed: { cathodeCurrent: 0, electrons: 100 } }],
  ])('negative gives the mirrored outcome of %s', (_name, changes) => {
    const there = outcomeOf(changes);
    const c = openCaseWith(changes);
    const { programme } = c.supply;
    const mirrored =
      programme.kind === 'step'
        ? step(-programme.voltage)
        : programme.kind === 'ramp'
          ? ramp(-programme.to, programme.rate)
          : table(...programme.times.map((t, i) => [t, -programme.voltages[i]] as const));
    const { left: l, right: r } = c.electrodes;
    const back = outcomeOf({ ...changes, electrodes: { left: r, right: l }, supply: { ...c.supply, programme: mirrored } });
    // the same sentence: reasons tell magnitudes
    expect(back.verdict).toEqual(there.verdict);
    expect(back.theory).toEqual(there.theory);
    const close = (a: number | null, b: number | null, sign: 1 | -1): void => {
      if (a === null || b === null) expect(b).toBe(a);
      else expect(Math.abs(b - sign * a)).toBeLessThanOrEqual(1e-6 * Math.abs(a));
    };
    close(there.onset.threshold_time_s, back.onset.threshold_time_s, 1);
    close(there.onset.formative_lag_s, back.onset.formative_lag_s, 1);
    close(there.onset.gap_voltage_V, back.onset.gap_voltage_V, -1);
    close(there.final.gap_voltage_V, back.final.gap_voltage_V, -1);
    close(there.peak.current_A, back.peak.current_A, -1);
    close(there.final.cathode_field_V_per_m, back.final.cathode_field_V_per_m, 1);
    close(there.final.cathode_layer_m, back.final.cathode_layer_m, 1);
    close(there.energy.after_trip_J, back.energy.after_trip_J, 1);
    for (const [i, level] of back.currents.entries()) close(there.currents[i].gap_voltage_V, level.gap_voltage_V, -1);
    expect(back.cautions.map((k) => k.code)).toEqual(there.cautions.map((k) => k.code));
  });

  it('of the largest open-gap voltage sets the theory, and the reason names the electrode that is nearer to breakdown', () => {
    // the left electrode is the weaker cathode: 209 V against 255 V
    const programme = table([0, 0], [1e-4, 200], [2e-4, 200], [4e-4, -220], [6e-4, -220]);
    const { theory, verdict } = outcomeOf({ electrodes: { left, right }, supply: { programme } });
    const other = (180 * 3) / Math.log((12 * 3) / Math.log1p(1 / 0.02));
    expect(theory.static_breakdown_voltage_V).toBeCloseTo(other, 3);
    expect(theory.overvoltage).toBeCloseTo(220 / other - 1, 5);
    expect(verdict.state).toBe('holds');
    expect(verdict.reason).toBe(
      'The highest voltage, 200 V with the left electrode as cathode, stays 4.4 % below the breakdown voltage of 209 V.',
    );
    const swapped = outcomeOf({
      electrodes: { left: right, right: left },
      supply: { programme: table([0, 0], [1e-4, 220], [2e-4, 220], [4e-4, -200], [6e-4, -200]) },
    });
    expect(swapped.verdict.reason).toBe(
      'The highest voltage, 200 V with the right electrode as cathode, stays 4.4 % below the breakdown voltage of 209 V.',
    );
  });
});

describe('a supply', () => {
  it('with a current limit settles the glow at the limit', () => {
    const { final } = outcomeOf({ supply: { currentLimit: 2e-3 } });
    const oracle = steadyAtCurrent(openCase, 2e-3, { accuracy: 1e-5 });
    expect(final.stop).toBe('steady');
    expect(final.current_A / 2e-3).toBeCloseTo(1, 4);
    expect(final.gap_voltage_V / oracle.voltage).toBeCloseTo(1, 2);
  });

  it('with a current limit charges the gap along a straight line, and the open-gap voltage with it', () => {
    const C = 100e-12 + 8.8541878128e-14 * 10;
    const until = 10e-6;
    const { final, theory } = outcomeOf({ supply: { currentLimit: 1e-3 }, observe: { until } });
    expect(final.gap_voltage_V).toBeCloseTo((1e-3 * until) / C, 2);
    expect(theory.overvoltage).toBeCloseTo((1e-3 * until) / C / V_S - 1, 5);
  });

  it('without resistance but with a limit collapses like any other', () => {
    const { onset, final } = outcomeOf({ supply: { seriesResistance: 0, currentLimit: 5e-3 } });
    expect(onset.lag_ends_at).toBe('collapse');
    expect(final.current_A / 5e-3).toBeCloseTo(1, 4);
  });

  it('without resistance or limit is above threshold from the start, and the lag ends with space charge', () => {
    const { onset, final, verdict } = outcomeOf({ supply: { seriesResistance: 0 } });
    expect(onset).toMatchObject({
      threshold_time_s: 0,
      collapse_time_s: null,
      lag_ends_at: 'space-charge',
      gap_voltage_V: expect.closeTo(230.202, 9),
    });
    expect(onset.formative_lag_s).toBe(onset.space_charge_time_s);
    expect(verdict.state).toBe('breaks-down');
    // the glow at a fixed voltage, on the abnormal branch
    const oracle = steadyAtVoltage(openCase, 230.202, [1e-2, 5e-2], { accuracy: 1e-5 });
    expect(final.current_A / oracle.current).toBeCloseTo(1, 1);
    expect(Math.abs(final.current_A / oracle.current - 1)).toBeLessThan(0.01);
  });

  it('that finds the gap charged above threshold starts the lag at 0', () => {
    const charged = outcomeOf({ supply: { initialGapVoltage: openCase.supplyVoltage } });
    const stepped = outcomeOf();
    expect(charged.onset.threshold_time_s).toBe(0);
    // what is missing is the time of charging up
    expect(charged.onset.formative_lag_s ?? 0).toBeLessThan(stepped.onset.formative_lag_s ?? 0);
    expect((charged.onset.formative_lag_s ?? 0) / (stepped.onset.formative_lag_s ?? 0)).toBeCloseTo(1, 2);
    expect(charged.final.gap_voltage_V / stepped.final.gap_voltage_V).toBeCloseTo(1, 4);
  });

  it('that is off leaves the charge that the gap holds to decide', () => {
    const { theory, onset, energy, final } = outcomeOf({
      supply: { programme: step(0), initialGapVoltage: -230.202, seriesResistance: 1e9 },
    });
    expect(theory.overvoltage).toBeCloseTo(0.1, 4);
    expect(onset.gap_voltage_V).toBeLessThan(-200);
    const C = 100e-12 + 8.8541878128e-14 * 10;
    // all but what leaks through 1 Gohm in some 100 µs comes from the capacitance
    expect(energy.gap_J / (0.5 * C * (230.202 ** 2 - final.gap_voltage_V ** 2))).toBeCloseTo(1, 2);
  });

  it('with starting electrons alone breaks a gap down above threshold and not below', () => {
    const seed = { cathodeCurrent: 0, electrons: 100 };
    const above = outcomeOf({ seed });
    expect(above.verdict.state).toBe('breaks-down');
    expect(above.verdict.self_sustaining).toBe(true);
    // fewer electrons, later
    const fewer = outcomeOf({ seed: { cathodeCurrent: 0, electrons: 1 } });
    const delay = (fewer.onset.formative_lag_s ?? 0) - (above.onset.formative_lag_s ?? 0);
    expect(delay).toBeCloseTo(Math.log(100) / (above.onset.growth_rate_per_s ?? 1), 6);
    expect(outcomeOf({ seed, supply: { programme: step(0.98 * V_S) } }).verdict.state).toBe('holds');
  });

  it('with so many starting electrons that they distort the field below threshold does not count as broken down', () => {
    const { verdict, onset } = outcomeOf({
      seed: { cathodeCurrent: 0, electrons: 1e9 },
      supply: { programme: step(150), seriesResistance: 0 },
    });
    expect(onset.space_charge_time_s).not.toBeNull();
    expect(verdict.state).toBe('holds');
  });
});
