import { statSync } from 'node:fs';
import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';
import { ResultFileError } from '../results/errors.ts';
import { type PreparedRunFile, prepareRunFile, type RunWriter } from '../results/write.ts';
import { SimulationFailure, simulate } from '../simulate.ts';
import { prospects } from '../theory/predict.ts';
import { TOWNSEND } from '../units/constants.ts';
import { VERSION } from '../version.ts';
import { effectiveText, type LoadedCase, loadCase } from './case-source.ts';
import type { RunOptions } from './cli.ts';
import { coefficientsUsed } from './coefficients.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { printable, printableJson } from './printable.ts';
import { progressLine } from './progress.ts';
import { type FileWritten, runText } from './run-text.ts';
import { listenForStop } from './signals.ts';
import type { Terminal } from './terminal.ts';

/** Simulates a case once and says what happened.
 *  @returns the exit code
 *  @throws Failure when the case is wrong, the simulation cannot go on or the result cannot be written */
export async function run(path: string, options: RunOptions, terminal: Terminal): Promise<number> {
  const loaded = loadCase(path, options.set);
  const stop = listenForStop();
  const progress = options.quiet ? null : progressLine(terminal);
  const recording = new Recording(loaded, options.set);
  try {
    // before anything is computed: the path may be no good
    if (options.output !== undefined) await recording.prepare(options.output);
    const outcome = await simulate(loaded.case, {
      interrupted: () => stop.exitCode !== null,
      progress: (p) => progress?.show(p),
      begin: (layout) => recording.begin(layout),
      snapshot: (snapshot) => recording.snapshot(snapshot),
    });
    progress?.end();
    report(outcome, recording.finish(outcome));
    if (stop.exitCode !== null && outcome.final.stop === 'interrupted') return stop.exitCode;
    return expectationMet(outcome, options, terminal) ? EXIT.done : EXIT.unexpected;
  } catch (thrown) {
    progress?.end();
    if (thrown instanceof ResultFileError) throw fileFailure(thrown);
    if (!(thrown instanceof SimulationFailure)) throw thrown;
    // what was found up to the last good state is worth keeping
    const failure = simulationFailure(path, thrown);
    const { outcome } = thrown;
    if (outcome) {
      const written = recording.finish(outcome);
      if (!options.json) report(outcome, written);
    }
    throw failure;
  } finally {
    recording.abandon();
    stop.release();
  }

  function report(outcome: Outcome, written: FileWritten | null): void {
    if (options.json) terminal.out(printableJson(outcome));
    else if (!options.quiet) {
      const settings = loaded.case;
      const voltage = theoryVoltage(settings, outcome);
      terminal.out(runText({ settings, outcome, voltage, prospects: prospects(settings, voltage), written }, terminal));
    }
  }
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

function fileFailure(error: ResultFileError): Failure {
  const { path, code, message } = error;
  return new Failure(
    EXIT.file,
    [`gapwake: ${printable(path)}: ${printable(message)}`],
    [problemWithoutPlace(code, path, 'a place where the result can be written', message)],
  );
}

function simulationFailure(path: string, error: SimulationFailure): Failure {
  return new Failure(
    EXIT.failed,
    [`gapwake: the simulation could not be completed: ${printable(error.message)}`],
    [problemWithoutPlace('simulation-failed', path, 'a simulation that goes on to its end', error.message)],
  );
}
