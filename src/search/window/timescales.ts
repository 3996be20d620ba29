import type { Case } from '../../case.ts';
import { prospects } from '../../theory/predict.ts';
import { alongPath, atDensity, programmeEnds } from './instant-case.ts';
import { type Threshold, timeToBreakdown } from './threshold.ts';
import type { Instant, Track } from './track.ts';
import { type JudgedInstant, windowsOf } from './windows.ts';

/** Where discharges are not fast against what changes around them. */
export interface Timescales {
  /** [s], of the instant or the start of the window */
  readonly time: number;
  /** what the discharge takes [s]: programme, transit of the ions and lag */
  readonly discharge: number;
  /** in what time density or voltage change by a factor e, or how long the window lasts [s] */
  readonly surroundings: number;
  /** what is too fast */
  readonly of: 'pressure' | 'voltage' | 'window';
}

/** Overvoltage at which the lag is taken near the hold-off voltage. */
const OVERVOLTAGE = 1.01;
/** Change of the surroundings, in ln, that a discharge may meet while it forms: as much as the overvoltage. */
const CHANGE = 0.01;
/** Lags that a window of breakdown must last for its gap to be sure to break down in it. */
const LAGS_OF_WINDOW = 10;
/** Instants, and windows, that are checked at most. */
const MOST_LOOKS = 200;
/** Stretches of the schedule shorter than this share of the duration are flanks: the case's own programme describes those. */
const FLANK = 5e-3;

/** Checks that each instant may be taken as a gap at rest: in the time in which a discharge forms 1 % above threshold the density and the voltage must
 *  change by less than 1 %, and a window of breakdown must last ten lags. @returns the worst violation; null where there is none */
export function timescalesOf(
  settings: Case,
  track: Track,
  instants: readonly JudgedInstant[],
  thresholdAt: (instant: Instant) => Threshold | null,
): Timescales | null {
  let worst: Timescales | null = null;
  let violation = 1;
  const report = (found: Timescales, ratio: number): void => {
    if (!(ratio > violation)) return;
    violation = ratio;
    worst = found;
  };
  const bad = instants.filter(({ judgement: { state } }) => state === 'breaks-down' || state === 'marginal');
  for (const { time } of some(bad)) {
    const instant = track.at(time);
    const threshold = thresholdAt(instant);
    if (threshold === null) continue;
    const discharge = formation(settings, instant, threshold, OVERVOLTAGE * threshold.voltage);
    for (const of of ['pressure', 'voltage'] as const) {
      const rate = of === 'pressure' ? densityRate(track, time) : voltageRate(track, time);
      report({ time, discharge, surroundings: 1 / rate, of }, (discharge * rate) / CHANGE);
    }
  }
  const broken = windowsOf(instants).filter(({ state }) => state === 'breaks-down');
  for (const { from, to } of some(broken.sort((a, b) => a.to - a.from - (b.to - b.from)))) {
    const lags = instants
      .filter(({ time, holdOff }) => time >= from && time <= to && holdOff !== null)
      .flatMap(({ time, supply, lag, judgement }) => {
        if (judgement.state !== 'breaks-down') return [];
        const instant = track.at(time);
        const threshold = thresholdAt(instant);
        return threshold === null
          ? []
          : [lag ?? formation(settings, instant, threshold, Math.max(Math.abs(supply), OVERVOLTAGE * threshold.voltage))];
      });
    const shortest = lags.reduce((a, b) => Math.min(a, b), Infinity);
    if (Number.isFinite(shortest))
      report({ time: from, discharge: shortest, surroundings: to - from, of: 'window' }, (LAGS_OF_WINDOW * shortest) / (to - from));
  }
  return worst;
}

/** At most {@link MOST_LOOKS} of many, evenly, the first one among them. */
function some<T>(all: readonly T[]): T[] {
  const every = Math.ceil(all.length / MOST_LOOKS);
  return all.filter((_, i) => i % every === 0);
}

/** What a discharge takes to form at a voltage [s]: the programme up to its end, a transit of the ions and the lag by theory. */
function formation(settings: Case, { density, polarity }: Instant, { path }: Threshold, voltage: number): number {
  const gap = alongPath(atDensity(settings, density), path, polarity);
  const driven = polarity * voltage;
  return programmeEnds(gap) + Math.max(prospects(gap, driven).ionTransit ?? 0, timeToBreakdown(gap, driven) ?? 0);
}

/** |d ln N/dt| around a time [1/s]. */
function densityRate(track: Track, time: number): number {
  const [before, after] = neighbours(track.times, time);
  return Math.abs(Math.log(track.at(after).density / track.at(before).density)) / (after - before);
}

/** |d ln |V|/dt| around a time [1/s], 0 on flanks. */
function voltageRate(track: Track, time: number): number {
  const corners = [0, ...track.voltageCorners, track.duration];
  const at = corners.findIndex((t, i) => time >= t && (time < corners[i + 1] || corners[i + 1] === undefined));
  const [from, to] = [corners[Math.min(at, corners.length - 2)], corners[Math.min(at + 1, corners.length - 1)]];
  if (to - from < FLANK * track.duration) return 0;
  const slope = (track.at(to).voltage - track.at(from).voltage) / (to - from);
  const here = Math.abs(track.at(time).voltage);
  return here > 0 ? Math.abs(slope) / here : 0;
}

function neighbours(times: Float64Array, time: number): [before: number, after: number] {
  let [low, high] = [0, times.length - 1];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle] <= time) low = middle;
    else high = middle;
  }
  return [times[low], times[high]];
}
