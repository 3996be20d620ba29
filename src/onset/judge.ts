import type { Findings } from './findings.ts';
import type { Regime, Verdict } from './outcome.ts';
import { whyItBrokeDown, whyItHolds } from './reasons.ts';
import { whyUndecided } from './undecided.ts';
import { amperes, volts } from './words.ts';

/** The verdict: the first of breaks-down, undecided, holds that applies. */
export function judge(f: Findings): Verdict {
  const regime: Regime = f.arcRisk ? 'arc-risk' : f.largestDistortion >= 0.1 ? 'glow' : 'dark';
  const verdict = (state: Verdict['state'], reason: string): Verdict => ({
    state,
    regime,
    self_sustaining: f.end.selfSustaining,
    reason: `${reason}.`,
  });
  if (f.brokeDown) return verdict('breaks-down', whyItBrokeDown(f));
  if (f.end.stop === 'steady' && f.end.selfSustaining) {
    const { current, voltage } = f.end;
    return verdict(
      'breaks-down',
      `A self-sustaining Townsend discharge of ${amperes(current)} settles at ${volts(voltage)}, too weak to change the field`,
    );
  }
  const open = whyUndecided(f);
  return open === null ? verdict('holds', whyItHolds(f)) : verdict('undecided', open);
}
