import type { Problem } from '../casefile/index.ts';

/** A problem as `--json` reports it: those of a case, and those of files, arguments and simulations in the same shape. */
export interface ReportedProblem extends Omit<Problem, 'code'> {
  readonly code: string;
}

/** Why a command ends early: the exit code, the text for people and the same for programs. */
export class Failure extends Error {
  override readonly name = 'Failure';
  readonly exitCode: number;
  /** one message each, without line ends */
  readonly lines: readonly string[];
  readonly problems: readonly ReportedProblem[];

  constructor(exitCode: number, lines: readonly string[], problems: readonly ReportedProblem[]) {
    super(lines[0] ?? '');
    this.exitCode = exitCode;
    this.lines = lines;
    this.problems = problems;
  }
}

/** A problem that stands at no line of a file. */
export function problemWithoutPlace(
  code: string,
  file: string,
  expected: string,
  found: string,
  nearest: string | null = null,
): ReportedProblem {
  return { code, file, line: null, column: null, path: '', expected, found, nearest };
}
