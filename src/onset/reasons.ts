import type { Findings } from './findings.ts';
import type { Polarity } from './polarity.ts';
import { amperes, metres, percent, seconds, volts, voltsApart } from './words.ts';

/** How it broke down and what became of it, as a sentence without its full stop. */
export function whyItBrokeDown(f: Findings): string {
  return [beginning(f), tripClause(f), ending(f)].filter((clause) => clause !== null).join('; ');
}

function beginning(f: Findings): string {
  const { onset, end } = f;
  const { formative_lag_s: lag, gap_voltage_V: voltage, lag_ends_at: ends } = onset;
  if (lag === null) {
    const why = onset.threshold_time_s === null ? ' although the feedback never reached 1: so strong a seed lowers the threshold' : '';
    return `Space charge took over at ${seconds(onset.space_charge_time_s ?? end.time)}${why}`;
  }
  const what = trippedBefore(f)
    ? `After the trip at ${seconds(f.trip?.time ?? 0)} the charge stored across the gap broke it down`
    : 'The gap broke down';
  const when = lag > 0 ? `${seconds(lag)} after threshold` : 'at threshold';
  const how = ends === 'collapse' ? 'its voltage fell through' : 'space charge set in at';
  return `${what} ${when}, when ${how} ${volts(Math.abs(voltage ?? 0))}`;
}

/** Did the trip act before the gap broke down? */
function trippedBefore({ trip, onset }: Findings): boolean {
  if (trip === null || onset.threshold_time_s === null || onset.formative_lag_s === null) return false;
  return trip.time < onset.threshold_time_s + onset.formative_lag_s;
}

function tripClause(f: Findings): string | null {
  if (f.trip === null || (trippedBefore(f) && !f.trip.byCharging)) return null;
  return `${f.trip.byCharging ? 'the supply was tripped by charging current' : 'the trip acted'} at ${seconds(f.trip.time)}`;
}

function ending({ end, trip, oscillation, supplyChanges, arcRisk }: Findings): string {
  const carries = `${amperes(end.current)} at ${volts(end.voltage)}`;
  switch (end.stop) {
    case 'steady':
      return `a steady discharge carries ${carries}`;
    case 'model-limit':
      return `it carries ${carries}, in the range of arcs, where the model ends`;
    case 'died-out':
    case 'tripped-out':
      return `the discharge died out by ${seconds(end.time)}`;
    case 'interrupted':
      return `the run was interrupted at ${seconds(end.time)}`;
    case 'failed':
      return `the simulation could not go on past ${seconds(end.time)}`;
    case 'until':
      if (oscillation !== null)
        return `${supplyChanges ? 'the gap voltage repeats' : 'it fires again'} every ${seconds(oscillation.period_s)}`;
      if (end.selfSustaining) return `it carries ${carries} at the end${arcRisk ? ', having been in the range of arcs' : ''}`;
      return trip === null ? 'at the end it no longer sustains itself' : 'the discharge no longer sustains itself';
  }
}

/** Why it holds, as a sentence without its full stop. */
export function whyItHolds(f: Findings): string {
  const { above, onset } = f;
  if (above.time > 0) {
    const often = above.stretches > 1 ? `, in ${above.stretches} stretches` : '';
    const rise =
      above.decades === null || above.decades < 0.05
        ? ''
        : `, ${often === '' ? 'in which' : 'in one of which'} the current rose by ${above.decades.toFixed(1)} decades`;
    const outcome = onset.space_charge_time_s === null ? 'space charge did not set in' : 'no discharge sustained itself';
    return `The voltage was above threshold for ${seconds(above.time)}${often}${rise}: ${outcome}`;
  }
  const [nearest] = f.polarities;
  return `${whyBelow(nearest, f.largestGapVoltage)}${f.stillCharging ? ', with the gap still charging at the end' : ''}`;
}

function whyBelow({ cathode, largest, breakdown, upper, lowest }: Polarity, seen: number): string {
  const side = cathode === null ? '' : ` with the ${cathode} electrode as cathode`;
  if (largest === 0) return 'No voltage was applied';
  if (breakdown === null) {
    return `No voltage up to 1e4 Td sustains a discharge over this gap${side}; the highest was ${volts(largest)}`;
  }
  if (upper !== null && largest >= upper) {
    const [reached, from] = voltsApart(largest, upper);
    return `The voltage went straight to ${reached}${side}, above the ${from} from which on the feedback is below 1 again`;
  }
  if (largest >= breakdown) {
    const [saw, of, needed] = voltsApart(seen, largest, breakdown);
    return `Loaded by the current that the seed draws, the gap saw at most ${saw} of ${of}${side}, below its breakdown voltage of ${needed}`;
  }
  const weakest = lowest !== null && lowest.voltage < breakdown ? lowest : { voltage: breakdown, path: null };
  const [reached, from] = voltsApart(largest, weakest.voltage);
  const what =
    weakest.path === null ? `breakdown voltage of ${from}` : `${from} from which on a path of ${metres(weakest.path)} breaks down`;
  return `The highest voltage, ${reached}${side}, stays ${percent(1 - largest / weakest.voltage)} below the ${what}`;
}
