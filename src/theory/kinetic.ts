import type { Case, KineticElectrons } from '../case.ts';
import { curveOf } from '../gases/curves.ts';
import { coarseThreshold, GapResponse, NEAR, type Passing, passes } from '../kinetics/gap-response.ts';
import { collisionsOf } from '../kinetics/of-case.ts';
import { type SingleElectrons, singleElectrons } from '../kinetics/single-electrons.ts';
import type { Measured } from '../kinetics/statistics.ts';
import { rootBetween } from '../numerics/roots.ts';
import { yieldAt } from '../surfaces/yield-law.ts';
import { TOWNSEND } from '../units/constants.ts';
import { type Threshold, threshold } from './breakdown-voltage.ts';
import { multiplicationOf, uniformFeedback } from './multiplication.ts';

/** A gap without space charge whose electrons are followed as particles: ions per electron, electrons that fall back, feedback and breakdown voltage.
 *
 *  The yield of the electrodes is here the number of electrons emitted per ion, those that fall back included. A net yield, as breakdown measurements give
 *  it with a local-field α, is smaller by the share that escapes. */
export class KineticGap {
  readonly response: GapResponse;
  readonly #settings: Case;
  readonly #column: number;
  readonly #rise: Passing | null;
  readonly #fall: Passing | null;
  readonly #polarity: number;
  #threshold: Threshold | null = null;
  readonly #chances = new Map<number, SingleElectrons>();

  /** @param polarity  positive: the left wall is the cathode
   *  @param distance  length of the path [m]
   *  @param responses  avalanches already followed with the same settings: they do not depend on the yield */
  constructor(settings: Case, electrons: KineticElectrons, polarity: number, distance: number, responses: Map<string, GapResponse>) {
    const { gas } = settings;
    const key = JSON.stringify([...sameAvalanche(settings), distance]);
    this.#settings = settings;
    this.#polarity = polarity;
    this.#column = gas.density * distance;
    const table = collisionsOf(settings);
    const alpha = curveOf(gas.coefficients.ionisation.form);
    const { emissionEnergy, particles, seed } = electrons;
    const reference = (voltage: number): number => Math.expm1(this.#column * alpha.valueAt(voltage / this.#column));
    const gap = { table, distance, emissionEnergy, particles, seed, reference };
    const least = table.thresholds.reduce((low, energy, p) => (table.kinds[p] === 'ionisation' ? Math.min(low, energy) : low), 1e9);
    const emission = (voltage: number): number => this.emissionAt(voltage);
    // particles know of no E/N beyond which they mean nothing, but of energies beyond which cross-sections are not known
    const highest = Math.max(HIGHEST * this.#column, table.set.range.to);
    const { rise, fall } = coarseThreshold(gap, emission, 1.2 * least, highest, LEFT_BRANCH * this.#column);
    this.#rise = rise;
    this.#fall = fall;
    const attention = rise === null ? { from: 0, to: 0 } : { from: rise.guess / AROUND, to: rise.guess * AROUND };
    this.response = responses.get(key) ?? new GapResponse({ ...gap, attention });
    responses.set(key, this.response);
  }

  /** Electrons emitted per ion in the field of a voltage [V] without space charge. */
  emissionAt(voltage: number): number {
    const { left, right } = this.#settings.electrodes;
    return yieldAt((this.#polarity < 0 ? right : left).ionYield, Math.abs(voltage) / this.#column);
  }

  /** q at a voltage [V]. */
  feedback(voltage: number): Measured {
    const emission = this.emissionAt(voltage);
    const { value, error } = this.response.at(Math.abs(voltage)).ionsPerElectron;
    return { value: emission * value, error: emission * error };
  }

  /** Electrons that cross the gap per electron from the seed, which is emitted like the others: below threshold only. */
  amplification(voltage: number): number | null {
    const q = this.feedback(voltage).value;
    if (q >= 1) return null;
    const { ionsPerElectron, returned } = this.response.at(Math.abs(voltage));
    return (1 - returned.value + ionsPerElectron.value) / (1 - q);
  }

  /** Growth rate [1/s] of the current: 1 = Σ γ s(x) e^(−λ τ x), s(x) the ions made at x per electron emitted, from the voltage followed nearest and scaled to
   *  the feedback; τ [s/m] the delay per length of ions on their way back and electrons on their way out. null where nothing feeds back. */
  growthRate(voltage: number, delay: number): number | null {
    const q = this.feedback(voltage).value;
    if (!(q > 0) || !(delay > 0) || !Number.isFinite(delay)) return null;
    const { ions } = this.response.nearest(Math.abs(voltage)).found;
    const made = ions.reduce((sum, n) => sum + n, 0);
    if (!(made > 0)) return null;
    const length = this.#column / this.#settings.gas.density;
    const excess = (lambda: number): number => {
      let sum = 0;
      for (let i = 0; i < ions.length; i++) sum += ions[i] * Math.exp(-lambda * delay * length * ((i + 0.5) / ions.length));
      return Math.log((q * sum) / made);
    };
    const scale = 1 / (length * delay);
    let [low, high] = [-scale, scale];
    while (excess(low) < 0) low *= 2;
    while (excess(high) > 0) high *= 2;
    return rootBetween(excess, low, high);
  }

  /** What electrons do in the uniform field of a voltage [V]: profiles over equal cells from the cathode, of the voltage followed nearest, scaled to the ions
   *  of this one; electrons that become slow share the change. */
  answer(voltage: number): { ions: Float64Array; slow: Float64Array; returned: number; error: number; byVoltage: number } {
    const { ionsPerElectron, returned } = this.response.at(voltage);
    const { found } = this.response.nearest(voltage);
    const { value, error } = ionsPerElectron;
    const made = found.ionsPerElectron.value;
    const factor = made > 0 ? value / made : 0;
    const electrons = 1 - returned.value + value;
    const before = 1 - found.returned.value + made;
    const around = [1 + SLOPE_STEP, 1 - SLOPE_STEP].map((share) => this.response.ionsAt(voltage * share));
    return {
      ions: found.ions.map((n) => n * factor),
      slow: found.slow.map((n) => (n * electrons) / before),
      returned: returned.value,
      error: value > 0 ? error / value : 1,
      byVoltage: around[1] > 0 ? Math.log(around[0] / around[1]) / Math.log((1 + SLOPE_STEP) / (1 - SLOPE_STEP)) : 0,
    };
  }

  /** What becomes of single electrons from the cathode at a voltage [V]; null where nothing is applied or an ion frees none, or more than one. */
  chance(voltage: number): SingleElectrons | null {
    const emission = this.emissionAt(voltage);
    const applied = Math.abs(voltage);
    if (!(applied > 0 && emission > 0 && emission <= 1)) return null;
    const known = this.#chances.get(applied) ?? singleElectrons(this.response.gap, applied, emission);
    this.#chances.set(applied, known);
    return known;
  }

  /** Takes over what was found at a voltage [V] elsewhere. */
  adoptChance(voltage: number, found: SingleElectrons): void {
    this.#chances.set(Math.abs(voltage), found);
  }

  get threshold(): Threshold {
    const feedback = (voltage: number): number => this.feedback(voltage).value;
    this.#threshold ??= { breakdown: passes(feedback, this.#rise), upper: passes(feedback, this.#fall) };
    return this.#threshold;
  }

  /** Standard error of a threshold [V]: that of ln q over its slope against V. */
  errorAt(threshold: number): number {
    const { value, error } = this.feedback(threshold);
    const step = 0.02;
    const ratio = this.feedback(threshold * (1 + step)).value / this.feedback(threshold * (1 - step)).value;
    const slope = Math.log(ratio) / (2 * step * threshold);
    return Math.abs(error / value / slope);
  }

  /** Voltages, by number, that the thresholds and the answer at one voltage [V] ask for and that have not been followed yet. */
  nodesAround(voltage: number): number[] {
    const wanted = [Math.abs(voltage) * (1 - SLOPE_STEP), Math.abs(voltage) * (1 + SLOPE_STEP)];
    for (const passing of [this.#rise, this.#fall]) {
      if (passing !== null) wanted.push(passing.guess * Math.exp(-NEAR), passing.guess * Math.exp(NEAR));
    }
    const nodes = new Set(wanted.filter((v) => v > 0).flatMap((v) => GapResponse.nodesFor(v)));
    return [...nodes].filter((node) => !this.response.has(node));
  }
}

/** share of a voltage up and down over which a slope is taken */
const SLOPE_STEP = 0.03;
/** E/N [V m²] up to which thresholds are looked for, and from which on feedback may fall with the voltage */
const HIGHEST = 1e4 * TOWNSEND;
const LEFT_BRANCH = 500 * TOWNSEND;
/** around the threshold, where more electrons are followed */
const AROUND = 1.3;
/** Gaps already followed, by the electrons' settings: electrons of one take seconds. */
const known = new WeakMap<KineticElectrons, { readonly gaps: Map<string, KineticGap>; readonly responses: Map<string, GapResponse> }>();

/** What decides how an avalanche grows, but for the length of its path. */
function sameAvalanche({ gas }: Case): unknown[] {
  return [gas.name, gas.density, gas.temperature, gas.coefficients.ionisation.form];
}

/** The gap of a case with kinetic electrons in front of the wall that is the cathode at a polarity; null where electrons follow the local field. */
export function kineticGapOf(settings: Case, polarity: number, distance: number = settings.gap.spacing): KineticGap | null {
  const { electrons, electrodes } = settings;
  if (electrons === undefined) return null;
  let followed = known.get(electrons);
  if (followed === undefined) {
    followed = { gaps: new Map(), responses: new Map() };
    known.set(electrons, followed);
  }
  const { gaps, responses } = followed;
  const cathode = polarity < 0 ? electrodes.right : electrodes.left;
  const key = JSON.stringify([...sameAvalanche(settings), distance, cathode.ionYield]);
  let gap = gaps.get(key);
  if (gap === undefined) {
    gap = new KineticGap(settings, electrons, polarity, distance, responses);
    gaps.set(key, gap);
  }
  return gap;
}

/** The `kinetics` block: what particles say of the space-charge-free gap at one voltage, beside what the local field says. SI, unit in the key. */
export interface Kinetics {
  readonly emission_energy_eV: number;
  readonly particles: number;
  readonly seed: number;
  /** at which the next entries are */
  readonly gap_voltage_V: number;
  readonly ions_per_electron: number;
  readonly ions_per_electron_error: number;
  /** of electrons emitted and made, those that fell back on the cathode, per electron emitted */
  readonly returned_fraction: number;
  readonly returned_fraction_error: number;
  readonly feedback: number;
  readonly feedback_error: number;
  /** that one electron from the cathode leads to breakdown, from the sizes of single avalanches; null where an ion frees more than one electron */
  readonly breakdown_probability: number | null;
  readonly breakdown_probability_error: number | null;
  /** of single electrons, those that make no ion */
  readonly silent_fraction: number | null;
  readonly silent_fraction_error: number | null;
  /** q of the local field with the net yield */
  readonly local_field_feedback: number;
  readonly breakdown_voltage_V: number | null;
  readonly breakdown_voltage_V_error: number | null;
  /** V_s of the local field with the net yield */
  readonly local_field_breakdown_voltage_V: number | null;
  /** the case's yield: electrons emitted per ion, those that fall back included */
  readonly emitted_per_ion: number;
  /** the net yield that it amounts to: by the share that escapes, at the breakdown voltage (without one at `gap_voltage_V`) */
  readonly net_per_ion: number;
}

/** null where electrons follow the local field. */
export function kineticsOf(settings: Case, voltage: number): Kinetics | null {
  const gap = kineticGapOf(settings, voltage);
  const { electrons } = settings;
  if (gap === null || electrons === undefined) return null;
  const { ionsPerElectron, returned } = gap.response.at(Math.abs(voltage));
  const feedback = gap.feedback(voltage);
  const { breakdown } = gap.threshold;
  const chance = gap.chance(voltage);
  const at = breakdown ?? voltage;
  const emitted = gap.emissionAt(at);
  const share = 1 - gap.response.at(Math.abs(at)).returned.value;
  const emitting = multiplicationOf(settings, voltage);
  const net = { ...emitting, ionYield: (x: number): number => share * emitting.ionYield(x) };
  const { density } = settings.gas;
  const { spacing } = settings.gap;
  const column = density * spacing;
  return {
    emission_energy_eV: electrons.emissionEnergy,
    particles: electrons.particles,
    seed: electrons.seed,
    gap_voltage_V: voltage,
    ions_per_electron: ionsPerElectron.value,
    ions_per_electron_error: ionsPerElectron.error,
    returned_fraction: returned.value,
    returned_fraction_error: returned.error,
    feedback: feedback.value,
    feedback_error: feedback.error,
    breakdown_probability: chance?.breakdown.value ?? null,
    breakdown_probability_error: chance?.breakdown.error ?? null,
    silent_fraction: chance?.silent.value ?? null,
    silent_fraction_error: chance?.silent.error ?? null,
    local_field_feedback: uniformFeedback(net, Math.abs(voltage) / column, column),
    breakdown_voltage_V: breakdown,
    breakdown_voltage_V_error: breakdown === null ? null : gap.errorAt(breakdown),
    local_field_breakdown_voltage_V: threshold(net, density, spacing).breakdown,
    emitted_per_ion: emitted,
    net_per_ion: emitted * share,
  };
}

/** A point of the breakdown curve by particles, beside that of the local field. SI, unit in the key. */
export interface CurvePoint {
  readonly pd_Pa_m: number;
  readonly breakdown_voltage_V: number | null;
  readonly breakdown_voltage_V_error: number | null;
  /** where the feedback falls below 1 again, if it does */
  readonly upper_breakdown_voltage_V: number | null;
  /** of the local field with the net yield at that point; with the yield of the case where particles find no breakdown */
  readonly local_field_breakdown_voltage_V: number | null;
  readonly net_per_ion: number | null;
}

/** The point of the curve at a multiple of a case's density, by a fifth of its particles. */
export function curvePointOf(settings: Case, multiple: number): CurvePoint {
  const { electrons, gas, gap } = settings;
  if (electrons === undefined) throw new Error('electrons follow the local field');
  const there: Case = {
    ...settings,
    gas: { ...gas, density: gas.density * multiple, pressure: gas.pressure * multiple },
    electrons: { ...electrons, particles: Math.ceil(electrons.particles / 5) },
  };
  const kinetic = kineticGapOf(there, 1);
  if (kinetic === null) throw new Error('electrons follow the local field');
  const { breakdown, upper } = kinetic.threshold;
  const emitting = multiplicationOf(there, 1);
  const share = breakdown === null ? 1 : 1 - kinetic.response.at(breakdown).returned.value;
  const net = { ...emitting, ionYield: (x: number): number => share * emitting.ionYield(x) };
  return {
    pd_Pa_m: there.gas.pressure * gap.spacing,
    breakdown_voltage_V: breakdown,
    breakdown_voltage_V_error: breakdown === null ? null : kinetic.errorAt(breakdown),
    upper_breakdown_voltage_V: upper,
    local_field_breakdown_voltage_V: threshold(net, there.gas.density, gap.spacing).breakdown,
    net_per_ion: breakdown === null ? null : kinetic.emissionAt(breakdown) * share,
  };
}
