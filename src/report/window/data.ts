/** What the figures of a window are drawn from: plain JSON, the same in Node and in the page. SI; null where a value does not apply. */
export interface WindowSeries {
  /** [s] rising */
  readonly time: readonly number[];
  readonly pressure_Pa: readonly number[];
  readonly supply_V: readonly number[];
  readonly holdOff_V: readonly (number | null)[];
  readonly holdOffAtHighYield_V: readonly (number | null)[];
  readonly lag_s: readonly (number | null)[];
  readonly states: readonly WindowState[];
  readonly windows: readonly WindowBand[];
  readonly events: readonly { readonly name: string; readonly time: number }[];
  /** of the gap itself, at 20 °C, at each instant [Pa m] */
  readonly pd: readonly number[];
  /** theory's breakdown voltage against pd at 20 °C; null without the case */
  readonly curve: BreakdownCurve | null;
  /** factor on the voltage below which a hold counts as marginal */
  readonly margin: number;
}

export type WindowState = 'holds' | 'marginal' | 'breaks-down' | 'outside-model';

export interface WindowBand {
  readonly from: number;
  readonly to: number;
  readonly state: Exclude<WindowState, 'holds'>;
  /** outside the model, but at a voltage so low that it counts as holding */
  readonly safe: boolean;
}

export interface BreakdownCurve {
  /** [Pa m], rising */
  readonly pd: readonly number[];
  /** [V] over the spacing; null where there is none */
  readonly spacing: readonly (number | null)[];
  /** [V] the lowest over longer paths; null where the case has no longer path */
  readonly paths: readonly (number | null)[] | null;
}
