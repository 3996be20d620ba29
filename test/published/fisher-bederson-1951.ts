import { lagOf } from '../help/measured.ts';
import type { Check, Source } from './check.ts';

const row = (torr: number): Check => ({
  check: `formative lag in air, 1 cm at ${torr} Torr, 2 % overvoltage`,
  published: 1e-6,
  unit: 's',
  allowed: { low: 100, high: 1000 },
  knownLimit: true,
  reason:
    'photons feed back within an electron transit; the model has only ions and is 100 to 1000 times too slow: unsafe for a pulse, as the README says',
  status: 'from memory (M)',
  independentOf: 'the measurement',
  simulated: true,
  slow: true,
  compute: () => lagOf('air', torr, 0.01, 0.02, 1e5),
});

export const fisherBederson1951: Source = {
  source: 'Fisher and Bederson, Phys. Rev. 81, 109, 1951',
  checks: [row(200), row(760)],
};
