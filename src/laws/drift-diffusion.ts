import type { Grid } from '../gap/grid.ts';

/** Γ = ±μ n E − D ∂n/∂x at the faces.
 *
 *  Drift: the face density is the parabola through the averages of two cells upwind and one cell downwind (the κ = 1/3
 *  upwind-biased scheme, third order; no limiter, which would stop Newton's method). Diffusion: central, second order.
 *  The first face off an emitting wall has one upwind cell only and is central. At a wall: outflow by drift with the density
 *  extrapolated linearly, no diffusion (zero normal gradient), no inflow.
 *  Source: van Leer, J. Comput. Phys. 32, 101, 1979 for the κ family; the coefficients for unequal cells are derived here
 *  by integrating the parabola over each cell. */
export interface Stencils {
  /** weights of cells f−2, f−1, f for drift towards +x at [3f …]; of f−1, f, f+1 for drift towards −x at [3(cells+1) + 3f …] */
  readonly weights: Float64Array;
  /** 1/(distance of the two neighbouring cell centres) [1/m]; 0 at the walls */
  readonly gradient: Float64Array;
  readonly faces: number;
}

export function makeStencils(grid: Grid): Stencils {
  const n = grid.cells;
  const faces = n + 1;
  const weights = new Float64Array(6 * faces);
  const gradient = new Float64Array(faces);
  const h = grid.widths;
  for (let f = 1; f < n; f++) {
    gradient[f] = 2 / (h[f - 1] + h[f]);
    const right = 3 * f;
    const left = 3 * (faces + f);
    if (f >= 2) {
      const [a, b, c] = parabolaAtFace(h[f - 2], h[f - 1], h[f]);
      weights.set([a, b, c], right);
    } else {
      weights.set([0, h[f] / (h[f - 1] + h[f]), h[f - 1] / (h[f - 1] + h[f])], right);
    }
    if (f <= n - 2) {
      const [a, b, c] = parabolaAtFace(h[f + 1], h[f], h[f - 1]);
      weights.set([c, b, a], left);
    } else {
      weights.set([h[f] / (h[f - 1] + h[f]), h[f - 1] / (h[f - 1] + h[f]), 0], left);
    }
  }
  // walls: outflow only
  const slope0 = h[0] / (h[0] + h[1]);
  weights.set([0, 1 + slope0, -slope0], 3 * faces);
  const slopeN = h[n - 1] / (h[n - 1] + h[n - 2]);
  weights.set([-slopeN, 1 + slopeN, 0], 3 * n);
  return { weights, gradient, faces };
}

/** Weights (far upwind, upwind, downwind) of three cell averages in the value of their parabola at the face between the last two. */
function parabolaAtFace(far: number, near: number, down: number): [number, number, number] {
  const sum = far + near + down;
  const c = (near * (far + near)) / ((near + down) * sum);
  const a = (-near * down) / ((far + near) * sum);
  return [a, 1 - a - c, c];
}

/** Fluxes at all faces.
 *  @param charge +1 or −1
 *  @param n densities with two pads either side; `first` is the index of cell 0
 *  @param field E [V/m] at faces, from index `field0`
 *  @param mobility μ [m²/(V s)] and `diffusion` D [m²/s] at faces */
export function fluxAtFaces(
  s: Stencils,
  charge: number,
  n: Float64Array,
  first: number,
  field: Float64Array,
  field0: number,
  mobility: Float64Array,
  diffusion: Float64Array,
  flux: Float64Array,
): void {
  const { weights, gradient, faces } = s;
  for (let f = 0; f < faces; f++) {
    const v = charge * mobility[f] * field[field0 + f];
    const w = v > 0 ? 3 * f : 3 * (faces + f);
    const c = v > 0 ? first + f - 2 : first + f - 1;
    const density = weights[w] * n[c] + weights[w + 1] * n[c + 1] + weights[w + 2] * n[c + 2];
    flux[f] = v * density - diffusion[f] * gradient[f] * (n[first + f] - n[first + f - 1]);
  }
}

/** Fluxes and their exact derivatives.
 *  @param mobilitySlope dμ/dE and `diffusionSlope` dD/dE at faces
 *  @param byDensity ∂Γ/∂n of cells f−2 … f+1 at [4f …]
 *  @param byField ∂Γ/∂E at the face */
export function linearFluxAtFaces(
  s: Stencils,
  charge: number,
  n: Float64Array,
  first: number,
  field: Float64Array,
  field0: number,
  mobility: Float64Array,
  mobilitySlope: Float64Array,
  diffusion: Float64Array,
  diffusionSlope: Float64Array,
  flux: Float64Array,
  byDensity: Float64Array,
  byField: Float64Array,
): void {
  const { weights, gradient, faces } = s;
  for (let f = 0; f < faces; f++) {
    const e = field[field0 + f];
    const v = charge * mobility[f] * e;
    const right = v > 0;
    const w = right ? 3 * f : 3 * (faces + f);
    const c = right ? first + f - 2 : first + f - 1;
    const w0 = weights[w];
    const w1 = weights[w + 1];
    const w2 = weights[w + 2];
    const up = n[first + f - 1];
    const down = n[first + f];
    const density = w0 * n[c] + w1 * n[c + 1] + w2 * n[c + 2];
    const g = diffusion[f] * gradient[f];
    flux[f] = v * density - g * (down - up);
    byDensity[4 * f] = right ? v * w0 : 0;
    byDensity[4 * f + 1] = v * (right ? w1 : w0) + g;
    byDensity[4 * f + 2] = v * (right ? w2 : w1) - g;
    byDensity[4 * f + 3] = right ? 0 : v * w2;
    byField[f] = charge * (mobility[f] + e * mobilitySlope[f]) * density - diffusionSlope[f] * gradient[f] * (down - up);
  }
}
