import { type Gauss, gaussOf } from '../gap/gauss.ts';
import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';
import type { GapEquations } from '../laws/gap-equations.ts';
import type { Circuit } from '../supply/circuit.ts';
import { ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY } from '../units/constants.ts';
import { solveSmall } from './border.ts';
import { LinearSystem } from './linear-system.ts';

/** Gap and circuit as one set of ordinary differential equations y' = f(t, y) in the unknowns of `Layout`.
 *
 *  densities: continuity. field at the left wall: ε0 dE/dt = j − e Σ q Γ. voltage: (C_p + C_gap) dV/dt = I_s − I.
 *  j = −(I + C_gap dV/dt)/A is the total current density along +x, the same at every x; I counts positive when it discharges a
 *  positive V. The field elsewhere follows by Gauss's
 *  law; Σ w E = −V is a linear invariant of these equations. */
export class GapSystem {
  readonly equations: GapEquations;
  readonly grid: Grid;
  readonly layout: Layout;
  readonly circuit: Circuit;
  readonly gapCapacitance: number;
  readonly #linear: LinearSystem;
  readonly #gauss: Gauss;
  readonly #capacitance: number;
  #columnSum = 0;
  /** of electrons followed as particles: what the answers to P, φ and j do to P, to the field at the cathode and to Σ weights·E */
  #emittedScale = 1;
  readonly #columnEmitted = new Float64Array(3);
  readonly #columnField = new Float64Array(3);
  readonly #columnIntegral = new Float64Array(3);
  readonly #rows = new Float64Array(20);
  readonly #z = new Float64Array(4);
  readonly #nothing: Float64Array;
  #a = 0;
  /** slope of the supply over the step that began with the last linearisation [V/s] */
  #supplySlope = 0;
  /** conduction current [A], dV/dt [V/s], j [A/m²], supply current [A] of the last evaluation */
  current = 0;
  voltageRate = 0;
  totalCurrentDensity = 0;
  supplyCurrent = 0;
  /** what the gap and the capacitances would draw from an ideal supply [A] */
  neededCurrent = 0;

  constructor(equations: GapEquations, circuit: Circuit) {
    this.equations = equations;
    this.grid = equations.grid;
    this.layout = equations.layout;
    this.circuit = circuit;
    this.gapCapacitance = (VACUUM_PERMITTIVITY * this.grid.area) / this.grid.spacing;
    this.#capacitance = circuit.parallelCapacitance + this.gapCapacitance;
    this.#gauss = gaussOf(this.grid, this.layout, equations.charges);
    this.#linear = new LinearSystem(equations, this.#gauss);
    this.#nothing = new Float64Array(this.layout.size);
  }

  /** C_p + C_gap [F] */
  get capacitance(): number {
    return this.#capacitance;
  }

  /** The field from the densities and the voltage. */
  settle(y: Float64Array): void {
    this.#gauss.settle(y);
  }

  /** out ← f(t, y) for a y whose E(0) obeys the invariant; completes y's field. */
  rates(t: number, y: Float64Array, out: Float64Array): void {
    out.fill(0);
    this.addRates(t, y, out);
  }

  /** out += f(t, y). */
  addRates(t: number, y: Float64Array, out: Float64Array): void {
    this.#gauss.fillField(y);
    this.#complete(t, y, out, this.equations.rates(y, out), false);
  }

  /** As `rates` for a settled y, and prepares `factor`. */
  linearise(t: number, y: Float64Array, out: Float64Array): void {
    this.#supplySlope = this.circuit.supplySlope(t);
    out.fill(0);
    this.#complete(t, y, out, this.equations.linearise(y, out), true);
  }

  /** Prepares `solve` for a = 1/(hγ) at the state last linearised. @returns the cell that cannot be solved, or −1 */
  factor(y: Float64Array, a: number): number {
    this.#a = a;
    const bad = this.#linear.factor(y, a);
    if (bad >= 0) return bad;
    const column = this.#linear.column;
    column[this.layout.leftField] = this.#linear.fieldAtLeftWall(column, 0, 1);
    this.#columnSum = this.#gauss.integral(column);
    if (this.equations.fast !== null) this.#prepareFast();
    return -1;
  }

  /** dV/dI [ohm] of the gap's steady states at the state last linearised: what δj = 1 does once everything has had time to follow.
   *  @param y that state
   *  @param long far longer than anything in the gap takes [s] */
  differentialResistance(y: Float64Array, long: number): number | null {
    if (this.factor(y, 1 / long) >= 0) return null;
    if (this.equations.fast === null) return this.#columnSum / this.grid.area;
    this.#nothing.fill(0);
    this.#solveBorder(this.#nothing, 0, 0, 0, 0, 1, 1);
    return -this.#z[DELTA_V] / this.grid.area;
  }

  /** U ← (a − J)⁻¹ r. Σ w r_E = −r_V must hold, as it does for rates and their combinations. */
  solve(r: Float64Array, U: Float64Array): void {
    const { layout } = this;
    const { voltage, leftField } = layout;
    const linear = this.#linear;
    const { parallelCapacitance, conductance, feed } = this.circuit;
    const area = this.grid.area;
    const a = this.#a;
    linear.solveDensities(r, U);
    const sum = linear.fieldOf(U, r[leftField]);
    let deltaJ: number;
    let deltaV: number;
    if (this.equations.fast !== null) {
      this.#solveWithFast(r, U, sum);
      return;
    }
    if (feed === 'ideal') {
      deltaV = r[voltage] / a;
      deltaJ = -(sum + deltaV) / this.#columnSum;
    } else {
      const k = (conductance + parallelCapacitance * a) / area;
      const m = (parallelCapacitance * r[voltage]) / area;
      deltaV = -(sum - m * this.#columnSum) / (1 + k * this.#columnSum);
      deltaJ = k * deltaV - m;
    }
    addScaled(U, linear.column, deltaJ, leftField + 1);
    U[voltage] = deltaV;
    this.#countCharges(r, U, deltaJ, deltaV);
  }

  /** What the answers to P, φ and j do to the emission, the field at the cathode and the voltage. Columns of P and φ are taken per unit of P itself (or 1),
   *  so that the numbers of the border are of a size. */
  #prepareFast(): void {
    const { equations, layout } = this;
    const linear = this.#linear;
    const left = equations.fast?.cathodeIsLeft === true;
    const columns = [linear.emittedColumn, linear.growthColumn, linear.column];
    this.#emittedScale = Math.abs(equations.at.emitted) || 1;
    for (let c = 0; c < 3; c++) {
      const column = columns[c];
      const scale = c === 0 ? this.#emittedScale : 1;
      const [dP, dG, dJ] = [c === 0 ? 1 : 0, c === 1 ? 1 : 0, c === 2 ? 1 : 0];
      this.#columnEmitted[c] = scale * linear.emittedBy(column);
      const field = left ? column[layout.leftField] : linear.fieldAtRightWall(column, 0, dJ, linear.fastFlux(layout.cells, dP, dG));
      this.#columnField[c] = scale * field;
      this.#columnIntegral[c] = c === 2 ? this.#columnSum : scale * this.#gauss.integral(column);
    }
  }

  #solveWithFast(r: Float64Array, U: Float64Array, sum: number): void {
    const { layout, equations } = this;
    const { voltage, leftField, cells } = layout;
    const linear = this.#linear;
    const { parallelCapacitance, conductance, feed } = this.circuit;
    const field = equations.fast?.cathodeIsLeft === true ? U[leftField] : linear.fieldAtRightWall(U, null, 0);
    if (feed === 'ideal') this.#solveBorder(U, field, sum, 0, 1, r[voltage] / this.#a, 0);
    else {
      const k = (conductance + parallelCapacitance * this.#a) / this.grid.area;
      const m = (parallelCapacitance * r[voltage]) / this.grid.area;
      this.#solveBorder(U, field, sum, 1, -k, -m, 0);
    }
    const z = this.#z;
    const deltaP = z[0] * this.#emittedScale;
    addScaled(U, linear.emittedColumn, deltaP, leftField + 1);
    addScaled(U, linear.growthColumn, z[1], leftField + 1);
    addScaled(U, linear.column, z[2], leftField + 1);
    U[voltage] = z[DELTA_V];
    this.#countCharges(r, U, z[2], z[DELTA_V], linear.fastFlux(0, deltaP, z[1]), linear.fastFlux(cells, deltaP, z[1]));
  }

  /** z = (δP/scale, δφ, δj, δV) from what P and φ depend on, Σ w δE = −δV, and the circuit: byJ δj + byV δV = rest (or, without a circuit, δj = fixed).
   *  @param U      densities for the right-hand side alone
   *  @param field  δE at the cathode and
   *  @param sum    Σ weights·δE for it */
  #solveBorder(U: Float64Array, field: number, sum: number, byJ: number, byV: number, rest: number, fixed: number): void {
    const { emissionSlopes: s } = this.equations;
    const rows = this.#rows;
    const [emitted, fields, integrals] = [this.#columnEmitted, this.#columnField, this.#columnIntegral];
    rows.fill(0);
    for (let c = 0; c < 3; c++) {
      rows[c] = -(emitted[c] + s.byField * fields[c]);
      rows[5 + c] = -s.growthByField * fields[c];
      rows[10 + c] = integrals[c];
    }
    rows[0] += this.#emittedScale;
    rows[4] = this.#linear.emittedBy(U) + s.byField * field;
    rows[6] += 1;
    rows[5 + DELTA_V] = -s.growthByVoltage;
    rows[9] = s.growthByField * field;
    rows[10 + DELTA_V] = 1;
    rows[14] = -sum;
    rows[15 + 2] = fixed !== 0 ? 1 : byJ;
    rows[15 + DELTA_V] = fixed !== 0 ? 0 : byV;
    rows[19] = fixed !== 0 ? fixed : rest;
    solveSmall(rows, 4, this.#z);
  }

  /** ∂f/∂t per unit of the supply's slope, only where it is not zero: writes r += factor × ∂f/∂t. */
  addTimeSlope(r: Float64Array, factor: number): void {
    if (this.circuit.feed !== 'resistor') return;
    const slope = this.#supplySlope;
    if (slope === 0) return;
    const { layout, grid } = this;
    const currentRate = (slope * factor) / this.circuit.resistance;
    const voltageRate = currentRate / this.#capacitance;
    r[layout.voltage] += voltageRate;
    r[layout.leftField] -= voltageRate / grid.spacing;
    r[layout.terminalCharge] += this.gapCapacitance * voltageRate;
    r[layout.supplyCharge] += currentRate;
  }

  #complete(t: number, y: Float64Array, out: Float64Array, current: number, linearised: boolean): void {
    const { layout, grid, circuit, equations } = this;
    const V = y[layout.voltage];
    const slope = circuit.feed === 'ideal' ? this.#supplySlope : 0;
    this.neededCurrent = current + this.#capacitance * slope;
    const supply = circuit.sourceCurrent(t, V, this.neededCurrent);
    const rate = circuit.feed === 'ideal' ? slope : (supply - current) / this.#capacitance;
    const terminal = current + this.gapCapacitance * rate;
    const j = -terminal / grid.area;
    this.current = current;
    this.voltageRate = rate;
    this.totalCurrentDensity = j;
    this.supplyCurrent = supply;
    const left = ELEMENTARY_CHARGE * equations.netFlux(0, linearised);
    out[layout.leftField] += (j - left) / VACUUM_PERMITTIVITY;
    out[layout.voltage] += rate;
    out[layout.terminalCharge] += terminal;
    out[layout.supplyCharge] += supply;
    out[layout.leftWallCharge] += grid.area * left;
    out[layout.rightWallCharge] += ELEMENTARY_CHARGE * grid.area * equations.netFlux(layout.cells, linearised);
  }

  #countCharges(r: Float64Array, U: Float64Array, deltaJ: number, deltaV: number, fastLeft = 0, fastRight = 0): void {
    const { layout, grid, circuit } = this;
    const per = 1 / this.#a;
    const terminal = r[layout.terminalCharge] - grid.area * deltaJ;
    U[layout.terminalCharge] = terminal * per;
    // an ideal feed delivers what gap and capacitance take; any other answers to the voltage alone
    U[layout.supplyCharge] =
      circuit.feed === 'ideal'
        ? U[layout.terminalCharge] + circuit.parallelCapacitance * deltaV
        : (r[layout.supplyCharge] - circuit.conductance * deltaV) * per;
    U[layout.leftWallCharge] = (r[layout.leftWallCharge] + grid.area * this.#linear.netCurrentAtLeftWall(U, fastLeft)) * per;
    U[layout.rightWallCharge] = (r[layout.rightWallCharge] + grid.area * this.#linear.netCurrentAtRightWall(U, deltaJ, fastRight)) * per;
  }
}

/** place of δV among the unknowns of the border */
const DELTA_V = 3;

function addScaled(target: Float64Array, source: Float64Array, factor: number, n: number): void {
  for (let i = 0; i < n; i++) target[i] += factor * source[i];
}
