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
