import type { Case } from '../case.ts';
import { curveOf } from '../gases/curves.ts';
import type { ErrorScale } from '../march/error-norm.ts';
import { Voltage } from '../supply/programme.ts';
import { feedbackOf, limitsOf } from '../theory/predict.ts';
import { driftSpeed } from '../theory/transit.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';

/** The scales of one case, from closed forms: thresholds, transit times, which walls are cathodes, how thick a cathode layer to expect. */
export interface Scales {
  readonly feedback: (voltage: number) => number;
  readonly threshold: { readonly positive: number | null; readonly negative: number | null };
  readonly largestVoltage: number;
  readonly electronTransit: number;
  readonly ionTransit: number;
  readonly cathodes: { readonly left: boolean; readonly right: boolean };
  /** is the left wall the first cathode? */
  readonly firstIsLeft: boolean;
  readonly layer: number;
  errorScale(species: number): ErrorScale;
}

/** The embedded error estimate is of third order and more than ten times the fourth-order solution's error; a step may therefore show
 *  this many tolerances. Chosen so that crossing times are right to a tenth of the tolerance in per cent: about 0.05 % at the default. */
const ESTIMATE_PER_TOLERANCE = 10;

/** E/N that sets the times of a gap without any voltage [V m²]. */
const IDLE_FIELD = 1e-19;

export function scalesOf(settings: Case): Scales {
  const { gap, gas, seed, supply, observe } = settings;
  const programme = Voltage.of(supply.programme);
  const signs = programme.signs(0, observe.until);
  const positive = signs.positive || supply.initialGapVoltage > 0;
  const negative = signs.negative || supply.initialGapVoltage < 0;
  const largestVoltage = Math.max(largestUntil(programme, observe.until), Math.abs(supply.initialGapVoltage));
  const limit = (polarity: number): number | null => limitsOf(settings, polarity).threshold.breakdown;
  const thresholds = { positive: limit(1), negative: limit(-1) };
  const first = Math.sign(supply.initialGapVoltage) || firstSign(programme, observe.until);

  const highest = Math.min(thresholds.positive ?? largestVoltage, thresholds.negative ?? largestVoltage);
  // a gap that nothing breaks down and nothing is applied to still needs a scale of time
  const reference = highest > 0 ? highest : IDLE_FIELD * gas.density * gap.spacing;
  const x = reference / (gas.density * gap.spacing);
  const transit = (mobility: Case['gas']['coefficients']['ionMobility']): number =>
    gap.spacing / driftSpeed(curveOf(mobility.form).valueAt(x), x);
  const electronTransit = transit(gas.coefficients.electronMobility);
  const ionTransit = transit(gas.coefficients.ionMobility);
  const { minimum } = limitsOf(settings, first);
  const layer = minimum === null ? gap.spacing / 5 : Math.min(minimum.column / gas.density, gap.spacing);

  // what the seed keeps in the gap: its electrons for a transit, and their ions
  const perArea = seed.cathodeCurrent / (ELEMENTARY_CHARGE * gap.area);
  const alphaD = gas.density * gap.spacing * curveOf(gas.coefficients.ionisation.form).valueAt(x);
  const electrons = (perArea * electronTransit) / gap.spacing;
  const ions = (Math.expm1(Math.min(alphaD, 30)) * perArea * ionTransit) / gap.spacing;
  return {
    feedback: feedbackOf(settings),
    threshold: thresholds,
    largestVoltage,
    electronTransit,
    ionTransit,
    cathodes: { left: positive, right: negative },
    firstIsLeft: first >= 0,
    layer,
    errorScale: (species) => ({
      tolerance: ESTIMATE_PER_TOLERANCE * settings.numerics.tolerance,
      seedDensities: [electrons, ions, ions].slice(0, species),
      speeds: [gap.spacing / electronTransit, gap.spacing / ionTransit, gap.spacing / ionTransit].slice(0, species),
      smallVoltage: 0.01 * Math.max(largestVoltage, reference),
    }),
  };
}

function largestUntil(programme: Voltage, until: number): number {
  let largest = Math.max(Math.abs(programme.at(0)), Math.abs(programme.at(until)));
  for (const t of programme.cornersAfter(0)) if (t < until) largest = Math.max(largest, Math.abs(programme.at(t)));
  return largest;
}

/** Sign of the first voltage that is not zero. */
function firstSign(programme: Voltage, until: number): number {
  if (programme.at(0) !== 0) return Math.sign(programme.at(0));
  for (const t of [...programme.cornersAfter(0), until]) if (programme.at(t) !== 0) return Math.sign(programme.at(t));
  return 1;
}
