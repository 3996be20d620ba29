import type { Observer, Step } from '../march/march.ts';
import type { RunContext } from './context.ts';
import type { SustainWatch } from './sustain-watch.ts';

/** Longest step while the guard looks, in ion transits: a swing of the gap and its circuit then cannot hide within a step. */
const LONGEST_STEP = 0.2;
/** How long it looks: ion transits, and charging times of the circuit. */
const TRANSITS = 20;
const CHARGING_TIMES = 2;
/** Relative change of the current over an ion transit from which on the step control sees a swing by itself. */
const VISIBLE = 0.2;
/** |ln| of the current's change up to which what was found still holds. */
const SAME_CURRENT = 0.3;

/** Tells a discharge at rest from one that would swing.
 *
 *  An implicit step far longer than a swing's period damps it, even where it should grow. So where steps grow past that length
 *  and the gap's differential resistance is negative, which a swing needs, the discharge is followed for a while in short steps: only
 *  if its changes do not grow may long steps go on, and may the run end as steady. */
export class SwingGuard implements Observer {
  readonly #context: RunContext;
  readonly #sustain: SustainWatch;
  #looking = false;
  #half = 0;
  #end = 0;
  #first = 0;
  #second = 0;
  /** the current at which the discharge was last found to be at rest [A] */
  #restCurrent: number | null = null;

  /** @param sustain looks before this one */
  constructor(context: RunContext, sustain: SustainWatch) {
    this.#context = context;
    this.#sustain = sustain;
  }

  nextTime(t: number): number {
    return this.#looking ? t + LONGEST_STEP * this.#context.ionTransit : Infinity;
  }

  look(step: Step): boolean {
    const { start, end } = step;
    const span = end.time - start.time;
    if (!(span > 0)) return false;
    if (!this.#looking) {
      if (span > LONGEST_STEP * this.#context.ionTransit && this.#sustain.distorted && this.#sustain.selfSustaining)
        this.allows(end.time, end.y, end.current);
      return false;
    }
    const change =
      (Math.abs(end.current - start.current) / Math.max(Math.abs(end.current), Number.MIN_VALUE)) * (this.#context.ionTransit / span);
    if (end.time <= this.#half) this.#first = Math.max(this.#first, change);
    else this.#second = Math.max(this.#second, change);
    if (change > VISIBLE) this.#looking = false;
    else if (end.time >= this.#end) {
      if (this.#second > this.#first) this.#begin(end.time);
      else {
        this.#looking = false;
        this.#restCurrent = end.current;
      }
    }
    return false;
  }

  /** Is the discharge known to be at rest at t? Starts to look where that is not sure.
   *  @param y its state, just linearised */
  allows(t: number, y: Float64Array, current: number): boolean {
    const { system, ionTransit } = this.#context;
    if (this.#looking) return false;
    if (system.circuit.feed !== 'resistor') return true;
    if (this.#restCurrent !== null && Math.abs(Math.log(Math.abs(current / this.#restCurrent))) < SAME_CURRENT) return true;
    const resistance = system.differentialResistance(y, 1e3 * ionTransit);
    if (resistance !== null && resistance >= 0) {
      this.#restCurrent = current;
      return true;
    }
    this.#begin(t);
    return false;
  }

  #begin(t: number): void {
    const { system, ionTransit } = this.#context;
    const span = Math.max(TRANSITS * ionTransit, CHARGING_TIMES * system.circuit.resistance * system.capacitance);
    this.#looking = true;
    this.#half = t + span / 2;
    this.#end = t + span;
    this.#first = 0;
    this.#second = 0;
  }
}
