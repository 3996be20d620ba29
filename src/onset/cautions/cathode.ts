import { amperes, volts } from '../words.ts';
import type { Evidence, Raise } from './evidence.ts';
import { yieldSpread } from './yield-ends.ts';

/** What the cathode does to a discharge beyond the model, and how well its yield is known. */
export function ofCathode(evidence: Evidence, raise: Raise): void {
  const { settings, prospects, found } = evidence;
  if (found?.arcRisk) {
    const density = found.largestCurrent / settings.gap.area / 1e4;
    raise(
      'arc-risk',
      `The current reached ${amperes(found.largestCurrent)}, ${density.toPrecision(2)} A/cm²: a glow may turn into an arc there, at a few tens of volts and limited by the supply alone; the model ends there.`,
      found.largestCurrent,
    );
  }
  const normal = found?.steadyGlow ? (prospects.normalCathodeFall?.currentDensity ?? 0) : 0;
  if (found?.steadyGlow && found.currentDensity < normal) {
    raise(
      'partly-covered',
      `The current density is ${(found.currentDensity / normal).toPrecision(2)} of the normal one: a real glow contracts to part of the cathode, so the voltage given is high and the current low.`,
      found.currentDensity / normal,
    );
  }
  ofYield(evidence, raise);
}

function ofYield({ settings, voltage }: Evidence, raise: Raise): void {
  const spread = yieldSpread(settings, voltage);
  if (spread === null) return;
  const { low, typical, high, byLaw, decides } = spread;
  const at = typical.atBreakdown;
  const known = byLaw
    ? `The ion yield, a law of the field${at === null ? '' : ` that gives ${Number(at.toPrecision(2))} at breakdown`}, is known only to a factor of ${short(low.given)} to ${short(high.given)}`
    : `The ion yield is known only to lie between ${low.given} and ${high.given} (${typical.given} taken)`;
  const within = decides ? `, and the ${volts(Math.abs(voltage))} here lie within, so the verdict depends on the yield` : '';
  raise('yield-spread', `${known}: the breakdown voltage is ${range(high.breakdown, low.breakdown)}${within}.`, high.given / low.given);
}

function short(factor: number): number {
  return Number(factor.toPrecision(2));
}

function range(lowest: number | null, highest: number | null): string {
  if (lowest === null) return 'none even at the high end';
  return highest === null ? `${volts(lowest)} at the high end and none at the low end` : `${volts(lowest)} to ${volts(highest)}`;
}
