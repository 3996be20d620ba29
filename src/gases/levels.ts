/** Energies of the built-in gases that decide which ion or excited atom can ionise what. */
export interface Levels {
  /** lowest ionisation energy [eV]; of oxygen for air */
  readonly ionisation: number;
  /** lowest metastable level of the atom [eV]; null for molecules, whose long-lived states carry too little to ionise anything here (N2 A³Σ: 6.2 eV) */
  readonly metastable: number | null;
}

/** Source: NIST tables of ionisation energies and of atomic levels, from memory (H), 0.01 eV; those of the molecules are adiabatic ones.
 *  Metastable states: He 2³S, Ne ³P2, Ar ³P2, Kr ³P2, Xe ³P2; the second of each pair lies 0.1 to 1.1 eV higher. */
const LEVELS: Readonly<Record<string, Levels>> = {
  helium: { ionisation: 24.59, metastable: 19.82 },
  neon: { ionisation: 21.56, metastable: 16.62 },
  argon: { ionisation: 15.76, metastable: 11.55 },
  krypton: { ionisation: 14.0, metastable: 9.92 },
  xenon: { ionisation: 12.13, metastable: 8.32 },
  hydrogen: { ionisation: 15.43, metastable: null },
  nitrogen: { ionisation: 15.58, metastable: null },
  oxygen: { ionisation: 12.07, metastable: null },
  air: { ionisation: 12.07, metastable: null },
  'carbon dioxide': { ionisation: 13.77, metastable: null },
  'water vapour': { ionisation: 12.62, metastable: null },
  'sulphur hexafluoride': { ionisation: 15.32, metastable: null },
};

/** The levels of a built-in gas; null for any other. */
export function levelsOf(gas: string): Levels | null {
  return Object.hasOwn(LEVELS, gas) ? LEVELS[gas] : null;
}

/** Is it one of the rare gases, whose atoms keep metastable levels? */
export function isRareGas(gas: string): boolean {
  return levelsOf(gas)?.metastable != null;
}

/** A gas whose metastable atoms ionise another one. */
export interface PenningPair {
  readonly metastable: string;
  readonly ionised: string;
  /** [eV], metastable level and ionisation energy: the first is the higher */
  readonly level: number;
  readonly ionisation: number;
}

/** The Penning pairs among gases, in the order of their names as given.
 *
 *  @example  penningPairs(['helium', 'argon']) is one pair: helium (19.82 eV) ionises argon (15.76 eV) */
export function penningPairs(names: readonly string[]): PenningPair[] {
  return names.flatMap((metastable) => {
    const level = levelsOf(metastable)?.metastable ?? null;
    if (level === null) return [];
    return names.flatMap((ionised) => {
      const ionisation = levelsOf(ionised)?.ionisation ?? Number.POSITIVE_INFINITY;
      return ionisation < level ? [{ metastable, ionised, level, ionisation }] : [];
    });
  });
}
