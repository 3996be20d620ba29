import { type Curve, curveOf } from '../gases/curves.ts';
import type { Form } from '../gases/forms.ts';
import type { Provenance } from '../gases/gas.ts';
import { TOWNSEND } from '../units/constants.ts';
import type { IonYield } from './surface.ts';

/** One term of a yield against the energy ε of what hits the wall [eV]:
 *      factor (ε − from)^power / (1 + (ε/scale)^fall)   above `from`, nothing below. */
export interface YieldTerm {
  readonly factor: number;
  readonly from: number;
  readonly power: number;
  /** [eV]; infinite for a plain power */
  readonly scale: number;
  readonly fall: number;
}

/** Electrons for each ion that arrives, as a law. */
export type YieldLaw =
  /** whatever the field */
  | { readonly kind: 'constant'; readonly value: number }
  /** of the reduced field E/N at the cathode [V m²] */
  | { readonly kind: 'reduced-field'; readonly form: Form }
  /** of the ion's energy at the wall, a sum of terms; ions arrive with the energies that charge exchange of this cross-section [m²] leaves them */
  | { readonly kind: 'ion-energy'; readonly terms: readonly YieldTerm[]; readonly chargeExchange: number };

/** A yield that depends on the field, with its source. */
export interface YieldData extends Provenance {
  readonly law: YieldLaw;
  /** validity: of E/N [V m²] or of the energy [eV], as the law has it; null where the source states none */
  readonly range: { readonly from: number; readonly to: number } | null;
}

/** Yield at one energy [eV]. */
export function yieldAtEnergy(terms: readonly YieldTerm[], energy: number): number {
  let sum = 0;
  for (const { factor, from, power, scale, fall } of terms) {
    if (energy > from) sum += (factor * (energy - from) ** power) / (1 + (energy / scale) ** fall);
  }
  return sum;
}

/** Mean energy [eV] with which ions reach a wall: e E λ, λ = 1/(N Q).
 *
 *  Each charge exchange leaves the ion at rest, so the energy at the wall is what the field gives over the last path, exponential with that mean. Valid in a uniform field over several λ; in a cathode layer of a few λ, or with
 *  less than a few λ to the other wall, ions arrive slower than that.
 *
 *  @param x               E/N at the wall [V m²]
 *  @param chargeExchange  Q [m²]
 *  @example  meanImpactEnergy(1e-18, 4e-19) is 2.5 eV */
export function meanImpactEnergy(x: number, chargeExchange: number): number {
  return x / chargeExchange;
}

/** Yield averaged over the energies of arriving ions, Ȳ = ∫ Y(u ε̄) e^{−u} du, ε̄ the mean energy [eV]. To about 1e-4. */
export function meanYield(terms: readonly YieldTerm[], meanEnergy: number): number {
  if (!(meanEnergy > 0)) return yieldAtEnergy(terms, 0);
  // midpoint rule on each stretch between thresholds, where Y is smooth, in v with u = a + (b − a) v²: dense at the threshold
  const last = 45;
  const cuts = [0, ...terms.map((t) => t.from / meanEnergy).filter((u) => u > 0 && u < last), last].sort((a, b) => a - b);
  const steps = 600;
  let sum = 0;
  for (let k = 0; k < cuts.length - 1; k++) {
    const [a, b] = [cuts[k], cuts[k + 1]];
    for (let i = 0; i < steps; i++) {
      const v = (i + 0.5) / steps;
      const u = a + (b - a) * v * v;
      sum += (2 * v * (b - a) * yieldAtEnergy(terms, u * meanEnergy) * Math.exp(-u)) / steps;
    }
  }
  return sum;
}

/** Curves already made, by their laws: averaging a law of the energy takes a while. */
const known = new WeakMap<YieldLaw, Curve>();

/** The yield as a function of E/N at the cathode [V m²], with its slope: finite and not negative from 0 to 1e5 Td and beyond.
 *
 *  A law of the energy is averaged once, at 12 fields a decade from 1 to 1e6 Td, and interpolated; its end values are kept outside. */
export function yieldCurve(law: YieldLaw): Curve {
  const before = known.get(law);
  if (before !== undefined) return before;
  const curve = curveOfLaw(law);
  known.set(law, curve);
  return curve;
}

/** γ at one reduced field [V m²] at the cathode. */
export function yieldAt({ typical, law }: IonYield, x: number): number {
  return law === undefined ? typical : typical * yieldCurve(law).valueAt(x);
}

/** dγ/d(E/N) [1/(V m²)]. */
export function yieldSlopeAt({ typical, law }: IonYield, x: number): number {
  return law === undefined ? 0 : typical * yieldCurve(law).slopeAt(x);
}

/** Do two walls answer alike to the same ions? */
export function sameYield(one: IonYield, other: IonYield): boolean {
  return one.typical === other.typical && one.law === other.law;
}

function curveOfLaw(law: YieldLaw): Curve {
  switch (law.kind) {
    case 'constant':
      return curveOf(law);
    case 'reduced-field':
      return curveOf(law.form);
    case 'ion-energy': {
      const x = Array.from({ length: 73 }, (_, i) => TOWNSEND * 10 ** (i / 12));
      return curveOf({ kind: 'table', law: 'plain', x, y: x.map((v) => meanYield(law.terms, meanImpactEnergy(v, law.chargeExchange))) });
    }
  }
}
