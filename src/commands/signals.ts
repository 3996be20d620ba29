import { EXIT } from './exit-codes.ts';

/** The wish to stop a long command: Ctrl-C or a termination request. */
export interface StopRequest {
  /** the exit code that the signal asks for; null while there was none */
  readonly exitCode: number | null;
  /** aborted by the first signal, at once */
  readonly signal: AbortSignal;
  /** Gives the signals back to the system. */
  release(): void;
}

const CODES: Readonly<Partial<Record<NodeJS.Signals, number>>> = { SIGINT: EXIT.interrupted, SIGTERM: EXIT.terminated };

/** One key press can arrive twice, from the terminal and from the program that started this one [ms]. */
const SAME_REQUEST = 150;

/** Notes the first signal and then steps aside, so that a second one ends the process at once. Call {@link StopRequest.release} at the end.
 *
 *  The note is taken only while the event loop runs: a long computation must yield to it. */
export function listenForStop(): StopRequest {
  let exitCode: number | null = null;
  const wish = new AbortController();
  let sameRequest: NodeJS.Timeout | undefined;
  const stopListening = (): void => {
    for (const signal of Object.keys(CODES)) process.off(signal, note);
  };
  const note = (signal: NodeJS.Signals): void => {
    if (exitCode !== null) return;
    exitCode = CODES[signal] ?? EXIT.interrupted;
    wish.abort();
    sameRequest = setTimeout(stopListening, SAME_REQUEST).unref();
  };
  for (const signal of Object.keys(CODES)) process.on(signal, note);
  return {
    get exitCode() {
      return exitCode;
    },
    signal: wish.signal,
    release: () => {
      clearTimeout(sameRequest);
      stopListening();
    },
  };
}
