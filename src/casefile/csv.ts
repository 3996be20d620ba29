import { clip, DIMENSIONS, type DimensionName, expectation, nearestSpelling, sameExponents, unitFactor } from '../units/index.ts';

const MAX_ROWS = 1_000_000;
/** more mistakes than this in one table are one mistake made many times */
const MAX_PROBLEMS = 20;
/** a number as a table may hold it */
export const NUMBER: RegExp = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

/** A column that a case asks for: its name in the case, its header in the file, and what it may hold. */
export interface ColumnRequest {
  readonly key: string;
  readonly header: string;
  /** given in the case; null where the header must carry it */
  readonly unit: string | null;
  readonly dimensions: readonly DimensionName[];
}

export interface Column {
  /** SI */
  readonly values: readonly number[];
  readonly dimension: DimensionName;
}

export interface CsvProblem {
  /** 1-based, in the file; null for the case's own entry under `key` */
  readonly line: number | null;
  readonly column: number | null;
  /** the requested column concerned, null for the table as a whole */
  readonly key: string | null;
  readonly expected: string;
  readonly found: string;
  readonly nearest: string | null;
}

export type CsvResult =
  | { readonly ok: true; readonly columns: readonly Column[] }
  | { readonly ok: false; readonly problems: readonly CsvProblem[] };

/** Reads the requested columns of a CSV text into SI.
 *
 *  A header, commas, decimal points, `#` comments; a unit in brackets in the header (`bias [kV]`) or in the request.
 *  The first requested column must rise strictly; at least two rows, every number finite. All problems are returned, at most 20. */
export function readCsv(text: string, requests: readonly ColumnRequest[]): CsvResult {
  const problems: CsvProblem[] = [];
  const add = (
    line: number | null,
    column: number | null,
    key: string | null,
    expected: string,
    found: string,
    nearest: string | null = null,
  ): void => {
    if (problems.length < MAX_PROBLEMS) problems.push({ line, column, key, expected, found, nearest });
  };
  const fail = (): CsvResult => ({ ok: false, problems });

  const rows = dataLines(text.startsWith('\ufeff') ? text.slice(1) : text);
  const first = rows.next();
  if (first.done) {
    add(null, null, null, 'a header and at least two rows', 'no header');
    return fail();
  }
  const header = splitFields(first.value.text).map((field) => ({ ...readHeader(field.text), column: field.column }));
  const names = header.map((h) => h.name);
  for (const [i, name] of names.entries()) {
    if (names.indexOf(name) < i) add(first.value.line, header[i].column, null, 'every column name once', `${clip(name)} again`);
  }
  const picks = requests.map((request) => {
    const index = names.indexOf(request.header);
    if (index < 0) {
      add(
        null,
        null,
        request.key,
        `a column of the table (${names.slice(0, 8).map(clip).join(', ')})`,
        clip(request.header),
        nearestSpelling(request.header, names),
      );
      return null;
    }
    const inHeader = header[index].unit;
    if (inHeader === null && request.unit === null && !request.dimensions.includes('number')) {
      add(
        first.value.line,
        header[index].column,
        request.key,
        `a unit in the header, as in ${clip(request.header)} [${DIMENSIONS[request.dimensions[0]].unit}], or in the case`,
        `${clip(request.header)} without a unit`,
      );
      return null;
    }
    if (inHeader !== null && request.unit !== null && inHeader.trim() !== request.unit.trim()) {
      add(null, null, request.key, `no second unit beside [${clip(inHeader)}] in the header`, clip(request.unit));
      return null;
    }
    const unit = inHeader ?? request.unit;
    const place: [number | null, number | null] = inHeader === null ? [null, null] : [first.value.line, header[index].column];
    const factor = unit === null ? ({ ok: true, factor: 1, exponents: DIMENSIONS.number.exponents } as const) : unitFactor(unit);
    if (!factor.ok) {
      add(
        ...place,
        request.key,
        factor.expected === 'a unit' ? `the unit of ${expectation(request.dimensions)}` : factor.expected,
        factor.found,
        factor.nearest,
      );
      return null;
    }
    const dimension = request.dimensions.find((name) => sameExponents(DIMENSIONS[name].exponents, factor.exponents));
    if (dimension === undefined) {
      add(...place, request.key, `the unit of ${expectation(request.dimensions)}`, clip(unit ?? ''));
      return null;
    }
    return { key: request.key, index, factor: factor.factor, dimension, values: [] as number[] };
  });
  if (picks.includes(null)) return fail();
  const columns = picks as Exclude<(typeof picks)[number], null>[];

  let count = 0;
  for (const { line, text: rowText } of rows) {
    if (problems.length >= MAX_PROBLEMS) break;
    if (++count > MAX_ROWS) {
      add(line, 1, null, 'at most 1000000 rows', 'more');
      break;
    }
    const fields = splitFields(rowText);
    if (fields.length !== header.length) {
      add(line, 1, null, `${header.length} fields, as in the header`, `${fields.length}`);
      continue;
    }
    for (const [k, pick] of columns.entries()) {
      const field = fields[pick.index];
      const value = NUMBER.test(field.text) ? Number(field.text) * pick.factor : Number.NaN;
      if (!Number.isFinite(value)) {
        add(line, field.column, pick.key, 'a finite number with a decimal point', clip(field.text) || 'nothing');
      } else if (k === 0 && pick.values.length > 0 && !(value > pick.values[pick.values.length - 1])) {
        add(line, field.column, pick.key, 'strictly rising values', `${clip(field.text)} after a value not below it`);
      }
      pick.values.push(value);
    }
  }
  if (count < 2) add(null, null, null, 'at least two rows', `${count}`);
  return problems.length > 0 ? fail() : { ok: true, columns: columns.map(({ values, dimension }) => ({ values, dimension })) };
}

export interface Field {
  readonly text: string;
  /** 1-based */
  readonly column: number;
}

/** The lines that carry data, with their numbers; comments and blank lines left out. */
export function* dataLines(text: string): Generator<{ readonly line: number; readonly text: string }, undefined> {
  let start = 0;
  for (let line = 1; start < text.length; line++) {
    const newline = text.indexOf('\n', start);
    const end = newline < 0 ? text.length : newline;
    const raw = text.slice(start, end);
    const content = withoutComment(raw);
    if (content.trim() !== '') yield { line, text: content };
    start = end + 1;
  }
  return undefined;
}

function withoutComment(line: string): string {
  let quoted = false;
  if (!line.includes('#')) return line;
  for (let i = 0; i < line.length; i++) {
    if (line[i] === '"') quoted = !quoted;
    else if (line[i] === '#' && !quoted) return line.slice(0, i);
  }
  return line;
}

/** Fields between commas, trimmed; a field in double quotes may hold commas, and "" for a quote. */
export function splitFields(line: string): Field[] {
  const fields: Field[] = [];
  let start = 0;
  let quoted = false;
  for (let i = 0; i <= line.length; i++) {
    if (line[i] === '"') quoted = !quoted;
    if (i < line.length && (line[i] !== ',' || quoted)) continue;
    const raw = line.slice(start, i);
    const trimmed = raw.trim();
    const text =
      trimmed.length >= 2 && trimmed.startsWith('"') && trimmed.endsWith('"') ? trimmed.slice(1, -1).replaceAll('""', '"').trim() : trimmed;
    fields.push({ text, column: start + (raw.length - raw.trimStart().length) + 1 });
    start = i + 1;
  }
  return fields;
}

export function readHeader(text: string): { name: string; unit: string | null } {
  const match = /^(.*?)\s*\[([^[\]]*)\]$/.exec(text);
  return match ? { name: match[1], unit: match[2] } : { name: text, unit: null };
}
