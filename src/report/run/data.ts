/** What the figures of a run are drawn from: plain numbers, the same in Node and in the page. SI throughout. */
export interface RunSeries {
  /** [s] never falling */
  readonly time: Float64Array;
  /** [m] cell centres */
  readonly x: Float64Array;
  readonly scalars: Readonly<Record<RunScalar, Float64Array>>;
  readonly fields: Readonly<Record<RunField, Profiles | null>>;
  readonly setting: RunSetting;
  readonly events: readonly RunEvent[];
}

export type RunScalar =
  | 'supplyVoltage'
  | 'openGapVoltage'
  | 'gapVoltage'
  | 'conductionCurrent'
  | 'totalCurrent'
  | 'supplyCurrent'
  | 'gapEnergy'
  | 'sourceEnergy';

/** The fields that figures show. */
export type RunField = 'electricField' | 'electronDensity' | 'ionDensity' | 'negativeIonDensity' | 'ionisationRate';

export const SCALARS: readonly RunScalar[] = [
  'supplyVoltage',
  'openGapVoltage',
  'gapVoltage',
  'conductionCurrent',
  'totalCurrent',
  'supplyCurrent',
  'gapEnergy',
  'sourceEnergy',
];

export const FIELDS: readonly RunField[] = ['electricField', 'electronDensity', 'ionDensity', 'negativeIonDensity', 'ionisationRate'];

/** A quantity over (time, x), row by row in time. */
export type Profiles = Float32Array;

/** What of the case the figures need; null where the file's case could not be read. */
export interface RunSetting {
  /** [m] */
  readonly spacing: number;
  /** [ohm] */
  readonly seriesResistance: number | null;
  /** [A] */
  readonly currentLimit: number | null;
  /** [A] that leaves the cathode without any feedback */
  readonly seedCurrent: number | null;
}

export interface RunEvent {
  readonly name: string;
  /** [s] */
  readonly time: number;
}
