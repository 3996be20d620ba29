import type { WindowProgress } from '../scan/window-session.ts';
import type { Terminal } from './terminal.ts';

/** Shows how far a window has come: on a terminal one line that is drawn again, elsewhere a plain line a minute. */
export interface WindowProgressLine {
  show(progress: WindowProgress): void;
  /** Removes the line. */
  end(): void;
}

/** [ms] between two drawings; before the first one; between plain lines */
const REDRAW = 100;
const QUIET_START = 300;
const PLAIN = 60_000;

export function windowProgressLine(terminal: Terminal, now: () => number = () => performance.now()): WindowProgressLine {
  const started = now();
  let due = started + (terminal.live ? QUIET_START : PLAIN);
  let drawn = false;
  return {
    show: (progress) => {
      const time = now();
      if (time < due) return;
      due = time + (terminal.live ? REDRAW : PLAIN);
      const line = windowProgressText(progress, (time - started) / 1000);
      if (terminal.live) {
        terminal.err(`\r${[...line].slice(0, terminal.errWidth - 1).join('')}\u001b[K`);
        drawn = true;
      } else terminal.err(`${line}\n`);
    },
    end: () => {
      if (drawn) terminal.err('\r\u001b[K');
      drawn = false;
    },
  };
}

/** `31 of 58 simulated so far   12 s`; how many more there will be is known only when these have been looked at. */
export function windowProgressText({ done, asked }: WindowProgress, elapsed: number): string {
  return `${done} of ${asked} simulated so far   ${elapsed.toFixed(0)} s`;
}
