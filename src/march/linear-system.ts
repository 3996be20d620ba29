import type { Gauss } from '../gap/gauss.ts';
import type { Layout } from '../gap/layout.ts';
import type { FastElectrons } from '../laws/fast-electrons.ts';
import type { GapEquations } from '../laws/gap-equations.ts';
import { alongDrift, alongDriftSlope, cellFactor, cellFactorSlope } from '../laws/production.ts';
import { BandMatrix } from '../numerics/band.ts';
import { ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY } from '../units/constants.ts';

/** (a − J) U = r for the densities and the field of one gap, a = 1/(hγ), with the exact Jacobian J of the discrete equations.
 *
 *  Instead of Gauss's law, which couples every cell, each face carries the conservation of total current,
 *  ε0 dE/dt + e Σ q Γ = j (the time derivative of Gauss's law). Its linearised form gives δE at a face from the densities of the
 *  four cells around it and from δj, one number for the whole gap. δE is eliminated face by face and what is left is a banded
 *  matrix for the densities alone, bordered by δj, which the circuit supplies (`GapSystem`).
 *
 *  Rows and columns: cell by cell, species in an order that keeps the band narrow for the direction of the field. */
export class LinearSystem {
  readonly #equations: GapEquations;
  readonly #tight: BandMatrix;
  readonly #wide: BandMatrix;
  #matrix: BandMatrix;
  /** place of each species within a cell's block, for the field of either direction */
  readonly #slotsForward: readonly number[];
  readonly #slotsBackward: readonly number[];
  #slots: readonly number[];
  /** 1/(a + σ/ε0) at faces, σ the differential conductivity */
  readonly #response: Float64Array;
  /** coefficient of δE in row (species, cell) from the left face at [2i], right face at [2i + 1] */
  readonly #fieldInRow: readonly Float64Array[];
  readonly #b: Float64Array;
  readonly #gauss: Gauss;
  /** right-hand side of the field at the right wall in the last solve */
  #rightRate = 0;
  /** part of Σ weights·δE that a unit charge density in cell i gives, seen from E(0) */
  readonly #moments: Float64Array;
  /** that part for the last solve [V]; null where it was not summed on the way */
  #integralOfCharge: number | null = null;
  /** answer of all unknowns to δj = 1 */
  readonly column: Float64Array;
  /** answers to δP = 1 and δφ = 1 of electrons followed as particles, and what these do to the electrons' flux at the faces */
  readonly emittedColumn: Float64Array;
  readonly growthColumn: Float64Array;
  readonly #emittedFlux: Float64Array;
  readonly #growthFlux: Float64Array;

  constructor(equations: GapEquations, gauss: Gauss) {
    this.#equations = equations;
    this.#gauss = gauss;
    const { cells, species, size } = equations.layout;
    const rows = cells * species;
    const wide = 3 * species - 1;
    this.#tight = species === 2 ? new BandMatrix(rows, 4, 4) : new BandMatrix(rows, wide, wide);
    this.#wide = species === 2 ? new BandMatrix(rows, wide, wide) : this.#tight;
    this.#matrix = this.#tight;
    // electrons drift against the field: with E < 0 their stencils reach left, the ions' reach right
    this.#slotsBackward = species === 2 ? [1, 0] : [1, 0, 2];
    this.#slotsForward = species === 2 ? [0, 1] : [1, 2, 0];
    this.#slots = this.#slotsBackward;
    this.#response = new Float64Array(cells + 1);
    this.#fieldInRow = equations.charges.map(() => new Float64Array(2 * cells));
    this.#b = new Float64Array(rows);
    this.column = new Float64Array(size);
    const some = equations.fast !== null;
    this.emittedColumn = new Float64Array(some ? size : 0);
    this.growthColumn = new Float64Array(some ? size : 0);
    this.#emittedFlux = new Float64Array(some ? cells + 1 : 0);
    this.#growthFlux = new Float64Array(some ? cells + 1 : 0);
    this.#moments = momentsOf(equations.grid.widths, equations.grid.faceWeights);
  }

  /** Assembles and factors for a = 1/(hγ), from the derivatives that `equations.linearise` left.
   *  @returns the cell whose pivot is unusable, or −1 */
  factor(y: Float64Array, a: number): number {
    const direction = this.#equations.direction;
    this.#matrix = direction === 0 ? this.#wide : this.#tight;
    this.#slots = direction > 0 ? this.#slotsForward : this.#slotsBackward;
    this.#respond(a);
    this.#assemble(y, a);
    const bad = this.#matrix.factor();
    if (bad >= 0) return Math.floor(bad / this.#equations.charges.length);
    this.#solveColumn();
    if (this.#equations.fast !== null) this.#solveFastColumns(this.#equations.fast);
    return -1;
  }

  #respond(a: number): void {
    const { byField, charges, layout } = this.#equations;
    const c = ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY;
    const g = this.#response;
    for (let f = 0; f <= layout.cells; f++) {
      let sigma = 0;
      for (let k = 0; k < charges.length; k++) sigma += charges[k] * byField[k][f];
      g[f] = 1 / (a + c * sigma);
    }
  }

  #assemble(y: Float64Array, a: number): void {
    const eq = this.#equations;
    if (eq.charges.length === 2 && !eq.laws.attachment && eq.direction !== 0) {
      assembleTwo(eq, a, this.#response, this.#fieldInRow, this.#matrix);
    } else {
      this.#matrix.clear();
      this.#assembleAny(y, a);
    }
    const ei = eq.laws.electronIonRecombination;
    if (ei > 0) this.#addRecombination(y, 0, 1, ei);
    const ii = eq.laws.ionIonRecombination;
    if (ii > 0 && eq.charges.length > 2) this.#addRecombination(y, 2, 1, ii);
  }

  /** Any number of species, with or without attachment, any field; `assembleTwo` is the same for the common case, several times as fast. */
  #assembleAny(y: Float64Array, a: number): void {
    const eq = this.#equations;
    const { cells, field } = eq.layout;
    const { widths } = eq.grid;
    const species = eq.charges.length;
    const c = ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY;
    const { entries, stride, lower } = this.#matrix;
    const byField = eq.byField;
    const { alpha, eta } = eq.at;
    const { density } = eq.laws;
    const electronFlux = eq.at.flux[0];
    const B = new Float64Array(species * species);
    const G = new Float64Array(species);
    for (let i = 0; i < cells; i++) {
      const width = widths[i];
      const z = 0.5 * (alpha[i] + alpha[i + 1] - eta[i] - eta[i + 1]) * width;
      const half = 0.5 * cellFactor(z);
      const left = electronFlux[i];
      const right = electronFlux[i + 1];
      const bend = 0.25 * cellFactorSlope(z) * width;
      const meanAlpha = 0.5 * (alpha[i] + alpha[i + 1]);
      const meanEta = 0.5 * (eta[i] + eta[i + 1]);
      const alongSum = (y[field + i] < 0 ? left : -left) + (y[field + i + 1] < 0 ? right : -right);
      const attachedSum = left * alongDrift(y[field + i], density) + right * alongDrift(y[field + i + 1], density);
      for (let k = 0; k < species; k++) {
        const diagonal = (species * i + this.#slots[k]) * stride + lower;
        entries[diagonal] += a;
      }
      for (let side = 0; side < 2; side++) {
        const f = i + side;
        const s = (side === 0 ? -1 : 1) / width;
        const along = y[field + f] < 0 ? 1 : -1;
        const made = half * meanAlpha * along;
        const lost = half * meanEta * alongDrift(y[field + f], density);
        const netSlope = eq.alphaSlope[f] - eq.etaSlope[f];
        const madeByField = (0.5 * half * eq.alphaSlope[f] + bend * meanAlpha * netSlope) * alongSum;
        const lostByField =
          (0.5 * half * eq.etaSlope[f] + bend * meanEta * netSlope) * attachedSum +
          half * meanEta * electronFlux[f] * alongDriftSlope(y[field + f], density);
        B.fill(0);
        for (let k = 0; k < species; k++) {
          const fromElectrons = k === 0 ? -made + lost : k === 1 ? -made : -lost;
          const fromField = k === 0 ? -madeByField + lostByField : k === 1 ? -madeByField : -lostByField;
          B[k * species + k] += s;
          B[k * species] += fromElectrons;
          G[k] = s * byField[k][f] + fromElectrons * byField[0][f] + fromField;
          const reach = G[k] * this.#response[f];
          this.#fieldInRow[k][2 * i + side] = reach;
          for (let m = 0; m < species; m++) B[k * species + m] -= reach * c * eq.charges[m];
          if (f === 0) B[k * species + 1] -= B[k * species] * eq.at.fluidEmissionLeft;
          if (f === cells) B[k * species + 1] -= B[k * species] * eq.at.fluidEmissionRight;
        }
        for (let k = 0; k < species; k++) {
          const rowIndex = species * i + this.#slots[k];
          const diagonal = rowIndex * stride + lower - rowIndex;
          for (let m = 0; m < species; m++) {
            const b = B[k * species + m];
            const p = eq.byDensity[m];
            for (let j = 0; j < 4; j++) {
              const cell = f - 2 + j;
              const v = p[4 * f + j];
              if (v === 0 || cell < 0 || cell >= cells) continue;
              entries[diagonal + species * cell + this.#slots[m]] += b * v;
            }
          }
        }
      }
    }
  }

  #addRecombination(y: Float64Array, one: number, other: number, beta: number): void {
    const { cells, row, first } = this.#equations.layout;
    const species = this.#equations.charges.length;
    const { entries, stride, lower } = this.#matrix;
    const p = this.#slots[one];
    const q = this.#slots[other];
    for (let i = 0; i < cells; i++) {
      const lossOne = beta * y[other * row + first + i];
      const lossOther = beta * y[one * row + first + i];
      const rowOne = (species * i + p) * stride + lower;
      const rowOther = (species * i + q) * stride + lower;
      entries[rowOne] += lossOne;
      entries[rowOne + q - p] += lossOther;
      entries[rowOther] += lossOther;
      entries[rowOther + p - q] += lossOne;
    }
  }

  /** U ← densities for right-hand side r (δj = 0).
   *  r holds rates of densities and of E(0); that of E elsewhere follows by Gauss's law, which rates obey too. */
  solveDensities(r: Float64Array, U: Float64Array): void {
    const { layout, charges, grid } = this.#equations;
    if (charges.length === 2 && this.#matrix === this.#tight) {
      this.#solveTwo(r, U);
      return;
    }
    const { cells, row, first } = layout;
    const b = this.#b;
    const species = charges.length;
    this.#rightRate = gather(r, layout, grid.widths, charges, this.#fieldInRow, b, this.#slots);
    this.#matrix.solve(b);
    for (let k = 0; k < species; k++) scatter(b, species, this.#slots[k], U, k * row + first, cells);
    this.#integralOfCharge = null;
  }

  /** Gathering, both substitutions and the integral of the charge in two passes over the cells, for two species. */
  #solveTwo(r: Float64Array, U: Float64Array): void {
    const { layout, grid } = this.#equations;
    const { row, first, leftField, cells } = layout;
    const electronsFirst = this.#slots[0] === 0;
    const baseA = electronsFirst ? first : row + first;
    const baseB = electronsFirst ? row + first : first;
    const reachA = this.#fieldInRow[electronsFirst ? 0 : 1];
    const reachB = this.#fieldInRow[electronsFirst ? 1 : 0];
    const { entries, inverse } = this.#tight;
    this.#rightRate = forward(
      r,
      leftField,
      baseA,
      baseB,
      electronsFirst ? 1 : -1,
      grid.widths,
      reachA,
      reachB,
      entries,
      inverse,
      this.#b,
      cells,
    );
    const moment = backward(this.#b, entries, U, baseA, baseB, this.#moments, cells);
    this.#integralOfCharge = electronsFirst ? moment : -moment;
  }

  /** Completes U's field at x = 0 for δj = 0 and field right-hand side rE there. @returns Σ weights·δE over the gap [V] */
  fieldOf(U: Float64Array, rE: number): number {
    const { layout } = this.#equations;
    U[layout.leftField] = this.fieldAtLeftWall(U, rE, 0);
    if (this.#integralOfCharge === null) return this.#gauss.integral(U);
    return U[layout.leftField] * this.#equations.grid.spacing + this.#integralOfCharge;
  }

  /** δE at the left wall for densities U, field right-hand side rE there and δj [A/m²].
   *  @param fast  change of the flux of fast electrons there [1/(m² s)] */
  fieldAtLeftWall(U: Float64Array, rE: number, deltaJ: number, fast = 0): number {
    const { byDensity, charges, layout } = this.#equations;
    const { fluidEmissionLeft } = this.#equations.at;
    let net = 0;
    let ions = 0;
    for (let k = charges.length - 1; k >= 0; k--) {
      const p = byDensity[k];
      const n = k * layout.row + layout.first;
      let d = p[2] * U[n] + p[3] * U[n + 1];
      if (k === 1) ions = d;
      if (k === 0) d -= fluidEmissionLeft * ions;
      net += charges[k] * d;
    }
    return this.#response[0] * (rE + (deltaJ - ELEMENTARY_CHARGE * (net - fast)) / VACUUM_PERMITTIVITY);
  }

  /** The same at the right wall.
   *  @param rate  right-hand side of the field there; null: that of the last solve */
  fieldAtRightWall(U: Float64Array, rate: number | null, deltaJ: number, fast = 0): number {
    const { cells } = this.#equations.layout;
    const net = this.#netFluxAtRightWall(U) - fast;
    return this.#response[cells] * ((rate ?? this.#rightRate) + (deltaJ - ELEMENTARY_CHARGE * net) / VACUUM_PERMITTIVITY);
  }

  /** Linear change of Σ q Γ of the fluid at the right wall at constant field. */
  #netFluxAtRightWall(U: Float64Array): number {
    const { byDensity, charges, layout } = this.#equations;
    const { fluidEmissionRight } = this.#equations.at;
    const f = layout.cells;
    let net = 0;
    let ions = 0;
    for (let k = charges.length - 1; k >= 0; k--) {
      const p = byDensity[k];
      const n = k * layout.row + layout.first + f;
      let d = p[4 * f] * U[n - 2] + p[4 * f + 1] * U[n - 1];
      if (k === 1) ions = d;
      if (k === 0) d -= fluidEmissionRight * ions;
      net += charges[k] * d;
    }
    return net;
  }

  /** Change of P for densities U, at constant field. */
  emittedBy(U: Float64Array): number {
    const { byDensity, layout, fast, emissionSlopes } = this.#equations;
    const left = fast?.cathodeIsLeft === true;
    const f = left ? 0 : layout.cells;
    const n = layout.row + layout.first + f;
    const p = byDensity[1];
    const ions = left ? p[2] * U[n] + p[3] * U[n + 1] : p[4 * f] * U[n - 2] + p[4 * f + 1] * U[n - 1];
    return emissionSlopes.byIonFlux * ions;
  }

  /** Change of the flux of fast electrons at a wall for changes of P and φ. */
  fastFlux(face: number, deltaP: number, deltaGrowth: number): number {
    return this.#emittedFlux[face] * deltaP + this.#growthFlux[face] * deltaGrowth;
  }

  /** Linear change of e Σ q Γ [A/m²] at the right wall for densities U of the last solve and δj [A/m²].
   *  The change of the field is the one eliminated from the rows of the last cell, so that walls and cells balance to rounding.
   *  @param fast  change of the flux of fast electrons there [1/(m² s)] */
  netCurrentAtRightWall(U: Float64Array, deltaJ: number, fast = 0): number {
    const { byField, charges, layout } = this.#equations;
    const f = layout.cells;
    let sigma = 0;
    for (let k = 0; k < charges.length; k++) sigma += charges[k] * byField[k][f];
    const net = this.#netFluxAtRightWall(U) - fast;
    const field = this.#response[f] * (this.#rightRate + (deltaJ - ELEMENTARY_CHARGE * net) / VACUUM_PERMITTIVITY);
    return ELEMENTARY_CHARGE * (net + sigma * field);
  }

  /** The same at the left wall. */
  netCurrentAtLeftWall(U: Float64Array, fast = 0): number {
    const { byDensity, byField, charges, layout } = this.#equations;
    const { fluidEmissionLeft } = this.#equations.at;
    let net = -fast;
    let ions = 0;
    for (let k = charges.length - 1; k >= 0; k--) {
      const p = byDensity[k];
      const n = k * layout.row + layout.first;
      let d = p[2] * U[n] + p[3] * U[n + 1];
      if (k === 1) ions = d;
      if (k === 0) d -= fluidEmissionLeft * ions;
      net += charges[k] * (d + byField[k][0] * U[layout.leftField]);
    }
    return ELEMENTARY_CHARGE * net;
  }

  /** Answers to a unit of P and of φ: each changes the electrons' flux at all faces and the ions made in all cells. */
  #solveFastColumns(fast: FastElectrons): void {
    const { cells } = this.#equations.layout;
    const { emitted, growth } = this.#equations.at;
    for (let f = 0; f <= cells; f++) {
      this.#emittedFlux[f] = fast.steady[f] + growth * fast.growing[f];
      this.#growthFlux[f] = emitted * fast.growing[f];
    }
    this.#solveFastColumn(this.#emittedFlux, fast.made, growth, this.emittedColumn);
    this.#solveFastColumn(this.#growthFlux, fast.made, emitted, this.growthColumn);
  }

  #solveFastColumn(flux: Float64Array, made: Float64Array, factor: number, column: Float64Array): void {
    const { layout, charges, grid } = this.#equations;
    const species = charges.length;
    const b = this.#b;
    const c = ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY;
    for (let k = 0; k < species; k++) {
      const reach = this.#fieldInRow[k];
      const slot = this.#slots[k];
      for (let i = 0; i < layout.cells; i++) {
        const ions = k < 2 ? factor * made[i] : 0;
        const carried = k === 0 ? (flux[i + 1] - flux[i]) / grid.widths[i] : 0;
        b[species * i + slot] = ions - carried - c * (reach[2 * i] * flux[i] + reach[2 * i + 1] * flux[i + 1]);
      }
    }
    this.#matrix.solve(b);
    for (let k = 0; k < species; k++) scatter(b, species, this.#slots[k], column, k * layout.row + layout.first, layout.cells);
    column[layout.leftField] = this.fieldAtLeftWall(column, 0, 0, flux[0]);
  }

  #solveColumn(): void {
    const { layout, charges } = this.#equations;
    const species = charges.length;
    const b = this.#b;
    for (let k = 0; k < species; k++) {
      const reach = this.#fieldInRow[k];
      const slot = this.#slots[k];
      for (let i = 0; i < layout.cells; i++) b[species * i + slot] = -(reach[2 * i] + reach[2 * i + 1]) / VACUUM_PERMITTIVITY;
    }
    this.#matrix.solve(b);
    for (let k = 0; k < species; k++) scatter(b, species, this.#slots[k], this.column, k * layout.row + layout.first, layout.cells);
  }
}

/** b ← right-hand sides with the eliminated field taken out. @returns that of the field at the right wall */
function gather(
  r: Float64Array,
  layout: Layout,
  widths: Float64Array,
  charges: readonly number[],
  reach: readonly Float64Array[],
  b: Float64Array,
  slots: readonly number[],
): number {
  const { cells, row, first, leftField } = layout;
  const c = ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY;
  const species = charges.length;
  let left = r[leftField];
  for (let i = 0; i < cells; i++) {
    let rho = 0;
    for (let k = 0; k < species; k++) rho += charges[k] * r[k * row + first + i];
    const right = left + c * widths[i] * rho;
    for (let k = 0; k < species; k++) {
      b[species * i + slots[k]] = r[k * row + first + i] - reach[k][2 * i] * left - reach[k][2 * i + 1] * right;
    }
    left = right;
  }
  return left;
}

/** (e/ε0) Δx_i × Σ weights of the faces right of cell i. */
function momentsOf(widths: Float64Array, faceWeights: Float64Array): Float64Array {
  const moments = new Float64Array(widths.length);
  let beyond = 0;
  for (let i = widths.length - 1; i >= 0; i--) {
    beyond += faceWeights[i + 1];
    moments[i] = (ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY) * widths[i] * beyond;
  }
  return moments;
}

/** w ← L⁻¹ of the right-hand sides with the eliminated field taken out; species A stands first in a cell's block, B second.
 *  @param chargeOfB +1 where B is the ions, −1 where it is the electrons
 *  @returns the right-hand side of the field at the right wall */
function forward(
  r: Float64Array,
  leftField: number,
  baseA: number,
  baseB: number,
  chargeOfB: number,
  widths: Float64Array,
  reachA: Float64Array,
  reachB: Float64Array,
  entries: Float64Array,
  inverse: Float64Array,
  w: Float64Array,
  cells: number,
): number {
  const c = (chargeOfB * ELEMENTARY_CHARGE) / VACUUM_PERMITTIVITY;
  let left = r[leftField];
  let p1 = 0;
  let p2 = 0;
  let p3 = 0;
  let p4 = 0;
  for (let i = 0; i < cells; i++) {
    const a = r[baseA + i];
    const b = r[baseB + i];
    const right = left + c * widths[i] * (b - a);
    const j = 2 * i;
    const o = 18 * i;
    const s0 =
      (a - reachA[j] * left - reachA[j + 1] * right) * inverse[j] -
      entries[o] * p4 -
      entries[o + 1] * p3 -
      entries[o + 2] * p2 -
      entries[o + 3] * p1;
    const s1 =
      (b - reachB[j] * left - reachB[j + 1] * right) * inverse[j + 1] -
      entries[o + 9] * p3 -
      entries[o + 10] * p2 -
      entries[o + 11] * p1 -
      entries[o + 12] * s0;
    w[j] = s0;
    w[j + 1] = s1;
    p4 = p2;
    p3 = p1;
    p2 = s0;
    p1 = s1;
    left = right;
  }
  return left;
}

/** U ← the solution for w = L⁻¹ b. @returns Σ moments × (B − A) */
function backward(
  w: Float64Array,
  entries: Float64Array,
  U: Float64Array,
  baseA: number,
  baseB: number,
  moments: Float64Array,
  cells: number,
): number {
  let q1 = 0;
  let q2 = 0;
  let q3 = 0;
  let q4 = 0;
  let sum = 0;
  for (let i = cells - 1; i >= 0; i--) {
    const j = 2 * i;
    const o = 18 * i;
    const x1 = w[j + 1] - entries[o + 17] * q4 - entries[o + 16] * q3 - entries[o + 15] * q2 - entries[o + 14] * q1;
    const x0 = w[j] - entries[o + 8] * q3 - entries[o + 7] * q2 - entries[o + 6] * q1 - entries[o + 5] * x1;
    U[baseA + i] = x0;
    U[baseB + i] = x1;
    sum += moments[i] * (x1 - x0);
    q4 = q2;
    q3 = q1;
    q2 = x1;
    q1 = x0;
  }
  return sum;
}

function scatter(b: Float64Array, species: number, slot: number, U: Float64Array, base: number, cells: number): void {
  for (let i = 0, at = slot; i < cells; i++, at += species) U[base + i] = b[at];
}

/** The matrix for electrons and one kind of ion without attachment and a field of one direction: `#assembleAny` written out,
 *  every entry stored once. Each face has three cells in each flux: electrons that move right use cells f−2 … f and ions
 *  f−1 … f+1; where they move left it is the other way round. */
function assembleTwo(eq: GapEquations, a: number, response: Float64Array, fieldInRow: readonly Float64Array[], matrix: BandMatrix): void {
  const { cells } = eq.layout;
  const { widths } = eq.grid;
  const c = ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY;
  const { entries } = matrix;
  const { alphaSlope } = eq;
  const { alpha, fluidEmissionLeft, fluidEmissionRight } = eq.at;
  const electronFlux = eq.at.flux[0];
  const pe = eq.byDensity[0];
  const pi = eq.byDensity[1];
  const eByField = eq.byField[0];
  const iByField = eq.byField[1];
  const reachE = fieldInRow[0];
  const reachI = fieldInRow[1];
  // electrons to the right: their row stands second in a cell's block, their stencil starts at f − 2
  const rightward = eq.direction < 0;
  const along = rightward ? 1 : -1;
  const eFirst = rightward ? 0 : 1;
  const iFirst = rightward ? 1 : 0;
  for (let i = 0; i < cells; i++) {
    const f = i + 1;
    const width = widths[i];
    const s = 1 / width;
    const alphaL = alpha[i];
    const alphaR = alpha[f];
    const sizeL = along * electronFlux[i];
    const sizeR = along * electronFlux[f];
    const z = 0.5 * (alphaL + alphaR) * width;
    const half = 0.5 * cellFactor(z);
    const mean = 0.5 * (alphaL + alphaR);
    // source = half × mean α × (sum of the fluxes): its slope by either α
    const byAlpha = (0.5 * half + 0.25 * cellFactorSlope(z) * width * mean) * (sizeL + sizeR);

    const madeL = along * half * mean;
    const byFieldL = alphaSlope[i] * byAlpha;
    const geL = ((-s - madeL) * eByField[i] - byFieldL) * response[i];
    const giL = (-s * iByField[i] - madeL * eByField[i] - byFieldL) * response[i];
    const beeL = -s - madeL + geL * c;
    const bieL = -madeL + giL * c;
    let beiL = -geL * c;
    let biiL = -s - giL * c;
    if (i === 0) {
      beiL -= beeL * fluidEmissionLeft;
      biiL -= bieL * fluidEmissionLeft;
    }

    const madeR = along * half * mean;
    const byFieldR = alphaSlope[f] * byAlpha;
    const geR = ((s - madeR) * eByField[f] - byFieldR) * response[f];
    const giR = (s * iByField[f] - madeR * eByField[f] - byFieldR) * response[f];
    const beeR = s - madeR + geR * c;
    const bieR = -madeR + giR * c;
    let beiR = -geR * c;
    let biiR = s - giR * c;
    if (f === cells) {
      beiR -= beeR * fluidEmissionRight;
      biiR -= bieR * fluidEmissionRight;
    }
    reachE[2 * i] = geL;
    reachE[2 * i + 1] = geR;
    reachI[2 * i] = giL;
    reachI[2 * i + 1] = giR;

    const eL = 4 * i + eFirst;
    const eR = eL + 4;
    const iL = 4 * i + iFirst;
    const iR = iL + 4;
    const e0 = pe[eL];
    const e1 = pe[eL + 1];
    const e2 = pe[eL + 2];
    const e3 = pe[eR];
    const e4 = pe[eR + 1];
    const e5 = pe[eR + 2];
    const i0 = pi[iL];
    const i1 = pi[iL + 1];
    const i2 = pi[iL + 2];
    const i3 = pi[iR];
    const i4 = pi[iR + 1];
    const i5 = pi[iR + 2];
    // rows 2i and 2i + 1, nine entries each, the diagonal fifth
    const first = 18 * i;
    if (rightward) {
      // row of the ions: columns of cells i−2 … i+2 as (ion, electron) pairs from place 0 (ion of i − 2)
      entries[first] = 0;
      entries[first + 1] = bieL * e0;
      entries[first + 2] = biiL * i0;
      entries[first + 3] = bieL * e1 + bieR * e3;
      entries[first + 4] = a + biiL * i1 + biiR * i3;
      entries[first + 5] = bieL * e2 + bieR * e4;
      entries[first + 6] = biiL * i2 + biiR * i4;
      entries[first + 7] = bieR * e5;
      entries[first + 8] = biiR * i5;
      // row of the electrons: places shift by one
      entries[first + 9] = beeL * e0;
      entries[first + 10] = beiL * i0;
      entries[first + 11] = beeL * e1 + beeR * e3;
      entries[first + 12] = beiL * i1 + beiR * i3;
      entries[first + 13] = a + beeL * e2 + beeR * e4;
      entries[first + 14] = beiL * i2 + beiR * i4;
      entries[first + 15] = beeR * e5;
      entries[first + 16] = beiR * i5;
      entries[first + 17] = 0;
    } else {
      // electrons first: their columns reach from i − 1 to i + 2, the ions' from i − 2 to i + 1
      entries[first] = 0;
      entries[first + 1] = beiL * i0;
      entries[first + 2] = beeL * e0;
      entries[first + 3] = beiL * i1 + beiR * i3;
      entries[first + 4] = a + beeL * e1 + beeR * e3;
      entries[first + 5] = beiL * i2 + beiR * i4;
      entries[first + 6] = beeL * e2 + beeR * e4;
      entries[first + 7] = beiR * i5;
      entries[first + 8] = beeR * e5;
      entries[first + 9] = biiL * i0;
      entries[first + 10] = bieL * e0;
      entries[first + 11] = biiL * i1 + biiR * i3;
      entries[first + 12] = bieL * e1 + bieR * e3;
      entries[first + 13] = a + biiL * i2 + biiR * i4;
      entries[first + 14] = bieL * e2 + bieR * e4;
      entries[first + 15] = biiR * i5;
      entries[first + 16] = bieR * e5;
      entries[first + 17] = 0;
    }
  }
}
