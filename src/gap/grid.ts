import type { PlanarGap } from './geometry.ts';

/** Cells and faces of a planar gap. Cell i lies between faces i and i + 1. */
export interface Grid {
  readonly cells: number;
  /** face positions [m], length cells + 1, from 0 to the spacing */
  readonly faces: Float64Array;
  /** cell centres [m] */
  readonly centres: Float64Array;
  /** cell widths [m] */
  readonly widths: Float64Array;
  /** quadrature weights of face values [m]: half of each neighbouring cell; Σ weights = spacing */
  readonly faceWeights: Float64Array;
  readonly spacing: number;
  readonly area: number;
}

/** How the cells crowd towards the walls that are cathodes at some time of the run. */
export interface Grading {
  readonly left: boolean;
  readonly right: boolean;
  /** length over which the crowding fades [m] */
  readonly length: number;
  /** cell density at the wall over that far away, ≥ 1 */
  readonly ratio: number;
}

/** Cells whose density is 1 + (ratio − 1) exp(−x/length) from each cathode, scaled so that `cells` of them fill the gap.
 *  The grid of a mirrored grading is the mirrored grid, to the last bit. */
export function makeGrid(gap: PlanarGap, cells: number, grading: Grading): Grid {
  const d = gap.spacing;
  const faces = new Float64Array(cells + 1);
  if (grading.right && !grading.left) {
    const mirrored = facePositions(d, cells, { ...grading, left: true, right: false });
    for (let f = 0; f <= cells; f++) faces[f] = d - mirrored[cells - f];
  } else {
    faces.set(facePositions(d, cells, grading));
  }
  faces[0] = 0;
  faces[cells] = d;
  return gridFromFaces(faces, gap.area);
}

/** A grid from given faces [m] (rising from 0), for tests and mirrored runs. */
export function gridFromFaces(faces: Float64Array, area: number): Grid {
  const cells = faces.length - 1;
  const widths = new Float64Array(cells);
  const centres = new Float64Array(cells);
  const faceWeights = new Float64Array(cells + 1);
  for (let i = 0; i < cells; i++) {
    widths[i] = faces[i + 1] - faces[i];
    centres[i] = (faces[i + 1] + faces[i]) / 2;
    faceWeights[i] += widths[i] / 2;
    faceWeights[i + 1] += widths[i] / 2;
  }
  return { cells, faces, centres, widths, faceWeights, spacing: faces[cells], area };
}

function facePositions(d: number, cells: number, grading: Grading): Float64Array {
  const crowd = grading.ratio - 1;
  const l = grading.length;
  const tail = Math.exp(-d / l);
  // number of cells between 0 and x, before scaling
  const count = (x: number): number => {
    let c = x;
    if (grading.left) c += crowd * l * -Math.expm1(-x / l);
    if (grading.right) c += crowd * l * (Math.exp((x - d) / l) - tail);
    return c;
  };
  const density = (x: number): number => {
    let c = 1;
    if (grading.left) c += crowd * Math.exp(-x / l);
    if (grading.right) c += crowd * Math.exp((x - d) / l);
    return c;
  };
  const total = count(d);
  const faces = new Float64Array(cells + 1);
  const both = grading.left && grading.right;
  const last = both ? Math.floor(cells / 2) : cells;
  for (let f = 1; f <= last; f++) faces[f] = place(count, density, (f / cells) * total, faces[f - 1], d);
  if (both) for (let f = last + 1; f <= cells; f++) faces[f] = d - faces[cells - f];
  return faces;
}

/** Where a rising function reaches a value between low and high: Newton's method, kept inside by bisection. */
function place(rising: (x: number) => number, slope: (x: number) => number, value: number, low: number, high: number): number {
  let x = low;
  for (let k = 0; k < 100; k++) {
    const excess = rising(x) - value;
    if (excess < 0) low = x;
    else high = x;
    let next = x - excess / slope(x);
    if (!(next > low && next < high)) next = (low + high) / 2;
    if (Math.abs(next - x) <= 2 * Number.EPSILON * x) return next;
    x = next;
  }
  return x;
}
