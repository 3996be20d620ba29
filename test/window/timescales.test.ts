/** Whether each instant may be taken as a gap at rest. */
import { describe, expect, it } from 'vitest';
import { windowCautions } from '../../src/search/window/cautions.ts';
import { followWindow } from '../../src/search/window/follow.ts';
import type { WindowSettings } from '../../src/study.ts';
import { analytic, densityAt, minimum, paschenCase, pressureOf, SPACING, TEMPERATURE } from './paschen.ts';

const one = { low: 0.01, typical: 0.01, high: 0.01 };
const bottom = minimum(one.typical).column / SPACING;

/** the pressure falls exponentially from 30 to 1.2 times that of the minimum; 400 V break down on the way */
async function falling(duration: number, voltage: WindowSettings['voltage'] = 400) {
  const times = Array.from({ length: 401 }, (_, i) => (i / 400) * duration);
  const values = times.map((t) => pressureOf(30 * bottom * (1.2 / 30) ** (t / duration)));
  const history = { duration, pressure: { kind: 'table' as const, rows: { times, values } }, temperature: TEMPERATURE };
  const settings = paschenCase(one);
  const answer = await followWindow(settings, { history, voltage, margin: 1.5 }, { evaluate: analytic(one).evaluate });
  const cautions = windowCautions(settings, answer, []).filter(({ code, text }) => code === 'timescales' && /forms?\b|to form/.test(text));
  return { answer, cautions };
}

describe('time scales', () => {
  it('part where the pressure takes hours, and nothing is said', async () => {
    const { answer, cautions } = await falling(3600);
    expect(answer.timescales).toBeNull();
    expect(cautions).toEqual([]);
    expect(answer.windows.some(({ state }) => state === 'breaks-down')).toBe(true);
  });

  it('meet where the pressure falls within milliseconds: the caution names the time, and the ratio is its number', async () => {
    const { answer, cautions } = await falling(2e-3);
    expect(answer.timescales).not.toBeNull();
    expect(cautions).toHaveLength(1);
    const { discharge, surroundings } = answer.timescales ?? { discharge: 0, surroundings: 1 };
    expect(cautions[0].value).toBe(discharge / surroundings);
    expect(cautions[0].value).toBeGreaterThan(0.01);
  });

  it('meet where a window is shorter than ten lags', async () => {
    // held at rest, and switched on for 50 µs
    const N = densityAt(300, one.typical, 'right');
    const history = {
      duration: 1,
      pressure: { kind: 'table' as const, rows: { times: [0, 1], values: [pressureOf(N), pressureOf(N)] } },
      temperature: TEMPERATURE,
    };
    const voltage = { times: [0, 0.5, 0.5 + 1e-6, 0.5 + 5e-5, 0.5 + 5.1e-5, 1], values: [0, 0, 400, 400, 0, 0] };
    const answer = await followWindow(paschenCase(one), { history, voltage, margin: 1 }, { evaluate: analytic(one).evaluate });
    expect(answer.windows.map(({ state }) => state)).toEqual(['breaks-down']);
    expect(answer.timescales?.of).toBe('window');
    // the evaluator's lag is 30 µs at a third above threshold
    expect(answer.timescales?.discharge).toBeCloseTo(3e-5, 6);
    const longer = { times: [0, 0.5, 0.5 + 1e-6, 0.51, 0.51 + 1e-6, 1], values: [0, 0, 400, 400, 0, 0] };
    const calm = await followWindow(paschenCase(one), { history, voltage: longer, margin: 1 }, { evaluate: analytic(one).evaluate });
    expect(calm.windows.map(({ state }) => state)).toEqual(['breaks-down']);
    expect(calm.timescales).toBeNull();
  });

  it('meet where the voltage creeps past the hold-off voltage faster than the lag allows', async () => {
    const { answer } = await falling(3600, { times: [0, 3600], values: [399, 401] });
    expect(answer.timescales).toBeNull();
    const steep = await falling(0.02, { times: [0, 0.02], values: [1, 600] });
    expect(steep.answer.timescales).not.toBeNull();
  });
});

describe('cautions of a window', () => {
  it('open with that of the clearance, and each code but this one stands once', async () => {
    const { answer } = await falling(3600);
    const codes = windowCautions(paschenCase(one), answer, []).map(({ code }) => code);
    expect(codes[0]).toBe('not-a-clearance');
    expect(new Set(codes).size).toBe(codes.length);
  });

  it('name the defaults that matter', async () => {
    const { answer } = await falling(3600);
    expect(windowCautions(paschenCase(one), answer, ['gas.temperature']).map(({ code }) => code)).toContain('defaults');
  });
});
