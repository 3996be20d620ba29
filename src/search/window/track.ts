import type { History } from '../../surroundings/history.ts';
import { fromRows, type Rows } from '../../surroundings/series.ts';
import { BOLTZMANN } from '../../units/constants.ts';
import type { Polarity } from './instant-case.ts';

/** One instant of a history and of the supply's schedule; SI. */
export interface Instant {
  readonly time: number;
  readonly pressure: number;
  readonly temperature: number;
  /** p/(kT) [1/m³] */
  readonly density: number;
  /** of the supply, with its sign [V] */
  readonly voltage: number;
  /** which wall is the cathode; without voltage, which one it is next or was last */
  readonly polarity: Polarity;
}

/** A gap's surroundings and its supply in time. */
export interface Track {
  /** [s] */
  readonly duration: number;
  /** times at which the supply's schedule bends, within the history, rising [s] */
  readonly voltageCorners: readonly number[];
  at(time: number): Instant;
  /** times so dense that the density changes by less than 5 % between neighbours and, up to 20,000 corners, nothing that is given bends in between [s] */
  readonly times: Float64Array;
}

/** Even steps in which a history is looked through before it is refined: each is a fifth of what an edge is located to. */
const STEPS = 1000;
/** Corners of what is given that are all looked at; of more, some. */
const MOST_GIVEN = 20_000;
/** Largest change of ln N between neighbouring times. */
const DENSITY_STEP = 0.05;
/** Shortest time between two instants, over the duration. */
export const SHORTEST = 1e-7;

/** Follows a history and a schedule side by side.
 *  @param voltage  [V], constant or in time
 *  @param symmetric  whether the polarity makes no difference: it is then always 1 */
export function trackOf(history: History, voltage: number | Rows, symmetric: boolean): Track {
  const { duration } = history;
  const schedule = typeof voltage === 'number' ? { at: () => voltage, corners: [] as readonly number[] } : fromRows(voltage);
  const voltageCorners = schedule.corners.filter((t) => t > 0 && t < duration);
  const polarityAt = symmetric ? (): Polarity => 1 : polarityOf(schedule.at, [0, ...voltageCorners, duration]);
  const at = (time: number): Instant => {
    const pressure = history.pressureAt(time);
    const temperature = history.temperatureAt(time);
    return {
      time,
      pressure,
      temperature,
      density: pressure / (BOLTZMANN * temperature),
      voltage: schedule.at(time),
      polarity: polarityAt(time),
    };
  };
  const logDensity = (t: number): number => Math.log(Math.max(at(t).density, Number.MIN_VALUE));
  const corners = telling(Float64Array.from(new Set([...history.corners, ...voltageCorners])).sort(), [
    logDensity,
    (t) => Math.abs(at(t).voltage),
  ]);
  const given = [...Array.from({ length: STEPS + 1 }, (_, i) => (i * duration) / STEPS), ...corners];
  return { duration, voltageCorners, at, times: refined(Float64Array.from(new Set(given)).sort(), logDensity, SHORTEST * duration) };
}

/** Of very many times those at which the quantities are extreme among their neighbours: what a state depends on lies between those extremes. */
function telling(times: Float64Array, quantities: readonly ((t: number) => number)[]): Float64Array {
  if (times.length <= MOST_GIVEN) return times;
  const size = Math.ceil((times.length * quantities.length * 2) / MOST_GIVEN);
  const kept = new Set<number>();
  for (const quantity of quantities) {
    for (let from = 0; from < times.length; from += size) {
      let [low, high] = [from, from];
      let [least, largest] = [Infinity, -Infinity];
      for (let i = from; i < Math.min(from + size, times.length); i++) {
        const value = quantity(times[i]);
        if (value < least) [low, least] = [i, value];
        if (value > largest) [high, largest] = [i, value];
      }
      kept.add(times[low]).add(times[high]);
    }
  }
  return Float64Array.from(kept).sort();
}

/** Halves intervals until the logarithm changes little across each, by its ends and its middle. */
function refined(times: Float64Array, logarithm: (t: number) => number, shortest: number): Float64Array {
  const all: number[] = [times[0]];
  const refine = (a: number, b: number, atA: number, atB: number): void => {
    const middle = (a + b) / 2;
    const atMiddle = logarithm(middle);
    if (b - a <= shortest || (Math.abs(atMiddle - atA) <= DENSITY_STEP / 2 && Math.abs(atB - atMiddle) <= DENSITY_STEP / 2)) {
      all.push(b);
      return;
    }
    refine(a, middle, atA, atMiddle);
    refine(middle, b, atMiddle, atB);
  };
  let before = logarithm(times[0]);
  for (let i = 1; i < times.length; i++) {
    const here = logarithm(times[i]);
    refine(times[i - 1], times[i], before, here);
    before = here;
  }
  return Float64Array.from(all);
}

/** The sign of the voltage; where there is none, that of the next voltage in time, or of the last one.
 *  @param corners  times between which the voltage is linear, rising */
function polarityOf(voltageAt: (t: number) => number, corners: readonly number[]): (t: number) => Polarity {
  const coming = new Float64Array(corners.length);
  for (let i = corners.length - 1; i >= 0; i--) coming[i] = Math.sign(voltageAt(corners[i])) || (coming[i + 1] ?? 0);
  const last = Math.sign(voltageAt(corners.findLast((t) => voltageAt(t) !== 0) ?? 0)) || 1;
  return (time) => {
    const here = Math.sign(voltageAt(time));
    if (here !== 0) return here as Polarity;
    let [low, high] = [-1, corners.length - 1];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (corners[middle] < time) low = middle;
      else high = middle;
    }
    return (coming[high] || last) as Polarity;
  };
}
