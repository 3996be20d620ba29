import { ionMobilityInTime } from '../help/transit.ts';
import { type Source, within } from './check.ts';

/** Ar+ in argon at 300 K: E/N [Td], K0 [cm²/(V s)] */
const ARGON = [
  [10, 1.53],
  [50, 1.44],
  [100, 1.3],
  [200, 1.09],
  [300, 0.95],
  [400, 0.855],
  [600, 0.715],
  [1000, 0.565],
] as const;

const shared = { unit: 'cm²/(V s)', status: 'from memory (M)', simulated: true } as const;

export const ellis1976: Source = {
  source: 'Ellis, Pai, McDaniel, Mason and Viehland, At. Data Nucl. Data Tables 17, 177, 1976 and 22, 179, 1978',
  checks: [
    ...ARGON.map(([td, K0]) => ({
      ...shared,
      check: `K0 of Ar+ in argon at ${td} Td, timed in two gaps`,
      published: K0,
      allowed: within(0.05),
      reason: 'the accuracy that the compilation states, 3 to 5 %',
      independentOf: 'this table: the data are a fit by Phelps and Petrović',
      compute: () => ionMobilityInTime(td),
    })),
    {
      ...shared,
      check: 'K0 of He+ in helium at low field (5 Td), timed in two gaps',
      published: 10.4,
      allowed: within(0.05),
      reason: 'the accuracy that the compilation states, 3 to 5 %; other measurements give 10.7 and 10.8',
      independentOf: 'this table: the data are fitted to Hornbeck, Oskam and Mittelstadt, Barata and Conde',
      compute: () => ionMobilityInTime(5, null, 'helium', 10),
    },
  ],
};
