import type { Beyond } from './threshold.ts';

/** What a gap does at one instant (`physics.md`, and the `window` outcome of the design). */
export type State = 'holds' | 'marginal' | 'breaks-down' | 'outside-model';

/** What is known of a gap at one instant. Voltages are magnitudes [V]. */
export interface Evidence {
  /** of the supply */
  readonly voltage: number;
  /** lowest voltage that does not hold; null where the model says nothing */
  readonly holdOff: number | null;
  /** the same at the high end of the yields; null where the model says nothing there */
  readonly holdOffAtHighYield: number | null;
  /** why the model says nothing; null where it does */
  readonly beyond: Beyond | null;
  /** whether E/N at the hold-off voltage is below the data, so that it is extrapolated */
  readonly belowData: boolean;
  /** the lowest breakdown voltages of this gas in front of this cathode at any density, with typical and with high yields; null where there is none */
  readonly minimum: number | null;
  readonly minimumAtHighYield: number | null;
}

/** What the state of an instant is judged by. */
export interface Criteria {
  /** factor on the voltage, ≥ 1 */
  readonly margin: number;
  /** relative uncertainty of a breakdown voltage outside its data */
  readonly uncertainty: number;
}

export interface Judgement {
  readonly state: State;
  /** holds with the margin, for all that is known */
  readonly safe: boolean;
}

/** The state of a gap at one instant, the first that applies:
 *  - no voltage: `holds`;
 *  - where the model says nothing: `outside-model`; safe all the same if |V| × margin is below the Paschen minimum, and |V| below that at the high end of the
 *    yields, because no density and no length of path breaks down there;
 *  - where E/N at the hold-off voltage is below the data (dense gas) and the hold-off voltage, extrapolated, is closer to |V| or to |V| × margin than it is
 *    known: `outside-model`, the rule by which a run is undecided;
 *  - |V| not below the hold-off: `breaks-down`;
 *  - |V| × margin not below it, or |V| not below it at the high end of the yields: `marginal`;
 *  - else `holds`. */
export function judge(evidence: Evidence, { margin, uncertainty }: Criteria): Judgement {
  const { voltage, holdOff, holdOffAtHighYield, beyond, belowData, minimum, minimumAtHighYield } = evidence;
  if (voltage === 0) return { state: 'holds', safe: true };
  const wanted = voltage * margin;
  if (beyond !== null || holdOff === null) {
    return { state: 'outside-model', safe: below(wanted, minimum) && below(voltage, minimumAtHighYield) };
  }
  if (belowData && wanted >= holdOff * (1 - uncertainty) && voltage < holdOff * (1 + uncertainty))
    return { state: 'outside-model', safe: false };
  if (voltage >= holdOff) return { state: 'breaks-down', safe: false };
  if (wanted >= holdOff || (holdOffAtHighYield !== null && voltage >= holdOffAtHighYield)) return { state: 'marginal', safe: false };
  return { state: 'holds', safe: true };
}

/** How bad a judgement is, for whoever must choose between two neighbours: a window reaches to the first instant known to be better. */
export function gravity({ state, safe }: Judgement): number {
  if (state === 'breaks-down') return 4;
  if (state === 'outside-model') return safe ? 1 : 3;
  return state === 'marginal' ? 2 : 0;
}

function below(voltage: number, minimum: number | null): boolean {
  return minimum !== null && voltage < minimum;
}
