import * as z from 'zod';
import { clip, DIMENSIONS, type DimensionName, expectation, sameExponents, unitFactor } from '../units/index.ts';
import { printable } from '../units/printable.ts';
import { type Bounds, type IssueDetail, isWithin, section } from './fields.ts';

/** What a case's data sets are read with: the finite values of a one-dimensional numeric data set and its attribute `units`, or why there are none. */
export type DatasetReader = (relativePath: string, dataset: string) => DatasetRead;

export type DatasetRead =
  | { readonly ok: true; readonly values: Float64Array; readonly units: string | null }
  | { readonly ok: false; readonly reason: string };

/** A quantity against time from an HDF5 file, in SI. */
export interface LoadedSeries {
  readonly file: string;
  readonly times: Float64Array;
  readonly values: Float64Array;
}

/** A quantity against time from two data sets of an HDF5 file: `{ file, dataset: /path, time: /path }`, units from their attribute `units` or
 *  given as `unit` and `time_unit`. Times must rise strictly; at least two rows. */
export function dataset(reader: DatasetReader, dimension: DimensionName, bounds: Bounds): z.ZodType<LoadedSeries> {
  const name = (what: string): z.ZodType<string> => z.string({ error: () => `the path of a data set of ${what} in the file, e.g. /log/p` });
  const unit = (of: DimensionName): z.ZodType =>
    z.string({ error: () => `the unit of ${expectation([of])}, where the file does not give it` }).optional();
  const known = new Map<string, LoadedSeries>();
  return section(
    {
      file: z.string({ error: () => 'the name of an HDF5 file, relative to the case file' }),
      dataset: name('pressures'),
      time: name('times'),
      unit: unit(dimension),
      time_unit: unit('time'),
    },
    "two data sets of an HDF5 file; units from their attribute 'units', or given",
  ).transform((given, ctx): LoadedSeries => {
    const spec = given as Readonly<Record<'file' | 'dataset' | 'time', string>> & { readonly unit?: string; readonly time_unit?: string };
    const identity = JSON.stringify(spec);
    const before = known.get(identity);
    if (before) return before;
    let sound = true;
    const report = (key: string, message: string, params: IssueDetail): null => {
      sound = false;
      ctx.addIssue({ code: 'custom', message, path: [key], params: { ...params } });
      return null;
    };
    const column = (key: 'dataset' | 'time', unitKey: 'unit' | 'time_unit', of: DimensionName): Float64Array | null => {
      const read = reader(spec.file, spec[key]);
      if (!read.ok)
        return report(key, 'a data set of finite numbers in one dimension', {
          code: 'unreadable',
          found: printable(read.reason).slice(0, 200),
        });
      const scale = factorOf(read.units, spec[unitKey], of);
      if (!scale.ok)
        return report(scale.given ? unitKey : key, scale.expected, { code: 'table', found: scale.found, nearest: scale.nearest });
      return read.values.map((value) => value * scale.factor);
    };
    const times = column('time', 'time_unit', 'time');
    const values = column('dataset', 'unit', dimension);
    if (times !== null && values !== null && times.length !== values.length)
      report('time', `as many times as values, ${values.length}`, { code: 'table', found: `${times.length}` });
    if (times !== null) {
      const stops = times.findIndex((t, i) => i > 0 && !(t > times[i - 1]));
      if (stops >= 0)
        report('time', 'strictly rising times', {
          code: 'table',
          found: `${times[stops]} s after ${times[stops - 1]} s, value ${stops + 1}`,
        });
      if (times.length < 2) report('time', 'at least two values', { code: 'table', found: `${times.length}` });
    }
    if (values !== null) {
      const bad = values.findIndex((value) => !isWithin(value, bounds));
      if (bad >= 0) report('dataset', `values ${bounds.text}`, { code: 'out-of-range', found: `${values[bad]} in SI, value ${bad + 1}` });
    }
    const loaded: LoadedSeries = { file: spec.file, times: times ?? new Float64Array(0), values: values ?? new Float64Array(0) };
    if (sound) known.set(identity, loaded);
    return loaded;
  });
}

/** names that UDUNITS and people use beside the symbols of this program; plurals too */
const NAMES: Readonly<Record<string, string>> = {
  second: 's',
  sec: 's',
  millisecond: 'ms',
  minute: 'min',
  hour: 'h',
  hr: 'h',
  day: 'day',
  d: 'day',
  pascal: 'Pa',
  hectopascal: 'hPa',
  kilopascal: 'kPa',
  millibar: 'mbar',
  torr: 'Torr',
  atmosphere: 'atm',
};

type Factor =
  | { readonly ok: true; readonly factor: number }
  | { readonly ok: false; readonly given: boolean; readonly expected: string; readonly found: string; readonly nearest: string | null };

/** The factor to SI by the file's attribute or by the case; where both can be read they must agree. */
function factorOf(attribute: string | null, given: string | undefined, dimension: DimensionName): Factor {
  const wanted = `the unit of ${expectation([dimension])}`;
  const read = (text: string): { factor: number } | { found: string; nearest: string | null } => {
    const word = text.trim();
    const name = NAMES[word.toLowerCase()] ?? NAMES[word.toLowerCase().replace(/s$/, '')] ?? word;
    const unit = unitFactor(name);
    if (!unit.ok) return { found: unit.found, nearest: unit.nearest };
    if (!sameExponents(unit.exponents, DIMENSIONS[dimension].exponents)) return { found: clip(text) || 'nothing', nearest: null };
    return { factor: unit.factor };
  };
  const own = attribute === null ? null : read(attribute);
  if (given === undefined) {
    if (own === null)
      return { ok: false, given: false, expected: `${wanted}, in the file or in the case`, found: "no attribute 'units'", nearest: null };
    if ('factor' in own) return { ok: true, factor: own.factor };
    return { ok: false, given: false, expected: `${wanted} in the attribute 'units', or in the case`, ...own };
  }
  const told = read(given);
  if (!('factor' in told)) return { ok: false, given: true, expected: wanted, ...told };
  if (own !== null && 'factor' in own && Math.abs(own.factor / told.factor - 1) > 1e-9)
    return {
      ok: false,
      given: true,
      expected: `no other unit than the file's own, ${clip(attribute ?? '')}`,
      found: clip(given),
      nearest: null,
    };
  return { ok: true, factor: told.factor };
}
