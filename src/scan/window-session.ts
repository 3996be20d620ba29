import { createHash } from 'node:crypto';
import { existsSync, statSync } from 'node:fs';
import type { Case } from '../case.ts';
import { hashWindow } from '../casefile/index.ts';
import { ResultFileError } from '../results/errors.ts';
import { deleteJournal, type Journal, type JournalHeader, openJournal } from '../results/journal.ts';
import { claimOutput } from '../results/output.ts';
import { readWindowFile, type WindowFile } from '../results/window-read.ts';
import { writeWindowFile } from '../results/window-write.ts';
import { type Answer, type Evaluate, followWindow, type Request, requestKey, windowOutcome } from '../search/window/index.ts';
import type { WindowSettings } from '../study.ts';
import { VERSION } from '../version.ts';
import { createPool } from './pool.ts';

/** A window and where it goes. */
export interface WindowRequest {
  readonly case: Case;
  readonly window: WindowSettings;
  /** paths of the entries that the case leaves to the program */
  readonly defaults: readonly string[];
  /** result file */
  readonly path: string;
  /** forget what is there already */
  readonly restart: boolean;
  /** default: all cores */
  readonly workers?: number;
  /** texts of the result file that only its caller knows */
  readonly texts: { readonly caseText: string; readonly coefficientsJson: string; readonly tablesJson: string };
  /** script of the workers, for tests */
  readonly script?: URL;
}

export interface WindowProgress {
  /** answers that are there, those of earlier sessions too; answers asked for so far */
  readonly done: number;
  readonly asked: number;
}

/** Who follows a window being computed. */
export interface WindowWatch {
  /** called after every answer */
  progress?(progress: WindowProgress): void;
  /** aborted: stop computing, keep what is finished */
  readonly stop: AbortSignal;
}

export type WindowEnd =
  /** the result file is complete; `computed` of its answers in this session */
  | { readonly kind: 'complete'; readonly file: WindowFile; readonly computed: number }
  /** the journal holds what is finished */
  | { readonly kind: 'interrupted'; readonly done: number; readonly journalPath: string };

/** Follows a gap through its surroundings, its simulations in parallel, and writes the result file.
 *
 *  The same history asks the same questions, whatever the number of workers, so every answer goes to the journal beside the result under the name of its
 *  question, and none is computed again. A complete result of the same study is answered from as it stands.
 *  @throws ResultFileError when files are in the way, of another study, or cannot be written; HistoryFailure when the pressure cannot be followed */
export async function runWindow(request: WindowRequest, watch: WindowWatch): Promise<WindowEnd> {
  const study = studyHash(request);
  const header: JournalHeader = { kind: 'window', version: VERSION, study, part: 'all instants' };
  const finished = request.restart ? null : completeResult(request.path, study);
  if (finished !== null) {
    dropJournal(request.path, header);
    return { kind: 'complete', file: finished, computed: 0 };
  }
  const output = claimOutput(request.path);
  let answers: Answers | undefined;
  try {
    if (request.restart) deleteJournal(output.journalPath);
    answers = new Answers(output.journalPath, header);
    const pool = new Simulations(request, answers, watch);
    try {
      const answer = await followWindow(request.case, request.window, { evaluate: pool.evaluate });
      const outcome = windowOutcome(request.case, request.window, answer, request.defaults, VERSION);
      await writeWindowFile(output.partPath, { ...request.texts, outcome, study });
    } catch (thrown) {
      if (!(thrown instanceof Stopped)) throw thrown;
      return { kind: 'interrupted', done: answers.count, journalPath: answers.path };
    } finally {
      await pool.close();
    }
    output.publish();
    answers.remove();
    return { kind: 'complete', file: readWindowFile(output.path), computed: pool.computed };
  } finally {
    answers?.close();
    output.discard();
  }
}

/** Hash of everything that decides the result. Title and defaults do not change what is computed, but the outcome says them. */
function studyHash({ case: settings, window, defaults }: WindowRequest): string {
  const said = JSON.stringify([hashWindow(settings, window), settings.title, defaults]);
  return createHash('sha256').update(said).digest('hex');
}

/** The result that a request asks for, if it is there and complete. */
function completeResult(path: string, study: string): WindowFile | null {
  if (!existsSync(path) || !statSync(path).isFile()) return null;
  try {
    const file = readWindowFile(path);
    return file.study === study && file.version === VERSION ? file : null;
  } catch (thrown) {
    // another file: whether it may be replaced is decided when it comes to that
    if (thrown instanceof ResultFileError) return null;
    throw thrown;
  }
}

/** A process killed after its result had its name may have left the journal of it. */
function dropJournal(path: string, header: JournalHeader): void {
  try {
    const output = claimOutput(path);
    try {
      if (existsSync(output.journalPath)) openJournal(output.journalPath, header, () => {}).remove();
    } finally {
      output.discard();
    }
  } catch (thrown) {
    // in use, or of something else: not this command's concern
    if (!(thrown instanceof ResultFileError)) throw thrown;
  }
}

/** Told to stop before every question was answered. */
class Stopped extends Error {}

/** Answers by the names of their questions, kept in the journal as they come. */
class Answers {
  readonly path: string;
  readonly #known = new Map<string, Answer>();
  readonly #journal: Journal;

  constructor(path: string, header: JournalHeader) {
    this.path = path;
    this.#journal = openJournal(path, header, (key, _, json) => {
      this.#known.set(key, JSON.parse(json()) as Answer);
    });
  }

  get count(): number {
    return this.#known.size;
  }

  get(request: Request): Answer | undefined {
    return this.#known.get(requestKey(request));
  }

  add(request: Request, answer: Answer): void {
    const key = requestKey(request);
    this.#journal.append(key, JSON.stringify(answer));
    this.#known.set(key, answer);
  }

  close(): void {
    this.#journal.close();
  }

  remove(): void {
    this.#journal.remove();
  }
}

/** Workers that answer what the journal does not. */
class Simulations {
  computed = 0;
  readonly #answers: Answers;
  readonly #watch: WindowWatch;
  readonly #pool: ReturnType<typeof createPool<Request, Answer>>;
  #asked = 0;
  readonly #interrupt = (): void => this.#pool.interrupt();

  constructor({ case: settings, workers, script }: WindowRequest, answers: Answers, watch: WindowWatch) {
    this.#answers = answers;
    this.#watch = watch;
    this.#pool = createPool<Request, Answer>({
      job: 'window-request',
      setup: settings,
      ...(workers === undefined ? {} : { workers }),
      ...(script === undefined ? {} : { script }),
    });
    watch.stop.addEventListener('abort', this.#interrupt);
  }

  readonly evaluate: Evaluate = async (requests) => {
    const missing = requests.filter((request) => this.#answers.get(request) === undefined);
    this.#asked += requests.length;
    let left = missing.length;
    const report = (): void => this.#watch.progress?.({ done: this.#asked - left, asked: this.#asked });
    report();
    const queue = missing.values();
    if (missing.length > 0 && !this.#watch.stop.aborted) {
      await this.#pool.run(
        () => queue.next().value,
        (request, answer) => {
          this.#answers.add(request, answer.ok ? answer.result : { kind: 'failed', reason: answer.error.text, runs: 0 });
          this.computed++;
          left--;
          report();
        },
      );
    }
    return requests.map((request) => {
      const answer = this.#answers.get(request);
      if (answer === undefined) throw new Stopped();
      return answer;
    });
  };

  async close(): Promise<void> {
    this.#watch.stop.removeEventListener('abort', this.#interrupt);
    await this.#pool.close();
  }
}
