import type { Form } from './forms.ts';
import type { Coefficient, GasCoefficients, GasData, MixturePart } from './gas.ts';
import { isRareGas, type PenningPair, penningPairs } from './levels.ts';

/* Gases mixed by fraction. Each coefficient of the mixture is built from those of its gases at the same E/N, by the rule that stands beside it.
 *
 * What the rules leave out is that electrons of a mixture have other energies than those of either gas at that field. Measured against our own solution of the Boltzmann equation for
 * mixtures (test/gases/mixture.test.ts; both sides from the same cross-sections, so that it is the rule alone that errs):
 *   molecular gases, and rare gases that do not ionise each other: α within a third from 200 Td on (hydrogen with nitrogen 1.9 times too large there, and right within 15 % from 500 Td);
 *   below 200 Td α is too large, up to ten times at 100 Td, where little is ionised: V_s too low, safe;
 *   a rare gas with a molecular one: α 2 to 30 times too large at 100 to 200 Td, where molecules cool the electrons (safe), and up to 36 % too small above 500 Td in helium with nitrogen (unsafe);
 *   neon with krypton, no Penning ionisation counted: up to 40 % too small (unsafe);
 *   μ of electrons within 40 %, D/μ within a factor of two. */

/** α/N and η/N [m²]: each molecule does at that field what it does in its own gas. */
const SUM = 'Σ fᵢ yᵢ at the same E/N (Wieland, ETZ-A 94, 370, 1973, from memory, M)';
/** μN: collisions of a kind add up, and with them the friction. Exact for a constant collision frequency; good to some 10 % for ions at low field. */
const BLANC = 'Blanc’s law, 1/μ = Σ fᵢ/μᵢ at the same E/N (Blanc, J. Phys. (Paris) 7, 825, 1908, from memory, H)';
/** D/μ: D and μ each by Blanc's law, so that the two stay consistent; it lies between those of the gases, nearest to that of the gas with most friction. */
const DIFFUSION = 'D and μ each by Blanc’s law at the same E/N (Blanc, J. Phys. (Paris) 7, 825, 1908, from memory, H)';
const MEAN = 'Σ fᵢ βᵢ over the gases for which it is known';

/** how well α and V_s are known: see the comparison above; a V_s at the minimum goes as 1/α */
const CLOSE = { ionisation: 0.3, breakdown: 0.3 };
const WIDE = { ionisation: 1, breakdown: 0.5 };

/** What a mixture is made of: the data of a built-in gas and its share of the density. */
export interface Ingredient {
  readonly gas: GasData;
  readonly fraction: number;
}

/** The data of a mixture, as those of a gas. One ingredient alone is that gas itself.
 *
 *  α/N, η/N: Σ fᵢ yᵢ. Mobilities: Blanc's law; the ion is one that moves through each gas as that gas's own ion does. D/μ: D and μ by Blanc's law. Recombination: Σ fᵢ βᵢ. All at the same
 *  E/N. Ranges: what all have in common. Negative ions move through every gas as through those that make them.
 *
 *  @param ingredients  fractions above 0 that sum to 1, no gas twice; their order does not matter
 *  @throws RangeError when there is none, or when fractions do not sum to 1 within 1e-6 */
export function mixtureOf(ingredients: readonly Ingredient[]): GasData {
  const sum = ingredients.reduce((total, { fraction }) => total + fraction, 0);
  if (!(Math.abs(sum - 1) <= 1.0001e-6)) throw new RangeError(`the fractions of a mixture sum to ${sum}`);
  if (ingredients.length === 1) return ingredients[0].gas;
  // by name, so that the same mixture gives the same numbers to the last digit
  const parts = ingredients.toSorted((a, b) => (a.gas.name < b.gas.name ? -1 : 1));
  const names = parts.map(({ gas }) => gas.name);
  const name = mixtureName(parts.map(({ gas, fraction }) => ({ gas: gas.name, fraction })));
  const pairs = penningPairs(names);
  const known = uncertaintyOf(names, pairs);
  return {
    name,
    title: `Mixture: ${name}`,
    set: 'mixing rule',
    reason: 'No data of the mixture itself: those of its gases, put together at the same E/N.',
    coefficients: coefficientsOf(parts, known.ionisation),
    alternatives: {},
    detachment: parts.map(({ gas }) => gas.detachment).find((text) => text !== null) ?? null,
    breakdownUncertainty: Math.max(known.breakdown, ...parts.map(({ gas }) => gas.breakdownUncertainty)),
    notes: mixtureNotes(names),
    kineticCrossSection: parts.reduce((total, { gas, fraction }) => total + fraction * gas.kineticCrossSection, 0),
  };
}

/** `0.9 argon + 0.1 nitrogen`: the largest share first. */
export function mixtureName(parts: readonly MixturePart[]): string {
  return parts
    .toSorted((a, b) => b.fraction - a.fraction || (a.gas < b.gas ? -1 : 1))
    .map(({ gas, fraction }) => `${Number(fraction.toPrecision(9))} ${gas}`)
    .join(' + ');
}

/** What a reader must know of a mixture of these gases: which way the rule errs. */
export function mixtureNotes(names: readonly string[]): string[] {
  const pairs = penningPairs(names);
  const notes = [
    'Coefficients by mixing rules at equal E/N: no measurement of this mixture is behind them. Where you have one, give it as gas.coefficients.ionisation.',
  ];
  if (pairs.length > 0) notes.push(`${penningText(pairs)}. It is not modelled: V_s comes out too high, which is unsafe.`);
  if (isMixed(names))
    notes.push(
      'Molecules cool the electrons of a rare gas: at fields of some 100 to 200 Td, at large pd, ionisation comes out several times too large and V_s too low, which is safe; above 500 Td, near the minimum, it may be a third too small and V_s too high, which is unsafe.',
    );
  notes.push(
    'The ion is a mean one. Charge passes to the gas that is ionised most easily, whose ions may be up to twice as fast or slow: lags with them.',
  );
  return notes;
}

/** `Penning ionisation: helium metastables (19.8 eV) ionise argon (15.8 eV) and xenon (12.1 eV)`. */
export function penningText(pairs: readonly PenningPair[]): string {
  const texts = [...new Set(pairs.map((pair) => pair.metastable))].map((metastable) => {
    const group = pairs.filter((pair) => pair.metastable === metastable);
    const gases = group.map((pair) => `${pair.ionised} (${pair.ionisation.toFixed(1)} eV)`);
    const list = gases.length === 1 ? gases[0] : `${gases.slice(0, -1).join(', ')} and ${gases[gases.length - 1]}`;
    return `${metastable} metastables (${group[0].level.toFixed(1)} eV) ionise ${list}`;
  });
  return `Penning ionisation: ${texts.join('; ')}`;
}

/** rare gases and molecular ones together */
function isMixed(names: readonly string[]): boolean {
  return names.some(isRareGas) && !names.every(isRareGas);
}

function uncertaintyOf(names: readonly string[], pairs: readonly PenningPair[]): typeof CLOSE {
  return pairs.length > 0 || isMixed(names) ? WIDE : CLOSE;
}

interface Share {
  readonly gas: string;
  readonly fraction: number;
  readonly coefficient: Coefficient;
  /** μN that weighs a D/μ */
  readonly beside?: Form;
}

function coefficientsOf(parts: readonly Ingredient[], ionisation: number): GasCoefficients {
  const sharesOf = (key: keyof GasCoefficients, weight?: keyof GasCoefficients): Share[] =>
    parts.flatMap(({ gas, fraction }) => {
      const coefficient = gas.coefficients[key];
      const beside = weight === undefined ? undefined : gas.coefficients[weight]?.form;
      return coefficient === null ? [] : [{ gas: gas.name, fraction, coefficient, ...(beside === undefined ? {} : { beside }) }];
    });
  const negative = (key: 'negativeIonMobility' | 'negativeIonEnergy', weight?: 'negativeIonMobility'): Share[] => {
    const shares = sharesOf(key, weight);
    const total = shares.reduce((sum, { fraction }) => sum + fraction, 0);
    return shares.map((share) => ({ ...share, fraction: share.fraction / total }));
  };
  const orNull = (shares: readonly Share[], make: (shares: readonly Share[]) => Coefficient): Coefficient | null =>
    shares.length === 0 ? null : make(shares);
  return {
    ionisation: mixed(
      sharesOf('ionisation'),
      'sum',
      SUM,
      ionisation,
      'Electrons of a mixture have other energies than those of its gases at that field; Penning ionisation is not in it.',
    ),
    attachment: orNull(sharesOf('attachment'), (shares) =>
      mixed(
        shares,
        'sum',
        SUM,
        Math.max(0.5, ionisation),
        'Gases without attachment count as 0. Cooler electrons attach more than this: V_s then comes out too low, which is safe.',
      ),
    ),
    electronMobility: mixed(sharesOf('electronMobility'), 'harmonic', BLANC, 0.4, 'Breakdown voltage and ion-fed lag hardly depend on it.'),
    electronEnergy: mixed(
      sharesOf('electronEnergy', 'electronMobility'),
      'harmonic',
      DIFFUSION,
      1,
      'Breakdown voltage shifts little with it.',
    ),
    ionMobility: mixed(
      sharesOf('ionMobility'),
      'harmonic',
      BLANC,
      0.5,
      'For one mean ion, which moves through each gas as that gas’s own ion does. Ions foreign to a gas do not exchange charge with it and are faster there. Lags scale with it, V_s does not.',
    ),
    ionEnergy: mixed(
      sharesOf('ionEnergy', 'ionMobility'),
      'harmonic',
      DIFFUSION,
      0.5,
      'Ions cross a gap by drift; breakdown voltage and lag hardly depend on it.',
    ),
    negativeIonMobility: orNull(negative('negativeIonMobility'), (shares) =>
      mixed(
        shares,
        'harmonic',
        BLANC,
        0.5,
        'Over the gases that attach: negative ions are taken to move through the others as through those.',
      ),
    ),
    negativeIonEnergy: orNull(negative('negativeIonEnergy', 'negativeIonMobility'), (shares) =>
      mixed(shares, 'harmonic', DIFFUSION, 0.5, 'Over the gases that attach.'),
    ),
    electronIonRecombination: orNull(sharesOf('electronIonRecombination'), (shares) =>
      mixed(
        shares,
        'sum',
        MEAN,
        1,
        'Gases without a value count as 0: a dense glow then comes out slightly too strong. No effect on breakdown.',
      ),
    ),
    ionIonRecombination: orNull(sharesOf('ionIonRecombination'), (shares) => {
      const total = shares.reduce((sum, { fraction }) => sum + fraction, 0);
      const whole = shares.map((share) => ({ ...share, fraction: share.fraction / total }));
      return mixed(whole, 'sum', MEAN, 1, 'Much the same for all ions. No effect on breakdown.');
    }),
  };
}

/** One coefficient from those of the gases. The rule's own uncertainty is a floor: no mixture is known better than its gases. */
function mixed(shares: readonly Share[], mean: 'sum' | 'harmonic', rule: string, uncertainty: number, note: string): Coefficient {
  const temperatures = new Set(shares.map(({ coefficient }) => coefficient.referenceTemperature ?? null));
  const sources = shares.map(({ gas, coefficient }) => `${gas}: ${coefficient.source} (${coefficient.status})`);
  return {
    form: {
      kind: 'mixed',
      mean,
      parts: shares.map(({ fraction, coefficient, beside }) => ({
        fraction,
        form: coefficient.form,
        ...(beside === undefined ? {} : { beside }),
      })),
    },
    range: commonRange(shares),
    source: `${rule}; ${sources.join('; ')}`,
    status: 'computed',
    uncertainty: Math.max(uncertainty, ...shares.map(({ coefficient }) => coefficient.uncertainty ?? 0)),
    referenceTemperature: temperatures.size === 1 ? [...temperatures][0] : null,
    note,
  };
}

/** What the ranges have in common; null where none is stated, a single point where they do not meet: then everything is outside. */
function commonRange(shares: readonly Share[]): Coefficient['range'] {
  const ranges = shares.flatMap(({ coefficient: { range } }) => (range === null ? [] : [range]));
  if (ranges.length === 0) return null;
  const from = Math.max(...ranges.map((range) => range.from));
  return { from, to: Math.max(from, Math.min(...ranges.map((range) => range.to))) };
}
