/** A supply voltage against time; positive makes the left electrode the cathode.
 *  Every programme is piecewise linear. */
export type Programme =
  /** from 0 at t = 0 to `voltage` [V] at `riseTime` [s]; a jump at t = 0 when riseTime is 0 */
  | { readonly kind: 'step'; readonly voltage: number; readonly riseTime: number }
  /** from `from` [V] at t = 0 at `rate` [V/s, > 0] towards `to` [V], then held */
  | { readonly kind: 'ramp'; readonly from: number; readonly to: number; readonly rate: number }
  /** linear between rows, held at its ends; times [s] strictly rising, voltages [V] */
  | { readonly kind: 'table'; readonly times: readonly number[]; readonly voltages: readonly number[] };

export interface TripSettings {
  /** [A], > 0 */
  readonly current: number;
  /** [s], ≥ 0 */
  readonly delay: number;
  readonly senses: 'gap' | 'supply';
  readonly action: 'open' | 'zero';
}

/** What feeds the gap. */
export interface SupplySettings {
  readonly programme: Programme;
  /** [ohm], ≥ 0 */
  readonly seriesResistance: number;
  /** [F], ≥ 0, across the gap */
  readonly parallelCapacitance: number;
  /** [A], > 0, or null for none */
  readonly currentLimit: number | null;
  readonly trip: TripSettings | null;
  /** [V] what the gap and the parallel capacitance hold at t = 0 */
  readonly initialGapVoltage: number;
}
