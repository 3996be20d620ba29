import { Random } from '../numerics/random.ts';
import type { CollisionTable } from './collision-table.ts';
import { Electrons } from './electrons.ts';
import { Flights, type ForceField } from './flights.ts';
import type { Measured } from './statistics.ts';

/** Chance from particles: what single electrons that leave a cathode do, one by one, and whether what follows from one of them dies out.
 *
 *  Every electron has its own stream of random numbers and is followed with all that it makes, without choosing among them, so that sizes of avalanches
 *  have their true distribution. It differs from Furry's, P(n) = mⁿ/(1 + m)ⁿ⁺¹ for n ions with mean m (W. H. Furry, Phys. Rev. 52, 569, 1937; from memory,
 *  H), which supposes that ionisation has no memory and every electron goes on to the anode:
 *  - electrons are scattered back to the cathode within the first few free paths and make nothing: P(0) is the share of them and more, where Furry's
 *    1/(1 + m) is small;
 *  - before it can ionise again an electron must gain the ionisation energy: those that get away are more alike than Furry's.
 *  The chance of breakdown from one electron (seed-chance.ts) therefore is above 1 − 1/q near q = 1, where the second counts, and stays below it far
 *  above, where it tends to 1 − P(0). */
export interface SeedElectrons {
  readonly table: CollisionTable;
  /** between two walls, the low one the cathode, and with a force to the anode everywhere */
  readonly field: ForceField;
  /** [eV]; electrons leave by the cosine law */
  readonly emissionEnergy: number;
  /** how many electrons; which one an electron is decides its random numbers */
  readonly electrons: number;
  readonly seed: number;
  /** tells the random numbers of this gap from others of the same seed */
  readonly stream?: number;
  /** an avalanche of more ions than this is not followed further */
  readonly most: number;
}

export interface Avalanches {
  /** ions made by each electron, in the order of their numbers; `most` + 1 where they were more than `most` */
  readonly sizes: Int32Array;
  readonly most: number;
  /** electrons that made no ion and fell back on the cathode; the others of size 0 reached the anode or were attached */
  readonly fellBack: number;
  /** real collisions followed */
  readonly collisions: number;
}

const AVALANCHE_STREAM = 7;
/** electrons between two looks whether to stop */
const BLOCK = 16;

/** Follows electrons one by one.
 *  @param before  the same electrons followed up to fewer ions: only those are followed again, from their start, that had made more
 *  @returns null when interrupted
 *  @throws Error for a field without walls or one that does not draw electrons to the anode everywhere */
export function followAvalanches(request: SeedElectrons, interrupted: () => boolean = () => false, before?: Avalanches): Avalanches | null {
  const { table, field, emissionEnergy, electrons: count, seed, stream = 0, most } = request;
  const { faces, force } = field;
  if (!Number.isFinite(faces[0]) || !Number.isFinite(faces[force.length])) throw new Error('a gap has two walls');
  if (!force.every((f) => f > 0)) throw new Error('an avalanche ends only where the field draws electrons to the anode everywhere');
  const random = new Random(seed);
  const engine = new Flights(table, field, random);
  const { tally } = engine;
  const electrons = new Electrons();
  const sizes = before === undefined ? new Int32Array(count) : before.sizes.slice();
  const speed = Math.sqrt(emissionEnergy);
  let fellBack = before?.fellBack ?? 0;
  for (let k = 0; k < count; k++) {
    if (k % BLOCK === 0 && interrupted()) return null;
    if (before !== undefined && sizes[k] <= before.most) continue;
    random.restart(seed, [AVALANCHE_STREAM, stream, k]);
    electrons.count = 0;
    const i = electrons.add(1);
    // the square of the cosine is uniform
    const square = random.uniform();
    const angle = 2 * Math.PI * random.uniform();
    electrons.x[i] = faces[0];
    electrons.ux[i] = speed * Math.sqrt(square);
    electrons.uy[i] = speed * Math.sqrt(1 - square) * Math.cos(angle);
    electrons.uz[i] = speed * Math.sqrt(1 - square) * Math.sin(angle);
    const returned = tally.left[0];
    engine.run(electrons, Number.POSITIVE_INFINITY, most + 1);
    // each ionisation makes one electron, and none is removed
    sizes[k] = Math.min(electrons.count - 1, most + 1);
    if (electrons.count === 1 && tally.left[0] > returned) fellBack++;
  }
  return { sizes, most, fellBack, collisions: tally.events[0] + (before?.collisions ?? 0) };
}

/** Distribution of ions made per electron emitted; errors are standard errors of independent electrons. */
export interface AvalancheSizes {
  /** of sizes as followed: lower bounds where `beyond` is above 0 */
  readonly mean: Measured;
  readonly variance: Measured;
  /** share of electrons that make 0, 1, 2, … ions, and of those that make more than the list says */
  readonly shares: readonly Measured[];
  readonly rest: Measured;
  /** share of electrons that make no ion and fall back on the cathode */
  readonly fellBack: Measured;
  /** share of electrons that were not followed to their end */
  readonly beyond: number;
}

/** @param upTo  largest size with a share of its own, at most as many as were followed */
export function avalancheSizes({ sizes, most, fellBack }: Avalanches, upTo: number): AvalancheSizes {
  const count = sizes.length;
  const shares = new Float64Array(Math.min(upTo, most) + 1);
  let [sum, beyond, listed] = [0, 0, 0];
  for (const n of sizes) {
    sum += n;
    if (n > most) beyond++;
    if (n < shares.length) {
      shares[n]++;
      listed++;
    }
  }
  const mean = sum / count;
  let [second, fourth] = [0, 0];
  for (const n of sizes) {
    const square = (n - mean) ** 2;
    second += square;
    fourth += square * square;
  }
  const variance = second / (count - 1);
  const share = (some: number): Measured => ({ value: some / count, error: Math.sqrt(((some / count) * (1 - some / count)) / count) });
  return {
    mean: { value: mean, error: Math.sqrt(variance / count) },
    variance: { value: variance, error: Math.sqrt(Math.max(0, fourth / count - variance * variance) / count) },
    shares: Array.from(shares, share),
    rest: share(count - listed),
    fellBack: share(fellBack),
    beyond: beyond / count,
  };
}
