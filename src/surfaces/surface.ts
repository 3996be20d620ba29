import type { Provenance } from '../gases/gas.ts';
import type { YieldLaw } from './yield-law.ts';

/** Electrons that leave a cathode for each positive ion that arrives: a net yield, as breakdown measurements give it. */
export interface IonYield extends Provenance {
  readonly typical: number;
  /** the ends of the published spread; equal to `typical` where a case gives one number */
  readonly low: number;
  readonly high: number;
  /** how it depends on the field at the cathode: the three numbers above then multiply what the law gives; absent where it does not */
  readonly law?: YieldLaw;
}

/** One electrode of a case. */
export interface Surface {
  /** built-in material, or null when the case gives only a yield */
  readonly material: string | null;
  readonly ionYield: IonYield;
  /** [eV], null where unknown */
  readonly workFunction: number | null;
  /** the condition that a case asked for; absent where it took the material's own row or gave a yield */
  readonly condition?: 'clean' | 'technical';
}
