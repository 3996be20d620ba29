import { criticalField } from '../gases/townsend.ts';
import { type Check, type PublishedStatus, type Source, spread } from './check.ts';

/** Where ionisation balances two-body attachment [Td], as a range */
const FIELDS: readonly (readonly [gas: string, from: number, to: number, status: PublishedStatus, ours: string])[] = [
  ['air', 100, 130, 'common practice', 'fits of α and η by Morrow and Lowke'],
  ['oxygen', 106, 121, 'from memory (M)', 'constants of Lieberman and Lichtenberg and our Boltzmann solution'],
  ['carbon dioxide', 80, 90, 'from memory (L)', 'constants of Raizer and our Boltzmann solution'],
  ['water vapour', 125, 135, 'from memory (L)', 'constants of Raizer and our Boltzmann solution'],
];

const row = ([gas, from, to, status, ours]: (typeof FIELDS)[number]): Check => {
  const published = (from + to) / 2;
  return {
    check: `${gas}: field at which ionisation balances attachment, ${from} to ${to}`,
    published,
    unit: 'Td',
    allowed: spread(published, from, to, 0.1),
    reason: 'the published range and 10 % beyond: α and η there are known to a factor of 1.5 and cross steeply',
    status,
    independentOf: `this field: ${ours} cross there`,
    simulated: false,
    compute: () => criticalField(gas),
  };
};

export const criticalFields: Source = { source: 'Critical fields of attaching gases: handbooks', checks: FIELDS.map(row) };
