import type { Findings } from './findings.ts';
import { amperes, metres, percent, roughly, seconds, voltsApart } from './words.ts';

/** Growth over one ion transit that still counts as growing. */
const STILL_GROWING = 0.01;

/** Why nothing can be said of a run that did not break down, as a sentence without its full stop; null where it holds. */
export function whyUndecided(f: Findings): string | null {
  return cutShort(f) ?? tripped(f) ?? outsideData(f) ?? longerPath(f) ?? stillGoing(f);
}

function cutShort({ end }: Findings): string | null {
  switch (end.stop) {
    case 'interrupted':
      return `Interrupted at ${seconds(end.time)}, before breakdown; nothing can be said of what follows`;
    case 'failed':
      return `The simulation could not go on past ${seconds(end.time)}, before breakdown; nothing can be said of what follows`;
    case 'model-limit':
      return `At ${seconds(end.time)} the current left the range of the model, before breakdown`;
    default:
      return null;
  }
}

function tripped({ trip, onset }: Findings): string | null {
  const spaceCharge = onset.space_charge_time_s;
  if (trip === null || (spaceCharge !== null && spaceCharge <= trip.time)) return null;
  const when = `${trip.byCharging ? 'The supply was tripped by charging current' : 'The trip acted'} at ${seconds(trip.time)}`;
  return trip.timeAbove > 0
    ? `${when}, after ${seconds(trip.timeAbove)} above threshold and before space charge set in`
    : `${when}, before the gap reached its breakdown voltage`;
}

function outsideData(f: Findings): string | null {
  if (!f.thresholdOutsideData || f.overvoltage === null || Math.abs(f.overvoltage) >= f.breakdownUncertainty) return null;
  return `E/N at the breakdown voltage lies outside the data of ionisation, and the highest voltage is within ${percent(f.breakdownUncertainty)} of it`;
}

function longerPath(f: Findings): string | null {
  for (const { largest, lowest, breakdown } of f.polarities) {
    if (lowest === null || lowest.voltage >= (breakdown ?? Infinity) || largest < lowest.voltage) continue;
    const [from, reached] = voltsApart(lowest.voltage, largest);
    return `The gap itself holds, but a path of ${metres(lowest.path)} breaks down from ${from} on, and the highest voltage was ${reached}`;
  }
  return null;
}

function stillGoing(f: Findings): string | null {
  const { feedback, growth, selfSustaining, loaded, current } = f.end;
  const unsettled = selfSustaining
    ? `A discharge of ${amperes(current)} sustains itself at the end without having settled: extend observe.until`
    : null;
  // a discharge that the circuit holds at the threshold swings about it
  if (unsettled !== null && loaded) return unsettled;
  if (feedback >= 1) {
    if (current === 0) return 'The gap is above threshold at the end, but no charge has started to multiply: extend observe.until';
    const needed = timeToSpaceCharge(f);
    const more = needed === null ? '' : ` and space charge needs about ${roughly(needed)} more`;
    return `The gap is above threshold at the end${more}: extend observe.until`;
  }
  if (growth !== null && growth > STILL_GROWING) {
    const needed = timeToSettle(f);
    const more = needed === null ? '' : `; to settle it needs about ${roughly(needed)} more`;
    return `The current still grows at the end, by ${percent(Math.expm1(growth))} in an ion transit${more}: extend observe.until`;
  }
  return unsettled;
}

/** Time until the field is distorted by a tenth at the present growth [s]; null where it does not grow. */
function timeToSpaceCharge({ end, ionTransit }: Findings): number | null {
  const measured = end.growth === null ? null : end.growth / ionTransit;
  // soon after switch-on the current has not taken up its own rate, near a limit of the circuit it has lost it
  const rate = Math.min(measured !== null && measured > 0 ? measured : Infinity, end.theoreticalGrowth ?? Infinity);
  if (!(rate > 0 && Number.isFinite(rate) && end.distortion > 0 && end.distortion < 0.1)) return null;
  return Math.log(0.1 / end.distortion) / rate;
}

/** Time until a current below threshold has stopped growing [s]: what is missing decays at the rate of theory. */
function timeToSettle({ end }: Findings): number | null {
  if (end.growth === null || end.theoreticalGrowth === null || !(end.theoreticalGrowth < 0)) return null;
  return Math.log(end.growth / STILL_GROWING) / -end.theoreticalGrowth;
}
