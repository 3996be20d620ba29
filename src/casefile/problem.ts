import { clip } from '../units/index.ts';
import { printable } from '../units/printable.ts';

/** One mistake in a case: what was expected where, and what stands there. */
export interface Problem {
  /** stable, for programs */
  readonly code: ProblemCode;
  /** the case file, a table's file, or `--set PATH` */
  readonly file: string;
  /** 1-based; null where the place is an argument or a whole file */
  readonly line: number | null;
  readonly column: number | null;
  /** keys joined by dots, list items by index; empty for the case as a whole */
  readonly path: string;
  readonly expected: string;
  /** what stands there; text from outside is escaped and at most 40 characters of it are quoted */
  readonly found: string;
  /** the nearest valid spelling, null where none is close */
  readonly nearest: string | null;
}

export type ProblemCode =
  /** the text is no YAML 1.2 */
  | 'yaml'
  | 'too-large'
  | 'too-deep'
  | 'aliases'
  | 'tag'
  | 'duplicate-key'
  | 'unknown-key'
  | 'missing-key'
  | 'not-supported-yet'
  | 'wrong-type'
  | 'unknown-name'
  | 'missing-unit'
  | 'unknown-unit'
  | 'bad-unit'
  | 'wrong-dimension'
  | 'not-a-quantity'
  | 'not-finite'
  | 'out-of-range'
  /** none or more than one of the arms of an either-or */
  | 'either-or'
  /** two entries that do not fit together */
  | 'inconsistent'
  /** a table's file could not be read */
  | 'unreadable'
  /** a table's contents are wrong */
  | 'table'
  /** a `--set` argument could not be applied */
  | 'set';

/** Where something stands. */
export interface Place {
  readonly file: string;
  readonly line: number | null;
  readonly column: number | null;
}

/** A problem as one line of text: `case.yaml:4:10: gap.spacing: expected …, found …; did you mean …?` */
export function formatProblem(problem: Problem): string {
  const { line, column, path, expected, found, nearest } = problem;
  const file = [...problem.file].length > 200 ? clip(problem.file) : printable(problem.file);
  const place = line === null ? file : `${file}:${line}:${column ?? 1}`;
  const where = path === '' || file === `--set ${path}` ? '' : ` ${printable(path)}:`;
  const hint = nearest === null ? '' : `; did you mean ${nearest}?`;
  return `${place}:${where} expected ${expected}, found ${found}${hint}`;
}

/** Problems in the order of the file; those without a line last, as they came. */
export function inOrder(problems: readonly Problem[]): Problem[] {
  const rank = (p: Problem): number => (p.line === null ? Number.POSITIVE_INFINITY : p.line * 1e6 + (p.column ?? 0));
  return problems
    .map((problem, i) => ({ problem, i }))
    .sort((a, b) => (rank(a.problem) === rank(b.problem) ? a.i - b.i : rank(a.problem) - rank(b.problem)))
    .map(({ problem }) => problem);
}
