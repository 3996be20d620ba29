import { type ScalarSolution, solveScalar } from '../numerics/ode.ts';
import { type AscentSettings, outsideAir } from './ascent.ts';
import { type Vent, ventFlow } from './conductance.ts';
import type { FlowGas } from './flow-gas.ts';
import { OUTGASSING_HELD_UNTIL, type OutgassingSurface, outgassing } from './outgassing.ts';
import { type Pump, pumpFlow } from './pump.ts';
import { constant, fromRows, type Rows, type Series } from './series.ts';

/** The pressure around a bay. */
export type OutsideSettings =
  | { readonly kind: 'fixed' /** [Pa], ≥ 0 */; readonly pressure: number }
  /** pressures [Pa] against times [s] */
  | { readonly kind: 'table'; readonly rows: Rows }
  | { readonly kind: 'ascent'; readonly ascent: AscentSettings };

/** A volume of gas at one pressure, and what feeds and drains it. */
export interface BaySettings {
  /** [m³] */
  readonly volume: number;
  /** pressure at t = 0 [Pa] */
  readonly start: number;
  /** the gas inside, outside and given off, taken as one */
  readonly gas: FlowGas;
  /** null: nothing outside that matters; then there are no vents */
  readonly outside: OutsideSettings | null;
  readonly vents: readonly Vent[];
  readonly pump: Pump | null;
  /** constant inflow [Pa m³/s] at the gas temperature, ≥ 0 */
  readonly gasLoad: number;
  readonly outgassing: readonly OutgassingSurface[];
}

/** Lowest pressure a bay starts from, sees outside or is pumped to [Pa]: below any vacuum yet made, it stands for 0, which has no logarithm. */
export const LEAST_PRESSURE = 1e-12;

/** Error allowed per step in ln p; the error of the whole stays below 1e-6, as the tests show. */
const TOLERANCE = 1e-8;

/** Share of the pressure below which a difference across a vent counts in proportion. A jet's flow rises as the root of the difference, so without this a wide
 *  vent follows differences too small for doubles; it moves the pressure by less than this share. */
const LEAST_DIFFERENCE = 1e-8;

/** What flows into a bay [Pa m³/s] at one instant; each is negative where gas leaves that way. */
export interface BayFlows {
  readonly vents: number;
  readonly pump: number;
  readonly gasLoad: number;
  readonly outgassing: number;
}

/** A bay followed in time. */
export interface Bay {
  /** [Pa], t [s] from 0 to the duration, held outside */
  pressureAt(t: number): number;
  /** at the bay's own pressure of that time */
  flowsAt(t: number): BayFlows;
  /** times at which what is given bends [s] */
  readonly corners: readonly number[];
  readonly steps: number;
}

/** Pressure outside against time, at least LEAST_PRESSURE. */
function outsidePressure(outside: OutsideSettings | null): Series {
  if (outside === null) return constant(LEAST_PRESSURE);
  const series =
    outside.kind === 'fixed' ? constant(outside.pressure) : outside.kind === 'table' ? fromRows(outside.rows) : outsideAir(outside.ascent);
  return { at: (t) => Math.max(LEAST_PRESSURE, series.at(t)), corners: series.corners };
}

/** Follows the pressure of a bay.
 *
 *  V T d(p/T)/dt = Σ flows in, with the gas everywhere at the given T(t): V dp/dt = Σ flows while T is constant, p ∝ T while nothing flows.
 *  Isothermal is right while the walls keep the gas warm, over minutes; a bay that vents in seconds cools on the way and comes through a pressure sooner
 *  (by up to a factor 1.4 in time; Rheault et al., SAE 941350, 1994, treat both).
 *  Solved for ln(p/T), so that the relative error is the same from one atmosphere to ultrahigh vacuum.
 *  @param duration  [s], > 0
 *  @throws RangeError for vents without an outside, a volume that is not positive, an ascent out of the atmosphere
 *  Source: balance of gas; compartments so followed: Scialdone, NASA X-327-69-524, 1969 */
export function followBay(settings: BaySettings, temperature: Series, duration: number): Bay {
  const { volume, gas, vents, gasLoad } = settings;
  if (!(volume > 0)) throw new RangeError(`a bay needs a volume, not ${volume} m³`);
  if (settings.outside === null && vents.length > 0) throw new RangeError('vents need an outside');
  const outside = outsidePressure(settings.outside);
  const pump = settings.pump && { ...settings.pump, basePressure: Math.max(LEAST_PRESSURE, settings.pump.basePressure) };

  const flows = (t: number, pressure: number): BayFlows => {
    const beyond = outside.at(t);
    let inward = 0;
    const least = LEAST_DIFFERENCE * beyond;
    const difference = beyond - pressure;
    const close = Math.abs(difference) < least;
    for (const vent of vents) {
      inward += close
        ? (difference / least) * ventFlow(gas, temperature.at(t), vent, beyond, beyond - least)
        : ventFlow(gas, temperature.at(t), vent, beyond, pressure);
    }
    return {
      vents: inward,
      pump: pump === null ? 0 : -pumpFlow(pump, pressure),
      gasLoad,
      outgassing: outgassing(settings.outgassing, t),
    };
  };
  const rate = (t: number, logarithm: number): number => {
    const pressure = Math.exp(logarithm) * temperature.at(t);
    const f = flows(t, pressure);
    return (f.vents + f.pump + f.gasLoad + f.outgassing) / (volume * pressure);
  };

  const corners = [...outside.corners, ...temperature.corners, ...(settings.outgassing.length > 0 ? [OUTGASSING_HELD_UNTIL] : [])]
    .filter((t) => t > 0 && t < duration)
    .sort((a, b) => a - b);
  const start = Math.log(Math.max(LEAST_PRESSURE, settings.start) / temperature.at(0));
  const solution: ScalarSolution = solveScalar(rate, 0, duration, start, TOLERANCE, corners);
  const pressureAt = (t: number): number => {
    const within = Math.min(duration, Math.max(0, t));
    return Math.exp(solution.at(within)) * temperature.at(within);
  };
  return { pressureAt, flowsAt: (t) => flows(t, pressureAt(t)), corners, steps: solution.steps };
}
