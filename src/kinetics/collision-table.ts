import { BOLTZMANN } from '../units/constants.ts';
import { type CrossSectionSet, ELECTRON_MASS, type ProcessKind, SPEED_OF_1_EV } from './cross-sections.ts';
import { type Angular, screenedMomentumShare, screening } from './scattering.ts';

/** Collision frequencies of a gas against energy, laid out for the inner loop.
 *
 *  Bins of energy, 128 to a factor of two: the upper bits of the energy as a 32-bit float are the number of its bin, without a logarithm. In each bin
 *  every process has a straight line; where a threshold lies in the bin, the line starts there. What the lines add up to is bounded by one number a bin,
 *  and over spans of a few factors of two by one number a span: the bounds of null collisions. */
export interface CollisionTable {
  /** of the processes, elastic scattering first */
  readonly kinds: readonly ProcessKind[];
  readonly names: readonly string[];
  /** [eV] */
  readonly thresholds: Float64Array;
  /** bin by bin, process by process: value at energy 0 and slope of the line [1/s, 1/(s eV)] */
  readonly lines: Float64Array;
  /** by bin: no total is higher [1/s] */
  readonly limits: Float64Array;
  /** number density [1/m³], mass [kg], temperature [K] of the gas */
  readonly density: number;
  readonly mass: number;
  readonly temperature: number;
  readonly angular: Angular;
  readonly set: CrossSectionSet;
}

/** log2 of the energy [eV] where bins start and end; energies outside share the first or last bin */
export const LOWEST = -14;
const HIGHEST = 17;
export const OCTAVES: number = HIGHEST - LOWEST;
export const BINS_PER_OCTAVE = 128;
export const BINS: number = OCTAVES * BINS_PER_OCTAVE;

/** Lower edge of a bin [eV]. */
export function binEdge(bin: number): number {
  const octave = Math.floor(bin / BINS_PER_OCTAVE);
  return 2 ** (LOWEST + octave) * (1 + (bin - octave * BINS_PER_OCTAVE) / BINS_PER_OCTAVE);
}

export interface GasState {
  /** [1/m³] */
  readonly density: number;
  /** [K]; 0: molecules at rest */
  readonly temperature: number;
}

/** Lays out a set of cross-sections.
 *  @throws Error for a set that does not start with its only elastic process, or holds a negative or non-finite value */
export function collisionTable(set: CrossSectionSet, gas: GasState, angular: Angular): CollisionTable {
  const { processes } = set;
  const isElastic = (kind: ProcessKind): boolean => kind === 'elastic' || kind === 'momentum-transfer';
  if (processes.length === 0 || !processes.every(({ kind }, p) => isElastic(kind) === (p === 0)))
    throw new Error(`the set ${set.name} must start with its only elastic process`);
  const count = processes.length;
  const lines = new Float64Array(2 * BINS * count);
  const limits = new Float64Array(BINS);
  for (const [p, process] of processes.entries()) {
    const rate = (energy: number): number => {
      const value = process.crossSection(energy);
      if (!(value >= 0 && value < Number.POSITIVE_INFINITY)) throw new Error(`${set.name}, ${process.name}: ${value} m² at ${energy} eV`);
      // momentum transfer says how much is scattered if the law of scattering is known
      const forward = process.kind === 'momentum-transfer' && angular === 'screened-coulomb';
      return gas.density * value * SPEED_OF_1_EV * Math.sqrt(energy) * (forward ? 1 / screenedMomentumShare(screening(energy)) : 1);
    };
    for (let bin = 0; bin < BINS; bin++) {
      const high = binEdge(bin + 1);
      if (high <= process.threshold) continue;
      const starts = Math.max(binEdge(bin), process.threshold);
      // just above a threshold, so that a step there is kept
      const first = rate(starts * (1 + 1e-9));
      const slope = (rate(high) - first) / (high - starts);
      const at = 2 * (bin * count + p);
      lines[at] = first - slope * starts;
      lines[at + 1] = slope;
    }
  }
  for (let bin = 0; bin < BINS; bin++) {
    const total = (energy: number): number => {
      let sum = 0;
      for (let p = 0; p < count; p++) {
        const at = 2 * (bin * count + p);
        sum += Math.max(0, lines[at] + lines[at + 1] * energy);
      }
      return sum;
    };
    // lines cut at zero bend upwards: no sum of them exceeds the larger of its ends
    limits[bin] = Math.max(total(binEdge(bin)), total(binEdge(bin + 1)));
  }
  return {
    kinds: processes.map(({ kind }) => kind),
    names: processes.map(({ name }) => name),
    thresholds: Float64Array.from(processes, ({ threshold }) => threshold),
    lines,
    limits,
    density: gas.density,
    mass: set.mass,
    temperature: gas.temperature,
    angular,
    set,
  };
}

/** Spans of energy for free flights, eight to a factor of two: an electron that starts in one is followed up to its top with one bound on collisions. A top
 *  near the start means a low bound and few null collisions, but flights that end at the top for nothing: it lies one mean flight's gain above. */
export interface Spans {
  /** [eV], by span */
  readonly top: Float64Array;
  /** energies between which flights may start with this span, so that it need not be looked up again after every one [eV]: a fifth below it, which costs
   *  few null collisions */
  readonly bottom: Float64Array;
  readonly start: Float64Array;
  /** [1/s] and its inverse */
  readonly bound: Float64Array;
  readonly mean: Float64Array;
  /** the lowest span in use: an electron at rest gains less than its top in two flights */
  readonly floor: number;
}

export const SPANS_PER_OCTAVE = 8;
export const SPANS: number = OCTAVES * SPANS_PER_OCTAVE;
const BINS_PER_SPAN = BINS_PER_OCTAVE / SPANS_PER_OCTAVE;

/** @param acceleration  largest one, in units of the speed of 1 eV per second */
export function spansOf(table: CollisionTable, acceleration: number): Spans {
  const [top, bottom, start, bound, mean] = Array.from({ length: 5 }, () => new Float64Array(SPANS)) as [
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  const { limits } = table;
  const highest = limits.reduce((a, b) => Math.max(a, b), 0);
  const edge = (span: number): number => binEdge(span * BINS_PER_SPAN);
  // a molecule that flies towards the electron raises their relative energy
  const spread = thermalSpread(table);
  const relative = (energy: number): number => (Math.sqrt(energy) + 6 * spread) ** 2;
  const most = new Float64Array(SPANS + 1);
  for (let span = 0; span < SPANS; span++) {
    let limit = most[span];
    for (let bin = span * BINS_PER_SPAN; bin < (span + 1) * BINS_PER_SPAN; bin++) limit = Math.max(limit, limits[bin]);
    most[span + 1] = limit;
  }
  /** bound on collisions up to the upper edge of a span; never 0, so that flights end where nothing collides */
  const boundTo = (span: number): number => {
    let last = span;
    while (last < SPANS - 1 && edge(last + 1) < relative(edge(span + 1))) last++;
    return Math.max(most[last + 1], 1e-12 * highest);
  };
  for (let span = 0; span < SPANS; span++) {
    const upper = edge(span + 1);
    let last = span + 1;
    while (last < SPANS && edge(last + 1) < upper + (2 * acceleration * Math.sqrt(upper)) / boundTo(last)) last++;
    top[span] = last >= SPANS - 1 ? Number.POSITIVE_INFINITY : edge(last + 1);
    bottom[span] = 0.8 * edge(span);
    start[span] = upper;
    bound[span] = last >= SPANS - 1 ? Math.max(highest, Number.MIN_VALUE) : boundTo(last);
    mean[span] = 1 / bound[span];
  }
  start[SPANS - 1] = Number.POSITIVE_INFINITY;
  let floor = 0;
  while (floor < SPANS - 1 && ((2 * acceleration * mean[floor]) ** 2 > top[floor] || 4 * spread ** 2 > top[floor])) floor++;
  bottom[floor] = -1;
  return { top, bottom, start, bound, mean, floor };
}

/** Standard deviation of one component of the velocity of molecules, in units of the speed of 1 eV. */
export function thermalSpread({ temperature, mass }: Pick<CollisionTable, 'temperature' | 'mass'>): number {
  return Math.sqrt((BOLTZMANN * temperature) / mass) / SPEED_OF_1_EV;
}

/** Share of the mass of a molecule in that of molecule and electron together. */
export function massShare(mass: number): number {
  return mass / (mass + ELECTRON_MASS);
}
