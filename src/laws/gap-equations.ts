import type { Grid } from '../gap/grid.ts';
import type { Layout } from '../gap/layout.ts';
import type { Curve } from '../gases/curves.ts';
import type { IonYield } from '../surfaces/surface.ts';
import { yieldAt, yieldSlopeAt } from '../surfaces/yield-law.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';
import { fluxAtFaces, linearFluxAtFaces, makeStencils, type Stencils } from './drift-diffusion.ts';
import { emissionShare, emissionShareSlope } from './emission.ts';
import type { FastElectrons } from './fast-electrons.ts';
import { alongDrift, cellFactor } from './production.ts';

/** One kind of charge carrier. Order everywhere: electrons, positive ions, negative ions. */
export interface Species {
  readonly name: 'electrons' | 'positive ions' | 'negative ions';
  readonly charge: 1 | -1;
  /** μN [1/(m V s)] and D/μ [V] against E/N */
  readonly mobility: Curve;
  readonly energy: Curve;
}

/** Everything the gas and the walls contribute, ready for evaluation. */
export interface GapLaws {
  readonly species: readonly Species[];
  /** α/N [m²] */
  readonly ionisation: Curve;
  /** η/N [m²] */
  readonly attachment: Curve | null;
  /** β [m³/s] */
  readonly electronIonRecombination: number;
  readonly ionIonRecombination: number;
  /** N [1/m³] */
  readonly density: number;
  readonly leftYield: IonYield;
  readonly rightYield: IonYield;
  /** seed electrons that leave the cathode [1/(m² s)] */
  readonly seedFlux: number;
}

/** μ [m²/(V s)] and D [m²/s] of one species at the faces, and their derivatives by E. */
interface FaceCoefficients {
  readonly mobility: Float64Array;
  readonly mobilitySlope: Float64Array;
  readonly diffusion: Float64Array;
  readonly diffusionSlope: Float64Array;
}

/** Everything evaluated at the faces for one state. Arrays have cells + 1 entries. */
export interface FaceValues {
  /** E/N [V m²] */
  readonly reducedField: Float64Array;
  /** α, η [1/m] */
  readonly alpha: Float64Array;
  readonly eta: Float64Array;
  readonly coefficients: readonly FaceCoefficients[];
  /** Γ of each species [1/(m² s)] */
  readonly flux: readonly Float64Array[];
  /** share of the wall's ion flux that leaves as electrons, −∂Γ_e/∂Γ_i, at the left and right wall */
  emissionLeft: number;
  emissionRight: number;
  /** the same as far as it leaves as part of the fluid: 0 at the wall whose electrons are followed as particles */
  fluidEmissionLeft: number;
  fluidEmissionRight: number;
  /** seed electrons leaving the left and right wall [1/(m² s)] */
  seedLeft: number;
  seedRight: number;
  /** electrons emitted as particles, P [1/(m² s)], and φ of `FastElectrons` */
  emitted: number;
  growth: number;
}

/** Derivatives of the emission of particles at the state last linearised. */
interface EmissionSlopes {
  /** ∂P/∂Γ₊ at the cathode */
  byIonFlux: number;
  /** ∂P/∂E at the cathode, at constant densities */
  byField: number;
  /** ∂φ/∂V and ∂φ/∂E at the cathode */
  growthByVoltage: number;
  growthByField: number;
}

/** The continuity equations of all species in one gap, discretised in space, and their exact derivatives.
 *
 *  ∂n/∂t + ∂Γ/∂x = source, with the drift–diffusion flux, ionisation and attachment in flux form, recombination, emission
 *  at both walls. Nothing is allocated after construction. */
export class GapEquations {
  readonly grid: Grid;
  readonly layout: Layout;
  readonly laws: GapLaws;
  readonly charges: readonly number[];
  readonly #stencils: Stencils;
  readonly #energy: Float64Array;
  readonly #energySlope: Float64Array;
  /** values at the state last linearised, and at the one last given to `rates` */
  readonly at: FaceValues;
  readonly #stage: FaceValues;
  /** dα/dE, dη/dE [1/V] */
  readonly alphaSlope: Float64Array;
  readonly etaSlope: Float64Array;
  /** ∂Γ/∂n of cells f−2 … f+1 at [4f …], and ∂Γ/∂E, at the state last linearised */
  readonly byDensity: readonly Float64Array[];
  readonly byField: readonly Float64Array[];
  /** electrons followed as particles; null: they follow the local field */
  readonly fast: FastElectrons | null;
  readonly emissionSlopes: EmissionSlopes = { byIonFlux: 0, byField: 0, growthByVoltage: 0, growthByField: 0 };
  /** does the field last linearised point one way everywhere (+1, −1), or not (0)? */
  direction = 0;

  constructor(grid: Grid, layout: Layout, laws: GapLaws, fast: FastElectrons | null = null) {
    this.fast = fast;
    this.grid = grid;
    this.layout = layout;
    this.laws = laws;
    this.charges = laws.species.map((s) => s.charge);
    this.#stencils = makeStencils(grid);
    const array = (): Float64Array => new Float64Array(grid.cells + 1);
    this.#energy = array();
    this.#energySlope = array();
    this.at = faceValues(grid.cells + 1, laws);
    this.#stage = faceValues(grid.cells + 1, laws);
    this.alphaSlope = array();
    this.etaSlope = array();
    this.byDensity = laws.species.map(() => new Float64Array(4 * (grid.cells + 1)));
    this.byField = laws.species.map(array);
  }

  /** Adds dn/dt of every species to `out`, from the densities and field in y. @returns the conduction current [A] */
  rates(y: Float64Array, out: Float64Array): number {
    const v = this.#stage;
    this.#coefficients(y, v);
    const { first, row, field } = this.layout;
    for (let k = 0; k < this.charges.length; k++) {
      const c = v.coefficients[k];
      fluxAtFaces(this.#stencils, this.charges[k], y, k * row + first, y, field, c.mobility, c.diffusion, v.flux[k]);
    }
    this.#emit(y, v);
    this.#sources(y, v, out);
    return this.conductionCurrent(v);
  }

  /** As `rates`, and leaves the values in `at` and every derivative in the public arrays. */
  linearise(y: Float64Array, out: Float64Array): number {
    const v = this.at;
    this.#coefficientsWithSlopes(y, v);
    const { first, row, field } = this.layout;
    for (let k = 0; k < this.charges.length; k++) {
      const c = v.coefficients[k];
      linearFluxAtFaces(
        this.#stencils,
        this.charges[k],
        y,
        k * row + first,
        y,
        field,
        c.mobility,
        c.mobilitySlope,
        c.diffusion,
        c.diffusionSlope,
        v.flux[k],
        this.byDensity[k],
        this.byField[k],
      );
    }
    this.#emitWithSlopes(y, v);
    this.#sources(y, v, out);
    return this.conductionCurrent(v);
  }

  /** I = (e/d) ∫ A (Γ_e + Γ_− − Γ_+) dx [A], by Shockley and Ramo. */
  conductionCurrent(v: FaceValues = this.at): number {
    const { faceWeights, area, spacing, cells } = this.grid;
    let sum = 0;
    if (this.charges.length === 2) {
      const [electrons, ions] = v.flux;
      for (let f = 0; f <= cells; f++) sum += faceWeights[f] * (electrons[f] - ions[f]);
      return (ELEMENTARY_CHARGE * area * sum) / spacing;
    }
    for (let k = 0; k < this.charges.length; k++) {
      const flux = v.flux[k];
      let s = 0;
      for (let f = 0; f <= cells; f++) s += faceWeights[f] * flux[f];
      sum -= this.charges[k] * s;
    }
    return (ELEMENTARY_CHARGE * area * sum) / spacing;
  }

  /** Σ q Γ [1/(m² s)] at face f of the state last given to `rates` or `linearise`. */
  netFlux(f: number, linearised: boolean): number {
    const flux = linearised ? this.at.flux : this.#stage.flux;
    let sum = 0;
    for (let k = 0; k < this.charges.length; k++) sum += this.charges[k] * flux[k][f];
    return sum;
  }

  #reduce(y: Float64Array, x: Float64Array): void {
    const { field, cells } = this.layout;
    const perDensity = 1 / this.laws.density;
    for (let f = 0; f <= cells; f++) x[f] = Math.abs(y[field + f]) * perDensity;
  }

  #coefficients(y: Float64Array, v: FaceValues): void {
    const x = v.reducedField;
    this.#reduce(y, x);
    const faces = this.layout.cells + 1;
    const N = this.laws.density;
    if (!this.fast) this.laws.ionisation.fill(x, faces, N, v.alpha);
    if (this.laws.attachment) {
      this.laws.attachment.fill(x, faces, N, v.eta);
    }
    for (let k = 0; k < this.charges.length; k++) {
      const s = this.laws.species[k];
      const c = v.coefficients[k];
      if (s.mobility.constant && s.energy.constant) continue; // filled once, at construction
      s.mobility.fill(x, faces, 1 / N, c.mobility);
      s.energy.fill(x, faces, 1, c.diffusion);
      multiply(c.diffusion, c.mobility, faces);
    }
  }

  #coefficientsWithSlopes(y: Float64Array, v: FaceValues): void {
    const x = v.reducedField;
    this.#reduce(y, x);
    const { field, cells } = this.layout;
    const faces = cells + 1;
    const N = this.laws.density;
    let forward = 0;
    for (let f = 0; f < faces; f++) if (y[field + f] > 0) forward++;
    this.direction = forward === 0 ? -1 : forward === faces ? 1 : 0;
    if (!this.fast) {
      this.laws.ionisation.fillWithSlope(x, faces, N, v.alpha, this.alphaSlope);
      signed(this.alphaSlope, y, field, faces, 1);
    }
    if (this.laws.attachment) {
      this.laws.attachment.fillWithSlope(x, faces, N, v.eta, this.etaSlope);
      signed(this.etaSlope, y, field, faces, 1);
    }
    for (let k = 0; k < this.charges.length; k++) {
      const s = this.laws.species[k];
      if (s.mobility.constant && s.energy.constant) continue;
      const c = v.coefficients[k];
      s.mobility.fillWithSlope(x, faces, 1 / N, c.mobility, c.mobilitySlope);
      signed(c.mobilitySlope, y, field, faces, 1 / (N * N));
      s.energy.fillWithSlope(x, faces, 1, this.#energy, this.#energySlope);
      signed(this.#energySlope, y, field, faces, 1 / N);
      for (let f = 0; f < faces; f++) {
        c.diffusion[f] = c.mobility[f] * this.#energy[f];
        c.diffusionSlope[f] = c.mobilitySlope[f] * this.#energy[f] + c.mobility[f] * this.#energySlope[f];
      }
    }
  }

  /** Emission of both walls: γ × the ions that arrive, and the seed of the wall that draws electrons off. */
  #emit(y: Float64Array, v: FaceValues): void {
    const { field, cells } = this.layout;
    const { density, leftYield, rightYield, seedFlux } = this.laws;
    const leftShare = emissionShare(-y[field] / density);
    v.emissionLeft = yieldAt(leftYield, v.reducedField[0]) * leftShare;
    v.seedLeft = seedFlux * leftShare;
    const left = v.seedLeft - v.emissionLeft * v.flux[1][0];
    const rightShare = emissionShare(y[field + cells] / density);
    v.emissionRight = yieldAt(rightYield, v.reducedField[cells]) * rightShare;
    v.seedRight = seedFlux * rightShare;
    const right = v.seedRight + v.emissionRight * v.flux[1][cells];
    const { fast } = this;
    v.fluidEmissionLeft = fast?.cathodeIsLeft === true ? 0 : v.emissionLeft;
    v.fluidEmissionRight = fast?.cathodeIsLeft === false ? 0 : v.emissionRight;
    if (fast === null || !fast.cathodeIsLeft) v.flux[0][0] += left;
    if (fast === null || fast.cathodeIsLeft) v.flux[0][cells] -= right;
    if (fast !== null) this.#emitParticles(y, fast, fast.cathodeIsLeft ? left : right, v);
  }

  /** Adds the flux of fast electrons to that of the fluid: from here on the electrons' flux is that of both. */
  #emitParticles(y: Float64Array, fast: FastElectrons, emitted: number, v: FaceValues): void {
    const { field, cells, voltage } = this.layout;
    const growth = fast.growth(Math.abs(y[voltage]), Math.abs(y[fast.cathodeIsLeft ? field : field + cells]));
    v.emitted = emitted;
    v.growth = growth;
    const { steady, growing } = fast;
    const electrons = v.flux[0];
    for (let f = 0; f <= cells; f++) electrons[f] += emitted * (steady[f] + growth * growing[f]);
  }

  #emitWithSlopes(y: Float64Array, v: FaceValues): void {
    this.#emit(y, v);
    const { field, cells } = this.layout;
    const { density, leftYield, rightYield, seedFlux } = this.laws;
    const ions = v.flux[1];
    // both change with the field: the share that leaves, and the yield
    const toLeft = -y[field] / density;
    const xLeft = v.reducedField[0];
    const left = -emissionShareSlope(toLeft) / density;
    const yieldLeft = (-yieldSlopeAt(leftYield, xLeft) * emissionShare(toLeft)) / density;
    const leftByField = (seedFlux - yieldAt(leftYield, xLeft) * ions[0]) * left - yieldLeft * ions[0] - v.emissionLeft * this.byField[1][0];
    const toRight = y[field + cells] / density;
    const xRight = v.reducedField[cells];
    const right = emissionShareSlope(toRight) / density;
    const yieldRight = (yieldSlopeAt(rightYield, xRight) * emissionShare(toRight)) / density;
    const rightByField =
      (seedFlux + yieldAt(rightYield, xRight) * ions[cells]) * right + yieldRight * ions[cells] + v.emissionRight * this.byField[1][cells];
    const { fast } = this;
    if (fast === null || !fast.cathodeIsLeft) this.byField[0][0] += leftByField;
    if (fast === null || fast.cathodeIsLeft) this.byField[0][cells] -= rightByField;
    if (fast === null) return;
    const slopes = this.emissionSlopes;
    const V = y[this.layout.voltage];
    const E = y[fast.cathodeIsLeft ? field : field + cells];
    slopes.byIonFlux = fast.cathodeIsLeft ? -v.emissionLeft : v.emissionRight;
    slopes.byField = fast.cathodeIsLeft ? leftByField : rightByField;
    slopes.growthByVoltage = Math.sign(V) * fast.growthByVoltage(Math.abs(V), Math.abs(E));
    slopes.growthByField = Math.sign(E) * fast.growthByField(Math.abs(V), Math.abs(E));
  }

  #sources(y: Float64Array, v: FaceValues, out: Float64Array): void {
    const { row, first, field } = this.layout;
    if (this.charges.length === 2 && !this.laws.attachment) {
      ionisedRates(this.grid.widths, v.alpha, y, field, v.flux[0], v.flux[1], out, first, row + first);
    } else {
      attachedRates(this.grid.widths, v.alpha, v.eta, y, field, this.laws.density, v.flux, out, first, row);
    }
    if (this.fast !== null) {
      const made = v.emitted * v.growth;
      for (let i = 0; i < this.grid.cells; i++) {
        const ions = made * this.fast.made[i];
        out[first + i] += ions;
        out[row + first + i] += ions;
      }
    }
    const ei = this.laws.electronIonRecombination;
    if (ei > 0) recombine(ei, y, first, row + first, this.grid.cells, out);
    const ii = this.laws.ionIonRecombination;
    if (ii > 0 && this.charges.length > 2) recombine(ii, y, 2 * row + first, row + first, this.grid.cells, out);
  }
}

function faceValues(faces: number, laws: GapLaws): FaceValues {
  const array = (): Float64Array => new Float64Array(faces);
  const anywhere = array();
  return {
    reducedField: array(),
    alpha: array(),
    eta: array(),
    coefficients: laws.species.map((s) => {
      const c = { mobility: array(), mobilitySlope: array(), diffusion: array(), diffusionSlope: array() };
      s.mobility.fill(anywhere, faces, 1 / laws.density, c.mobility);
      s.energy.fill(anywhere, faces, 1, c.diffusion);
      multiply(c.diffusion, c.mobility, faces);
      return c;
    }),
    flux: laws.species.map(array),
    emissionLeft: 0,
    emissionRight: 0,
    fluidEmissionLeft: 0,
    fluidEmissionRight: 0,
    emitted: 0,
    growth: 1,
    seedLeft: 0,
    seedRight: 0,
  };
}

/** Adds dn/dt of electrons and positive ions: fluxes, and ionisation by the flux along the drift, S = −α Γ_e sign(E).
 *
 *  (α|Γ_e| would be the same but where the unlimited scheme's wiggles turn the flux for a cell or two: the absolute value would make ions of
 *  wiggles of either sign, 20 % too many behind a narrow packet without diffusion.) */
function ionisedRates(
  widths: Float64Array,
  alpha: Float64Array,
  y: Float64Array,
  field: number,
  electrons: Float64Array,
  ions: Float64Array,
  out: Float64Array,
  first: number,
  firstIon: number,
): void {
  let leftElectrons = electrons[0];
  let leftIons = ions[0];
  let leftAlpha = alpha[0];
  let leftAlong = y[field] < 0 ? leftElectrons : -leftElectrons;
  for (let i = 0; i < widths.length; i++) {
    const e = electrons[i + 1];
    const p = ions[i + 1];
    const a = alpha[i + 1];
    const along = y[field + i + 1] < 0 ? e : -e;
    const width = widths[i];
    const mean = 0.5 * (leftAlpha + a);
    const source = 0.5 * cellFactor(mean * width) * mean * (leftAlong + along);
    const per = 1 / width;
    out[first + i] += source - (e - leftElectrons) * per;
    out[firstIon + i] += source - (p - leftIons) * per;
    leftElectrons = e;
    leftIons = p;
    leftAlpha = a;
    leftAlong = along;
  }
}

/** The same with attachment, η Γ_e along the drift, and negative ions as third species. (η|Γ_e| would take electrons from a cell that
 *  a wiggle has left with less than none, and so feed the wiggle.)
 *  @param density N [1/m³] */
function attachedRates(
  widths: Float64Array,
  alpha: Float64Array,
  eta: Float64Array,
  y: Float64Array,
  field: number,
  density: number,
  flux: readonly Float64Array[],
  out: Float64Array,
  first: number,
  row: number,
): void {
  const electrons = flux[0];
  for (let i = 0; i < widths.length; i++) {
    const width = widths[i];
    const left = electrons[i];
    const right = electrons[i + 1];
    const [leftField, rightField] = [y[field + i], y[field + i + 1]];
    const half = 0.5 * cellFactor(0.5 * (alpha[i] + alpha[i + 1] - eta[i] - eta[i + 1]) * width);
    const ionised = half * 0.5 * (alpha[i] + alpha[i + 1]) * ((leftField < 0 ? left : -left) + (rightField < 0 ? right : -right));
    const attached = half * 0.5 * (eta[i] + eta[i + 1]) * (left * alongDrift(leftField, density) + right * alongDrift(rightField, density));
    out[first + i] += ionised - attached - (right - left) / width;
    out[row + first + i] += ionised - (flux[1][i + 1] - flux[1][i]) / width;
    if (flux.length > 2) out[2 * row + first + i] += attached - (flux[2][i + 1] - flux[2][i]) / width;
  }
}

function recombine(beta: number, y: Float64Array, one: number, other: number, cells: number, out: Float64Array): void {
  for (let i = 0; i < cells; i++) {
    const lost = beta * y[one + i] * y[other + i];
    out[one + i] -= lost;
    out[other + i] -= lost;
  }
}

function multiply(a: Float64Array, b: Float64Array, n: number): void {
  for (let i = 0; i < n; i++) a[i] *= b[i];
}

/** Turns a derivative by |E|/N into one by E: times `factor` and the sign of E. */
function signed(slope: Float64Array, y: Float64Array, field: number, n: number, factor: number): void {
  for (let i = 0; i < n; i++) slope[i] *= y[field + i] < 0 ? -factor : factor;
}
