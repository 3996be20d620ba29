/** The still, dry air of the U.S. Standard Atmosphere from 5 km below sea level to 86 km.
 *
 *  Source: U.S. Standard Atmosphere, 1976 (NOAA, NASA, USAF), part 1: constants of table 2, layers of table 4, eqs. 18, 23, 33a, 33b, 42.
 *  Its layer bases and table rows are checked in test/surroundings. Real air differs: at 30 km the seasons and latitudes spread the pressure by
 *  some 10 %, at 80 km by a factor of two (from memory). */

/** g0 [m/s²], table 2 */
const GRAVITY = 9.80665;
/** r0 [m], the earth's radius at which g0 holds, table 2 */
const EARTH_RADIUS = 6356766;
/** R* [J/(kmol K)], table 2: the value of 1976, part of the definition */
const GAS_CONSTANT = 8314.32;
/** M0 [kg/kmol], mean molar mass at sea level, table 2 */
const MOLAR_MASS = 28.9644;
/** g0 M0/R* [K/m] */
const HYDROSTATIC: number = (GRAVITY * MOLAR_MASS) / GAS_CONSTANT;
/** at sea level, table 2: [Pa], [K] */
const SEA_LEVEL = { pressure: 101325, temperature: 288.15 } as const;

/** table 4: geopotential height of the base [m], gradient of the molecular-scale temperature [K/m] */
const LAYERS: readonly (readonly [number, number])[] = [
  [0, -6.5e-3],
  [11e3, 0],
  [20e3, 1e-3],
  [32e3, 2.8e-3],
  [47e3, 0],
  [51e3, -2.8e-3],
  [71e3, -2e-3],
];

interface Layer {
  /** geopotential [m] */
  readonly base: number;
  /** [K/m] */
  readonly gradient: number;
  /** at the base: [K], [Pa] */
  readonly temperature: number;
  readonly pressure: number;
}

const layers: Layer[] = [];
for (const [base, gradient] of LAYERS) {
  const below = layers.at(-1);
  const { pressure, temperature } = below === undefined ? SEA_LEVEL : stateIn(below, base);
  layers.push({ base, gradient, temperature, pressure });
}

/** geometric altitudes [m] at which the gradient of temperature jumps */
export const LAYER_ALTITUDES: readonly number[] = layers.slice(1).map((layer) => altitudeOfHeight(layer.base));

/** geometric altitudes [m] between which the standard is used here */
export const ATMOSPHERE_RANGE: Readonly<{ lowest: number; highest: number }> = { lowest: -5000, highest: 86000 };

export interface Air {
  /** [Pa] */
  readonly pressure: number;
  /** molecular-scale temperature [K]; from 80 to 86 km, where the air begins to unmix, up to 0.05 % above the kinetic one */
  readonly temperature: number;
  /** mass density [kg/m³] */
  readonly density: number;
}

/** Geopotential height of a geometric altitude.
 *  H = r0 Z/(r0 + Z), eq. 18
 *  @example geopotential(86000) // 84852.05 */
export function geopotential(altitude: number): number {
  return (EARTH_RADIUS * altitude) / (EARTH_RADIUS + altitude);
}

/** Air at a geometric altitude.
 *  T = T_b + L (H − H_b);  p = p_b (T_b/T)^(g0 M0/(R* L)), or p_b exp[−g0 M0 (H − H_b)/(R* T_b)] where L = 0;  ρ = p M0/(R* T)
 *  @param altitude  [m], −5000…86000
 *  @throws RangeError outside that range
 *  @example airAt(10000).pressure // 26499.9 */
export function airAt(altitude: number): Air {
  if (!(altitude >= ATMOSPHERE_RANGE.lowest && altitude <= ATMOSPHERE_RANGE.highest))
    throw new RangeError(`altitude ${altitude} m is outside the standard atmosphere (-5 to 86 km)`);
  const height = geopotential(altitude);
  let index = layers.length - 1;
  while (index > 0 && layers[index].base > height) index--;
  const { pressure, temperature } = stateIn(layers[index], height);
  return { pressure, temperature, density: (pressure * MOLAR_MASS) / (GAS_CONSTANT * temperature) };
}

function stateIn(layer: Layer, height: number): { pressure: number; temperature: number } {
  const rise = height - layer.base;
  const temperature = layer.temperature + layer.gradient * rise;
  const pressure =
    layer.gradient === 0
      ? layer.pressure * Math.exp((-HYDROSTATIC * rise) / layer.temperature)
      : layer.pressure * (layer.temperature / temperature) ** (HYDROSTATIC / layer.gradient);
  return { pressure, temperature };
}

/** Geometric altitude at which the standard atmosphere has a pressure: the inverse of `airAt`.
 *  @param pressure  [Pa], between those at 86 km (0.3734 Pa) and −5 km (177.8 kPa)
 *  @returns [m]
 *  @throws RangeError outside that range
 *  @example altitudeOf(26499.9) // 10000.0 */
export function altitudeOf(pressure: number): number {
  const { lowest, highest } = ATMOSPHERE_RANGE;
  if (!(pressure <= airAt(lowest).pressure && pressure >= airAt(highest).pressure))
    throw new RangeError(`pressure ${pressure} Pa is outside the standard atmosphere (-5 to 86 km)`);
  let index = layers.length - 1;
  while (index > 0 && layers[index].pressure < pressure) index--;
  const layer = layers[index];
  const thinning = Math.log(layer.pressure / pressure);
  const rise =
    layer.gradient === 0
      ? (layer.temperature * thinning) / HYDROSTATIC
      : (layer.temperature * Math.expm1((layer.gradient * thinning) / HYDROSTATIC)) / layer.gradient;
  return altitudeOfHeight(layer.base + rise);
}

function altitudeOfHeight(height: number): number {
  return (EARTH_RADIUS * height) / (EARTH_RADIUS - height);
}
