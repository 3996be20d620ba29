import { Random } from '../numerics/random.ts';
import { type CollisionTable, collisionTable } from './collision-table.ts';
import { type CrossSectionSet, ELECTRON_MASS, SPEED_OF_1_EV } from './cross-sections.ts';
import { Electrons } from './electrons.ts';
import { clearTally, Flights, uniformForce } from './flights.ts';
import type { Angular } from './scattering.ts';
import { jackknife, type Measured } from './statistics.ts';

/** Electrons in a uniform field, as particles, without walls: how fast they drift and spread, what they ionise.
 *
 *  A point is computed in batches that know nothing of each other, each with its own stream of random numbers, and gives the same whichever thread
 *  computes which batch. A batch lets electrons settle, then follows pulses of them (windows) for bulk values and time averages for flux values, and
 *  then, where electrons are made or lost, a steady stream for Townsend's coefficients. */

/** [1/m³]: results are per density, so any would do; about that of 1 Torr */
const DENSITY = 3.2e22;
/** streams of random numbers, told apart by what they are for */
const PILOT_STREAM = 1;
const BATCH_STREAM = 2;

export interface SwarmGas {
  readonly table: CollisionTable;
}

/** @param temperature  of the gas [K] */
export function swarmGas(set: CrossSectionSet, temperature: number, angular: Angular): SwarmGas {
  return { table: collisionTable(set, { density: DENSITY, temperature }, angular) };
}

/** How the batches of a point are run, found by a pilot. Times in s. */
export interface SwarmPlan {
  readonly kind: 'plan';
  /** in which the energy of the electrons is turned over: mean energy over the power they take, recoil included */
  readonly turnover: number;
  /** [eV] where batches start */
  readonly energy: number;
  /** α − η for the start of the steady stream [1/m] */
  readonly growth: number;
  readonly electrons: number;
  readonly windows: number;
  /** longest time without a look at how many there are */
  readonly slice: number;
  /** whether electrons are made or lost often enough for a pilot to see it */
  readonly changes: boolean;
}

/** Why there is no plan: electrons take up more than they lose, or would take too long to settle. */
export interface NoPlan {
  readonly kind: 'runaway' | 'too-slow';
}

/** Electrons of a pilot. */
const PILOT = 200;
/** turnovers that electrons have to settle, in the pilot and in a batch that starts near */
const PILOT_TURNOVERS = 15;
const SETTLING = 6;
/** turnovers after which a pulse spreads evenly, and after which it is let go */
const EVEN = 3;
const WINDOW = 6;
/** turnovers of the steady stream: to settle, and to average over */
const STREAM_SETTLING = 4;
const STREAM = 24;
/** electrons of a batch: where they multiply, choosing among a few would favour the quick ones by about one part in their number */
const FEWEST = 400;
const FEWEST_ALONE = 16;
const MOST = 4000;
/** windows that a batch is planned for */
const WINDOWS = 3;
/** [eV] beyond this mean energy nothing is expected to hold electrons back, and the mechanics is no longer right */
const RUNAWAY = 2e4;
const PILOT_FLIGHTS = 3e8;

/** Lets a few electrons settle, to see how long that takes and what a batch costs.
 *  @param reducedField  E/N [V m²], above 0
 *  @param point         number of the point, for its stream of random numbers
 *  @param flights       of a batch, real and null, as far as few electrons allow */
export function pilotOf(gas: SwarmGas, reducedField: number, seed: number, point: number, flights: number): SwarmPlan | NoPlan {
  const { table } = gas;
  const random = new Random(seed, [PILOT_STREAM, point]);
  const engine = new Flights(table, uniformForce(reducedField * DENSITY), random);
  const { tally } = engine;
  const electrons = launch(PILOT, 1, random);
  let time = 0;
  let step = 20 / table.limits.reduce((most, limit) => Math.max(most, limit), 0);
  let all = 0;
  for (;;) {
    clearTally(tally);
    time += step;
    engine.run(electrons, time);
    electrons.removeGone();
    if (electrons.count === 0) return { kind: 'too-slow' };
    if (electrons.count > 2 * PILOT || electrons.count < PILOT / 2) resampleAlike(electrons, PILOT, random);
    all += tally.events[1];
    const energy = tally.energy[0] / tally.time[0];
    const turnover = turnoverOf(engine, reducedField);
    if (energy > RUNAWAY) return { kind: 'runaway' };
    if (time > PILOT_TURNOVERS * turnover && step > 0.2 * turnover) break;
    if (all > PILOT_FLIGHTS) return { kind: 'too-slow' };
    step = Math.min(Math.max(turnover / 4, step / 4), 2 * step);
  }
  // a look at what has settled
  clearTally(tally);
  for (let k = 0; k < 8; k++) {
    time += step;
    engine.run(electrons, time);
    electrons.removeGone();
    if (electrons.count > 2 * PILOT || electrons.count < PILOT / 2) resampleAlike(electrons, PILOT, random);
  }
  const turnover = turnoverOf(engine, reducedField);
  const electronTime = tally.time[0];
  const [made, lost] = madeAndLost(table, tally.counts);
  const rate = (made - lost) / electronTime;
  const changes = made + lost > 0;
  const perTurnover = (tally.events[1] / electronTime) * turnover;
  const settling = SETTLING + (changes ? STREAM_SETTLING + STREAM : 0);
  const affordable = flights / perTurnover / (settling + WINDOWS * WINDOW);
  const count = Math.round(Math.min(MOST, Math.max(changes ? FEWEST : FEWEST_ALONE, affordable)));
  const windows = Math.round(Math.min(64, Math.max(1, (flights / perTurnover / count - settling) / WINDOW)));
  return {
    kind: 'plan',
    turnover,
    energy: tally.energy[0] / electronTime,
    growth: (made - lost) / tally.way[0],
    electrons: count,
    windows,
    slice: Math.min(turnover, 0.4 / Math.max(Math.abs(rate), 1e-300)),
    changes,
  };
}

/** Sums of a batch, for {@link combine}: see the names below. */
export type BatchSums = Float64Array;

/** Places of the sums: time averages, pulses at two times, the steady stream; then collisions by process of the averages and of the stream. */
const TIME = 0;
const WAY = 1;
const ENERGY = 2;
const ELASTIC = 3;
const INELASTIC = 4;
const ABOVE = 5;
const LOOKED = 6;
const EARLY = 7;
const LATE = 11;
const STREAM_TIME = 15;
const STREAM_WAY = 16;
const STREAM_ENERGY = 17;
const COLLISIONS = 18;
const FLIGHTS = 19;
const COUNTS = 20;

/** One batch of a point.
 *  @param batch  its number, for its stream of random numbers
 *  @param interrupted  polled now and then
 *  @returns null when interrupted */
export function batchOf(
  gas: SwarmGas,
  reducedField: number,
  plan: SwarmPlan,
  seed: number,
  point: number,
  batch: number,
  interrupted: () => boolean = () => false,
): BatchSums | null {
  const { table } = gas;
  const { turnover, electrons: count, slice } = plan;
  const processes = table.kinds.length;
  const sums = new Float64Array(COUNTS + 2 * processes);
  const random = new Random(seed, [BATCH_STREAM, point, batch]);
  const engine = new Flights(table, uniformForce(reducedField * DENSITY), random);
  const { tally } = engine;
  const electrons = launch(count, plan.energy, random);
  let time = 0;
  /** Follows all for a while; more than twice as many as wanted, or less than half, become as many as wanted, all alike.
   *  @returns how many electrons each of them stands for, in those at the start */
  const follow = (duration: number): number => {
    const parts = Math.max(1, Math.ceil(duration / slice - 1e-9));
    let stands = 1;
    const start = time;
    for (let k = 1; k <= parts; k++) {
      time = start + (duration * k) / parts;
      engine.run(electrons, time);
      electrons.removeGone();
      if (electrons.count === 0) throw new Error('every electron was attached between two looks');
      if (electrons.count > 2 * count || electrons.count < count / 2) {
        stands *= electrons.count / count;
        resampleAlike(electrons, count, random);
      }
      const { ux, uy, uz } = electrons;
      for (let i = 0; i < electrons.count; i++) {
        if (ux[i] ** 2 + uy[i] ** 2 + uz[i] ** 2 > table.set.range.to) sums[ABOVE]++;
      }
      sums[LOOKED] += electrons.count;
    }
    return stands;
  };

  follow(SETTLING * turnover);
  sums[ABOVE] = 0;
  sums[LOOKED] = 0;
  clearTally(tally);
  for (let window = 0; window < plan.windows; window++) {
    if (interrupted()) return null;
    if (electrons.count !== count) resampleAlike(electrons, count, random);
    for (const places of [electrons.x, electrons.y, electrons.z]) places.fill(0, 0, electrons.count);
    const early = follow(EVEN * turnover);
    addPlaces(electrons, early, sums, EARLY);
    const late = early * follow((WINDOW - EVEN) * turnover);
    addPlaces(electrons, late, sums, LATE);
  }
  sums[TIME] = tally.time[0];
  sums[WAY] = tally.way[0];
  sums[ENERGY] = tally.energy[0];
  sums[ELASTIC] = tally.losses[0];
  sums[INELASTIC] = tally.losses[1];
  sums[COLLISIONS] = tally.events[0];
  sums[FLIGHTS] = tally.events[1];
  sums.set(tally.counts, COUNTS);

  if (plan.changes) {
    if (electrons.count !== count) resampleAlike(electrons, count, random);
    const parts = Math.max(2, Math.ceil(turnover / slice));
    let growth = plan.growth;
    for (let k = -STREAM_SETTLING * parts; k < STREAM * parts; k++) {
      if (k % parts === 0 && interrupted()) return null;
      if (k === 0) clearTally(tally);
      const [time0, way0] = [tally.time[0], tally.way[0]];
      const [made0, lost0] = madeAndLost(table, tally.counts);
      time += turnover / parts;
      electrons.x.fill(0, 0, electrons.count);
      engine.run(electrons, time);
      electrons.removeGone();
      // a stream that grows as e^(αx) and is steady: those ahead stand for a larger share of what comes after them
      for (let i = 0; i < electrons.count; i++) electrons.weight[i] *= Math.exp(-growth * electrons.x[i]);
      resampleAlike(electrons, count, random);
      const [made1, lost1] = madeAndLost(table, tally.counts);
      // while settling, the latest turnovers count; then all
      if (k < 0) {
        const [made, way] = [made1 - lost1 - made0 + lost0, tally.way[0] - way0];
        if (way > 0 && tally.time[0] > time0) growth += Math.min(1, 0.5 / parts) * (made / way - growth);
      } else if (k >= parts) growth = (made1 - lost1) / tally.way[0];
    }
    sums[STREAM_TIME] = tally.time[0];
    sums[STREAM_WAY] = tally.way[0];
    sums[STREAM_ENERGY] = tally.energy[0];
    sums[COLLISIONS] += tally.events[0];
    sums[FLIGHTS] += tally.events[1];
    sums.set(tally.counts, COUNTS + processes);
  }
  return sums;
}

/** What is known of electrons at one reduced field, from all batches. SI; energies in eV. */
export interface SwarmPoint {
  /** E/N [V m²] */
  readonly reducedField: number;
  /** [eV], mean over all electrons of a pulse */
  readonly meanEnergy: Measured;
  /** mean velocity of the electrons [m/s] */
  readonly fluxDrift: Measured;
  /** velocity of their centre of mass [m/s], which ionisation ahead of it pushes on */
  readonly bulkDrift: Measured;
  /** N times the coefficients by which a pulse spreads across and along the field (bulk values) [1/(m s)] */
  readonly transverseDiffusion: Measured;
  readonly longitudinalDiffusion: Measured;
  /** per electron and molecule [m³/s] */
  readonly ionisationRate: Measured;
  readonly attachmentRate: Measured;
  /** made and lost per unit length of a steady stream over the density [m²] */
  readonly ionisation: Measured;
  readonly attachment: Measured;
  /** [eV] and [m/s] in the steady stream; null where it is the same as the pulse */
  readonly streamMeanEnergy: Measured | null;
  readonly streamDrift: Measured | null;
  /** rate of every process [m³/s] */
  readonly rates: readonly { readonly name: string; readonly kind: string; readonly rate: Measured }[];
  /** share of electrons above the energies for which the set is known */
  readonly aboveRange: number;
  /** what collisions took over what the field gave, stored energy in new electrons counted: 1 up to noise */
  readonly energyBalance: Measured;
  readonly batches: number;
  /** real collisions followed, and flights with null ones */
  readonly collisions: number;
  readonly flights: number;
}

/** @param batches  sums of at least two batches of one plan */
export function combine(gas: SwarmGas, reducedField: number, plan: SwarmPlan, batches: readonly BatchSums[]): SwarmPoint {
  const { table } = gas;
  const processes = table.kinds.length;
  const N = DENSITY;
  const measure = (quantity: (s: Float64Array) => number): Measured => jackknife(batches, quantity);
  const countsOf = (s: Float64Array, kind: string, offset: number): number => {
    let sum = 0;
    for (let p = 0; p < processes; p++) if (table.kinds[p] === kind) sum += s[offset + p];
    return sum;
  };
  const between = (WINDOW - EVEN) * plan.turnover;
  const mean = (s: Float64Array, at: number): number => s[at + 1] / s[at];
  const variance = (s: Float64Array, at: number): number => s[at + 2] / s[at] - mean(s, at) ** 2;
  const across = (s: Float64Array, at: number): number => s[at + 3] / s[at];
  // where hardly any are made or lost, a pulse is a steady stream
  const perLength = (kind: string): Measured =>
    plan.changes
      ? measure((s) => countsOf(s, kind, COUNTS + processes) / s[STREAM_WAY] / N)
      : measure((s) => countsOf(s, kind, COUNTS) / s[WAY] / N);
  const sum = (place: number): number => batches.reduce((total, batch) => total + batch[place], 0);
  return {
    reducedField,
    meanEnergy: measure((s) => s[ENERGY] / s[TIME]),
    fluxDrift: measure((s) => s[WAY] / s[TIME]),
    bulkDrift: measure((s) => (mean(s, LATE) - mean(s, EARLY)) / between),
    transverseDiffusion: measure((s) => (N * (across(s, LATE) - across(s, EARLY))) / (4 * between)),
    longitudinalDiffusion: measure((s) => (N * (variance(s, LATE) - variance(s, EARLY))) / (2 * between)),
    ionisationRate: measure((s) => countsOf(s, 'ionisation', COUNTS) / s[TIME] / N),
    attachmentRate: measure((s) => countsOf(s, 'attachment', COUNTS) / s[TIME] / N),
    ionisation: perLength('ionisation'),
    attachment: perLength('attachment'),
    streamMeanEnergy: plan.changes ? measure((s) => s[STREAM_ENERGY] / s[STREAM_TIME]) : null,
    streamDrift: plan.changes ? measure((s) => s[STREAM_WAY] / s[STREAM_TIME]) : null,
    rates: table.names.map((name, p) => ({ name, kind: table.kinds[p], rate: measure((s) => s[COUNTS + p] / s[TIME] / N) })),
    aboveRange: sum(ABOVE) / Math.max(1, sum(LOOKED)),
    energyBalance: measure((s) => {
      // every electron made takes the mean energy with it, every one lost is counted as a loss and takes it away
      const net = countsOf(s, 'ionisation', COUNTS) - countsOf(s, 'attachment', COUNTS);
      const stored = (net * s[ENERGY]) / s[TIME];
      return (s[ELASTIC] + s[INELASTIC] + stored) / (reducedField * N * s[WAY]);
    }),
    batches: batches.length,
    collisions: sum(COLLISIONS),
    flights: sum(FLIGHTS),
  };
}

/** Electrons of one energy [eV] in all directions. */
function launch(count: number, energy: number, random: Random): Electrons {
  const electrons = new Electrons(4 * count);
  const speed = Math.sqrt(energy);
  for (let k = 0; k < count; k++) {
    const i = electrons.add(1);
    const cosine = random.signed();
    const angle = 2 * Math.PI * random.uniform();
    const across = speed * Math.sqrt(1 - cosine * cosine);
    electrons.ux[i] = speed * cosine;
    electrons.uy[i] = across * Math.cos(angle);
    electrons.uz[i] = across * Math.sin(angle);
  }
  return electrons;
}

/** As many electrons as wanted, each standing for one. */
function resampleAlike(electrons: Electrons, wanted: number, random: Random): void {
  electrons.resample(wanted, random.uniform());
  electrons.weight.fill(1, 0, wanted);
}

function addPlaces({ x, y, z, count }: Electrons, weight: number, sums: Float64Array, at: number): void {
  for (let i = 0; i < count; i++) {
    sums[at] += weight;
    sums[at + 1] += weight * x[i];
    sums[at + 2] += weight * x[i] * x[i];
    sums[at + 3] += weight * (y[i] * y[i] + z[i] * z[i]);
  }
}

function madeAndLost({ kinds }: CollisionTable, counts: Float64Array): [made: number, lost: number] {
  let [made, lost] = [0, 0];
  for (const [p, kind] of kinds.entries()) {
    if (kind === 'ionisation') made += counts[p];
    if (kind === 'attachment') lost += counts[p];
  }
  return [made, lost];
}

/** Mean energy over the power that turns it over: what the field gives, and what a gas at rest would take by recoil; at least the time of three losses of
 *  momentum, W/(eE/m) each, so that a pulse has forgotten its velocities too when it is said to spread evenly. That counts only where electrons drift about
 *  as fast as they fly. */
function turnoverOf({ table, tally }: Flights, reducedField: number): number {
  const field = reducedField * DENSITY;
  const power = Math.max(0, (field * tally.way[0]) / tally.energy[0]);
  const recoil = ((2 * ELECTRON_MASS) / table.mass) * (tally.counts[0] / tally.time[0]);
  const momentum = (2 * tally.way[0]) / tally.time[0] / (field * SPEED_OF_1_EV ** 2);
  return Math.max(1 / Math.max(power + recoil, 1e-300), 3 * momentum);
}
