import { linear, type Scale } from '../figure/scale.ts';
import { logTime } from '../log-time.ts';

/** Hours of venting and seconds of pumping need different axes. */
export type WindowAxisKind = 'even' | 'log';

export const WINDOW_AXES: readonly { readonly kind: WindowAxisKind; readonly name: string; readonly explanation: string }[] = [
  { kind: 'even', name: 'even', explanation: 'Time as it runs.' },
  {
    kind: 'log',
    name: 'logarithmic',
    explanation: 'Time since the start on a logarithmic axis; the first instants are pressed together at the left.',
  },
];

const UNITS: readonly (readonly [unit: string, seconds: number])[] = [
  ['d', 86400],
  ['h', 3600],
  ['min', 60],
  ['s', 1],
];

export function windowTimeScale(kind: WindowAxisKind, time: readonly number[]): (length: number) => Scale {
  if (kind === 'log') return logTime(Float64Array.from(time), time[0], 'Time since the start, log');
  const [first, last] = [time[0], Math.max(time[time.length - 1], time[0] + 1e-9)];
  const [unit, seconds] = UNITS.find(([, s]) => last > 2.5 * s) ?? ['s', 1];
  return (length) => {
    const scale = linear('Time', unit, first / seconds, last / seconds, { length, apart: 60 }, false);
    return { ...scale, at: (t) => scale.at(t / seconds), from: (share) => scale.from(share) * seconds };
  };
}

/** A time of a history: `12.4 s`, `97.3 min`, `5 h 32 min`, `3 d 4 h`. */
export function clockText(seconds: number): string {
  if (Math.abs(seconds) < 120) return `${Number(seconds.toPrecision(3))} s`;
  if (seconds < 7200) return `${Number((seconds / 60).toFixed(1))} min`;
  const [big, small, per, unit] = seconds < 2 * 86400 ? ['h', 'min', 60, 60] : ['d', 'h', 24, 3600];
  const whole = Math.round(seconds / Number(unit));
  return `${Math.floor(whole / Number(per))} ${big}${whole % Number(per) === 0 ? '' : ` ${whole % Number(per)} ${small}`}`;
}
