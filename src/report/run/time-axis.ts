import { formatQuantity } from '../../units/index.ts';
import type { Scale, Tick } from '../figure/scale.ts';
import { logTime } from '../log-time.ts';
import type { RunSeries } from './data.ts';

/** The ways to lay out time, which runs over six and more decades in one run. */
export type TimeAxisKind = 'activity' | 'log' | 'even';

export const TIME_AXES: readonly { readonly kind: TimeAxisKind; readonly name: string; readonly explanation: string }[] = [
  {
    kind: 'activity',
    name: 'by activity',
    explanation: 'Time is stretched where current, voltage or the steps of the simulation move fast; labels give the true time.',
  },
  {
    kind: 'log',
    name: 'log from threshold',
    explanation: 'Time after the threshold on a logarithmic axis; everything before it is pressed together at the left.',
  },
  { kind: 'even', name: 'even', explanation: 'Time as it runs.' },
];

/** A time axis of a given length [px]. */
export type TimeScale = (length: number) => Scale;

/** A time axis over a run. */
export function timeScale(kind: TimeAxisKind, run: RunSeries): TimeScale {
  switch (kind) {
    case 'activity':
      return activityScale(run);
    case 'log':
      return logScale(run);
    case 'even':
      return evenScale(run);
  }
}

/** least distance of two labels [px] */
const APART = 74;

/** How much each stretch between snapshots moves: the change of ln |I|, of the gap voltage, and the bare number of snapshots, which are the steps of the
 *  simulation and crowd where something happens. The axis gives each its share of the length. */
const SHARES = { current: 0.4, voltage: 0.3, steps: 0.3 };
/** decades of current below its peak that count */
const DECADES = 13;

function activityScale({ time, scalars }: RunSeries): TimeScale {
  const { conductionCurrent, gapVoltage } = scalars;
  const n = time.length;
  const floor = largest(conductionCurrent) * 10 ** -DECADES;
  const logCurrent = conductionCurrent.map((i) => Math.log(Math.max(Math.abs(i), floor, 1e-300)));
  const changes = (values: Float64Array): Float64Array => values.map((v, i) => (i === 0 ? 0 : Math.abs(v - values[i - 1])));
  const parts: [number, Float64Array][] = [
    [SHARES.current, changes(logCurrent)],
    [SHARES.voltage, changes(gapVoltage)],
    [SHARES.steps, time.map((t, i) => (i === 0 || t === time[i - 1] ? 0 : 1))],
  ];
  const position = new Float64Array(n);
  for (const [share, values] of parts) {
    const whole = values.reduce((sum, v) => sum + v, 0);
    if (whole > 0) for (let i = 0; i < n; i++) position[i] += (share * values[i]) / whole;
  }
  for (let i = 1; i < n; i++) position[i] += position[i - 1];
  const whole = position[n - 1] || 1;
  for (let i = 0; i < n; i++) position[i] /= whole;
  return placed(time, position, 'Time, stretched by activity');
}

/** A little room for what comes before the threshold, and decades of time after it. */
function logScale({ time, events }: RunSeries): TimeScale {
  const threshold = events.find(({ name }) => name === 'threshold')?.time ?? null;
  const title = threshold === null ? 'Time after turn-on, log' : `Time after the threshold at ${formatQuantity(threshold, 's')}, log`;
  return logTime(time, threshold ?? time[0], title);
}

function evenScale({ time }: RunSeries): TimeScale {
  const [first, last] = [time[0], time[time.length - 1]];
  const span = last - first || 1;
  return placed(
    time,
    time.map((t) => (t - first) / span),
    'Time',
  );
}

/** An axis on which the k-th time stands at the k-th position, rising, linear in between. */
function placed(time: Float64Array, position: Float64Array, title: string): TimeScale {
  const between = (from: Float64Array, to: Float64Array, value: number): number => {
    const last = from.length - 1;
    if (last < 1 || value <= from[0]) return to[0];
    if (value >= from[last]) return to[last];
    let [low, high] = [0, last];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (from[middle] <= value) low = middle;
      else high = middle;
    }
    const width = from[high] - from[low];
    return width > 0 ? to[low] + ((value - from[low]) / width) * (to[high] - to[low]) : to[low];
  };
  const at = (t: number): number => (t < time[0] || t > time[time.length - 1] ? Number.NaN : between(time, position, t));
  const from = (share: number): number => between(position, time, share);
  return (length) => ({ at, from, ticks: roundTimes(at, from, length), title });
}

/** About every {@link APART} pixels the roundest time nearby. */
function roundTimes(at: (t: number) => number, from: (share: number) => number, length: number): Tick[] {
  const count = Math.max(3, Math.floor(length / APART));
  const ticks: Tick[] = [];
  let lastEnd = Number.NEGATIVE_INFINITY;
  for (let k = 0; k <= count; k++) {
    const middle = k / count;
    const reach = k === 0 || k === count ? 0 : 0.36 / count;
    const [low, high] = [from(middle - reach), from(middle + reach)];
    const value = k === count ? { value: high, digits: 3 } : roundest(low, high);
    const label = formatQuantity(value.value, 's', value.digits);
    const centre = at(value.value) * length;
    const half = 3.7 * label.length + 5;
    const [start, end] = k === 0 ? [centre, centre + 2 * half] : k === count ? [centre - 2 * half, centre] : [centre - half, centre + half];
    // the last one stands; one that it would cover gives way
    if (k === count) while (ticks.length > 0 && ticks[ticks.length - 1].at * length + half > start) ticks.pop();
    else if (start < lastEnd) continue;
    lastEnd = end;
    ticks.push({ at: at(value.value), label });
  }
  return ticks;
}

/** The number with the fewest digits from `low` to `high`. */
export function roundest(low: number, high: number): { readonly value: number; readonly digits: number } {
  if (low <= 0 && high >= 0) return { value: 0, digits: 1 };
  const middle = (low + high) / 2;
  for (let digits = 1; digits <= 6; digits++) {
    const value = Number(middle.toPrecision(digits));
    if (value >= low && value <= high) return { value, digits };
    // fives are rounder than other digits
    const unit = 10 ** (Math.floor(Math.log10(Math.abs(middle))) - digits + 1);
    const half = Number((Math.round(middle / unit / 0.5) * 0.5 * unit).toPrecision(digits + 1));
    if (half >= low && half <= high) return { value: half, digits: digits + 1 };
  }
  return { value: Number(middle.toPrecision(4)), digits: 4 };
}

function largest(values: Float64Array): number {
  return values.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
}
