import { dirname } from 'node:path';
import { parseSource } from '../casefile/document.ts';
import { formatProblem, type ReadResult, readCase } from '../casefile/index.ts';
import { applyOverrides } from '../casefile/overrides.ts';
import { printable } from '../units/printable.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { readText } from './read-text.ts';
import { datasetReader, tableReader } from './tables.ts';

/** A case that passed validation, with the text it came from. */
export type LoadedCase = Extract<ReadResult, { readonly ok: true }> & { readonly text: string };

/** larger than the 1 MB a case may have, so that the message about it is the case reader's own */
const MAX_BYTES = 16e6;

/** Reads the case of a command line.
 *  @param overrides  `PATH=VALUE` of each `--set`
 *  @throws Failure when the file cannot be read (4) or the case is wrong (2), with every mistake */
export function loadCase(path: string, overrides: readonly string[]): LoadedCase {
  const read = readText(path, MAX_BYTES);
  if (!read.ok) {
    const wrongContent = read.reason === 'not UTF-8' || read.reason.includes('MB');
    throw new Failure(
      wrongContent ? EXIT.wrongInput : EXIT.file,
      [`${printable(path)}: cannot be read as a case: ${read.reason}`],
      [problemWithoutPlace('unreadable', path, 'a case file (YAML, UTF-8, at most 1 MB)', read.reason)],
    );
  }
  const result = readCase(read.text, path, tableReader(dirname(path)), overrides, datasetReader(dirname(path)));
  if (!result.ok) {
    const { problems } = result;
    const count = problems.length === 1 ? 'One problem' : `${problems.length} problems`;
    throw new Failure(EXIT.wrongInput, [...problems.map(formatProblem), `${count}; nothing was computed or written.`], problems);
  }
  return { ...result, text: read.text };
}

/** The case as it was read, so that it alone leads to the same run: the file's text, with every `--set` applied. */
export function effectiveText(loaded: LoadedCase, overrides: readonly string[]): string {
  if (overrides.length === 0) return loaded.text;
  const parsed = parseSource(loaded.text, '');
  if (!parsed.ok) throw new Error('a case that was read cannot be read again');
  applyOverrides(parsed.document, overrides);
  return parsed.document.yaml.toString();
}
