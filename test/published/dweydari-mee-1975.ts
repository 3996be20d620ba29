import { surfaces } from '../../src/surfaces/index.ts';
import { type Source, within } from './check.ts';

export const dweydariMee1975: Source = {
  source: 'Dweydari and Mee, 1975: silver, polycrystal and faces',
  checks: [
    {
      check: 'work function of silver, polycrystal',
      published: 4.26,
      unit: 'eV',
      allowed: within(0.05),
      reason: 'either states some 0.05 eV; polycrystals average faces of 4.52 to 4.74 eV and rougher spots differently: 0.2 eV',
      status: 'read',
      independentOf: 'this paper: the data are Riviere’s, 1957',
      simulated: false,
      compute: () => surfaces.silver.workFunction?.value ?? Number.NaN,
    },
  ],
};
