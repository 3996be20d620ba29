import { TABLE_TEMPERATURE } from '../gases/conversions.ts';
import { curveOf } from '../gases/curves.ts';
import type { Coefficient, GasCoefficients, GasData, Provenance } from '../gases/gas.ts';
import { dataSets, gasData, gases } from '../gases/index.ts';
import { cleanYieldFor, surfaces, yieldLawFor } from '../surfaces/index.ts';
import type { SurfaceData } from '../surfaces/metals.ts';
import type { IonYield } from '../surfaces/surface.ts';
import { type YieldData, yieldCurve } from '../surfaces/yield-law.ts';
import { BOLTZMANN, TOWNSEND } from '../units/constants.ts';
import { VERSION } from '../version.ts';
import { namedCoefficients } from './coefficients.ts';
import { COMMON_CATHODE, isOutside, minimumOf, yieldRow } from './gas-facts.ts';

/* `gapwake gas --json`: `gapwake.gas/1`. SI, E/N in Td; every key is there, null where it does not apply.
 *
 *  { format, version,
 *    gases:    null | [ { name, title, set, sets: [name], ionisation_range_Td: { from, to } | null, breakdown_uncertainty, minimum } ],
 *    surfaces: null | [ { name, title, work_function_eV, ion_yields: { GAS: { low, typical, high } } } ],
 *    gas:      null | { name, title, set, default_set, reason, breakdown_uncertainty, detachment, notes: [text], kinetic_cross_section_m2, minimum,
 *                       coefficients: { NAME: COEFFICIENT }, sets: [ { name, reason, breakdown_uncertainty, coefficients: { NAME: COEFFICIENT } } ],
 *                       ion_yields: { MATERIAL: YIELD }, at: null | [ { reduced_field_Td, coefficients: { NAME: { value, outside_range } },
 *                       ion_yield_laws: { clean, technical } | null } ] },
 *    surface:  null | { name, title, work_function: { value_eV, uncertainty_eV, source, status } | null, note, ion_yields: { GAS: YIELD } } }
 *
 *  minimum:     { voltage_V, pd_Pa_m (at 293.15 K), reduced_field_Td, ion_yield, material } | null, in closed form with the typical yield
 *  COEFFICIENT: { unit, form, range_Td: { from, to } | null, source, status, uncertainty, reference_temperature_K, note }; `form` as src/gases/forms.ts declares it, in V m²
 *  YIELD:       { low, typical, high, source, status, uncertainty, note, clean: { low, typical, high, source, status, uncertainty } | null,
 *                 laws: { clean: LAW, technical: LAW } | null };  LAW: { law, range, source, status, uncertainty, note }
 *  `sets` holds all sets, the default first: that one complete, the others with what they replace. */

type Json = Record<string, unknown>;

function envelope(parts: Json): Json {
  return { format: 'gapwake.gas/1', version: VERSION, gases: null, surfaces: null, gas: null, surface: null, ...parts };
}

/** Everything built in, in short. */
export function listJson(): Json {
  return envelope({
    gases: Object.values(gases).map((gas) => ({
      name: gas.name,
      title: gas.title,
      set: gas.set,
      sets: dataSets(gas.name),
      ionisation_range_Td: rangeJson(gas.coefficients.ionisation.range),
      breakdown_uncertainty: gas.breakdownUncertainty,
      minimum: minimumJson(gas),
    })),
    surfaces: Object.values(surfaces).map(({ name, title, workFunction, yields }) => ({
      name,
      title,
      work_function_eV: workFunction?.value ?? null,
      ion_yields: Object.fromEntries(Object.entries(yields).map(([gas, { low, typical, high }]) => [gas, { low, typical, high }])),
    })),
  });
}

/** One gas with the set of data chosen, and its values at some fields [V m²]. */
export function gasJson(gas: GasData, fields: readonly number[] | null): Json {
  const standard = gases[gas.name];
  return envelope({
    gas: {
      name: gas.name,
      title: gas.title,
      set: gas.set,
      default_set: standard.set,
      reason: gas.reason,
      breakdown_uncertainty: gas.breakdownUncertainty,
      detachment: gas.detachment,
      notes: gas.notes,
      kinetic_cross_section_m2: gas.kineticCrossSection,
      minimum: minimumJson(gas),
      coefficients: coefficientsJson(gas.coefficients),
      sets: dataSets(gas.name).map((name) => {
        const set = gasData(gas.name, name) ?? standard;
        const own = name === standard.set ? standard.coefficients : standard.alternatives[name].coefficients;
        return { name, reason: set.reason, breakdown_uncertainty: set.breakdownUncertainty, coefficients: coefficientsJson(own) };
      }),
      ion_yields: Object.fromEntries(Object.keys(surfaces).map((material) => [material, yieldJson(material, gas.name)])),
      at: fields?.map((x) => valuesJson(gas, x)) ?? null,
    },
  });
}

/** One cathode material. */
export function surfaceJson({ name, title, workFunction, note, yields }: SurfaceData): Json {
  return envelope({
    surface: {
      name,
      title,
      work_function:
        workFunction === null
          ? null
          : {
              value_eV: workFunction.value,
              uncertainty_eV: workFunction.uncertainty,
              source: workFunction.source,
              status: workFunction.status,
            },
      note: note ?? null,
      ion_yields: Object.fromEntries(Object.keys(yields).map((gas) => [gas, yieldJson(name, gas)])),
    },
  });
}

function minimumJson(gas: GasData): Json | null {
  const { typical } = yieldRow(COMMON_CATHODE, gas.name);
  const found = minimumOf(gas, typical);
  if (found === null) return null;
  return {
    voltage_V: found.voltage,
    pd_Pa_m: found.column * BOLTZMANN * TABLE_TEMPERATURE,
    reduced_field_Td: found.reducedField / TOWNSEND,
    ion_yield: typical,
    material: COMMON_CATHODE,
  };
}

function coefficientsJson(coefficients: Partial<GasCoefficients>): Json {
  return Object.fromEntries(
    namedCoefficients(coefficients).map(({ name, unit, coefficient }) => [name, { unit, ...coefficientJson(coefficient) }]),
  );
}

function coefficientJson(coefficient: Coefficient): Json {
  return {
    form: coefficient.form,
    range_Td: rangeJson(coefficient.range),
    ...provenanceJson(coefficient),
    reference_temperature_K: coefficient.referenceTemperature ?? null,
    note: coefficient.note ?? null,
  };
}

function provenanceJson({ source, status, uncertainty }: Provenance): Json {
  return { source, status, uncertainty };
}

/** an open end is null */
function rangeJson(range: Coefficient['range']): Json | null {
  if (range === null) return null;
  return { from: range.from / TOWNSEND, to: range.to / TOWNSEND > 1e12 ? null : range.to / TOWNSEND };
}

function yieldJson(material: string, gas: string): Json {
  const bare = ({ low, typical, high, ...rest }: IonYield): Json => ({ low, typical, high, ...provenanceJson(rest) });
  const row = yieldRow(material, gas);
  const clean = cleanYieldFor(material, gas);
  const laws = [yieldLawFor(material, gas, 'clean'), yieldLawFor(material, gas, 'technical')].map((law) => law && lawJson(law));
  return {
    ...bare(row),
    note: row.note ?? null,
    clean: clean === null ? null : bare(clean),
    laws: laws[0] === null ? null : { clean: laws[0], technical: laws[1] },
  };
}

function lawJson({ law, range, note, ...rest }: YieldData): Json {
  return { law, range, ...provenanceJson(rest), note: note ?? null };
}

function valuesJson(gas: GasData, x: number): Json {
  const law = (state: 'clean' | 'technical'): number | null => {
    const data = yieldLawFor(COMMON_CATHODE, gas.name, state);
    return data === null ? null : yieldCurve(data.law).valueAt(x);
  };
  const values = namedCoefficients(gas.coefficients).map(({ name, coefficient }) => [
    name,
    { value: curveOf(coefficient.form).valueAt(x), outside_range: isOutside(coefficient, x) },
  ]);
  const clean = law('clean');
  return {
    reduced_field_Td: x / TOWNSEND,
    coefficients: Object.fromEntries(values),
    ion_yield_laws: clean === null ? null : { clean, technical: law('technical') },
  };
}
