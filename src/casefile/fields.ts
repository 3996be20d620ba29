import * as z from 'zod';
import { _check } from 'zod/v4/core';
import { DIMENSIONS, type DimensionName, expectation, parseAnyOf, type QuantityError } from '../units/index.ts';
import { type Column, readCsv } from './csv.ts';
import type { ProblemCode } from './problem.ts';

/** The building blocks of the case's schema.
 *
 *  Every schema's error message says what is expected, in the words a problem uses; what was found, where and the nearest
 *  spelling are added from the document (issues.ts). Checks add issues whose `params` are an `IssueDetail`. */
export interface IssueDetail {
  readonly code: ProblemCode;
  readonly found?: string;
  readonly nearest?: string | null;
  /** characters into the value's text */
  readonly offset?: number;
  /** a place in another file */
  readonly table?: { readonly file: string; readonly line: number | null; readonly column: number | null };
}

/** Bounds of a number or quantity in SI, with the words for them. */
export interface Bounds {
  readonly above?: number;
  readonly min?: number;
  readonly max?: number;
  /** completes "a length …" */
  readonly text: string;
  /** in place of that of the dimension */
  readonly example?: string;
}

/** A quantity that may be of several kinds: which one it was decides how it is converted. */
export interface Dimensioned {
  readonly value: number;
  readonly dimension: DimensionName;
}

/** A table that was read: columns in SI, in the order of the request, and the file they came from. */
export interface LoadedTable {
  readonly file: string;
  readonly text: string;
  readonly columns: readonly Column[];
}

/** What a case's tables are read with: the text of a file, or why there is none. */
export type TableReader = (
  relativePath: string,
) => { readonly ok: true; readonly text: string } | { readonly ok: false; readonly reason: string };

/** What a quantity or plain number accepts: a scan needs to know it of the entries it varies. */
export interface Leaf {
  readonly dimensions: readonly DimensionName[];
  /** whole numbers only */
  readonly whole: boolean;
}

const LEAVES = new WeakMap<z.core.$ZodType, Leaf>();

/** The leaf that a schema stands for, null where it is no quantity and no plain number. */
export function leafOf(schema: z.core.$ZodType): Leaf | null {
  return LEAVES.get(schema) ?? null;
}

function leaf<Schema extends z.ZodType>(schema: Schema, dimensions: readonly DimensionName[], whole = false): Schema {
  LEAVES.set(schema, { dimensions, whole });
  return schema;
}

export const POSITIVE: Bounds = { above: 0, text: 'above 0' };
export const NOT_NEGATIVE: Bounds = { min: 0, text: 'not below 0' };

/** Whether a value in SI lies within bounds. */
export function isWithin(value: number, bounds: Bounds | undefined): boolean {
  if (!bounds) return true;
  const { above = Number.NEGATIVE_INFINITY, min = Number.NEGATIVE_INFINITY, max = Number.POSITIVE_INFINITY } = bounds;
  return value > above && value >= min && value <= max;
}

type Issues = { addIssue(issue: { code: 'custom'; message: string; params: IssueDetail }): void };

function refuse(ctx: z.RefinementCtx, message: string, params: IssueDetail): typeof z.NEVER {
  (ctx as unknown as Issues).addIssue({ code: 'custom', message, params });
  return z.NEVER;
}

function refuseQuantity(ctx: z.RefinementCtx, error: QuantityError, bounds: Bounds | undefined): typeof z.NEVER {
  const expected = withBounds(error.expected, bounds);
  return refuse(ctx, expected, { code: error.code, found: error.found, nearest: error.nearest, offset: error.column - 1 });
}

/** An expectation of a kind of quantity, with its bounds and their example. */
function withBounds(expected: string, bounds: Bounds | undefined): string {
  if (bounds === undefined) return expected;
  return expected.replace(/, e\.g\. (.*)/, (_, example: string) => ` ${bounds.text}, e.g. ${bounds.example ?? example}`);
}

/** `a length above 0, e.g. 6 mm` */
function wanted(dimensions: readonly DimensionName[], bounds: Bounds | undefined): string {
  return withBounds(expectation(dimensions), bounds);
}

/** A quantity of one kind; its value in SI. */
export function quantity(dimension: DimensionName, bounds?: Bounds): z.ZodType<number, string> {
  const expected = wanted([dimension], bounds);
  const schema = z
    .string({ error: () => expected })
    .meta({ description: expected, examples: [bounds?.example ?? DIMENSIONS[dimension].example] })
    .transform((text, ctx): number => {
      const read = parseAnyOf(text, [dimension]);
      if (!read.ok) return refuseQuantity(ctx, read, bounds);
      if (!isWithin(read.value, bounds)) return refuse(ctx, expected, { code: 'out-of-range' });
      return read.value;
    });
  return leaf(schema, [dimension]);
}

/** A quantity of one of several kinds. `hint` replaces the message where the kind found is `hint.on`. */
export function quantityOf(
  dimensions: readonly DimensionName[],
  bounds?: Bounds,
  hint?: { readonly on: DimensionName; readonly expected: string },
): z.ZodType<Dimensioned, string> {
  const expected = wanted(dimensions, bounds);
  const schema = z
    .string({ error: () => expected })
    .meta({ description: expected, examples: dimensions.map((name) => DIMENSIONS[name].example) })
    .transform((text, ctx): Dimensioned => {
      const read = parseAnyOf(text, dimensions);
      if (!read.ok) {
        if (hint && parseAnyOf(text, [hint.on]).ok) {
          return refuse(ctx, hint.expected, { code: 'wrong-dimension', found: read.found, offset: read.column - 1 });
        }
        return refuseQuantity(ctx, read, bounds);
      }
      if (!isWithin(read.value, bounds)) return refuse(ctx, expected, { code: 'out-of-range' });
      return { value: read.value, dimension: read.dimension };
    });
  return leaf(schema, dimensions);
}

/** A pure number, `0.02` or `2 %`. */
export function pureNumber(text: string, bounds: Bounds, example: number, whole = false): z.ZodType<number, number | string> {
  const expected = `${text} ${bounds.text}, e.g. ${example}`;
  const schema = z
    .union([z.number().meta({ examples: [example] }), z.string()], { error: () => expected })
    .meta({ description: expected })
    .transform((given, ctx): number => {
      const read = typeof given === 'number' ? ({ ok: true, value: given } as const) : parseAnyOf(given, ['number']);
      if (!read.ok) return refuse(ctx, expected, { code: read.code, found: read.found, nearest: read.nearest, offset: read.column - 1 });
      if (!isWithin(read.value, bounds) || (whole && !Number.isInteger(read.value))) return refuse(ctx, expected, { code: 'out-of-range' });
      return read.value;
    });
  return leaf(schema, ['number'], whole);
}

/** A quantity whose kind another entry decides: text or a number, checked there. */
export function undecidedQuantity(): z.ZodType<RawQuantity> {
  return z.union([z.string(), z.number()], { error: () => 'a quantity, e.g. 1.2 Torr' });
}

export type RawQuantity = string | number;

/** A list of `least` to `most` items. The library's own limits also look at mappings with a key `length`. */
export function list<Item extends z.ZodType>(item: Item, expected: string, least: number, most: number): z.ZodType<z.output<Item>[]> {
  return z
    .array(item, { error: () => expected })
    .refine((items) => items.length >= least, { error: () => `at least ${least === 1 ? 'one item' : `${least} items`}`, abort: true })
    .refine((items) => items.length <= most, { error: () => `at most ${most} items` })
    .meta({ minItems: least, maxItems: most });
}

/** One of a few names. */
export function choice<const Names extends readonly [string, ...string[]]>(
  names: Names,
  example: string = names[0],
): z.ZodType<Names[number], string> {
  const list = names.length === 1 ? names[0] : `${names.slice(0, -1).join(', ')} or ${names[names.length - 1]}`;
  return z.enum(names, { error: () => list }).meta({ examples: [example] }) as unknown as z.ZodType<Names[number], string>;
}

/** A mapping with exactly these keys. */
export function section<Shape extends z.core.$ZodLooseShape>(shape: Shape, description: string): z.ZodObject<Shape, z.core.$strict> {
  const keys = Object.keys(shape).join(', ');
  return z.strictObject(shape, { error: () => `a mapping with the keys ${keys}` }).meta({ description });
}

type Entries = Readonly<Record<string, unknown>>;

/** A check across the keys of a mapping. It runs even if single keys are wrong, so that every mistake is reported at once.
 *
 *  @param check  sees the entries without the wrong ones (`sound`), and which are there at all (`given`); `adopt` takes over what another
 *                schema finds wrong with an entry */
export function across(check: (sound: Entries, report: Report, given: Entries, adopt: Adopt) => void): z.core.$ZodCheck<unknown> {
  return _check<unknown>(
    (payload) => {
      const given = payload.value as Entries;
      const sound = payload.issues.reduce((value, issue) => without(value, issue.path ?? []), given);
      check(
        sound,
        (path, expected, detail) => {
          payload.issues.push({
            code: 'custom',
            input: payload.value,
            path: [...path],
            message: expected,
            params: { ...detail },
            continue: true,
          } as never);
        },
        given,
        (path, issues) => {
          for (const issue of issues)
            payload.issues.push({ ...issue, input: payload.value, path: [...path, ...issue.path], continue: true } as never);
        },
      );
    },
    { when: (payload) => typeof payload.value === 'object' && payload.value !== null && !Array.isArray(payload.value) },
  );
}

/** A copy without the entry at a path. */
function without(value: Entries, path: readonly PropertyKey[]): Entries {
  if (path.length === 0 || typeof value !== 'object' || value === null || Array.isArray(value)) return value;
  const key = String(path[0]);
  const { [key]: inner, ...rest } = value;
  if (path.length === 1 || typeof inner !== 'object' || inner === null || Array.isArray(inner)) return rest;
  return { ...rest, [key]: without(inner as Entries, path.slice(1)) };
}

export type Adopt = (path: readonly PropertyKey[], issues: readonly z.core.$ZodIssue[]) => void;

export type Report = (path: readonly PropertyKey[], expected: string, detail: IssueDetail) => void;

/** Reports unless exactly one of the arms is there. */
export function exactlyOne(arms: readonly string[]): z.core.$ZodCheck<unknown> {
  return across((_, report, entries) => {
    const given = arms.filter((arm) => entries[arm] !== undefined);
    const expected = `exactly one of ${arms.slice(0, -1).join(', ')} and ${arms[arms.length - 1]}`;
    if (given.length === 0) report([], expected, { code: 'either-or', found: 'none of them' });
    if (given.length > 1) report([given[1]], expected, { code: 'either-or', found: given.join(' and ') });
  });
}

export interface ColumnField {
  readonly key: string;
  readonly dimensions: readonly DimensionName[];
  /** bounds on each value in SI */
  readonly bounds?: Bounds;
}

/** A table in a CSV file; the first column must rise. */
export function table(reader: TableReader, fields: readonly ColumnField[]): z.ZodType<LoadedTable> {
  const column = z
    .union([z.string(), z.strictObject({ column: z.string(), unit: z.string() })], {
      error: () => 'a column of the table, or { column: NAME, unit: UNIT }',
    })
    .meta({ examples: ['bias', { column: 'bias', unit: 'kV' }] });
  const shape = {
    file: z.string({ error: () => 'the name of a CSV file, relative to the case file' }),
    ...Object.fromEntries(fields.map((f) => [f.key, column])),
  };
  // a case is validated again at every point of a scan: its tables are read once
  const known = new Map<string, LoadedTable>();
  return section(shape, 'columns of a CSV file').transform((given, ctx): LoadedTable => {
    const spec = given as { file: string } & Record<string, string | { column: string; unit: string }>;
    const identity = JSON.stringify(spec);
    const before = known.get(identity);
    if (before) return before;
    let sound = true;
    const failure = { file: spec.file, text: '', columns: [] };
    const report = (path: string[], message: string, params: IssueDetail): void => {
      sound = false;
      ctx.addIssue({ code: 'custom', message, path, params: { ...params } });
    };
    const read = reader(spec.file);
    if (!read.ok) {
      report(['file'], 'a CSV file that can be read', { code: 'unreadable', found: read.reason });
      return failure;
    }
    const requests = fields.map(({ key, dimensions }) => {
      const entry = spec[key];
      return typeof entry === 'string'
        ? { key, header: entry, unit: null, dimensions }
        : { key, header: entry.column, unit: entry.unit, dimensions };
    });
    const csv = readCsv(read.text, requests);
    if (!csv.ok) {
      for (const { line, column, key, expected, found, nearest } of csv.problems) {
        const elsewhere = line !== null || key === null;
        report(key === null ? ['file'] : [key], expected, {
          code: 'table',
          found,
          nearest,
          ...(elsewhere ? { table: { file: spec.file, line, column } } : {}),
        });
      }
      return failure;
    }
    for (const [k, { key, bounds }] of fields.entries()) {
      const bad = csv.columns[k].values.findIndex((value) => !isWithin(value, bounds));
      if (bad >= 0)
        report([key], `values ${bounds?.text}`, { code: 'out-of-range', found: `${csv.columns[k].values[bad]} in SI, row ${bad + 1}` });
    }
    const loaded: LoadedTable = { file: spec.file, text: read.text, columns: csv.columns };
    if (sound) known.set(identity, loaded);
    return loaded;
  });
}
