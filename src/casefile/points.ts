import type { Case } from '../case.ts';
import type { Axis, ScanSettings } from '../study.ts';
import { clip } from '../units/index.ts';
import { locate, type SourceDocument } from './document.ts';
import { getPlain, type Plain, setPlain } from './plain.ts';
import { inOrder, type Problem, type ProblemCode } from './problem.ts';

/** The case at one point of a scan, or why there is none.
 *  @param values  one SI value per axis, in their order */
export type PointReader = (
  values: ArrayLike<number>,
) => { readonly ok: true; readonly case: Case } | { readonly ok: false; readonly problems: readonly Problem[] };

/** What the points of a scan are made from. */
export interface PointSource {
  /** the case as plain data, without scan and history */
  readonly base: Plain;
  readonly scan: ScanSettings | null;
  readonly document: SourceDocument;
  /** validates and builds one run */
  readonly read: (plain: Plain) => ReturnType<PointReader>;
}

/** The reader of a scan's points. Text is not parsed again: the varied entries are set in the data, which are validated anew.
 *  @throws RangeError when the values are not as many as the axes */
export function pointReader({ base, scan, document, read }: PointSource): PointReader {
  const axes = (scan?.axes ?? []).map((axis) => ({ ...axis, keys: axis.path.split('.') }));
  const varies = (path: string): number => axes.findIndex((axis) => path === axis.path || path.startsWith(`${axis.path}.`));
  return (values) => {
    if (values.length !== axes.length) throw new RangeError(`${values.length} values for ${axes.length} varied entries`);
    let plain = base;
    for (const [k, { keys, unit, path }] of axes.entries()) {
      const set = setPlain(plain, keys, written(values[k], unit));
      if (!set.ok) return { ok: false, problems: [axisProblem(document, k, 'set', set.expected, path)] };
      plain = set.value;
    }
    const result = read(plain);
    if (result.ok) return result;
    // what stands in no line of the file is placed at the entry that varies it
    const problems = result.problems.map((problem) => {
      const k = varies(problem.path);
      return k < 0 ? problem : { ...problem, ...locate(document, ['scan', 'vary', k]) };
    });
    return { ok: false, problems: inOrder(problems) };
  };
}

/** A value as a case would hold it; SI units have the factor 1, so that exactly this number comes back. */
function written(value: number, unit: string): string | number {
  return unit === '1' ? value : `${value} ${unit}`;
}

/** What is wrong with a scan as a whole, although each of its entries is right: entries that exclude each other, values twice in a grid,
 *  and ends that make no case whatever the other entries are.
 *
 *  Points between may still make no case; they are found when their turn comes. */
export function scanProblems(source: PointSource, at: PointReader): Problem[] {
  const { base, scan, document } = source;
  if (scan === null || scan.axes.length === 0) return [];
  const { axes, zip } = scan;
  const clashes = excluded(base, axes).map(({ k, by }) =>
    axisProblem(document, by, 'inconsistent', 'entries that may stand together', `${axes[by].path}, which excludes ${axes[k].path}`),
  );
  if (clashes.length > 0) return clashes;
  const problems: Problem[] = [];
  if (!zip)
    for (const [k, { values, unit }] of axes.entries()) {
      const twice = repeated(values);
      if (twice !== null)
        problems.push(axisProblem(document, k, 'inconsistent', 'every value once in a grid', `${written(twice, unit)} again`));
    }
  const first = axes.map(({ values }) => values[0]);
  const last = axes.map(({ values }) => values[values.length - 1]);
  const seen = new Set<string>();
  for (const [k, { path, unit }] of axes.entries()) {
    for (const end of [first, last]) {
      // in a grid an end is tried beside both ends of the others: it is wrong only if it never fits
      const others = zip ? [end] : [first, last];
      const results = others.map((other) => at(other.map((value, j) => (j === k ? end[k] : value))));
      if (results.some((result) => result.ok)) continue;
      for (const problem of results[0].ok ? [] : results[0].problems) {
        const identity = `${problem.path} ${problem.expected} ${problem.found}`;
        if (seen.has(identity)) continue;
        seen.add(identity);
        const expected = `a case that is right with ${path} = ${written(end[k], unit)}`;
        problems.push(
          axisProblem(document, k, problem.code, expected, `${problem.path}: expected ${problem.expected}, found ${problem.found}`),
        );
      }
    }
  }
  return problems;
}

/** Varied entries that are gone once a later one is set. */
function excluded(base: Plain, axes: readonly Axis[]): { readonly k: number; readonly by: number }[] {
  let plain = base;
  for (const [by, { path, values, unit }] of axes.entries()) {
    const set = setPlain(plain, path.split('.'), written(values[0], unit));
    if (!set.ok) return [];
    plain = set.value;
    const gone = axes.slice(0, by).flatMap((axis, k) => {
      const there = getPlain(plain, axis.path.split('.'));
      return there === written(axis.values[0], axis.unit) ? [] : [{ k, by }];
    });
    if (gone.length > 0) return gone;
  }
  return [];
}

function repeated(values: Float64Array): number | null {
  const rising = values[values.length - 1] > values[0];
  // from, to and points give values in order: no need to sort a million of them
  if (values.every((value, i) => i === 0 || (rising ? value > values[i - 1] : value < values[i - 1]))) return null;
  const sorted = values.toSorted();
  const index = sorted.findIndex((value, i) => i > 0 && value === sorted[i - 1]);
  return index < 0 ? null : sorted[index];
}

function axisProblem(document: SourceDocument, k: number, code: ProblemCode, expected: string, found: string): Problem {
  const path = ['scan', 'vary', k, 'path'];
  return {
    code,
    ...locate(document, path),
    path: path.join('.'),
    expected,
    found: found.length > 200 ? clip(found) : found,
    nearest: null,
  };
}
