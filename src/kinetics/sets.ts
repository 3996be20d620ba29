import { argon } from './argon.ts';
import type { CrossSectionSet } from './cross-sections.ts';
import { helium } from './helium.ts';
import { lucasSaelee, reidRamp } from './model-gases.ts';
import { neon } from './neon.ts';
import { nitrogen } from './nitrogen.ts';

/** The built-in sets of cross-sections by name. Other gases have none here: no published set is at hand that can be named and reproduced. */
export const crossSectionSets: Readonly<Record<string, CrossSectionSet>> = Object.fromEntries(
  [argon, helium, neon, nitrogen, reidRamp, lucasSaelee(0), lucasSaelee(0.5), lucasSaelee(1)].map((set) => [set.name, set]),
);

/** Whether the electrons of a case in this gas can be followed as particles. Attachment on the way would make negative ions of them, for which the coupling
 *  to the fluid has no place. */
export function isFollowed(gas: string): boolean {
  const set = Object.hasOwn(crossSectionSets, gas) ? crossSectionSets[gas] : undefined;
  return set?.processes.every(({ kind }) => kind !== 'attachment') ?? false;
}
