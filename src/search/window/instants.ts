import { gravity, type Judgement } from './states.ts';
import { type Instant, SHORTEST, type Track } from './track.ts';

/** What is expected at any instant, from what has been simulated so far. */
export interface View {
  judge(instant: Instant): Judgement;
  /** hold-off voltage [V]; null where the model says nothing */
  holdOff(instant: Instant): number | null;
}

/** Width within which the time of an edge is known, over the duration: inside the 0.5 % that are promised. */
const EDGE = 4e-3;
/** The same over the shorter of the two stretches that it parts. */
const EDGE_OF_STRETCH = 0.2;
/** Relative change of the lowest hold-off voltage that is worth another look. */
const LOWER = 1e-3;
/** Instants of a schedule's corners, and of minima, that are looked at from the start. */
const MOST_CORNERS = 40;
const MOST_MINIMA = 10;
/** How many instants a plain look takes: over time, per unit of ln N and per unit of ln V. */
const OVER_TIME = 12;
const PER_DENSITY = 1.4;
const PER_VOLTAGE = 2.5;
const MOST_EVEN = 40;

/** Instants for a first look at a history: its ends, the corners of the schedule, the minima of the hold-off voltage, and enough in between that neither
 *  density nor hold-off voltage changes much from one to the next [s]. */
export function firstInstants(track: Track, view: View): number[] {
  const { times, duration } = track;
  const levels = Array.from(times, (t) => view.holdOff(track.at(t)));
  const logDensities = Array.from(times, (t) => Math.log(track.at(t).density));
  const walked = new Float64Array(times.length);
  for (let i = 1; i < times.length; i++) {
    const [before, here] = [levels[i - 1], levels[i]];
    let step = (OVER_TIME * (times[i] - times[i - 1])) / duration;
    if (before !== null && here !== null)
      step += PER_DENSITY * Math.abs(logDensities[i] - logDensities[i - 1]) + PER_VOLTAGE * Math.abs(Math.log(here / before));
    walked[i] = walked[i - 1] + step;
  }
  const total = walked[times.length - 1];
  const count = Math.min(MOST_EVEN, Math.ceil(total));
  const even: number[] = [];
  for (let i = 1; i < times.length; i++) if (walked[i] >= ((even.length + 1) * total) / count) even.push(times[i]);

  const minima = Array.from(levels.keys())
    .filter((i) => isMinimum(levels, i))
    .sort((i, j) => (levels[i] ?? 0) - (levels[j] ?? 0));
  return sorted([
    0,
    duration,
    ...even,
    ...thinned(track.voltageCorners, MOST_CORNERS),
    ...minima.slice(0, MOST_MINIMA).map((i) => times[i]),
  ]);
}

/** Instants to look at next [s], none when every edge between states is known well enough, every stretch of a bad state has been looked at where it is worst,
 *  and so has the lowest hold-off voltage.
 *  @param looked  instants looked at so far, rising */
export function nextInstants(track: Track, view: View, looked: readonly number[]): number[] {
  const times = sorted([...track.times, ...looked]);
  const instants = times.map((t) => track.at(t));
  const judgements = instants.map((instant) => view.judge(instant));
  const changes: number[] = [];
  for (let i = 1; i < times.length; i++)
    changesBetween(track, view, times[i - 1], times[i], judgements[i - 1], judgements[i], SHORTEST * track.duration, changes);

  const wanted: number[] = [];
  const borders = [0, ...changes, track.duration];
  for (let k = 1; k + 1 < borders.length; k++) wanted.push(...besides(borders[k - 1], borders[k], borders[k + 1], track.duration, looked));

  const levels = instants.map((instant) => view.holdOff(instant));
  const between = (a: number, b: number): number[] => range(lowerBound(times, a), lowerBound(times, b)).filter((i) => times[i] > a);
  for (let k = 1; k < borders.length; k++) {
    const stretch = between(borders[k - 1], borders[k]);
    const worst = best(stretch, (i) => badness(judgements[i], instants[i], levels[i]));
    if (worst === null || badness(judgements[worst], instants[worst], levels[worst]) === -Infinity) continue;
    const near = 0.05 * (borders[k] - borders[k - 1]);
    if (!isNear(looked, times[worst], near)) wanted.push(times[worst]);
  }

  const lowest = best(range(0, times.length), (i) => -(levels[i] ?? Infinity));
  if (lowest !== null) {
    const known = looked.map((t) => view.holdOff(track.at(t)) ?? Infinity).reduce((a, b) => Math.min(a, b), Infinity);
    if ((levels[lowest] ?? Infinity) < known * (1 - LOWER)) wanted.push(times[lowest]);
  }
  const fresh = new Set(looked);
  return sorted(wanted).filter((t) => !fresh.has(t));
}

/** How far a voltage is above what the gap holds; −∞ where it simply holds or nothing can be said. */
function badness(judgement: Judgement, instant: Instant, level: number | null): number {
  if (judgement.state === 'holds' || level === null || level === 0) return Number.NEGATIVE_INFINITY;
  return Math.abs(instant.voltage) / level;
}

/** Every change of state between two times, as far as halving finds it: appended to `changes`, rising. */
function changesBetween(
  track: Track,
  view: View,
  a: number,
  b: number,
  atA: Judgement,
  atB: Judgement,
  shortest: number,
  changes: number[],
): void {
  if (gravity(atA) === gravity(atB)) return;
  const middle = (a + b) / 2;
  if (b - a <= shortest || middle <= a || middle >= b) {
    changes.push(middle);
    return;
  }
  const there = view.judge(track.at(middle));
  changesBetween(track, view, a, middle, atA, there, shortest, changes);
  changesBetween(track, view, middle, b, there, atB, shortest, changes);
}

/** Instants on either side of a change, where there are none yet that are near enough. */
function besides(before: number, change: number, after: number, duration: number, looked: readonly number[]): number[] {
  const stretch = Math.min(change - before, after - change);
  const reach = Math.max(2 * SHORTEST * duration, Math.min(EDGE * duration, EDGE_OF_STRETCH * stretch) / 2);
  const at = lowerBound(looked, change);
  const wanted: number[] = [];
  if (!(looked[at - 1] >= change - reach)) wanted.push(Math.max(before, change - 0.8 * reach));
  if (!(looked[at] <= change + reach)) wanted.push(Math.min(after, change + 0.8 * reach));
  return wanted;
}

function isMinimum(levels: readonly (number | null)[], i: number): boolean {
  const here = levels[i];
  if (here === null) return false;
  const [before, after] = [levels[i - 1] ?? Infinity, levels[i + 1] ?? Infinity];
  // of a flat stretch its first instant
  return here < before && here <= after;
}

function best(indices: readonly number[], value: (i: number) => number): number | null {
  let found: number | null = null;
  for (const i of indices) if (found === null || value(i) > value(found)) found = i;
  return found;
}

/** first index whose time is not before t */
function lowerBound(times: ArrayLike<number>, t: number): number {
  let [low, high] = [0, times.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle] < t) low = middle + 1;
    else high = middle;
  }
  return low;
}

function isNear(times: readonly number[], t: number, reach: number): boolean {
  const at = lowerBound(times, t);
  return times[at] - t <= reach || t - times[at - 1] <= reach;
}

function thinned(times: readonly number[], most: number): number[] {
  if (times.length <= most) return [...times];
  return Array.from({ length: most }, (_, i) => times[Math.round((i * (times.length - 1)) / (most - 1))]);
}

function range(from: number, to: number): number[] {
  return Array.from({ length: Math.max(0, to - from) }, (_, i) => from + i);
}

function sorted(times: readonly number[]): number[] {
  return Array.from(Float64Array.from(new Set(times)).sort());
}
