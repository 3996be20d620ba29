import { describe, expect, it } from 'vitest';
import { ArcWatch } from '../../src/onset/arc-watch.ts';
import { CurrentsWatch } from '../../src/onset/currents-watch.ts';
import { OpenGapWatch } from '../../src/onset/open-gap-watch.ts';
import { Recent } from '../../src/onset/recent.ts';
import { play, type Script, sceneOf, through, upTo } from './script.ts';
import { outcomeOf, step, table, V_S } from './set-up.ts';

describe('the current levels', () => {
  const watch = (script: Script, levels: readonly number[]): CurrentsWatch => {
    const currents = new CurrentsWatch(sceneOf().system, levels);
    play(script, [currents]);
    return currents;
  };

  it('are located within their step, whatever the sign, with the voltage there', () => {
    for (const sign of [1, -1]) {
      const { levels } = watch({ times: [0, 4], voltage: (t) => 100 - t, current: (t) => sign * 1e-9 * 10 ** t }, [1e-8, 1e-7, 1e-4]);
      expect(levels[0].time).toBeCloseTo(1, 9);
      expect(levels[0].voltage).toBeCloseTo(99, 9);
      expect(levels[1].time).toBeCloseTo(2, 9);
      expect(levels[2]).toEqual({ level: 1e-4, time: null, voltage: null });
    }
  });

  it('count once, at the first crossing, and at 0 where the run starts above', () => {
    const { levels } = watch({ times: upTo(8), voltage: () => 100, current: through([0, 2], [2, 6], [4, 0], [8, 12]) }, [1, 4, 10]);
    expect(levels.map((l) => l.time)).toEqual([0, expect.closeTo(1, 9), expect.closeTo(7 + 1 / 3, 9)]);
  });

  it('are found even if the current exceeds them inside one step only', () => {
    const parabola = (t: number): number => 10 - (t - 2) ** 2;
    const { levels, peak } = watch({ times: [0, 1.5, 2.4, 4], voltage: () => 100, current: parabola }, [9.9]);
    expect(peak.current).toBeCloseTo(10, 5);
    expect(peak.time).toBeCloseTo(2, 2);
    expect(levels[0].time).toBeCloseTo(2 - Math.sqrt(0.1), 6);
  });
});

describe('the peak current', () => {
  it('is found inside a step, with its sign', () => {
    const currents = new CurrentsWatch(sceneOf().system, []);
    play({ times: [0, 1, 1.6, 2.5, 4], voltage: (t) => 100 - 10 * t, current: (t) => -(10 - (t - 2) ** 2) }, [currents]);
    expect(currents.peak.current).toBeCloseTo(-10, 5);
    expect(currents.peak.time).toBeCloseTo(2, 2);
    expect(currents.peak.voltage).toBeCloseTo(80, 1);
  });

  it('is the largest of several', () => {
    const currents = new CurrentsWatch(sceneOf().system, []);
    play({ times: upTo(12, 0.5), voltage: () => 1, current: (t) => Math.sin((Math.PI * t) / 2) ** 2 * (1 + 0.1 * t) }, [currents]);
    expect(currents.peak.time).toBeCloseTo(11, 1);
  });
});

describe('the range of arcs', () => {
  // 1e3 A/m², 1 A, 1e6 W/m² for a millisecond
  const watch = (script: Script, area = 1e-4, until = 1): ArcWatch => {
    const arc = new ArcWatch(sceneOf({ area, until }));
    play(script, [arc]);
    return arc;
  };
  const times = upTo(3e-3, 1e-4);

  it('is entered at 0.1 A/cm² and at 1 A, at once', () => {
    expect(watch({ times: [0, 1e-6], voltage: () => 10, current: () => 0.11 }).risk).toBe(true);
    expect(watch({ times: [0, 1e-6], voltage: () => 10, current: () => 0.09 }).risk).toBe(false);
    expect(watch({ times: [0, 1e-6], voltage: () => 10, current: () => -1.1 }, 1).risk).toBe(true);
    expect(watch({ times: [0, 1e-6], voltage: () => 10, current: () => 0.9 }, 1).risk).toBe(false);
  });

  it('is entered at 100 W/cm² only where that lasts a millisecond', () => {
    const hot = { voltage: (): number => -2000, current: (): number => -0.06 };
    expect(watch({ ...hot, times: upTo(0.9e-3, 1e-4) }).risk).toBe(false);
    expect(watch({ ...hot, times }).risk).toBe(true);
    expect(watch({ ...hot, current: () => -0.04, times }).risk).toBe(false);
    const interrupted = { ...hot, current: (t: number): number => (Math.abs(t - 0.8e-3) < 1e-5 ? 0 : -0.06), times: upTo(1.7e-3, 1e-4) };
    expect(watch(interrupted).risk).toBe(false);
  });

  it('ends the model after a millisecond in it, not at a short peak', () => {
    expect(watch({ times, voltage: () => 10, current: () => 0.2 }).over).toBe(true);
    expect(watch({ times, voltage: () => 10, current: (t) => (t < 0.5e-3 ? 0.2 : 0) }).over).toBe(false);
  });

  it('asks for a look when the millisecond is over', () => {
    const arc = watch({ times: [0, 1e-4], voltage: () => 10, current: () => 0.2 });
    expect(arc.nextTime(1e-4)).toBeCloseTo(1e-3, 12);
    expect(watch({ times: [0, 1e-4], voltage: () => 10 }).nextTime(1e-4)).toBe(Infinity);
  });

  it('counts a steady power that a run ending early would have kept up', () => {
    const hot = { times: upTo(0.5e-3, 1e-4), voltage: (): number => 2000, current: (): number => 0.06 };
    const long = watch(hot);
    long.lookAhead();
    expect(long.risk).toBe(true);
    const short = watch(hot, 1e-4, 0.9e-3);
    short.lookAhead();
    expect(short.risk).toBe(false);
  });

  it('takes down the largest current', () => {
    expect(watch({ times, voltage: () => 10, current: (t) => -t }).largestCurrent).toBeCloseTo(3e-3, 12);
  });
});

describe('the open-gap voltage', () => {
  it('is taken where it turns inside a step', () => {
    // behind RC = 1 s the gap peaks where it meets the falling supply
    const open = (t: number): number => 10 * t * Math.exp(1 - t);
    const context = sceneOf();
    const supply = (t: number): number => open(t) + 10 * (1 - t) * Math.exp(1 - t);
    Object.assign(context.system.circuit, { supplyVoltage: supply });
    const watch = new OpenGapWatch(context);
    play({ times: [0, 0.4, 1.7, 3], voltage: () => 5, open }, [watch]);
    expect(watch.largest).toBeCloseTo(10, 9);
    expect(watch.largestGapVoltage).toBe(5);
  });

  it('of a run is that of the supply, found wherever it is highest', () => {
    // a triangle behind RC = 1 ms: from the apex on the gap charges until it meets the supply
    const [R, C, top, rise] = [1e7, 100.88541878128e-12, 150, 2e-3];
    const tau = R * C;
    const slope = top / rise;
    const atApex = slope * (rise - tau * (1 - Math.exp(-rise / tau)));
    // V_open = V_supply + slope τ + c e^{−s/τ} after the apex; it turns where both are equal
    const c = atApex - top - slope * tau;
    const s = tau * Math.log(-c / (slope * tau));
    const { theory } = outcomeOf({
      supply: { programme: table([0, 0], [rise, top], [2 * rise, 0]), seriesResistance: R },
      observe: { until: 10e-3 },
    });
    expect(theory.overvoltage).toBeCloseTo((top - slope * s) / V_S - 1, 9);
  });

  it('is at its largest where it had either sign', () => {
    const programme = table([0, 0], [1e-4, 150], [2e-4, -190], [3e-4, 100]);
    const { theory } = outcomeOf({ supply: { programme, seriesResistance: 0 } });
    expect(theory.overvoltage).toBeCloseTo(190 / V_S - 1, 9);
  });

  it('of a gap that holds a charge counts from the start', () => {
    const { theory } = outcomeOf({ supply: { programme: step(50), initialGapVoltage: -180 } });
    expect(theory.overvoltage).toBeCloseTo(180 / V_S - 1, 9);
  });
});

describe('growth over the last stretch of time', () => {
  it('compares with the past by interpolating its logarithm', () => {
    const recent = new Recent(1);
    expect(recent.growth()).toBeNull();
    for (const t of [0, 0.7, 1.4]) recent.add(t, -Math.exp(3 * t));
    // the past lies at 0.4, between two entries
    expect(recent.growth()).toBeCloseTo(3, 12);
  });

  it('is unknown before the span has passed and where there was nothing', () => {
    const recent = new Recent(1);
    recent.add(0, 0);
    recent.add(0.9, 1);
    expect(recent.growth()).toBeNull();
    recent.add(1, 1);
    expect(recent.growth()).toBeNull();
    recent.add(2.5, 0);
    expect(recent.growth()).toBe(-Infinity);
  });

  it('stays exact over a long run', () => {
    const recent = new Recent(1);
    for (let k = 0; k <= 20_000; k++) recent.add(0.01 * k, Math.exp(-0.02 * k));
    expect(recent.growth()).toBeCloseTo(-2, 9);
  });
});
