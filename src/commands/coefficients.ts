import type { Case } from '../case.ts';
import type { Coefficient, GasCoefficients } from '../gases/gas.ts';
import { gases } from '../gases/index.ts';
import { mixtureNotes } from '../gases/mixture.ts';
import type { Surface } from '../surfaces/surface.ts';

/** A coefficient that a case uses, with its name and unit. */
export interface NamedCoefficient {
  readonly name: string;
  readonly label: string;
  /** of the form's values; its argument is E/N in V m² */
  readonly unit: string;
  readonly coefficient: Coefficient;
}

const NAMES: readonly (readonly [keyof GasCoefficients, string, string, string])[] = [
  ['ionisation', 'ionisation', 'ionisation α/N', 'm^2'],
  ['attachment', 'attachment', 'attachment η/N', 'm^2'],
  ['electronMobility', 'electron_mobility', 'electron mobility', '1/(m V s)'],
  ['electronEnergy', 'electron_energy', 'electron energy D/μ', 'V'],
  ['ionMobility', 'ion_mobility', 'ion mobility', '1/(m V s)'],
  ['ionEnergy', 'ion_energy', 'ion energy D/μ', 'V'],
  ['negativeIonMobility', 'negative_ion_mobility', 'negative-ion mobility', '1/(m V s)'],
  ['negativeIonEnergy', 'negative_ion_energy', 'negative-ion energy D/μ', 'V'],
  ['electronIonRecombination', 'electron_ion_recombination', 'recombination of electrons', 'm^3/s'],
  ['ionIonRecombination', 'ion_ion_recombination', 'recombination of ions', 'm^3/s'],
];

/** The coefficients that occur in the gas of a case, in a fixed order. */
export function coefficientsOf(settings: Case): NamedCoefficient[] {
  return namedCoefficients(settings.gas.coefficients);
}

/** Those of a set of data that are there, in the same order. */
export function namedCoefficients(coefficients: Partial<GasCoefficients>): NamedCoefficient[] {
  return NAMES.flatMap(([key, name, label, unit]) => {
    const coefficient = coefficients[key] ?? null;
    return coefficient === null ? [] : [{ name, label, unit, coefficient }];
  });
}

/** What a reader must know of the gas, of a mixture of its rules. */
export function notesOf({ name, mixture }: Case['gas']): readonly string[] {
  if (mixture !== undefined) return mixtureNotes(mixture.map((part) => part.gas));
  return name === null ? [] : (gases[name]?.notes ?? []);
}

/** Every number that a run takes from elsewhere, with its source, as a result file keeps it. SI; E/N in V m². */
export function coefficientsUsed(settings: Case): Record<string, unknown> {
  const { gas, electrodes } = settings;
  const electrode = (surface: Surface): Record<string, unknown> => ({
    material: surface.material,
    ion_yield: surface.ionYield,
    work_function_eV: surface.workFunction,
  });
  return {
    gas: gas.name,
    notes: notesOf(gas),
    breakdown_uncertainty: gas.breakdownUncertainty,
    kinetic_cross_section_m2: gas.kineticCrossSection,
    coefficients: Object.fromEntries(coefficientsOf(settings).map(({ name, unit, coefficient }) => [name, { unit, ...coefficient }])),
    electrodes: { left: electrode(electrodes.left), right: electrode(electrodes.right) },
  };
}
