import type { RunEvent } from './data.ts';
import type { RunReport } from './report.ts';

/** The moments of a run that have names, in the order of time. */
export function eventsOf({ outcome, time, scalars, settings }: Pick<RunReport, 'outcome' | 'time' | 'scalars' | 'settings'>): RunEvent[] {
  const { threshold_time_s, space_charge_time_s, collapse_time_s } = outcome.onset;
  const trip = outcome.energy.after_trip_J === null ? null : tripTime(time, scalars, settings?.supply.trip?.action ?? 'open');
  const named: readonly (readonly [string, number | null])[] = [
    ['threshold', threshold_time_s],
    ['space charge', space_charge_time_s],
    ['collapse', collapse_time_s],
    ['trip', trip],
  ];
  return named.flatMap(([name, t]) => (t === null ? [] : [{ name, time: t }])).sort((a, b) => a.time - b.time);
}

/** When the trip acted: steps end there, and from that snapshot on the supply gives no current (`open`) or no voltage (`zero`). */
function tripTime(time: Float64Array, { supplyCurrent, supplyVoltage }: RunReport['scalars'], action: 'open' | 'zero'): number | null {
  const gone = action === 'open' ? supplyCurrent : supplyVoltage;
  let first = gone.length;
  while (first > 0 && gone[first - 1] === 0) first--;
  return first < gone.length && first > 0 ? time[first] : null;
}
