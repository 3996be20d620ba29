import { ionMobilityInTime } from '../help/transit.ts';
import { type Source, within } from './check.ts';

const shared = {
  unit: 'cm²/(V s)',
  allowed: within(0.1),
  reason: 'measurements at low field run from 1.53 to 1.63, 6 %; the fit used states 10 %',
  independentOf: 'this paper: the data are a fit by Phelps and Petrović',
  simulated: true,
  compute: () => ionMobilityInTime(10),
} as const;

export const hornbeck1951: Source = {
  source: 'Hornbeck, The drift velocities of molecular and atomic ions in He, Ne, and A, Phys. Rev. 84, 615, 1951',
  checks: [
    { ...shared, check: 'K0 of Ar+ in argon at low field, timed at 10 Td', published: 1.63, status: 'read' },
    {
      ...shared,
      check: 'K0 of Ar+ in argon at low field, Holstein’s theory, timed at 10 Td',
      published: 1.64,
      status: 'second-hand',
      reason: 'theory of charge transfer good to some 5 %; the fit used states 10 %',
    },
    {
      ...shared,
      check: 'K0 of Ne+ in neon at low field, theory quoted, timed at 10 Td',
      published: 4.1,
      status: 'second-hand',
      reason: 'theory of charge transfer good to some 5 %; measured values differ by 7 %',
      independentOf: 'the theory: the data are fitted to measurements',
      compute: () => ionMobilityInTime(10, null, 'neon', 4),
    },
    {
      ...shared,
      check: 'K0 of He+ in helium at low field, Massey and Mohr, timed at 5 Td',
      published: 11,
      status: 'second-hand',
      reason: 'theory of charge transfer good to some 5 %; the data state 10 %',
      independentOf: 'the theory: the data are fitted to measurements',
      compute: () => ionMobilityInTime(5, null, 'helium', 10),
    },
  ],
};
