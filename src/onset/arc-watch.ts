import type { Observer, Step } from '../march/march.ts';
import type { RunContext } from './context.ts';

/** Where a glow may pass into an arc; common practice, from memory. */
const CURRENT_DENSITY = 1e3; // A/m², 0.1 A/cm²
const CURRENT = 1; // A
const POWER_DENSITY = 1e6; // W/m², 100 W/cm²
/** Times a limit beyond which nothing is left of the model: it ends at once. */
const RUNAWAY = 1e4;
/** how long a power density must last, and how long the model is followed beyond any of the limits [s] */
const DURATION = 1e-3;

/** Follows whether the current or the power is in the range of arcs. */
export class ArcWatch implements Observer {
  readonly #context: RunContext;
  #since: number | null = null;
  risk = false;
  /** largest |I| seen [A] */
  largestCurrent = 0;
  /** beyond a limit for so long that the model ends here? */
  over = false;

  constructor(context: RunContext) {
    this.#context = context;
  }

  nextTime(t: number): number {
    const end = this.#since === null ? Infinity : this.#since + DURATION;
    return end > t ? end : Infinity;
  }

  look(step: Step): boolean {
    const { system, settings } = this.#context;
    const { time, y } = step.end;
    const current = Math.abs(step.end.current);
    this.largestCurrent = Math.max(this.largestCurrent, current);
    const density = current / settings.gap.area;
    const beyond = density > CURRENT_DENSITY || current > CURRENT;
    const hot = Math.abs(y[system.layout.voltage]) * density > POWER_DENSITY;
    if (beyond) this.risk = true;
    if (!(beyond || hot)) this.#since = null;
    else this.#since ??= time;
    const runaway = density > RUNAWAY * CURRENT_DENSITY || current > RUNAWAY * CURRENT;
    this.over = runaway || (this.#since !== null && time >= this.#since + DURATION);
    if (this.over) this.risk = true;
    return false;
  }

  /** A steady state that would have stayed in the range of arcs until the end of the run counts as if it had been followed. */
  lookAhead(): void {
    if (this.#since !== null && this.#context.settings.observe.until > this.#since + DURATION) this.risk = true;
  }
}
