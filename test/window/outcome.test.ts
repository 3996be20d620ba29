/** The answer as it is printed and kept. */
import { describe, expect, it } from 'vitest';
import { followWindow } from '../../src/search/window/follow.ts';
import { isSymmetric } from '../../src/search/window/instant-case.ts';
import { type WindowOutcome, windowOutcome } from '../../src/search/window/outcome.ts';
import type { YieldLaw } from '../../src/surfaces/yield-law.ts';
import { analytic, minimum, paschenCase, pressureOf, SPACING, TEMPERATURE } from './paschen.ts';

const spread = { low: 0.005, typical: 0.01, high: 0.02 };
const bottom = minimum(spread.typical).column / SPACING;

async function outcomeWith(law: YieldLaw | null): Promise<WindowOutcome> {
  const settings = paschenCase(spread);
  const { left } = settings.electrodes;
  const surface = law === null ? left : { ...left, ionYield: { ...left.ionYield, law } };
  const changed = { ...settings, electrodes: { left: surface, right: surface } };
  const rows = { times: [0, 100], values: [pressureOf(20 * bottom), pressureOf(1.5 * bottom)] };
  const history = { duration: 100, pressure: { kind: 'table' as const, rows }, temperature: TEMPERATURE };
  const window = { history, voltage: 300, margin: 1.5 };
  const answer = await followWindow(changed, window, { evaluate: analytic(spread).evaluate });
  return windowOutcome(changed, window, answer, [], '1.2.3');
}

describe('the outcome of a window', () => {
  it('has every key of the design, and is the same when it has been written and read', async () => {
    const outcome = await outcomeWith(null);
    expect(outcome).toMatchObject({ format: 'gapwake.window/1', version: '1.2.3', duration_s: 100, margin: 1.5 });
    for (const key of ['windows', 'lowest_hold_off', 'earliest_turn_on_s', 'latest_turn_on_s', 'history', 'cautions'])
      expect(Object.keys(outcome)).toContain(key);
    expect(JSON.parse(JSON.stringify(outcome))).toEqual(outcome);
    expect(outcome.windows.map(({ state }) => state)).toContain('breaks-down');
    expect(outcome.worst?.hold_off_V).toBe(outcome.history.find(({ time_s }) => time_s === outcome.worst?.time_s)?.hold_off_V);
  });

  it('names the ends of the yields as electrons per ion, by a law too', async () => {
    const plain = await outcomeWith(null);
    expect([plain.yield_spread?.low.ion_yield, plain.yield_spread?.high.ion_yield]).toEqual([0.005, 0.02]);
    const half = await outcomeWith({ kind: 'constant', value: 0.5 });
    expect([half.yield_spread?.low.ion_yield, half.yield_spread?.high.ion_yield]).toEqual([0.0025, 0.01]);
  });
});

describe('walls', () => {
  it('are alike only where their yields, spreads and laws are', () => {
    const settings = paschenCase(spread);
    const { left } = settings.electrodes;
    const other = (changes: object): boolean =>
      isSymmetric({ ...settings, electrodes: { left, right: { ...left, ionYield: { ...left.ionYield, ...changes } } } });
    expect(other({})).toBe(true);
    expect(other({ typical: 0.011 })).toBe(false);
    expect(other({ high: 0.03 })).toBe(false);
    expect(other({ law: { kind: 'constant', value: 1 } })).toBe(false);
  });
});
