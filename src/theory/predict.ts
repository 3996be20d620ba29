import type { Case } from '../case.ts';
import type { PlanarGap } from '../gap/geometry.ts';
import { curveOf } from '../gases/curves.ts';
import type { Gas } from '../gases/gas.ts';
import { sameYield } from '../surfaces/yield-law.ts';
import { BOLTZMANN, ELEMENTARY_CHARGE, TOWNSEND } from '../units/constants.ts';
import { type Threshold, threshold } from './breakdown-voltage.ts';
import { layerCurrentDensity, normalCathodeLayer } from './cathode-fall.ts';
import { breakdownProbability, meanStatisticalLag } from './chance.ts';
import { growthRate, ionDelay } from './growth-rate.ts';
import { kineticGapOf } from './kinetic.ts';
import { lowCurrentSlope } from './low-current-slope.ts';
import { type Multiplication, multiplicationOf, uniformFeedback } from './multiplication.ts';
import { lowestOverPaths, type PaschenPoint, type PathThreshold, paschenMinimum } from './paschen.ts';
import { emissionThatDistorts, riseTime } from './rise-time.ts';
import { steadyAmplification } from './steady-current.ts';
import { streamerIntegral } from './streamer.ts';
import { driftSpeed, transitTime } from './transit.ts';

/** The `theory` block of an outcome: closed forms of the space-charge-free gap at one voltage. SI, unit in the key. */
export interface Theory {
  /** V_s for the polarity of the voltage; null when none exists up to 1e4 Td */
  readonly static_breakdown_voltage_V: number | null;
  /** where the feedback falls back below 1 above V_s */
  readonly upper_breakdown_voltage_V: number | null;
  /** lowest V_s of the paths from the spacing to the longest path, at the same density */
  readonly lowest_over_paths_V: number | null;
  readonly paschen_minimum_V: number | null;
  readonly paschen_minimum_pd_Pa_m: number | null;
  /** |V|/V_s − 1 */
  readonly overvoltage: number | null;
  readonly pd_Pa_m: number;
  readonly reduced_field_Td: number;
  readonly alpha_d: number;
  /** q */
  readonly feedback: number;
  /** exact for negligible diffusion; null where nothing feeds back */
  readonly growth_rate_per_s: number | null;
  /** I/I₀; null at and above threshold */
  readonly steady_amplification: number | null;
}

/** What else theory says of a case at one voltage; SI. */
export interface Prospects {
  /** E/N at V_s [V m²] */
  readonly breakdownReducedField: number | null;
  /** the path that breaks down at the lowest voltage [m] */
  readonly lowestPath: number | null;
  /** E/N at the Paschen minimum [V m²] */
  readonly minimumReducedField: number | null;
  /** [s]; null without a field */
  readonly electronTransit: number | null;
  readonly ionTransit: number | null;
  /** that one electron from the cathode leads to breakdown */
  readonly breakdownProbability: number;
  /** [s]; null when no seed or no chance */
  readonly meanStatisticalLag: number | null;
  /** ∫(α − η) dx */
  readonly streamerIntegral: number;
  /** [s] from a sudden step to a cathode field changed by a tenth, grown from the seed current; null at or below threshold or unseeded */
  readonly timeToSpaceCharge: number | null;
  readonly lowCurrentSlope: 'falls' | 'rises' | null;
  readonly normalCathodeFall: {
    /** [V] */
    readonly voltage: number;
    /** [m] */
    readonly thickness: number;
    /** [V/m] */
    readonly cathodeField: number;
    /** [A/m²] */
    readonly currentDensity: number;
  } | null;
}

/** The feedback q of the space-charge-free gap as a function of its voltage [V], for either polarity. */
export function feedbackOf(settings: Case): (voltage: number) => number {
  const { density } = settings.gas;
  const { spacing } = settings.gap;
  if (settings.electrons !== undefined) return (voltage) => kineticGapOf(settings, voltage)?.feedback(voltage).value ?? 0;
  const column = density * spacing;
  const [positive, negative] = [multiplicationOf(settings, 1), multiplicationOf(settings, -1)];
  return (voltage) => uniformFeedback(voltage < 0 ? negative : positive, Math.abs(voltage) / column, column);
}

/** What does not depend on the voltage, only on which wall is the cathode. */
export interface Limits {
  readonly multiplication: Multiplication;
  readonly threshold: Threshold;
  readonly minimum: PaschenPoint | null;
  readonly lowest: PathThreshold | null;
}

/** Limits already found, by gas: each takes a search over the whole range of fields, a run asks several times, and the cases of a
 *  voltage search share their gas, gap and electrodes. */
const known = new WeakMap<Gas, Known[]>();
interface Known {
  readonly gap: PlanarGap;
  readonly electrodes: Case['electrodes'];
  readonly electrons: Case['electrons'];
  positive?: Limits;
  negative?: Limits;
}

function knownLimits({ gas, gap, electrodes, electrons }: Case): Known {
  let list = known.get(gas);
  if (list === undefined) {
    list = [];
    known.set(gas, list);
  }
  let found = list.find((k) => k.gap === gap && k.electrodes === electrodes && k.electrons === electrons);
  if (found === undefined) {
    found = { gap, electrodes, electrons };
    list.push(found);
    if (list.length > MOST_KNOWN) list.shift();
  }
  return found;
}

/** gaps remembered for one gas: a scan over spacings must not hoard */
const MOST_KNOWN = 8;

/** Thresholds of a case with the left (polarity ≥ 0) or the right wall as cathode. */
export function limitsOf(settings: Case, polarity: number): Limits {
  const found = knownLimits(settings);
  const { left, right } = settings.electrodes;
  const negative = polarity < 0 && !sameYield(left.ionYield, right.ionYield);
  const before = negative ? found.negative : found.positive;
  if (before !== undefined) return before;
  const { gap, gas } = settings;
  const multiplication = multiplicationOf(settings, negative ? -1 : 1);
  const local: Limits = {
    multiplication,
    threshold: threshold(multiplication, gas.density, gap.spacing),
    minimum: paschenMinimum(multiplication),
    lowest: lowestOverPaths(multiplication, gas.density, gap.spacing, gap.longestPath),
  };
  const limits = withParticles(local, settings, negative ? -1 : 1);
  if (negative) found.negative = limits;
  else found.positive = limits;
  return limits;
}

/** The thresholds by particles where a case asks for them. Which of the longer paths breaks down first is taken from the local field; the Paschen minimum is
 *  the local field's. */
function withParticles(local: Limits, settings: Case, polarity: number): Limits {
  const here = kineticGapOf(settings, polarity);
  if (here === null) return local;
  const { spacing } = settings.gap;
  const paths: PathThreshold[] = here.threshold.breakdown === null ? [] : [{ voltage: here.threshold.breakdown, path: spacing }];
  if (local.lowest !== null && local.lowest.path > spacing) {
    const { path } = local.lowest;
    const there = kineticGapOf(settings, polarity, path)?.threshold.breakdown ?? null;
    if (there !== null) paths.push({ voltage: there, path });
  }
  const lowest = paths.reduce<PathThreshold | null>((best, next) => (best === null || next.voltage < best.voltage ? next : best), null);
  return { ...local, threshold: here.threshold, lowest };
}

/** The `theory` block of the outcome.
 *  @param voltage  [V]; its sign sets the polarity, positive makes the left electrode the cathode */
export function predict(settings: Case, voltage: number): Theory {
  const { gap, gas } = settings;
  const here = localState(settings, voltage);
  const { threshold: limits, minimum, lowest } = limitsOf(settings, voltage);
  return {
    static_breakdown_voltage_V: limits.breakdown,
    upper_breakdown_voltage_V: limits.upper,
    lowest_over_paths_V: lowest?.voltage ?? null,
    paschen_minimum_V: minimum?.voltage ?? null,
    paschen_minimum_pd_Pa_m: minimum === null ? null : minimum.column * BOLTZMANN * gas.temperature,
    overvoltage: limits.breakdown === null ? null : Math.abs(voltage) / limits.breakdown - 1,
    pd_Pa_m: gas.pressure * gap.spacing,
    reduced_field_Td: here.reducedField / TOWNSEND,
    alpha_d: here.alpha * gap.spacing,
    feedback: here.feedback,
    growth_rate_per_s: here.growthRate,
    steady_amplification: here.amplification,
  };
}

/** What else theory says of a case at one voltage, for `check` to print. */
export function prospects(settings: Case, voltage: number): Prospects {
  const { gap, gas, seed } = settings;
  const here = localState(settings, voltage);
  const { multiplication, ionSpeed, electronSpeed } = here;
  const limits = limitsOf(settings, voltage);
  const breakdown = limits.threshold.breakdown;
  const breakdownReducedField = breakdown === null ? null : breakdown / (gas.density * gap.spacing);
  const probability = breakdownProbability(here.feedback);
  let fall: { readonly layer: Prospects['normalCathodeFall'] } | undefined;
  return {
    breakdownReducedField,
    lowestPath: limits.lowest?.path ?? null,
    minimumReducedField: limits.minimum?.reducedField ?? null,
    electronTransit: electronSpeed > 0 ? transitTime(gap.spacing, electronSpeed) : null,
    ionTransit: ionSpeed > 0 ? transitTime(gap.spacing, ionSpeed) : null,
    breakdownProbability: probability,
    meanStatisticalLag: meanStatisticalLag(seed.cathodeCurrent / ELEMENTARY_CHARGE, probability),
    streamerIntegral: streamerIntegral(here.alpha, here.eta, gap.spacing),
    timeToSpaceCharge: settings.electrons === undefined ? timeToSpaceCharge(settings, here) : null,
    lowCurrentSlope: breakdownReducedField === null ? null : lowCurrentSlope(multiplication.ionisation, breakdownReducedField),
    // a search of its own, which few ask for
    get normalCathodeFall() {
      fall ??= { layer: normalFall(settings, here) };
      return fall.layer;
    },
  };
}

/** coefficients in the uniform field of one voltage */
interface LocalState {
  readonly multiplication: Multiplication;
  readonly reducedField: number;
  readonly alpha: number;
  readonly eta: number;
  readonly ionYield: number;
  readonly electronSpeed: number;
  readonly ionSpeed: number;
  readonly feedback: number;
  readonly growthRate: number | null;
  readonly amplification: number | null;
}

function localState(settings: Case, voltage: number): LocalState {
  const { gap, gas } = settings;
  const { multiplication } = limitsOf(settings, voltage);
  const column = gas.density * gap.spacing;
  const reducedField = Math.abs(voltage) / column;
  const alpha = gas.density * multiplication.ionisation(reducedField);
  const eta = gas.density * multiplication.attachment(reducedField);
  const ionYield = multiplication.ionYield(reducedField);
  const electronSpeed = driftSpeed(curveOf(gas.coefficients.electronMobility.form).valueAt(reducedField), reducedField);
  const ionSpeed = driftSpeed(curveOf(gas.coefficients.ionMobility.form).valueAt(reducedField), reducedField);
  const delay = ionDelay(electronSpeed, ionSpeed);
  const particles = kineticGapOf(settings, voltage);
  return {
    multiplication,
    reducedField,
    alpha,
    eta,
    ionYield,
    electronSpeed,
    ionSpeed,
    feedback: particles?.feedback(voltage).value ?? uniformFeedback(multiplication, reducedField, column),
    growthRate:
      particles === null ? growthRate(alpha, eta, gap.spacing, [{ yield: ionYield, delay }]) : particles.growthRate(voltage, delay),
    amplification: particles === null ? steadyAmplification(alpha, eta, gap.spacing, ionYield) : particles.amplification(voltage),
  };
}

function timeToSpaceCharge(settings: Case, here: LocalState): number | null {
  const { gap, gas, seed } = settings;
  const { alpha, eta, electronSpeed, ionSpeed } = here;
  if (here.growthRate === null || !(here.growthRate > 0) || !(seed.cathodeCurrent > 0)) return null;
  const tenth = 0.1 * here.reducedField * gas.density;
  const emission = emissionThatDistorts(alpha, eta, gap.spacing, electronSpeed, ionSpeed, here.growthRate, tenth);
  const ratio = (emission * gap.area) / seed.cathodeCurrent;
  return riseTime(alpha, eta, gap.spacing, [{ yield: here.ionYield, delay: ionDelay(electronSpeed, ionSpeed) }], ratio);
}

function normalFall(settings: Case, here: LocalState): Prospects['normalCathodeFall'] {
  const { gas } = settings;
  const layer = normalCathodeLayer(here.multiplication.ionisation, here.multiplication.ionYield);
  if (layer === null) return null;
  const x = layer.cathodeReducedField;
  const ionSpeed = driftSpeed(curveOf(gas.coefficients.ionMobility.form).valueAt(x), x);
  return {
    voltage: layer.voltage,
    thickness: layer.column / gas.density,
    cathodeField: x * gas.density,
    currentDensity: layerCurrentDensity(layer, here.multiplication.ionYield(x), gas.density, ionSpeed),
  };
}
