import { Random } from '../numerics/random.ts';
import type { CollisionTable } from './collision-table.ts';
import { Electrons } from './electrons.ts';
import { clearTally, Flights, type ForceField } from './flights.ts';
import { slowBelow } from './slow.ts';
import { jackknife, type Measured } from './statistics.ts';

/** What one electron that a cathode emits does in a planar gap with a given field: ions made and where, the chance to come back, where electrons become
 *  slow, times of flight.
 *
 *  The cathode is the low face of the field, the anode the high one; both take every electron that arrives. `ForceField.force` is the force on electrons
 *  over their charge, towards the anode positive: −E.
 *
 *  Each emitted electron is followed to the end with all that it makes, on streams of random numbers of its own and of its offspring (`Flights`), so that
 *  fields that hardly differ give nearly the same answer. So that a long avalanche costs little more than one electron's way, electrons are played for: in
 *  each cell with a chance that keeps about as many as there were emitted. All means are right whatever those weights; only the noise depends on them. */
export interface GapElectrons {
  readonly table: CollisionTable;
  readonly field: ForceField;
  /** of emitted electrons [eV], leaving by the cosine law */
  readonly emissionEnergy: number;
  /** electrons emitted, all batches together */
  readonly particles: number;
  readonly seed: number;
  /** tells these electrons from others of the same seed */
  readonly stream?: number;
  /** electrons through each cell per electron emitted, as expected, to choose weights by; as many as cells. Absent: found by a few electrons beforehand */
  readonly expected?: Float64Array;
}

export interface GapYield {
  /** ions made per electron emitted */
  readonly ionsPerElectron: Measured;
  /** of electrons emitted and made, those that fell back on the cathode, per electron emitted */
  readonly returned: Measured;
  /** those that reached the anode while they could still ionise, per electron emitted */
  readonly arrived: Measured;
  /** mean time from emission at which these, those made on the way too, reach the anode [s], and their mean energy there [eV]; null where none does */
  readonly arrivalTime: Measured | null;
  readonly arrivalEnergy: Measured | null;
  /** ions made in each cell per electron emitted, and their standard errors */
  readonly ions: Float64Array;
  readonly ionsError: Float64Array;
  /** electrons that in each cell had become too slow ever to ionise, per electron emitted */
  readonly slow: Float64Array;
  /** where ions are made on average [m from the low face]; null where none are */
  readonly ionPlace: Measured | null;
  /** real collisions followed */
  readonly collisions: number;
  /** electrons through each cell per electron emitted, for `GapElectrons.expected` of a field that is not very different */
  readonly flux: Float64Array;
}

export const GAP_BATCHES = 16;
const GAP_STREAM = 3;
/** electrons followed in a cell for each emitted, about */
const FOLLOWED = 2;
/** electrons emitted to choose weights by in each round, of at least so many; what weights come down by in one */
const SCOUTS = 16;
const ROUNDS = 2;
const DESCENT = 30;
/** volts for the number of electrons to grow e-fold, which no gas does sooner for long: weights of the first round */
const QUICKEST = 35;

/** Places of the sums of a batch; then ions by cell, then slow electrons by cell. */
const EMITTED = 0;
const MADE = 1;
const RETURNED = 2;
const ARRIVED = 3;
const TIME = 4;
const ENERGY = 5;
const PLACE = 6;
const COLLISIONS = 7;
const CELLS = 8;

/** @throws Error for a field without walls */
export function gapYieldOf(request: GapElectrons, interrupted: () => boolean = () => false): GapYield | null {
  const expected = request.expected ?? expectedFlux(request);
  const engine = engineFor(request, weightsFor(expected));
  const count = batchSize(request);
  const batches: Float64Array[] = [];
  for (let batch = 0; batch < GAP_BATCHES; batch++) {
    if (interrupted()) return null;
    batches.push(follow(engine, request, count, batch * count));
  }
  return combineGap(batches);
}

/** One of the batches of {@link gapYieldOf}; what they give does not depend on who computes them. */
export function gapBatchOf(request: GapElectrons & { readonly expected: Float64Array }, batch: number): Float64Array {
  const count = batchSize(request);
  return follow(engineFor(request, weightsFor(request.expected)), request, count, batch * count);
}

function batchSize({ particles }: GapElectrons): number {
  return Math.max(1, Math.round(particles / GAP_BATCHES));
}

/** Electrons through each cell per electron emitted, roughly: by a few electrons whose weights are at first far too large, so that few are followed, and
 *  come down by no more than a factor a round, so that never many are. */
export function expectedFlux(request: GapElectrons): Float64Array {
  const { faces, force } = request.field;
  let volts = 0;
  let weight: Float64Array = force.map((f, cell) => {
    volts += Math.max(0, f) * (faces[cell + 1] - faces[cell]);
    return Math.exp(volts / QUICKEST);
  });
  for (let round = 0; ; round++) {
    const flux = fluxOf(follow(engineFor(request, weight), request, SCOUTS, 2 ** 31 + round * SCOUTS), force.length);
    const wanted = weightsFor(flux);
    const next = wanted.map((w, cell) => Math.max(w, weight[cell] / DESCENT));
    if (round >= ROUNDS && next.every((w, cell) => w === wanted[cell])) return flux;
    weight = next;
  }
}

/** The weight of electrons in each cell with which about `FOLLOWED` of them are followed for each emitted. */
function weightsFor(flux: Float64Array): Float64Array {
  return flux.map((electrons) => Math.max(1, electrons / FOLLOWED));
}

/** @param weight  of electrons in each cell, see `Thinning` */
function engineFor({ table, field }: GapElectrons, weight: Float64Array): Flights {
  const { faces, force } = field;
  if (!Number.isFinite(faces[0]) || !Number.isFinite(faces[force.length])) throw new Error('a gap has two walls');
  return new Flights(table, field, new Random(0), { slowBelow: slowBelow(table, field), weight });
}

/** Follows electrons from the cathode, one after the other with their offspring.
 *  @param first  number of the first, which tells their random numbers */
function follow(
  engine: Flights,
  { table, field, emissionEnergy, seed, stream = 0 }: GapElectrons,
  count: number,
  first: number,
): Float64Array {
  const { faces, force } = field;
  const cells = force.length;
  const low = faces[0];
  const processes = table.kinds.length;
  const { tally, random } = engine;
  clearTally(tally);
  const electrons = new Electrons(256);
  const speed = Math.sqrt(emissionEnergy);
  for (let k = 0; k < count; k++) {
    random.restart(seed, [GAP_STREAM, stream, first + k]);
    electrons.count = 0;
    const i = electrons.add(1);
    // the square of the cosine is uniform; one electron in each of `count` equal parts
    const square = (k + random.uniform()) / count;
    const angle = 2 * Math.PI * random.uniform();
    electrons.x[i] = low;
    electrons.ux[i] = speed * Math.sqrt(square);
    electrons.uy[i] = speed * Math.sqrt(1 - square) * Math.cos(angle);
    electrons.uz[i] = speed * Math.sqrt(1 - square) * Math.sin(angle);
    electrons.keys[2 * i] = random.word();
    electrons.keys[2 * i + 1] = random.word();
    engine.run(electrons, Number.POSITIVE_INFINITY);
  }

  const sums = new Float64Array(CELLS + 2 * cells);
  sums[EMITTED] = count;
  for (let cell = 0; cell < cells; cell++) {
    let ions = 0;
    for (let p = 0; p < processes; p++) if (table.kinds[p] === 'ionisation') ions += tally.counts[cell * processes + p];
    sums[CELLS + cell] = ions;
    sums[CELLS + cells + cell] = tally.slow[cell];
    sums[MADE] += ions;
    sums[PLACE] += ions * ((faces[cell] + faces[cell + 1]) / 2 - low);
  }
  sums[RETURNED] = tally.left[0];
  sums[ARRIVED] = tally.left[1];
  sums[TIME] = tally.leftTime[1];
  sums[ENERGY] = tally.leftEnergy[1];
  sums[COLLISIONS] = tally.events[0];
  return sums;
}

/** Electrons through each cell per electron emitted, from sums: those that did not fall back, and what has been made, less what has become slow. */
function fluxOf(sums: Float64Array, cells: number): Float64Array {
  let flux = Math.max(0, sums[EMITTED] - sums[RETURNED]);
  return Float64Array.from({ length: cells }, (_, cell) => {
    const made = sums[CELLS + cell];
    const slow = sums[CELLS + cells + cell];
    const middle = flux + made / 2;
    flux = Math.max(0, flux + made - slow);
    return middle / sums[EMITTED];
  });
}

export function combineGap(batches: readonly Float64Array[]): GapYield {
  const all = new Float64Array(batches[0].length);
  for (const batch of batches) for (let k = 0; k < all.length; k++) all[k] += batch[k];
  const measure = (above: number, below: number): Measured => jackknife(batches, (s) => s[above] / s[below]);
  const cells = (all.length - CELLS) / 2;
  const ions = Array.from({ length: cells }, (_, cell) => measure(CELLS + cell, EMITTED));
  const some = all[ARRIVED] > 0;
  return {
    ionsPerElectron: measure(MADE, EMITTED),
    returned: measure(RETURNED, EMITTED),
    arrived: measure(ARRIVED, EMITTED),
    arrivalTime: some ? measure(TIME, ARRIVED) : null,
    arrivalEnergy: some ? measure(ENERGY, ARRIVED) : null,
    ions: Float64Array.from(ions, ({ value }) => value),
    ionsError: Float64Array.from(ions, ({ error }) => error),
    slow: all.slice(CELLS + cells).map((sum) => sum / all[EMITTED]),
    ionPlace: all[MADE] > 0 ? measure(PLACE, MADE) : null,
    collisions: all[COLLISIONS],
    flux: fluxOf(all, cells),
  };
}

/** A gap of equal cells with the same field everywhere.
 *  @param voltage   [V], above 0: the low face is the cathode
 *  @param distance  [m] */
export function uniformGap(voltage: number, distance: number, cells: number): ForceField {
  return {
    faces: Float64Array.from({ length: cells + 1 }, (_, i) => (distance * i) / cells),
    force: new Float64Array(cells).fill(voltage / distance),
  };
}
