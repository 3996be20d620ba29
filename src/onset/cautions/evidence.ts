import type { Case } from '../../case.ts';
import type { Prospects, Theory } from '../../theory/predict.ts';
import type { CautionCode } from '../outcome.ts';

/** What cautions are raised from. */
export interface Evidence {
  readonly settings: Case;
  /** at which theory was evaluated [V], with its sign */
  readonly voltage: number;
  readonly theory: Theory;
  readonly prospects: Prospects;
  /** null before a case is run */
  readonly found: RunFindings | null;
}

/** What a finished run adds to what is known beforehand. */
export interface RunFindings {
  readonly broken: boolean;
  readonly held: boolean;
  readonly arcRisk: boolean;
  /** largest |I| [A] */
  readonly largestCurrent: number;
  readonly thresholdTime: number | null;
  /** formative lag [s] */
  readonly lag: number | null;
  /** time with q_L ≥ 1 [s] */
  readonly timeAboveThreshold: number;
  /** largest q_L */
  readonly largestFeedback: number;
  readonly steadyGlow: boolean;
  /** |I|/A at the end [A/m²] */
  readonly currentDensity: number;
  /** [V/m] */
  readonly largestCathodeField: number;
  /** coefficients used outside their data, with the share of all ionisation made there; the largest first */
  readonly outside: readonly { readonly name: string; readonly share: number }[];
  /** I R over the largest |V_open|, at the end */
  readonly seedDrop: number;
  /** fewest cells in the cathode layer of a discharge; null where there was none */
  readonly layerCells: number | null;
  /** worst undershoot of a density while space charge mattered, over its peak */
  readonly undershoot: number;
}

export type Raise = (code: CautionCode, text: string, value: number | null) => void;
