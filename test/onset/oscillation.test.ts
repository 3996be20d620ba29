import { describe, expect, it } from 'vitest';
import { oscillationOf } from '../../src/onset/oscillation.ts';
import { SwingWatch } from '../../src/onset/swing-watch.ts';
import { Swings, type Turn } from '../../src/onset/swings.ts';
import { play, sceneOf, upTo } from './script.ts';
import { outcomeOf } from './set-up.ts';

function turnsOf(value: (t: number) => number, end: number, smallest = 1, stepSize = 0.01): readonly Turn[] {
  const swings = new Swings(smallest);
  for (const t of upTo(end, stepSize)) swings.add(t, value(t));
  return swings.turns;
}

describe('the swings of a voltage', () => {
  it('are its maxima and minima by turns', () => {
    const turns = turnsOf((t) => 100 + 10 * Math.sin(2 * Math.PI * t), 2);
    expect(turns.map((t) => [t.kind, Math.round(t.value), Number(t.time.toFixed(2))])).toEqual([
      [1, 110, 0.25],
      [-1, 90, 0.75],
      [1, 110, 1.25],
      [-1, 90, 1.75],
    ]);
  });

  it('leave out wiggles below the smallest that counts', () => {
    const wiggling = (t: number): number => 100 + 10 * Math.sin(2 * Math.PI * t) + 0.3 * Math.sin(60 * Math.PI * t);
    expect(turnsOf(wiggling, 2).length).toBe(4);
    expect(turnsOf(wiggling, 2, 0.1).length).toBeGreaterThan(20);
  });

  it('keep only the last of a long run', () => {
    const turns = turnsOf((t) => Math.sin(2 * Math.PI * t), 200, 0.1);
    expect(turns.length).toBeLessThanOrEqual(64);
    expect(turns[turns.length - 1].time).toBeCloseTo(199.75, 2);
  });

  it('turn inside steps', () => {
    const watch = new SwingWatch(sceneOf().system, 1);
    // steps of 43 degrees
    play({ times: upTo(2, 0.12), voltage: (t) => 100 + 10 * Math.sin(2 * Math.PI * t) }, [watch]);
    const [first, second] = watch.swings.turns;
    expect(first).toEqual({ kind: 1, time: expect.closeTo(0.25, 2), value: expect.closeTo(110, 1) });
    expect(second).toEqual({ kind: -1, time: expect.closeTo(0.75, 2), value: expect.closeTo(90, 1) });
  });
});

describe('an oscillation', () => {
  it('has the period and half the swing of an end that repeats', () => {
    const found = oscillationOf(
      turnsOf((t) => 100 + 10 * Math.sin((2 * Math.PI * t) / 3), 20),
      20,
    );
    expect(found?.period_s).toBeCloseTo(3, 1);
    expect(found?.amplitude_V).toBeCloseTo(10, 1);
  });

  it('is none that dies away, grows, changes its period or has ended', () => {
    expect(
      oscillationOf(
        turnsOf((t) => 100 + 50 * Math.exp(-0.1 * t) * Math.sin(2 * Math.PI * t), 10),
        10,
      ),
    ).toBeNull();
    expect(
      oscillationOf(
        turnsOf((t) => 100 + 5 * Math.exp(0.1 * t) * Math.sin(2 * Math.PI * t), 10),
        10,
      ),
    ).toBeNull();
    expect(
      oscillationOf(
        turnsOf((t) => 100 + 10 * Math.sin(t * t), 10),
        10,
      ),
    ).toBeNull();
    const ended = (t: number): number => (t < 6 ? 100 + 10 * Math.sin(2 * Math.PI * t) : 100);
    expect(oscillationOf(turnsOf(ended, 10), 6)).not.toBeNull();
    expect(oscillationOf(turnsOf(ended, 10), 10)).toBeNull();
  });

  it('is none with fewer than three whole periods', () => {
    expect(
      oscillationOf(
        turnsOf((t) => 100 + 10 * Math.sin(2 * Math.PI * t), 3.2),
        3.2,
      ),
    ).toBeNull();
    expect(oscillationOf([], 1)).toBeNull();
  });

  it('is none of a steady run', () => {
    expect(outcomeOf().oscillation).toBeNull();
  });

  it('is found for a source that cannot feed the glow but charges the capacitance again', () => {
    // 3 Mohm and 1 nF: the glow wants milliamperes, the source gives 15 µA
    const relaxing = { supply: { seriesResistance: 3e6, parallelCapacitance: 1e-9 }, observe: { until: 30e-3 } };
    const { oscillation, verdict, final } = outcomeOf(relaxing);
    expect(final.stop).toBe('until');
    expect(verdict.state).toBe('breaks-down');
    expect(verdict.reason).toMatch(/; it fires again every 4\.7\d ms\.$/);
    // from the lowest voltage V_l the gap charges to its peak V_p in RC ln((V_0 − V_l)/(V_0 − V_p))
    const { period_s: period = 0, amplitude_V: amplitude = 0 } = oscillation ?? {};
    expect(amplitude).toBeGreaterThan(20);
    const finer = outcomeOf({ ...relaxing, numerics: { tolerance: 1e-5 } }).oscillation;
    expect(Math.abs(period / (finer?.period_s ?? 1) - 1)).toBeLessThan(5e-3);
    expect(Math.abs(amplitude / (finer?.amplitude_V ?? 1) - 1)).toBeLessThan(5e-3);
  });
});
