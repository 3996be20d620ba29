/** A case's text -> a frozen `Case`, or all its mistakes with line and column.
 *
 *  document.ts      YAML within limits; where each entry stands
 *  overrides.ts     --set PATH=VALUE
 *  schema.ts        what a case may hold (fields.ts: the building blocks; later.ts: what is refused by name)
 *  csv.ts           tables
 *  scan-schema.ts   `scan` (axis.ts: one varied entry; walk.ts: which entries there are)
 *  history-schema.ts  `history` (dataset.ts: data sets)
 *  issues.ts        what the schema found wrong -> problems (problem.ts)
 *  build.ts         validated input and defaults -> Case (coefficients.ts: the gas)
 *  build-study.ts   the same for scan and history
 *  points.ts        the case at a point of a scan (plain.ts: --set on plain data; sections.ts: what is validated anew)
 *  resolved.ts      the case as a flat record in SI; hash.ts: its SHA-256
 *  template.ts      a case to start from
 *
 *  No file is opened here: tables and data sets are read through the functions passed in. */
import * as z from 'zod';
import type { Case } from '../case.ts';
import { dataSets, gasData, gases } from '../gases/index.ts';
import { isFollowed } from '../kinetics/sets.ts';
import type { ScanSettings, WindowSettings } from '../study.ts';
import { surfaceIn, surfaces, yieldFor, yieldInMixture } from '../surfaces/index.ts';
import { type BuiltIns, buildCase, knownSurface } from './build.ts';
import { buildScan, buildWindow, highestVoltage } from './build-study.ts';
import type { DatasetReader } from './dataset.ts';
import { Defaults, type DefaultUsed } from './defaults.ts';
import { locate, parseSource, type SourceDocument, toPlain } from './document.ts';
import type { LoadedTable, TableReader } from './fields.ts';
import { deepFreeze } from './freeze.ts';
import { problemsOf } from './issues.ts';
import { applyOverrides } from './overrides.ts';
import { getPlain, type Plain } from './plain.ts';
import { type PointReader, pointReader, scanProblems } from './points.ts';
import { inOrder, type Place, type Problem } from './problem.ts';
import { resolvedOf } from './resolved.ts';
import type { ResolvedValue } from './resolved-study.ts';
import { type CaseInput, caseSchemas } from './schema.ts';
import { sectionReader } from './sections.ts';

export type { BuiltIns } from './build.ts';
export type { DatasetRead, DatasetReader } from './dataset.ts';
export type { DefaultUsed } from './defaults.ts';
export type { TableReader } from './fields.ts';
export { hashCase, hashScan, hashWindow } from './hash.ts';
export type { PointReader } from './points.ts';
export { formatProblem, type Place, type Problem, type ProblemCode } from './problem.ts';
export type { ResolvedValue } from './resolved-study.ts';
export { caseTemplate } from './template.ts';

/** A table that a case named, as it was read. */
export interface TableUsed {
  readonly path: string;
  readonly file: string;
  readonly text: string;
}

export type ReadResult =
  | {
      readonly ok: true;
      readonly case: Case;
      /** many gaps at once, null where the case asks for none */
      readonly scan: ScanSettings | null;
      /** the gap in changing surroundings, null where the case asks for none */
      readonly window: WindowSettings | null;
      /** the case at a point of the scan: one SI value per axis, in their order; validated anew, its hash that of a file with these values */
      readonly at: PointReader;
      readonly defaults: readonly DefaultUsed[];
      /** how entries were read, where that is not plain */
      readonly notes: readonly string[];
      /** path -> SI value */
      readonly resolved: Readonly<Record<string, ResolvedValue>>;
      readonly tables: readonly TableUsed[];
      /** where the entry at a path stands, or its nearest ancestor */
      readonly locate: (path: string) => Place;
    }
  | { readonly ok: false; readonly problems: readonly Problem[] };

export const BUILT_INS: BuiltIns = {
  gases,
  dataSets,
  gasData,
  materials: Object.keys(surfaces),
  surfaceFor: yieldFor,
  surfaceInMixture: yieldInMixture,
  surfaceIn,
  kinetic: Object.keys(gases).filter((name) => isFollowed(name)),
};

/** Reads a case.
 *
 *  @param text       YAML 1.2, at most 1 MB
 *  @param fileName   for messages, and the title by default
 *  @param reader     gives the text of a table's file by its name in the case
 *  @param overrides  `PATH=VALUE`, applied left to right before validation
 *  @param datasets   gives the values of a data set of an HDF5 file
 *  @returns the frozen case with the defaults used, or every problem, in the order of the file. Never throws on any text. */
export function readCase(
  text: string,
  fileName: string,
  reader: TableReader,
  overrides: readonly string[] = [],
  datasets: DatasetReader = () => ({ ok: false, reason: 'no data sets are read here' }),
  builtIns: BuiltIns = BUILT_INS,
): ReadResult {
  const parsed = parseSource(text, fileName);
  if (!parsed.ok) return { ok: false, problems: parsed.problems };
  const { document } = parsed;
  const problems = applyOverrides(document, overrides);
  const plain = toPlain(document);
  problems.push(...plain.problems);
  if (plain.problems.some((p) => p.code === 'aliases' || p.code === 'too-deep')) return { ok: false, problems };

  const { file, run } = caseSchemas(
    {
      reader: onceEach(reader),
      datasets,
      gasNames: Object.keys(builtIns.gases),
      dataSets: builtIns.dataSets,
      materialNames: builtIns.materials,
      kineticNames: builtIns.kinetic,
    },
    Object.keys(plain.value as Plain),
  );
  const validated = file.safeParse(plain.value, { reportInput: false, jitless: true });
  if (!validated.success) problems.push(...problemsOf(validated.error.issues, file, plain.value, document));
  problems.push(...missingYields(plain.value, builtIns, document));
  if (!validated.success || problems.length > 0) return { ok: false, problems: inOrder(problems) };

  const fileTitle = baseName(fileName);
  const defaults = new Defaults();
  const input = validated.data;
  const built = buildCase(input, fileTitle, builtIns, defaults);
  const scan = input.scan ? deepFreeze(buildScan(input.scan, run, defaults)) : null;
  const window = input.history ? deepFreeze(buildWindow(input.history, built, defaults)) : null;

  const { scan: _, history: __, ...base } = plain.value as Plain;
  const readSections = sectionReader(run);
  const read = (point: Plain): ReturnType<PointReader> => {
    const quick = readSections(point);
    const again = quick === null ? run.safeParse(point, { reportInput: false }) : ({ success: true, data: quick } as const);
    const missing = missingYields(point, builtIns, document);
    if (!again.success) return { ok: false, problems: [...problemsOf(again.error.issues, run, point, document), ...missing] };
    if (missing.length > 0) return { ok: false, problems: missing };
    const made = buildCase(again.data, fileTitle, builtIns, new Defaults());
    if (scan?.find?.what === 'hold-off' && highestVoltage(made.supply.programme) === 0)
      return { ok: false, problems: [nothingToScale(document)] };
    return { ok: true, case: made };
  };
  const source = { base, scan, document, read };
  const at = pointReader(source);
  const unfit = scanProblems(source, at);
  if (unfit.length > 0) return { ok: false, problems: inOrder(unfit) };
  return {
    ok: true,
    case: built,
    scan,
    window,
    at,
    defaults: defaults.used,
    notes: defaults.notes,
    resolved: resolvedOf(built, scan, window),
    tables: tablesOf(input),
    locate: (path) => locate(document, path === '' ? [] : path.split('.')),
  };
}

/** A search for the highest voltage that holds, at a point whose supply stays at 0 V. */
function nothingToScale(document: SourceDocument): Problem {
  const path = ['scan', 'find', 'what'];
  const expected = 'a supply.voltage that differs from 0 V at some time, to be scaled';
  return {
    code: 'inconsistent',
    ...locate(document, path),
    path: path.join('.'),
    expected,
    found: 'a supply at 0 V throughout',
    nearest: null,
  };
}

/** The JSON Schema of a case, generated from the validator. */
export function caseJsonSchema(builtIns: BuiltIns = BUILT_INS): Record<string, unknown> {
  const { file } = caseSchemas({
    reader: () => ({ ok: false, reason: 'no files are read for a schema' }),
    datasets: () => ({ ok: false, reason: 'no files are read for a schema' }),
    gasNames: Object.keys(builtIns.gases),
    dataSets: builtIns.dataSets,
    materialNames: builtIns.materials,
    kineticNames: builtIns.kinetic,
  });
  return { title: 'gapwake case', ...z.toJSONSchema(file, { io: 'input', target: 'draft-7' }) };
}

/** A file named twice is read once. */
function onceEach(reader: TableReader): TableReader {
  const read = new Map<string, ReturnType<TableReader>>();
  return (file) => {
    const known = read.get(file);
    if (known) return known;
    const result = reader(file);
    read.set(file, result);
    return result;
  };
}

/** Electrodes whose material has no yield in this gas, or not in the condition asked for: two sections decide, so it is checked on the data as given. */
function missingYields(raw: unknown, builtIns: BuiltIns, document: SourceDocument): Problem[] {
  const name = getPlain(raw, ['gas', 'name']);
  const mixture = getPlain(raw, ['gas', 'mixture']);
  const named = typeof name === 'string' ? [name] : typeof mixture === 'object' && mixture !== null ? Object.keys(mixture) : [];
  // an unknown gas has its own problem
  if (!named.every((gas) => Object.hasOwn(builtIns.gases, gas))) return [];
  const where = named.length === 0 ? 'this gas' : named.length === 1 ? named[0] : 'a mixture';
  return ['left', 'right'].flatMap((side) => {
    const electrode = (key: string): unknown => getPlain(raw, ['electrodes', side, key]);
    const [material, surface] = [electrode('material'), electrode('surface')];
    if (typeof material !== 'string' || !builtIns.materials.includes(material) || electrode('ion_yield') !== undefined) return [];
    const condition = surface === 'clean' || surface === 'technical' ? surface : undefined;
    if (surface !== undefined && condition === undefined) return [];
    if (knownSurface(material, condition, named, builtIns) !== null) return [];
    const path = ['electrodes', side, condition === undefined ? 'material' : 'surface'];
    const expected =
      condition === undefined
        ? `a material with a known yield in ${where}, or an ion_yield beside it`
        : `a surface whose yield is known (that of ${condition} ${material} in ${where} is not), or none for the built-in yield`;
    const found = condition ?? material;
    return [{ code: 'inconsistent', ...locate(document, path), path: path.join('.'), expected, found, nearest: null } satisfies Problem];
  });
}

function tablesOf(input: CaseInput): TableUsed[] {
  const tables: TableUsed[] = [];
  const add = (path: string, table: LoadedTable | undefined): void => {
    if (table) tables.push({ path, file: table.file, text: table.text });
  };
  add('supply.voltage.table', input.supply.voltage.table);
  for (const [key, value] of Object.entries(input.gas.coefficients ?? {})) {
    if (typeof value === 'object' && 'table' in value) add(`gas.coefficients.${key}.table`, value.table);
  }
  for (const side of ['left', 'right'] as const) {
    const given = input.electrodes[side]?.ion_yield;
    if (typeof given === 'object') add(`electrodes.${side}.ion_yield.table`, given.table);
  }
  const { pressure, temperature, voltage } = input.history ?? {};
  add('history.pressure.table', pressure?.table);
  add('history.pressure.bay.outside.table', pressure?.bay?.outside?.table);
  if (typeof temperature === 'object') add('history.temperature.table', temperature.table);
  if (typeof voltage === 'object') add('history.voltage.table', voltage.table);
  return tables;
}

function baseName(file: string): string {
  return file.split(/[/\\]/).pop() || file;
}
