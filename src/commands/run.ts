import { statSync } from 'node:fs';
import type { Case } from '../case.ts';
import { withDefaults } from '../onset/cautions/index.ts';
import { highestOpenGapVoltage } from '../onset/highest-voltage.ts';
import type { Outcome } from '../onset/outcome.ts';
import { ResultFileError } from '../results/errors.ts';
import { type PreparedRunFile, prepareRunFile, type RunWriter } from '../results/write.ts';
import { type Progress, SimulationFailure, simulate } from '../simulate.ts';
import { prospects } from '../theory/predict.ts';
import { TOWNSEND } from '../units/constants.ts';
import { printable, printableJson } from '../units/printable.ts';
import { VERSION } from '../version.ts';
import { effectiveText, type LoadedCase, loadCase } from './case-source.ts';
import type { RunOptions } from './cli.ts';
import { coefficientsUsed } from './coefficients.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { fileFailure } from './file-failure.ts';
import { type ProgressLine, progressLine, runProgressText } from './progress.ts';
import { type FileWritten, runText } from './run-text.ts';
import { listenForStop, type StopRequest } from './signals.ts';
import type { Terminal } from './terminal.ts';
import { unusedStudies } from './unused.ts';

/** Simulates a case once and says what happened.
 *  @returns the exit code
 *  @throws Failure when the case is wrong, the simulation cannot go on or the result cannot be written */
export async function run(path: string, options: RunOptions, terminal: Terminal): Promise<number> {
  const loaded = loadCase(path, options.set);
  const stop = listenForStop();
  const recording = new Recording(loaded, options.set);
  try {
    // before anything is computed: the path may be no good
    if (options.output !== undefined) await recording.prepare(options.output);
    const { outcome, failure } = await follow(
      path,
      loaded,
      stop,
      recording,
      options.quiet ? null : progressLine(terminal, runProgressText),
    );
    const kept = keep(recording, outcome);
    const problem = failure ?? kept.failure;
    // with --json a problem is the one object on stdout; a person may still want to know what was found
    if (options.json && problem === null) terminal.out(printableJson(outcome));
    if (!options.json && !options.quiet) terminal.out(textOf(loaded, outcome, kept.written, terminal));
    if (problem !== null) throw problem;
    if (stop.exitCode !== null && outcome.final.stop === 'interrupted') return stop.exitCode;
    return expectationMet(outcome, options, terminal) ? EXIT.done : EXIT.unexpected;
  } catch (thrown) {
    throw thrown instanceof ResultFileError ? fileFailure(thrown) : thrown;
  } finally {
    recording.abandon();
    stop.release();
  }
}

/** Simulates, recorded and shown. What was found up to the last good state is worth as much as a whole run. */
async function follow(
  path: string,
  loaded: LoadedCase,
  stop: StopRequest,
  recording: Recording,
  progress: ProgressLine<Progress> | null,
): Promise<{ readonly outcome: Outcome; readonly failure: Failure | null }> {
  try {
    if (loaded.case.electrons !== undefined)
      await (await import('../scan/gap-session.ts')).followAhead(loaded.case, highestOpenGapVoltage(loaded.case), stop.signal);
    const outcome = await simulate(loaded.case, {
      interrupted: () => stop.exitCode !== null,
      progress: (p) => progress?.show(p),
      begin: (layout) => recording.begin(layout),
      snapshot: (snapshot) => recording.snapshot(snapshot),
    });
    return { outcome: withAssumptions(outcome, loaded), failure: null };
  } catch (thrown) {
    if (!(thrown instanceof SimulationFailure)) throw thrown;
    return { outcome: withAssumptions(thrown.outcome, loaded), failure: simulationFailure(path, thrown) };
  } finally {
    progress?.end();
  }
}

/** Adds the caution about the defaults that the case leaves to the program: only who read the case knows them. */
function withAssumptions(outcome: Outcome, { case: settings, defaults }: LoadedCase): Outcome {
  return {
    ...outcome,
    cautions: withDefaults(
      outcome.cautions,
      settings,
      defaults.map(({ path }) => path),
    ),
  };
}

/** Finishes the file; a disk that refuses it does not take the verdict away. */
function keep(recording: Recording, outcome: Outcome): { readonly written: FileWritten | null; readonly failure: Failure | null } {
  try {
    return { written: recording.finish(outcome), failure: null };
  } catch (thrown) {
    if (!(thrown instanceof ResultFileError)) throw thrown;
    return { written: null, failure: fileFailure(thrown) };
  }
}

function textOf(loaded: LoadedCase, outcome: Outcome, written: FileWritten | null, terminal: Terminal): string {
  const settings = loaded.case;
  const voltage = theoryVoltage(settings, outcome);
  return runText({ settings, outcome, voltage, prospects: prospects(settings, voltage), written, unused: unusedStudies(loaded) }, terminal);
}

/** The result file of a run, if one was asked for. */
class Recording {
  readonly #loaded: LoadedCase;
  readonly #overrides: readonly string[];
  #path = '';
  #prepared: PreparedRunFile | null = null;
  #writer: RunWriter | null = null;
  #snapshots = 0;

  constructor(loaded: LoadedCase, overrides: readonly string[]) {
    this.#loaded = loaded;
    this.#overrides = overrides;
  }

  async prepare(path: string): Promise<void> {
    this.#path = path;
    this.#prepared = await prepareRunFile(path);
  }

  begin(layout: Parameters<PreparedRunFile['begin']>[0]): void {
    this.#writer = this.#prepared?.begin(layout) ?? null;
  }

  snapshot(snapshot: Parameters<RunWriter['append']>[0]): void {
    this.#writer?.append(snapshot);
    this.#snapshots++;
  }

  finish(outcome: Outcome): FileWritten | null {
    if (this.#writer === null) return null;
    const { tables, case: settings } = this.#loaded;
    this.#writer.finish({
      title: settings.title,
      version: VERSION,
      caseText: effectiveText(this.#loaded, this.#overrides),
      outcomeJson: JSON.stringify(outcome),
      coefficientsJson: JSON.stringify(coefficientsUsed(settings)),
      tablesJson: JSON.stringify(tables),
    });
    return { path: this.#path, snapshots: this.#snapshots, bytes: statSync(this.#path).size };
  }

  /** Leaves nothing behind unless the file is finished. */
  abandon(): void {
    this.#writer?.abandon();
    this.#prepared?.abandon();
  }
}

/** The voltage at which the theory of an outcome was evaluated [V], with the sign of the discharge. */
function theoryVoltage({ gap, gas }: Case, { theory, peak }: Outcome): number {
  return (peak.gap_voltage_V < 0 ? -1 : 1) * theory.reduced_field_Td * TOWNSEND * gas.density * gap.spacing;
}

/** Says so when the verdict is another one than expected, even where nothing else is printed. */
function expectationMet({ verdict }: Outcome, { expect }: RunOptions, terminal: Terminal): boolean {
  if (expect === undefined || verdict.state === expect) return true;
  terminal.err(`gapwake: expected ${expect}, the verdict is ${verdict.state}\n`);
  return false;
}

function simulationFailure(path: string, error: SimulationFailure): Failure {
  return new Failure(
    EXIT.failed,
    [`gapwake: the simulation could not be completed: ${printable(error.message)}`],
    [problemWithoutPlace('simulation-failed', path, 'a simulation that goes on to its end', error.message)],
  );
}
