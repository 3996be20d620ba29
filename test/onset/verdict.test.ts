import { describe, expect, it } from 'vitest';
import { openCase } from '../oracles/open-case.ts';
import { voltageCurrentCurve } from '../oracles/steady-gap.ts';
import { codes, ION_TRANSIT, openCaseWith, outcomeOf, ramp, step, table, V_S } from './set-up.ts';

describe('breaks-down', () => {
  it('a step of 10 % overvoltage leads to a steady glow', () => {
    const { verdict, final } = outcomeOf();
    expect(verdict).toMatchObject({ state: 'breaks-down', regime: 'glow', self_sustaining: true });
    expect(verdict.reason).toMatch(
      /^The gap broke down 81\.\d µs after threshold, when its voltage fell through 207 V; a steady discharge carries 4\.38 mA at 186 V\.$/,
    );
    expect(final.stop).toBe('steady');
  });

  it('a Townsend discharge behind 1 Gohm breaks down with regime dark', () => {
    const { verdict, final, onset, theory } = outcomeOf({
      seed: { cathodeCurrent: 1e-13 },
      supply: { seriesResistance: 1e9, parallelCapacitance: 0 },
      observe: { until: 1 },
    });
    expect(verdict).toMatchObject({ state: 'breaks-down', regime: 'dark', self_sustaining: true });
    expect(verdict.reason).toBe('A self-sustaining Townsend discharge of 20.9 nA settles at 209 V, too weak to change the field.');
    expect(final.stop).toBe('steady');
    expect(onset.space_charge_time_s).toBeNull();
    // the discharge holds the gap at V_s, and the resistance sets the current
    expect(final.gap_voltage_V / V_S).toBeCloseTo(1, 4);
    expect(final.current_A).toBeCloseTo((openCase.supplyVoltage - V_S) / 1e9, 11);
    expect(theory.overvoltage).toBeCloseTo(0.1, 4);
  });

  it('the same discharge counts as driven by its seed where that makes up more than 1 % of the emission', () => {
    const townsend = (cathodeCurrent: number): ReturnType<typeof outcomeOf> =>
      outcomeOf({ seed: { cathodeCurrent }, supply: { seriesResistance: 1e9, parallelCapacitance: 0 }, observe: { until: 1 } });
    // the current is (V_0 − V_s)/R, the emission γ/(1 + γ) of it
    const emission = (((openCase.supplyVoltage - V_S) / 1e9) * 0.07) / 1.07;
    expect(townsend(0.007 * emission).verdict).toMatchObject({ state: 'breaks-down', self_sustaining: true });
    expect(townsend(0.013 * emission).verdict).toMatchObject({ state: 'holds', self_sustaining: false });
  });

  it('the same discharge counts as self-sustaining although it settles far below its first overshoot', () => {
    const { verdict, peak, final } = outcomeOf({
      seed: { cathodeCurrent: 1e-14 },
      supply: { seriesResistance: 1e8, parallelCapacitance: 1e-11 },
      observe: { until: 5 },
    });
    expect(peak.current_A).toBeGreaterThan(5 * final.current_A);
    expect(verdict).toMatchObject({ state: 'breaks-down', regime: 'dark', self_sustaining: true });
  });

  it('a discharge behind a high resistance breaks down too where a slow ramp never lifts the gap above V_s', () => {
    // the open gap goes to 1.9 V_s; the seed makes up 1e-5 of the emission
    const { verdict, onset, theory } = outcomeOf({
      seed: { cathodeCurrent: 1e-12 },
      supply: { programme: ramp(400, 100), seriesResistance: 1e8, parallelCapacitance: 1e-11 },
      observe: { until: 5 },
    });
    expect(onset.threshold_time_s).toBeNull();
    expect(theory.overvoltage).toBeGreaterThan(0.9);
    expect(verdict).toMatchObject({ state: 'breaks-down', regime: 'dark', self_sustaining: true });
  });

  // seed [A]; the currents [A] between which the fold of V + R I lies
  it.each([
    [1e-7, 1e-5, 3e-5],
    [1e-6, 3e-5, 8e-5],
  ])('a seed of %d A breaks the open case down from where its steady curve folds, below V_s', (seed, from, to) => {
    // oracle: V + R I along the steady states of this seed has a maximum, beyond which only the glow is left
    const currents = Array.from({ length: 11 }, (_, k) => from * (to / from) ** (k / 10));
    const curve = voltageCurrentCurve({ ...openCase, seedCurrent: seed }, currents, { accuracy: 1e-5 });
    const fold = Math.max(...curve.map((state) => state.voltage + openCase.seriesResistance * state.current));
    // 0.98 and 0.93 V_s (physics of the project)
    expect(fold / V_S).toBeCloseTo(seed === 1e-7 ? 0.98 : 0.93, 2);
    const at = (share: number): ReturnType<typeof outcomeOf> =>
      outcomeOf({ seed: { cathodeCurrent: seed }, supply: { programme: step(share * fold) }, observe: { until: 20e-3 } });

    const above = at(1.002);
    expect(above.verdict.state).toBe('breaks-down');
    expect(above.verdict.reason).toMatch(/although the feedback never reached 1: so strong a seed lowers the threshold/);
    expect(above.onset).toMatchObject({ threshold_time_s: null, formative_lag_s: null, lag_ends_at: null, gap_voltage_V: null });
    expect(above.onset.space_charge_time_s).toBeGreaterThan(0);
    expect(codes(above.cautions)).toContain('seed-lowers-threshold');

    const below = at(0.998);
    expect(below.verdict.state).toBe('holds');
    expect(below.verdict.self_sustaining).toBe(false);
    expect(codes(below.cautions)).not.toContain('seed-lowers-threshold');
  });
});

describe('holds', () => {
  it('a voltage below threshold holds, and the reason says by how much', () => {
    const { verdict, final } = outcomeOf({ supply: { programme: step(0.9 * V_S) } });
    expect(verdict).toEqual({
      state: 'holds',
      regime: 'dark',
      self_sustaining: false,
      reason: 'The highest voltage, 188 V, stays 10 % below the breakdown voltage of 209 V.',
    });
    expect(final.stop).toBe('steady');
  });

  it('0.999 V_s holds although the seed makes up less than 1 % of the emission', () => {
    const { verdict, final, theory } = outcomeOf({
      seed: { cathodeCurrent: 1e-15 },
      supply: { programme: step(0.999 * V_S) },
      observe: { until: 0.1 },
    });
    expect(1 - theory.feedback).toBeLessThan(0.01);
    // I/I_0 of the closed form: the seed's share is what it should be, and the run reached it
    expect(final.current_A / 1e-15 / (theory.steady_amplification ?? 0)).toBeCloseTo(1, 1);
    expect(verdict.state).toBe('holds');
    expect(verdict.self_sustaining).toBe(false);
  });

  const pulse = table([0, 0], [1e-6, 230], [40e-6, 230], [41e-6, 0]);

  it('a pulse shorter than the lag holds, and the reason says for how long and by how many decades the current rose', () => {
    const { verdict, onset, peak } = outcomeOf({ supply: { programme: pulse } });
    expect(verdict.state).toBe('holds');
    const said =
      /^The voltage was above threshold for (\S+) µs, in which the current rose by (\S+) decades: space charge did not set in\.$/.exec(
        verdict.reason,
      );
    // the supply ramps in 1 µs behind a time constant of 1 µs: V = 230 (1 − e^{−s/τ}) about s after the start
    expect(Number(said?.[1])).toBeCloseTo(37.5, 0);
    // what the current grew to, over what it was at threshold: the seed and its first avalanches
    expect(Number(said?.[2])).toBeCloseTo(Math.log10(peak.current_A / 6.5e-10), 0);
    expect(onset.threshold_time_s).toBeCloseTo(3e-6, 6);
    expect(onset.space_charge_time_s).toBeNull();
    expect(onset.formative_lag_s).toBeNull();
  });

  it('the same pulse breaks down once it lasts longer than the lag', () => {
    const longer = table([0, 0], [1e-6, 230], [100e-6, 230], [101e-6, 0]);
    const { verdict, final } = outcomeOf({ supply: { programme: longer } });
    expect(verdict.state).toBe('breaks-down');
    expect(final.gap_voltage_V).toBeLessThan(1);
  });

  it('a pulse that falls back to just below threshold holds too: what it left behind dies out', () => {
    const { verdict } = outcomeOf({
      seed: { cathodeCurrent: 1e-13 },
      supply: { programme: table([0, 0], [1e-6, 230], [40e-6, 230], [41e-6, 0.999 * V_S]) },
      observe: { until: 20e-3 },
    });
    expect(verdict.state).toBe('holds');
    expect(verdict.self_sustaining).toBe(false);
  });

  it('several pulses are told from one', () => {
    const twice = table([0, 0], [1e-6, 230], [20e-6, 230], [21e-6, 0], [60e-6, 0], [61e-6, 230], [80e-6, 230], [81e-6, 0]);
    const { verdict, onset } = outcomeOf({ supply: { programme: twice } });
    expect(verdict.reason).toMatch(/^The voltage was above threshold for 3\d(\.\d)? µs, in 2 stretches, in one of which the current rose/);
    // the last upward crossing
    expect(onset.threshold_time_s).toBeGreaterThan(61e-6);
  });

  it('a gap that is still charging at the end holds so far, and the reason says that it was still charging', () => {
    const { verdict } = outcomeOf({ supply: { seriesResistance: 1e9 }, observe: { until: 20e-3 } });
    expect(verdict.state).toBe('holds');
    expect(verdict.reason).toMatch(/below the breakdown voltage of 209 V, with the gap still charging at the end\.$/);
  });

  it('a gap that a strong seed loads below threshold holds, and the reason says so', () => {
    const { verdict, onset } = outcomeOf({
      seed: { cathodeCurrent: 1e-9 },
      supply: { programme: step(1.01 * V_S), seriesResistance: 1e9, parallelCapacitance: 0 },
      observe: { until: 50e-3 },
    });
    expect(onset.threshold_time_s).toBeNull();
    expect(verdict.state).toBe('holds');
    expect(verdict.reason).toMatch(
      /^Loaded by the current that the seed draws, the gap saw at most 19\d V of 211 V, below its breakdown voltage of 209 V\.$/,
    );
  });
});

describe('undecided', () => {
  it('a run that ends above threshold says how much time space charge still needs', () => {
    const whole = outcomeOf();
    const reached = whole.onset.space_charge_time_s ?? 0;
    for (const until of [30e-6, 50e-6]) {
      const { verdict } = outcomeOf({ observe: { until } });
      expect(verdict.state).toBe('undecided');
      const said = /space charge needs about (\S+) µs more: extend observe\.until\.$/.exec(verdict.reason);
      expect(Math.abs(Number(said?.[1]) * 1e-6 - (reached - until))).toBeLessThan(0.05 * reached);
    }
  });

  it('a run that ends below threshold while the current still grows says how much time it needs to settle', () => {
    const until = 4 * ION_TRANSIT;
    const { verdict, theory } = outcomeOf({ supply: { programme: step(0.99 * V_S) }, observe: { until } });
    expect(verdict.state).toBe('undecided');
    const said = /^The current still grows at the end, by (\S+) % in an ion transit; to settle it needs about (\S+) (µs|ms) more/.exec(
      verdict.reason,
    );
    const needed = Number(said?.[2]) * (said?.[3] === 'ms' ? 1e-3 : 1e-6);
    // it does settle by then, and it would not have in half the time
    const verdictAfter = (share: number): string =>
      outcomeOf({ supply: { programme: step(0.99 * V_S) }, observe: { until: until + share * needed } }).verdict.state;
    expect(theory.growth_rate_per_s).toBeLessThan(0);
    expect(verdictAfter(1.1)).toBe('holds');
    expect(verdictAfter(0.5)).toBe('undecided');
  });

  it('a gap that holds is undecided where a longer path breaks down', () => {
    // left of the minimum at p d = e ln(1 + 1/γ)/12 = 0.618 Torr cm
    const gap = { spacing: 1.5e-3, longestPath: 1.5e-3, longestPathGiven: false };
    const supply = { programme: step(115) };
    const alone = outcomeOf({ gap, supply });
    expect(alone.verdict.state).toBe('holds');
    const { verdict, theory } = outcomeOf({ gap: { ...gap, longestPath: 6e-3, longestPathGiven: true }, supply });
    expect(verdict.state).toBe('undecided');
    // the minimum, e 180 ln(1 + 1/γ)/12 = 111.2 V, lies on a path of 2.06 mm
    expect(theory.lowest_over_paths_V).toBeCloseTo((Math.E * 180 * Math.log1p(1 / 0.07)) / 12, 1);
    expect(verdict.reason).toBe(
      'The gap itself holds, but a path of 2.06 mm breaks down from 111 V on, and the highest voltage was 115 V.',
    );
    // below what every path stands, it holds, and the margin is that of the weakest path
    const low = outcomeOf({ gap: { ...gap, longestPath: 6e-3, longestPathGiven: true }, supply: { programme: step(100) } });
    expect(low.verdict.state).toBe('holds');
    expect(low.verdict.reason).toMatch(/stays 10\.\d % below the 111 V from which on a path of 2\.06 mm breaks down\.$/);
  });

  it('a discharge that sustains itself without having settled is not called a hold', () => {
    const { verdict } = outcomeOf({
      seed: { cathodeCurrent: 1e-13 },
      supply: { seriesResistance: 1e9, parallelCapacitance: 1e-11 },
      observe: { until: 0.15 },
    });
    expect(verdict.state).toBe('undecided');
    expect(verdict.self_sustaining).toBe(true);
    expect(verdict.reason).toMatch(
      /^A discharge of 2\d(\.\d)? nA sustains itself at the end without having settled: extend observe\.until\.$/,
    );
  });
});

describe('coefficients outside their data', () => {
  const { ionisation, ...others } = openCaseWith().gas.coefficients;
  const reducedField = V_S / (openCase.density * openCase.spacing);
  const gas = { coefficients: { ...others, ionisation: { ...ionisation, range: { from: 0, to: 0.9 * reducedField } } } };

  it('leave a run undecided whose voltage is nearer to V_s than V_s is certain', () => {
    const { verdict, cautions } = outcomeOf({ gas, supply: { programme: step(0.95 * V_S) } });
    expect(verdict.state).toBe('undecided');
    expect(verdict.reason).toBe(
      'E/N at the breakdown voltage lies outside the data of ionisation, and the highest voltage is within 20 % of it.',
    );
    expect(codes(cautions)).toContain('outside-range');
  });

  it('do not matter farther below V_s', () => {
    expect(outcomeOf({ gas, supply: { programme: step(0.75 * V_S) } }).verdict.state).toBe('holds');
  });

  it('do not take back a breakdown', () => {
    expect(outcomeOf({ gas }).verdict.state).toBe('breaks-down');
  });

  it('in the cathode layer alone never change the verdict', () => {
    const wide = { coefficients: { ...others, ionisation: { ...ionisation, range: { from: 0, to: 1.3 * reducedField } } } };
    const { verdict, cautions } = outcomeOf({ gas: wide });
    expect(verdict.state).toBe('breaks-down');
    expect(codes(cautions)).toContain('outside-range');
  });
});
