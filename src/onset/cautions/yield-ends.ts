import type { Case } from '../../case.ts';
import type { Surface } from '../../surfaces/surface.ts';
import { yieldAt } from '../../surfaces/yield-law.ts';
import { threshold } from '../../theory/breakdown-voltage.ts';
import { kineticGapOf } from '../../theory/kinetic.ts';
import { multiplicationOf } from '../../theory/multiplication.ts';

/** One end of what is known of the cathode's yield. */
export interface YieldEnd {
  /** as the case or its data give it: electrons per ion, or the factor on a law */
  readonly given: number;
  /** electrons per ion at this end's own breakdown field; null where nothing breaks down */
  readonly atBreakdown: number | null;
  /** V_s [V], null where no voltage sustains a discharge */
  readonly breakdown: number | null;
}

/** What the spread of the cathode's yield does to V_s, by the closed form. */
export interface YieldSpread {
  readonly side: 'left' | 'right';
  /** whether the yield follows a law of the field, on which the ends are factors */
  readonly byLaw: boolean;
  readonly low: YieldEnd;
  readonly typical: YieldEnd;
  readonly high: YieldEnd;
  /** whether the voltage lies from V_s at the high yield up to that at the low one: the yield then decides between holding and breaking down */
  readonly decides: boolean;
}

/** A spread below this is one number, written twice. */
const SPREAD = 1.001;

/** What the spread of the cathode's yield does at a voltage [V], whose sign says which wall is the cathode; null where the yield is one number. */
export function yieldSpread(settings: Case, voltage: number): YieldSpread | null {
  const side = voltage < 0 ? 'right' : 'left';
  const { ionYield } = settings.electrodes[side];
  if (!(ionYield.high > ionYield.low * SPREAD)) return null;
  const [low, typical, high] = [ionYield.low, ionYield.typical, ionYield.high].map((given) => endOf(settings, side, given));
  const applied = Math.abs(voltage);
  const decides = high.breakdown !== null && applied >= high.breakdown && applied < (low.breakdown ?? Number.POSITIVE_INFINITY);
  return { side, byLaw: ionYield.law !== undefined, low, typical, high, decides };
}

function endOf(settings: Case, side: 'left' | 'right', given: number): YieldEnd {
  const there = withYield(settings, side, given);
  const { density } = settings.gas;
  const { spacing } = settings.gap;
  const polarity = side === 'right' ? -1 : 1;
  const { breakdown } = kineticGapOf(there, polarity)?.threshold ?? threshold(multiplicationOf(there, polarity), density, spacing);
  const atBreakdown = breakdown === null ? null : yieldAt(there.electrodes[side].ionYield, breakdown / (density * spacing));
  return { given, atBreakdown, breakdown };
}

/** The case with another yield of one wall. */
export function withYield(settings: Case, side: 'left' | 'right', typical: number): Case {
  const surface: Surface = settings.electrodes[side];
  const changed: Surface = { ...surface, ionYield: { ...surface.ionYield, typical } };
  return { ...settings, electrodes: { ...settings.electrodes, [side]: changed } };
}
