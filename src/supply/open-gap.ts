import type { Circuit } from './circuit.ts';

/** The open-gap companion: the voltage the same circuit would have with no conduction in the gap, its switch following the
 *  real trip. Advanced in closed form over pieces on which the supply voltage is straight. */
export class OpenGap {
  readonly #resistance: number;
  readonly #capacitance: number;
  readonly #limit: number;
  #time: number;
  #voltage: number;

  /** @param capacitance C_p + C_gap [F]
   *  @param voltage at `time` [V]
   *  @param time [s] from which on it is advanced */
  constructor(circuit: Circuit, capacitance: number, voltage: number, time = 0) {
    this.#time = time;
    this.#resistance = circuit.resistance;
    this.#capacitance = capacitance;
    this.#limit = circuit.limit ?? Infinity;
    this.#voltage = voltage;
  }

  get voltage(): number {
    return this.#voltage;
  }

  /** Voltage at time t ≥ the last advance [V]; no corner of the supply may lie between. */
  at(circuit: Circuit, t: number): number {
    if (t <= this.#time || circuit.feed === 'open') return this.#voltage;
    const t0 = this.#time;
    const from = circuit.supplyVoltage(t0);
    const slope = circuit.supplySlope(t0);
    if (this.#resistance === 0) return this.#ideal(t - t0, from, slope);
    return this.#behindResistance(t - t0, from, slope);
  }

  advance(circuit: Circuit, t: number): void {
    this.#voltage = this.at(circuit, t);
    this.#time = t;
  }

  #ideal(span: number, supply: number, slope: number): number {
    const end = supply + slope * span;
    const drop = supply - this.#voltage;
    const rate = this.#limit / this.#capacitance;
    if (drop === 0) return Math.abs(slope) <= rate ? end : this.#voltage + Math.sign(slope) * rate * span;
    const sign = Math.sign(drop);
    const closing = sign * rate - slope; // dV/dt − dV_supply/dt
    const meet = drop / closing;
    if (!(meet >= 0 && meet <= span)) return this.#voltage + sign * rate * span;
    if (Math.abs(slope) <= rate) return end;
    // the supply has come past and runs away faster than the limit lets the gap follow
    return this.#voltage + sign * rate * meet + Math.sign(slope) * rate * (span - meet);
  }

  #behindResistance(span: number, supply: number, slope: number): number {
    const R = this.#resistance;
    const C = this.#capacitance;
    const tau = R * C;
    const most = this.#limit * R; // drop at which the limit sets in
    let left = span;
    let drop = supply - this.#voltage;
    // at most a few changes between limited and not: drop moves monotonically in each regime
    for (let pass = 0; pass < 4 && left > 0; pass++) {
      if (Math.abs(drop) > most * (1 + 1e-12)) {
        const rate = slope - Math.sign(drop) * (this.#limit / C);
        const needed = Math.sign(rate) === -Math.sign(drop) ? (Math.sign(drop) * most - drop) / rate : Infinity;
        const dt = Math.min(needed, left);
        drop += rate * dt;
        left -= dt;
        if (dt === needed) drop = Math.sign(drop) * most;
        continue;
      }
      const settled = slope * tau;
      let dt = left;
      if (Math.abs(settled) > most) {
        const target = Math.sign(settled) * most;
        const share = (target - settled) / (drop - settled);
        if (share > 0 && share < 1) dt = Math.min(left, -tau * Math.log(share));
        else if (share >= 1) dt = 0;
      }
      drop = settled + (drop - settled) * Math.exp(-dt / tau);
      left -= dt;
      if (left > 0) {
        drop = Math.sign(settled) * most;
        // limited from here on while the slope lasts
        drop += (slope - Math.sign(drop) * (this.#limit / C)) * left;
        left = 0;
      }
    }
    return supply + slope * span - drop;
  }
}
