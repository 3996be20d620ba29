import type { Case } from '../case.ts';
import type { Find } from '../study.ts';
import type { Found, Simulate } from './found.ts';
import { holdOff } from './hold-off.ts';
import { seriesResistance } from './series-resistance.ts';
import { tripDelay } from './trip-delay.ts';

/** Searches a case for what a scan asks at each of its points. Every number of the answer was simulated.
 *  @throws SimulationFailure when every run failed */
export function search(settings: Case, find: Find, simulate: Simulate): Found {
  switch (find.what) {
    case 'hold-off':
      return holdOff(settings, find, simulate);
    case 'trip-delay':
      return tripDelay(settings, find, simulate);
    case 'series-resistance':
      return seriesResistance(settings, find, simulate);
  }
}
