/** Layers of equal area under a falling curve, for the ziggurat method: G. Marsaglia and W. W. Tsang, J. Stat. Softw. 5 (8), 2000. */
export interface Layers {
  /** a place in a layer is a whole number; below this one it lies under the curve for certain */
  readonly inside: Float64Array;
  /** abscissa of a place: place × width */
  readonly width: Float64Array;
  /** the curve at the outer edge of a layer */
  readonly height: Float64Array;
  /** where the tail begins */
  readonly edge: number;
}

/** Where the tail of the normal distribution begins, with 128 layers of area 9.91256303526217e-3. */
export const NORMAL_TAIL = 3.442619855899;

/** @param places  in a layer
 *  @param curve    falling, 1 at 0
 *  @param inverse  of `curve`
 *  @param edge     where the tail begins
 *  @param area     of each layer, the lowest one with the tail */
function layersOf(
  count: number,
  places: number,
  curve: (x: number) => number,
  inverse: (y: number) => number,
  edge: number,
  area: number,
): Layers {
  const inside = new Float64Array(count);
  const width = new Float64Array(count);
  const height = new Float64Array(count);
  const lowest = area / curve(edge);
  inside[0] = (edge / lowest) * places;
  width[0] = lowest / places;
  height[0] = 1;
  let x = edge;
  width[count - 1] = x / places;
  height[count - 1] = curve(x);
  for (let i = count - 2; i >= 1; i--) {
    const outer = x;
    x = inverse(area / x + curve(x));
    inside[i + 1] = (x / outer) * places;
    width[i] = x / places;
    height[i] = curve(x);
  }
  return { inside, width, height, edge };
}

export const exponentialLayers: Layers = layersOf(
  256,
  2 ** 24,
  (x) => Math.exp(-x),
  (y) => -Math.log(y),
  7.69711747013105,
  3.949659822581572e-3,
);

export const normalLayers: Layers = layersOf(
  128,
  2 ** 23, // and a sign
  (x) => Math.exp(-0.5 * x * x),
  (y) => Math.sqrt(-2 * Math.log(y)),
  NORMAL_TAIL,
  9.91256303526217e-3,
);
