import type { Form } from './forms.ts';

/** How well a number is known to us. `given`: the user's own, from the case file. */
export type Status = 'read' | 'second-hand' | 'from memory (H)' | 'from memory (M)' | 'from memory (L)' | 'computed' | 'given';

/** Where a published number comes from and how far it can be trusted. */
export interface Provenance {
  readonly source: string;
  readonly status: Status;
  /** relative standard uncertainty (0.1 = 10 %); null where nobody states one */
  readonly uncertainty: number | null;
  readonly note?: string;
}

/** One coefficient of a gas against the reduced field x = E/N [V m²]. */
export interface Coefficient extends Provenance {
  readonly form: Form;
  /** validity in x [V m²]; null where the source states none (then nothing counts as outside) */
  readonly range: { readonly from: number; readonly to: number } | null;
  /** gas temperature at which the source gives it, or of the pressure it is given against [K]; null where the source states none and it hardly matters */
  readonly referenceTemperature?: number | null;
}

/** The coefficients of one gas, N-based and in SI. A null coefficient does not occur in this gas. */
export interface GasCoefficients {
  /** α/N [m²] */
  readonly ionisation: Coefficient;
  /** η/N [m²] */
  readonly attachment: Coefficient | null;
  /** μ_e N [1/(m V s)] */
  readonly electronMobility: Coefficient;
  /** D_e/μ_e [V] */
  readonly electronEnergy: Coefficient;
  /** μ_i N [1/(m V s)] of the positive ion */
  readonly ionMobility: Coefficient;
  /** D_i/μ_i [V] of the positive ion */
  readonly ionEnergy: Coefficient;
  /** μ N [1/(m V s)] and D/μ [V] of the negative ion */
  readonly negativeIonMobility: Coefficient | null;
  readonly negativeIonEnergy: Coefficient | null;
  /** β [m³/s], electrons with positive ions */
  readonly electronIonRecombination: Coefficient | null;
  /** β [m³/s], negative with positive ions */
  readonly ionIonRecombination: Coefficient | null;
}

/** Another set of data of a gas, where sources disagree: what it replaces of the default set. */
export interface DataSet {
  /** whose data these are, when to use them, why they are not the default */
  readonly reason: string;
  readonly coefficients: Partial<GasCoefficients>;
  /** replaces that of the default set */
  readonly breakdownUncertainty?: number;
}

/** A built-in gas: its coefficients and what a reader must know about them. */
export interface GasData {
  readonly name: string;
  readonly title: string;
  /** name of the set of data that `coefficients` holds, and why it was chosen */
  readonly set: string;
  readonly reason: string;
  readonly coefficients: GasCoefficients;
  /** other sets by name */
  readonly alternatives: Readonly<Record<string, DataSet>>;
  /** what leaving out the detachment of electrons from negative ions does; null where no negative ions form */
  readonly detachment: string | null;
  /** relative uncertainty of a breakdown voltage computed with these data; 0.2 where nothing better is known */
  readonly breakdownUncertainty: number;
  /** what is neglected, which way that errs, known conflicts of sources */
  readonly notes: readonly string[];
  /** gas-kinetic cross-section for the mean free path [m²], for the collisionless caution */
  readonly kineticCrossSection: number;
}

/** One gas of a mixture. */
export interface MixturePart {
  /** built-in name */
  readonly gas: string;
  /** share of the density, 0 < fraction < 1; all of them sum to 1 */
  readonly fraction: number;
}

/** The gas of one case. */
export interface Gas {
  /** built-in name, of a mixture the words for it, or null when every coefficient is the user's own */
  readonly name: string | null;
  /** the set of data of a built-in gas that was taken; a name only, the data are in `coefficients` */
  readonly dataSet?: string;
  /** the gases of a mixture, by name; absent where there is none */
  readonly mixture?: readonly MixturePart[];
  /** [Pa] */
  readonly pressure: number;
  /** [K] */
  readonly temperature: number;
  /** N = p/(kT) [1/m³] */
  readonly density: number;
  readonly coefficients: GasCoefficients;
  readonly breakdownUncertainty: number;
  readonly kineticCrossSection: number | null;
}
