import type { Observer, Step } from '../march/march.ts';
import type { ArcWatch } from './arc-watch.ts';
import type { RunContext } from './context.ts';
import type { Stop } from './outcome.ts';
import type { SustainWatch } from './sustain-watch.ts';
import type { SwingGuard } from './swing-guard.ts';

/** q_L up to which an undistorted discharge can be steady: the closed form and the simulated threshold differ by less. */
const STEADY_FEEDBACK = 1.0001;
/** Share of the growth that the feedback alone would give, below which an undistorted current counts as held by space charge:
 *  on a rising characteristic (near and left of the minimum) a discharge settles with q_L > 1 and less than a tenth of distortion. */
const HELD_SHARE = 0.1;
/** over how many ion transits, and how many charging times of the circuit, nothing may change */
const TRANSITS = 10;
const CHARGING_TIMES = 5;

/** Ends a run once nothing more can happen. Looks last. */
export class StopWatch implements Observer {
  readonly #context: RunContext;
  readonly #sustain: SustainWatch;
  readonly #arc: ArcWatch;
  readonly #guard: SwingGuard | null;
  /** why the run ends here; null while it goes on */
  stop: Stop | null = null;
  #lastUnsettled = 0;
  #carriersBefore = 0;

  /** @param sustain @param arc look before this one */
  constructor(context: RunContext, sustain: SustainWatch, arc: ArcWatch, guard: SwingGuard | null = null) {
    this.#guard = guard;
    this.#context = context;
    this.#sustain = sustain;
    this.#arc = arc;
  }

  look(step: Step): boolean {
    const { time } = step.end;
    if (time > step.start.time && !this.#settled(step)) this.#lastUnsettled = time;
    this.#carriersBefore = this.#sustain.carriers;
    this.stop = this.#reason(time, step.end.y, step.end.current);
    return this.stop !== null;
  }

  #reason(t: number, y: Float64Array, current: number): Stop | null {
    if (this.#arc.over) return 'model-limit';
    const { trip } = this.#context.march();
    if (trip !== null && Number.isFinite(trip.actsAt)) return null;
    const ended = this.#quiet(t, y[this.#context.system.layout.voltage]) ? 'died-out' : this.#steady(t) ? 'steady' : null;
    if (ended === 'steady' && this.#sustain.distorted && this.#guard !== null && !this.#guard.allows(t, y, current)) return null;
    return ended !== null && trip?.acted ? 'tripped-out' : ended;
  }

  /** Gap charge gone, or down to what the seed keeps, and nothing to come that could lift the voltage above V_s. */
  #quiet(t: number, V: number): boolean {
    const { threshold, system, ionTransit } = this.#context;
    if (!this.#sustain.faded || t < ionTransit) return false;
    const least = Math.min(threshold.positive ?? Infinity, threshold.negative ?? Infinity);
    return Math.max(Math.abs(V), system.circuit.largestSupplyFrom(t)) < least;
  }

  #steady(t: number): boolean {
    const { circuit, capacitance } = this.#context.system;
    if (circuit.feed !== 'open' && circuit.nextCorner(t) < Infinity) return false;
    const window = Math.max(TRANSITS * this.#context.ionTransit, CHARGING_TIMES * circuit.resistance * capacitance);
    return t - this.#lastUnsettled >= window;
  }

  /** Would voltage, current and charge, going on at the rates of this step, stay within the tolerance until the end of the run? */
  #settled(step: Step): boolean {
    const { settings, system } = this.#context;
    const { start, end } = step;
    const { feedback, distorted, carriers } = this.#sustain;
    const { voltage } = system.layout;
    const currentChange = change(start.current, end.current);
    // feedback above 1 means growth of about q − 1 an ion transit; a current that grows far less is held by its space charge
    const expected = ((feedback - 1) * (end.time - start.time)) / this.#context.ionTransit;
    if (feedback > STEADY_FEEDBACK && !distorted && currentChange > HELD_SHARE * expected) return false;
    const changes = [change(start.y[voltage], end.y[voltage]), currentChange, change(this.#carriersBefore, carriers)];
    const ahead = (settings.observe.until - end.time) / (end.time - start.time);
    return Math.max(...changes) * ahead <= settings.numerics.tolerance;
  }
}

/** |b − a| relative to the larger of the two; 0 where they are equal. */
function change(a: number, b: number): number {
  return a === b ? 0 : Math.abs(b - a) / Math.max(Math.abs(a), Math.abs(b));
}
