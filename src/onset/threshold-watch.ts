import type { Observer, Step } from '../march/march.ts';
import type { RunContext } from './context.ts';

/** An instant at which something was passed. */
export interface Passing {
  /** [s] */
  readonly time: number;
  /** gap voltage [V] */
  readonly voltage: number;
}

/** Follows q_L(t), the feedback of the space-charge-free gap at its voltage: when it passes 1, how long it stays above, and by how
 *  much the current rises meanwhile. */
export class ThresholdWatch implements Observer {
  readonly #context: RunContext;
  readonly #scratch: Float64Array;
  /** where q_L rose through 1 in the step just seen; null where it did not */
  rose: Passing | null = null;
  /** q_L ≥ 1 now? */
  above = false;
  largestFeedback = 0;
  /** time with q_L ≥ 1 [s], and how many stretches it came in */
  time = 0;
  stretches = 0;
  /** lg of the largest rise of |I| within one stretch, counted from the seed current at least; null without one */
  decades: number | null = null;
  #least = 0;

  constructor(context: RunContext) {
    this.#context = context;
    this.#scratch = new Float64Array(context.system.layout.size);
  }

  look(step: Step): boolean {
    const { start, end } = step;
    const before = this.#feedback(start.y) >= 1;
    const now = this.#feedback(end.y);
    const after = now >= 1;
    this.largestFeedback = Math.max(this.largestFeedback, now);
    this.rose = null;
    // the voltage may also have jumped between two steps, or stand above from the start
    if (before && !this.above) this.#enter(start.time, this.#voltage(start.y), start.current);
    if (before !== after) {
      const time = step.crossing(this.#feedback(start.y) - 1, now - 1, (_t, y) => this.#feedback(y) - 1);
      step.stateAt(time, this.#scratch);
      const current = step.currentOf(time, this.#scratch);
      if (after) this.#enter(time, this.#voltage(this.#scratch), current);
      else this.#compare(current);
      this.time += after ? end.time - time : time - start.time;
    } else if (after) this.time += end.time - start.time;
    if (after) this.#compare(end.current);
    this.above = after;
    return false;
  }

  #enter(time: number, voltage: number, current: number): void {
    this.rose = { time, voltage };
    this.stretches++;
    this.#least = Math.max(Math.abs(current), this.#context.settings.seed.cathodeCurrent);
  }

  #compare(current: number): void {
    const rise = Math.log10(Math.abs(current) / this.#least);
    if (Number.isFinite(rise) && rise > (this.decades ?? 0)) this.decades = rise;
  }

  #voltage(y: Float64Array): number {
    return y[this.#context.system.layout.voltage];
  }

  #feedback(y: Float64Array): number {
    return this.#context.feedback(this.#voltage(y));
  }
}
