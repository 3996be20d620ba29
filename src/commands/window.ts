import { statSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { ResultFileError } from '../results/errors.ts';
import type { WindowFile } from '../results/window-read.ts';
import { runWindow, type WindowEnd, type WindowRequest } from '../scan/window-session.ts';
import { HistoryFailure } from '../search/window/index.ts';
import type { WindowSettings } from '../study.ts';
import { printable, printableJson } from '../units/printable.ts';
import { effectiveText, type LoadedCase, loadCase } from './case-source.ts';
import type { WindowOptions } from './cli.ts';
import { coefficientsUsed } from './coefficients.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { fileFailure } from './file-failure.ts';
import { progressLine } from './progress.ts';
import { listenForStop, type StopRequest } from './signals.ts';
import type { Terminal } from './terminal.ts';
import { windowProgressText } from './window-progress.ts';
import { checkWindowCsvTarget, writeWindowCsv } from './window-table.ts';
import { windowText } from './window-text.ts';

/** Follows the pressure history of a case: when the gap breaks down, what it holds, when turn-on is safe.
 *  @returns the exit code
 *  @throws Failure when the case is wrong, a file cannot be read or written, or it was interrupted */
export async function window(path: string, options: WindowOptions, terminal: Terminal): Promise<number> {
  const loaded = loadCase(path, options.set);
  if (loaded.window === null) throw withoutHistory(path);
  const stop = listenForStop();
  try {
    if (options.csv !== undefined) checkWindowCsvTarget(options.csv);
    const end = await follow(requestOf(path, loaded, loaded.window, options), options, stop, terminal);
    if (end.kind === 'interrupted') throw interruption(end, stop);
    return conclude(end.file, end.computed, options, terminal);
  } catch (thrown) {
    if (thrown instanceof ResultFileError) throw fileFailure(thrown);
    if (thrown instanceof HistoryFailure) throw withoutPressure(path, thrown);
    throw thrown;
  } finally {
    stop.release();
  }
}

function requestOf(path: string, loaded: LoadedCase, settings: WindowSettings, options: WindowOptions): WindowRequest {
  return {
    case: loaded.case,
    window: settings,
    defaults: defaultsOf(loaded),
    path: options.output ?? defaultOutput(path),
    restart: options.restart ?? false,
    ...(options.workers === undefined ? {} : { workers: options.workers }),
    texts: {
      caseText: effectiveText(loaded, options.set),
      coefficientsJson: JSON.stringify(coefficientsUsed(loaded.case)),
      tablesJson: JSON.stringify(loaded.tables),
    },
  };
}

/** Entries left to the program that play a part here: the gas's own temperature does only where the history gives none. */
function defaultsOf({ defaults }: LoadedCase): string[] {
  const paths = defaults.map(({ path }) => path).filter((path) => !path.startsWith('scan.'));
  return paths.includes('history.temperature') ? paths : paths.filter((path) => path !== 'gas.temperature');
}

/** `bay.yaml` → `bay.window.h5`, beside it. */
function defaultOutput(path: string): string {
  return join(dirname(path), `${basename(path).replace(/\.ya?ml$/i, '')}.window.h5`);
}

async function follow(request: WindowRequest, options: WindowOptions, stop: StopRequest, terminal: Terminal): Promise<WindowEnd> {
  const line = options.quiet ? null : progressLine(terminal, windowProgressText);
  try {
    return await runWindow(request, { stop: stop.signal, ...(line === null ? {} : { progress: line.show }) });
  } finally {
    line?.end();
  }
}

/** Shows a complete window. Instants without an answer come before an expectation, as in a run. */
function conclude(file: WindowFile, computed: number, options: WindowOptions, terminal: Terminal): number {
  const { outcome } = file;
  if (options.csv !== undefined) writeWindowCsv(outcome, options.csv);
  if (options.json) terminal.out(printableJson(outcome));
  else if (!options.quiet) {
    const written = { path: file.path, bytes: statSync(file.path).size, computed, csv: options.csv ?? null };
    terminal.out(windowText(outcome, written, terminal));
  }
  const { failures } = outcome.numerics;
  for (const reason of new Set(failures)) terminal.err(`gapwake: a simulation could not be completed: ${printable(reason)}\n`);
  const met = expectationMet(file, options, terminal);
  if (failures.length > 0) return EXIT.failed;
  return met ? EXIT.done : EXIT.unexpected;
}

/** `holds`: no window of breakdown; `breaks-down`: at least one. Said even where nothing else is printed. */
function expectationMet({ outcome }: WindowFile, { expect }: WindowOptions, terminal: Terminal): boolean {
  if (expect === undefined) return true;
  const broken = outcome.windows.filter(({ state }) => state === 'breaks-down').length;
  if (broken > 0 === (expect === 'breaks-down')) return true;
  const found =
    broken === 0 ? 'there is no window of breakdown' : `there ${broken === 1 ? 'is a window' : `are ${broken} windows`} of breakdown`;
  terminal.err(`gapwake: expected ${expect}; ${found}\n`);
  return false;
}

function interruption({ done, journalPath }: Extract<WindowEnd, { kind: 'interrupted' }>, stop: StopRequest): Failure {
  const saved = `${done} answers are finished and kept in ${printable(journalPath)}`;
  return new Failure(
    stop.exitCode ?? EXIT.interrupted,
    [`gapwake: interrupted: ${saved}. The same command goes on from there; --restart starts anew.`],
    [problemWithoutPlace('interrupted', 'signal', 'the end of the window', saved)],
  );
}

function withoutHistory(path: string): Failure {
  return new Failure(
    EXIT.wrongInput,
    [`${printable(path)}: the case has no history: the pressure to follow stands under the key \`history\``],
    [problemWithoutPlace('missing-key', path, 'a section `history` with the pressure in time', 'none')],
  );
}

function withoutPressure(path: string, { message }: HistoryFailure): Failure {
  return new Failure(
    EXIT.failed,
    [`gapwake: the pressure could not be followed: ${printable(message)}`],
    [problemWithoutPlace('simulation-failed', path, 'a pressure that can be followed to its end', message)],
  );
}
