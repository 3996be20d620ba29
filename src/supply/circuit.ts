import { Voltage } from './programme.ts';
import type { SupplySettings } from './settings.ts';

/** How the supply feeds the gap at one instant.
 *  resistor: I_s = (V_supply − V)/R. limited: I_s = ±limit. ideal: V = V_supply (R = 0). open: I_s = 0, tripped open. */
export type Feed = 'resistor' | 'limited' | 'ideal' | 'open';

/** Supply, series resistance, current limit and switch: (C_p + C_gap) dV/dt = I_s − I.
 *
 *  The feed changes only at events that the march locates (`excess` changes sign) or at known times (`act`); between two of them every equation is smooth. */
export class Circuit {
  readonly resistance: number;
  readonly parallelCapacitance: number;
  readonly limit: number | null;
  #voltage: Voltage;
  feed: Feed;
  /** sign of the limited current */
  limitSign = 0;

  constructor(settings: SupplySettings) {
    this.resistance = settings.seriesResistance;
    this.parallelCapacitance = settings.parallelCapacitance;
    this.limit = settings.currentLimit;
    this.#voltage = Voltage.of(settings.programme);
    this.feed = settings.seriesResistance > 0 ? 'resistor' : 'ideal';
  }

  supplyVoltage(t: number): number {
    return this.#voltage.at(t);
  }

  supplySlope(t: number): number {
    return this.#voltage.slopeAfter(t);
  }

  nextCorner(t: number): number {
    return this.#voltage.nextCorner(t);
  }

  /** Does the supply's slope change at t? */
  isCorner(t: number): boolean {
    return this.#voltage.isCorner(t);
  }

  largestSupplyFrom(t: number): number {
    return this.feed === 'open' ? 0 : this.#voltage.largestFrom(t);
  }

  /** ∂I_s/∂V = −conductance [S]. */
  get conductance(): number {
    return this.feed === 'resistor' ? 1 / this.resistance : 0;
  }

  /** I_s [A] at gap voltage V; for an ideal feed from the current the gap needs.
   *  @param needed conduction current plus (C_p + C_gap) dV_supply/dt [A] */
  sourceCurrent(t: number, V: number, needed: number): number {
    switch (this.feed) {
      case 'resistor':
        return (this.#voltage.at(t) - V) / this.resistance;
      case 'limited':
        return this.limitSign * (this.limit ?? 0);
      case 'ideal':
        return needed;
      case 'open':
        return 0;
    }
  }

  /** Positive once the present feed no longer applies: the current exceeds the limit, or the limited current would exceed
   *  what the resistance asks for. The march ends a step where this crosses zero and calls `change`.
   *  Scaled by the limit, so of order one. */
  excess(t: number, V: number, needed: number): number {
    if (this.limit === null || this.feed === 'open') return -1;
    const drop = this.#voltage.at(t) - V;
    switch (this.feed) {
      case 'resistor':
        return Math.abs(drop) / (this.resistance * this.limit) - 1;
      case 'ideal':
        return Math.abs(needed) / this.limit - 1;
      default:
        return this.resistance > 0
          ? 1 - (this.limitSign * drop) / (this.resistance * this.limit)
          : (-this.limitSign * drop) / Math.max(Math.abs(V), Math.abs(this.#voltage.at(t)), Number.MIN_VALUE);
    }
  }

  /** Takes the feed that applies after `excess` has reached zero, or at t = 0.
   *  @returns the gap voltage, which an ideal feed sets */
  change(t: number, V: number, needed: number): number {
    if (this.feed === 'open') return V;
    const supply = this.#voltage.at(t);
    if (this.feed === 'limited') {
      this.feed = this.resistance > 0 ? 'resistor' : 'ideal';
      return this.resistance > 0 ? V : supply;
    }
    this.feed = 'limited';
    this.limitSign = this.resistance > 0 ? Math.sign(supply - V) : Math.sign(needed);
    return V;
  }

  /** The feed at t = 0 for a gap that holds V; an ideal feed without a limit jumps to the supply's voltage at once.
   *  @returns the gap voltage just after */
  begin(t: number, V: number): number {
    const drop = this.#voltage.at(t) - V;
    if (this.resistance > 0) {
      if (this.limit !== null && Math.abs(drop) > this.limit * this.resistance) {
        this.feed = 'limited';
        this.limitSign = Math.sign(drop);
      } else this.feed = 'resistor';
      return V;
    }
    if (this.limit !== null && drop !== 0) {
      this.feed = 'limited';
      this.limitSign = Math.sign(drop);
      return V;
    }
    this.feed = 'ideal';
    return this.#voltage.at(t);
  }

  /** The trip acts: open disconnects, zero drives the supply to 0 V behind the same resistance.
   *  @returns the gap voltage just after */
  act(action: 'open' | 'zero', t: number, V: number): number {
    if (action === 'open') {
      this.feed = 'open';
      return V;
    }
    this.#voltage = new Voltage([0], [0]);
    return this.begin(t, V);
  }
}
