import type { Kinetics } from '../theory/kinetic.ts';
import type { Theory } from '../theory/predict.ts';

/** What a run found, as `run --json` prints it: SI, the unit in the key, null where a value does not apply. */
export interface Outcome {
  readonly format: 'gapwake.outcome/1';
  readonly title: string;
  readonly version: string;
  readonly case_sha256: string;
  readonly verdict: Verdict;
  readonly theory: Theory;
  /** only where electrons are followed as particles */
  readonly kinetics?: Kinetics;
  readonly onset: Onset;
  readonly oscillation: { readonly period_s: number; readonly amplitude_V: number } | null;
  readonly peak: { readonly current_A: number; readonly time_s: number; readonly gap_voltage_V: number };
  readonly final: Final;
  readonly energy: { readonly gap_J: number; readonly source_J: number; readonly after_trip_J: number | null };
  readonly currents: readonly { readonly level_A: number; readonly time_s: number | null; readonly gap_voltage_V: number | null }[];
  readonly cautions: readonly Caution[];
  readonly numerics: NumericsReport;
}

export type State = 'holds' | 'breaks-down' | 'undecided';
export type Regime = 'dark' | 'glow' | 'arc-risk';

export interface Verdict {
  readonly state: State;
  readonly regime: Regime;
  readonly self_sustaining: boolean;
  /** one sentence */
  readonly reason: string;
}

export interface Onset {
  readonly threshold_time_s: number | null;
  readonly space_charge_time_s: number | null;
  readonly collapse_time_s: number | null;
  readonly formative_lag_s: number | null;
  readonly lag_ends_at: 'collapse' | 'space-charge' | null;
  /** at the end of the lag: for a ramp, the dynamic breakdown voltage */
  readonly gap_voltage_V: number | null;
  readonly growth_rate_per_s: number | null;
}

export type Stop = 'until' | 'steady' | 'died-out' | 'tripped-out' | 'model-limit' | 'interrupted' | 'failed';

export interface Final {
  readonly time_s: number;
  readonly stop: Stop;
  readonly gap_voltage_V: number;
  readonly current_A: number;
  /** magnitude at the wall that is the cathode at the end */
  readonly cathode_field_V_per_m: number;
  readonly cathode_layer_m: number | null;
}

export interface Caution {
  readonly code: CautionCode;
  readonly text: string;
  readonly value: number | null;
}

export type CautionCode =
  | 'not-a-clearance'
  | 'outside-range'
  | 'left-of-minimum'
  | 'longer-path'
  | 'double-valued'
  | 'short-gap'
  | 'streamer'
  | 'field-emission'
  | 'collisionless'
  | 'arc-risk'
  | 'partly-covered'
  | 'few-electrons'
  | 'seed-lowers-threshold'
  | 'loaded-by-seed'
  | 'yield-spread'
  | 'timescales'
  | 'mixture'
  | 'insulator'
  | 'edges'
  | 'tolerance'
  | 'cathode-cells'
  | 'undershoot'
  | 'defaults';

export interface NumericsReport {
  readonly cells: number;
  readonly tolerance: number;
  readonly steps: number;
  readonly rejected: number;
  /** linear solves: each stage of a step is one Newton iteration with the exact Jacobian */
  readonly newton: number;
  readonly wall_s: number;
  /** largest violation of the charge balance of gap, walls and circuit, relative to the charge passed */
  readonly charge_defect: number;
  /** most negative density over the largest its species had had by then, as a positive number */
  readonly worst_undershoot: number;
}
