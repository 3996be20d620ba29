import { NO_BREAK } from './layout.ts';

/** Times of a long history for people, rounded away from what would flatter the gap. */
export type Rounding = 'down' | 'up' | 'nearest';

const MINUTE = 60;
const HOUR = 3600;
const DAY = 86400;

/** A time of a history as long as `duration`, to about its 0.2 % or better: `12.4 s`, `7.3 min`, `1 h 32 min`, `2 d 7 h`.
 *  @param seconds  ≥ 0
 *  @example clock(5744.3, 10800, 'down') // '1 h 35 min' */
export function clock(seconds: number, duration: number, rounding: Rounding = 'nearest'): string {
  const round = (value: number): number => {
    // what differs from a whole number by rounding only is that number
    const nearest = Math.round(value);
    if (rounding === 'nearest' || Math.abs(value - nearest) < 1e-6) return nearest;
    return rounding === 'down' ? Math.floor(value) : Math.ceil(value);
  };
  if (duration < 3 * MINUTE) {
    const step = 10 ** Math.floor(Math.log10(duration / 500));
    return `${Number((round(seconds / step) * step).toPrecision(6))}${NO_BREAK}s`;
  }
  if (duration < 2 * HOUR) return `${Number((round(seconds / 6) / 10).toFixed(1))}${NO_BREAK}min`;
  if (duration < 3 * DAY) return inTwo(round(seconds / MINUTE), 60, 'h', 'min');
  return inTwo(round(seconds / HOUR), 24, 'd', 'h');
}

function inTwo(count: number, per: number, large: string, small: string): string {
  const [whole, rest] = [Math.floor(count / per), count % per];
  return [whole === 0 ? '' : `${whole}${NO_BREAK}${large}`, rest === 0 && whole > 0 ? '' : `${rest}${NO_BREAK}${small}`]
    .filter((part) => part !== '')
    .join(NO_BREAK);
}
