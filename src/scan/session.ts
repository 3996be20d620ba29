import { existsSync, statSync } from 'node:fs';
import { ResultFileError } from '../results/errors.ts';
import { deleteJournal, type Journal, type JournalHeader, openJournal, type Span } from '../results/journal.ts';
import { claimOutput, type Output } from '../results/output.ts';
import { readScanFile, type ScanFile } from '../results/scan-read.ts';
import type { PointError, ScanPoint } from '../results/scan-variables.ts';
import { type ScanAbout, writeScanFile } from '../results/scan-write.ts';
import { VERSION } from '../version.ts';
import { orderOf } from './order.ts';
import { type Plan, type Shard, type Share, shareOf } from './plan.ts';
import type { PointResult } from './point-job.ts';
import { createPool } from './pool.ts';
import { pointId, pointIdWithoutCase, type Study, type StudySource } from './study.ts';

/** A scan, or one shard of it, and where it goes. */
export interface ScanRequest {
  readonly study: Study;
  /** result file */
  readonly path: string;
  readonly shard: Shard | null;
  /** forget what is there already */
  readonly restart: boolean;
  /** default: all cores */
  readonly workers?: number;
  /** texts of the result file that only its caller knows */
  readonly texts: { readonly caseText: string; readonly coefficientsJson: string; readonly tablesJson: string };
  /** script of the workers, for tests */
  readonly script?: URL;
  /** [MB] of a worker, for tests */
  readonly memory?: number;
}

/** Who follows a scan. */
export interface ScanWatch {
  /** called after every point, and once before the first */
  progress?(progress: ScanProgress): void;
  /** aborted: stop computing, keep what is finished */
  readonly stop: AbortSignal;
}

export interface ScanProgress {
  /** finished, failed ones included, those of earlier sessions too */
  readonly done: number;
  readonly failed: number;
  readonly total: number;
  /** finished in this session */
  readonly computed: number;
}

export type ScanEnd =
  /** the result file is complete; `computed` of its points in this session */
  | { readonly kind: 'complete'; readonly file: ScanFile; readonly computed: number }
  /** the journal holds what is finished */
  | { readonly kind: 'interrupted'; readonly done: number; readonly total: number; readonly journalPath: string };

/** Computes what is not yet finished of a scan and writes its result file.
 *
 *  Every finished point goes to the journal beside the result at once, so that nothing finished is lost or computed again, however the process ends; once all
 *  are there the result file is built in the order of the plan. A complete result of the same study is answered from as it stands.
 *  @throws ResultFileError when files are in the way, of another study, or cannot be written */
export async function runScan(request: ScanRequest, watch: ScanWatch): Promise<ScanEnd> {
  const finished = request.restart ? null : completeResult(request);
  if (finished !== null) {
    dropJournal(request);
    return { kind: 'complete', file: finished, computed: 0 };
  }
  return withLedger(request, async (ledger, output) => {
    const computed = await compute(request, ledger, watch);
    return conclude(request, ledger, output, computed, watch);
  });
}

/** Joins complete shard files of one plan into the result of the whole.
 *  @param read  the shards, opened; checked here to be all shards of this study, once each
 *  @throws ResultFileError as {@link runScan}, and when shards do not fit */
export async function gatherScan(request: ScanRequest, paths: readonly string[], watch: ScanWatch): Promise<ScanEnd> {
  checkShards(request.study, paths);
  const finished = request.restart ? null : completeResult(request);
  if (finished !== null) return { kind: 'complete', file: finished, computed: 0 };
  return withLedger(request, async (ledger, output) => {
    for (const path of paths) {
      // one file in memory at a time
      for (const json of readScanFile(path).lines()) {
        const { index, error } = JSON.parse(json) as ScanPoint;
        if (!ledger.has(index)) ledger.add(index, { json, failed: error !== null });
      }
      await new Promise<void>((resume) => setImmediate(resume));
      if (watch.stop.aborted) break;
    }
    return conclude(request, ledger, output, 0, watch);
  });
}

/** The result that a request asks for, if it is there and complete. */
function completeResult({ path, study, shard }: ScanRequest): ScanFile | null {
  if (!existsSync(path) || !statSync(path).isFile()) return null;
  try {
    const file = readScanFile(path);
    const same = file.study === study.hash && file.version === VERSION && file.shard?.k === shard?.k && file.shard?.n === shard?.n;
    return same ? file : null;
  } catch (thrown) {
    // another file: whether it may be replaced is decided when it comes to that
    if (thrown instanceof ResultFileError) return null;
    throw thrown;
  }
}

/** A process killed after its result had its name may have left the journal of it. */
function dropJournal(request: ScanRequest): void {
  try {
    const output = claimOutput(request.path);
    try {
      if (existsSync(output.journalPath)) openJournal(output.journalPath, headerOf(request), () => {}).remove();
    } finally {
      output.discard();
    }
  } catch (thrown) {
    // in use, or of something else: not this command's concern
    if (!(thrown instanceof ResultFileError)) throw thrown;
  }
}

function headerOf({ study, shard }: ScanRequest): JournalHeader {
  const part = shard === null ? `${study.plan.count} points` : `shard ${shard.k} of ${shard.n} of ${study.plan.count} points`;
  return { kind: 'scan', version: VERSION, study: study.hash, part };
}

async function withLedger(request: ScanRequest, work: (ledger: Ledger, output: Output) => Promise<ScanEnd>): Promise<ScanEnd> {
  const output = claimOutput(request.path);
  let ledger: Ledger | undefined;
  try {
    if (request.restart) deleteJournal(output.journalPath);
    ledger = new Ledger(output.journalPath, headerOf(request), shareOf(request.study.plan, request.shard));
    return await work(ledger, output);
  } finally {
    ledger?.close();
    output.discard();
  }
}

/** [s] points that take less are handed out ahead: to wait for the next one would be a large part of their time */
const QUICK = 0.1;

/** What is finished, and where it lies in the journal: 13 bytes a point. */
class Ledger {
  readonly share: Share;
  done = 0;
  failed = 0;
  readonly path: string;
  readonly #journal: Journal;
  readonly #offsets: Float64Array;
  /** 0: not finished */
  readonly #lengths: Int32Array;

  constructor(path: string, header: JournalHeader, share: Share) {
    this.path = path;
    this.share = share;
    this.#offsets = new Float64Array(share.count);
    this.#lengths = new Int32Array(share.count);
    this.#journal = openJournal(path, header, (key, span, json) => {
      const position = /^[0-9]{1,9}$/.test(key) ? share.positionOf(Number(key)) : null;
      if (position === null || position >= share.count) {
        throw new ResultFileError(
          'damaged',
          path,
          `the file is damaged: it holds a point ${key} that is not in the plan; --restart deletes it`,
        );
      }
      this.#note(position, span, failedIn(json()));
    });
  }

  has(index: number): boolean {
    const position = this.share.positionOf(index);
    return position !== null && this.finished(position);
  }

  finished(position: number): boolean {
    return this.#lengths[position] !== 0;
  }

  add(index: number, { json, failed }: PointResult): void {
    const position = this.share.positionOf(index);
    if (position === null) throw new RangeError(`point ${index} belongs to another shard`);
    this.#note(position, this.#journal.append(String(index), json), failed);
  }

  /** JSON of every point, in the order of the plan. */
  *lines(): Generator<string> {
    for (let position = 0; position < this.share.count; position++) {
      yield this.#journal.read({ offset: this.#offsets[position] as number, length: this.#lengths[position] as number });
    }
  }

  close(): void {
    this.#journal.close();
  }

  remove(): void {
    this.#journal.remove();
  }

  #note(position: number, { offset, length }: Span, failed: boolean): void {
    if (this.finished(position)) return;
    this.#offsets[position] = offset;
    this.#lengths[position] = length;
    this.done++;
    if (failed) this.failed++;
  }
}

/** Whether a point counts as failed, without parsing all of it: `error` comes after `outcome`, and only an object under that key has a code there. */
function failedIn(json: string): boolean {
  return json.includes('"error":{"code":');
}

/** Lets the pool compute what is missing. @returns how many points were finished */
async function compute(request: ScanRequest, ledger: Ledger, watch: ScanWatch): Promise<number> {
  const { study, workers, script, memory } = request;
  const { share } = ledger;
  const pool = createPool<number, PointResult>({
    job: 'scan-point',
    setup: study.source satisfies StudySource,
    ahead: QUICK,
    ...(workers === undefined ? {} : { workers }),
    ...(script === undefined ? {} : { script }),
    ...(memory === undefined ? {} : { memory }),
  });
  const order = orderOf(study.plan, share, (position) => ledger.finished(position), pool.workers);
  let computed = 0;
  const report = (): void => watch.progress?.({ done: ledger.done, failed: ledger.failed, total: share.count, computed });
  const interrupt = (): void => pool.interrupt();
  watch.stop.addEventListener('abort', interrupt);
  try {
    report();
    if (watch.stop.aborted) return 0;
    await pool.run(
      () => {
        const position = order.next();
        return position === undefined ? undefined : share.indexAt(position);
      },
      (index, answer) => {
        ledger.add(index, answer.ok ? answer.result : { json: JSON.stringify(withoutAnswer(study, index, answer.error)), failed: true });
        if (answer.ok) order.took(share.positionOf(index) as number, answer.seconds);
        computed++;
        report();
      },
    );
  } finally {
    watch.stop.removeEventListener('abort', interrupt);
    await pool.close();
  }
  return computed;
}

/** A point whose worker could not give an answer. */
function withoutAnswer(study: Study, index: number, error: PointError): ScanPoint {
  const values = study.plan.values(index);
  const read = study.at(values);
  const id = read.ok ? pointId(read.case, study.plan.find) : pointIdWithoutCase(study, values);
  return { index, id, values, outcome: null, error, found: null };
}

/** Builds the result file from a journal that is complete. */
async function conclude(request: ScanRequest, ledger: Ledger, output: Output, computed: number, watch: ScanWatch): Promise<ScanEnd> {
  const { done, share, path: journalPath } = ledger;
  const interrupted: ScanEnd = { kind: 'interrupted', done, total: share.count, journalPath };
  if (done < share.count) return interrupted;
  if (!(await writeScanFile(output.partPath, aboutOf(request, share), ledger.lines(), () => watch.stop.aborted))) return interrupted;
  output.publish();
  ledger.remove();
  return { kind: 'complete', file: readScanFile(output.path), computed };
}

function aboutOf({ study, texts, shard }: ScanRequest, share: Share): ScanAbout {
  const { plan, case: settings, hash } = study;
  return {
    ...texts,
    title: settings.title,
    version: VERSION,
    study: hash,
    axes: plan.axes,
    find: plan.find?.what ?? null,
    layout: plan.grid && shard === null ? { kind: 'grid' } : listOf(plan, share),
    total: plan.count,
    shard,
  };
}

function listOf(plan: Plan, share: Share): Extract<ScanAbout['layout'], { kind: 'list' }> {
  const indices = Int32Array.from({ length: share.count }, (_, position) => share.indexAt(position));
  const values = plan.axes.map(() => new Float64Array(share.count));
  for (const [position, index] of indices.entries()) {
    for (const [axis, value] of plan.values(index).entries()) (values[axis] as Float64Array)[position] = value;
  }
  return { kind: 'list', values, indices };
}

/** Whether files are all the shards of a study, once each. @throws ResultFileError that names what does not fit */
function checkShards(study: Study, paths: readonly string[]): void {
  const known = new Map<number, string>();
  let n = 0;
  for (const path of paths) {
    const refuse = (why: string): ResultFileError => new ResultFileError('other-study', path, why);
    const { shard, study: hash, version, count } = readScanFile(path);
    if (shard === null) throw refuse('is the result of a whole scan, not a shard');
    if (version !== VERSION) throw refuse(`was computed by another version of gapwake (${version}; this is ${VERSION})`);
    if (hash !== study.hash) throw refuse('is a shard of another case: something that decides the results was changed');
    if (n !== 0 && shard.n !== n) throw refuse(`is shard ${shard.k} of ${shard.n}; the files before it are shards of ${n}`);
    n = shard.n;
    const other = known.get(shard.k);
    if (other !== undefined) throw refuse(`is shard ${shard.k} of ${n}, as is ${other}`);
    if (count !== shareOf(study.plan, shard).count) throw refuse('is a shard of another plan');
    known.set(shard.k, path);
  }
  const missing = Array.from({ length: n }, (_, i) => i + 1).filter((k) => !known.has(k));
  if (missing.length > 0) {
    const names = missing.length <= 10 ? missing.join(', ') : `${missing.slice(0, 10).join(', ')} and ${missing.length - 10} more`;
    throw new ResultFileError('other-study', paths[0] as string, `is one of ${n} shards; missing: ${names}`);
  }
}
