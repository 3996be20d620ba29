import { createHash } from 'node:crypto';
import { closeSync, fdatasync, fdatasyncSync, fstatSync, ftruncateSync, openSync, readSync, rmSync, statSync, writeSync } from 'node:fs';
import { ResultFileError, resultFileError } from './errors.ts';

/** Results as they come, one checksummed line each, so that whatever ends the process loses only what was not yet finished:
 *
 *      SUM KEY JSON\n        SUM: the first 16 hexadecimal digits of the SHA-256 of "KEY JSON"
 *
 *  The first line has the key `gapwake.journal/1` and says what is being computed. A last line that is torn (the machine went down while it was
 *  written) is dropped; a wrong line elsewhere means that the file was changed, and it is refused.
 *
 *  Whoever opens a journal holds the lock of the result it belongs to. */
export interface Journal {
  /** Adds a finished result and hands it to the operating system; it is brought to the disk within about a second.
   *  @param key   not empty, no white space
   *  @param json  one line
   *  @returns where it lies, for {@link Journal.read}
   *  @throws ResultFileError when the disk refuses; what was appended before is safe */
  append(key: string, json: string): Span;
  /** The JSON of an entry. @throws ResultFileError */
  read(span: Span): string;
  /** Brings everything to the disk and closes the file; may be called twice. */
  close(): void;
  /** Closes and deletes the file: its results are safe elsewhere. */
  remove(): void;
}

/** Where the JSON of an entry lies in the file [bytes]. */
export interface Span {
  readonly offset: number;
  readonly length: number;
}

/** What a journal holds results of. All of it must agree when work goes on. */
export interface JournalHeader {
  readonly kind: 'scan' | 'window';
  /** of the program: another one may compute other numbers */
  readonly version: string;
  /** hash of everything that decides the results: the case, what is varied or followed, what is searched */
  readonly study: string;
  /** which part of the study, in words: `120 points`, `shard 2 of 8` */
  readonly part: string;
}

const FORMAT = 'gapwake.journal/1';
const SUM_LENGTH = 16;
const BLOCK = 1 << 20;
/** longer than any result; a file without line ends is no journal */
const LONGEST_LINE = 1 << 26;
/** [ms] between two calls that bring the file to the disk */
const SYNC_INTERVAL = 1000;

/** Opens the journal at `path` to go on with it, or begins one.
 *  @param known  called for each result that is already there, in the order of the file; `json` reads it
 *  @throws ResultFileError `other-study` when it belongs to another case, version or part; `damaged`; `foreign` when it is no journal */
export function openJournal(path: string, header: JournalHeader, known: (key: string, span: Span, json: () => string) => void): Journal {
  try {
    checkRegular(path);
    const file = openSync(path, 'a+');
    try {
      const size = fstatSync(file).size;
      const end = size === 0 ? 0 : readExisting(file, path, header, known);
      if (end < size) ftruncateSync(file, end);
      const journal = new OpenJournal(file, path, end);
      if (end === 0) journal.append(FORMAT, JSON.stringify(header));
      return journal;
    } catch (thrown) {
      closeSync(file);
      throw thrown;
    }
  } catch (thrown) {
    throw resultFileError(path, thrown);
  }
}

/** Deletes the journal at `path`, if there is one. @throws ResultFileError `foreign` when something else bears its name */
export function deleteJournal(path: string): void {
  try {
    if (!checkRegular(path)) return;
    const file = openSync(path, 'r');
    try {
      const head = Buffer.alloc(4096);
      const length = readSync(file, head, 0, head.length, 0);
      if (!beginsLikeJournal(head.toString('utf8', 0, length))) throw foreign(path);
    } finally {
      closeSync(file);
    }
    rmSync(path);
  } catch (thrown) {
    throw resultFileError(path, thrown);
  }
}

class OpenJournal implements Journal {
  #file: number | null;
  readonly #path: string;
  #size: number;
  #syncedAt = 0;
  #syncing = false;

  constructor(file: number, path: string, size: number) {
    this.#file = file;
    this.#path = path;
    this.#size = size;
  }

  append(key: string, json: string): Span {
    const file = this.#open();
    if (!/^\S+$/.test(key) || json.includes('\n')) throw new RangeError(`not an entry of a journal: ${key}`);
    const body = `${key} ${json}`;
    const line = Buffer.from(`${sumOf(body)} ${body}\n`);
    try {
      for (let done = 0; done < line.length; ) done += writeSync(file, line, done);
    } catch (thrown) {
      // a full disk: half a line must not stand in the middle of the file
      ftruncateSync(file, this.#size);
      throw resultFileError(this.#path, thrown);
    }
    const length = Buffer.byteLength(json);
    const span = { offset: this.#size + line.length - 1 - length, length };
    this.#size += line.length;
    this.#sync(file);
    return span;
  }

  read({ offset, length }: Span): string {
    try {
      const bytes = Buffer.allocUnsafe(length);
      if (readSync(this.#open(), bytes, 0, length, offset) !== length) throw damaged(this.#path, 'it was cut short meanwhile');
      return bytes.toString();
    } catch (thrown) {
      throw resultFileError(this.#path, thrown);
    }
  }

  close(): void {
    if (this.#file === null) return;
    const file = this.#file;
    this.#file = null;
    try {
      fdatasyncSync(file);
    } catch {
      // some file systems cannot; the system will write it
    }
    closeSync(file);
  }

  remove(): void {
    this.close();
    try {
      rmSync(this.#path, { force: true });
    } catch (thrown) {
      throw resultFileError(this.#path, thrown);
    }
  }

  #open(): number {
    if (this.#file === null) throw new Error('the journal is closed');
    return this.#file;
  }

  /** A killed process loses nothing that was written; this is for machines that go down. */
  #sync(file: number): void {
    const now = performance.now();
    if (this.#syncing || now - this.#syncedAt < SYNC_INTERVAL) return;
    this.#syncedAt = now;
    this.#syncing = true;
    fdatasync(file, () => {
      this.#syncing = false;
    });
  }
}

/** Checks every line. @returns where the last whole line ends; 0 when not even the first is whole */
function readExisting(file: number, path: string, header: JournalHeader, known: Parameters<typeof openJournal>[2]): number {
  let good = 0;
  let number = 0;
  let wrong: number | null = null;
  for (const { line, offset } of linesOf(file, path)) {
    number++;
    // a wrong line is torn if nothing follows it
    if (wrong !== null) {
      if (wrong === 1) throw foreign(path);
      throw damaged(path, `line ${wrong} does not match its checksum; --restart deletes it and starts anew`);
    }
    const parsed = partsOf(line);
    if (parsed === null) {
      if (number === 1 && !beginsLikeJournal(line.toString('utf8', 0, 4096))) throw foreign(path);
      wrong = number;
      continue;
    }
    const { key, start } = parsed;
    const json = (): string => line.toString('utf8', start, line.length - 1);
    if (number === 1) checkHeader(path, key, json(), header);
    else known(key, { offset: offset + start, length: line.length - 1 - start }, json);
    good = offset + line.length;
  }
  return good;
}

/** Lines with their line ends; the last one may lack it. The buffers are reused. */
function* linesOf(file: number, path: string): Generator<{ readonly line: Buffer; readonly offset: number }> {
  let held = Buffer.alloc(0);
  let offset = 0;
  const block = Buffer.allocUnsafe(BLOCK);
  for (let position = 0; ; ) {
    const length = readSync(file, block, 0, BLOCK, position);
    if (length === 0) break;
    position += length;
    held = Buffer.concat([held, block.subarray(0, length)]);
    let start = 0;
    for (let end = held.indexOf(10); end >= 0; end = held.indexOf(10, start)) {
      yield { line: held.subarray(start, end + 1), offset: offset + start };
      start = end + 1;
    }
    held = Buffer.from(held.subarray(start));
    offset += start;
    if (held.length > LONGEST_LINE) throw foreign(path);
  }
  if (held.length > 0) yield { line: held, offset };
}

/** Key and start of the JSON of a whole line with the right sum; else null. */
function partsOf(line: Buffer): { readonly key: string; readonly start: number } | null {
  if (line[line.length - 1] !== 10 || line[SUM_LENGTH] !== 32) return null;
  const body = line.subarray(SUM_LENGTH + 1, line.length - 1);
  if (line.toString('latin1', 0, SUM_LENGTH) !== sumOf(body)) return null;
  const space = body.indexOf(32);
  if (space < 1) return null;
  return { key: body.toString('utf8', 0, space), start: SUM_LENGTH + 1 + space + 1 };
}

function sumOf(body: string | Buffer): string {
  return createHash('sha256').update(body).digest('hex').slice(0, SUM_LENGTH);
}

/** Whether a text is the beginning of a journal, however short. */
function beginsLikeJournal(text: string): boolean {
  if (!/^[0-9a-f]*$/.test(text.slice(0, SUM_LENGTH))) return false;
  const rest = text.slice(SUM_LENGTH);
  const expected = ` ${FORMAT} `;
  return rest.length < expected.length ? expected.startsWith(rest) : rest.startsWith(expected);
}

function checkHeader(path: string, key: string, json: string, expected: JournalHeader): void {
  if (key !== FORMAT) {
    if (/^gapwake\.journal\/[0-9]+$/.test(key)) throw other(path, 'of a newer gapwake');
    throw foreign(path);
  }
  let found: Partial<JournalHeader>;
  try {
    found = JSON.parse(json) as Partial<JournalHeader>;
  } catch {
    throw foreign(path);
  }
  if (found.kind !== expected.kind) throw other(path, `of another kind (${found.kind}, not ${expected.kind})`);
  if (found.version !== expected.version)
    throw other(path, `of another version of gapwake (${found.version}; this is ${expected.version})`);
  if (found.study !== expected.study) throw other(path, 'of another case: something that decides the results was changed');
  if (found.part !== expected.part) throw other(path, `of another part of this study (${found.part}, not ${expected.part})`);
}

function other(path: string, whose: string): ResultFileError {
  return new ResultFileError(
    'other-study',
    path,
    `holds unfinished results ${whose}. --restart deletes them and starts anew; another -o leaves them alone`,
  );
}

function foreign(path: string): ResultFileError {
  return new ResultFileError('foreign', path, 'is in the way and is no unfinished gapwake result; choose another output name or move it');
}

function damaged(path: string, what: string): ResultFileError {
  return new ResultFileError('damaged', path, `the file is damaged: ${what}`);
}

/** @returns whether something is there */
function checkRegular(path: string): boolean {
  const status = statSync(path, { throwIfNoEntry: false });
  if (!status) return false;
  if (!status.isFile()) throw foreign(path);
  return true;
}
