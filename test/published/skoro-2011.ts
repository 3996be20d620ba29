import type { Source } from './check.ts';
import { minimumRows } from './minima-rows.ts';

export const skoro2011: Source = {
  source: 'Škoro, Marić, Malović, Graham and Petrović, Electrical breakdown in water vapor, Phys. Rev. E 84, 055401, 2011',
  checks: minimumRows({ gas: 'water vapour', voltage: 480, pd: 0.6, status: 'read' }),
};
