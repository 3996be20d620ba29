import type { Form } from '../gases/forms.ts';
import type { Coefficient, GasCoefficients } from '../gases/gas.ts';
import { BOLTZMANN, ELEMENTARY_CHARGE, LOSCHMIDT } from '../units/constants.ts';
import type { DimensionName } from '../units/index.ts';
import type { Defaults } from './defaults.ts';
import type { Dimensioned } from './fields.ts';
import type { CoefficientsInput, GrowthInput, PlainInput, Validity } from './schema.ts';

/** temperature at which p-based data hold unless the case says otherwise [K] */
export const REFERENCE_TEMPERATURE = 293.15;

/** A case's own coefficients, N-based and in SI, over the built-in ones (if any).
 *
 *  p-based data are turned into N-based ones once, with p = N k T_ref: α/N = (α/p) k T_ref, E/N = (E/p) k T_ref, μN = μp/(k T_ref).
 *  A reduced mobility K0 refers to the Loschmidt density: μN = K0 N0. */
export function coefficientsOf(
  input: CoefficientsInput,
  builtIn: GasCoefficients | null,
  temperature: number,
  defaults: Defaults,
): GasCoefficients {
  const reader = new Reader(input.reference_temperature, defaults);
  const growth = (key: 'ionisation' | 'attachment'): Coefficient | null => {
    const given = input[key];
    return given ? reader.growth(given, key) : (builtIn?.[key] ?? null);
  };
  const plain = (key: PlainKey): Coefficient | null => {
    const given = input[key];
    return given ? reader.plain(given, key) : null;
  };
  const required = (coefficient: Coefficient | null, key: string): Coefficient => {
    if (coefficient === null) throw new Error(`gas.coefficients.${key} passed validation without a value`);
    return coefficient;
  };
  const constant = (value: number, key: string, text: string, source: string): Coefficient => {
    defaults.add(`gas.coefficients.${key}`, text);
    return { form: { kind: 'constant', value }, range: null, source, status: 'computed', uncertainty: null };
  };

  const ionMobility = required(plain('ion_mobility') ?? builtIn?.ionMobility ?? null, 'ion_mobility');
  const thermal = (BOLTZMANN * temperature) / ELEMENTARY_CHARGE;
  const ionEnergy =
    plain('ion_energy') ??
    builtIn?.ionEnergy ??
    constant(
      thermal,
      'ion_energy',
      `${thermal.toPrecision(4)} V, kT/e at gas.temperature`,
      'Einstein relation, D/μ = kT/e at the gas temperature',
    );
  const attachment = growth('attachment');
  let negativeIonMobility = plain('negative_ion_mobility') ?? builtIn?.negativeIonMobility ?? null;
  let negativeIonEnergy = plain('negative_ion_energy') ?? builtIn?.negativeIonEnergy ?? null;
  if (attachment !== null && negativeIonMobility === null) {
    defaults.add('gas.coefficients.negative_ion_mobility', 'as ion_mobility');
    negativeIonMobility = ionMobility;
  }
  if (attachment !== null && negativeIonEnergy === null) {
    defaults.add('gas.coefficients.negative_ion_energy', 'as ion_energy');
    negativeIonEnergy = ionEnergy;
  }
  const recombination = input.recombination ? given({ kind: 'constant', value: input.recombination.value }) : null;
  return {
    ionisation: required(growth('ionisation'), 'ionisation'),
    attachment,
    electronMobility: required(plain('electron_mobility') ?? builtIn?.electronMobility ?? null, 'electron_mobility'),
    electronEnergy: plain('electron_energy') ?? builtIn?.electronEnergy ?? constant(0, 'electron_energy', '0 V', 'default of a case'),
    ionMobility,
    ionEnergy,
    negativeIonMobility,
    negativeIonEnergy,
    // one number stands for both: handbooks that give one use it for electrons and for negative ions alike
    electronIonRecombination: recombination ?? builtIn?.electronIonRecombination ?? null,
    ionIonRecombination: (attachment !== null ? recombination : null) ?? builtIn?.ionIonRecombination ?? null,
  };
}

type PlainKey = 'electron_mobility' | 'electron_energy' | 'ion_mobility' | 'ion_energy' | 'negative_ion_mobility' | 'negative_ion_energy';

const given = (form: Form, range: Coefficient['range'] = null): Coefficient => ({
  form,
  range,
  source: 'case file',
  status: 'given',
  uncertainty: null,
});

/** Factor from a p-based SI value to the N-based one at kT [J]; 1 for what is N-based already. */
function factor(dimension: DimensionName, kT: number): number {
  switch (dimension) {
    case 'growthOverPressure':
    case 'fieldOverPressure':
      return kT;
    case 'rootFieldOverPressure':
      return Math.sqrt(kT);
    case 'mobilityTimesPressure':
      return 1 / kT;
    default:
      return 1;
  }
}

const SCALED = new WeakMap<readonly number[], Map<number, readonly number[]>>();

/** A column times a factor; the same list each time, so that the points of a scan share it. */
function scaled(values: readonly number[], scale: number): readonly number[] {
  const known = SCALED.get(values) ?? new Map<number, readonly number[]>();
  SCALED.set(values, known);
  const list = known.get(scale) ?? values.map((value) => value * scale);
  known.set(scale, list);
  return list;
}

class Reader {
  readonly #shared: number | undefined;
  readonly #defaults: Defaults;

  constructor(shared: number | undefined, defaults: Defaults) {
    this.#shared = shared;
    this.#defaults = defaults;
  }

  growth(input: GrowthInput, key: string): Coefficient {
    const kT = this.#kT(input, key, [input.A, input.B, input.C, input.D, input.table?.columns[0], input.table?.columns[1]]);
    if (input.table) return this.#table(input.table.columns, 'growth', input, kT);
    const si = (value: Dimensioned | undefined): number => (value ? value.value * factor(value.dimension, kT) : Number.NaN);
    const form: Form =
      input.form === 'root' ? { kind: 'root', C: si(input.C), D: si(input.D) } : { kind: 'exponential', A: si(input.A), B: si(input.B) };
    return given(form, range(input, kT, null));
  }

  plain(input: PlainInput, key: string): Coefficient {
    if ('dimension' in input) {
      const kT = this.#kT({}, key, [input]);
      return given({ kind: 'constant', value: input.value * factor(input.dimension, kT) });
    }
    const kT = this.#kT(input, key, [input.value, input.table?.columns[0], input.table?.columns[1]]);
    if (input.table) return this.#table(input.table.columns, 'plain', input, kT);
    const value =
      input.K0 !== undefined ? input.K0 * LOSCHMIDT : (input.value?.value ?? Number.NaN) * factor(input.value?.dimension ?? 'number', kT);
    return given({ kind: 'constant', value }, range(input, kT, null));
  }

  #table(
    columns: readonly { readonly values: readonly number[]; readonly dimension: DimensionName }[],
    law: 'growth' | 'plain',
    input: Validity,
    kT: number,
  ): Coefficient {
    const [x, y] = columns.map((column) => scaled(column.values, factor(column.dimension, kT)));
    return given({ kind: 'table', law, x, y }, range(input, kT, { from: x[0], to: x[x.length - 1] }));
  }

  /** k T_ref of a coefficient; the default temperature is noted where it matters: where a value is p-based */
  #kT(input: Validity, key: string, values: readonly ({ readonly dimension: DimensionName } | undefined)[]): number {
    const own = input.reference_temperature ?? this.#shared;
    const bounds = [input.valid_from, input.valid_to];
    const isPressureBased = [...values, ...bounds].some((value) => value !== undefined && factor(value.dimension, 2) !== 1);
    if (isPressureBased) {
      if (own === undefined) this.#defaults.add('gas.coefficients.reference_temperature', `${REFERENCE_TEMPERATURE} K`);
      this.#defaults.note(
        `gas.coefficients.${key}: given against pressure, turned into values against density at ${own ?? REFERENCE_TEMPERATURE} K`,
      );
    }
    return BOLTZMANN * (own ?? REFERENCE_TEMPERATURE);
  }
}

function range(input: Validity, kT: number, fallback: Coefficient['range']): Coefficient['range'] {
  const { valid_from, valid_to } = input;
  if (!valid_from && !valid_to) return fallback;
  return {
    from: valid_from ? valid_from.value * factor(valid_from.dimension, kT) : (fallback?.from ?? 0),
    // no upper end given: the largest double, because Infinity is lost in JSON
    to: valid_to ? valid_to.value * factor(valid_to.dimension, kT) : (fallback?.to ?? Number.MAX_VALUE),
  };
}
