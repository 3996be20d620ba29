import { rootBetween } from '../numerics/roots.ts';
import type { CollisionTable } from './collision-table.ts';
import { expectedFlux, GAP_BATCHES, type GapYield, gapYieldOf, uniformGap } from './gap-yield.ts';
import type { Measured } from './statistics.ts';

/** A planar gap without space charge, whatever its voltage, and the electrons at its cathode. */
export interface NodeGap {
  readonly table: CollisionTable;
  /** [m] */
  readonly distance: number;
  /** [eV] */
  readonly emissionEnergy: number;
  readonly seed: number;
}

/** The same with what its answers need. */
export interface ResponseGap extends NodeGap {
  /** electrons emitted for one answer, at most */
  readonly particles: number;
  /** ions per electron as a closed form has them at a voltage [V], above 0 where not 0: what is measured is the ratio to it */
  readonly reference: (voltage: number) => number;
  /** voltages [V] between which the answer matters most: elsewhere fewer electrons are followed */
  readonly attention: { readonly from: number; readonly to: number };
}

/** What the gap does with an electron at one voltage. */
export interface GapAnswer {
  /** ions made per electron emitted */
  readonly ionsPerElectron: Measured;
  /** of electrons emitted and made, those that fell back on the cathode, per electron emitted */
  readonly returned: Measured;
}

/** Measured at one voltage. */
interface Node {
  readonly logVoltage: number;
  /** ln of ions per electron over the reference, and its standard error; null where no ion was made */
  readonly logRatio: Measured | null;
  readonly returned: Measured;
  readonly found: GapYield;
}

/** Voltages at which electrons are followed: ln V in steps of this. */
const STRIDE = 0.05;
/** half the width of the window of ln V over which a straight line is fitted: what bends the ratio of particles to closed form is felt over more than that */
const WINDOW = 0.175;
/** electrons followed at one voltage are all over this: some seven voltages lie in a window, and those at its ends count little */
const IN_WINDOW = 5;
/** ions per electron too few to matter to any discharge */
const NO_IONS = 1e-6;
const CELLS = 40;
/** by how much fewer electrons are followed where the answer matters less */
const ELSEWHERE = 20;

/** Ions per electron and electrons that fall back against the voltage of a gap, as smooth functions: electrons are followed at some voltages, when first
 *  needed, and a straight line through the ratio of particles to the closed form over ln V, weighted by a smooth window (W. S. Cleveland, J. Am. Stat. Assoc.
 *  74, 829, 1979; from memory, H), joins several of them, so that noise of one voltage is shared by its neighbours. All voltages use the same electrons at
 *  the cathode and the same random numbers. */
export class GapResponse {
  readonly gap: ResponseGap;
  readonly #nodes = new Map<number, Node>();
  readonly #answers = new Map<number, GapAnswer>();

  constructor(gap: ResponseGap) {
    this.gap = gap;
  }

  /** Numbers of the voltages that {@link at} needs at a voltage [V]; they can be handed to {@link measure} in any order. */
  static nodesFor(voltage: number): number[] {
    const centre = Math.log(voltage) / STRIDE;
    const reach = WINDOW / STRIDE;
    const nodes: number[] = [];
    for (let k = Math.ceil(centre - reach); k <= centre + reach; k++) nodes.push(k);
    return nodes;
  }

  /** Electrons followed at the voltage of a number. */
  share(node: number): number {
    const { particles, attention } = this.gap;
    const voltage = Math.exp(node * STRIDE);
    const matters = voltage >= attention.from && voltage <= attention.to;
    return Math.max(GAP_BATCHES, Math.ceil(particles / IN_WINDOW / (matters ? 1 : ELSEWHERE)));
  }

  /** The answer at a voltage [V] ≥ 0. */
  at(voltage: number): GapAnswer {
    if (!(voltage > 0)) return NOTHING;
    const known = this.#answers.get(voltage);
    if (known !== undefined) return known;
    const answer = this.#fit(voltage);
    if (this.#answers.size > 4096) this.#answers.clear();
    this.#answers.set(voltage, answer);
    return answer;
  }

  /** Ions per electron alone. */
  ionsAt(voltage: number): number {
    return this.at(voltage).ionsPerElectron.value;
  }

  /** What was found at the voltage of those followed that is next to one [V] above 0. */
  nearest(voltage: number): { readonly voltage: number; readonly found: GapYield } {
    const { logVoltage, found } = this.#node(Math.round(Math.log(voltage) / STRIDE));
    return { voltage: Math.exp(logVoltage), found };
  }

  /** Whether electrons have been followed at the voltage of a number. */
  has(node: number): boolean {
    return this.#nodes.has(node);
  }

  /** Takes over what was found at a voltage elsewhere. */
  adopt(node: number, found: GapYield): void {
    const logVoltage = node * STRIDE;
    const { value, error } = found.ionsPerElectron;
    const logRatio = value > 0 ? { value: Math.log(value / this.#reference(Math.exp(logVoltage))), error: error / value } : null;
    this.#nodes.set(node, { logVoltage, logRatio, returned: found.returned, found });
  }

  #node(k: number): Node {
    if (!this.#nodes.has(k)) this.adopt(k, measureNode(this.gap, this.share(k), k));
    const node = this.#nodes.get(k);
    if (node === undefined) throw new Error(`no answer at voltage ${k}`);
    return node;
  }

  #reference(voltage: number): number {
    return Math.max(NO_IONS, this.gap.reference(voltage));
  }

  #fit(voltage: number): GapAnswer {
    const logVoltage = Math.log(voltage);
    const nodes = GapResponse.nodesFor(voltage).map((k) => this.#node(k));
    const weights = nodes.map((node) => (1 - Math.abs((node.logVoltage - logVoltage) / WINDOW) ** 3) ** 3);
    const returned = lineAt(
      nodes.map(({ logVoltage: u, returned: r }) => [u - logVoltage, r.value, r.error] as const),
      weights,
    );
    const made = nodes.flatMap(({ logVoltage: u, logRatio }) =>
      logRatio === null ? [] : [[u - logVoltage, logRatio.value, logRatio.error] as const],
    );
    if (made.length < nodes.length) return { ionsPerElectron: { value: 0, error: 0 }, returned };
    const ratio = lineAt(made, weights);
    const value = Math.exp(ratio.value) * this.#reference(voltage);
    return { ionsPerElectron: { value, error: value * ratio.error }, returned };
  }
}

const NOTHING: GapAnswer = { ionsPerElectron: { value: 0, error: 0 }, returned: { value: 1, error: 0 } };

/** Follows electrons at the voltage of one number. */
export function measureNode({ table, distance, emissionEnergy, seed }: NodeGap, particles: number, node: number): GapYield {
  const request = { table, field: uniformGap(Math.exp(node * STRIDE), distance, CELLS), emissionEnergy, particles, seed };
  const found = gapYieldOf({ ...request, expected: expectedFlux(request) });
  if (found === null) throw new Error('interrupted');
  return found;
}

/** A straight line through points (u, value, error) at u = 0, by weights that go smoothly to 0 at the ends of a window. Errors say nothing of how points
 *  should be weighted against each other, which all have as many electrons; they only give that of the answer. */
function lineAt(points: readonly (readonly [number, number, number])[], weights: readonly number[]): Measured {
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  points.forEach(([u], i) => {
    s0 += weights[i];
    s1 += weights[i] * u;
    s2 += weights[i] * u * u;
  });
  const determinant = s0 * s2 - s1 * s1;
  let value = 0;
  let variance = 0;
  points.forEach(([u, y, error], i) => {
    const share = determinant > 0 ? (weights[i] * (s2 - s1 * u)) / determinant : weights[i] / s0;
    value += share * y;
    variance += (share * error) ** 2;
  });
  return { value, error: Math.sqrt(variance) };
}

/** Where a feedback passes 1, as few electrons say. */
export interface Passing {
  /** [V] */
  readonly guess: number;
  readonly rising: boolean;
}

/** Looks upwards in coarse steps, by few electrons, for the lowest voltage at which feedback reaches 1, then for the next at which it falls below again.
 *  @param emission  electrons per ion at a voltage [V]
 *  @param from      where to begin [V]
 *  @param to        where to end [V]
 *  @param upperFrom  voltage from which on it is worth looking whether feedback falls again [V] */
export function coarseThreshold(
  gap: NodeGap,
  emission: (voltage: number) => number,
  from: number,
  to: number,
  upperFrom: number,
): { readonly rise: Passing | null; readonly fall: Passing | null } {
  const { table, distance, emissionEnergy, seed } = gap;
  const logFeedback = (voltage: number): number => {
    const field = uniformGap(voltage, distance, CELLS);
    const by = (particles: number): { readonly log: number; readonly cost: number } => {
      const found = gapYieldOf({ table, field, emissionEnergy, particles, seed });
      const q = emission(voltage) * (found?.ionsPerElectron.value ?? 0);
      return { log: Math.log(Math.max(NO_IONS, q)), cost: (found?.collisions ?? 0) / particles };
    };
    const rough = by(ROUGH);
    return Math.abs(rough.log) < DOUBTFUL || rough.cost < CHEAP ? by(MORE).log : rough.log;
  };
  let rise: Passing | null = null;
  let [before, logBefore] = [from, Number.NaN];
  for (let voltage = from; voltage <= to; voltage *= COARSE) {
    const log = logFeedback(voltage);
    const passes = rise === null ? log >= 0 : log < 0;
    if (passes) {
      // along a straight line of ln q over ln V
      const share = Number.isNaN(logBefore) ? 1 : logBefore / (logBefore - log);
      const passing: Passing = { guess: before * (voltage / before) ** share, rising: rise === null };
      if (rise !== null) return { rise, fall: passing };
      rise = passing;
    }
    if (rise !== null && voltage < upperFrom) return { rise, fall: null };
    [before, logBefore] = [voltage, log];
  }
  return { rise, fall: null };
}

/** Where a smooth feedback passes 1, near where few electrons found it [V]; null where it does not. */
export function passes(feedback: (voltage: number) => number, passing: Passing | null): number | null {
  if (passing === null) return null;
  const sign = passing.rising ? 1 : -1;
  const excess = (logVoltage: number): number => {
    const q = feedback(Math.exp(logVoltage));
    return (sign * (q - 1)) / (q + 1);
  };
  const guess = Math.log(passing.guess);
  let [low, high] = [guess - NEAR, guess + NEAR];
  // the few may have misled further than that
  for (let k = 0; k < WIDENINGS && excess(low) > 0; k++) low -= NEAR;
  for (let k = 0; k < WIDENINGS && excess(high) < 0; k++) high += NEAR;
  return excess(low) > 0 || excess(high) < 0 ? null : Math.exp(rootBetween(excess, low, high));
}

/** how far around a guess a threshold is looked for, in ln V, and how often further */
export const NEAR = 0.03;
const WIDENINGS = 8;
/** steps of the coarse search, and electrons at each */
const COARSE = 1.2;
const ROUGH = 64;
/** |ln q| below which that is too few to say on which side of 1 it is, and collisions of an electron below which more cost next to nothing; and then */
const DOUBTFUL = 0.4;
const CHEAP = 300;
const MORE = 1024;
