/** A pump of constant speed down to a base pressure. */
export interface Pump {
  /** [m³/s] at the volume: lines between included */
  readonly speed: number;
  /** [Pa], ≥ 0: what the pump alone reaches */
  readonly basePressure: number;
}

/** Gas taken by a pump.
 *  Q = S (1 − p_base/p) p
 *  @param pressure  at its inlet [Pa]
 *  @returns [Pa m³/s]; negative below the base pressure, where gas comes back through the pump
 *  Source: definition of net speed (O'Hanlon, A User's Guide to Vacuum Technology; from memory H)
 *  @example pumpFlow({ speed: 0.05, basePressure: 0.01 }, 1) // 0.0495 */
export function pumpFlow(pump: Pump, pressure: number): number {
  return pump.speed * (pressure - pump.basePressure);
}
