import type { IonYield } from './surface.ts';

/** Cathode metals: net yields by gas and work functions, as data.
 *
 *  A net yield is what a breakdown measurement gives: electrons that leave the cathode for good per ion that arrives, photons and metastables included.
 *  The state of a surface (oxide, gas layers, wear) matters more than the metal beneath, so most metals share a row; a row of its own means a published value. */

const any: IonYield = {
  typical: 0.01,
  low: 1e-3,
  high: 0.3,
  source:
    'handbook range for technical surfaces, 1e-3 to 1e-1, widened to slow He+ on clean metal, 0.3 (Hagstrum, Phys. Rev. 96, 325, 1954)',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'For any gas without a row of its own: known to a factor of ten. Give ion_yield in the case if you know better.',
};

const argon: IonYield = {
  typical: 0.07,
  low: 0.017,
  high: 0.16,
  source:
    'Phelps and Petrović, Plasma Sources Sci. Technol. 8, R21, 1999: 0.07 for Ar+ below 500 eV on clean metal; low: their dirty metal at 10 eV; high: sputter targets, Depla et al., 2009',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'On dirty metal 0.02 to 0.03 at the ion energies of breakdown. The clean value gives the lower breakdown voltage: safe.',
};

const nitrogen: IonYield = {
  typical: 0.03,
  low: 1e-3,
  high: 0.15,
  source:
    'gives, with the α of nitrogen here, the minimum of 275 V for nitrogen on iron (von Engel, Ionized Gases, 1965); low: DeBitetto and Fisher, 1956, nickel near 40 V/(cm Torr); ' +
    'high: normal cathode falls in nitrogen (180 V on aluminium) by the relation of von Engel and Steenbeck; potential emission on clean metal gives 0.10',
  status: 'from memory (M)',
  uncertainty: null,
};

const air: IonYield = {
  typical: 0.01,
  low: 1e-3,
  high: 0.1,
  source: 'default for technical surfaces in handbooks, 0.01; spread 1e-3 to 1e-1',
  status: 'second-hand',
  uncertainty: null,
  note: '0.007 gives, with the α of air here, the measured minimum of 327 V. The spread is from memory (M).',
};

const helium: IonYield = {
  typical: 0.18,
  low: 0.03,
  high: 0.35,
  source:
    'gives, with the α of helium here, the minimum of 156 V (Naidu and Kamaraju, High Voltage Engineering); high: slow He+ on clean metal, 0.29 to 0.30 (Hagstrum, Phys. Rev. 96, 325, 1954), with metastables; low: our guess for dirty metal',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'An ion of helium carries 24.6 eV: the highest yields of all gases. The same minimum with the set `raizer` needs 0.008.',
};

const neon: IonYield = {
  typical: 0.025,
  low: 5e-3,
  high: 0.25,
  source:
    'gives, with the α of neon here, the minimum of 244 to 245 V (on iron: von Engel, Ionized Gases, 1965; Kuffel et al. 2000); high: slow Ne+ on clean metal, 0.21 to 0.25 (Hagstrum 1954/56); low: our guess for dirty metal',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'Clean metal yields ten times as much, and 105 V: give ion_yield for a baked and sputtered cathode.',
};

const krypton: IonYield = {
  typical: 0.05,
  low: 2e-3,
  high: 0.1,
  source: 'slow Kr+ on clean tungsten, 0.05, on molybdenum 0.07 (Hagstrum 1954/56); low: as for argon on iron',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'No minimum was found to hold it against. The clean value gives the lower breakdown voltage: safe.',
};

const xenon: IonYield = {
  typical: 0.02,
  low: 1e-3,
  high: 0.1,
  source: 'slow Xe+ on clean tungsten and molybdenum, 0.02 (Hagstrum 1954/56); spread as for technical surfaces in handbooks',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'No minimum was found to hold it against.',
};

const hydrogen: IonYield = {
  typical: 0.03,
  low: 1e-3,
  high: 0.2,
  source:
    'gives, with the α of hydrogen here, the minimum of 273 V (Naidu and Kamaraju, High Voltage Engineering); low: DeBitetto and Fisher, 1956 (read), nickel near 20 V/(cm Torr); high: normal cathode falls in hydrogen (170 V on ' +
    'aluminium) by the relation of von Engel and Steenbeck',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'Published minima of 230 to 295 V need 0.053 to 0.022.',
};

const oxygen: IonYield = {
  typical: 3e-3,
  low: 2e-4,
  high: 0.05,
  source:
    'between what the minimum of 450 V needs with the α of oxygen here, 3e-4 (Naidu and Kamaraju; Kuffel et al. 2000; von Engel 1965), and what normal cathode falls give by the relation of von Engel and Steenbeck, 0.003 to 0.01; ends: ours',
  status: 'from memory (L)',
  uncertainty: null,
  note: 'Cathodes oxidise, which lowers the yield of metals and may raise that of aluminium and magnesium. The typical value gives the lower breakdown voltage of the two: safe.',
};

const carbonDioxide: IonYield = {
  typical: 3e-3,
  low: 5e-4,
  high: 0.05,
  source:
    'above what the minimum of 420 V needs with the α of carbon dioxide here, 1.3e-3 (Naidu and Kamaraju; Kuffel et al. 2000; von Engel 1965), as normal cathode falls of 410 to 526 V do by the relation of von Engel and Steenbeck; ends: ours',
  status: 'from memory (L)',
  uncertainty: null,
  note: 'The typical value gives 370 V: safe.',
};

const waterVapour: IonYield = {
  typical: 3e-3,
  low: 3e-4,
  high: 0.05,
  source:
    'above what the minimum of 480 V (Škoro et al., Phys. Rev. E 84, 055401, 2011, read) needs with the α of water vapour here, 4e-4; ends: ours',
  status: 'from memory (L)',
  uncertainty: null,
  note: 'The typical value gives 350 V: safe.',
};

const sulphurHexafluoride: IonYield = {
  typical: 2e-3,
  low: 1e-4,
  high: 0.05,
  source:
    'above what the minimum of 507 V (Kuffel, Zaengl and Kuffel 2000) needs with the α of sulphur hexafluoride here, 1.3e-4; ends: ours',
  status: 'from memory (L)',
  uncertainty: null,
  note: 'The typical value gives 360 V: safe. At large pd the yield hardly matters.',
};

const ironInAir: IonYield = {
  typical: 0.02,
  low: 1e-3,
  high: 0.1,
  source: 'air on iron, 0.02, handbook value used for the normal cathode fall (Cobine, Gaseous Conductors, 1941)',
  status: 'from memory (M)',
  uncertainty: null,
  note: 'The minimum of 330 V for air on iron (von Engel 1965) needs 0.007 with the α of air here; the larger value is the safe side.',
};

const ironInArgon: IonYield = {
  ...argon,
  low: 1.9e-3,
  source: `${argon.source}; low here: gives the minimum of 265 V for argon on iron (von Engel, Ionized Gases, 1965)`,
};

/** A published work function. */
export interface WorkFunction {
  /** [eV] */
  readonly value: number;
  readonly source: string;
  readonly status: 'read' | 'from memory (M)';
  /** [eV] */
  readonly uncertainty: number;
}

/** One cathode material. */
export interface SurfaceData {
  readonly name: string;
  readonly title: string;
  /** by name of the gas; `any` for every other gas */
  readonly yields: Readonly<Record<string, IonYield>> & { readonly any: IonYield };
  readonly workFunction: WorkFunction | null;
  readonly note?: string;
}

/** Contact-potential values against tungsten, of films evaporated in vacuum; technical surfaces differ by tenths of an eV. */
function riviere(value: number): WorkFunction {
  return {
    value,
    source: 'Riviere, 1957, contact potential of vacuum films, tungsten 4.565 eV as reference',
    status: 'read',
    uncertainty: 0.05,
  };
}

const common = {
  argon,
  nitrogen,
  air,
  helium,
  neon,
  krypton,
  xenon,
  hydrogen,
  oxygen,
  'carbon dioxide': carbonDioxide,
  'water vapour': waterVapour,
  'sulphur hexafluoride': sulphurHexafluoride,
  any,
};
const likeIron = { ...common, argon: ironInArgon, air: ironInAir };

export const metals: readonly SurfaceData[] = [
  { name: 'nickel', title: 'Nickel', yields: common, workFunction: riviere(4.74) },
  { name: 'copper', title: 'Copper', yields: common, workFunction: riviere(4.52) },
  {
    name: 'aluminium',
    title: 'Aluminium',
    yields: common,
    workFunction: riviere(4.2),
    note: 'Always oxidised: normal cathode falls (100 V in argon) point to a yield near the high end. A thick oxide charges up, which is outside the model.',
  },
  {
    name: 'molybdenum',
    title: 'Molybdenum',
    yields: common,
    workFunction: riviere(4.22),
    note: 'Slow ions on atomically clean molybdenum: Ar+ 0.12, He+ 0.30, Ne+ 0.25 (Hagstrum 1956, from memory, M), reached only after flashing in vacuum.',
  },
  {
    name: 'tungsten',
    title: 'Tungsten',
    yields: common,
    workFunction: riviere(4.565),
    note: 'Slow ions on atomically clean tungsten: Ar+ 0.095, He+ 0.29, Ne+ 0.21 (Hagstrum 1954/56, from memory, H), reached only after flashing in vacuum.',
  },
  { name: 'iron', title: 'Iron', yields: likeIron, workFunction: riviere(4.17) },
  {
    name: 'stainless steel',
    title: 'Stainless steel',
    yields: likeIron,
    workFunction: { value: 4.4, source: 'about 4.4 eV, common handbook figure', status: 'from memory (M)', uncertainty: 0.2 },
    note: 'Yields of iron, its main component; no breakdown values for stainless steel were found.',
  },
  { name: 'gold', title: 'Gold', yields: common, workFunction: riviere(4.7) },
  { name: 'silver', title: 'Silver', yields: common, workFunction: riviere(4.31) },
  {
    name: 'graphite',
    title: 'Graphite',
    yields: common,
    workFunction: { value: 4.6, source: 'about 4.6 eV, common handbook figure', status: 'from memory (M)', uncertainty: 0.2 },
    note: 'Yields of technical metals: normal cathode falls on carbon (240 V in hydrogen, 526 V in carbon dioxide) are at the high end of those on metals, so the yield is rather lower.',
  },
  {
    name: 'metal',
    title: 'Unspecified technical metal',
    yields: { ...common, argon: { ...argon, low: 1.9e-3, source: ironInArgon.source } },
    workFunction: null,
    note: 'For a metal not listed, or not known.',
  },
];
