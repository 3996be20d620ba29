import { lagOf } from '../help/measured.ts';
import { type Check, type Source, within } from './check.ts';

const row = (gas: string): Check => ({
  check: `formative lag in ${gas} at 1 Torr cm: 1 % overvoltage over 2 %`,
  published: 2,
  unit: '',
  allowed: within(0.15),
  reason:
    't = T/(q − 1) ln[…] at small overvoltage; the logarithm, and q − 1 against V, both bend by a few per cent over the factor of two',
  status: 'from memory (M)',
  independentOf: 'the formula',
  simulated: true,
  compute: () => lagOf(gas, 1, 0.03, 0.01) / lagOf(gas, 1, 0.03, 0.02),
});

export const schade1937: Source = {
  source: 'Schade, Z. Phys. 104, 487, 1937',
  checks: [row('argon'), row('nitrogen')],
};
