import type { Source } from './check.ts';
import { minimumRows, type PublishedMinimum } from './minima-rows.ts';

const status = 'from memory (M)';

const MINIMA: readonly PublishedMinimum[] = [
  { gas: 'helium', cathode: 'iron', voltage: 150, pd: 2.5, status },
  { gas: 'neon', cathode: 'iron', voltage: 244, pd: 3.0, status },
  { gas: 'argon', cathode: 'iron', voltage: 265, pd: 1.5, status },
  { gas: 'nitrogen', cathode: 'iron', voltage: 275, pd: 0.75, status },
  { gas: 'oxygen', cathode: 'iron', voltage: 450, pd: 0.7, status },
  { gas: 'air', cathode: 'iron', voltage: 330, pd: 0.57, status },
  { gas: 'hydrogen', cathode: 'platinum', voltage: 295, pd: 1.25, status },
];

export const vonEngel1965: Source = {
  source: 'von Engel, Ionized Gases, 2nd ed., 1965, breakdown table, plane cathode',
  checks: MINIMA.flatMap(minimumRows),
};
