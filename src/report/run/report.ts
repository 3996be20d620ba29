import type { Case } from '../../case.ts';
import type { Outcome } from '../../onset/outcome.ts';
import type { Profiles, RunScalar } from './data.ts';

/** All that a report of a run is made from: read from its file by whoever calls, plain data. */
export interface RunReport {
  readonly fileName: string;
  readonly title: string;
  /** version of the program that wrote the file */
  readonly version: string;
  /** of the program that writes the report */
  readonly reportVersion: string;
  readonly time: Float64Array;
  readonly x: Float64Array;
  readonly scalars: Readonly<Record<RunScalar, Float64Array>>;
  /** over (time, x); null for what this gas has not */
  readonly fields: Readonly<
    Record<
      | 'electricField'
      | 'electronDensity'
      | 'ionDensity'
      | 'negativeIonDensity'
      | 'ionisationRate'
      | 'electronFlux'
      | 'ionFlux'
      | 'negativeIonFlux',
      Profiles | null
    >
  >;
  readonly outcome: Outcome;
  readonly caseText: string;
  readonly tables: readonly { readonly file: string; readonly text: string }[];
  readonly coefficients: CoefficientsUsed;
  /** the case resolved again from its text; null where this program cannot */
  readonly settings: Case | null;
  /** every value of the case in words */
  readonly assumptions: readonly (readonly [label: string, value: string])[];
  /** how entries were read */
  readonly remarks: readonly string[];
}

/** The coefficients that a run used, as its file keeps them. */
export interface CoefficientsUsed {
  readonly gas: string | null;
  readonly notes: readonly string[];
  readonly breakdownUncertainty: number | null;
  readonly entries: readonly CoefficientUsed[];
}

export interface CoefficientUsed {
  /** as the file names it: `ionisation`, `electron_mobility`, …, `left_ion_yield` */
  readonly name: string;
  readonly label: string;
  /** what it is, in words: the form and its numbers */
  readonly value: string;
  readonly source: string;
  readonly status: string;
  /** relative */
  readonly uncertainty: number | null;
  readonly note: string | null;
  /** in E/N [V m²]; null where none is stated */
  readonly range: { readonly from: number; readonly to: number } | null;
}
