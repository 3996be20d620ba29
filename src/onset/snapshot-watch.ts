import ndarray from 'ndarray';
import ops from 'ndarray-ops';
import type { Grid } from '../gap/grid.ts';
import { densityAtCells } from '../gap/layout.ts';
import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';
import type { EnergyWatch } from './energy-watch.ts';

/** One instant of a run: numbers and profiles at the cell centres, SI, true x-components. The arrays are reused. */
export interface Snapshot {
  /** [s] */
  readonly time: number;
  /** [V] */
  readonly supplyVoltage: number;
  readonly openGapVoltage: number;
  readonly gapVoltage: number;
  /** [A] */
  readonly conductionCurrent: number;
  readonly totalCurrent: number;
  readonly supplyCurrent: number;
  /** [J] */
  readonly gapEnergy: number;
  readonly sourceEnergy: number;
  /** [1/m³] */
  readonly electronDensity: Float64Array;
  readonly ionDensity: Float64Array;
  readonly negativeIonDensity?: Float64Array;
  /** [V/m] */
  readonly electricField: Float64Array;
  /** [V], 0 at x = 0 */
  readonly potential: Float64Array;
  /** [1/(m² s)] */
  readonly electronFlux: Float64Array;
  readonly ionFlux: Float64Array;
  readonly negativeIonFlux?: Float64Array;
  /** [1/(m³ s)] */
  readonly ionisationRate: Float64Array;
}

/** Snapshots before the choice becomes stricter. */
const FIRST_BATCH = 1000;

/** Hands out snapshots: every step of a usual run, fewer as a run grows long.
 *
 *  Steps already crowd where something happens. After each further thousand the change of ln I or V that earns a snapshot doubles. */
export class SnapshotWatch implements Observer {
  readonly #system: GapSystem;
  readonly #energy: EnergyWatch;
  readonly #take: (s: Snapshot) => void;
  readonly #cells: { [K in 'electricField' | 'potential' | 'ionisationRate']: Float64Array };
  readonly #density: Float64Array[];
  readonly #flux: Float64Array[];
  #count = 0;
  #needed = 0;
  #lastCurrent = 0;
  #lastVoltage = 0;
  #lastTime = -1;

  constructor(system: GapSystem, energy: EnergyWatch, take: (s: Snapshot) => void) {
    this.#system = system;
    this.#energy = energy;
    this.#take = take;
    const n = system.grid.cells;
    const array = (): Float64Array => new Float64Array(n);
    this.#cells = { electricField: array(), potential: array(), ionisationRate: array() };
    this.#density = system.equations.charges.map(array);
    this.#flux = system.equations.charges.map(array);
  }

  look(step: Step): boolean {
    const { end } = step;
    const V = end.y[this.#system.layout.voltage];
    if (this.#needed > 0 && end.time > 0) {
      const moved =
        Math.abs(Math.log(Math.abs(end.current / this.#lastCurrent))) +
        Math.abs(V - this.#lastVoltage) / Math.max(Math.abs(V), Math.abs(this.#lastVoltage));
      if (moved < this.#needed) return false;
    }
    this.#snapshot(step);
    return false;
  }

  /** The last step of a run is always kept. */
  finish(step: Step): void {
    if (step.end.time !== this.#lastTime) this.#snapshot(step);
  }

  #snapshot(step: Step): void {
    const { end } = step;
    const { layout, equations, grid } = this.#system;
    this.#count++;
    this.#lastCurrent = end.current;
    this.#lastVoltage = end.y[layout.voltage];
    this.#lastTime = end.time;
    if (this.#count % FIRST_BATCH === 0) this.#needed = this.#needed === 0 ? 0.02 : 2 * this.#needed;
    for (let k = 0; k < this.#density.length; k++) {
      ops.assign(ndarray(this.#density[k], [layout.cells]), densityAtCells(layout, end.y, k));
      faceMeans(equations.at.flux[k], this.#flux[k]);
    }
    profiles(grid, end.y, layout.field, equations.at.alpha, equations.at.flux[0], this.#cells);
    const { fast, at } = equations;
    if (fast !== null) for (let i = 0; i < layout.cells; i++) this.#cells.ionisationRate[i] = at.emitted * at.growth * fast.made[i];
    const negative = this.#density.length > 2 ? { negativeIonDensity: this.#density[2], negativeIonFlux: this.#flux[2] } : {};
    this.#take({
      time: end.time,
      supplyVoltage: end.supplyVoltage,
      openGapVoltage: step.openGapAt(end.time),
      gapVoltage: end.y[layout.voltage],
      conductionCurrent: end.current,
      totalCurrent: end.totalCurrent,
      supplyCurrent: end.supplyCurrent,
      gapEnergy: this.#energy.gap,
      sourceEnergy: this.#energy.source,
      electronDensity: this.#density[0],
      ionDensity: this.#density[1],
      electronFlux: this.#flux[0],
      ionFlux: this.#flux[1],
      ...this.#cells,
      ...negative,
    });
  }
}

/** cells ← means of the two faces of each cell. */
function faceMeans(faces: Float64Array, cells: Float64Array): void {
  const n = cells.length;
  const out = ndarray(cells, [n]);
  const all = ndarray(faces, [n + 1]);
  ops.add(out, all.hi(n), all.lo(1));
  ops.mulseq(out, 0.5);
}

function profiles(
  grid: Grid,
  y: Float64Array,
  field: number,
  alpha: Float64Array,
  electronFlux: Float64Array,
  out: { electricField: Float64Array; potential: Float64Array; ionisationRate: Float64Array },
): void {
  let potential = 0;
  for (let i = 0; i < grid.cells; i++) {
    const left = y[field + i];
    const middle = 0.5 * (left + y[field + i + 1]);
    const half = 0.5 * grid.widths[i];
    out.electricField[i] = middle;
    out.potential[i] = potential - half * 0.5 * (left + middle);
    potential -= 2 * half * middle;
    out.ionisationRate[i] = 0.25 * (alpha[i] + alpha[i + 1]) * Math.abs(electronFlux[i] + electronFlux[i + 1]);
  }
}
