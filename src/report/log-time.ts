import { logarithmic, type Scale } from './figure/scale.ts';

/** A logarithmic axis of the time since an origin; what lies before it, and its first instants, are pressed together at the left. */
export function logTime(time: Float64Array, origin: number, title: string): (length: number) => Scale {
  const last = time[time.length - 1];
  const span = last - origin > 0 ? last - origin : 1;
  const first = time.find((t) => t > origin) ?? last;
  const start = Math.min(Math.max(first - origin, span * 1e-7, 1e-15), span / 10);
  const before = origin > time[0] ? 0.14 : 0.04;
  const decades = Math.log10(span / start);
  const at = (t: number): number => {
    const since = t - origin;
    if (since > start) return before + (1 - before) * (Math.log10(since / start) / decades);
    return before * ((t - time[0]) / (origin + start - time[0]));
  };
  const from = (share: number): number =>
    share > before
      ? origin + start * 10 ** (((share - before) / (1 - before)) * decades)
      : time[0] + (share / before) * (origin + start - time[0]);
  return (length) => {
    const after = logarithmic('', 's', start, span, { length: length * (1 - before), apart: 60 });
    return { at, from, ticks: after.ticks.map((tick) => ({ ...tick, at: before + (1 - before) * tick.at })), title };
  };
}
