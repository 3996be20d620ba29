import { surfaces } from '../../src/surfaces/index.ts';
import { type Check, type Source, within } from './check.ts';

/** Work functions of polycrystals [eV] */
const VALUES: readonly (readonly [material: string, value: number])[] = [
  ['tungsten', 4.55],
  ['copper', 4.65],
  ['silver', 4.26],
  ['gold', 5.1],
  ['aluminium', 4.28],
  ['nickel', 5.15],
  ['molybdenum', 4.6],
  ['iron', 4.5],
];

const row = ([material, value]: (typeof VALUES)[number]): Check => ({
  check: `work function of ${material}`,
  published: value,
  unit: 'eV',
  allowed: within(0.1),
  reason: 'faces of one metal differ by 0.5 eV, and films by contact potential lie up to 0.4 eV below later polycrystals: 10 %',
  status: 'from memory (M)',
  independentOf: 'this compilation: the data are Riviere’s, 1957, by contact potential',
  simulated: false,
  compute: () => surfaces[material].workFunction?.value ?? Number.NaN,
});

export const michaelson1977: Source = { source: 'Michaelson, J. Appl. Phys. 48, 4729, 1977', checks: VALUES.map(row) };
