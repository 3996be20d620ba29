import { statSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { ResultFileError } from '../results/errors.ts';
import type { ScanFile } from '../results/scan-read.ts';
import { type Preview, preview } from '../scan/pilot.ts';
import type { Shard } from '../scan/plan.ts';
import { gatherScan, runScan, type ScanEnd, type ScanRequest } from '../scan/session.ts';
import { type Study, studyOf } from '../scan/study.ts';
import { printable, printableJson } from '../units/printable.ts';
import { effectiveText, type LoadedCase, loadCase } from './case-source.ts';
import type { ScanOptions } from './cli.ts';
import { coefficientsUsed } from './coefficients.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { fileFailure } from './file-failure.ts';
import { progressLine } from './progress.ts';
import { scanProgressText } from './scan-progress.ts';
import { checkCsvTarget, printScanJson, writeScanCsv } from './scan-table.ts';
import { planText, scanText } from './scan-text.ts';
import { listenForStop, type StopRequest } from './signals.ts';
import type { Terminal } from './terminal.ts';

/** Computes every point of a case's scan, or what is left of it.
 *  @returns the exit code
 *  @throws Failure when the case or the options are wrong, a file cannot be read or written, or it was interrupted */
export async function scan(path: string, options: ScanOptions, terminal: Terminal): Promise<number> {
  const loaded = loadCase(path, options.set);
  const study = studyOf(loaded, loaded.text, path, options.set);
  if (study === null) throw withoutScan(path);
  const shard = options.shard ?? null;
  if (shard !== null && shard.n > study.plan.count) throw tooManyShards(shard, study.plan.count);
  const stop = listenForStop();
  try {
    if (options.plan) return await showPlan(study, shard, options, stop, terminal);
    if (options.csv !== undefined) checkCsvTarget(options.csv);
    const request = requestOf(path, loaded, study, options);
    const end = await follow(request, options, stop, terminal);
    if (end.kind === 'interrupted') throw interruption(end, stop);
    return await conclude(end.file, end.computed, options, terminal);
  } catch (thrown) {
    throw thrown instanceof ResultFileError ? fileFailure(thrown) : thrown;
  } finally {
    stop.release();
  }
}

function requestOf(path: string, loaded: LoadedCase, study: Study, options: ScanOptions): ScanRequest {
  return {
    study,
    path: options.output ?? defaultOutput(path, options.shard ?? null),
    shard: options.shard ?? null,
    restart: options.restart ?? false,
    ...(options.workers === undefined ? {} : { workers: options.workers }),
    texts: {
      caseText: effectiveText(loaded, options.set),
      coefficientsJson: JSON.stringify(coefficientsUsed(loaded.case)),
      tablesJson: JSON.stringify(loaded.tables),
    },
  };
}

/** `bay.yaml` → `bay.scan.h5`, `bay.scan.shard-3-of-8.h5`, beside it. */
function defaultOutput(path: string, shard: Shard | null): string {
  const name = basename(path).replace(/\.ya?ml$/i, '');
  return join(dirname(path), `${name}.scan${shard === null ? '' : `.shard-${shard.k}-of-${shard.n}`}.h5`);
}

async function follow(request: ScanRequest, options: ScanOptions, stop: StopRequest, terminal: Terminal): Promise<ScanEnd> {
  const line = options.quiet ? null : progressLine(terminal, scanProgressText);
  const watch = { stop: stop.signal, ...(line === null ? {} : { progress: line.show }) };
  try {
    return options.gather === undefined ? await runScan(request, watch) : await gatherScan(request, options.gather, watch);
  } finally {
    line?.end();
  }
}

/** Shows a complete scan. Failed points come before an expectation, as in a run. */
async function conclude(file: ScanFile, computed: number, options: ScanOptions, terminal: Terminal): Promise<number> {
  if (options.csv !== undefined) writeScanCsv(file, options.csv);
  if (options.json) await printScanJson(file, terminal);
  else if (!options.quiet) {
    const bytes = statSync(file.path).size;
    terminal.out(scanText({ file, computed, bytes, csv: options.csv ?? null }, terminal));
  }
  const errors = file.column('error');
  let failed = 0;
  for (let i = 0; i < errors.length; i++) if (errors[i] !== 0) failed++;
  if (failed > 0) terminal.err(`gapwake: ${failed} of ${file.count} points could not be completed; the others are saved\n`);
  const met = expectationMet(file, options, terminal);
  if (failed > 0) return EXIT.failed;
  return met ? EXIT.done : EXIT.unexpected;
}

/** Says so when a point has another verdict than expected, even where nothing else is printed. */
function expectationMet(file: ScanFile, { expect }: ScanOptions, terminal: Terminal): boolean {
  if (expect === undefined) return true;
  const headline = file.headlines.find(({ name }) => name === 'verdict');
  const expected = headline?.kind === 'flag' ? headline.meanings.indexOf(expect) : -1;
  const verdicts = file.column('verdict');
  let others = 0;
  for (let i = 0; i < verdicts.length; i++) if (verdicts[i] !== expected) others++;
  if (others > 0) terminal.err(`gapwake: expected ${expect} at every point; ${others} of ${file.count} differ\n`);
  return others === 0;
}

async function showPlan(study: Study, shard: Shard | null, options: ScanOptions, stop: StopRequest, terminal: Terminal): Promise<number> {
  const { workers } = options;
  const plan = await preview(study, shard, { stop: stop.signal, ...(workers === undefined ? {} : { workers }) });
  if (stop.exitCode !== null) {
    throw new Failure(stop.exitCode, ['gapwake: interrupted; nothing was written'], [interruptedProblem('the end of the pilot')]);
  }
  if (options.json) terminal.out(printableJson(planJson(plan, study)));
  else if (!options.quiet) terminal.out(planText(plan, study.plan.axes, terminal));
  return EXIT.done;
}

/** `gapwake.plan/1` */
function planJson({ total, count, shard, workers, first, pilot, estimate }: Preview, { plan }: Study): unknown {
  return {
    format: 'gapwake.plan/1',
    points: total,
    shard: shard === null ? null : { ...shard, points: count },
    axes: plan.axes.map(({ path, unit, values }) => ({ path, unit, points: values.length })),
    first,
    workers,
    pilot: {
      points: pilot.points,
      unfinished: pilot.unfinished,
      failed: pilot.failed,
      mean_s: pilot.mean,
      least_s: pilot.least,
      largest_s: pilot.largest,
    },
    estimated_s: estimate,
  };
}

function interruption({ done, total, journalPath }: Extract<ScanEnd, { kind: 'interrupted' }>, stop: StopRequest): Failure {
  const saved = `${done} of ${total} points are finished and kept in ${printable(journalPath)}`;
  return new Failure(
    stop.exitCode ?? EXIT.interrupted,
    [`gapwake: interrupted: ${saved}. The same command goes on from there; --restart starts anew.`],
    [interruptedProblem('the end of the scan', saved)],
  );
}

function interruptedProblem(expected: string, found = 'an interruption'): ReturnType<typeof problemWithoutPlace> {
  return problemWithoutPlace('interrupted', 'signal', expected, found);
}

function withoutScan(path: string): Failure {
  return new Failure(
    EXIT.wrongInput,
    [`${printable(path)}: the case has no scan: what is to be varied, or found, stands under the key \`scan\``],
    [problemWithoutPlace('missing-key', path, 'a section `scan` with vary, find, or both', 'none')],
  );
}

function tooManyShards({ k, n }: Shard, count: number): Failure {
  const text = `--shard ${k}/${n}: ${n} shards of ${count} point${count === 1 ? '' : 's'} would leave some empty`;
  return new Failure(EXIT.wrongInput, [`gapwake: ${text}`], [problemWithoutPlace('usage', '--shard', `at most ${count} shards`, `${n}`)]);
}
