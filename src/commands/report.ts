import { readFileSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { GENERATOR } from '../report/document.ts';
import type { FigureFile } from '../report/svg-file.ts';
import { ResultFileError, resultFileError } from '../results/errors.ts';
import { readResultFormat } from '../results/read.ts';
import { printable } from '../units/printable.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { writeFigures } from './report-figures.ts';
import type { Terminal } from './terminal.ts';

export interface ReportOptions {
  readonly output?: string;
  readonly figures?: string;
  readonly quiet?: boolean;
}

/** A report before it is written. */
export interface Report {
  /** @param script  of pages of this kind */
  readonly page: (script: string) => string;
  readonly figures: () => FigureFile[];
}

/** What kinds of result there are pages for, and the script of each. */
const KINDS: Readonly<Record<string, (path: string) => Promise<Report>>> = {
  run: async (path) => (await import('./report-run.ts')).runReport(path),
  scan: async (path) => (await import('./report-scan.ts')).scanReport(path),
  window: async (path) => (await import('./report-window.ts')).windowReport(path),
};

/** Makes one self-contained page of a result file, and its figures as files if asked for.
 *  @throws Failure when the file cannot be read or the page cannot be written */
export async function report(path: string, options: ReportOptions, terminal: Terminal): Promise<void> {
  const output = options.output ?? `${path.replace(/\.h5$/i, '')}.html`;
  try {
    const { kind } = readResultFormat(path);
    const open = KINDS[kind];
    if (open === undefined) throw new ResultFileError('other-kind', path, `holds a ${kind}, for which there is no report`);
    // before anything is drawn: the path may be no good
    checkReplaceable(output);
    const made = await open(path);
    const lines = [written(output, writeWhole(output, made.page(scriptFor(kind))))];
    if (options.figures !== undefined) lines.push(await writeFigures(options.figures, made.figures()));
    if (!options.quiet) terminal.out(lines.map((line) => `${line}\n`).join(''));
  } catch (thrown) {
    throw thrown instanceof ResultFileError ? failureOf(thrown) : thrown;
  }
}

/** The bundled script of a kind of page lies beside the program. */
function scriptFor(kind: string): string {
  return readFileSync(fileURLToPath(new URL(`./page/${kind}.js`, import.meta.url)), 'utf8');
}

/** A page of this program may be replaced, nothing else. */
function checkReplaceable(path: string): void {
  const status = statSync(path, { throwIfNoEntry: false });
  if (!status) return;
  if (!status.isFile())
    throw new ResultFileError('not-a-file', path, status.isDirectory() ? 'is a folder, not a file' : 'is not a regular file');
  if (!readFileSync(path, 'utf8').slice(0, 4000).includes(`<meta name="generator" content="${GENERATOR}">`))
    throw new ResultFileError('foreign', path, 'exists and is not a page of gapwake; it is not replaced');
}

/** Writes under another name and renames, so that nobody ever sees half a page. @returns bytes written */
function writeWhole(path: string, text: string): number {
  const part = `${path}.part`;
  try {
    writeFileSync(part, text);
    renameSync(part, path);
  } catch (thrown) {
    rmSync(part, { force: true });
    throw resultFileError(path, thrown);
  }
  return Buffer.byteLength(text);
}

function written(path: string, bytes: number): string {
  return `Written: ${printable(path)} (${bytes < 1e6 ? `${Math.ceil(bytes / 1e3)} kB` : `${(bytes / 1e6).toFixed(1)} MB`}).`;
}

function failureOf({ path, code, message }: ResultFileError): Failure {
  return new Failure(
    EXIT.file,
    [`gapwake: ${printable(path)}: ${printable(message)}`],
    [problemWithoutPlace(code, path, 'a complete result of gapwake, and a place for its report', message)],
  );
}
