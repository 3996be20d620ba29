import { type Avalanches, followAvalanches, type SeedElectrons } from './avalanches.ts';
import type { Measured } from './statistics.ts';

/** What becomes of one electron that leaves the cathode, when every ion frees one there with the same chance. */
export interface SeedChance {
  /** chance that its successors do not die out */
  readonly probability: Measured;
  /** by how much that may be too high because avalanches of more than `most` ions count as such that cannot die out */
  readonly lowerBy: number;
  /** q: mean number of electrons that take its place; a lower bound where avalanches were not followed to their end */
  readonly feedback: Measured;
}

/** Chance of breakdown from one electron, by the sizes of avalanches: with chance `emission` each of the n ions of an avalanche frees one electron, which
 *  does the same. That its line dies out has the smallest chance s that solves s = G(1 − ε + ε s), G(z) = Σ P(n) zⁿ; the probability is 1 − s. For
 *  Furry's distribution that is 1 − 1/q, q = ε m (R. A. Wijsman, Phys. Rev. 75, 833, 1949; from memory, H); here P(n) are the measured shares.
 *
 *  Error: the standard error of G at the solution over 1 − ε G′, since δs = δG/(1 − ε G′). Where the measured q is not above 1, the probability that one
 *  error more would give, 2 (q − 1)/(ε² ⟨n (n − 1)⟩) for q near 1.
 *  Avalanches that were not followed to their end count as zⁿ = 0; for `lowerBy` as z^(most + 1), more than which it cannot be.
 *  @param emission  ε, electrons freed per ion, those that fall back included: above 0, at most 1
 *  @throws Error for another emission */
export function seedChance(avalanches: Avalanches, emission: number): SeedChance {
  if (!(emission > 0 && emission <= 1)) throw new Error(`an ion frees an electron with a chance from 0 to 1, not ${emission}`);
  const { most } = avalanches;
  const count = avalanches.sizes.length;
  const { sizes, shares } = sharesOf(avalanches);
  const isOpen = sizes[sizes.length - 1] > most;
  const mean = (quantity: (n: number) => number): number => sizes.reduce((sum, n, k) => sum + shares[k] * quantity(n), 0);
  const errorOfMean = (quantity: (n: number) => number): number =>
    Math.sqrt(Math.max(0, mean((n) => quantity(n) ** 2) - mean(quantity) ** 2) / (count - 1));
  const feedback: Measured = { value: emission * mean((n) => n), error: emission * errorOfMean((n) => n) };

  const extinction = (unfinishedCount: boolean): number => {
    // all avalanches together replace an electron by less than one
    if (feedback.value <= 1 && (unfinishedCount || !isOpen)) return 1;
    // convex in s: from 0 Newton's method does not pass the first root
    let s = 0;
    for (let k = 0; k < 500; k++) {
      const z = 1 - emission + emission * s;
      let [excess, slope] = [-s, -1];
      for (const [j, n] of sizes.entries()) {
        if (n > most && !unfinishedCount) continue;
        excess += shares[j] * z ** n;
        if (n > 0) slope += emission * shares[j] * n * z ** (n - 1);
      }
      const step = -excess / slope;
      if (!(slope < 0 && step > 1e-15)) break;
      s = Math.min(1, s + step);
    }
    return s;
  };

  const s = extinction(false);
  const z = 1 - emission + emission * s;
  const power = (n: number): number => (n > most ? 0 : z ** n);
  const slope = 1 - emission * mean((n) => (n > most || n === 0 ? 0 : n * z ** (n - 1)));
  const pairs = emission * emission * mean((n) => n * (n - 1));
  const atOneMoreError = pairs > 0 ? (2 * Math.max(0, feedback.value + feedback.error - 1)) / pairs : 0;
  return {
    probability: { value: 1 - s, error: s < 1 && slope > 0 ? errorOfMean(power) / slope : atOneMoreError },
    lowerBy: isOpen ? extinction(true) - s : 0,
    feedback,
  };
}

/** Sizes that occur, rising, and their shares. */
function sharesOf(avalanches: Avalanches): { readonly sizes: readonly number[]; readonly shares: readonly number[] } {
  const sizes: number[] = [];
  const counts: number[] = [];
  for (const n of avalanches.sizes.slice().sort()) {
    if (n !== sizes[sizes.length - 1]) {
      sizes.push(n);
      counts.push(0);
    }
    counts[counts.length - 1]++;
  }
  return { sizes, shares: counts.map((some) => some / avalanches.sizes.length) };
}

/** sizes up to which avalanches are followed at first and at last, times the emission, and how much further each time */
const FIRST_SIZE = 3;
const LAST_SIZE = 81;
const FURTHER = 3;

/** Follows electrons as far as their chance of breakdown needs it: an avalanche of many times 1/ε ions goes on almost for certain, so that large ones cost
 *  no more than those. Sizes followed grow until `lowerBy` is at most a tenth of the error.
 *  @param emission  ε as for {@link seedChance}
 *  @returns null when interrupted */
export function seedChanceOf(
  electrons: Omit<SeedElectrons, 'most'>,
  emission: number,
  interrupted: () => boolean = () => false,
): { readonly avalanches: Avalanches; readonly chance: SeedChance } | null {
  let found: Avalanches | undefined;
  for (let times = FIRST_SIZE; ; times *= FURTHER) {
    const avalanches = followAvalanches({ ...electrons, most: Math.ceil(times / emission) }, interrupted, found);
    if (avalanches === null) return null;
    const chance = seedChance(avalanches, emission);
    if (chance.lowerBy <= 0.1 * chance.probability.error || times >= LAST_SIZE) return { avalanches, chance };
    found = avalanches;
  }
}
