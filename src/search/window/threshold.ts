import type { Case } from '../../case.ts';
import { limitsOf, predict, prospects } from '../../theory/predict.ts';
import { atDensity, type Polarity, withYields, type YieldEnd } from './instant-case.ts';

/** What theory says of a gap at one density: over all paths from the spacing to the longest one. */
export interface Threshold {
  /** lowest breakdown voltage [V] */
  readonly voltage: number;
  /** the path that has it [m] */
  readonly path: number;
  /** E/N there [V m²] */
  readonly field: number;
}

/** Why the model says nothing of a gap at some density. */
export type Beyond =
  /** no voltage up to 1e4 Td breaks down any path */
  | 'no-threshold'
  /** E/N at the breakdown voltage is above the data of ionisation */
  | 'field-above-data'
  /** the mean free path is comparable with the path */
  | 'collisionless'
  /** a run that could not be completed, or that answers neither way */
  | 'no-answer';

/** Mean free path over path from which on the gas hardly matters, as in the caution `collisionless`; common practice, from memory. */
const COLLISIONLESS = 0.1;
/** Gas-kinetic cross-section where the gas is not known [m²]: argon, nitrogen and air lie within a sixth of it. */
const TYPICAL_CROSS_SECTION = 4e-19;

/** Step in ln N between the densities at which theory is evaluated; linear in ln V between, the error stays below 1e-4 where V_s varies as N or slower. */
const STEP = 0.025;

/** Thresholds of one case against density, for one polarity and one end of the yields' spread; each is computed when first asked for. */
export class ThresholdCurve {
  readonly #settings: Case;
  readonly #polarity: Polarity;
  readonly #known = new Map<number, Threshold | null>();

  constructor(settings: Case, polarity: Polarity, end: YieldEnd) {
    this.#settings = withYields(settings, end);
    this.#polarity = polarity;
  }

  /** Lowest voltage at which any length breaks down [V]; null when none does. */
  get minimum(): number | null {
    return limitsOf(this.#settings, this.#polarity).minimum?.voltage ?? null;
  }

  /** @param density  [1/m³]; null where nothing breaks down up to 1e4 Td */
  at(density: number): Threshold | null {
    if (!(density > 0)) return null;
    const place = Math.log(density) / STEP;
    const index = Math.floor(place);
    const [below, above] = [this.#node(index), this.#node(index + 1)];
    if (below === null || above === null) return place === index ? below : null;
    const share = place - index;
    const mix = (a: number, b: number): number => Math.exp((1 - share) * Math.log(a) + share * Math.log(b));
    return { voltage: mix(below.voltage, above.voltage), path: mix(below.path, above.path), field: mix(below.field, above.field) };
  }

  /** Why the model says nothing at this density; null where it does. */
  beyond(density: number): Beyond | null {
    const threshold = this.at(density);
    if (threshold === null) return 'no-threshold';
    const { ionisation } = this.#settings.gas.coefficients;
    if (ionisation.range !== null && threshold.field > ionisation.range.to) return 'field-above-data';
    const freePath = 1 / (density * (this.#settings.gas.kineticCrossSection ?? TYPICAL_CROSS_SECTION));
    return freePath > COLLISIONLESS * threshold.path ? 'collisionless' : null;
  }

  /** Whether E/N at the breakdown voltage is below the data of ionisation: V_s is then extrapolated, as in dense gas. */
  belowData(density: number): boolean {
    const { range } = this.#settings.gas.coefficients.ionisation;
    const threshold = this.at(density);
    return range !== null && threshold !== null && threshold.field < range.from;
  }

  #node(index: number): Threshold | null {
    const known = this.#known.get(index);
    if (known !== undefined) return known;
    const density = Math.exp(index * STEP);
    const { lowest } = limitsOf(atDensity(this.#settings, density), this.#polarity);
    const threshold = lowest === null ? null : { ...lowest, field: lowest.voltage / (density * lowest.path) };
    this.#known.set(index, threshold);
    return threshold;
  }
}

/** E-fold times of growth from the seed to space charge where no seed current says how many: nine decades. */
const FOLDS = 20;

/** Time that a plane gap needs from a sudden step to space charge, by theory [s]; null where it does not break down there.
 *  @param voltage  [V], with its sign */
export function timeToBreakdown(gap: Case, voltage: number): number | null {
  const { timeToSpaceCharge } = prospects(gap, voltage);
  if (timeToSpaceCharge !== null) return timeToSpaceCharge;
  const growth = predict(gap, voltage).growth_rate_per_s;
  return growth !== null && growth > 0 ? FOLDS / growth : null;
}
