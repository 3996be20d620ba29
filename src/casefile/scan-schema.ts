import * as z from 'zod';
import { clip, nearestSpelling } from '../units/index.ts';
import { type AxisInput, axisOf, MOST_POINTS, settable } from './axis.ts';
import {
  type Adopt,
  across,
  type Bounds,
  choice,
  list,
  POSITIVE,
  pureNumber,
  quantity,
  type RawQuantity,
  type Report,
  section,
  undecidedQuantity,
} from './fields.ts';
import { keysAt, leafPaths, schemasAt } from './walk.ts';

/** `scan` of a case as validated. What kind of quantity an entry is depends on its neighbour, so quantities stay as they were written. */
export interface ScanInput {
  readonly vary?: readonly AxisInput[] | undefined;
  readonly zip?: boolean | undefined;
  readonly find?: FindInput | undefined;
}

export interface FindInput {
  readonly what: 'hold-off' | 'trip-delay' | 'series-resistance';
  readonly from: RawQuantity;
  readonly to: RawQuantity;
  readonly gap_energy?: number | undefined;
  readonly tolerance?: number | undefined;
}

const within = (max: number, text: string): Bounds => ({ above: 0, max, text });

/** the ends of the range that is searched, by what is searched for */
export const FIND_RANGE: Readonly<Record<FindInput['what'], z.ZodType<number, string>>> = {
  'hold-off': quantity('voltage', within(1e7, 'above 0 and up to 10 MV')),
  'trip-delay': quantity('time', within(1e9, 'above 0 and up to 1e9 s')),
  'series-resistance': quantity('resistance', within(1e18, 'above 0 and up to 1e18 ohm')),
};

/** entries that a search sets itself */
const SEARCHED: Readonly<Record<string, string>> = {
  'trip-delay': 'supply.trip.delay',
  'series-resistance': 'supply.series_resistance',
};

const MOST_AXES = 20;

const MIXTURE = 'gas.mixture.';

/** @param run  the schema of the entries that may be varied: a case without scan and history */
export function scanSchema(run: z.ZodType): z.ZodType<ScanInput> {
  return section(
    {
      vary: list(
        axisSchema(run),
        'a list of entries { path: …, values: […] } or { path: …, from: …, to: …, points: … }',
        1,
        MOST_AXES,
      ).optional(),
      zip: z.boolean({ error: () => 'true (the entries walk together) or false (a grid)' }).optional(),
      find: findSchema().optional(),
    },
    'many gaps at once, for `gapwake scan`: vary, find, or both; zip default false: a grid, its last entry fastest',
  )
    .check(
      across((_, report, { vary, find }) => {
        if (vary === undefined && find === undefined) report([], 'vary, find, or both', { code: 'missing-key', found: 'neither' });
      }),
    )
    .check(across((_, report, given) => checkTogether(given, report))) as unknown as z.ZodType<ScanInput>;
}

function axisSchema(run: z.ZodType): z.ZodType<AxisInput> {
  return section(
    {
      path: z.string({ error: () => 'the path of a quantity or plain number of the case, e.g. gas.pressure' }),
      values: list(undecidedQuantity(), 'a list of quantities, e.g. [350 V, 400 V]', 1, MOST_POINTS).optional(),
      from: undecidedQuantity().optional(),
      to: undecidedQuantity().optional(),
      points: pureNumber('a whole number', { min: 2, max: MOST_POINTS, text: `from 2 to ${MOST_POINTS}` }, 25, true).optional(),
      spacing: choice(['linear', 'log']).optional(),
    },
    'an entry to vary: values, or from, to and points; spacing default linear',
  ).check(across((sound, report, given, adopt) => checkAxis(run, sound, report, given, adopt))) as unknown as z.ZodType<AxisInput>;
}

type Entries = Readonly<Record<string, unknown>>;

function checkAxis(run: z.ZodType, sound: Entries, report: Report, given: Entries, adopt: Adopt): void {
  const range = ['from', 'to', 'points'];
  const form = 'either values, or from, to and points';
  const beside = [...range, 'spacing'].find((key) => given[key] !== undefined);
  if (given.values !== undefined) {
    if (beside !== undefined) report([beside], form, { code: 'either-or', found: `values and ${beside}` });
  } else if (beside === undefined) report([], form, { code: 'either-or', found: 'none of them' });
  else
    for (const key of range)
      if (given[key] === undefined) report([key], `${key}, required without values`, { code: 'missing-key', found: 'nothing' });

  if (typeof sound.path !== 'string') return;
  const leaf = settable(run, sound.path);
  if (leaf === null) refusePath(run, sound.path, report);
  else {
    const problem = axisOf(sound as Partial<AxisInput>, leaf, adopt);
    if (problem !== null && !problem.ok) report(problem.at, problem.expected, { code: 'inconsistent', found: problem.found });
  }
}

/** Says why a path leads to nothing that can be varied. */
function refusePath(run: z.ZodType, path: string, report: Report): void {
  const expected = 'the path of a quantity or plain number of the case';
  const keys = path.trim().split('.');
  if (keys[0] === 'scan' || keys[0] === 'history') {
    report(['path'], `${expected}, outside scan and history`, { code: 'unknown-key', found: clip(path) });
    return;
  }
  const above = keys.map((_, n) => keys.slice(0, n).join('.')).find((prefix) => prefix !== '' && settable(run, prefix) !== null);
  const there = schemasAt(run, keys);
  if (there.length === 0 && above !== undefined && keysAt(run, above.split('.')).length === 0) {
    report(['path'], expected, { code: 'unknown-key', found: `${clip(path)}, an entry inside the quantity ${above}`, nearest: above });
  } else if (there.length === 0) {
    report(['path'], expected, {
      code: 'unknown-key',
      found: clip(path) || 'nothing',
      nearest: nearestSpelling(path.trim(), leafPaths(run)),
    });
  } else {
    const inner = keysAt(run, keys);
    const what = inner.length > 0 ? `a mapping with the keys ${inner.join(', ')}` : there[0] instanceof z.ZodArray ? 'a list' : 'text';
    report(['path'], expected, { code: 'wrong-type', found: `${clip(path)}, ${what}` });
  }
}

function findSchema(): z.ZodType<FindInput> {
  return section(
    {
      what: choice(['hold-off', 'trip-delay', 'series-resistance']),
      from: undecidedQuantity(),
      to: undecidedQuantity(),
      gap_energy: quantity('energy', POSITIVE).optional(),
      tolerance: pureNumber('a relative width', { min: 1e-5, max: 0.1, text: 'from 1e-5 to 0.1' }, 1e-3).optional(),
    },
    'what to search for at each point, between from and to; tolerance default 0.1 %; gap_energy with trip-delay only',
  ).check(
    across((sound, report, given, adopt) => {
      const what = sound.what as FindInput['what'] | undefined;
      if (what === undefined) return;
      if (what === 'trip-delay' && given.gap_energy === undefined)
        report(['gap_energy'], 'gap_energy, required with what: trip-delay', { code: 'missing-key', found: 'nothing' });
      if (what !== 'trip-delay' && given.gap_energy !== undefined)
        report(['gap_energy'], 'gap_energy only with what: trip-delay', { code: 'either-or', found: `gap_energy with ${what}` });
      const [from, to] = ['from', 'to'].map((key) => {
        if (sound[key] === undefined) return Number.NaN;
        const read = FIND_RANGE[what].safeParse(sound[key]);
        if (!read.success) adopt([key], read.error.issues);
        return read.data ?? Number.NaN;
      });
      if (from >= to) report(['to'], 'an end above from', { code: 'inconsistent' });
    }),
  ) as unknown as z.ZodType<FindInput>;
}

/** Lengths, sizes and repetitions across the entries that are varied. */
function checkTogether({ vary, zip, find }: Entries, report: Report): void {
  const axes = (Array.isArray(vary) ? vary : []) as Partial<AxisInput>[];
  const what = (find as Partial<Record<'what', unknown>> | null | undefined)?.what;
  const searched = typeof what === 'string' && Object.hasOwn(SEARCHED, what) ? SEARCHED[what] : null;
  const paths = axes.map((axis) => (typeof axis?.path === 'string' ? axis.path.trim() : null));
  for (const [k, path] of paths.entries()) {
    if (path !== null && paths.indexOf(path) < k)
      report(['vary', k, 'path'], 'every path once', { code: 'inconsistent', found: `${clip(path)} again` });
    if (path !== null && path === searched)
      report(['vary', k, 'path'], 'an entry that find does not search for', { code: 'inconsistent', found: path });
  }
  const fractions = paths.flatMap((path, k) => (path?.startsWith(MIXTURE) ? [k] : []));
  if (fractions.length > 0 && (fractions.length === 1 || zip !== true)) {
    const found = fractions.length === 1 ? `${clip(paths[fractions[0]] ?? '')} alone` : 'fractions in a grid';
    const expected =
      'the other fractions of gas.mixture varied with it, as entries of their own with zip: true, so that they sum to 1 at every point';
    report(['vary', fractions[0], 'path'], expected, { code: 'inconsistent', found });
  }
  const lengths = axes.map((axis) =>
    Array.isArray(axis?.values) ? axis.values.length : typeof axis?.points === 'number' ? axis.points : 1,
  );
  if (zip === true) {
    const other = lengths.findIndex((length) => length !== lengths[0]);
    if (other >= 0)
      report(['vary', other], `${lengths[0]} values, as many as the first entry has (zip: true)`, {
        code: 'inconsistent',
        found: `${lengths[other]}`,
      });
  } else {
    const points = lengths.reduce((product, length) => product * length, 1);
    if (points > MOST_POINTS) report(['vary'], `at most ${MOST_POINTS} points in all`, { code: 'too-large', found: `${points}` });
  }
}
