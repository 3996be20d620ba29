import type { HistorySettings } from './surroundings/history.ts';
import type { Rows } from './surroundings/series.ts';

/** What a case file may ask beyond one run. SI throughout; plain frozen data, like `Case`. */

/** One varied entry of a scan. */
export interface Axis {
  /** path of the entry in the case file, as in `--set` */
  readonly path: string;
  /** SI unit of the values in UDUNITS spelling; `1` for pure numbers */
  readonly unit: string;
  /** [unit], at least one, in the order of the file */
  readonly values: Float64Array;
}

/** What to search for at each point of a scan. */
export type Find =
  | {
      /** the highest voltage that holds, scaling the whole programme; `from` and `to` are its largest |V| [V] */
      readonly what: 'hold-off';
      readonly from: number;
      readonly to: number;
      /** relative width of the bracket at the end */
      readonly tolerance: number;
    }
  | {
      /** the longest trip delay that keeps the gap's energy below `gapEnergy`; `from`, `to` [s] */
      readonly what: 'trip-delay';
      /** [J] */
      readonly gapEnergy: number;
      readonly from: number;
      readonly to: number;
      readonly tolerance: number;
    }
  | {
      /** the least series resistance above which no run up to 100 times it ends self-sustained; `from`, `to` [ohm] */
      readonly what: 'series-resistance';
      readonly from: number;
      readonly to: number;
      readonly tolerance: number;
    };

/** Many gaps at once. */
export interface ScanSettings {
  /** none: the one point that is the case itself */
  readonly axes: readonly Axis[];
  /** whether the axes walk together (equal lengths) instead of spanning a grid, whose last axis runs fastest */
  readonly zip: boolean;
  readonly find: Find | null;
}

/** One gap in changing surroundings. */
export interface WindowSettings {
  readonly history: HistorySettings;
  /** supply voltage while energised [V], in time or constant; positive makes the left electrode the cathode */
  readonly voltage: number | Rows;
  /** factor on the voltage below which a hold counts as marginal, ≥ 1 */
  readonly margin: number;
}
