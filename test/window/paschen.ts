/** A gap whose hold-off voltage is a closed form, and an evaluator that answers with it in place of simulations.
 *  V_s = B z/[ln(A z) − ln ln(1 + 1/γ)] with z = N d, α/N = A exp(−B N/E) (Townsend's criterion; e.g. Raizer, Gas Discharge Physics, 1991, eq. 7.3, from memory). */
import type { Case } from '../../src/case.ts';
import type { Answer, Evaluate, Request } from '../../src/search/window/request.ts';
import { coefficient, makeCase } from '../theory/make-case.ts';

export const BOLTZMANN = 1.380649e-23;
export const TEMPERATURE = 300;
/** α/N = A exp(−B/(E/N)), of the order of common gases [m²], [V m²] */
export const A = 3.6e-20;
export const B = 5.5e-19;
export const SPACING = 0.01;

export interface Yields {
  readonly low: number;
  readonly typical: number;
  readonly high: number;
}

/** A case with that gas; its supply steps to 300 V. */
export function paschenCase(yields: Yields, changes: Partial<Case> = {}): Case {
  const surface = {
    material: null,
    ionYield: { ...yields, source: 'test', status: 'given', uncertainty: null },
    workFunction: null,
  } as const;
  const base = makeCase();
  return makeCase({
    gap: { ...base.gap, spacing: SPACING, longestPath: SPACING },
    gas: { ...base.gas, coefficients: { ...base.gas.coefficients, ionisation: coefficient({ kind: 'exponential', A, B }) } },
    electrodes: { left: surface, right: surface },
    supply: { ...base.supply, programme: { kind: 'step', voltage: 300, riseTime: 0 } },
    ...changes,
  });
}

/** V_s [V]; null where no voltage suffices */
export function closedForm(density: number, path: number, ionYield: number): number | null {
  const z = density * path;
  const denominator = Math.log(A * z) - Math.log(Math.log(1 + 1 / ionYield));
  return denominator > 0 ? (B * z) / denominator : null;
}

/** The minimum: e B ln(1 + 1/γ)/A at N d = e ln(1 + 1/γ)/A. */
export function minimum(ionYield: number): { voltage: number; column: number } {
  const loops = Math.log(1 + 1 / ionYield);
  return { voltage: (Math.E * B * loops) / A, column: (Math.E * loops) / A };
}

/** Density [1/m³] at which the right branch of the curve is at a voltage, by halving. */
export function densityAt(voltage: number, ionYield: number, branch: 'left' | 'right', path: number = SPACING): number {
  const bottom = minimum(ionYield).column / path;
  let [near, far] = branch === 'right' ? [bottom, 1e4 * bottom] : [bottom, bottom / Math.E];
  for (let k = 0; k < 200; k++) {
    const middle = Math.sqrt(near * far);
    const there = closedForm(middle, path, ionYield);
    if (there !== null && there < voltage) near = middle;
    else far = middle;
  }
  return near;
}

export interface Analytic {
  readonly evaluate: Evaluate;
  /** every request asked, in order */
  readonly asked: Request[];
  /** how many in each round */
  readonly rounds: number[];
}

/** Answers by the closed form times `ratio`, so that theory is wrong by as much. */
export function analytic(yields: Yields, ratio: (density: number) => number = () => 1): Analytic {
  const asked: Request[] = [];
  const rounds: number[] = [];
  const answer = (request: Request): Answer => {
    const ionYield = request.kind === 'lag' ? yields.typical : yields[request.yields];
    const threshold = closedForm(request.density, request.path, ionYield);
    if (threshold === null) return { kind: 'failed', reason: 'asked where there is no threshold', runs: 1 };
    const holdOff = threshold * ratio(request.density);
    if (request.kind === 'lag')
      return { kind: 'lag', lag: request.voltage > holdOff ? 1e-5 / (request.voltage / holdOff - 1) : null, runs: 1 };
    return { kind: 'hold-off', lower: holdOff, upper: holdOff, note: null, runs: 2 };
  };
  return {
    asked,
    rounds,
    evaluate: async (requests) => {
      asked.push(...requests);
      rounds.push(requests.length);
      return requests.map(answer);
    },
  };
}

/** [Pa] */
export function pressureOf(density: number): number {
  return density * BOLTZMANN * TEMPERATURE;
}
