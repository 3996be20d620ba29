import type { Case } from '../case.ts';
import type { PlanarGap } from '../gap/geometry.ts';
import type { Gas, GasData, MixturePart } from '../gases/gas.ts';
import { mixtureOf } from '../gases/mixture.ts';
import type { Programme, SupplySettings } from '../supply/settings.ts';
import type { IonYield, Surface } from '../surfaces/surface.ts';
import type { YieldLaw } from '../surfaces/yield-law.ts';
import { BOLTZMANN, ELEMENTARY_CHARGE } from '../units/constants.ts';
import { coefficientsOf } from './coefficients.ts';
import type { Defaults } from './defaults.ts';
import { deepFreeze } from './freeze.ts';
import { hashCase } from './hash.ts';
import type { CaseInput, ElectrodeInput, YieldInput } from './schema.ts';

/** The built-in data that a case may name. */
export interface BuiltIns {
  readonly gases: Readonly<Record<string, GasData>>;
  /** names of the sets of data of a gas, the default first */
  readonly dataSets: (gas: string) => readonly string[];
  /** a gas with one of its sets of data; null where there is no such set */
  readonly gasData: (gas: string, set?: string) => GasData | null;
  readonly materials: readonly string[];
  /** the surface of a material in a gas (null: the case's own coefficients), or null where its yield is unknown */
  readonly surfaceFor: (material: string, gas: string | null) => Surface | null;
  /** gases whose electrons can be followed as particles */
  readonly kinetic: readonly string[];
  /** the same in a mixture of gases */
  readonly surfaceInMixture: (material: string, gases: readonly string[]) => Surface | null;
  /** the same in a stated condition */
  readonly surfaceIn: (material: string, gas: string, condition: 'clean' | 'technical') => Surface | null;
}

/** relative uncertainty of a breakdown voltage where nothing better is known */
const BREAKDOWN_UNCERTAINTY = 0.2;

/** A validated case with every default filled in, frozen. */
export function buildCase(input: CaseInput, fileTitle: string, builtIns: BuiltIns, defaults: Defaults): Case {
  const title = defaults.or(input.title, 'title', fileTitle, fileTitle);
  const parts = partsOf(input.gas.mixture);
  const gasNames = parts?.map(({ gas }) => gas) ?? (input.gas.name === undefined ? [] : [input.gas.name]);
  const withoutHash: Omit<Case, 'sha256'> = {
    title,
    gap: kept(GAPS, input.gap, null, () => gapOf(input.gap, defaults)),
    gas: kept(GASES, input.gas, null, () => gasOf(input.gas, parts, builtIns, defaults)),
    electrodes: kept(ELECTRODES, input.electrodes, input.gas, () => electrodesOf(input.electrodes, gasNames, builtIns, defaults)),
    seed: {
      cathodeCurrent: input.seed.cathode_current,
      electrons: defaults.or(input.seed.electrons, 'seed.electrons', 0, '0'),
    },
    supply: supplyOf(input.supply, defaults),
    ...electronsOf(input.electrons, defaults),
    observe: {
      until: input.observe.until,
      currents: [...new Set(defaults.or(input.observe.currents, 'observe.currents', [], 'none'))].sort((a, b) => a - b),
    },
    numerics: {
      cells: defaults.or<number | null>(input.numerics?.cells, 'numerics.cells', null, "the program's choice"),
      tolerance: defaults.or(input.numerics?.tolerance, 'numerics.tolerance', 1e-3, '1e-3'),
    },
  };
  return deepFreeze({ ...withoutHash, sha256: hashCase(withoutHash) });
}

/** What was made of a section of the input, and what else it was made from. */
type Kept<Part> = WeakMap<object, { readonly beside: object | null; readonly part: Part }>;
const GAPS: Kept<PlanarGap> = new WeakMap();
const GASES: Kept<Gas> = new WeakMap();
const ELECTRODES: Kept<Case['electrodes']> = new WeakMap();

/** A part of a case, made once for a section of the input: points of a scan share the sections that it does not vary (sections.ts), and so also what is
 *  built, frozen and hashed of them, and the limits that theory keeps by gas, gap and electrodes. Defaults are noted when a part is made. */
function kept<Part extends object>(known: Kept<Part>, section: object, beside: object | null, make: () => Part): Part {
  const before = known.get(section);
  if (before !== undefined && before.beside === beside) return before.part;
  const part = deepFreeze(make());
  known.set(section, { beside, part });
  return part;
}

/** Nothing where electrons follow the local field: such a case is what it was before there was a choice. */
function electronsOf(input: CaseInput['electrons'], defaults: Defaults): Pick<Case, 'electrons'> {
  const closure = defaults.or(input?.closure, 'electrons.closure', 'local-field', 'local-field');
  if (closure === 'local-field') return {};
  const energy = input?.emission_energy;
  return {
    electrons: {
      closure,
      emissionEnergy: defaults.or(energy === undefined ? undefined : energy / ELEMENTARY_CHARGE, 'electrons.emission_energy', 2, '2 eV'),
      particles: defaults.or(input?.particles, 'electrons.particles', 20000, '20000'),
      seed: defaults.or(input?.seed, 'electrons.seed', 1, '1'),
    },
  };
}

function gapOf(input: CaseInput['gap'], defaults: Defaults): PlanarGap {
  return {
    geometry: input.geometry,
    spacing: input.spacing,
    area: input.area,
    longestPath: defaults.or(input.longest_path, 'gap.longest_path', input.spacing, 'gap.spacing'),
    longestPathGiven: input.longest_path !== undefined,
  };
}

/** The gases of a mixture, by name so that their order in the file does not matter; null where there is none. */
function partsOf(mixture: CaseInput['gas']['mixture']): readonly MixturePart[] | null {
  if (mixture === undefined) return null;
  return Object.entries(mixture)
    .flatMap(([gas, fraction]) => (fraction === undefined ? [] : [{ gas, fraction }]))
    .sort((a, b) => (a.gas < b.gas ? -1 : 1));
}

/** The data of a built-in gas or mixture; null where the case brings all of its own. A mixture of one gas is that gas. */
function dataOf(input: CaseInput['gas'], parts: readonly MixturePart[] | null, builtIns: BuiltIns, defaults: Defaults): GasData | null {
  const known = (gas: string, set?: string): GasData => {
    const data = builtIns.gasData(gas, set);
    if (data === null) throw new Error('gas passed validation without data');
    return data;
  };
  if (parts !== null && parts.length > 1) return mixtureOf(parts.map(({ gas, fraction }) => ({ gas: known(gas), fraction })));
  const name = parts === null ? input.name : parts[0].gas;
  if (name === undefined) return null;
  if (parts !== null) defaults.note(`gas.mixture: ${name} alone, read as gas.name: ${name}`);
  const [standard] = builtIns.dataSets(name);
  return known(name, defaults.or(input.data, 'gas.data', standard, standard));
}

function gasOf(input: CaseInput['gas'], parts: readonly MixturePart[] | null, builtIns: BuiltIns, defaults: Defaults): Gas {
  const builtIn = dataOf(input, parts, builtIns, defaults);
  const isMixture = parts !== null && parts.length > 1;
  const temperature = defaults.or(input.temperature, 'gas.temperature', 293.15, '293.15 K');
  const own = input.coefficients;
  const coefficients =
    own || !builtIn ? coefficientsOf(own ?? {}, builtIn?.coefficients ?? null, temperature, defaults) : builtIn.coefficients;
  // what was known about a breakdown voltage no longer holds once its ionisation coefficient is replaced
  const uncertainty = builtIn && !own?.ionisation && !own?.attachment ? builtIn.breakdownUncertainty : BREAKDOWN_UNCERTAINTY;
  return {
    name: builtIn?.name ?? null,
    ...(builtIn === null || isMixture ? {} : { dataSet: builtIn.set }),
    ...(isMixture ? { mixture: parts } : {}),
    pressure: input.pressure,
    temperature,
    density: input.pressure / (BOLTZMANN * temperature),
    coefficients,
    breakdownUncertainty: uncertainty,
    kineticCrossSection: builtIn?.kineticCrossSection ?? null,
  };
}

function electrodesOf(
  input: CaseInput['electrodes'],
  gases: readonly string[],
  builtIns: BuiltIns,
  defaults: Defaults,
): Case['electrodes'] {
  const left = surfaceOf(input.left, gases, builtIns);
  if (!input.right) defaults.add('electrodes.right', 'same as left');
  return { left, right: input.right ? surfaceOf(input.right, gases, builtIns) : left };
}

/** @param gases  built-in ones, none where the case brings all its coefficients */
function surfaceOf({ material, surface, ion_yield }: ElectrodeInput, gases: readonly string[], builtIns: BuiltIns): Surface {
  if (ion_yield === undefined) {
    const known = material === undefined ? null : knownSurface(material, surface, gases, builtIns);
    if (known === null) throw new Error('an electrode passed validation without a yield');
    return known;
  }
  return {
    material: material ?? null,
    ionYield: yieldOf(ion_yield),
    workFunction: material === undefined ? null : (builtIns.surfaceFor(material, null)?.workFunction ?? null),
  };
}

/** A built-in surface, null where its yield is unknown. */
export function knownSurface(
  material: string,
  condition: ElectrodeInput['surface'],
  gases: readonly string[],
  builtIns: BuiltIns,
): Surface | null {
  if (gases.length > 1) return condition === undefined ? builtIns.surfaceInMixture(material, gases) : null;
  const gas = gases.length === 0 ? null : gases[0];
  if (condition === undefined) return builtIns.surfaceFor(material, gas);
  return gas === null ? null : builtIns.surfaceIn(material, gas, condition);
}

const GIVEN = { source: 'case file', status: 'given', uncertainty: null } as const;

function yieldOf(input: number | YieldInput): IonYield {
  if (typeof input === 'number') return { typical: input, low: input, high: input, ...GIVEN };
  const { low, high, table } = input;
  if (table === undefined) {
    if (input.typical === undefined) throw new Error('ion_yield passed validation without a value');
    const { typical } = input;
    return { typical, low: low ?? typical, high: high ?? typical, ...GIVEN };
  }
  const [x, y] = table.columns.map(({ values }) => values);
  return { typical: 1, low: low ?? 1, high: high ?? 1, ...GIVEN, law: tableLaw(x, y) };
}

const LAWS = new WeakMap<readonly number[], YieldLaw>();

/** The law of a table; the same one each time, so that the points of a scan and both walls share it. */
function tableLaw(x: readonly number[], y: readonly number[]): YieldLaw {
  const known = LAWS.get(y);
  if (known !== undefined) return known;
  const law: YieldLaw = { kind: 'reduced-field', form: { kind: 'table', law: 'plain', x, y } };
  LAWS.set(y, law);
  return law;
}

function supplyOf(input: CaseInput['supply'], defaults: Defaults): SupplySettings {
  const { trip } = input;
  return {
    programme: programmeOf(input.voltage, defaults),
    seriesResistance: input.series_resistance,
    parallelCapacitance: defaults.or(input.parallel_capacitance, 'supply.parallel_capacitance', 0, '0 F'),
    currentLimit: defaults.or<number | null>(input.current_limit, 'supply.current_limit', null, 'none'),
    trip: defaults.or<SupplySettings['trip']>(
      trip && {
        current: trip.current,
        delay: trip.delay,
        senses: defaults.or(trip.senses, 'supply.trip.senses', 'gap', 'gap'),
        action: defaults.or(trip.action, 'supply.trip.action', 'open', 'open'),
      },
      'supply.trip',
      null,
      'none',
    ),
    initialGapVoltage: defaults.or(input.initial_gap_voltage, 'supply.initial_gap_voltage', 0, '0 V'),
  };
}

function programmeOf(voltage: CaseInput['supply']['voltage'], defaults: Defaults): Programme {
  if (voltage.step !== undefined) {
    return { kind: 'step', voltage: voltage.step, riseTime: defaults.or(voltage.rise_time, 'supply.voltage.rise_time', 0, '0 s') };
  }
  if (voltage.ramp) return { kind: 'ramp', ...voltage.ramp };
  const [times, voltages] = voltage.table?.columns ?? [];
  if (!times || !voltages) throw new Error('supply.voltage passed validation without a step, ramp or table');
  return { kind: 'table', times: times.values, voltages: voltages.values };
}
