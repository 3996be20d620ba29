import { alphaRow } from './alpha-rows.ts';
import type { Source } from './check.ts';

const share = 0.25;

export const lieberman2005: Source = {
  source: 'Lieberman and Lichtenberg, Principles of Plasma Discharges, 2nd ed., 2005, Table 14.1',
  checks: [
    alphaRow({ gas: 'helium', author: [2.8, 77], at: 90, share, status: 'second-hand', ours: 'Ward’s form' }),
    alphaRow({ gas: 'argon', author: [11.5, 176], at: 250, share, status: 'second-hand', ours: 'a fit by Phelps and Petrović' }),
    alphaRow({ gas: 'nitrogen', author: [11.8, 325], at: 300, share, status: 'second-hand', ours: 'constants of Raizer' }),
    alphaRow({ gas: 'krypton', author: [15.6, 220], at: 400, share, status: 'from memory (M)', ours: 'Ward’s form' }),
    alphaRow({ gas: 'xenon', author: [24, 330], at: 400, share, status: 'from memory (M)', ours: 'Ward’s form' }),
  ],
};
