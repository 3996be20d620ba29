import { gravity, type Judgement, type State } from './states.ts';

/** One looked-at instant of a history, judged. SI; null where a value does not apply. */
export interface JudgedInstant {
  readonly time: number;
  readonly pressure: number;
  readonly temperature: number;
  readonly supply: number;
  readonly holdOff: number | null;
  readonly judgement: Judgement;
  readonly lag: number | null;
}

/** A stretch of time in which the gap does not simply hold. */
export interface Window {
  /** [s] */
  readonly from: number;
  readonly to: number;
  readonly state: Exclude<State, 'holds'>;
  /** outside the model, but below any voltage at which the gas breaks down */
  readonly safe: boolean;
  /** [V] */
  readonly lowestHoldOff: number | null;
  /** [s] */
  readonly shortestLag: number | null;
}

/** The windows of a history. Between two looked-at instants of different states the worse one is taken to last until the better one is known to hold.
 *  @param instants  rising in time, with the first and the last of the history */
export function windowsOf(instants: readonly JudgedInstant[]): Window[] {
  const windows: Window[] = [];
  for (let first = 0; first < instants.length; ) {
    const { judgement } = instants[first];
    let last = first;
    while (last + 1 < instants.length && gravity(instants[last + 1].judgement) === gravity(judgement)) last++;
    const { state, safe } = judgement;
    if (state !== 'holds') {
      const reach = (neighbour: JudgedInstant | undefined, own: number): number =>
        neighbour !== undefined && gravity(neighbour.judgement) < gravity(judgement) ? neighbour.time : own;
      const within = instants.slice(first, last + 1);
      windows.push({
        from: reach(instants[first - 1], instants[first].time),
        to: reach(instants[last + 1], instants[last].time),
        state,
        safe,
        lowestHoldOff: least(within.map(({ holdOff }) => holdOff)),
        shortestLag: least(within.map(({ lag }) => lag)),
      });
    }
    first = last + 1;
  }
  return windows;
}

/** The first instant from which every later one holds with the margin [s]; null when the last one does not. */
export function earliestTurnOn(instants: readonly JudgedInstant[]): number | null {
  const unsafe = instants.findLastIndex(({ judgement }) => !judgement.safe);
  return instants[unsafe + 1]?.time ?? null;
}

/** The last instant before the first that does not hold with the margin [s]; null when the first one does not. */
export function latestTurnOn(instants: readonly JudgedInstant[]): number | null {
  const unsafe = instants.findIndex(({ judgement }) => !judgement.safe);
  return instants.at(unsafe === -1 ? -1 : unsafe - 1 >= 0 ? unsafe - 1 : instants.length)?.time ?? null;
}

/** The instant of the lowest hold-off voltage; the first of several. */
export function lowestHoldOff(instants: readonly JudgedInstant[]): (JudgedInstant & { readonly holdOff: number }) | null {
  let lowest: (JudgedInstant & { readonly holdOff: number }) | null = null;
  for (const instant of instants) {
    const { holdOff } = instant;
    if (holdOff !== null && (lowest === null || holdOff < lowest.holdOff)) lowest = { ...instant, holdOff };
  }
  return lowest;
}

function least(values: readonly (number | null)[]): number | null {
  return values.reduce<number | null>((lowest, v) => (v !== null && (lowest === null || v < lowest) ? v : lowest), null);
}
