import type { Onset, Outcome, Stop } from './outcome.ts';
import type { Polarity } from './polarity.ts';

/** What a verdict rests on. Currents and voltages as magnitudes. */
export interface Findings {
  /** space charge while self-sustaining, at some time */
  readonly brokeDown: boolean;
  readonly arcRisk: boolean;
  readonly largestDistortion: number;
  readonly onset: Onset;
  readonly oscillation: Outcome['oscillation'];
  /** does the supply still change at the end? */
  readonly supplyChanges: boolean;
  /** time with q_L ≥ 1 [s], in how many stretches, and by how many decades the current rose in one */
  readonly above: { readonly time: number; readonly stretches: number; readonly decades: number | null };
  /** when the trip acted [s], on what, and the time with q_L ≥ 1 until then [s] */
  readonly trip: { readonly time: number; readonly byCharging: boolean; readonly timeAbove: number } | null;
  readonly end: {
    readonly stop: Stop;
    /** [s] */
    readonly time: number;
    readonly current: number;
    readonly voltage: number;
    /** does the current keep the gap's voltage below that of the open gap? */
    readonly loaded: boolean;
    readonly selfSustaining: boolean;
    /** q_L */
    readonly feedback: number;
    readonly distortion: number;
    /** ln of the growth over the last ion transit, of the current or of the charge carriers, whichever is less; null if unknown */
    readonly growth: number | null;
    /** λ of theory at the end's voltage [1/s] */
    readonly theoreticalGrowth: number | null;
  };
  /** [s] */
  readonly ionTransit: number;
  readonly largestGapVoltage: number;
  /** is the open gap still on its way up to the supply's voltage at the end? */
  readonly stillCharging: boolean;
  /** the nearest to breakdown first */
  readonly polarities: readonly Polarity[];
  /** E/N at V_s outside the data of α? */
  readonly thresholdOutsideData: boolean;
  readonly overvoltage: number | null;
  readonly breakdownUncertainty: number;
}
