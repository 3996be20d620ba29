import { type CrossSectionSet, type ProcessKind, tabulated } from './cross-sections.ts';

/** A user's cross-sections as plain data, which can be handed to a worker. */
export interface UserSet {
  readonly title: string;
  /** [kg] */
  readonly mass: number;
  readonly processes: readonly UserProcess[];
  /** w of the ejected electrons [eV]; null: the threshold of each ionisation */
  readonly ejectedWidth: number | null;
}

export interface UserProcess {
  readonly kind: ProcessKind;
  readonly name: string;
  /** [eV] */
  readonly threshold: number;
  /** [eV], rising, and [m²] */
  readonly energies: readonly number[];
  readonly values: readonly number[];
}

/** The set that a user's data make: straight lines between rows. Elastic scattering comes first. */
export function setOfUser({ title, mass, processes, ejectedWidth }: UserSet): CrossSectionSet {
  const isElastic = ({ kind }: UserProcess): boolean => kind === 'elastic' || kind === 'momentum-transfer';
  return {
    name: 'own',
    title,
    mass,
    processes: [...processes.filter(isElastic), ...processes.filter((process) => !isElastic(process))].map((process) => ({
      kind: process.kind,
      name: process.name,
      threshold: process.threshold,
      crossSection: tabulated(process.energies, process.values, process.threshold),
    })),
    sharing: { kind: 'opal', width: ejectedWidth },
    // where the first of the processes ends that every electron meets or makes
    range: {
      from: 0,
      to: Math.min(
        ...processes
          .filter((process) => isElastic(process) || process.kind === 'ionisation')
          .map(({ energies }) => energies[energies.length - 1]),
      ),
    },
    temperature: null,
    source: 'cross-sections given by the user',
    status: 'given',
    uncertainty: null,
    notes: [],
  };
}
