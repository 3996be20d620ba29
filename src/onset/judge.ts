import type { Theory } from '../theory/predict.ts';
import type { Regime, Stop, Verdict } from './outcome.ts';
import { amperes, percent, seconds, volts } from './words.ts';

/** What the verdict rests on. */
export interface Findings {
  readonly brokeDown: boolean;
  readonly selfSustaining: boolean;
  readonly distortedNow: boolean;
  readonly largestDistortion: number;
  readonly arcRisk: boolean;
  readonly stop: Stop;
  readonly time: number;
  readonly current: number;
  readonly voltage: number;
  readonly largestOpenGap: number;
  /** largest |V| the gap itself saw [V] */
  readonly largestGapVoltage: number;
  /** q_L at the end */
  readonly feedback: number;
  /** ln growth of the current over the last ion transit */
  readonly growthOverTransit: number;
  readonly ionTransit: number;
  readonly distortionNow: number;
  readonly spaceChargeTime: number | null;
  readonly lag: { readonly value: number; readonly kind: 'collapse' | 'space-charge' } | null;
  readonly lagVoltage: number | null;
  readonly aboveThreshold: number;
  readonly currentAtThreshold: number | null;
  readonly peakCurrent: number;
  readonly tripTime: number | null;
  readonly trippedByCharging: boolean;
  /** E/N at V_s outside the data of α */
  readonly thresholdOutsideData: boolean;
  readonly breakdownUncertainty: number;
  readonly theory: Theory;
  readonly lowestPath: number | null;
  readonly seedLowers: boolean;
}

/** Growth over one ion transit that still counts as growing. */
const STILL_GROWING = 0.01;

/** The verdict: the first of breaks-down, undecided, holds that applies. */
export function judge(f: Findings): Verdict {
  const regime: Regime = f.arcRisk ? 'arc-risk' : f.largestDistortion >= 0.1 ? 'glow' : 'dark';
  const verdict = (state: Verdict['state'], reason: string): Verdict => ({
    state,
    regime,
    self_sustaining: f.selfSustaining,
    reason: f.trippedByCharging ? `${reason.replace(/\.$/, '')}; tripped by charging current.` : reason,
  });
  if (f.brokeDown) return verdict('breaks-down', brokeDown(f));
  if (f.stop === 'steady' && f.selfSustaining) {
    return verdict(
      'breaks-down',
      `A self-sustaining Townsend discharge of ${amperes(f.current)} settles at ${volts(f.voltage)}, too weak to change the field.`,
    );
  }
  const open = undecided(f);
  return open === null ? verdict('holds', holds(f)) : verdict('undecided', open);
}

function brokeDown(f: Findings): string {
  const lead =
    f.lag === null
      ? `Space charge took over at ${seconds(f.spaceChargeTime ?? f.time)}${f.seedLowers ? ' below the static threshold, carried by the seed' : ''}`
      : `The gap broke down ${seconds(f.lag.value)} after threshold${f.lagVoltage === null ? '' : `, at ${volts(f.lagVoltage)}`}`;
  switch (f.stop) {
    case 'tripped-out':
      return `${lead}; the trip ended it.`;
    case 'died-out':
      return `${lead}; the discharge then died out.`;
    default:
      return f.selfSustaining
        ? `${lead}; the discharge carries ${amperes(f.current)} at ${volts(f.voltage)} at the end.`
        : `${lead}; it no longer sustains itself at the end.`;
  }
}

function undecided(f: Findings): string | null {
  const { theory } = f;
  if (f.stop === 'interrupted') return `Interrupted at ${seconds(f.time)} before breakdown; nothing can be said of what follows.`;
  if (f.stop === 'failed') return `The simulation stopped at ${seconds(f.time)} before breakdown.`;
  if (f.tripTime !== null && f.aboveThreshold > 0) {
    return `The trip acted at ${seconds(f.tripTime)}, before space charge set in; the gap had been above threshold for ${seconds(f.aboveThreshold)}.`;
  }
  if (f.tripTime !== null && f.spaceChargeTime === null) return `The trip acted at ${seconds(f.tripTime)}, before anything was decided.`;
  if (f.thresholdOutsideData && theory.overvoltage !== null && Math.abs(theory.overvoltage) < f.breakdownUncertainty) {
    return `E/N at the breakdown voltage lies outside the data, and the highest voltage is within ${percent(f.breakdownUncertainty)} of it.`;
  }
  const lowest = theory.lowest_over_paths_V;
  if (lowest !== null && f.lowestPath !== null && f.largestOpenGap >= lowest && lowest < (theory.static_breakdown_voltage_V ?? Infinity)) {
    return `The gap itself holds, but a longer path breaks down from ${volts(lowest)}.`;
  }
  const growing = Number.isFinite(f.growthOverTransit) && f.growthOverTransit > STILL_GROWING;
  if (f.feedback >= 1 || growing) {
    const needed = growing && f.distortionNow > 0 ? (Math.log(0.1 / f.distortionNow) / f.growthOverTransit) * f.ionTransit : null;
    const state = f.feedback >= 1 ? 'The gap is above threshold' : 'The current still grows';
    return needed !== null && needed > 0
      ? `${state} at the end and space charge needs about ${seconds(needed)} more: extend observe.until.`
      : `${state} at the end: extend observe.until.`;
  }
  return null;
}

function holds(f: Findings): string {
  if (f.aboveThreshold > 0) {
    const rise =
      f.currentAtThreshold !== null && f.currentAtThreshold > 0 ? Math.log10(Math.abs(f.peakCurrent) / f.currentAtThreshold) : null;
    const decades = rise !== null && rise > 0.05 ? ` while the current rose by ${rise.toFixed(1)} decades` : '';
    return `The voltage was above threshold for ${seconds(f.aboveThreshold)}${decades}, too short for space charge to set in.`;
  }
  const V_s = f.theory.static_breakdown_voltage_V;
  if (V_s === null) return `No voltage breaks this gap down by the Townsend criterion; the highest was ${volts(f.largestOpenGap)}.`;
  if (f.largestOpenGap >= V_s) {
    return `Loaded by the current that the seed draws, the gap sees at most ${volts(f.largestGapVoltage)} of ${volts(f.largestOpenGap)}, below the breakdown voltage of ${volts(V_s)}.`;
  }
  return `The highest voltage, ${volts(f.largestOpenGap)}, stays ${percent(1 - f.largestOpenGap / V_s)} below the breakdown voltage of ${volts(V_s)}.`;
}
