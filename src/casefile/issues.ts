import type * as z from 'zod';
import { clip, nearestSpelling } from '../units/index.ts';
import { locate, type Path, pathText, type SourceDocument } from './document.ts';
import type { IssueDetail } from './fields.ts';
import { isLaterKey, isLaterName } from './later.ts';
import { getPlain } from './plain.ts';
import type { Place, Problem, ProblemCode } from './problem.ts';
import { keysAt } from './walk.ts';

/** What the validator found wrong, placed in the document.
 *
 *  @param raw  the plain data that was validated */
export function problemsOf(issues: readonly z.core.$ZodIssue[], schema: z.ZodType, raw: unknown, document: SourceDocument): Problem[] {
  return issues.flatMap((issue) => convert(issue, [], { schema, raw, document }));
}

/** unknown keys reported per mapping; placing each costs time in proportion to their number */
const MAX_KEYS = 100;

interface Context {
  readonly schema: z.ZodType;
  readonly raw: unknown;
  readonly document: SourceDocument;
}

function convert(issue: z.core.$ZodIssue, base: Path, context: Context): Problem[] {
  const { raw, document } = context;
  const path = [...base, ...issue.path];
  const value = getPlain(raw, path);
  const make = (code: ProblemCode, place: Place, at: Path, expected: string, found: string, nearest: string | null): Problem => ({
    code,
    file: place.file,
    line: place.line,
    column: place.column,
    path: pathText(at),
    expected,
    found,
    nearest,
  });

  if (issue.code === 'unrecognized_keys') {
    const known = keysAt(context.schema, path);
    return issue.keys.slice(0, MAX_KEYS).map((key) => {
      const at = [...path, key];
      const place = locate(document, at, 'key');
      if (isLaterKey(path, key)) return make('not-supported-yet', place, at, `no such key (${key} is not supported yet)`, clip(key), null);
      const where = path.length === 0 ? 'a key of a case' : `a key of ${clip(pathText(path))}`;
      return make('unknown-key', place, at, `${where} (${known.join(', ')})`, clip(key), nearestSpelling(key, known));
    });
  }
  if (issue.code === 'invalid_union') {
    // the arm that accepts this type of value knows best what is wrong inside it
    const arms = issue.errors.filter((arm) => !isOfAnotherType(arm));
    if (arms.length === 1) return arms[0].flatMap((inner) => convert(inner, path, context));
  }
  const place = locate(document, path);
  if (issue.code === 'custom') {
    const detail = (issue.params ?? { code: 'wrong-type' }) as unknown as IssueDetail;
    const found = detail.found ?? describe(value);
    const where = detail.table ?? locate(document, path, 'value', detail.offset ?? 0);
    return [make(detail.code, where, path, issue.message, found, detail.nearest ?? null)];
  }
  if (issue.code === 'invalid_value' && typeof value === 'string') {
    if (isLaterName(path, value))
      return [make('not-supported-yet', place, path, `${issue.message} (${value} is not supported yet)`, clip(value), null)];
    const names = issue.values.map(String);
    return [make('unknown-name', place, path, issue.message, clip(value) || 'nothing', nearestSpelling(value, names))];
  }
  return [make(codeOf(value, issue.message), place, path, issue.message, describe(value, issue.message), null)];
}

/** Whether an arm of a union refuses a value for its type: it may be a union itself. */
function isOfAnotherType(arm: readonly z.core.$ZodIssue[]): boolean {
  return arm.some(
    (issue) =>
      issue.path.length === 0 &&
      (issue.code === 'invalid_type' || (issue.code === 'invalid_union' && issue.errors.length > 0 && issue.errors.every(isOfAnotherType))),
  );
}

/** The code for a value of the wrong type. */
function codeOf(value: unknown, expected: string): ProblemCode {
  if (value === undefined || value === null) return 'missing-key';
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) return 'not-finite';
    return isOfQuantity(expected) ? 'missing-unit' : 'wrong-type';
  }
  return 'wrong-type';
}

/** What stands there, in at most 40 characters from outside. */
function describe(value: unknown, expected = ''): string {
  if (value === undefined || value === null) return 'nothing';
  if (Array.isArray(value)) return 'a list';
  if (typeof value === 'object') return 'a mapping';
  if (typeof value === 'number' && Number.isFinite(value) && isOfQuantity(expected)) return `${value} without a unit`;
  return clip(String(value)) || 'nothing';
}

/** an expectation that shows how a quantity is written */
function isOfQuantity(expected: string): boolean {
  return expected.includes(', e.g. ');
}
