import * as z from 'zod';
import { ATMOSPHERE_RANGE } from '../surroundings/atmosphere.ts';
import { type DatasetReader, dataset, type LoadedSeries } from './dataset.ts';
import {
  across,
  type Bounds,
  exactlyOne,
  type LoadedTable,
  list,
  NOT_NEGATIVE,
  pureNumber,
  quantity,
  type Report,
  section,
  type TableReader,
  table,
} from './fields.ts';

/** `history` of a case as validated: SI values, tables and data sets read, no defaults filled in. */
export interface HistoryInput {
  readonly duration?: number | undefined;
  readonly pressure: {
    readonly table?: LoadedTable | undefined;
    readonly dataset?: LoadedSeries | undefined;
    readonly ascent?: AscentInput | undefined;
    readonly bay?: BayInput | undefined;
  };
  readonly temperature?: number | { readonly table: LoadedTable } | undefined;
  readonly voltage?: number | { readonly table: LoadedTable } | undefined;
  readonly margin?: number | undefined;
}

export interface AscentInput {
  readonly from: number;
  readonly to: number;
  readonly rate: number;
}

export interface OutsideInput {
  readonly pressure?: number | undefined;
  readonly table?: LoadedTable | undefined;
  readonly ascent?: AscentInput | undefined;
}

export interface BayInput {
  readonly volume: number;
  readonly start: number;
  readonly outside?: OutsideInput | undefined;
  readonly vents?:
    | readonly {
        readonly diameter: number;
        readonly length: number;
        readonly count?: number | undefined;
        readonly discharge_coefficient?: number | undefined;
      }[]
    | undefined;
  readonly pump?: { readonly speed: number; readonly base_pressure?: number | undefined } | undefined;
  readonly gas_load?: number | undefined;
  readonly outgassing?: readonly { readonly area: number; readonly rate_at_1h: number; readonly exponent: number }[] | undefined;
}

export interface HistoryContext {
  readonly reader: TableReader;
  readonly datasets: DatasetReader;
  /** of gas.temperature */
  readonly temperature: Bounds;
  /** of supply.voltage */
  readonly voltage: Bounds;
}

/** a history reaches pressures at which no gap is computed, vacuum included */
const PRESSURE: Bounds = { min: 0, max: 1e6, text: 'from 0 Pa to 1e6 Pa' };
const ALTITUDE: Bounds = { min: 0, max: ATMOSPHERE_RANGE.highest, text: `from 0 to ${ATMOSPHERE_RANGE.highest / 1e3} km` };
const MOST_PARTS = 100;

export function historySchema(context: HistoryContext): z.ZodType<HistoryInput> {
  const { reader } = context;
  return section(
    {
      duration: quantity('time', { above: 0, max: 1e10, text: 'above 0 and up to 1e10 s' }).optional(),
      pressure: section(
        {
          table: pressureTable(reader).optional(),
          dataset: dataset(context.datasets, 'pressure', PRESSURE).optional(),
          ascent: ascentSchema().optional(),
          bay: baySchema(reader).optional(),
        },
        'a table, a data set of an HDF5 file, an ascent through the standard atmosphere, or a bay',
      ).check(exactlyOne(['table', 'dataset', 'ascent', 'bay'])),
      temperature: steadyOrTable(reader, 'temperature', context.temperature, 'e.g. 295 K').optional(),
      voltage: steadyOrTable(reader, 'voltage', context.voltage, 'e.g. 400 V').optional(),
      margin: pureNumber('a factor on the voltage', { min: 1, max: 100, text: 'from 1 to 100' }, 1.5).optional(),
    },
    "pressure around the gap in time, for `gapwake window`; temperature default gas.temperature, voltage the supply's largest, margin 1.5",
  )
    .check(across((sound, report, given) => checkDuration(sound, report, given)))
    .check(
      across(({ voltage }, report) => {
        const rows = (voltage as { table?: LoadedTable } | undefined)?.table?.columns?.[1]?.values;
        if (voltage === 0) report(['voltage'], 'a voltage that differs from 0 V', { code: 'inconsistent' });
        if (rows?.every((v) => v === 0))
          report(['voltage', 'table', 'voltage'], 'a voltage that differs from 0 V at some time', {
            code: 'inconsistent',
            found: '0 V in every row',
          });
      }),
    ) as unknown as z.ZodType<HistoryInput>;
}

function checkDuration(sound: Readonly<Record<string, unknown>>, report: Report, given: Readonly<Record<string, unknown>>): void {
  if (given.duration !== undefined) return;
  const { pressure, temperature, voltage } = given as Partial<HistoryInput>;
  const isTable = (entry: unknown): boolean => typeof entry === 'object' && entry !== null && 'table' in entry;
  if (typeof pressure !== 'object' || pressure === null) return;
  const allRows =
    ('table' in pressure || 'dataset' in pressure) && [temperature, voltage].every((entry) => entry === undefined || isTable(entry));
  if (!allRows) report(['duration'], 'duration, required unless every entry is a table', { code: 'missing-key', found: 'nothing' });
  else if ((lastTime(sound as Partial<HistoryInput>) ?? 1) <= 0)
    report(['duration'], 'duration, required where the tables end at 0 s or before', { code: 'missing-key', found: 'nothing' });
}

/** The latest time of any row of a history [s], null where it has none. */
export function lastTime({ pressure, temperature, voltage }: Partial<HistoryInput>): number | null {
  const tables = [pressure, temperature, voltage].map((entry) =>
    typeof entry === 'object' ? entry?.table?.columns?.[0]?.values : undefined,
  );
  const ends = [...tables, pressure?.dataset?.times].flatMap((times) => (times && times.length > 0 ? [times[times.length - 1]] : []));
  return ends.length === 0 ? null : Math.max(...ends);
}

function pressureTable(reader: TableReader): z.ZodType<LoadedTable> {
  return table(reader, [
    { key: 'time', dimensions: ['time'] },
    { key: 'pressure', dimensions: ['pressure'], bounds: PRESSURE },
  ]);
}

function steadyOrTable(reader: TableReader, kind: 'temperature' | 'voltage', bounds: Bounds, example: string): z.ZodType {
  const rows = table(reader, [
    { key: 'time', dimensions: ['time'] },
    { key: kind, dimensions: [kind], bounds },
  ]);
  return z.union([quantity(kind, bounds), section({ table: rows }, `${kind} against time`)], {
    error: () => `a ${kind}, ${example}, or { table: … }`,
  });
}

function ascentSchema(): z.ZodType<AscentInput> {
  return section(
    {
      from: quantity('length', ALTITUDE),
      to: quantity('length', ALTITUDE),
      rate: quantity('velocity', { min: -1e5, max: 1e5, text: 'of at most 100 km/s either way' }),
    },
    'a climb or descent through the U.S. Standard Atmosphere, 1976, then held at `to`',
  ).check(
    across(({ from, to, rate }, report) => {
      const [start, end, speed] = [from, to, rate] as (number | undefined)[];
      if (start !== undefined && start === end) report(['to'], 'an altitude that differs from `from`', { code: 'inconsistent' });
      else if (start !== undefined && end !== undefined && speed !== undefined && !((end - start) * speed > 0))
        report(['rate'], `a rate ${end > start ? 'above' : 'below'} 0, which leads from \`from\` to \`to\``, { code: 'inconsistent' });
    }),
  ) as unknown as z.ZodType<AscentInput>;
}

function baySchema(reader: TableReader): z.ZodType<BayInput> {
  const length = { max: 100, text: 'above 0 and up to 100 m' };
  return section(
    {
      volume: quantity('volume', { above: 0, max: 1e6, text: 'above 0 and up to 1e6 m^3' }),
      start: quantity('pressure', PRESSURE),
      outside: section(
        { pressure: quantity('pressure', PRESSURE).optional(), table: pressureTable(reader).optional(), ascent: ascentSchema().optional() },
        'the pressure beyond the vents',
      )
        .check(exactlyOne(['pressure', 'table', 'ascent']))
        .optional(),
      vents: list(
        section(
          {
            diameter: quantity('length', { above: 0, ...length }),
            length: quantity('length', { min: 0, max: 100, text: 'from 0 (a thin hole) to 100 m' }),
            count: pureNumber('a whole number', { min: 1, max: 1e6, text: 'from 1 to 1e6' }, 4, true).optional(),
            discharge_coefficient: pureNumber('a number', { above: 0, max: 1, text: 'above 0 and up to 1' }, 0.7).optional(),
          },
          'round openings; length 0: a thin hole; count default 1, discharge_coefficient default 0.7',
        ),
        'a list of vents { diameter: …, length: … }',
        0,
        MOST_PARTS,
      ).optional(),
      pump: section(
        {
          speed: quantity('volumeRate', { above: 0, max: 1e6, text: 'above 0 and up to 1e6 m^3/s' }),
          base_pressure: quantity('pressure', PRESSURE).optional(),
        },
        'speed at the bay, lines included; base_pressure default 0 Pa',
      ).optional(),
      gas_load: quantity('gasFlow', { min: 0, max: 1e9, text: 'from 0 to 1e9 Pa m^3/s' }).optional(),
      outgassing: list(
        section(
          {
            area: quantity('area', { above: 0, max: 1e6, text: 'above 0 and up to 1e6 m^2' }),
            rate_at_1h: quantity('outgassingRate', NOT_NEGATIVE),
            exponent: pureNumber('a number', { min: 0, max: 3, text: 'from 0 to 3 (about 1 for metals, 0.5 for polymers)' }, 1),
          },
          'a surface that gives off rate_at_1h (t/1 h)^-exponent per area',
        ),
        'a list of surfaces { area: …, rate_at_1h: …, exponent: … }',
        0,
        MOST_PARTS,
      ).optional(),
    },
    'a volume at one pressure; outside is required with vents; gas_load default 0',
  ).check(
    across((_, report, { vents, outside }) => {
      if (Array.isArray(vents) && vents.length > 0 && outside === undefined)
        report(['outside'], 'outside, required with vents', { code: 'missing-key', found: 'nothing' });
    }),
  ) as unknown as z.ZodType<BayInput>;
}
