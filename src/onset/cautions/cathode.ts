import type { Case } from '../../case.ts';
import { limitsOf } from '../../theory/predict.ts';
import { amperes, volts } from '../words.ts';
import type { Evidence, Raise } from './evidence.ts';

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
  const normal = prospects.normalCathodeFall?.currentDensity ?? 0;
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
  const side = voltage < 0 ? 'right' : 'left';
  const { low, high, typical } = settings.electrodes[side].ionYield;
  if (!(high > low * 1.001)) return;
  const highest = thresholdWith(settings, side, low);
  const lowest = thresholdWith(settings, side, high);
  const applied = Math.abs(voltage);
  const within = lowest !== null && applied >= lowest && applied < (highest ?? Infinity);
  raise(
    'yield-spread',
    `The ion yield is known only to lie between ${low} and ${high} (${typical} taken): the breakdown voltage is ${spread(lowest, highest)}${within ? `, and the ${volts(applied)} here lie within` : ''}.`,
    high / low,
  );
}

function spread(lowest: number | null, highest: number | null): string {
  if (lowest === null) return 'none even at the high end';
  return highest === null ? `${volts(lowest)} at the high end and none at the low end` : `${volts(lowest)} to ${volts(highest)}`;
}

/** V_s with another yield of one electrode as cathode. */
function thresholdWith(settings: Case, side: 'left' | 'right', ionYield: number): number | null {
  const surface = settings.electrodes[side];
  const changed = { ...surface, ionYield: { ...surface.ionYield, typical: ionYield } };
  const there: Case = { ...settings, electrodes: { left: changed, right: changed } };
  return limitsOf(there, 1).threshold.breakdown;
}
