import { describe, expect, it } from 'vitest';
import type { TripSettings } from '../../src/supply/settings.ts';
import { type Changes, outcomeOf, step, V_S } from './set-up.ts';

const trip = (changes: Partial<TripSettings> = {}): TripSettings => ({
  current: 1e-3,
  delay: 1e-6,
  senses: 'gap',
  action: 'open',
  ...changes,
});
const withTrip = (changes: Partial<TripSettings>, supply: Changes['supply'] = {}, observe: Changes['observe'] = {}): Changes => ({
  supply: { trip: trip(changes), ...supply },
  observe: { currents: [1e-3], ...observe },
});

const GAP_CAPACITANCE = (8.8541878128e-12 * 1e-3) / 0.01;

describe('a trip', () => {
  it('acts its delay after the gap first carries its current', () => {
    for (const delay of [1e-6, 5e-6]) {
      const { verdict, currents } = outcomeOf(withTrip({ delay }));
      const acted = /the trip acted at (\S+) µs/.exec(verdict.reason)?.[1];
      expect(Number(acted) * 1e-6).toBeCloseTo((currents[0].time_s ?? 0) + delay, 7);
    }
  });

  it('that opens leaves the gap to the stored charge, which goes on feeding it', () => {
    const { energy, final, verdict } = outcomeOf(withTrip({}));
    expect(verdict.state).toBe('breaks-down');
    expect(verdict.self_sustaining).toBe(false);
    expect(verdict.reason).toMatch(/; the trip acted at \S+ µs; the discharge died out by \d+ µs\.$/);
    expect(final.stop).toBe('tripped-out');
    // what goes into the gap after the trip comes from the capacitances: ½ C (V_trip² − V_end²)
    const C = 100e-12 + GAP_CAPACITANCE;
    const voltageAtTrip = Math.sqrt((2 * (energy.after_trip_J ?? 0)) / C + final.gap_voltage_V ** 2);
    expect(voltageAtTrip).toBeGreaterThan(final.gap_voltage_V);
    expect(voltageAtTrip).toBeLessThan(230.202);
    expect(energy.after_trip_J).toBeGreaterThan(1e-6);
  });

  it('limits the energy to a little without stored charge', () => {
    const stored = outcomeOf(withTrip({}));
    const bare = outcomeOf(withTrip({}, { parallelCapacitance: 0 }));
    expect(bare.energy.after_trip_J).toBeGreaterThan(0);
    expect(bare.energy.after_trip_J).toBeLessThan(0.05 * (stored.energy.after_trip_J ?? 0));
  });

  it('that drives the supply to zero discharges the capacitance through the resistance as well', () => {
    const open = outcomeOf(withTrip({}));
    const zero = outcomeOf(withTrip({ action: 'zero' }, {}, { until: 400e-6 }));
    expect(Math.abs(zero.final.gap_voltage_V)).toBeLessThan(1e-3);
    expect(zero.energy.after_trip_J).toBeLessThan(0.5 * (open.energy.after_trip_J ?? 0));
    expect(zero.energy.gap_J).toBeLessThan(open.energy.gap_J);
    // until the trip they are the same
    expect(zero.energy.gap_J - (zero.energy.after_trip_J ?? 0)).toBeCloseTo(open.energy.gap_J - (open.energy.after_trip_J ?? 0), 12);
  });

  it('latches: one excursion is enough, though the current has fallen below the level long before the trip acts', () => {
    const relaxing: Changes['supply'] = { seriesResistance: 3e6, parallelCapacitance: 1e-9 };
    const { verdict, onset, final, peak } = outcomeOf(withTrip({ delay: 200e-6 }, relaxing, { until: 50e-3 }));
    // the discharge of the capacitance is over in some 50 µs
    expect(peak.current_A).toBeGreaterThan(1e-3);
    expect(verdict.reason).toMatch(/the trip acted at 7\.9\d ms/);
    expect(onset.collapse_time_s).toBeLessThan(7.8e-3);
    expect(final.stop).toBe('tripped-out');
    expect(final.time_s).toBeLessThan(10e-3);
  });

  it('of the supply acts on charging current, and the reason names it', () => {
    // 230 V behind 10 kohm charge with 23 mA at first
    const { verdict, final } = outcomeOf(withTrip({ senses: 'supply', delay: 0.5e-6 }));
    expect(verdict.state).toBe('undecided');
    expect(verdict.reason).toBe('The supply was tripped by charging current at 500 ns, before the gap reached its breakdown voltage.');
    expect(final.stop).toBe('tripped-out');
    // RC charging for 0.5 µs
    const tau = 1e4 * (100e-12 + GAP_CAPACITANCE);
    expect(final.gap_voltage_V).toBeCloseTo(230.202 * (1 - Math.exp(-0.5e-6 / tau)), 1);
  });

  it('of the supply acts at once where the first instant is above its level', () => {
    const { verdict, final, energy } = outcomeOf(withTrip({ senses: 'supply', delay: 0 }));
    expect(verdict.reason).toMatch(/^The supply was tripped by charging current at 0 s/);
    expect(final.gap_voltage_V).toBe(0);
    expect(energy).toEqual({ gap_J: 0, source_J: 0, after_trip_J: 0 });
  });

  it('of the gap does not see the charging current', () => {
    const { verdict } = outcomeOf(withTrip({ senses: 'gap' }));
    expect(verdict.reason).not.toMatch(/charging/);
  });

  it('of the supply on a discharge is no trip by charging current', () => {
    const { verdict } = outcomeOf(withTrip({ senses: 'supply', current: 2e-3 }, { programme: step(230.202, 200e-6) }));
    expect(verdict.state).toBe('breaks-down');
    expect(verdict.reason).toMatch(/the trip acted at/);
  });

  it('before space charge set in leaves open what would have followed', () => {
    const { verdict, onset } = outcomeOf(withTrip({ current: 1e-7, action: 'zero' }, {}, { until: 200e-6 }));
    expect(verdict.state).toBe('undecided');
    expect(verdict.reason).toMatch(
      /^The trip acted at 3\d(\.\d)? µs, after 3\d(\.\d)? µs above threshold and before space charge set in\.$/,
    );
    expect(onset.space_charge_time_s).toBeNull();
    // without stored charge the gap keeps its voltage when the trip opens; the time said is that until the trip
    const bare = outcomeOf(withTrip({ current: 1e-7 }, { parallelCapacitance: 0 }));
    expect(bare.verdict.reason).toMatch(/^The trip acted at 3\d(\.\d)? µs, after 3\d(\.\d)? µs above threshold/);
  });

  it('too early for a breakdown does not prevent one from the stored charge, and the reason says so', () => {
    const { verdict, onset } = outcomeOf(withTrip({ current: 1e-7 }));
    expect(verdict.state).toBe('breaks-down');
    expect(verdict.reason).toMatch(
      /^After the trip at 3\d(\.\d)? µs the charge stored across the gap broke it down 6\d(\.\d)? µs after threshold, when space charge set in at 230 V; /,
    );
    // a collapse counts before a trip only
    expect(onset.collapse_time_s).toBeNull();
    expect(onset.lag_ends_at).toBe('space-charge');
  });

  it('that never acts leaves no energy after it', () => {
    const { energy } = outcomeOf(withTrip({ current: 1 }));
    expect(energy.after_trip_J).toBeNull();
  });

  it('behind R = 0 with zero ends the energy at once', () => {
    const { energy } = outcomeOf(withTrip({ action: 'zero' }, { seriesResistance: 0 }, { until: 200e-6 }));
    expect(energy.after_trip_J).toBe(0);
    expect(energy.gap_J).toBeGreaterThan(1e-6);
  });

  it('that is pending keeps the run from ending as steady', () => {
    const { final } = outcomeOf(withTrip({ delay: 1.5e-3 }));
    expect(final.stop).toBe('tripped-out');
    expect(final.time_s).toBeGreaterThan(1.58e-3);
  });
});

describe('what the open gap would have seen', () => {
  it('follows the trip: opened at half the voltage, it stays there', () => {
    const { theory } = outcomeOf(withTrip({ senses: 'supply', delay: 0.5e-6 }));
    expect(theory.overvoltage).toBeLessThan(90.1 / V_S - 1);
  });
});
