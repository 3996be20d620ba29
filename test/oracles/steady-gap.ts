/** Oracle: the steady discharge of a planar gap, with space charge and diffusion.
 *
 *  Contains: V, cathode field and profiles for a given current, a given voltage or a load line, and a V(j) curve, as a boundary value
 *  problem in x solved by fourth-order collocation with continuation in the current:
 *      Γ_e = μ_e n_e E − D_e n_e′,   Γ_p = μ_p n_p E + D_p n_p′,   Γ_e′ = α(|E|) |Γ_e|,   Γ_e + Γ_p = J/e,
 *      E′ = −(e/ε0)(n_p − n_e),
 *  x from the cathode (0) to the anode (d), E > 0 where it drives electrons to the anode, Γ_p towards the cathode. Walls:
 *      Γ_e(0) = γ Γ_p(0) + seed,   n_p′(0) = 0,   n_e′(d) = 0,   Γ_p(d) = 0.
 *  An energy D/μ of 0 removes that diffusion exactly (the density is then Γ/(μE)), with the condition that goes with it.
 *  Does not contain: attachment, recombination, time; whether the state is stable.
 *  Every state is refined by halving the mesh until V and the cathode field stop moving; `error` is what the last halving moved. */

import {
  adaptedMesh,
  type BoundaryProblem,
  type Condition,
  halved,
  type MeshFunction,
  midpoint,
  solveOnMesh,
  transfer,
} from './collocation.ts';
import { ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY } from './open-case.ts';

type OfField = number | ((field: number) => number);

export interface SteadyGap {
  /** [m], [m²] */
  readonly spacing: number;
  readonly area: number;
  /** α [1/m] of |E| [V/m] */
  readonly alpha: (field: number) => number;
  readonly ionYield: number;
  /** μ [m²/(V s)], a number or a function of |E| [V/m] */
  readonly electronMobility: OfField;
  readonly ionMobility: OfField;
  /** D/μ [V]; 0 switches that diffusion off */
  readonly electronEnergy: OfField;
  readonly ionEnergy: OfField;
  /** [A] */
  readonly seedCurrent: number;
}

export interface SteadyState {
  /** [V], [A], [V/m] */
  readonly voltage: number;
  readonly current: number;
  readonly cathodeField: number;
  /** largest relative change of V and of the cathode field when the mesh was last halved */
  readonly error: number;
  /** profiles at the nodes: position [m], field [V/m], flux of electrons [1/(m² s)], densities [1/m³] */
  readonly x: Float64Array;
  readonly field: Float64Array;
  readonly electronFlux: Float64Array;
  readonly electronDensity: Float64Array;
  readonly ionDensity: Float64Array;
}

export interface SteadyOptions {
  /** relative accuracy asked of V and of the cathode field, default 1e-6 */
  readonly accuracy?: number;
}

/** The state that carries `current` [A]. */
export function steadyAtCurrent(gap: SteadyGap, current: number, options: SteadyOptions = {}): SteadyState {
  const branch = new Branch(gap);
  branch.goTo(current);
  return branch.refined(options.accuracy ?? 1e-6);
}

/** V(j): one state for each current, in the order given; rising or falling order is cheapest. */
export function voltageCurrentCurve(gap: SteadyGap, currents: readonly number[], options: SteadyOptions = {}): SteadyState[] {
  const branch = new Branch(gap);
  return currents.map((current) => {
    branch.goTo(current);
    return branch.refined(options.accuracy ?? 1e-6);
  });
}

/** The state where V + R I = V_supply with the largest current: the one a glow settles in.
 *  @param load  supply voltage [V] and series resistance [ohm, > 0] */
export function steadyOnLoadLine(
  gap: SteadyGap,
  load: { readonly supplyVoltage: number; readonly resistance: number },
  options: SteadyOptions = {},
): SteadyState {
  const accuracy = options.accuracy ?? 1e-6;
  const branch = new Branch(gap);
  const excess = (current: number): number => {
    branch.goTo(current);
    return branch.refined(accuracy).voltage + load.resistance * current - load.supplyVoltage;
  };
  // a gap voltage of zero would take all of the supply, so the root lies below this current
  let high = load.supplyVoltage / load.resistance;
  let atHigh = excess(high);
  for (;;) {
    const low = high / 1.2;
    if (low < 1e-16) throw new Error('steady gap: no state on this load line');
    const atLow = excess(low);
    if (atLow <= 0) {
      closeIn(excess, [low, atLow], [high, atHigh], 1e-8 * load.supplyVoltage);
      return branch.refined(accuracy);
    }
    [high, atHigh] = [low, atLow];
  }
}

/** The state of a given voltage whose current lies between two currents on either side of it: V(j) is not monotone, so the
 *  caller says which branch.
 *  @param voltage  [V]   @param between  two currents [A] whose voltages bracket it */
export function steadyAtVoltage(
  gap: SteadyGap,
  voltage: number,
  between: readonly [number, number],
  options: SteadyOptions = {},
): SteadyState {
  const accuracy = options.accuracy ?? 1e-6;
  const branch = new Branch(gap);
  const excess = (current: number): number => {
    branch.goTo(current);
    return branch.refined(accuracy).voltage - voltage;
  };
  const ends = between.map((current): [number, number] => [current, excess(current)]);
  const [low, high] = ends[0][1] < ends[1][1] ? ends : [ends[1], ends[0]];
  if (low[1] > 0 || high[1] < 0) throw new Error('steady gap: these currents do not bracket the voltage');
  closeIn(excess, low, high, 1e-8 * voltage);
  return branch.refined(accuracy);
}

/** Secant steps kept inside a bracket [place, value]; leaves the function evaluated at the root last. */
function closeIn(f: (x: number) => number, below: readonly [number, number], above: readonly [number, number], tolerance: number): void {
  let [low, atLow] = below;
  let [high, atHigh] = above;
  for (let i = 0; i < 60; i++) {
    const next = i % 3 === 2 ? (low + high) / 2 : low - (atLow * (high - low)) / (atHigh - atLow);
    const value = f(next);
    if (Math.abs(value) < tolerance) return;
    if (value > 0) [high, atHigh] = [next, value];
    else [low, atLow] = [next, value];
  }
  throw new Error('steady gap: the current did not settle');
}

/** One branch of states, followed in the current from the dark discharge upwards. */
class Branch {
  readonly #gap: SteadyGap;
  readonly #referenceField: number;
  #current: number;
  #solution: MeshFunction;

  constructor(gap: SteadyGap) {
    this.#gap = gap;
    this.#referenceField = fieldWhere(gap, Math.log(1 + 1 / gap.ionYield));
    // space charge that bends the field by 1e-6 only: the uniform-field profile is as good as the answer; but the seed must not
    // make up all of the current
    this.#current = Math.max(this.#currentOfDistortion(1e-6), 2 * gap.seedCurrent);
    const system = this.#system(this.#current);
    this.#solution = this.#solve(this.#current, system.uniform(uniformMesh(200)));
  }

  goTo(target: number): void {
    let factor = 4;
    while (this.#current !== target) {
      const ratio = target / this.#current;
      const step = Math.min(factor, Math.max(1 / factor, ratio));
      const next = step === ratio ? target : this.#current * step;
      try {
        const system = this.#system(next);
        // everything is scaled by the flux, so the state of a nearby current is a start as it stands
        const rough = this.#solve(next, this.#solution);
        const mesh = adaptedMesh(system.problem, rough, 400);
        this.#solution = this.#solve(next, transfer(system.problem, rough, mesh));
        this.#current = next;
        factor = Math.min(4, factor ** 1.5);
      } catch (error) {
        factor = Math.sqrt(factor);
        if (factor < 1.0001) throw error;
      }
    }
  }

  refined(accuracy: number): SteadyState {
    const system = this.#system(this.#current);
    let solution = this.#solution;
    let state = system.state(solution, Number.POSITIVE_INFINITY);
    for (let level = 0; level < 8; level++) {
      const finer = transfer(system.problem, solution, halved(solution.x));
      solution = this.#solve(this.#current, finer);
      const before = state;
      state = system.state(solution, 0);
      const moved = Math.max(Math.abs(before.voltage / state.voltage - 1), Math.abs(before.cathodeField / state.cathodeField - 1));
      state = { ...state, error: moved };
      if (moved < accuracy) return state;
    }
    throw new Error(`steady gap: V and the cathode field still move by ${state.error} on ${solution.x.length} nodes`);
  }

  #solve(current: number, start: MeshFunction): MeshFunction {
    const { problem, typical } = this.#system(current);
    return solveOnMesh(problem, start, typical(start));
  }

  #currentOfDistortion(share: number): number {
    const { spacing, area } = this.#gap;
    const E = this.#referenceField;
    return (share * VACUUM_PERMITTIVITY * at(this.#gap.ionMobility, E) * E * E * area) / spacing;
  }

  #system(current: number): SteadySystem {
    return steadySystem(this.#gap, this.#referenceField, current);
  }
}

interface SteadySystem {
  readonly problem: BoundaryProblem;
  readonly typical: (solution: MeshFunction) => Float64Array;
  readonly uniform: (mesh: Float64Array) => MeshFunction;
  readonly state: (solution: MeshFunction, error: number) => SteadyState;
}

/** The equations scaled by d, the reference field F, the total flux Γ = J/e and the densities Γ/(μF).
 *  Components of y: g = Γ_e/Γ, ε = E/F, then ν = n_e μ_e F/Γ if electrons diffuse, then π = n_p μ_p F/Γ if ions do. */
function steadySystem(gap: SteadyGap, F: number, current: number): SteadySystem {
  const d = gap.spacing;
  const flux = current / (ELEMENTARY_CHARGE * gap.area);
  const electronMobility = at(gap.electronMobility, F);
  const ionMobility = at(gap.ionMobility, F);
  const charge = (ELEMENTARY_CHARGE * flux * d) / (VACUUM_PERMITTIVITY * ionMobility * F * F);
  const slowness = ionMobility / electronMobility;
  const emission = (gap.ionYield + gap.seedCurrent / current) / (1 + gap.ionYield);
  const electronsDiffuse = at(gap.electronEnergy, F) > 0;
  const ionsDiffuse = at(gap.ionEnergy, F) > 0;
  const NU = 2;
  const PI = electronsDiffuse ? 3 : 2;
  const size = 2 + (electronsDiffuse ? 1 : 0) + (ionsDiffuse ? 1 : 0);

  // coefficients of the scaled field, and their slopes
  const alpha = (e: number): number => d * gap.alpha(Math.abs(e) * F);
  const electronStall = (e: number): number => electronMobility / at(gap.electronMobility, Math.abs(e) * F);
  const ionStall = (e: number): number => ionMobility / at(gap.ionMobility, Math.abs(e) * F);
  const electronRate = (e: number): number => (d * F) / at(gap.electronEnergy, Math.abs(e) * F);
  const ionRate = (e: number): number => (d * F) / at(gap.ionEnergy, Math.abs(e) * F);
  const slope = (f: (e: number) => number, e: number): number => {
    const step = 1e-5 * Math.max(Math.abs(e), 1e-4);
    return (f(e + step) - f(e - step)) / (2 * step);
  };

  const electronDensity = (y: Float64Array): number => (electronsDiffuse ? y[NU] : (y[0] * electronStall(y[1])) / y[1]);
  const ionDensity = (y: Float64Array): number => (ionsDiffuse ? y[PI] : ((1 - y[0]) * ionStall(y[1])) / y[1]);

  const rate = (y: Float64Array, out: Float64Array): void => {
    const [g, e] = y;
    out[0] = alpha(e) * Math.abs(g);
    out[1] = -charge * (ionDensity(y) - slowness * electronDensity(y));
    if (electronsDiffuse) out[NU] = electronRate(e) * (y[NU] * e - g * electronStall(e));
    if (ionsDiffuse) out[PI] = ionRate(e) * ((1 - g) * ionStall(e) - y[PI] * e);
  };
  const rateJacobian = (y: Float64Array, out: Float64Array): void => {
    const [g, e] = y;
    out.fill(0);
    out[0] = alpha(e) * Math.sign(g);
    out[1] = slope(alpha, e) * Math.abs(g);
    const row = size;
    if (ionsDiffuse) out[row + PI] = -charge;
    else {
      out[row] += (charge * ionStall(e)) / e;
      out[row + 1] -= charge * (1 - g) * (slope(ionStall, e) / e - ionStall(e) / (e * e));
    }
    if (electronsDiffuse) out[row + NU] = charge * slowness;
    else {
      out[row] += (charge * slowness * electronStall(e)) / e;
      out[row + 1] += charge * slowness * g * (slope(electronStall, e) / e - electronStall(e) / (e * e));
    }
    if (electronsDiffuse) {
      const r = electronRate(e);
      const balance = y[NU] * e - g * electronStall(e);
      out[NU * size] = -r * electronStall(e);
      out[NU * size + 1] = r * (y[NU] - g * slope(electronStall, e)) + slope(electronRate, e) * balance;
      out[NU * size + NU] = r * e;
    }
    if (ionsDiffuse) {
      const r = ionRate(e);
      const balance = (1 - g) * ionStall(e) - y[PI] * e;
      out[PI * size] = -r * ionStall(e);
      out[PI * size + 1] = r * ((1 - g) * slope(ionStall, e) - y[PI]) + slope(ionRate, e) * balance;
      out[PI * size + PI] = -r * e;
    }
  };

  const cathodeEmission: Condition = {
    value: (y) => y[0] - emission,
    gradient: (_, out) => {
      out.fill(0);
      out[0] = 1;
    },
  };
  const ionsLandByDrift: Condition = {
    value: (y) => (1 - y[0]) * ionStall(y[1]) - y[PI] * y[1],
    gradient: (y, out) => {
      out.fill(0);
      out[0] = -ionStall(y[1]);
      out[1] = (1 - y[0]) * slope(ionStall, y[1]) - y[PI];
      out[PI] = -y[1];
    },
  };
  const noIonsFromAnode: Condition = {
    value: (y) => y[0] - 1,
    gradient: (_, out) => {
      out.fill(0);
      out[0] = 1;
    },
  };
  const electronsLandByDrift: Condition = {
    value: (y) => y[NU] * y[1] - y[0] * electronStall(y[1]),
    gradient: (y, out) => {
      out.fill(0);
      out[0] = -electronStall(y[1]);
      out[1] = y[NU] - y[0] * slope(electronStall, y[1]);
      out[NU] = y[1];
    },
  };
  const problem: BoundaryProblem = {
    size,
    rate,
    rateJacobian,
    left: ionsDiffuse ? [cathodeEmission, ionsLandByDrift] : [cathodeEmission],
    right: electronsDiffuse ? [electronsLandByDrift, noIonsFromAnode] : [noIonsFromAnode],
  };

  const typical = (solution: MeshFunction): Float64Array => {
    const scale = new Float64Array(size).fill(1e-30);
    for (let i = 0; i < solution.values.length; i++) {
      scale[i % size] = Math.max(scale[i % size], Math.abs(solution.values[i]));
    }
    return scale;
  };

  const uniform = (mesh: Float64Array): MeshFunction => {
    const values = new Float64Array(mesh.length * size);
    const e = fieldWhere(gap, -Math.log(emission)) / F;
    for (let i = 0; i < mesh.length; i++) {
      const g = Math.exp(alpha(e) * (mesh[i] - 1));
      values[i * size] = g;
      values[i * size + 1] = e;
      if (electronsDiffuse) values[i * size + NU] = (g * electronStall(e)) / e;
      if (ionsDiffuse) values[i * size + PI] = ((1 - g) * ionStall(e)) / e;
    }
    return { x: mesh, values };
  };

  const state = (solution: MeshFunction, error: number): SteadyState => {
    const nodes = solution.x.length;
    const field = new Float64Array(nodes);
    const electronFlux = new Float64Array(nodes);
    const electrons = new Float64Array(nodes);
    const ions = new Float64Array(nodes);
    const middle = new Float64Array(size);
    let voltage = 0;
    for (let i = 0; i < nodes; i++) {
      const y = solution.values.subarray(i * size, (i + 1) * size);
      electronFlux[i] = y[0] * flux;
      field[i] = y[1] * F;
      electrons[i] = (electronDensity(y) * flux) / (electronMobility * F);
      ions[i] = (ionDensity(y) * flux) / (ionMobility * F);
      if (i + 1 < nodes) {
        midpoint(problem, solution, i, middle);
        const next = solution.values[(i + 1) * size + 1];
        voltage += ((solution.x[i + 1] - solution.x[i]) / 6) * (y[1] + 4 * middle[1] + next);
      }
    }
    return {
      voltage: voltage * F * d,
      current,
      cathodeField: field[0],
      error,
      x: solution.x.map((s) => s * d),
      field,
      electronFlux,
      electronDensity: electrons,
      ionDensity: ions,
    };
  };

  return { problem, typical, uniform, state };
}

/** the uniform field [V/m] in which α d has the given value */
function fieldWhere(gap: SteadyGap, target: number): number {
  let low = 1;
  let high = 2;
  while (gap.alpha(high) * gap.spacing < target) {
    low = high;
    high *= 1.2;
    if (high > 1e12) throw new Error('steady gap: no uniform field multiplies enough');
  }
  for (;;) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) return middle;
    if (gap.alpha(middle) * gap.spacing < target) low = middle;
    else high = middle;
  }
}

function at(coefficient: OfField, field: number): number {
  return typeof coefficient === 'number' ? coefficient : coefficient(field);
}

function uniformMesh(intervals: number): Float64Array {
  return Float64Array.from({ length: intervals + 1 }, (_, i) => i / intervals);
}
