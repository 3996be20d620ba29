import type { Case } from '../case.ts';
import type { Find } from '../study.ts';
import type { Found, Simulate } from './found.ts';
import { holdOff } from './hold-off.ts';

export function search(settings: Case, find: Find, simulate: Simulate): Found {
  return holdOff(settings, find, simulate);
}
