import * as z from 'zod';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';
import { clip, nearestSpelling } from '../units/index.ts';
import type { DatasetReader } from './dataset.ts';
import {
  across,
  choice,
  type Dimensioned,
  exactlyOne,
  type LoadedTable,
  list,
  NOT_NEGATIVE,
  POSITIVE,
  pureNumber,
  quantity,
  quantityOf,
  type Report,
  section,
  type TableReader,
  table,
} from './fields.ts';
import { type HistoryInput, historySchema } from './history-schema.ts';
import { getPlain } from './plain.ts';
import { type ScanInput, scanSchema } from './scan-schema.ts';

interface ElectronsInput {
  readonly closure?: 'local-field' | 'kinetic' | undefined;
  /** [J] */
  readonly emission_energy?: number | undefined;
  readonly particles?: number | undefined;
  readonly seed?: number | undefined;
}

/** A case as validated: SI values, entries as they were given, no defaults filled in. */
export interface CaseInput {
  readonly title?: string | undefined;
  readonly gap: {
    readonly geometry: 'planar';
    readonly spacing: number;
    readonly area: number;
    readonly longest_path?: number | undefined;
  };
  readonly gas: {
    readonly name?: string | undefined;
    readonly data?: string | undefined;
    readonly mixture?: Readonly<Record<string, number | undefined>> | undefined;
    readonly pressure: number;
    readonly temperature?: number | undefined;
    readonly coefficients?: CoefficientsInput | undefined;
  };
  readonly electrodes: { readonly left: ElectrodeInput; readonly right?: ElectrodeInput | undefined };
  readonly seed: { readonly cathode_current: number; readonly electrons?: number | undefined };
  readonly supply: {
    readonly voltage: {
      readonly step?: number | undefined;
      readonly rise_time?: number | undefined;
      readonly ramp?: { readonly from: number; readonly to: number; readonly rate: number } | undefined;
      readonly table?: LoadedTable | undefined;
    };
    readonly series_resistance: number;
    readonly parallel_capacitance?: number | undefined;
    readonly current_limit?: number | undefined;
    readonly trip?:
      | {
          readonly current: number;
          readonly delay: number;
          readonly senses?: 'gap' | 'supply' | undefined;
          readonly action?: 'open' | 'zero' | undefined;
        }
      | undefined;
    readonly initial_gap_voltage?: number | undefined;
  };
  readonly electrons?: ElectronsInput | undefined;
  readonly observe: { readonly until: number; readonly currents?: readonly number[] | undefined };
  readonly numerics?: { readonly cells?: number | undefined; readonly tolerance?: number | undefined } | undefined;
  readonly scan?: ScanInput | undefined;
  readonly history?: HistoryInput | undefined;
}

export interface ElectrodeInput {
  readonly material?: string | undefined;
  readonly surface?: 'clean' | 'technical' | undefined;
  readonly ion_yield?: number | YieldInput | undefined;
}

/** A yield with its spread: numbers, or a table and factors on it. */
export interface YieldInput {
  readonly typical?: number | undefined;
  readonly table?: LoadedTable | undefined;
  readonly low?: number | undefined;
  readonly high?: number | undefined;
}

export interface GrowthInput extends Validity {
  readonly form?: 'exponential' | 'root' | undefined;
  readonly A?: Dimensioned | undefined;
  readonly B?: Dimensioned | undefined;
  readonly C?: Dimensioned | undefined;
  readonly D?: Dimensioned | undefined;
  readonly table?: LoadedTable | undefined;
}

export interface Validity {
  readonly valid_from?: Dimensioned | undefined;
  readonly valid_to?: Dimensioned | undefined;
  readonly reference_temperature?: number | undefined;
}

/** A coefficient that is not a growth rate: one value, a reduced mobility, or a table. */
export type PlainInput =
  | Dimensioned
  | (Validity & { readonly value?: Dimensioned | undefined; readonly K0?: number | undefined; readonly table?: LoadedTable | undefined });

export interface CoefficientsInput {
  readonly ionisation?: GrowthInput | undefined;
  readonly attachment?: GrowthInput | undefined;
  readonly electron_mobility?: PlainInput | undefined;
  readonly electron_energy?: PlainInput | undefined;
  readonly ion_mobility?: PlainInput | undefined;
  readonly ion_energy?: PlainInput | undefined;
  readonly negative_ion_mobility?: PlainInput | undefined;
  readonly negative_ion_energy?: PlainInput | undefined;
  readonly recombination?: Dimensioned | undefined;
  readonly reference_temperature?: number | undefined;
}

/** What the schema is built around. */
export interface SchemaContext {
  readonly reader: TableReader;
  readonly datasets: DatasetReader;
  readonly gasNames: readonly string[];
  /** names of the sets of data of a gas, the default first */
  readonly dataSets: (gas: string) => readonly string[];
  readonly materialNames: readonly string[];
  /** gases whose electrons can be followed as particles */
  readonly kineticNames: readonly string[];
}

const TEMPERATURE = { min: 4, max: 3000, text: 'from 4 K to 3000 K' };
const VOLTAGE = { min: -1e7, max: 1e7, text: 'of at most 10 MV either way' };
const EITHER_FIELD = ['fieldOverPressure', 'reducedField'] as const;
const EITHER_GROWTH = ['growthOverPressure', 'crossSection'] as const;
const EITHER_MOBILITY = ['mobilityTimesPressure', 'mobilityTimesDensity'] as const;

/** The validators of a case. The JSON Schema is generated from `file`. */
export interface CaseSchemas {
  /** a case file */
  readonly file: z.ZodType<CaseInput>;
  /** one run of it: a case without scan and history */
  readonly run: z.ZodType<CaseInput>;
}

/** @param keys  the keys of the case: building the schemas of scan and history takes longer than reading most cases, so it is left where neither
 *               is asked for */
export function caseSchemas(context: SchemaContext, keys: readonly string[] = ['scan', 'history']): CaseSchemas {
  const shape = runShape(context);
  const description = 'A gap, its gas and electrodes, what feeds it, and how long to watch it';
  const kinetic = across((sound, report) => checkCrossSections(sound as Partial<CaseInput>, context.kineticNames, report));
  const run = section(shape, description).check(kinetic);
  const { reader, datasets } = context;
  const file = section(
    {
      ...shape,
      scan: keys.includes('scan') ? scanSchema(run).optional() : z.undefined().optional(),
      history: keys.includes('history')
        ? historySchema({ reader, datasets, temperature: TEMPERATURE, voltage: VOLTAGE }).optional()
        : z.undefined().optional(),
    },
    description,
  )
    .check(kinetic)
    .check(across((sound, report, given) => checkStudies(sound as Partial<CaseInput>, report, given)));
  return { file, run } as unknown as CaseSchemas;
}

function runShape(context: SchemaContext): Readonly<Record<string, z.ZodType>> {
  return {
    title: z
      .string({ error: () => 'text of at most 200 characters' })
      .max(200)
      .optional(),
    gap: gapSchema(),
    gas: gasSchema(context),
    electrodes: section(
      { left: electrodeSchema(context), right: electrodeSchema(context).optional() },
      'left is at x = 0, right at x = spacing; right is as left by default',
    ),
    seed: seedSchema(),
    supply: supplySchema(context),
    electrons: electronsSchema().optional(),
    observe: section(
      {
        until: quantity('time', { above: 0, max: 1e9, text: 'above 0 and up to 1e9 s' }),
        currents: list(quantity('current', POSITIVE), 'a list of currents, e.g. [1 nA, 1 uA]', 0, 1000).optional(),
      },
      'how long, and which conduction currents to report when first crossed',
    ),
    numerics: section(
      {
        cells: pureNumber('a whole number', { min: 20, max: 5000, text: 'from 20 to 5000' }, 150, true).optional(),
        tolerance: pureNumber('a number', { min: 1e-8, max: 0.1, text: 'from 1e-8 to 0.1' }, 1e-3).optional(),
      },
      'defaults: cells the choice of the program, tolerance 1e-3',
    ).optional(),
  };
}

/** The entries of kinetic electrons, with the words for their bounds. */
const KINETIC_ENTRIES = ['emission_energy', 'particles', 'seed'] as const;

function electronsSchema(): z.ZodType<ElectronsInput> {
  return section(
    {
      closure: choice(['local-field', 'kinetic']).optional(),
      emission_energy: quantity('energy', {
        min: 0.1 * ELEMENTARY_CHARGE,
        max: 20 * ELEMENTARY_CHARGE,
        text: 'from 0.1 eV to 20 eV',
        example: '2 eV',
      }).optional(),
      particles: pureNumber('a whole number', { min: 320, max: 1e7, text: 'from 320 to 1e7' }, 20000, true).optional(),
      seed: pureNumber('a whole number', { min: 0, max: 2 ** 53 - 1, text: 'from 0 to 2^53 - 1' }, 1, true).optional(),
    },
    'closure local-field: electrons follow the field where they are; kinetic: they are followed as particles, in gases with built-in cross-sections. Then emission_energy: with which they leave the cathode (default 2 eV), particles: how many are followed for one answer at most (default 20000), seed of the random numbers (default 1)',
  ).check(
    across(({ closure }, report, given) => {
      if (closure === 'kinetic' || (given.closure !== undefined && closure === undefined)) return;
      for (const key of KINETIC_ENTRIES)
        if (given[key] !== undefined)
          report([key], `${key} only beside closure: kinetic`, { code: 'inconsistent', found: `closure: ${closure ?? 'local-field'}` });
    }),
  ) as unknown as z.ZodType<ElectronsInput>;
}

/** Cross-sections that kinetic electrons need. */
function checkCrossSections({ gas, electrons }: Partial<CaseInput>, kinetic: readonly string[], report: Report): void {
  if (electrons?.closure !== 'kinetic' || gas === undefined) return;
  if (gas.name !== undefined && kinetic.includes(gas.name)) return;
  if (gas.name === undefined && gas.mixture === undefined && gas.coefficients === undefined) return;
  const what = gas.name ?? (gas.mixture !== undefined ? 'a mixture' : 'a gas without name');
  report(['electrons', 'closure'], `local-field, or a gas.name with built-in cross-sections (${kinetic.join(', ')}) for kinetic`, {
    code: 'inconsistent',
    found: `kinetic with ${what}`,
  });
}

/** What a scan or a history asks of the rest of the case. */
function checkStudies(
  { supply, scan, history, electrons }: Partial<CaseInput>,
  report: Report,
  given: Readonly<Record<string, unknown>>,
): void {
  checkVariedYields(given, report);
  if (electrons?.closure === 'kinetic' && given.history !== undefined)
    report(['electrons', 'closure'], 'local-field beside a history: a window asks for hundreds of densities and runs', {
      code: 'inconsistent',
      found: 'kinetic with a history',
    });
  const what = scan?.find?.what;
  const supplyGiven = given.supply as Readonly<Record<string, unknown>> | null | undefined;
  if (what === 'trip-delay' && typeof supplyGiven === 'object' && supplyGiven?.trip === undefined)
    report(['scan', 'find', 'what'], 'supply.trip in the case, with what: trip-delay', { code: 'inconsistent', found: 'no supply.trip' });
  if (!isZero(supply?.voltage)) return;
  const found = 'a supply at 0 V throughout';
  if (what === 'hold-off')
    report(['scan', 'find', 'what'], 'a supply.voltage that differs from 0 V at some time, to be scaled', { code: 'inconsistent', found });
  if (history !== undefined && (given.history as Partial<HistoryInput> | null)?.voltage === undefined)
    report(['history', 'voltage'], 'voltage, required where supply.voltage gives none', { code: 'missing-key', found });
}

/** A varied yield replaces what stands there: a number takes the place of a number, `typical` that of `typical`. Anything else would drop a spread or a table unseen. */
function checkVariedYields({ scan, electrodes }: Readonly<Record<string, unknown>>, report: Report): void {
  const vary = getPlain(scan, ['vary']);
  for (const [k, axis] of (Array.isArray(vary) ? vary : []).entries()) {
    const path = getPlain(axis, ['path']);
    const [section, side, key, part, ...rest] = typeof path === 'string' ? path.trim().split('.') : [];
    if (section !== 'electrodes' || key !== 'ion_yield' || rest.length > 0) continue;
    const there = getPlain(electrodes, [side, 'ion_yield']);
    if (typeof there !== 'object' || there === null) continue;
    const typical = `electrodes.${side}.ion_yield.typical`;
    const refuse = (expected: string, found: string, nearest: string | null): void =>
      report(['scan', 'vary', k, 'path'], expected, { code: 'inconsistent', found, nearest });
    if ('table' in there) {
      if (part === undefined || part === 'typical') refuse('an entry that leaves the table of the yield in place', clip(`${path}`), null);
    } else if (part === undefined) refuse('the typical yield, as ion_yield is a mapping', clip(`${path}`), typical);
  }
}

/** Whether a programme stays at 0 V; false where it is not known. */
function isZero(voltage: Partial<CaseInput['supply']['voltage']> | undefined): boolean {
  if (voltage?.step !== undefined) return voltage.step === 0;
  if (voltage?.ramp) return voltage.ramp.from === 0 && voltage.ramp.to === 0;
  const rows = voltage?.table?.columns?.[1]?.values;
  return rows?.every((v) => v === 0) ?? false;
}

function gapSchema(): z.ZodType<CaseInput['gap']> {
  const length = { above: 0, max: 100, text: 'above 0 and up to 100 m' };
  return section(
    {
      geometry: choice(['planar']),
      spacing: quantity('length', length),
      area: quantity('area', { above: 0, max: 1e4, text: 'above 0 and up to 1e4 m^2' }),
      longest_path: quantity('length', { above: 0, max: 1e3, text: 'above 0 and up to 1 km' }).optional(),
    },
    'longest_path: the longest way around the gap that a discharge could take; default the spacing',
  ).check(
    across(({ spacing, longest_path }, report) => {
      if (typeof spacing !== 'number' || typeof longest_path !== 'number' || longest_path >= spacing) return;
      report(['longest_path'], 'a length not below gap.spacing', { code: 'inconsistent' });
    }),
  ) as unknown as z.ZodType<CaseInput['gap']>;
}

function gasSchema(context: SchemaContext): z.ZodType<CaseInput['gas']> {
  return section(
    {
      name: choice(context.gasNames as [string, ...string[]]).optional(),
      data: dataSchema(context).optional(),
      mixture: mixtureSchema(context).optional(),
      pressure: quantity('pressure', { min: 1e-3, max: 1e6, text: 'from 1e-3 Pa to 1e6 Pa' }),
      temperature: quantity('temperature', TEMPERATURE).optional(),
      coefficients: coefficientsSchema(context).optional(),
    },
    'name: built-in data, data: which set of them; mixture: built-in gases by their fractions; coefficients: your own, alone or in place of single built-in ones',
  ).check(
    across((sound, report, { name, data, mixture, coefficients }) => {
      if (name !== undefined && mixture !== undefined)
        report(['mixture'], 'either name or mixture', { code: 'either-or', found: 'name and mixture' });
      else if (name === undefined && mixture === undefined && coefficients === undefined)
        report([], 'a name or a mixture, coefficients, or both', { code: 'missing-key', found: 'neither' });
      if (data !== undefined && name === undefined)
        report(['data'], 'data only beside gas.name, whose sets it chooses from', {
          code: 'either-or',
          found: mixture === undefined ? 'data without name' : 'data beside mixture',
        });
      else if (typeof sound.data === 'string' && typeof sound.name === 'string') checkDataSet(context, sound.name, sound.data, report);
      if (
        name !== undefined ||
        mixture !== undefined ||
        typeof coefficients !== 'object' ||
        coefficients === null ||
        Array.isArray(coefficients)
      )
        return;
      for (const key of ['ionisation', 'electron_mobility', 'ion_mobility']) {
        if (!(key in coefficients))
          report(['coefficients', key], `${key}, required without gas.name or gas.mixture`, { code: 'missing-key', found: 'nothing' });
      }
    }),
  ) as unknown as z.ZodType<CaseInput['gas']>;
}

function dataSchema({ gasNames, dataSets }: SchemaContext): z.ZodType<string> {
  const several = gasNames.filter((gas) => dataSets(gas).length > 1);
  return z.string({ error: () => 'the name of a set of data of the gas, as `gapwake gas NAME` lists them' }).meta({
    description: `which set of a gas's data: ${several.map((gas) => `${gas}: ${dataSets(gas).join(', ')}`).join('; ')}; default the first`,
  });
}

function checkDataSet({ dataSets }: SchemaContext, gas: string, set: string, report: Report): void {
  const sets = dataSets(gas);
  if (sets.includes(set)) return;
  const expected = sets.length === 1 ? `${sets[0]}, the only set of data of ${gas}` : `a set of data of ${gas} (${sets.join(', ')})`;
  report(['data'], expected, { code: 'unknown-name', found: clip(set) || 'nothing', nearest: nearestSpelling(set, sets) });
}

/** how far the fractions of a mixture may be from 1 in all */
const FRACTION_TOLERANCE = 1e-6;

function mixtureSchema({ gasNames }: SchemaContext): z.ZodType<Readonly<Record<string, number | undefined>>> {
  const fraction = pureNumber('a fraction', { above: 0, max: 1, text: 'above 0 and up to 1' }, 0.9);
  return section(
    Object.fromEntries(gasNames.map((gas) => [gas, fraction.optional()])),
    'built-in gases by their fractions of the density (or pressure), which sum to 1; several are varied together in a scan with zip: true',
  ).check(
    across((sound, report, given) => {
      const keys = Object.keys(given).filter((key) => given[key] !== undefined);
      if (keys.length === 0)
        report([], 'gases with their fractions, e.g. { argon: 0.9, nitrogen: 0.1 }', { code: 'missing-key', found: 'none' });
      const fractions = keys.map((key) => (gasNames.includes(key) ? sound[key] : undefined));
      if (keys.length === 0 || !fractions.every((value) => typeof value === 'number')) return;
      const sum = fractions.reduce((total, value) => total + value, 0);
      // a fraction may be off by rounding where the sum just meets the tolerance
      if (Math.abs(sum - 1) > FRACTION_TOLERANCE * (1 + 1e-9))
        report([], 'fractions that sum to 1', { code: 'inconsistent', found: `a sum of ${Number(sum.toPrecision(9))}` });
    }),
  ) as unknown as z.ZodType<Readonly<Record<string, number | undefined>>>;
}

function coefficientsSchema({ reader }: SchemaContext): z.ZodType<CoefficientsInput> {
  const mobility = (): z.ZodType<PlainInput> => mobilitySchema(reader);
  const energy = (): z.ZodType<PlainInput> => energySchema(reader);
  return section(
    {
      ionisation: growthSchema(reader).optional(),
      attachment: growthSchema(reader).optional(),
      electron_mobility: mobility().optional(),
      electron_energy: energy().optional(),
      ion_mobility: mobility().optional(),
      ion_energy: energy().optional(),
      negative_ion_mobility: mobility().optional(),
      negative_ion_energy: energy().optional(),
      recombination: quantityOf(['recombination'], NOT_NEGATIVE).optional(),
      reference_temperature: quantity('temperature', TEMPERATURE).optional(),
    },
    'against pressure at reference_temperature, or against density: the dimension of each unit decides',
  ) as unknown as z.ZodType<CoefficientsInput>;
}

const validity = (): Record<'valid_from' | 'valid_to' | 'reference_temperature', z.ZodType> => ({
  valid_from: quantityOf(EITHER_FIELD, NOT_NEGATIVE).optional(),
  valid_to: quantityOf(EITHER_FIELD, POSITIVE).optional(),
  reference_temperature: quantity('temperature', TEMPERATURE).optional(),
});

const validityInOrder = (): z.core.$ZodCheck<unknown> =>
  across(({ valid_from, valid_to }, report) => {
    const from = valid_from as Dimensioned | undefined;
    const to = valid_to as Dimensioned | undefined;
    if (from?.dimension === undefined || to?.dimension === undefined) return;
    if (from.dimension !== to.dimension) report(['valid_to'], 'the same kind of field as valid_from', { code: 'inconsistent' });
    else if (!(to.value > from.value)) report(['valid_to'], 'a field above valid_from', { code: 'inconsistent' });
  });

/** α or η: an exponential, a root form, or a table. */
function growthSchema(reader: TableReader): z.ZodType<GrowthInput> {
  const growth = quantityOf(EITHER_GROWTH, POSITIVE);
  return section(
    {
      form: choice(['exponential', 'root']).optional(),
      A: growth.optional(),
      B: quantityOf(EITHER_FIELD, POSITIVE).optional(),
      C: growth.optional(),
      D: quantityOf(['rootFieldOverPressure', 'rootReducedField'], POSITIVE).optional(),
      table: table(reader, [
        { key: 'reduced_field', dimensions: EITHER_FIELD, bounds: NOT_NEGATIVE },
        { key: 'coefficient', dimensions: EITHER_GROWTH, bounds: NOT_NEGATIVE },
      ]).optional(),
      ...validity(),
    },
    'exponential: A exp(-B p/E); root: C exp(-D sqrt(p/E)); or a table',
  )
    .check(exactlyOne(['form', 'table']))
    .check(
      across((_, report, value) => {
        const own = value.form === 'exponential' ? ['A', 'B'] : value.form === 'root' ? ['C', 'D'] : [];
        for (const key of own)
          if (value[key] === undefined)
            report([key], `${key}, required with form: ${value.form}`, { code: 'missing-key', found: 'nothing' });
        if (own.length === 0 && value.table === undefined) return;
        for (const key of ['A', 'B', 'C', 'D'].filter((k) => !own.includes(k) && value[k] !== undefined)) {
          report([key], own.length > 0 ? `only ${own.join(' and ')} with form: ${value.form}` : 'no constants beside a table', {
            code: 'either-or',
            found: key,
          });
        }
      }),
    )
    .check(
      across((value, report) => {
        const loaded = value.table as LoadedTable | undefined;
        if (loaded?.columns?.length !== 2) return;
        const [field, coefficient] = loaded.columns;
        const firstPositive = coefficient.values.findIndex((y) => y > 0);
        const zeroAbove = firstPositive >= 0 && coefficient.values.slice(firstPositive).some((y) => y === 0);
        if (firstPositive < 0 || firstPositive > coefficient.values.length - 2) {
          report(['table', 'coefficient'], 'at least two rows above 0', { code: 'table', found: firstPositive < 0 ? 'none' : 'one' });
        } else if (zeroAbove)
          report(['table', 'coefficient'], 'zeros only below the first row above 0 (its logarithm is interpolated)', {
            code: 'table',
            found: '0 in a later row',
          });
        else if (field.values[firstPositive] === 0)
          report(['table', 'coefficient'], '0 at no field', { code: 'table', found: `${coefficient.values[0]}` });
      }),
    )
    .check(validityInOrder()) as unknown as z.ZodType<GrowthInput>;
}

const BARE_MOBILITY = {
  on: 'mobility',
  expected:
    'a mobility times a pressure, e.g. 1.5e3 cm^2 Torr/(V s), or times a density, e.g. 1e24 1/(m V s); a reduced mobility (at 273.15 K and 760 Torr) is written { K0: 1.5 cm^2/(V s) }',
} as const;

function mobilitySchema(reader: TableReader): z.ZodType<PlainInput> {
  const value = quantityOf(EITHER_MOBILITY, POSITIVE, BARE_MOBILITY);
  const parts = section(
    {
      value: value.optional(),
      K0: quantity('mobility', POSITIVE).optional(),
      table: table(reader, [
        { key: 'reduced_field', dimensions: EITHER_FIELD, bounds: NOT_NEGATIVE },
        { key: 'coefficient', dimensions: EITHER_MOBILITY, bounds: POSITIVE },
      ]).optional(),
      ...validity(),
    },
    'K0: the reduced mobility, at 273.15 K and 760 Torr',
  )
    .check(exactlyOne(['value', 'K0', 'table']))
    .check(validityInOrder());
  return z.union([value, parts], {
    error: () => 'a mobility times a pressure, e.g. 1.5e3 cm^2 Torr/(V s), or { K0: … } or { table: … }',
  }) as unknown as z.ZodType<PlainInput>;
}

function energySchema(reader: TableReader): z.ZodType<PlainInput> {
  const bounds = { min: 0, max: 1e4, text: 'from 0 to 10 kV' };
  const value = quantityOf(['voltage'], bounds);
  const parts = section(
    {
      value: value.optional(),
      table: table(reader, [
        { key: 'reduced_field', dimensions: EITHER_FIELD, bounds: NOT_NEGATIVE },
        { key: 'coefficient', dimensions: ['voltage'], bounds },
      ]).optional(),
      ...validity(),
    },
    'D/mu',
  )
    .check(exactlyOne(['value', 'table']))
    .check(validityInOrder());
  return z.union([value, parts], { error: () => 'a voltage (D/mu), e.g. 1 V, or { table: … }' }) as unknown as z.ZodType<PlainInput>;
}

const YIELD = { min: 0, max: 10, text: 'from 0 to 10' };
const YIELD_FORMS = '{ low: 0.01, typical: 0.02, high: 0.05 }, or { table: … }';

function electrodeSchema(context: SchemaContext): z.ZodType<ElectrodeInput> {
  const number = pureNumber('electrons per ion', YIELD, 0.02);
  return section(
    {
      material: choice(context.materialNames as [string, ...string[]]).optional(),
      surface: choice(['clean', 'technical']).optional(),
      ion_yield: z
        .union([number, yieldSchema(context)], { error: () => `electrons per ion ${YIELD.text}, e.g. 0.02, or ${YIELD_FORMS}` })
        .optional(),
    },
    'material: its built-in yield, surface: that of its clean or technical surface, where known; ion_yield: electrons per arriving ion, wins over the material',
  ).check(
    across((_, report, { material, surface, ion_yield }) => {
      if (material === undefined && ion_yield === undefined)
        report([], 'a material or an ion_yield', { code: 'missing-key', found: 'neither' });
      if (surface === undefined) return;
      if (ion_yield !== undefined)
        report(['surface'], 'either surface or ion_yield', { code: 'either-or', found: 'surface and ion_yield' });
      else if (material === undefined) report(['surface'], 'surface only beside material', { code: 'either-or', found: 'surface' });
    }),
  ) as unknown as z.ZodType<ElectrodeInput>;
}

/** A yield with its spread, or one that depends on the field. */
function yieldSchema({ reader }: SchemaContext): z.ZodType<YieldInput> {
  const bound = pureNumber('electrons per ion, or a factor beside table,', { min: 0, max: 1000, text: 'from 0 to 1000' }, 0.01);
  return section(
    {
      low: bound.optional(),
      typical: pureNumber('electrons per ion', YIELD, 0.02).optional(),
      high: bound.optional(),
      table: table(reader, [
        { key: 'reduced_field', dimensions: ['reducedField'], bounds: NOT_NEGATIVE },
        { key: 'yield', dimensions: ['number'], bounds: YIELD },
      ]).optional(),
    },
    'typical, with the ends of its spread; or a table against E/N at the cathode, with factors for the ends. low and high default: no spread',
  )
    .check(
      across((_, report, { typical, table }) => {
        if (typical !== undefined && table !== undefined)
          report(['table'], 'either typical or table', { code: 'either-or', found: 'typical and table' });
        if (typical === undefined && table === undefined)
          report(['typical'], 'typical, required without table', { code: 'missing-key', found: 'nothing' });
      }),
    )
    .check(across(checkYieldSpread)) as unknown as z.ZodType<YieldInput>;
}

/** low ≤ typical ≤ high; beside a table low ≤ 1 ≤ high. */
function checkYieldSpread({ low, typical, high }: Partial<YieldInput>, report: Report, given: Readonly<Record<string, unknown>>): void {
  if (given.table !== undefined && given.typical === undefined) {
    if (low !== undefined && low > 1) report(['low'], 'a factor on the table, not above 1', { code: 'inconsistent' });
    if (high !== undefined && high < 1) report(['high'], 'a factor on the table, not below 1', { code: 'inconsistent' });
    return;
  }
  if (given.table !== undefined) return;
  if (high !== undefined && high > YIELD.max) report(['high'], `electrons per ion ${YIELD.text}`, { code: 'out-of-range' });
  if (low !== undefined && typical !== undefined && low > typical)
    report(['low'], 'a yield not above typical', { code: 'inconsistent', found: `${low} beside typical ${typical}` });
  if (high !== undefined && typical !== undefined && high < typical)
    report(['high'], 'a yield not below typical', { code: 'inconsistent', found: `${high} beside typical ${typical}` });
  if (given.typical === undefined && low !== undefined && high !== undefined && low > high)
    report(['low'], 'a yield not above high', { code: 'inconsistent', found: `${low} beside high ${high}` });
}

function seedSchema(): z.ZodType<CaseInput['seed']> {
  return section(
    { cathode_current: quantity('current', NOT_NEGATIVE), electrons: pureNumber('a number of electrons', NOT_NEGATIVE, 1).optional() },
    'cathode_current leaves whichever wall is the cathode; electrons are released there at t = 0',
  ).check(
    across(({ cathode_current, electrons }, report, given) => {
      if (cathode_current !== 0 || (given.electrons !== undefined && electrons !== 0)) return;
      report(['cathode_current'], 'a current above 0, or electrons above 0 beside it', { code: 'inconsistent' });
    }),
  ) as unknown as z.ZodType<CaseInput['seed']>;
}

function supplySchema({ reader }: SchemaContext): z.ZodType<CaseInput['supply']> {
  const voltage = section(
    {
      step: quantity('voltage', VOLTAGE).optional(),
      rise_time: quantity('time', NOT_NEGATIVE).optional(),
      ramp: section(
        { from: quantity('voltage', VOLTAGE), to: quantity('voltage', VOLTAGE), rate: quantity('voltageRate', POSITIVE) },
        'from `from` at t = 0 at `rate` towards `to`, then held',
      ).optional(),
      table: table(reader, [
        { key: 'time', dimensions: ['time'] },
        { key: 'voltage', dimensions: ['voltage'], bounds: VOLTAGE },
      ]).optional(),
    },
    'a step, a ramp or a table; positive makes the left electrode the cathode',
  )
    .check(exactlyOne(['step', 'ramp', 'table']))
    .check(
      across((_, report, { step, rise_time }) => {
        if (rise_time !== undefined && step === undefined)
          report(['rise_time'], 'rise_time only with step', { code: 'either-or', found: 'rise_time' });
      }),
    );
  return section(
    {
      voltage,
      series_resistance: quantity('resistance', { min: 0, max: 1e18, text: 'from 0 ohm to 1e18 ohm' }),
      parallel_capacitance: quantity('capacitance', { min: 0, max: 1e3, text: 'from 0 to 1 kF' }).optional(),
      current_limit: quantity('current', POSITIVE).optional(),
      trip: section(
        {
          current: quantity('current', POSITIVE),
          delay: quantity('time', NOT_NEGATIVE),
          senses: choice(['gap', 'supply']).optional(),
          action: choice(['open', 'zero']).optional(),
        },
        'acts `delay` after the current first exceeds `current`, once',
      ).optional(),
      initial_gap_voltage: quantity('voltage', VOLTAGE).optional(),
    },
    'parallel_capacitance default 0; current_limit and trip default none; initial_gap_voltage default 0',
  ).check(across(checkSupply)) as unknown as z.ZodType<CaseInput['supply']>;
}

function checkSupply(
  value: Readonly<Record<string, unknown>>,
  report: (path: readonly PropertyKey[], expected: string, detail: { code: 'inconsistent'; found?: string }) => void,
  given: Readonly<Record<string, unknown>>,
): void {
  const { voltage, trip } = value as Partial<CaseInput['supply']>;
  if (value.series_resistance === 0 && trip?.action === 'zero' && given.current_limit === undefined) {
    report(['trip', 'action'], 'open, or a series_resistance or current_limit to take up the jump of the supply to 0 V', {
      code: 'inconsistent',
      found: 'zero behind 0 ohm',
    });
  }
  if (given.initial_gap_voltage !== undefined && value.initial_gap_voltage !== 0) return;
  const nowhere = 'a voltage that differs from 0 V at some time';
  if (voltage?.step === 0) report(['voltage', 'step'], nowhere, { code: 'inconsistent' });
  if (voltage?.ramp?.from === 0 && voltage.ramp.to === 0) report(['voltage', 'ramp', 'to'], nowhere, { code: 'inconsistent' });
  const column = voltage?.table?.columns?.[1];
  if (column?.values.every((v) => v === 0))
    report(['voltage', 'table', 'voltage'], nowhere, { code: 'inconsistent', found: '0 V in every row' });
}
