import { philox, type Random } from '../numerics/random.ts';
import { exponentialLayers, normalLayers } from '../numerics/random-layers.ts';
import { BINS, type CollisionTable, LOWEST, massShare, SPANS, type Spans, spansOf, thermalSpread } from './collision-table.ts';
import { ELECTRON_MASS, type ProcessKind, SPEED_OF_1_EV } from './cross-sections.ts';
import type { Electrons } from './electrons.ts';
import { ejectedEnergy, screenedCosine, screening } from './scattering.ts';

/** What happened on flights, weighted, by cell where it says so. Only ever added to; `clear` starts anew. */
export interface Tally {
  /** electron time [s] by cell */
  readonly time: Float64Array;
  /** way along the field [m] by cell; over the time: mean velocity */
  readonly way: Float64Array;
  /** energy times time [eV s] by cell; over the time: mean energy */
  readonly energy: Float64Array;
  /** collisions by cell and process */
  readonly counts: Float64Array;
  /** energy that collisions took [eV]: elastic ones, gains from a warm gas deducted; the others, with recoil and what attached electrons had */
  readonly losses: Float64Array;
  /** electrons that left at the low and the high end, and the sums of their times [s] and energies [eV] */
  readonly left: Float64Array;
  readonly leftTime: Float64Array;
  readonly leftEnergy: Float64Array;
  /** electrons given over as slow, by cell (see `Thinning`) */
  readonly slow: Float64Array;
  /** unweighted: real collisions, and with null ones */
  readonly events: Float64Array;
}

export function tallyFor(cells: number, processes: number): Tally {
  return {
    time: new Float64Array(cells),
    way: new Float64Array(cells),
    energy: new Float64Array(cells),
    counts: new Float64Array(cells * processes),
    losses: new Float64Array(2),
    left: new Float64Array(2),
    leftTime: new Float64Array(2),
    leftEnergy: new Float64Array(2),
    slow: new Float64Array(cells),
    events: new Float64Array(2),
  };
}

export function clearTally(tally: Tally): void {
  for (const sums of Object.values(tally) as Float64Array[]) sums.fill(0);
}

/** A force on electrons that is constant in each of some cells. Ends that are not infinite are walls: electrons that get there are gone. */
export interface ForceField {
  /** faces of the cells [m], rising; one more than cells */
  readonly faces: Float64Array;
  /** force over the elementary charge, towards larger x [V/m]: the negative of the electric field */
  readonly force: Float64Array;
}

/** The same force everywhere. */
export function uniformForce(force: number): ForceField {
  return { faces: Float64Array.of(Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY), force: Float64Array.of(force) };
}

/** Which electrons need not be followed, by cell. */
export interface Thinning {
  /** after a collision that leaves it less energy [eV] an electron is gone and counted as slow; negative: never */
  readonly slowBelow: Float64Array;
  /** electrons of less than half this weight are played for: they go on with this weight or not at all, so that on average nothing changes */
  readonly weight: Float64Array;
}

const KINDS: readonly ProcessKind[] = ['elastic', 'momentum-transfer', 'excitation', 'ionisation', 'attachment'];
const [, , EXCITATION, IONISATION] = KINDS.map((_, i) => i);

/** tells streams of electrons from others that start from the same numbers */
const OWN_STREAM = 0x67617077;

const NOTHING = new Float64Array(0);

/** what ends a flight */
const COLLISION = 0;
const SPAN_END = 1;
const LOW_FACE = 2;
const HIGH_FACE = 3;
const TIME_END = 4;

/** the upper bits of a 32-bit float less these: number of a span and of a bin */
const SPAN_BITS = (127 + LOWEST) << 2;
const BIN_BITS = (127 + LOWEST) << 7;

/** An energy of this many kT of the gas and more does not notice that molecules move: their heating is 1/400 of recoil there. */
const WARM = 400;

/** Electrons flying and colliding, exact for cross-sections on straight lines: null collisions, with a bound that holds over a span of energy. A flight
 *  that would leave its span, its cell or the time asked for ends there without a collision, which the loss of memory of exponential times allows.
 *
 *  Collisions are with molecules at rest or Maxwellian at the gas temperature (only the relative velocity counts). Elastic scattering is exact for the
 *  two masses; inelastic collisions too, except that of an ionisation the ion's recoil is neglected. The gas is in its ground state: no superelastic
 *  collisions. Non-relativistic.
 *  Null collisions: H. R. Skullerud, The stochastic computer simulation of ion motion in a gas subjected to a constant electric field,
 *  J. Phys. D 1, 1567, 1968 (from memory, H). */
export class Flights {
  readonly table: CollisionTable;
  readonly tally: Tally;
  readonly random: Random;
  readonly #field: ForceField;
  readonly #acceleration: Float64Array;
  readonly #bounded: boolean;
  readonly #spans: Spans;
  readonly #kinds: Int32Array;
  /** a vector handed to and fro */
  readonly #velocity = new Float64Array(3);
  readonly #other = new Float64Array(3);
  readonly #bits = new Float32Array(1);
  readonly #word: Int32Array;
  readonly #thinning: Thinning | null;
  readonly #key = new Uint32Array(4);

  /** @param thinning  null: every electron is followed. With it each electron has its own stream of random numbers (`Electrons.keys`), so that a run in a
   *    field that is hardly different makes nearly the same electrons */
  constructor(table: CollisionTable, field: ForceField, random: Random, thinning: Thinning | null = null) {
    this.table = table;
    this.#thinning = thinning;
    this.tally = tallyFor(field.force.length, table.kinds.length);
    this.random = random;
    this.#field = field;
    this.#acceleration = field.force.map((force) => (force * SPEED_OF_1_EV) / 2);
    this.#bounded = field.force.length > 1 || Number.isFinite(field.faces[0]) || Number.isFinite(field.faces[1]);
    this.#spans = spansOf(
      table,
      this.#acceleration.reduce((most, a) => Math.max(most, Math.abs(a)), 0),
    );
    this.#kinds = Int32Array.from(table.kinds, (kind) => KINDS.indexOf(kind));
    this.#word = new Int32Array(this.#bits.buffer);
  }

  /** Follows every electron, and those that it makes, up to a time [s] or until it is gone; those that are gone keep their place with weight 0.
   *  Nothing is allocated on the way except when the electrons outgrow their arrays.
   *  @param most  stops after the electron that brings them above this number, with those behind it not followed */
  run(electrons: Electrons, until: number, most: number = Number.POSITIVE_INFINITY): void {
    const { table, tally } = this;
    const random = this.random;
    const { faces } = this.#field;
    const { limits, lines, thresholds } = table;
    const { top: tops, bottom: bottoms, start: starts, bound: bounds, mean: means, floor } = this.#spans;
    const kinds = this.#kinds;
    const bits = this.#bits;
    const bitsAsWord = this.#word;
    const accelerations = this.#acceleration;
    const bounded = this.#bounded;
    const processes = thresholds.length;
    const warmBelow = WARM * thermalSpread(table) ** 2 * (table.mass / ELECTRON_MASS);
    const spread = thermalSpread(table);
    const share = massShare(table.mass);
    const rest = 1 - share;
    const isotropic = table.angular === 'isotropic';
    const velocity = this.#velocity;
    const thinned = this.#thinning !== null;
    const slowBelow = this.#thinning?.slowBelow ?? NOTHING;
    const wanted = this.#thinning?.weight ?? NOTHING;
    const { inside: exponentialInside, width: exponentialWidth } = exponentialLayers;
    const { inside: normalInside, width: normalWidth } = normalLayers;
    let { x: xs, y: ys, z: zs, ux: uxs, uy: uys, uz: uzs, time: times, weight: weights, cell: cells } = electrons;
    let elasticLoss = 0;
    let inelasticLoss = 0;
    let collisions = 0;
    let trials = 0;

    for (let i = 0; i < electrons.count && electrons.count <= most; i++) {
      let weight = weights[i];
      if (weight === 0) continue;
      if (thinned) this.#ownStream(electrons.keys, i);
      let x = xs[i];
      let y = ys[i];
      let z = zs[i];
      let ux = uxs[i];
      let uy = uys[i];
      let uz = uzs[i];
      let t = times[i];
      let cell = cells[i];
      let low = faces[cell];
      let high = faces[cell + 1];
      let acceleration = accelerations[cell];
      let energy = ux * ux + uy * uy + uz * uz;
      let top = 0;
      let start = -1;
      let bottom = 0;
      let bound = 0;
      let mean = 0;
      let sumTime = 0;
      let sumWay = 0;
      let sumEnergy = 0;
      let gone = false;

      for (;;) {
        if (energy > start || energy < bottom) {
          bits[0] = energy;
          let span = (bitsAsWord[0] >> 21) - SPAN_BITS;
          if (span < floor) span = floor;
          else if (span >= SPANS) span = SPANS - 1;
          start = starts[span];
          top = tops[span];
          bottom = bottoms[span];
          bound = bounds[span];
          mean = means[span];
        }
        let end = COLLISION;
        // random numbers are made here from whole ones: a function that returns any other allocates it
        let word = random.word();
        let layer = word & 255;
        let place = word >>> 8;
        const part = place * exponentialWidth[layer];
        let dt = place < exponentialInside[layer] ? part * mean : random.exponentialRest(layer, part) * mean;
        if (t + dt >= until) {
          dt = until - t;
          end = TIME_END;
        }
        const across = uy * uy + uz * uz;
        let ux1 = ux + acceleration * dt;
        let energy1 = ux1 * ux1 + across;
        if (energy1 > top) {
          ux1 = acceleration > 0 ? Math.sqrt(top - across) : -Math.sqrt(top - across);
          dt = (ux1 - ux) / acceleration;
          energy1 = top;
          end = SPAN_END;
        }
        let dx = SPEED_OF_1_EV * (ux + 0.5 * acceleration * dt) * dt;
        if (bounded && (x + dx < low || x + dx > high || ux * ux1 < 0)) {
          const toLow = timeTo(low - x, ux, acceleration, false);
          const toHigh = timeTo(high - x, ux, acceleration, true);
          if (toLow < dt || toHigh < dt) {
            const isLow = toLow < toHigh;
            dt = isLow ? toLow : toHigh;
            end = isLow ? LOW_FACE : HIGH_FACE;
            dx = (isLow ? low : high) - x;
            ux1 = ux + acceleration * dt;
            energy1 = ux1 * ux1 + across;
          }
        }
        sumTime += dt;
        sumWay += dx;
        sumEnergy += dt * (energy + dt * acceleration * (ux + (acceleration * dt) / 3));
        x += dx;
        y += SPEED_OF_1_EV * uy * dt;
        z += SPEED_OF_1_EV * uz * dt;
        t += dt;
        ux = ux1;
        energy = energy1;

        if (end !== COLLISION) {
          if (end === SPAN_END) continue;
          if (end === TIME_END) break;
          tally.time[cell] += weight * sumTime;
          tally.way[cell] += weight * sumWay;
          tally.energy[cell] += weight * sumEnergy;
          sumTime = 0;
          sumWay = 0;
          sumEnergy = 0;
          if (end === LOW_FACE) {
            x = low;
            cell--;
          } else {
            x = high;
            cell++;
          }
          if (cell < 0 || cell === accelerations.length) {
            const side = cell < 0 ? 0 : 1;
            tally.left[side] += weight;
            tally.leftTime[side] += weight * t;
            tally.leftEnergy[side] += weight * energy;
            cell = cell < 0 ? 0 : cell - 1;
            gone = true;
            break;
          }
          low = faces[cell];
          high = faces[cell + 1];
          acceleration = accelerations[cell];
          if (thinned && weight < 0.5 * wanted[cell]) {
            if ((random.word() >>> 0) * 2 ** -32 * wanted[cell] >= weight) {
              gone = true;
              break;
            }
            weight = wanted[cell];
          }
          continue;
        }

        // velocity of the molecule, and of the electron relative to it
        trials++;
        let vx = 0;
        let vy = 0;
        let vz = 0;
        let gx = ux;
        let gy = uy;
        let gz = uz;
        let relative = energy;
        if (energy < warmBelow) {
          word = random.word();
          layer = word & 127;
          place = word >> 8;
          vx = place * normalWidth[layer];
          vx = Math.abs(place) < normalInside[layer] ? vx * spread : random.normalRest(layer, vx) * spread;
          word = random.word();
          layer = word & 127;
          place = word >> 8;
          vy = place * normalWidth[layer];
          vy = Math.abs(place) < normalInside[layer] ? vy * spread : random.normalRest(layer, vy) * spread;
          word = random.word();
          layer = word & 127;
          place = word >> 8;
          vz = place * normalWidth[layer];
          vz = Math.abs(place) < normalInside[layer] ? vz * spread : random.normalRest(layer, vz) * spread;
          gx -= vx;
          gy -= vy;
          gz -= vz;
          relative = gx * gx + gy * gy + gz * gz;
        }
        bits[0] = relative;
        let bin = (bitsAsWord[0] >> 16) - BIN_BITS;
        if (bin < 0) bin = 0;
        else if (bin >= BINS) bin = BINS - 1;
        let draw = (random.word() >>> 0) * 2 ** -32 * bound;
        if (draw >= limits[bin]) continue;
        let p = 0;
        for (let at = 2 * bin * processes; p < processes; p++, at += 2) {
          if (relative <= thresholds[p]) continue;
          const rate = lines[at] + lines[at + 1] * relative;
          if (rate <= 0) continue;
          if (draw < rate) break;
          draw -= rate;
        }
        if (p === processes) continue;

        collisions++;
        tally.counts[cell * processes + p] += weight;
        const before = energy;
        if (p === 0 || kinds[p] === EXCITATION) {
          // relative speed after the collision, in a direction at random
          const left = p === 0 ? relative : Math.max(0, relative - thresholds[p] / share);
          let nx: number;
          let ny: number;
          let nz: number;
          if (isotropic) {
            // G. Marsaglia, Choosing a point from the surface of a sphere, Ann. Math. Stat. 43, 645, 1972
            let a: number;
            let b: number;
            let s: number;
            do {
              a = random.word() * 2 ** -31;
              b = random.word() * 2 ** -31;
              s = a * a + b * b;
            } while (s >= 1);
            const f = 2 * Math.sqrt(1 - s);
            nx = f * a;
            ny = f * b;
            nz = 1 - 2 * s;
          } else {
            velocity[0] = gx;
            velocity[1] = gy;
            velocity[2] = gz;
            screenedDirection(velocity, random);
            nx = velocity[0];
            ny = velocity[1];
            nz = velocity[2];
          }
          const speed = share * Math.sqrt(left);
          ux = rest * ux + share * vx + speed * nx;
          uy = rest * uy + share * vy + speed * ny;
          uz = rest * uz + share * vz + speed * nz;
          energy = ux * ux + uy * uy + uz * uz;
          if (p === 0) elasticLoss += weight * (before - energy);
          else inelasticLoss += weight * (before - energy);
        } else if (kinds[p] === IONISATION) {
          if (electrons.count === electrons.capacity) {
            electrons.grow();
            ({ x: xs, y: ys, z: zs, ux: uxs, uy: uys, uz: uzs, time: times, weight: weights, cell: cells } = electrons);
          }
          const born = electrons.count++;
          xs[born] = x;
          ys[born] = y;
          zs[born] = z;
          times[born] = t;
          weights[born] = weight;
          cells[born] = cell;
          if (thinned) {
            electrons.keys[2 * born] = random.word();
            electrons.keys[2 * born + 1] = random.word();
          }
          velocity[0] = gx;
          velocity[1] = gy;
          velocity[2] = gz;
          this.#ionise(electrons, born, thresholds[p], velocity);
          ux = velocity[0];
          uy = velocity[1];
          uz = velocity[2];
          energy = ux * ux + uy * uy + uz * uz;
          inelasticLoss += weight * (before - Math.max(0, relative - thresholds[p]));
          if (thinned && weight < 0.5 * wanted[cell]) {
            tally.time[cell] += weight * sumTime;
            tally.way[cell] += weight * sumWay;
            tally.energy[cell] += weight * sumEnergy;
            sumTime = 0;
            sumWay = 0;
            sumEnergy = 0;
            weights[born] = (random.word() >>> 0) * 2 ** -32 * wanted[cell] < weight ? wanted[cell] : 0;
            if ((random.word() >>> 0) * 2 ** -32 * wanted[cell] >= weight) {
              gone = true;
              break;
            }
            weight = wanted[cell];
          }
        } else {
          inelasticLoss += weight * before;
          gone = true;
          break;
        }
        if (thinned && energy < slowBelow[cell]) {
          tally.slow[cell] += weight;
          gone = true;
          break;
        }
      }

      tally.time[cell] += weight * sumTime;
      tally.way[cell] += weight * sumWay;
      tally.energy[cell] += weight * sumEnergy;
      xs[i] = x;
      ys[i] = y;
      zs[i] = z;
      uxs[i] = ux;
      uys[i] = uy;
      uzs[i] = uz;
      times[i] = t;
      cells[i] = cell;
      weights[i] = gone ? 0 : weight;
    }
    tally.losses[0] += elasticLoss;
    tally.losses[1] += inelasticLoss;
    tally.events[0] += collisions;
    tally.events[1] += trials;
  }

  /** Goes to the stream of one electron, told by two numbers from the stream of the one that made it: what becomes of one electron does not change the
   *  random numbers of any other but those it makes. */
  #ownStream(keys: Int32Array, i: number): void {
    const key = this.#key;
    key[0] = keys[2 * i];
    key[1] = keys[2 * i + 1];
    key[2] = 0;
    key[3] = 0;
    philox(key, OWN_STREAM, 0);
    this.random.start(key[0], key[1], key[2], key[3]);
  }

  /** Velocities after an ionisation: of the electron ejected, in its place, and of the other in `velocity`, which comes as that relative to the molecule. */
  #ionise(electrons: Electrons, born: number, threshold: number, velocity: Float64Array): void {
    const random = this.random;
    const left = Math.max(0, velocity[0] ** 2 + velocity[1] ** 2 + velocity[2] ** 2 - threshold);
    const ejected = ejectedEnergy(this.table.set.sharing, left, threshold, random.uniform());
    const other = this.#other;
    randomDirection(other, random);
    let speed = Math.sqrt(ejected);
    electrons.ux[born] = speed * other[0];
    electrons.uy[born] = speed * other[1];
    electrons.uz[born] = speed * other[2];
    if (this.table.angular === 'isotropic') randomDirection(velocity, random);
    else screenedDirection(velocity, random);
    speed = Math.sqrt(left - ejected);
    for (let k = 0; k < 3; k++) velocity[k] *= speed;
  }
}

/** First time [s] > 0 at which an electron has gone a way [m] to a face; infinite where it never does. An electron on the face itself counts as there
 *  only if it flies out.
 *  @param way       to the face: not positive for the low face, not negative for the high one
 *  @param isHigh    whether it is the high face
 *  @param velocity  and acceleration in units of the speed of 1 eV */
function timeTo(way: number, velocity: number, acceleration: number, isHigh: boolean): number {
  if (way === Number.NEGATIVE_INFINITY || way === Number.POSITIVE_INFINITY) return Number.POSITIVE_INFINITY;
  const sign = isHigh ? 1 : -1;
  const distance = Math.max(0, sign * way) / SPEED_OF_1_EV;
  const towards = sign * velocity;
  const push = sign * acceleration;
  if (distance === 0) {
    if (towards > 0 || (towards === 0 && push > 0)) return 0;
    // flies in, and may be turned back
    return push > 0 ? (-2 * towards) / push : Number.POSITIVE_INFINITY;
  }
  const root = towards * towards + 2 * push * distance;
  if (root < 0) return Number.POSITIVE_INFINITY;
  // the smaller positive root of push t²/2 + towards t = distance, without a difference of nearly equal numbers
  const sum = towards + Math.sqrt(root);
  return sum > 0 ? (2 * distance) / sum : push > 0 ? (Math.sqrt(root) - towards) / push : Number.POSITIVE_INFINITY;
}

function randomDirection(out: Float64Array, random: Random): void {
  for (;;) {
    const a = random.signed();
    const b = random.signed();
    const s = a * a + b * b;
    if (s >= 1) continue;
    const f = 2 * Math.sqrt(1 - s);
    out[0] = f * a;
    out[1] = f * b;
    out[2] = 1 - 2 * s;
    return;
  }
}

/** Turns a relative velocity into the direction after screened Coulomb scattering at its energy. */
function screenedDirection(velocity: Float64Array, random: Random): void {
  const length = Math.sqrt(velocity[0] ** 2 + velocity[1] ** 2 + velocity[2] ** 2);
  const cosine = screenedCosine(screening(length * length), random.uniform());
  const sine = Math.sqrt(Math.max(0, 1 - cosine * cosine));
  let a: number;
  let b: number;
  let s: number;
  do {
    a = random.signed();
    b = random.signed();
    s = a * a + b * b;
  } while (s >= 1 || s === 0);
  // cosine and sine of twice the angle of (a, b), which is uniform too
  const c1 = ((a * a - b * b) / s) * sine;
  const s1 = ((2 * a * b) / s) * sine;
  const ex = velocity[0] / length;
  const ey = velocity[1] / length;
  const ez = velocity[2] / length;
  const across = Math.sqrt(ex * ex + ey * ey);
  if (across < 1e-9) {
    velocity[0] = c1;
    velocity[1] = s1;
    velocity[2] = ez > 0 ? cosine : -cosine;
    return;
  }
  velocity[0] = cosine * ex + (c1 * ex * ez - s1 * ey) / across;
  velocity[1] = cosine * ey + (c1 * ey * ez + s1 * ex) / across;
  velocity[2] = cosine * ez - c1 * across;
}
