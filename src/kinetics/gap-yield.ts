import { Random } from '../numerics/random.ts';
import type { CollisionTable } from './collision-table.ts';
import { SPEED_OF_1_EV } from './cross-sections.ts';
import { Electrons } from './electrons.ts';
import { Flights, type ForceField } from './flights.ts';
import { jackknife, type Measured } from './statistics.ts';

/** What one electron that a cathode emits does in a planar gap with a given field: ions made and where, the chance to come back, times of flight.
 *
 *  The cathode is the low face of the field, the anode the high one; both take every electron that arrives. `ForceField.force` is the force on electrons
 *  over their charge, towards the anode positive: −E. */
export interface GapElectrons {
  readonly table: CollisionTable;
  readonly field: ForceField;
  /** of emitted electrons [eV], leaving by the cosine law */
  readonly emissionEnergy: number;
  /** electrons emitted, all batches together */
  readonly particles: number;
  readonly seed: number;
  /** tells the random numbers of this field from others of the same seed; equal ones make results smooth in the field */
  readonly stream?: number;
}

export interface GapYield {
  /** ions made per electron emitted */
  readonly ionsPerElectron: Measured;
  /** of electrons emitted and made, those that fell back on the cathode, per electron emitted */
  readonly returned: Measured;
  /** those that reached the anode, per electron emitted */
  readonly arrived: Measured;
  /** mean time from emission at which electrons, those made on the way too, reach the anode [s], and their mean energy there [eV]; null where none does */
  readonly arrivalTime: Measured | null;
  readonly arrivalEnergy: Measured | null;
  /** ions made in each cell per electron emitted, and their standard errors */
  readonly ions: Float64Array;
  readonly ionsError: Float64Array;
  /** where ions are made on average [m from the low face]; null where none are */
  readonly ionPlace: Measured | null;
  /** per electron emitted, those left in the gap, which can no more ionise: slow electrons where the field does not carry them off */
  readonly idle: number;
  /** real collisions followed */
  readonly collisions: number;
}

const BATCHES = 16;
const GAP_STREAM = 3;
/** electrons followed at the same time, for each emitted in the batch and at least; more are represented by a choice of them, whose noise is small beside
 *  that of what the emitted ones do first */
const MOST_PER_EMITTED = 8;
const MOST = 400;
/** slices of time after which electrons that cannot ionise are no longer waited for */
const PATIENCE = 400;

/** Places of the sums of a batch; then ions by cell. */
const EMITTED = 0;
const MADE = 1;
const RETURNED = 2;
const ARRIVED = 3;
const TIME = 4;
const ENERGY = 5;
const PLACE = 6;
const IDLE = 7;
const COLLISIONS = 8;
const CELLS = 9;

/** @throws Error for a field without walls */
export function gapYieldOf(request: GapElectrons, interrupted: () => boolean = () => false): GapYield | null {
  const batches: Float64Array[] = [];
  for (let batch = 0; batch < BATCHES; batch++) {
    if (interrupted()) return null;
    batches.push(gapBatchOf(request, batch));
  }
  return combineGap(batches);
}

/** One of the batches of {@link gapYieldOf}; what they give does not depend on who computes them. */
export function gapBatchOf({ table, field, emissionEnergy, particles, seed, stream = 0 }: GapElectrons, batch: number): Float64Array {
  const { faces, force } = field;
  const cells = force.length;
  const [low, high] = [faces[0], faces[cells]];
  if (!Number.isFinite(low) || !Number.isFinite(high)) throw new Error('a gap has two walls');
  const processes = table.kinds.length;
  const random = new Random(seed, [GAP_STREAM, stream, batch]);
  const engine = new Flights(table, field, random);
  const { tally } = engine;
  const count = Math.max(1, Math.round(particles / BATCHES));
  const electrons = emit(count, emissionEnergy, low, random);
  const most = Math.max(MOST, MOST_PER_EMITTED * count);
  const gain = gainAhead(field);
  const threshold = table.kinds.reduce(
    (least, kind, p) => (kind === 'ionisation' ? Math.min(least, table.thresholds[p]) : least),
    Number.POSITIVE_INFINITY,
  );

  let step = (high - low) / (SPEED_OF_1_EV * Math.sqrt(emissionEnergy + 10)) / 20;
  let time = 0;
  let waited = 0;
  while (electrons.count > 0) {
    const before = electrons.count;
    time += step;
    engine.run(electrons, time);
    const growth = electrons.count / before;
    electrons.removeGone();
    if (growth > 1.5) step /= 1.5;
    else if (growth < 1.1) step *= 1.2;
    if (electrons.count > most) electrons.resample(most / 2, random.uniform());
    if (canIonise(electrons, faces, force, gain, threshold)) waited = 0;
    else if (++waited > PATIENCE || !isCarriedOff(electrons, force)) break;
  }

  const sums = new Float64Array(CELLS + cells);
  sums[EMITTED] = count;
  for (let cell = 0; cell < cells; cell++) {
    let ions = 0;
    for (let p = 0; p < processes; p++) if (table.kinds[p] === 'ionisation') ions += tally.counts[cell * processes + p];
    sums[CELLS + cell] = ions;
    sums[MADE] += ions;
    sums[PLACE] += ions * ((faces[cell] + faces[cell + 1]) / 2 - low);
  }
  sums[RETURNED] = tally.left[0];
  sums[ARRIVED] = tally.left[1];
  sums[TIME] = tally.leftTime[1];
  sums[ENERGY] = tally.leftEnergy[1];
  sums[IDLE] = electrons.totalWeight();
  sums[COLLISIONS] = tally.events[0];
  return sums;
}

export function combineGap(batches: readonly Float64Array[]): GapYield {
  const total = (place: number): number => batches.reduce((sum, batch) => sum + batch[place], 0);
  const measure = (above: number, below: number): Measured => jackknife(batches, (s) => s[above] / s[below]);
  const cells = batches[0].length - CELLS;
  const ions = Array.from({ length: cells }, (_, cell) => measure(CELLS + cell, EMITTED));
  const some = total(ARRIVED) > 0;
  return {
    ionsPerElectron: measure(MADE, EMITTED),
    returned: measure(RETURNED, EMITTED),
    arrived: measure(ARRIVED, EMITTED),
    arrivalTime: some ? measure(TIME, ARRIVED) : null,
    arrivalEnergy: some ? measure(ENERGY, ARRIVED) : null,
    ions: Float64Array.from(ions, ({ value }) => value),
    ionsError: Float64Array.from(ions, ({ error }) => error),
    ionPlace: total(MADE) > 0 ? measure(PLACE, MADE) : null,
    idle: total(IDLE) / total(EMITTED),
    collisions: total(COLLISIONS),
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

/** Feedback q of a gap without space charge: every ion returns to the cathode and frees `emission` electrons there.
 *  The yield of emission counts every electron that is emitted, also one that falls back: it is larger than a net yield, as breakdown measurements with a
 *  local-field α give it, by one over the share that escapes. */
export function particleFeedback({ ionsPerElectron: { value, error } }: GapYield, emission: number): Measured {
  return { value: emission * value, error: emission * error };
}

/** Electrons at the low face, leaving it by the cosine law. */
function emit(count: number, energy: number, low: number, random: Random): Electrons {
  const electrons = new Electrons(4 * count);
  const speed = Math.sqrt(energy);
  for (let k = 0; k < count; k++) {
    const i = electrons.add(1);
    // the square of the cosine is uniform
    const square = random.uniform();
    const angle = 2 * Math.PI * random.uniform();
    electrons.x[i] = low;
    electrons.ux[i] = speed * Math.sqrt(square);
    electrons.uy[i] = speed * Math.sqrt(1 - square) * Math.cos(angle);
    electrons.uz[i] = speed * Math.sqrt(1 - square) * Math.sin(angle);
  }
  return electrons;
}

/** By face: the most energy [eV] that an electron there can still gain anywhere in the gap. */
function gainAhead({ faces, force }: ForceField): Float64Array {
  const potential = new Float64Array(faces.length);
  for (let i = 1; i < faces.length; i++) potential[i] = potential[i - 1] + force[i - 1] * (faces[i] - faces[i - 1]);
  const highest = potential.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  return potential.map((value) => highest - value);
}

/** Whether any electron has, or can get from the field, what it takes to ionise. */
function canIonise(electrons: Electrons, faces: Float64Array, force: Float64Array, gain: Float64Array, threshold: number): boolean {
  const { x, ux, uy, uz, cell, count } = electrons;
  for (let i = 0; i < count; i++) {
    const c = cell[i];
    const ahead = gain[c] - force[c] * (x[i] - faces[c]);
    if (ux[i] ** 2 + uy[i] ** 2 + uz[i] ** 2 + ahead > threshold) return true;
  }
  return false;
}

/** Whether the field carries some of the electrons on. */
function isCarriedOff({ cell, count }: Electrons, force: Float64Array): boolean {
  for (let i = 0; i < count; i++) if (force[cell[i]] > 0) return true;
  return false;
}
