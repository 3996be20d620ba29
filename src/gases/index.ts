import { air } from './air.ts';
import { argon } from './argon.ts';
import type { GasData } from './gas.ts';
import { nitrogen } from './nitrogen.ts';

/** The built-in gases by the name a case uses. A new gas is one file and one line here. */
export const gases: Readonly<Record<string, GasData>> = {
  argon,
  nitrogen,
  air,
};
