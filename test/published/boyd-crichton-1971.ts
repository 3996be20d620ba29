import { criticalField } from '../gases/townsend.ts';
import { type Source, within } from './check.ts';

export const boydCrichton1971: Source = {
  source: 'Boyd and Crichton 1971, as given by Kuffel et al., ch. 5: (α − η)/p = 27.7 (E/p − 88.5), kV, mm, bar',
  checks: [
    {
      check: 'sulphur hexafluoride: field at which ionisation balances attachment',
      // 88.5 kV/(cm bar) at 20 °C, N = 1e5 Pa/(k 293.15 K) = 2.4707e25 1/m³
      published: 358.2,
      unit: 'Td',
      allowed: within(0.02),
      reason: 'every measurement of this field lies within 2 % of 360 Td',
      status: 'from memory (H)',
      independentOf: 'this paper: the data are Morrow’s fits of α and η, which cross there',
      simulated: false,
      compute: () => criticalField('sulphur hexafluoride'),
    },
  ],
};
