import type { WindowProgress } from '../scan/window-session.ts';

/** `31 of 58 simulated so far   12 s`; how many more there will be is known only when these have been looked at. */
export function windowProgressText({ done, asked }: WindowProgress, elapsed: number): string {
  return `${done} of ${asked} simulated so far   ${elapsed.toFixed(0)} s`;
}
