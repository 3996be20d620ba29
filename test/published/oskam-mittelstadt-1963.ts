import { ionMobilityInTime } from '../help/transit.ts';
import { type Source, within } from './check.ts';

export const oskamMittelstadt1963: Source = {
  source: 'Oskam and Mittelstadt, Ion mobilities in helium, neon, and argon, Phys. Rev. 132, 1435, 1963',
  checks: [
    {
      check: 'K0 of Ar+ in argon at low field, afterglow, timed at 10 Td',
      published: 1.6,
      unit: 'cm²/(V s)',
      allowed: within(0.1),
      reason: 'measurements at low field run from 1.53 to 1.63, 6 %; the fit used states 10 %',
      status: 'read',
      independentOf: 'this paper: the data are a fit by Phelps and Petrović',
      simulated: true,
      compute: () => ionMobilityInTime(10),
    },
  ],
};
