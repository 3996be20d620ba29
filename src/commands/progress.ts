import type { Progress } from '../simulate.ts';
import { formatQuantity } from '../units/index.ts';
import type { Terminal } from './terminal.ts';

/** Shows how far something has come: on a terminal a line that is drawn again, elsewhere a plain line a minute. */
export interface ProgressLine<P> {
  show(progress: P): void;
  /** Removes the line. */
  end(): void;
}

/** [ms] between two drawings; before the first one, because most runs end within it; between plain lines */
const REDRAW = 100;
const QUIET_START = 300;
const PLAIN = 60_000;

/** @param text  one line for what there is to show and the time since the line was made [s] */
export function progressLine<P>(
  terminal: Terminal,
  text: (progress: P, elapsed: number) => string,
  now: () => number = () => performance.now(),
): ProgressLine<P> {
  const started = now();
  let due = started + (terminal.live ? QUIET_START : PLAIN);
  let drawn = false;
  return {
    show: (progress) => {
      const time = now();
      if (time < due) return;
      due = time + (terminal.live ? REDRAW : PLAIN);
      const line = text(progress, (time - started) / 1000);
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

/** A run. The parts have fixed widths, so that the line stands still while its numbers change. */
export function runProgressText(progress: Progress, wall: number): string {
  const { time_s, until_s, current_A, gap_voltage_V, growth_per_s, steps } = progress;
  const time = `${formatQuantity(time_s, 's')} of ${formatQuantity(until_s, 's')}`;
  const rate = growth_per_s === null ? '' : `${growth_per_s > 0 ? '+' : ''}${formatQuantity(growth_per_s, '1/s')}`;
  return [
    time.padEnd(18),
    formatQuantity(current_A, 'A').padStart(9),
    formatQuantity(gap_voltage_V, 'V').padStart(8),
    rate.padStart(12),
    `${steps} steps`.padStart(13),
    `${wall.toFixed(0)} s`.padStart(6),
  ].join('  ');
}
