import { air } from './air.ts';
import { argon } from './argon.ts';
import { carbonDioxide } from './carbon-dioxide.ts';
import type { GasData } from './gas.ts';
import { helium } from './helium.ts';
import { hydrogen } from './hydrogen.ts';
import { krypton } from './krypton.ts';
import { neon } from './neon.ts';
import { nitrogen } from './nitrogen.ts';
import { oxygen } from './oxygen.ts';
import { sulphurHexafluoride } from './sulphur-hexafluoride.ts';
import { waterVapour } from './water-vapour.ts';
import { xenon } from './xenon.ts';

/** The built-in gases by the name a case uses. A new gas is one file and one line here. */
export const gases: Readonly<Record<string, GasData>> = {
  argon,
  nitrogen,
  air,
  helium,
  neon,
  krypton,
  xenon,
  hydrogen,
  oxygen,
  'carbon dioxide': carbonDioxide,
  'water vapour': waterVapour,
  'sulphur hexafluoride': sulphurHexafluoride,
};

/** Names of the sets of data of a built-in gas, the default first; empty for an unknown gas. */
export function dataSets(gas: string): readonly string[] {
  if (!Object.hasOwn(gases, gas)) return [];
  return [gases[gas].set, ...Object.keys(gases[gas].alternatives)];
}

/** A built-in gas with one of its sets of data in `coefficients`, `set` and `reason` being that set's.
 *
 *  @param gas  built-in name
 *  @param set  a name that `dataSets` lists; the default set when left out
 *  @returns    null where there is no such gas or set
 *  @example    gasData('helium', 'raizer')?.coefficients.ionisation.source begins with “Raizer” */
export function gasData(gas: string, set?: string): GasData | null {
  if (!Object.hasOwn(gases, gas)) return null;
  const standard = gases[gas];
  if (set === undefined || set === standard.set) return standard;
  if (!Object.hasOwn(standard.alternatives, set)) return null;
  const other = standard.alternatives[set];
  return {
    ...standard,
    set,
    reason: other.reason,
    coefficients: { ...standard.coefficients, ...other.coefficients },
    breakdownUncertainty: other.breakdownUncertainty ?? standard.breakdownUncertainty,
  };
}
