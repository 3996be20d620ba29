import { describe, expect, it } from 'vitest';
import type { SustainWatch } from '../../src/onset/sustain-watch.ts';
import { SwingGuard } from '../../src/onset/swing-guard.ts';
import { play, type Scene, sceneOf, upTo } from './script.ts';

const DISCHARGE = { distorted: true, selfSustaining: true } as SustainWatch;
const DARK = { distorted: false, selfSustaining: false } as SustainWatch;
const state = new Float64Array(3);

/** A guard over a gap whose steady states have a differential resistance [ohm]. */
function guardOf(resistance: number | null, scene: Scene = {}, sustain = DISCHARGE): SwingGuard {
  const context = sceneOf(scene);
  Object.assign(context.system, { differentialResistance: () => resistance });
  return new SwingGuard(context, sustain);
}

/** times of steps of a tenth of an ion transit */
const short = (from: number, to: number): number[] => upTo(to - from, 0.1).map((t) => from + t);

describe('the guard against swings that hide in long steps', () => {
  it('lets a gap rest whose differential resistance is positive, or that no resistance feeds', () => {
    expect(guardOf(5).allows(0, state, 1)).toBe(true);
    expect(guardOf(-5, { feed: 'ideal' }).allows(0, state, 1)).toBe(true);
  });

  it('looks in short steps before it lets a gap of negative differential resistance rest', () => {
    const guard = guardOf(-5);
    expect(guard.nextTime(0)).toBe(Infinity);
    expect(guard.allows(0, state, 1)).toBe(false);
    expect(guard.nextTime(3)).toBeCloseTo(3.2, 12);
    // 20 ion transits of a current that settles
    play({ times: short(0, 20.5), voltage: () => 80, current: (t) => 1 + 0.01 * Math.exp(-t / 3) }, [guard]);
    expect(guard.nextTime(21)).toBe(Infinity);
    expect(guard.allows(21, state, 1)).toBe(true);
  });

  it('goes on looking while the changes grow', () => {
    const guard = guardOf(-5);
    guard.allows(0, state, 1);
    play({ times: short(0, 20.5), voltage: () => 80, current: (t) => 1 + 1e-6 * Math.exp(t / 4) * Math.sin(t) }, [guard]);
    expect(guard.nextTime(21)).toBeCloseTo(21.2, 12);
    expect(guard.allows(21, state, 1)).toBe(false);
  });

  it('leaves a swing that the step control sees by itself to the step control', () => {
    const guard = guardOf(-5);
    guard.allows(0, state, 1);
    play({ times: short(0, 1), voltage: () => 80, current: (t) => 1 + t }, [guard]);
    expect(guard.nextTime(1)).toBe(Infinity);
  });

  it('looks anew where the current has moved from the one found at rest', () => {
    const guard = guardOf(-5);
    guard.allows(0, state, 1);
    play({ times: short(0, 20.5), voltage: () => 80, current: () => 1 }, [guard]);
    expect(guard.allows(21, state, 1.3)).toBe(true);
    expect(guard.allows(21, state, 1.4)).toBe(false);
  });

  it('begins by itself where steps of a distorted, self-sustained discharge grow long, and nowhere else', () => {
    const script = { times: [0, 0.3, 0.6], voltage: () => 80, current: () => 1 };
    const guard = guardOf(-5);
    play(script, [guard]);
    expect(guard.nextTime(1)).toBeCloseTo(1.2, 12);

    const dark = guardOf(-5, {}, DARK);
    play(script, [dark]);
    expect(dark.nextTime(1)).toBe(Infinity);

    const fine = guardOf(-5);
    play({ ...script, times: [0, 0.15, 0.3] }, [fine]);
    expect(fine.nextTime(1)).toBe(Infinity);
  });
});
