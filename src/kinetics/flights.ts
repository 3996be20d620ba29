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

/** the upper bits of a 32-bit float less these: number of a span and of a bin */
const SPAN_BITS = (127 + LOWEST) << 3;
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
  /** numbers handed between the inner loop and what is around it */
  readonly #held = new Float64Array(5);
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
    const { top: tops, bottom: bottoms, start: starts, bound: bounds, mean: means } = this.#spans;
    const kinds = this.#kinds;
    const bits = this.#bits;
    const bitsAsWord = this.#word;
    const accelerations = this.#acceleration;
    const warmBelow = WARM * thermalSpread(table) ** 2 * (table.mass / ELECTRON_MASS);
    const isotropic = table.angular === 'isotropic';
    const velocity = this.#velocity;
    const thinned = this.#thinning !== null;
    const slowBelow = this.#thinning?.slowBelow ?? NOTHING;
    const wanted = this.#thinning?.weight ?? NOTHING;
    const { inside: exponentialInside, width: exponentialWidth } = exponentialLayers;
    const { inside: normalInside, width: normalWidth } = normalLayers;
    // The compiler asks numbers of the module, arguments and what functions return for their type at every use in the loop; the results of arithmetic it
    // does not.
    const unit = 1 * SPEED_OF_1_EV;
    const end = 1 * until;
    const spread = 1 * thermalSpread(table);
    const share = 1 * massShare(table.mass);
    const floor = this.#spans.floor | 0;
    const processes = thresholds.length | 0;
    const bounded = this.#bounded ? 1 : 0;
    const spanBits = SPAN_BITS | 0;
    const binBits = BIN_BITS | 0;
    const lastSpan = (SPANS - 1) | 0;
    const lastBin = (BINS - 1) | 0;
    // what ends a flight: here, since numbers of the module are read anew each time
    const COLLISION = 0;
    const SPAN_END = 1;
    const TIME_END = 2;
    const LOW_FACE = 3;
    const HIGH_FACE = 4;
    // and what else leaves the inner loop
    const DRAW = 5;
    const FACES = 6;
    const MOLECULE = 7;
    const TURN = 8;
    const CHANGE = 9;
    const SLOW = 10;
    const counts = tally.counts;
    const held = this.#held;
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
      // what was found outside of the inner loop, in `held`, and where it goes on with that
      let found = COLLISION;

      while (!gone) {
        let event = COLLISION;
        // No function is called in the inner loop (`random.word` is put in its place), so that numbers stay in registers; what needs one leaves it.
        for (;;) {
          if (found !== MOLECULE) {
            let dt: number;
            let dx: number;
            let ux1: number;
            let energy1: number;
            let flight = COLLISION;
            if (found === FACES) {
              dt = held[0];
              dx = held[1];
              ux1 = held[2];
              energy1 = held[3];
              flight = held[4] | 0;
            } else {
              if (found === DRAW) dt = held[0];
              else {
                if (energy > start || energy < bottom) {
                  bits[0] = energy;
                  let span = (bitsAsWord[0] >> 20) - spanBits;
                  if (span < floor) span = floor;
                  else if (span > lastSpan) span = lastSpan;
                  start = starts[span];
                  top = tops[span];
                  bottom = bottoms[span];
                  bound = bounds[span];
                  mean = means[span];
                }
                const word = random.word();
                const layer = word & 255;
                const place = word >>> 8;
                dt = place * exponentialWidth[layer] * mean;
                if (place >= exponentialInside[layer]) {
                  held[0] = layer;
                  held[1] = place * exponentialWidth[layer];
                  event = DRAW;
                  break;
                }
              }
              if (t + dt >= end) {
                dt = end - t;
                flight = TIME_END;
              }
              const across = uy * uy + uz * uz;
              ux1 = ux + acceleration * dt;
              energy1 = ux1 * ux1 + across;
              if (energy1 > top) {
                ux1 = acceleration > 0 ? Math.sqrt(top - across) : -Math.sqrt(top - across);
                dt = (ux1 - ux) / acceleration;
                energy1 = top;
                flight = SPAN_END;
              }
              dx = unit * dt * (ux + 0.5 * acceleration * dt);
              if (bounded === 1 && (x + dx < low || x + dx > high || ux * ux1 < 0)) {
                held[0] = dt;
                held[1] = dx;
                held[2] = ux1;
                held[3] = energy1;
                held[4] = flight;
                event = FACES;
                break;
              }
            }
            const gain = acceleration * dt;
            const reach = unit * dt;
            sumTime += dt;
            sumWay += dx;
            sumEnergy += dt * (energy + gain * (ux + gain * (1 / 3)));
            x += dx;
            y += uy * reach;
            z += uz * reach;
            t += dt;
            ux = ux1;
            energy = energy1;
            if (flight !== COLLISION) {
              found = COLLISION;
              if (flight === SPAN_END) continue;
              event = flight;
              break;
            }
            trials++;
          }

          // velocity of the electron relative to the molecule
          let gx = ux;
          let gy = uy;
          let gz = uz;
          let relative = energy;
          if (energy < warmBelow) {
            if (found === MOLECULE) {
              gx -= held[0];
              gy -= held[1];
              gz -= held[2];
            } else {
              let word = random.word();
              let layer = word & 127;
              let place = word >> 8;
              const vx = place * normalWidth[layer];
              if (Math.abs(place) >= normalInside[layer]) {
                held[0] = vx;
                held[3] = layer;
                held[4] = 0;
                event = MOLECULE;
                break;
              }
              word = random.word();
              layer = word & 127;
              place = word >> 8;
              const vy = place * normalWidth[layer];
              if (Math.abs(place) >= normalInside[layer]) {
                held[0] = vx;
                held[1] = vy;
                held[3] = layer;
                held[4] = 1;
                event = MOLECULE;
                break;
              }
              word = random.word();
              layer = word & 127;
              place = word >> 8;
              const vz = place * normalWidth[layer];
              if (Math.abs(place) >= normalInside[layer]) {
                held[0] = vx;
                held[1] = vy;
                held[2] = vz;
                held[3] = layer;
                held[4] = 2;
                event = MOLECULE;
                break;
              }
              gx -= vx * spread;
              gy -= vy * spread;
              gz -= vz * spread;
            }
            relative = gx * gx + gy * gy + gz * gz;
          }
          found = COLLISION;
          bits[0] = relative;
          let bin = (bitsAsWord[0] >> 16) - binBits;
          if (bin < 0) bin = 0;
          else if (bin > lastBin) bin = lastBin;
          let draw = (random.word() >>> 0) * 2 ** -32 * bound;
          if (draw >= limits[bin]) continue;
          let at = 2 * bin * processes;
          let p = 0;
          // elastic scattering, the most likely one by far, has no threshold
          const elastic = lines[at] + lines[at + 1] * relative;
          if (draw >= elastic) {
            draw -= elastic;
            for (p = 1; p < processes; p++) {
              at += 2;
              if (relative <= thresholds[p]) continue;
              const rate = lines[at] + lines[at + 1] * relative;
              if (rate <= 0) continue;
              if (draw < rate) break;
              draw -= rate;
            }
            if (p === processes) continue;
          }

          collisions++;
          counts[cell * processes + p] += weight;
          const turns = p === 0 || kinds[p] === EXCITATION;
          if (!turns || !isotropic) {
            velocity[0] = gx;
            velocity[1] = gy;
            velocity[2] = gz;
            held[0] = relative;
            held[1] = p;
            event = turns ? TURN : CHANGE;
            break;
          }
          // relative speed after the collision, in a direction at random: G. Marsaglia, Choosing a point from the surface of a sphere, Ann. Math. Stat. 43,
          // 645, 1972
          let a: number;
          let b: number;
          let s: number;
          do {
            a = random.word() * 2 ** -31;
            b = random.word() * 2 ** -31;
            s = a * a + b * b;
          } while (s >= 1);
          const speed = Math.sqrt(p === 0 ? relative : Math.max(0, relative - thresholds[p] / share));
          const f = 2 * speed * Math.sqrt(1 - s);
          ux += share * (f * a - gx);
          uy += share * (f * b - gy);
          uz += share * (speed * (1 - 2 * s) - gz);
          const before = energy;
          energy = ux * ux + uy * uy + uz * uz;
          if (p === 0) elasticLoss += weight * (before - energy);
          else inelasticLoss += weight * (before - energy);
          if (thinned && energy < slowBelow[cell]) {
            event = SLOW;
            break;
          }
        }

        if (event === TIME_END) break;
        if (event === DRAW) {
          held[0] = random.exponentialRest(held[0], held[1]) * mean;
          found = DRAW;
          continue;
        }
        if (event === MOLECULE) {
          const axis = held[4];
          for (let k = 0; k < 3; k++)
            held[k] = spread * (k < axis ? held[k] : k === axis ? random.normalRest(held[3], held[k]) : random.normal());
          found = MOLECULE;
          continue;
        }
        if (event === FACES) {
          const toLow = timeTo(low - x, ux, acceleration, false);
          const toHigh = timeTo(high - x, ux, acceleration, true);
          if (toLow < held[0] || toHigh < held[0]) {
            const isLow = toLow < toHigh;
            const dt = isLow ? toLow : toHigh;
            const ux1 = ux + acceleration * dt;
            held[0] = dt;
            held[1] = (isLow ? low : high) - x;
            held[2] = ux1;
            held[3] = ux1 * ux1 + uy * uy + uz * uz;
            held[4] = isLow ? LOW_FACE : HIGH_FACE;
          }
          found = FACES;
          continue;
        }
        if (event === LOW_FACE || event === HIGH_FACE) {
          tally.time[cell] += weight * sumTime;
          tally.way[cell] += weight * sumWay;
          tally.energy[cell] += weight * sumEnergy;
          sumTime = 0;
          sumWay = 0;
          sumEnergy = 0;
          if (event === LOW_FACE) {
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
            gone = random.uniform() * wanted[cell] >= weight;
            weight = wanted[cell];
          }
          continue;
        }
        const p = held[1];
        const before = energy;
        if (event === TURN) {
          const speed = Math.sqrt(p === 0 ? held[0] : Math.max(0, held[0] - thresholds[p] / share));
          const gx = velocity[0];
          const gy = velocity[1];
          const gz = velocity[2];
          screenedDirection(velocity, random);
          ux += share * (speed * velocity[0] - gx);
          uy += share * (speed * velocity[1] - gy);
          uz += share * (speed * velocity[2] - gz);
          energy = ux * ux + uy * uy + uz * uz;
          if (p === 0) elasticLoss += weight * (before - energy);
          else inelasticLoss += weight * (before - energy);
        } else if (event === CHANGE && kinds[p] === IONISATION) {
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
          this.#ionise(electrons, born, thresholds[p], velocity);
          ux = velocity[0];
          uy = velocity[1];
          uz = velocity[2];
          energy = ux * ux + uy * uy + uz * uz;
          inelasticLoss += weight * (before - Math.max(0, held[0] - thresholds[p]));
          if (thinned && weight < 0.5 * wanted[cell]) {
            tally.time[cell] += weight * sumTime;
            tally.way[cell] += weight * sumWay;
            tally.energy[cell] += weight * sumEnergy;
            sumTime = 0;
            sumWay = 0;
            sumEnergy = 0;
            weights[born] = random.uniform() * wanted[cell] < weight ? wanted[cell] : 0;
            gone = random.uniform() * wanted[cell] >= weight;
            weight = wanted[cell];
          }
        } else if (event === CHANGE) {
          inelasticLoss += weight * before;
          gone = true;
        }
        if (!gone && thinned && energy < slowBelow[cell]) {
          tally.slow[cell] += weight;
          gone = true;
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
