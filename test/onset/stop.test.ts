import { describe, expect, it } from 'vitest';
import { cellsFor } from '../../src/gap/cells.ts';
import { makeLayout } from '../../src/gap/layout.ts';
import type { GapSystem } from '../../src/march/gap-system.ts';
import type { Instant, Step } from '../../src/march/march.ts';
import type { ArcWatch } from '../../src/onset/arc-watch.ts';
import { LayerWatch } from '../../src/onset/layer-watch.ts';
import type { Outcome } from '../../src/onset/outcome.ts';
import { StopWatch } from '../../src/onset/stop-watch.ts';
import type { SustainWatch } from '../../src/onset/sustain-watch.ts';
import { simulateNow } from '../../src/simulate.ts';
import { play, type Scene, type Script, sceneOf, upTo } from './script.ts';
import { type Changes, openCaseWith, outcomeOf, step, table, V_S } from './set-up.ts';

describe('a run ends', () => {
  it('as steady once nothing changes any more', () => {
    const { final } = outcomeOf();
    expect(final.stop).toBe('steady');
    expect(final.time_s).toBeLessThan(1e-3);
  });

  it('not as steady before ten ion transits and five charging times', () => {
    const slow = outcomeOf({ supply: { programme: step(0.5 * V_S), seriesResistance: 1e7 }, observe: { until: 0.1 } });
    expect(slow.final.stop).toBe('steady');
    expect(slow.final.time_s).toBeGreaterThan(5 * 1e7 * 100.9e-12);
    // to the tolerance of the run
    expect(slow.final.gap_voltage_V / (0.5 * V_S)).toBeCloseTo(1, 3);
  });

  it('as died-out when the charge is gone and nothing can bring the voltage back above V_s', () => {
    const { final, verdict } = outcomeOf({ seed: { cathodeCurrent: 0, electrons: 1000 }, supply: { programme: step(0.7 * V_S) } });
    expect(final.stop).toBe('died-out');
    expect(final.time_s).toBeLessThan(0.5e-3);
    expect(verdict.state).toBe('holds');
  });

  it('as died-out after a discharge that the supply cannot feed', () => {
    const { final, verdict } = outcomeOf({ supply: { programme: step(0), initialGapVoltage: 230.202, seriesResistance: 1e9 } });
    expect(verdict.state).toBe('breaks-down');
    expect(verdict.reason).toMatch(/; the discharge died out by 1\d\d µs\.$/);
    expect(final.stop).toBe('died-out');
    expect(final.gap_voltage_V).toBeGreaterThan(100);
  });

  it('not as died-out while the supply could charge the gap up again', () => {
    const { final } = outcomeOf({ supply: { seriesResistance: 3e6, parallelCapacitance: 1e-9 }, observe: { until: 9e-3 } });
    expect(final.stop).toBe('until');
    expect(final.time_s).toBe(9e-3);
  });

  it('not as died-out before a later pulse', () => {
    const programme = table([0, 0], [1e-6, 230], [20e-6, 230], [21e-6, 0], [1e-3, 0], [1.001e-3, 230]);
    const { final, onset } = outcomeOf({ supply: { programme } });
    expect(onset.collapse_time_s).toBeGreaterThan(1e-3);
    expect(final.time_s).toBeGreaterThan(1e-3);
  });

  it('as tripped-out when that happens after a trip', () => {
    const { final } = outcomeOf({ supply: { trip: { current: 1e-3, delay: 1e-6, senses: 'gap', action: 'open' } } });
    expect(final.stop).toBe('tripped-out');
  });

  it('at its time where none of this is reached', () => {
    const { final } = outcomeOf({ observe: { until: 90e-6 } });
    expect(final).toMatchObject({ stop: 'until', time_s: 90e-6 });
  });

  it('where the model ends, a millisecond after the current has entered the range of arcs for good', () => {
    const { final, verdict, cautions } = outcomeOf({
      gap: { area: 1e-6 },
      supply: { programme: step(800), parallelCapacitance: 0 },
      seed: { cathodeCurrent: 1e-13 },
      observe: { until: 0.1 },
    });
    expect(final.stop).toBe('model-limit');
    expect(verdict).toMatchObject({ state: 'breaks-down', regime: 'arc-risk' });
    expect(verdict.reason).toMatch(/ it carries \S+ mA at \d+ V, in the range of arcs, where the model ends\.$/);
    expect(cautions[1].code).toBe('arc-risk');
    expect(final.current_A / 1e-6).toBeGreaterThan(1e3);
    expect(final.time_s).toBeGreaterThan(1e-3);
    expect(final.time_s).toBeLessThan(1.1e-3);
  });

  it('at once in every respect where nothing is applied, even to a gap that no voltage breaks down', () => {
    const narrow = { spacing: 5e-4, longestPath: 5e-4 };
    for (const gap of [{}, narrow]) {
      const { final, verdict } = outcomeOf({ gap, supply: { programme: step(0) } });
      expect(final.stop).toBe('steady');
      expect(verdict).toEqual({ state: 'holds', regime: 'dark', self_sustaining: false, reason: 'No voltage was applied.' });
    }
  });

  /** interrupts the open case after a time */
  const interruptedAfter = (time: number): Outcome => {
    let late = false;
    return simulateNow(openCaseWith(), {
      snapshot: (s) => {
        late = s.time > time;
      },
      interrupted: () => late,
    });
  };

  it('as interrupted when it is told to, with what was found so far', () => {
    const { final, verdict } = interruptedAfter(20e-6);
    expect(final.stop).toBe('interrupted');
    expect(final.time_s).toBeLessThan(60e-6);
    expect(verdict.state).toBe('undecided');
    expect(verdict.reason).toMatch(/^Interrupted at \S+ µs, before breakdown; nothing can be said of what follows\.$/);
  });

  it('as interrupted after a breakdown without taking it back', () => {
    const { verdict } = interruptedAfter(90e-6);
    expect(verdict.state).toBe('breaks-down');
    expect(verdict.reason).toMatch(/; the run was interrupted at \S+ µs\.$/);
  });
});

/** What must not depend on how long the run was meant to last. */
function told({ verdict, theory, onset, peak, cautions, currents }: Outcome): unknown {
  const rounded = (x: number | null): number | null => (x === null ? null : Number(x.toPrecision(3)));
  return {
    verdict: { ...verdict, reason: verdict.reason.replace(/ by \S+ µs/, '') },
    theory,
    onset: Object.values(onset).map((v) => (typeof v === 'number' ? rounded(v) : v)),
    peak: rounded(peak.current_A),
    cautions: cautions.map((c) => c.code),
    currents,
  };
}

describe('the rules for an early end', () => {
  /** @returns why a run ends whose charge has faded or not, given what its supply may still do */
  const stopOf = (script: Script, scene: Scene, { faded = false, distorted = false, over = false, feedback = 0.5 } = {}): string | null => {
    const context = sceneOf(scene);
    const sustain = { faded, distorted, carriers: 1, feedback } as SustainWatch;
    const watch = new StopWatch(context, sustain, { over } as ArcWatch);
    play(script, [watch]);
    return watch.stop;
  };
  const quiet: Script = { times: upTo(20), voltage: () => 50, current: () => 1e-9 };

  it('know steady, died-out, tripped-out and the end of the model', () => {
    expect(stopOf(quiet, {})).toBe('steady');
    expect(stopOf(quiet, {}, { faded: true })).toBe('died-out');
    expect(stopOf(quiet, { trip: { acted: true, actsAt: Infinity } })).toBe('tripped-out');
    expect(stopOf(quiet, { trip: { acted: true, actsAt: Infinity } }, { faded: true })).toBe('tripped-out');
    expect(stopOf(quiet, {}, { over: true })).toBe('model-limit');
  });

  it('wait for corners of the supply, unless it is disconnected, and for a pending trip', () => {
    expect(stopOf(quiet, { nextCorner: 50 })).toBeNull();
    expect(stopOf(quiet, { nextCorner: 50, feed: 'open' })).toBe('steady');
    expect(stopOf(quiet, { trip: { acted: false, actsAt: 30 } })).toBeNull();
    expect(stopOf(quiet, { trip: { acted: false, actsAt: 30 } }, { faded: true })).toBeNull();
  });

  it('do not call a gap dead that holds, or could be given, more than V_s', () => {
    const faded = { faded: true };
    expect(stopOf({ ...quiet, voltage: (t) => 120 + t }, {}, faded)).toBeNull();
    expect(stopOf({ ...quiet, voltage: (t) => -120 - t }, {}, faded)).toBeNull();
    expect(stopOf({ ...quiet, voltage: (t) => 50 + t }, { largestSupply: 120 }, faded)).toBeNull();
    expect(stopOf({ ...quiet, voltage: (t) => 50 + t }, { largestSupply: 90 }, faded)).toBe('died-out');
  });

  it('do not call a current steady that feedback above 1 lets grow, however slowly, unless space charge holds it', () => {
    const slowly = (rate: number): Script => ({ ...quiet, current: (t) => 1e-9 * Math.exp(rate * t) });
    const above = { feedback: 1 + 2e-4 };
    // q − 1 an ion transit of 1 s; within the tolerance until 21 s
    expect(stopOf(slowly(0.5e-4), { until: 21 }, above)).toBeNull();
    expect(stopOf(slowly(0.5e-4), { until: 21 }, { ...above, distorted: true })).toBe('steady');
    expect(stopOf(slowly(0.5e-4), { until: 21 })).toBe('steady');
    expect(stopOf(slowly(0.1e-4), { until: 21 }, above)).toBe('steady');
  });

  it('let nothing that would change by more than the tolerance until the end pass as steady', () => {
    // 1e-3 until 100: 1e-5 a second at the end of the window
    expect(stopOf({ ...quiet, voltage: (t) => 50 * (1 + 3e-5 * t) }, {})).toBeNull();
    expect(stopOf({ ...quiet, voltage: (t) => 50 * (1 + 0.5e-5 * t) }, {})).toBe('steady');
    expect(stopOf({ ...quiet, current: (t) => 1e-9 * (1 + 3e-5 * t) }, {})).toBeNull();
    expect(stopOf({ ...quiet, times: upTo(9) }, {})).toBeNull();
  });
});

describe('the cells of the cathode layer', () => {
  it('are counted only while a discharge sustains itself and distorts the field', () => {
    const { layout, grid } = { layout: makeLayout(40, 2), grid: cellsFor(openCaseWith().gap, 40, { left: true, right: false }, 2e-3) };
    const y = new Float64Array(layout.size);
    y[layout.voltage] = 200;
    for (let j = 0; j <= 40; j++) y[layout.field + j] = -Math.max(1e5 * (1 - grid.faces[j] / 1e-3), 1e3);
    const at = { time: 0, y } as unknown as Instant;
    const lookWith = (selfSustaining: boolean, distorted: boolean): number | null => {
      const watch = new LayerWatch({ layout, grid } as GapSystem, { selfSustaining, distorted } as SustainWatch);
      watch.look({ start: at, end: at } as Step);
      expect(watch.largestField).toBe(1e5);
      return watch.fewestCells;
    };
    expect(lookWith(true, true)).toBe(Array.from(grid.faces).filter((x) => x > 0 && x <= 1e-3).length);
    expect(lookWith(true, false)).toBeNull();
    expect(lookWith(false, true)).toBeNull();
  });
});

describe('an early end changes nothing', () => {
  const cases: readonly (readonly [string, Changes, readonly [number, number]])[] = [
    ['a glow', {}, [1e-3, 1]],
    ['a hold', { supply: { programme: step(0.9 * V_S) } }, [5e-3, 10]],
    [
      'a hold whose charge dies out while the gap is still charging',
      { seed: { cathodeCurrent: 0, electrons: 100 }, supply: { programme: step(0.9 * V_S), seriesResistance: 1e7 } },
      [60e-3, 1],
    ],
    ['a trip', { supply: { trip: { current: 1e-3, delay: 1e-6, senses: 'gap', action: 'open' } } }, [0.3e-3, 1]],
    ['stored charge', { supply: { programme: step(0), initialGapVoltage: 230.202, seriesResistance: 1e9 } }, [0.3e-3, 1]],
    ['a strong seed', { seed: { cathodeCurrent: 1e-6 }, supply: { programme: step(0.95 * V_S) } }, [2e-3, 1]],
  ];

  it('of a steady power in the range of arcs, which counts as if it had been followed for its millisecond', () => {
    const { left } = openCaseWith().electrodes;
    const weak = { ...left, ionYield: { ...left.ionYield, typical: 1e-3, low: 1e-3, high: 1e-3 } };
    const { final, verdict, cautions } = outcomeOf({
      gap: { area: 1e-5 },
      electrodes: { left: weak, right: weak },
      supply: { programme: step(2800, 200e-6), seriesResistance: 0, parallelCapacitance: 0 },
      observe: { until: 3e-3 },
    });
    // 614 A/m² at 2.8 kV, from 0.15 ms on at the earliest
    expect(final).toMatchObject({ stop: 'steady', time_s: expect.closeTo(0.9e-3, 3) });
    expect(verdict.regime).toBe('arc-risk');
    expect(cautions[1].code).toBe('arc-risk');
  });

  it.each(cases)('of %s', (_name, changes, [short, long]) => {
    const [first, second] = [short, long].map((until) => outcomeOf({ ...changes, observe: { until, currents: [1e-9, 1e-6] } }));
    expect(told(first)).toEqual(told(second));
    // as if the run had gone on: the supply would have charged the gap
    const { voltage } = { voltage: 0.1, ...openCaseWith(changes).supply.programme };
    expect(second.theory.overvoltage).toBeCloseTo(Math.max(voltage, openCaseWith(changes).supply.initialGapVoltage) / V_S - 1, 6);
    // and it did end early
    expect(second.final.time_s).toBeLessThan(long / 2);
  });
});
