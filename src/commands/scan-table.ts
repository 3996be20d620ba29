import { closeSync, openSync, readSync, renameSync, rmSync, statSync, writeSync } from 'node:fs';
import { dirname } from 'node:path';
import { ResultFileError, resultFileError } from '../results/errors.ts';
import type { ScanFile } from '../results/scan-read.ts';
import type { Headline, ScanPoint } from '../results/scan-variables.ts';
import { printableJsonText } from '../units/printable.ts';
import type { Terminal } from './terminal.ts';

/** A scan as JSON and as CSV, written as it is read: however many points there are, only a page of them is in memory. */

/** characters that are handed over together */
const PIECE = 1 << 16;

/** Prints `gapwake.scan/1`; each axis and each point is a line. */
export async function printScanJson(file: ScanFile, terminal: Terminal): Promise<void> {
  const list = function* (lines: Iterable<string>): Generator<string> {
    let before = '\n    ';
    for (const line of lines) {
      yield before + printableJsonText(line);
      before = ',\n    ';
    }
  };
  const axes = file.axes.map(({ path, unit, values }) => JSON.stringify({ path, unit, values: [...values] }));
  let text = '{\n  "format": "gapwake.scan/1",\n  "axes": [';
  for (const part of list(axes)) text += part;
  text += axes.length === 0 ? '],\n' : '\n  ],\n';
  text += '  "points": [';
  for (const part of list(file.lines())) {
    text += part;
    if (text.length < PIECE) continue;
    terminal.out(text);
    text = '';
    await terminal.drained?.();
  }
  terminal.out(`${text}\n  ]\n}\n`);
  await terminal.drained?.();
}

const CSV_HEAD = 'index,id,';

/** Whether a table may be written at `path`: nothing is there, or an older such table. Asked before hours are spent on what goes into it.
 *  @throws ResultFileError */
export function checkCsvTarget(path: string): void {
  try {
    const status = statSync(path, { throwIfNoEntry: false });
    if (status === undefined) {
      if (!statSync(dirname(path), { throwIfNoEntry: false })?.isDirectory()) {
        throw new ResultFileError('missing', path, `cannot be written: there is no folder ${dirname(path)}`);
      }
      return;
    }
    if (!status.isFile()) throw new ResultFileError('not-a-file', path, 'is not a regular file');
    const head = Buffer.alloc(CSV_HEAD.length);
    const file = openSync(path, 'r');
    try {
      readSync(file, head, 0, head.length, 0);
    } finally {
      closeSync(file);
    }
    if (status.size > 0 && head.toString() !== CSV_HEAD) {
      throw new ResultFileError('foreign', path, 'exists and is not a table of a gapwake scan; it is not replaced');
    }
  } catch (thrown) {
    throw resultFileError(path, thrown);
  }
}

/** Writes the table of headlines: a header with units in brackets, a row for each point, nothing where a value does not apply; numbers in full.
 *  @throws ResultFileError */
export function writeScanCsv(file: ScanFile, path: string): void {
  checkCsvTarget(path);
  const part = `${path}.part`;
  try {
    const output = openSync(part, 'w');
    try {
      let text = csvHeader(file);
      for (const point of file.points()) {
        text += csvRow(point, file.headlines);
        if (text.length < PIECE) continue;
        writeAll(output, text);
        text = '';
      }
      writeAll(output, text);
    } finally {
      closeSync(output);
    }
    renameSync(part, path);
  } catch (thrown) {
    rmSync(part, { force: true });
    throw resultFileError(path, thrown);
  }
}

function csvHeader({ axes, headlines }: ScanFile): string {
  const named = (name: string, unit: string): string => (unit === '1' ? name : `${name} [${unit}]`);
  const columns = [
    ...axes.map(({ path, unit }) => named(path, unit)),
    ...headlines.map((headline) => named(headline.name, 'units' in headline ? headline.units : '1')),
    'error_text',
  ];
  return `${CSV_HEAD}${columns.map(quoted).join(',')}\n`;
}

function csvRow(point: ScanPoint, headlines: readonly Headline[]): string {
  const cells = headlines.map((headline) => {
    const value = headline.of(point);
    if (value === null) return '';
    return typeof value === 'number' || typeof value === 'string' ? String(value) : value.join(' ');
  });
  const row = [String(point.index), point.id, ...point.values.map(String), ...cells, point.error?.text ?? ''];
  return `${row.map(quoted).join(',')}\n`;
}

/** RFC 4180 */
function quoted(cell: string): string {
  return /[",\r\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}

function writeAll(file: number, text: string): void {
  const bytes = Buffer.from(text);
  for (let done = 0; done < bytes.length; ) done += writeSync(file, bytes, done);
}
