import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { search } from '../../src/search/index.ts';
import { seriesResistance } from '../../src/search/series-resistance.ts';
import { simulateNow } from '../../src/simulate.ts';
import { openCaseWith, table, V_S } from '../onset/set-up.ts';
import { type Script, scripted, type Told } from './scripted.ts';

/** Fired by a pulse of 300 V, then held at 200 V, below V_s = 209 V and above what a glow needs. */
const fired = (parallelCapacitance: number): Case =>
  openCaseWith({
    supply: { parallelCapacitance, programme: table([0, 0], [1e-6, 300], [1e-4, 300], [1.1e-4, 200]) },
    observe: { until: 2e-3 },
  });
const settings = fired(0);

const RANGE = { from: 1e3, to: 1e6, tolerance: 0.02 };
const byResistance = (tell: (resistance: number, settings: Case) => Told | 'fails'): Script =>
  scripted((c) => c.supply.seriesResistance, tell);
const stands: Told = { state: 'breaks-down', stop: 'steady', selfSustaining: true };
const dies: Told = { state: 'breaks-down', stop: 'died-out' };

describe('series resistance', () => {
  it('is the least above which nothing ends self-sustained, swept to 100 times the range', () => {
    const script = byResistance((R) => (R < 4.7e4 ? stands : dies));
    const found = seriesResistance(settings, RANGE, script.simulate);
    expect(found).toMatchObject({ what: 'series-resistance', state: 'found', unit: 'ohm', theory: null, note: null });
    expect(found.value).toBe(found.upper);
    expect(found.value).toBeGreaterThanOrEqual(4.7e4);
    expect(found.lower).toBeLessThan(4.7e4);
    expect((found.upper ?? 0) / (found.lower ?? 1)).toBeLessThanOrEqual(1.02);
    expect(Math.max(...script.asked.map((a) => a.value))).toBe(100 * RANGE.to);
    expect(found.runs).toBe(script.asked.length);
  });

  it('is searched for by `search`', () => {
    const find = { what: 'series-resistance', ...RANGE } as const;
    expect(search(settings, find, byResistance((R) => (R < 4.7e4 ? stands : dies)).simulate).state).toBe('found');
  });

  it('passes over a quiet stretch above which a discharge stands again within 100 times', () => {
    const script = byResistance((R) => (R < 5e3 || (R > 5e4 && R < 3e5) ? stands : dies));
    const found = seriesResistance(settings, RANGE, script.simulate);
    expect(found.state).toBe('found');
    expect(found.value).toBeGreaterThanOrEqual(3e5);
    expect(found.value).toBeLessThan(3.1e5);
    expect(found.changes.map((c) => c.above)).toEqual(['holds', 'breaks-down', 'holds']);
  });

  it('does not look further than 100 times', () => {
    const found = seriesResistance(settings, RANGE, byResistance((R) => (R < 5e3 || R > 2e7 ? stands : dies)).simulate);
    expect(found.state).toBe('found');
    expect(found.value).toBeLessThan(5.2e3);
    expect(found.changes.length).toBe(2);
  });

  it('knows when all are quiet, none is, or none is for long enough', () => {
    expect(seriesResistance(settings, RANGE, byResistance(() => dies).simulate)).toMatchObject({
      state: 'none-breaks-down',
      upper: 1e3,
      value: null,
    });
    expect(seriesResistance(settings, RANGE, byResistance(() => stands).simulate)).toMatchObject({
      state: 'none-holds',
      lower: 1e6,
      value: null,
    });
    const brief = seriesResistance(settings, RANGE, byResistance((R) => (R > 2e5 && R < 9e5 ? dies : stands)).simulate);
    expect(brief.state).toBe('none-holds');
    expect(brief.note).toContain('100 times');
  });

  it('gives the lowest of the range where that is quiet, and names what comes beyond its reach', () => {
    const found = seriesResistance(settings, RANGE, byResistance((R) => (R > 2e5 ? stands : dies)).simulate);
    expect(found).toMatchObject({ state: 'found', value: 1e3, lower: null, upper: 1e3 });
    expect(found.note).toContain('ohm');
  });

  describe('ends self-sustained', () => {
    const stateOf = (told: Told | 'fails', c: Case = settings): string => {
      // quiet from 10 kΩ on but for what is told between 20 and 200 kΩ
      const found = seriesResistance(c, RANGE, byResistance((R) => (R < 1e4 ? stands : R > 2e4 && R < 2e5 ? told : dies)).simulate);
      if (found.state === 'undecided') return found.note ?? '';
      return (found.value ?? 0) > 1.5e5 ? 'self-sustained' : 'quiet';
    };

    it('when the discharge does at the end, or repeats under a supply that stays', () => {
      expect(stateOf({ state: 'breaks-down', stop: 'until', selfSustaining: true })).toBe('self-sustained');
      expect(stateOf({ state: 'breaks-down', stop: 'until', period: 1e-5 })).toBe('self-sustained');
      expect(stateOf({ state: 'undecided', stop: 'until', selfSustaining: true })).toBe('self-sustained');
    });

    it('when it left the range of the model as an arc would', () => {
      expect(stateOf({ state: 'breaks-down', stop: 'model-limit' })).toBe('self-sustained');
    });

    it('when it has fired and the supply lifts the gap above V_s again', () => {
      const above = openCaseWith({ supply: { parallelCapacitance: 0 }, observe: { until: 2e-3 } });
      expect(stateOf({ state: 'breaks-down', stop: 'until', finalVoltage: 0.5 * V_S }, above)).toBe('self-sustained');
    });

    it('not when it fired and died out, nor when it held', () => {
      expect(stateOf(dies)).toBe('quiet');
      expect(stateOf({ state: 'breaks-down', stop: 'steady', selfSustaining: false })).toBe('quiet');
      expect(stateOf({ state: 'holds', stop: 'steady' })).toBe('quiet');
    });

    it('not for a voltage that repeats because the supply does', () => {
      const train = openCaseWith({
        supply: {
          parallelCapacitance: 0,
          programme: table(...Array.from({ length: 401 }, (_, i): [number, number] => [i * 5e-6, i % 2 === 0 ? 0 : 200])),
        },
        observe: { until: 2e-3 },
      });
      expect(stateOf({ state: 'breaks-down', stop: 'died-out', period: 1e-5 }, train)).toBe('quiet');
    });

    it('undecided while the discharge still decays, the gap still charges, or a run failed', () => {
      expect(stateOf({ state: 'breaks-down', stop: 'until', finalVoltage: 200 })).toContain('before the discharge has died out or settled');
      expect(stateOf('fails')).toContain('the run failed');
      // 0.2 µF: 2 ms are a tenth of the charging time behind 100 kΩ
      expect(stateOf({ state: 'holds' }, fired(2e-7))).toContain('full voltage');
    });
  });

  it('that keeps a glow from standing is found by simulation, and pulses above it count', { timeout: 120_000 }, () => {
    const ends: { R: number; stands: boolean; pulses: boolean }[] = [];
    const found = seriesResistance(fired(50e-12), { from: 1e4, to: 1e5, tolerance: 0.05 }, (c) => {
      const outcome = simulateNow(c);
      ends.push({ R: c.supply.seriesResistance, stands: outcome.verdict.self_sustaining, pulses: outcome.oscillation !== null });
      return outcome;
    });
    expect(found.state).toBe('found');
    const below = ends.filter((e) => e.R <= (found.lower ?? 0));
    expect(below.every((e) => e.stands || e.pulses)).toBe(true);
    // a glow stands up to 31.6 kΩ; above that its voltage swings until it can no longer start again
    expect(below.some((e) => e.pulses)).toBe(true);
    expect(ends.filter((e) => e.R >= (found.upper ?? 0)).every((e) => !e.stands && !e.pulses)).toBe(true);
  });
});
