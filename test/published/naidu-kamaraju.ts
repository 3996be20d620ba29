import type { Source } from './check.ts';
import { minimumRows, type PublishedMinimum } from './minima-rows.ts';

const MINIMA: readonly PublishedMinimum[] = [
  { gas: 'air', voltage: 327, pd: 0.567, status: 'second-hand' },
  { gas: 'argon', voltage: 137, pd: 0.9, status: 'from memory (H)' },
  { gas: 'hydrogen', voltage: 273, pd: 1.15, status: 'from memory (H)' },
  { gas: 'helium', voltage: 156, pd: 4.0, status: 'from memory (H)' },
  { gas: 'carbon dioxide', voltage: 420, pd: 0.51, status: 'from memory (H)' },
  { gas: 'nitrogen', voltage: 251, pd: 0.67, status: 'from memory (H)' },
  { gas: 'oxygen', voltage: 450, pd: 0.7, status: 'from memory (H)' },
];

export const naiduKamaraju: Source = {
  source: 'Naidu and Kamaraju, High Voltage Engineering, table of minimum sparking potentials',
  checks: MINIMA.flatMap(minimumRows),
};
