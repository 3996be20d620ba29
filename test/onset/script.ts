/** A run without a simulation: voltage, current and field distortion as functions of time, played to observers step by step. */
import type { Instant, Observer, Step } from '../../src/march/march.ts';
import type { RunContext } from '../../src/onset/context.ts';

export interface Script {
  /** ends of the steps [s]; the first is the start of the run */
  readonly times: readonly number[];
  /** gap voltage [V], and that of the open gap (default: the same) */
  readonly voltage: (t: number) => number;
  readonly open?: (t: number) => number;
  /** [A], default 0 */
  readonly current?: (t: number) => number;
  /** field distortion at the cathode, relative to |V|/d; default 0 */
  readonly distortion?: (t: number) => number;
}

export interface Scene {
  /** V_s of either polarity [V]; null for none. q_L is |V|/V_s (0 without) */
  readonly breakdown?: number | null;
  readonly ionTransit?: number;
  readonly feed?: string;
  readonly trip?: { readonly acted: boolean; readonly actsAt: number } | null;
  readonly until?: number;
  readonly seedCurrent?: number;
  readonly nextCorner?: number;
  readonly largestSupply?: number;
  readonly area?: number;
}

const LAYOUT = { voltage: 0, field: 1, cells: 1, size: 3, species: 1, row: 0, first: 3 };

/** What observers see of a run in a gap of 1 m (so that fields and voltages are the same numbers). */
export function sceneOf(scene: Scene = {}): RunContext {
  const breakdown = scene.breakdown === undefined ? 100 : scene.breakdown;
  const context = {
    threshold: { positive: breakdown, negative: breakdown },
    feedback: (V: number): number => (breakdown === null ? 0 : Math.abs(V) / breakdown),
    ionTransit: scene.ionTransit ?? 1,
    settings: {
      gap: { spacing: 1, area: scene.area ?? 1 },
      gas: {},
      seed: { cathodeCurrent: scene.seedCurrent ?? 0, electrons: 0 },
      supply: {
        programme: { kind: 'step', voltage: 80, riseTime: 0 },
        seriesResistance: 0,
        parallelCapacitance: 0,
        currentLimit: null,
        initialGapVoltage: 0,
      },
      observe: { until: scene.until ?? 100, currents: [] },
      numerics: { tolerance: 1e-3 },
    },
    system: {
      layout: LAYOUT,
      grid: { spacing: 1 },
      capacitance: 1,
      circuit: {
        feed: scene.feed ?? 'resistor',
        resistance: 0,
        nextCorner: () => scene.nextCorner ?? Infinity,
        largestSupplyFrom: () => scene.largestSupply ?? 0,
      },
    },
    march: () => ({ trip: scene.trip ?? null }),
  };
  // the few members that observers read, instead of a whole march
  return context as unknown as RunContext;
}

/** Plays the script to observers, in their order. @returns the time at which one of them ended it, or the last */
export function play(script: Script, observers: readonly Observer[]): number {
  const { times, voltage } = script;
  const zero = (): number => 0;
  const { open = voltage, current = zero, distortion = zero } = script;
  const fill = (t: number, y: Float64Array): Float64Array => {
    const V = voltage(t);
    const field = Math.abs(V) * (1 + distortion(t));
    y[0] = V;
    // the field points from anode to cathode: −x where the left wall is the cathode
    y[1] = V >= 0 ? -field : Math.abs(V);
    y[2] = V >= 0 ? -Math.abs(V) : field;
    return y;
  };
  const slope = (t: number): number => (voltage(t + 1e-6) - voltage(t - 1e-6)) / 2e-6;
  const instant = (t: number): Instant => ({
    time: t,
    y: fill(t, new Float64Array(3)),
    current: current(t),
    supplyCurrent: current(t),
    supplyVoltage: open(t),
    voltageRate: slope(t),
    totalCurrent: current(t),
  });
  let start = instant(times[0]);
  for (const time of times) {
    const end = instant(time);
    const from = start;
    const step: Step = {
      start: from,
      end,
      openGapAt: open,
      stateAt: (t, out) => {
        fill(t, out);
      },
      unknownAt: (t, index) => fill(t, new Float64Array(3))[index],
      currentOf: (t) => current(t),
      crossing: (before, _after, g) => {
        let [low, high] = [from.time, end.time];
        const y = new Float64Array(3);
        for (let k = 0; k < 60; k++) {
          const middle = (low + high) / 2;
          if (Math.sign(g(middle, fill(middle, y))) === Math.sign(before)) low = middle;
          else high = middle;
        }
        return high;
      },
    };
    let ends = false;
    for (const o of observers) if (o.look(step)) ends = true;
    if (ends) return time;
    start = end;
  }
  return times[times.length - 1];
}

/** straight lines through points */
export function through(...points: readonly (readonly [t: number, value: number])[]): (t: number) => number {
  return (t) => {
    const i = points.findIndex(([time]) => time >= t);
    if (i < 0) return points[points.length - 1][1];
    if (i === 0) return points[0][1];
    const [[t0, v0], [t1, v1]] = [points[i - 1], points[i]];
    return v0 + ((v1 - v0) * (t - t0)) / (t1 - t0);
  };
}

/** whole numbers from 0 to n, as times of steps */
export const upTo = (n: number, stepSize = 1): number[] => Array.from({ length: Math.round(n / stepSize) + 1 }, (_, k) => k * stepSize);
