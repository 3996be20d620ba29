import type { Case } from '../../case.ts';
import type { Caution } from '../../onset/outcome.ts';
import type { WindowSettings } from '../../study.ts';
import type { IonYield } from '../../surfaces/surface.ts';
import { yieldAt } from '../../surfaces/yield-law.ts';
import { BOLTZMANN } from '../../units/constants.ts';
import { windowCautions } from './cautions.ts';
import type { Followed, FollowedInstant, WindowAnswer } from './follow.ts';
import type { State } from './states.ts';
import type { JudgedInstant, Window } from './windows.ts';

/** What `window --json` prints: SI, the unit in the key, null where a value does not apply. Nothing in it depends on how or when it was computed. */
export interface WindowOutcome extends WindowOfYield {
  readonly format: 'gapwake.window/1';
  readonly title: string;
  readonly version: string;
  readonly case_sha256: string;
  readonly duration_s: number;
  /** factor on the voltage below which a hold counts as marginal */
  readonly margin: number;
  /** where |V| is highest over the hold-off voltage; null where there is no voltage, or nothing can be said */
  readonly worst: {
    readonly time_s: number;
    readonly pressure_Pa: number;
    readonly supply_V: number;
    readonly hold_off_V: number;
    readonly lag_s: number | null;
  } | null;
  /** what becomes of the answer at the ends of the yields' published spread; null where the case gives one number */
  readonly yield_spread: {
    /** electrons per ion; where they depend on the field, at the hold-off voltage of the worst instant */
    readonly low: WindowOfYield & { readonly ion_yield: number };
    readonly high: WindowOfYield & { readonly ion_yield: number };
  } | null;
  readonly history: readonly HistoryEntry[];
  /** what a reader should know of the history, one sentence each */
  readonly notes: readonly string[];
  readonly cautions: readonly Caution[];
  readonly numerics: { readonly instants: number; readonly runs: number; readonly failures: readonly string[] };
}

/** The part of the answer that is given for typical yields and for either end of their spread. */
export interface WindowOfYield {
  readonly windows: readonly {
    readonly from_s: number;
    readonly to_s: number;
    readonly state: Exclude<State, 'holds'>;
    /** `outside-model`, but with |V| × margin below the Paschen minimum: counts as holding */
    readonly below_paschen_minimum: boolean;
    readonly lowest_hold_off_V: number | null;
    readonly shortest_lag_s: number | null;
  }[];
  readonly lowest_hold_off: { readonly voltage_V: number; readonly time_s: number; readonly pressure_Pa: number } | null;
  readonly earliest_turn_on_s: number | null;
  readonly latest_turn_on_s: number | null;
}

export interface HistoryEntry {
  readonly time_s: number;
  readonly pressure_Pa: number;
  readonly temperature_K: number;
  readonly supply_V: number;
  readonly hold_off_V: number | null;
  /** simulated where it decides, else expected from those that were; null where nothing is spread */
  readonly hold_off_at_high_yield_V: number | null;
  /** formative lag; null where it was not simulated or nothing breaks down */
  readonly lag_s: number | null;
  readonly state: State;
  /** why the model says nothing here */
  readonly note: string | null;
}

/** Puts an answer into the form in which it is printed and kept.
 *  @param defaults  paths of every default that the case leaves to the program */
export function windowOutcome(
  settings: Case,
  { margin }: WindowSettings,
  answer: WindowAnswer,
  defaults: readonly string[],
  version: string,
): WindowOutcome {
  const { instants, worst, ends } = answer;
  const most = worst === null ? null : instants[worst];
  const polarity = most !== null && most.supply < 0 ? 'right' : 'left';
  const { ionYield } = settings.electrodes[polarity];
  const known = most ?? instants.find(({ holdOff }) => holdOff !== null) ?? null;
  const yieldOf = (end: 'low' | 'high'): number => electronsPerIon(ionYield, end, known);
  return {
    format: 'gapwake.window/1',
    title: settings.title,
    version,
    case_sha256: settings.sha256,
    duration_s: answer.duration,
    margin,
    ...ofYield(answer),
    worst:
      most === null || most.holdOff === null
        ? null
        : { time_s: most.time, pressure_Pa: most.pressure, supply_V: most.supply, hold_off_V: most.holdOff, lag_s: most.lag },
    yield_spread:
      ends === null
        ? null
        : { low: { ion_yield: yieldOf('low'), ...ofYield(ends.low) }, high: { ion_yield: yieldOf('high'), ...ofYield(ends.high) } },
    history: instants.map(historyEntry),
    notes: answer.notes,
    cautions: windowCautions(settings, answer, defaults),
    numerics: { instants: instants.length, runs: answer.runs, failures: answer.failures },
  };
}

/** One end of a yield. Where it follows a law of the field, what that gives at the hold-off voltage of one instant, to three digits; without such an instant
 *  the end's factor on the law. */
function electronsPerIon(ionYield: IonYield, end: 'low' | 'high', at: FollowedInstant | null): number {
  if (ionYield.law === undefined || at === null || at.holdOff === null || at.path === null) return ionYield[end];
  const density = at.pressure / (BOLTZMANN * at.temperature);
  return Number(yieldAt({ ...ionYield, typical: ionYield[end] }, at.holdOff / (density * at.path)).toPrecision(3));
}

function ofYield({ windows, lowest, earliest, latest }: Followed<JudgedInstant>): WindowOfYield {
  return {
    windows: windows.map(windowEntry),
    lowest_hold_off: lowest === null ? null : { voltage_V: lowest.holdOff, time_s: lowest.time, pressure_Pa: lowest.pressure },
    earliest_turn_on_s: earliest,
    latest_turn_on_s: latest,
  };
}

function windowEntry({ from, to, state, safe, lowestHoldOff, shortestLag }: Window): WindowOfYield['windows'][number] {
  return {
    from_s: from,
    to_s: to,
    state,
    below_paschen_minimum: safe,
    lowest_hold_off_V: lowestHoldOff,
    shortest_lag_s: shortestLag,
  };
}

function historyEntry(instant: FollowedInstant): HistoryEntry {
  return {
    time_s: instant.time,
    pressure_Pa: instant.pressure,
    temperature_K: instant.temperature,
    supply_V: instant.supply,
    hold_off_V: instant.holdOff,
    hold_off_at_high_yield_V: instant.holdOffAtHighYield,
    lag_s: instant.lag,
    state: instant.judgement.state,
    note: instant.note,
  };
}
