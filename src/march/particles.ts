import type { Case } from '../case.ts';
import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';
import type { CollisionTable } from '../kinetics/collision-table.ts';
import type { ForceField } from '../kinetics/flights.ts';
import { expectedFlux, GAP_BATCHES, type GapYield, gapYieldOf } from '../kinetics/gap-yield.ts';
import { collisionsOf } from '../kinetics/of-case.ts';
import type { FastElectrons } from '../laws/fast-electrons.ts';
import { yieldAt } from '../surfaces/yield-law.ts';
import { TOWNSEND } from '../units/constants.ts';

/** Which electrons are followed, and how many. */
export interface ParticleSettings {
  readonly table: CollisionTable;
  /** [eV] */
  readonly emissionEnergy: number;
  /** electrons emitted for one answer, at most */
  readonly particles: number;
  readonly seed: number;
  /** γ, for the feedback that says how much an answer matters */
  readonly emission: number;
  /** [s] */
  readonly ionTransit: number;
  /** the gap without space charge, already followed */
  readonly uniform: UniformAnswers;
}

/** What electrons do in the uniform field of a voltage [V] above 0: profiles over equal cells from the cathode, and exponents of the ions made. */
export type UniformAnswers = (voltage: number) => {
  readonly ions: Float64Array;
  readonly slow: Float64Array;
  readonly returned: number;
  /** relative standard error of the ions */
  readonly error: number;
  readonly byVoltage: number;
};

/** What a case says of its particles; null where electrons follow the local field. */
export function particleSettingsOf(settings: Case, ionTransit: number, uniform: UniformAnswers): ParticleSettings | null {
  const { electrons, electrodes } = settings;
  if (electrons === undefined) return null;
  const { emissionEnergy, particles, seed } = electrons;
  const emission = Math.max(...[electrodes.left, electrodes.right].map(({ ionYield }) => yieldAt(ionYield, USUAL_FIELD)));
  return { table: collisionsOf(settings), emissionEnergy, particles, seed, emission, ionTransit, uniform };
}

/** E/N at a cathode [V m²] for a yield that depends on it, where only its size matters */
const USUAL_FIELD = 500 * TOWNSEND;

/** How far the field may have changed since electrons were last followed in it: the largest of the relative changes of the gap voltage, of the field at
 *  the cathode, and of the field anywhere as a share of the voltage, ∫|E − E₀|dx/V. Between two looks the number of ions follows voltage and field by
 *  exponents, which leaves an error of second order: (a²/2) × change² for ions ∝ V^a that truly go otherwise,
 *  1.1 % at worst at a = 5 and 3 %. */
const FRESH = 0.03;
/** the least share of that */
const CLOSEST = 0.3;
/** the same where feedback is far below 1 and ions matter less */
const FRESH_WEAK = 0.1;
const WEAK_FEEDBACK = 0.15;
/** shares of all electrons that one look follows: while the field changes, and where it hardly does over an ion transit: there every further look makes the
 *  answer better, until all have been followed */
const SHARE = 40;
const SHARE_AT_REST = 4;
/** collisions that an electron usually takes with all it makes */
const USUAL_COST = 2000;
/** change in an ion transit, as a share of what calls for a new look, that counts as hardly any */
const AT_REST = 0.5;
/** by how much the field is changed to find the exponents, and after what change of the field they are looked for again */
const TILT = 0.08;
const FRESH_EXPONENTS = 0.2;
/** relative error of an answer carried over to a field that has changed by 1: what the exponents get wrong */
const CARRIED = 1.2;
const STREAM = 2 ** 20;
/** at least so many groups of cells in a gap */
const GROUPS = 100;
/** how far the field may be from uniform for the answers of the gap without space charge to be used, relative */
const UNIFORM = 0.01;

/** Looks at fast electrons as particles, when the field has changed enough to matter, and hands what they do to the equations.
 *
 *  Each look follows a share of all electrons on random numbers of its own. Its answer is joined with the last one, carried over to the new field by the
 *  exponents, both weighted by what is known of their errors: the noise of the new one and the change of the field that the old one was carried over
 *  (R. E. Kalman, J. Basic Eng. 82, 35, 1960; from memory, H). So noise falls in a field that hardly changes, until all electrons have been followed in it
 *  and looks end: then the source is a smooth function and a steady state can be reached. */
export class Particles {
  readonly #settings: ParticleSettings;
  readonly #fast: FastElectrons;
  readonly #grid: Grid;
  readonly #layout: Layout;
  /** the voltage above which an electron can ionise at all [V] */
  readonly #least: number;
  /** electrons are followed in cells of several of the grid's, which crowd at the walls: the first of each, and the number of cells */
  readonly #groups: Int32Array;
  /** of the last look, along +x */
  readonly #field: Float64Array;
  #voltage = 0;
  #time = 0;
  #exponentsField: Float64Array | null = null;
  #exponentsVoltage = 0;
  #looked = false;
  #left = true;
  #ions: Float64Array;
  #slow: Float64Array;
  #returned = 0;
  #variance = Number.POSITIVE_INFINITY;
  #followed = 0;
  #byVoltage = 0;
  #byField = 0;
  /** collisions for each electron of the last look */
  #cost = 0;
  #expected: Float64Array | null = null;
  /** looks taken */
  looks = 0;

  constructor(settings: ParticleSettings, fast: FastElectrons, grid: Grid, layout: Layout) {
    this.#settings = settings;
    this.#fast = fast;
    this.#grid = grid;
    this.#layout = layout;
    const { kinds, thresholds } = settings.table;
    const ionising = thresholds.filter((_, p) => kinds[p] === 'ionisation');
    this.#least = Math.max(
      0,
      ionising.reduce((least, energy) => Math.min(least, energy), Number.POSITIVE_INFINITY) - settings.emissionEnergy,
    );
    this.#field = new Float64Array(grid.cells + 1);
    this.#groups = groupsOf(grid);
    this.#ions = new Float64Array(grid.cells);
    this.#slow = new Float64Array(grid.cells);
  }

  /** Relative standard error of the ions made, as far as noise and what was carried over go. */
  get error(): number {
    return Math.sqrt(this.#variance);
  }

  /** Looks again at the electrons of a state at time t [s] if that is due. @returns whether the source has changed */
  look(t: number, y: Float64Array): boolean {
    const change = this.change(y);
    const atRest = this.#improves(t, change);
    if (change <= this.#limit() && !atRest) return false;
    this.#look(y, change, atRest);
    this.#time = t;
    return true;
  }

  /** How far the field of a state is from that of the last look, in units of what is allowed: above 1 a step went too far. */
  overreach(y: Float64Array): number {
    return this.change(y) / (1.5 * this.#limit());
  }

  /** See {@link FRESH}. */
  change(y: Float64Array): number {
    if (!this.#looked) return Number.POSITIVE_INFINITY;
    const { field, cells, voltage } = this.#layout;
    const { faceWeights } = this.#grid;
    // below the voltage that ionises at all nothing happens
    if (!this.#canIonise(this.#voltage)) return Math.max(0, Math.abs(y[voltage]) / this.#least - 1);
    if (leftIsCathode(y, this.#layout) !== this.#left) return Number.POSITIVE_INFINITY;
    const V = Math.max(Math.abs(this.#voltage), this.#least);
    let moved = 0;
    for (let f = 0; f <= cells; f++) moved += Math.abs(y[field + f] - this.#field[f]) * faceWeights[f];
    const wall = this.#left ? 0 : cells;
    const cathode = Math.max(Math.abs(this.#field[wall]), (0.2 * V) / this.#grid.spacing);
    const atCathode = Math.abs(y[field + wall] - this.#field[wall]) / cathode;
    return Math.max(moved / V, atCathode, Math.abs(y[voltage] - this.#voltage) / V);
  }

  #limit(): number {
    if (this.#settings.emission * total(this.#ions) < WEAK_FEEDBACK) return FRESH_WEAK;
    // a jump of the source is a jump of the current: where electrons take few collisions, looks may be closer together
    return this.#cost === 0 ? FRESH : FRESH * Math.min(1, Math.max(CLOSEST, this.#cost / USUAL_COST));
  }

  /** Whether another look in nearly the same field makes the answer better. */
  #improves(t: number, change: number): boolean {
    if (!this.#looked || !this.#canIonise(this.#voltage)) return false;
    if (change * this.#settings.ionTransit > AT_REST * this.#limit() * (t - this.#time) || change > this.#limit()) return false;
    return this.#followed < this.#settings.particles && this.#settings.emission * total(this.#ions) >= WEAK_FEEDBACK;
  }

  #canIonise(voltage: number): boolean {
    return Math.abs(voltage) > this.#least;
  }

  #look(y: Float64Array, change: number, atRest: boolean): void {
    const { layout, grid } = { layout: this.#layout, grid: this.#grid };
    const { cells, field, voltage } = layout;
    const V = y[voltage];
    const left = leftIsCathode(y, layout);
    const wall = left ? field : field + cells;
    if (!this.#canIonise(V)) {
      this.#ions.fill(0);
      this.#slow.fill(0);
      this.#slow[left ? 0 : cells - 1] = 1;
      this.#returned = 0;
      this.#variance = Number.POSITIVE_INFINITY;
      this.#followed = 0;
      this.#byVoltage = 0;
      this.#byField = 0;
    } else if (isUniform(y, layout, grid)) this.#takeUniform(Math.abs(V), left);
    else {
      const force = forceOf(grid, layout, y, left, this.#groups);
      if (this.#exponentsAreOld(y)) this.#findExponents(force, y, change);
      const count = this.#count(atRest);
      const found = this.#follow(force, count, STREAM + this.looks);
      const share = this.#shareOfNew(found, change);
      const carried = this.#looked && this.#left === left ? this.#fast.growth(Math.abs(V), Math.abs(y[wall])) : 0;
      const [ions, slow] = [found.ions, found.slow].map((counts) => onGrid(mirrored(smoothed(counts), left), this.#groups, grid));
      for (let i = 0; i < cells; i++) {
        this.#ions[i] = share * ions[i] + (1 - share) * carried * this.#ions[i];
        this.#slow[i] = share * slow[i] + (1 - share) * this.#slow[i];
      }
      this.#returned = share * found.returned.value + (1 - share) * this.#returned;
      this.#followed = atRest ? this.#followed + count : count;
      this.looks++;
    }
    this.#looked = true;
    this.#left = left;
    this.#voltage = V;
    for (let f = 0; f <= cells; f++) this.#field[f] = y[field + f];
    this.#fast.set({
      cathodeIsLeft: left,
      ions: this.#ions,
      slow: balanced(this.#slow, 1 - this.#returned + total(this.#ions)),
      returned: this.#returned,
      voltage: Math.abs(V),
      cathodeField: Math.abs(y[wall]),
      byVoltage: this.#byVoltage,
      byField: this.#byField,
    });
  }

  /** Without space charge the answer is known beforehand. */
  #takeUniform(voltage: number, left: boolean): void {
    const answer = this.#settings.uniform(voltage);
    this.#ions.set(mirrored(spread(answer.ions, this.#grid, left), left));
    this.#slow.set(mirrored(spread(answer.slow, this.#grid, left), left));
    this.#returned = answer.returned;
    this.#variance = answer.error ** 2;
    this.#byVoltage = answer.byVoltage;
    this.#byField = 0;
    this.#followed = this.#settings.particles;
  }

  /** Weight of a new answer against the old one carried over, and the error of both together. */
  #shareOfNew(found: GapYield, change: number): number {
    const { value, error } = found.ionsPerElectron;
    const noise = value > 0 ? (error / value) ** 2 : 1;
    const old = Number.isFinite(change) ? this.#variance + (CARRIED * change) ** 2 : Number.POSITIVE_INFINITY;
    if (!Number.isFinite(old)) {
      this.#variance = noise;
      return 1;
    }
    const share = old / (old + noise);
    this.#variance = share * noise;
    return share;
  }

  /** How many electrons a look follows: a share of all, and more where each takes few collisions. */
  #count(atRest: boolean): number {
    const { particles } = this.#settings;
    const share = particles / (atRest ? SHARE_AT_REST : SHARE);
    const affordable = this.#cost > 0 ? (0.5 * share * USUAL_COST) / this.#cost : share;
    return Math.ceil(Math.max(GAP_BATCHES, share, Math.min(affordable, particles / 2)));
  }

  #follow(force: ForceField, particles: number, stream: number): GapYield {
    const { table, emissionEnergy, seed } = this.#settings;
    const request = { table, field: force, emissionEnergy, particles, seed, stream };
    const expected = this.#expected ?? expectedFlux(request);
    const found = gapYieldOf({ ...request, expected });
    if (found === null) throw new Error('interrupted');
    this.#expected = found.flux;
    this.#cost = found.collisions / particles;
    return found;
  }

  #exponentsAreOld(y: Float64Array): boolean {
    if (this.#exponentsField === null) return true;
    const { field, cells, voltage } = this.#layout;
    let moved = 0;
    for (let f = 0; f <= cells; f++) moved += Math.abs(y[field + f] - this.#exponentsField[f]) * this.#grid.faceWeights[f];
    return moved > FRESH_EXPONENTS * this.#exponentsVoltage || Math.abs(y[voltage]) < (1 - FRESH_EXPONENTS) * this.#exponentsVoltage;
  }

  /** How the ions change with the voltage at the same shape of the field, and with the field at the cathode at the same voltage: by particles on the same
   *  random numbers in fields changed a little up and down. */
  #findExponents(force: ForceField, y: Float64Array, change: number): void {
    const { field, cells, voltage } = this.#layout;
    const ahead = shareOfVoltageBefore(force);
    const count = Math.max(GAP_BATCHES, Math.ceil((0.5 * this.#settings.particles) / SHARE));
    const ionsIn = (factor: (cell: number) => number): number => {
      const changed = { faces: force.faces, force: force.force.map((value, cell) => value * factor(cell)) };
      return this.#follow(changed, count, 0).ionsPerElectron.value;
    };
    const slope = (up: number, down: number): number => (up > 0 && down > 0 ? Math.log(up / down) / (2 * TILT) : 0);
    const byBoth = slope(
      ionsIn(() => 1 + TILT),
      ionsIn(() => 1 - TILT),
    );
    const byField = slope(
      ionsIn((cell) => 1 + TILT * (1 - 2 * ahead[cell])),
      ionsIn((cell) => 1 - TILT * (1 - 2 * ahead[cell])),
    );
    const weight = Number.isFinite(change) && this.#exponentsField !== null ? 0.6 : 1;
    this.#byField = weight * byField + (1 - weight) * this.#byField;
    this.#byVoltage = weight * (byBoth - byField) + (1 - weight) * this.#byVoltage;
    this.#exponentsField = y.slice(field, field + cells + 1);
    this.#exponentsVoltage = Math.abs(y[voltage]);
  }
}

/** The wall that draws electrons off; with both or none, the one that the voltage makes the cathode. */
function leftIsCathode(y: Float64Array, { field, cells, voltage }: Layout): boolean {
  const [left, right] = [y[field] < 0, y[field + cells] > 0];
  return left === right ? y[voltage] >= 0 : left;
}

/** Whether space charge has hardly changed the field anywhere. */
function isUniform(y: Float64Array, { field, cells, voltage }: Layout, { spacing }: Grid): boolean {
  const mean = -y[voltage] / spacing;
  for (let f = 0; f <= cells; f++) if (Math.abs(y[field + f] - mean) > UNIFORM * Math.abs(mean)) return false;
  return true;
}

/** What lies in equal cells, over the cells of a grid, both counted from the cathode. */
function spread(values: Float64Array, { faces, spacing, cells }: Grid, left: boolean): Float64Array {
  const face = (f: number): number => (left ? faces[f] : spacing - faces[cells - f]) / spacing;
  const sums = new Float64Array(values.length + 1);
  for (let i = 0; i < values.length; i++) sums[i + 1] = sums[i] + values[i];
  const upTo = (share: number): number => {
    const at = Math.min(values.length, Math.max(0, share * values.length));
    const i = Math.min(values.length - 1, Math.floor(at));
    return sums[i] + (at - i) * values[i];
  };
  return Float64Array.from({ length: cells }, (_, i) => upTo(face(i + 1)) - upTo(face(i)));
}

/** Neighbouring cells taken together until they are a small part of the gap. */
function groupsOf({ widths, cells, spacing }: Grid): Int32Array {
  const starts = [0];
  let width = 0;
  for (let i = 0; i < cells; i++) {
    width += widths[i];
    if (width >= spacing / GROUPS && i + 1 < cells) {
      starts.push(i + 1);
      width = 0;
    }
  }
  return Int32Array.from([...starts, cells]);
}

/** What is made in groups of cells, in the cells themselves. */
function onGrid(values: Float64Array, groups: Int32Array, { faces, widths, cells }: Grid): Float64Array {
  const out = new Float64Array(cells);
  for (let g = 0; g < values.length; g++) {
    const width = faces[groups[g + 1]] - faces[groups[g]];
    for (let i = groups[g]; i < groups[g + 1]; i++) out[i] = (values[g] * widths[i]) / width;
  }
  return out;
}

/** The force on electrons in groups of cells, counted from the cathode. */
function forceOf(grid: Grid, { field, cells }: Layout, y: Float64Array, left: boolean, groups: Int32Array): ForceField {
  const { widths, spacing } = grid;
  const count = groups.length - 1;
  const faces = Float64Array.from(groups, (f) => (f === cells ? spacing : grid.faces[f]));
  const force = Float64Array.from({ length: count }, (_, g) => {
    let drop = 0;
    for (let i = groups[g]; i < groups[g + 1]; i++) drop -= 0.5 * (y[field + i] + y[field + i + 1]) * widths[i];
    return drop / (faces[g + 1] - faces[g]);
  });
  if (left) return { faces, force };
  return {
    faces: faces.map((_, f) => spacing - faces[count - f]),
    force: force.map((_, g) => -force[count - 1 - g]),
  };
}

/** Share of the voltage that lies between the cathode and the middle of each cell. */
function shareOfVoltageBefore({ faces, force }: ForceField): Float64Array {
  const drops = force.map((value, i) => value * (faces[i + 1] - faces[i]));
  const all = total(drops);
  let sum = 0;
  return drops.map((drop) => {
    sum += drop;
    return (sum - drop / 2) / all;
  });
}

/** Counts in cells with the noise from one cell to the next taken out; their sum stays. */
function smoothed(values: Float64Array): Float64Array {
  let before = values;
  for (let pass = 0; pass < 2; pass++) {
    const last = before.length - 1;
    const at = before;
    before = at.map((value, i) => 0.5 * value + 0.25 * (at[Math.max(0, i - 1)] + at[Math.min(last, i + 1)]));
  }
  return before;
}

function mirrored(values: Float64Array, left: boolean): Float64Array {
  return left ? values : values.slice().reverse();
}

/** Slow electrons, brought down where by noise there are more than electrons at all. */
function balanced(slow: Float64Array, electrons: number): Float64Array {
  const sum = total(slow);
  return sum > electrons ? slow.map((n) => (n * electrons) / sum) : slow;
}

function total(values: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i];
  return sum;
}
