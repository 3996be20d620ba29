import { NO_BREAK } from './layout.ts';

/** Which way a time is rounded: away from what would flatter a gap. */
export type Rounding = 'down' | 'up' | 'nearest';

const MINUTE = 60;
const HOUR = 3600;
const DAY = 86400;

/** A time of a history for people, to three digits or so: `12.4 s`, `97.3 min`, `5 h 32 min`, `12 d 7 h`.
 *  @param seconds  ≥ 0
 *  @example clock(5744.3, 'down') // '95.7 min' */
export function clock(seconds: number, rounding: Rounding = 'nearest'): string {
  if (!(seconds > 0)) return `0${NO_BREAK}s`;
  if (seconds < 2 * MINUTE) {
    const step = 10 ** Math.min(0, Math.floor(Math.log10(seconds)) - 2);
    return `${Number((rounded(seconds / step, rounding) * step).toPrecision(6))}${NO_BREAK}s`;
  }
  if (seconds < 2 * HOUR) return `${Number((rounded(seconds / 6, rounding) / 10).toFixed(1))}${NO_BREAK}min`;
  if (seconds < 2 * DAY) return inTwo(rounded(seconds / MINUTE, rounding), 60, 'h', 'min');
  return inTwo(rounded(seconds / HOUR, rounding), 24, 'd', 'h');
}

function rounded(value: number, rounding: Rounding): number {
  // what differs from a whole number by rounding errors only is that number
  const nearest = Math.round(value);
  if (rounding === 'nearest' || Math.abs(value - nearest) < 1e-6 * Math.max(1, Math.abs(value))) return nearest;
  return rounding === 'down' ? Math.floor(value) : Math.ceil(value);
}

function inTwo(count: number, per: number, large: string, small: string): string {
  const [whole, rest] = [Math.floor(count / per), count % per];
  return rest === 0 ? `${whole}${NO_BREAK}${large}` : `${whole}${NO_BREAK}${large}${NO_BREAK}${rest}${NO_BREAK}${small}`;
}
