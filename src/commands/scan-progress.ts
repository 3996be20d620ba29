import type { ScanProgress } from '../scan/session.ts';

/** `312 done, 1 failed, 687 left   52.1/s   13 s to go`: rate and time by what this session has finished; at most 79 characters. */
export function scanProgressText({ done, failed, total, computed }: ScanProgress, elapsed: number): string {
  const left = total - done;
  const rate = elapsed > 0 ? computed / elapsed : 0;
  const counts = `${done} done, ${failed} failed, ${left} left`;
  if (computed === 0) return counts;
  return `${counts}   ${rateText(rate)}   ${durationText(left / rate)} to go`;
}

function rateText(perSecond: number): string {
  if (perSecond >= 1) return `${Number(perSecond.toPrecision(3))}/s`;
  return `${Number((perSecond * 60).toPrecision(3))}/min`;
}

/** A time for people, in two units at most. @example durationText(4000) // '1 h 7 min' */
export function durationText(seconds: number): string {
  const whole = Math.ceil(seconds);
  if (whole < 60) return `${whole} s`;
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${whole % 60} s`;
  if (whole < 48 * 3600) return `${Math.floor(whole / 3600)} h ${Math.floor((whole % 3600) / 60)} min`;
  return `${Math.floor(whole / 86_400)} d ${Math.floor((whole % 86_400) / 3600)} h`;
}
