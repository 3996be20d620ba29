import type { Source } from './check.ts';
import { minimumRows, type PublishedMinimum } from './minima-rows.ts';

const status = 'from memory (M)';

const MINIMA: readonly PublishedMinimum[] = [
  { gas: 'air', voltage: 352, pd: 0.55, status },
  { gas: 'nitrogen', voltage: 240, pd: 0.65, status },
  { gas: 'hydrogen', voltage: 230, pd: 1.05, status },
  { gas: 'sulphur hexafluoride', voltage: 507, pd: 0.26, status },
  { gas: 'carbon dioxide', voltage: 420, pd: 0.57, status },
  { gas: 'neon', voltage: 245, pd: 4.0, status },
  { gas: 'helium', voltage: 155, pd: 4.0, status },
];

export const kuffelZaenglKuffel: Source = {
  source: 'Kuffel, Zaengl and Kuffel, High Voltage Engineering Fundamentals, 2nd ed., 2000, ch. 5, table of minimum sparking constants',
  checks: MINIMA.flatMap(minimumRows),
};
