import type * as z from 'zod';
import type { Axis } from '../study.ts';
import { clip, DIMENSIONS, type DimensionName } from '../units/index.ts';
import { type Adopt, type Dimensioned, leafOf, type RawQuantity } from './fields.ts';
import { schemasAt } from './walk.ts';

/** An entry of `scan.vary`. */
export interface AxisInput {
  readonly path: string;
  readonly values?: readonly RawQuantity[] | undefined;
  readonly from?: RawQuantity | undefined;
  readonly to?: RawQuantity | undefined;
  readonly points?: number | undefined;
  readonly spacing?: 'linear' | 'log' | undefined;
}

/** of one scan */
export const MOST_POINTS = 1_000_000;
/** more mistakes than this in one list are one mistake made many times */
const MOST_PROBLEMS = 20;

type Leaf = z.core.$ZodType;

/** The validator of the quantity or plain number at a path, null where there is none. */
export function settable(run: z.ZodType, path: string): Leaf | null {
  return schemasAt(run, path.trim().split('.')).find((schema) => leafOf(schema) !== null) ?? null;
}

export type AxisResult =
  | { readonly ok: true; readonly axis: Axis }
  | { readonly ok: false; readonly at: readonly PropertyKey[]; readonly expected: string; readonly found: string };

/** The values of a varied entry, each checked by the validator of the very entry it is for.
 *
 *  Linear: (from (n−1−i) + to i)/(n−1); log: from (to/from)^(i/(n−1)); the ends exactly as given.
 *  @param input  keys that are missing or wrong are left out
 *  @param adopt  is told what the validator finds wrong with a value
 *  @returns null where something is missing or wrong already */
export function axisOf(input: Partial<AxisInput>, leaf: Leaf, adopt: Adopt): AxisResult | null {
  const path = (input.path ?? '').trim();
  const { whole = false } = leafOf(leaf) ?? {};
  if (input.values !== undefined) {
    const values = readAll(input.values, ['values'], leaf, adopt);
    if (values === null) return null;
    const other = values.findIndex(({ dimension }) => dimension !== values[0].dimension);
    if (other >= 0) return refuse(['values', other], 'values of one kind', kind(values[other].dimension), kind(values[0].dimension));
    return made(
      path,
      values[0].dimension,
      Float64Array.from(values, ({ value }) => value),
    );
  }
  // both, so that both are told what is wrong with them
  const [from, to] = (['from', 'to'] as const).map((key) => {
    const raw = input[key];
    return raw === undefined ? null : (readAll([raw], null, leaf, (at, issues) => adopt([key, ...at], issues))?.[0] ?? null);
  });
  const { points, spacing = 'linear' } = input;
  if (from === null || to === null) return null;
  if (from.dimension !== to.dimension) return refuse(['to'], 'values of one kind', kind(to.dimension), kind(from.dimension));
  if (from.value === to.value) return refuse(['to'], 'an end that differs from `from`', clip(String(input.to)));
  if (spacing === 'log' && !(from.value * to.value > 0)) {
    const zero = from.value === 0 || to.value === 0;
    return refuse([from.value === 0 ? 'from' : 'to'], 'ends on one side of 0 with spacing: log', zero ? '0' : 'ends on both sides');
  }
  if (points === undefined) return null;
  const values = spacing === 'log' ? logarithmic(from.value, to.value, points) : linear(from.value, to.value, points);
  if (whole && !values.every(Number.isInteger)) {
    const broken = values.find((value) => !Number.isInteger(value));
    return refuse(['points'], `a number of points that makes every value of ${path} whole`, `${broken} among them`);
  }
  return made(path, from.dimension, values);
}

function refuse(at: readonly PropertyKey[], expected: string, found: string, beside?: string): AxisResult {
  return { ok: false, at, expected, found: beside === undefined ? found : `${found} beside ${beside}` };
}

function made(path: string, dimension: DimensionName, values: Float64Array): AxisResult {
  return { ok: true, axis: { path, unit: DIMENSIONS[dimension].unit || '1', values } };
}

const kind = (dimension: DimensionName): string => DIMENSIONS[dimension].name;

/** Values in SI, null where one is wrong. */
function readAll(raw: readonly RawQuantity[], at: readonly PropertyKey[] | null, leaf: Leaf, adopt: Adopt): Dimensioned[] | null {
  const [first] = leafOf(leaf)?.dimensions ?? [];
  let wrong = 0;
  const values: Dimensioned[] = [];
  for (const [i, value] of raw.entries()) {
    const read = (leaf as z.ZodType<number | Dimensioned>).safeParse(value);
    if (read.success) values.push(typeof read.data === 'number' ? { value: read.data, dimension: first } : read.data);
    else if (wrong++ < MOST_PROBLEMS) adopt(at === null ? [] : [...at, i], read.error.issues);
  }
  return wrong > 0 ? null : values;
}

function linear(from: number, to: number, points: number): Float64Array {
  const last = points - 1;
  return spaced(from, to, points, (i) => (from * (last - i) + to * i) / last);
}

function logarithmic(from: number, to: number, points: number): Float64Array {
  const step = Math.log(to / from) / (points - 1);
  return spaced(from, to, points, (i) => from * Math.exp(step * i));
}

/** Values by index; the ends as given, and rounding carries none past an end that a validator has accepted. */
function spaced(from: number, to: number, points: number, valueAt: (i: number) => number): Float64Array {
  const [low, high] = [Math.min(from, to), Math.max(from, to)];
  const values = new Float64Array(points);
  for (let i = 1; i < points - 1; i++) values[i] = Math.min(high, Math.max(low, valueAt(i)));
  values[0] = from;
  values[points - 1] = to;
  return values;
}
