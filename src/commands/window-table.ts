import { closeSync, openSync, readSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { ResultFileError, resultFileError } from '../results/errors.ts';
import { windowNumbers, windowState, windowTime } from '../results/window-variables.ts';
import type { WindowOutcome } from '../search/window/index.ts';

/** The history of a window as CSV: a header with units in brackets, a row for each instant, nothing where a value does not apply; numbers in full. */

const HEADER: string = [
  `${windowTime.name} [${windowTime.units}]`,
  ...windowNumbers.map(({ name, units }) => `${name} [${units}]`),
  windowState.name,
].join(',');

/** Whether a table may be written at `path`: nothing is there, or an older such table. Asked before anything is computed.
 *  @throws ResultFileError */
export function checkWindowCsvTarget(path: string): void {
  try {
    const status = statSync(path, { throwIfNoEntry: false });
    if (status === undefined) {
      if (statSync(dirname(path), { throwIfNoEntry: false })?.isDirectory()) return;
      throw new ResultFileError('missing', path, `cannot be written: there is no folder ${dirname(path)}`);
    }
    if (!status.isFile()) throw new ResultFileError('not-a-file', path, 'is not a regular file');
    if (status.size > 0 && !beginsWithHeader(path))
      throw new ResultFileError('foreign', path, 'exists and is not a table of a gapwake window; it is not replaced');
  } catch (thrown) {
    throw resultFileError(path, thrown);
  }
}

/** @throws ResultFileError */
export function writeWindowCsv(outcome: WindowOutcome, path: string): void {
  checkWindowCsvTarget(path);
  const part = `${path}.part`;
  try {
    writeFileSync(part, windowCsv(outcome));
    renameSync(part, path);
  } catch (thrown) {
    rmSync(part, { force: true });
    throw resultFileError(path, thrown);
  }
}

export function windowCsv({ history }: WindowOutcome): string {
  const rows = history.map((entry) => [entry.time_s, ...windowNumbers.map(({ key }) => entry[key] ?? ''), entry.state].join(','));
  return `${[HEADER, ...rows].join('\n')}\n`;
}

function beginsWithHeader(path: string): boolean {
  const head = Buffer.alloc(HEADER.length);
  const file = openSync(path, 'r');
  try {
    readSync(file, head, 0, head.length, 0);
  } finally {
    closeSync(file);
  }
  return head.toString() === HEADER;
}
