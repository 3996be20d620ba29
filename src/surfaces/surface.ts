import type { Provenance } from '../gases/gas.ts';

/** Electrons that leave a cathode for each positive ion that arrives: a net yield, as breakdown measurements give it. */
export interface IonYield extends Provenance {
  readonly typical: number;
  /** the ends of the published spread; equal to `typical` where a case gives one number */
  readonly low: number;
  readonly high: number;
}

/** One electrode of a case. */
export interface Surface {
  /** built-in material, or null when the case gives only a yield */
  readonly material: string | null;
  readonly ionYield: IonYield;
  /** [eV], null where unknown */
  readonly workFunction: number | null;
}
