import pc from 'picocolors';

type Style = (text: string) => string;

/** Where a command writes, and what that place can show. */
export interface Terminal {
  /** to stdout: what was asked for, and nothing else */
  out(text: string): void;
  /** Resolves when stdout can take more: whoever writes much waits for it, so that it is not all held in memory. */
  drained?(): Promise<void>;
  /** to stderr: problems and progress */
  err(text: string): void;
  /** characters in a line of stdout, at most 80 */
  readonly width: number;
  /** whether a person sees stdout at once, and not a pipe or a file */
  readonly seen: boolean;
  /** whether stderr shows a line that is drawn again and again */
  readonly live: boolean;
  /** characters in a line of stderr; infinite where lines go to a file and are not folded */
  readonly errWidth: number;
  readonly style: { readonly strong: Style; readonly faint: Style; readonly alarm: Style; readonly doubt: Style };
}

const WIDEST = 80;
const NARROWEST = 40;

/** The terminal or pipe that the process was started with. */
export function processTerminal(): Terminal {
  const { stdout, stderr, env } = process;
  const dumb = env.TERM === 'dumb';
  // decided here: the library colours pipes where CI is set
  const forced = env.FORCE_COLOR !== undefined && env.FORCE_COLOR !== '' && env.FORCE_COLOR !== '0';
  const colours = pc.createColors(!env.NO_COLOR && ((stdout.isTTY === true && !dumb) || forced));
  return {
    out: (text) => void stdout.write(text),
    drained: () => {
      if (!stdout.writableNeedDrain) return Promise.resolve();
      return new Promise((resolve) => {
        // closed: nobody reads any more
        const events = ['drain', 'close', 'error'] as const;
        const done = (): void => {
          for (const event of events) stdout.off(event, done);
          resolve();
        };
        for (const event of events) stdout.on(event, done);
      });
    },
    err: (text) => void stderr.write(text),
    width: clamp(stdout.columns),
    seen: stdout.isTTY === true,
    live: stderr.isTTY === true && !dumb,
    errWidth: stderr.isTTY === true ? clamp(stderr.columns) : Number.POSITIVE_INFINITY,
    style: {
      strong: (text) => colours.bold(text),
      faint: (text) => colours.dim(text),
      alarm: (text) => colours.bold(colours.red(text)),
      doubt: (text) => colours.bold(colours.yellow(text)),
    },
  };
}

function clamp(columns: number | undefined): number {
  return columns === undefined || columns === 0 ? WIDEST : Math.min(WIDEST, Math.max(NARROWEST, columns));
}
