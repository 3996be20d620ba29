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
  /** time with q_L ≥ 1 [s], in how many stretches, and by how many decades the current rose in one */
  readonly above: { readonly time: number; readonly stretches: number; readonly decades: number | null };
  readonly trip: { readonly time: number; readonly byCharging: boolean } | null;
  readonly end: {
    readonly stop: Stop;
    /** [s] */
    readonly time: number;
    readonly current: number;
    readonly voltage: number;
    readonly selfSustaining: boolean;
    /** q_L */
    readonly feedback: number;
    readonly distortion: number;
    /** ln of the growth of the current over the last ion transit; null if unknown */
    readonly growth: number | null;
    /** λ of theory at the end's voltage [1/s] */
    readonly theoreticalGrowth: number | null;
  };
  /** [s] */
  readonly ionTransit: number;
  readonly largestGapVoltage: number;
  /** the nearest to breakdown first */
  readonly polarities: readonly Polarity[];
  /** E/N at V_s outside the data of α? */
  readonly thresholdOutsideData: boolean;
  readonly overvoltage: number | null;
  readonly breakdownUncertainty: number;
}
