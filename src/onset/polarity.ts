import type { Case } from '../case.ts';
import { sameYield } from '../surfaces/yield-law.ts';
import { limitsOf } from '../theory/predict.ts';

/** What one polarity of a run went up to, and what it could have stood. */
export interface Polarity {
  /** which wall is the cathode; null where it makes no difference */
  readonly cathode: 'left' | 'right' | null;
  /** largest |V_open| [V] */
  readonly largest: number;
  /** V_s, and where the feedback falls below 1 again [V]; null where there is none */
  readonly breakdown: number | null;
  readonly upper: number | null;
  /** the lowest V_s of the paths from the spacing to the longest, and that path [V, m] */
  readonly lowest: { readonly voltage: number; readonly path: number } | null;
}

/** The polarities that a run had, the one nearest to breakdown first.
 *  @param highest, lowest open-gap voltages [V] */
export function polaritiesOf(settings: Case, highest: number, lowest: number): Polarity[] {
  const { left, right } = settings.electrodes;
  const alike = sameYield(left.ionYield, right.ionYield);
  const of = (cathode: 'left' | 'right', largest: number): Polarity => {
    const { threshold, lowest: path } = limitsOf(settings, cathode === 'left' ? 1 : -1);
    return { cathode: alike ? null : cathode, largest, breakdown: threshold.breakdown, upper: threshold.upper, lowest: path };
  };
  if (alike) return [of('left', Math.max(highest, -lowest))];
  const both = [...(highest > 0 || lowest === 0 ? [of('left', highest)] : []), ...(lowest < 0 ? [of('right', -lowest)] : [])];
  return both.sort((a, b) => closeness(b) - closeness(a));
}

function closeness({ largest, lowest }: Polarity): number {
  return lowest === null ? 0 : largest / lowest.voltage;
}
