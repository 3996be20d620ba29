import { ATMOSPHERE_RANGE, airAt, LAYER_ALTITUDES } from './atmosphere.ts';
import type { Series } from './series.ts';

/** A climb or a descent at constant speed through the standard atmosphere, then held. */
export interface AscentSettings {
  /** geometric altitudes [m], −5000…86000 */
  readonly from: number;
  readonly to: number;
  /** [m/s], with the sign of to − from */
  readonly rate: number;
}

/** Altitude against time: from + rate t, held at `to` once reached.
 *  @throws RangeError when an altitude is outside the atmosphere or the rate leads away from `to`
 *  @example altitudes({ from: 0, to: 35000, rate: 5 }).at(3600) // 18000 */
export function altitudes(ascent: AscentSettings): Series {
  const { from, to, rate } = ascent;
  for (const altitude of [from, to])
    if (!(altitude >= ATMOSPHERE_RANGE.lowest && altitude <= ATMOSPHERE_RANGE.highest))
      throw new RangeError(`altitude ${altitude} m is outside the standard atmosphere (-5 to 86 km)`);
  if (from === to) return { at: () => from, corners: [] };
  const arrival = (to - from) / rate;
  if (!(arrival > 0 && arrival < Infinity)) throw new RangeError(`a rate of ${rate} m/s does not lead from ${from} m to ${to} m`);
  return { at: (t) => (t >= arrival ? to : from + rate * Math.max(0, t)), corners: [arrival] };
}

/** Pressure of the outside air along an ascent [Pa].
 *  @example outsideAir({ from: 0, to: 35000, rate: 5 }).at(2000) // 26499.9 */
export function outsideAir(ascent: AscentSettings): Series {
  const altitude = altitudes(ascent);
  const [low, high] = [Math.min(ascent.from, ascent.to), Math.max(ascent.from, ascent.to)];
  const crossings = LAYER_ALTITUDES.filter((z) => z > low && z < high).map((z) => (z - ascent.from) / ascent.rate);
  return { at: (t) => airAt(altitude.at(t)).pressure, corners: [...crossings, ...altitude.corners].sort((a, b) => a - b) };
}
