import type { Observer, Step } from '../march/march.ts';
import type { RunContext } from './context.ts';
import type { Distortion } from './distortion.ts';
import { fitGrowth } from './growth-fit.ts';

/** Largest field distortion, and relative change of the voltage, over which growth counts as undisturbed. */
const LINEAR_DISTORTION = 0.01;
const STEADY_VOLTAGE = 1e-4;
const SETTLING_TRANSITS = 3;
const LEAST_TRANSITS = 2;
const LEAST_DECADES = 1.5;
/** Decades that an interval which space charge ends must span for λ to be sure to 0.5 %: up to 1 % distortion space charge already acts, in
 *  proportion to the current, and over fewer decades that cannot be told from the seed's constant (0.56 % off over 1.6 decades). */
const SURE_DECADES = 2.1;
const SAMPLES_PER_STEP = 4;

/** Collects the current over the longest interval of undisturbed growth and fits its rate.
 *
 *  The interval is the longest stretch before the field is distorted by 1 % in which the voltage stays within 1e-4, less the time in
 *  which the growth settles. */
export class GrowthWatch implements Observer {
  readonly #context: RunContext;
  readonly #distortion: Distortion;
  readonly #scratch: Float64Array;
  /** the present stretch of constant voltage */
  #time: number[] = [];
  #current: number[] = [];
  #voltage: number[] = [];
  #least = Infinity;
  #most = -Infinity;
  #best: { readonly time: number[]; readonly current: number[] } | null = null;
  /** did space charge end the longest interval? */
  #bestDistorted = false;
  #ended = false;

  constructor(context: RunContext, distortion: Distortion) {
    this.#context = context;
    this.#distortion = distortion;
    this.#scratch = new Float64Array(context.system.layout.size);
  }

  look(step: Step): boolean {
    if (this.#ended) return false;
    const { start, end } = step;
    if (this.#distortion.of(end.y) > LINEAR_DISTORTION) {
      this.#ended = true;
      const excess = (y: Float64Array): number => this.#distortion.of(y) - LINEAR_DISTORTION;
      const before = excess(start.y);
      if (before < 0 && end.time > start.time)
        this.#sample(
          step,
          step.crossing(before, excess(end.y), (_t, y) => excess(y)),
        );
      this.#keepLongest();
    } else this.#sample(step, end.time);
    return false;
  }

  /** λ [1/s] of the longest interval; null where none is long enough or the growth too small. */
  rate(): number | null {
    this.#keepLongest();
    if (this.#best === null) return null;
    const { time, current } = this.#best;
    if (this.#bestDistorted && current[current.length - 1] < current[0] * 10 ** SURE_DECADES) return null;
    return fitGrowth(time, current);
  }

  /** Takes the current from the start of the step to `until`: only there once growth has settled, else at the end alone. */
  #sample(step: Step, until: number): void {
    const { start, end } = step;
    const settled = this.#time.length > 0 && end.time >= this.#settledFrom();
    const count = settled ? SAMPLES_PER_STEP : 1;
    for (let j = 1; j <= count; j++) {
      const t = j === count ? until : start.time + (j / count) * (until - start.time);
      if (t >= end.time) this.#add(end.time, end.current, end.y);
      else {
        step.stateAt(t, this.#scratch);
        this.#add(t, step.currentOf(t, this.#scratch), this.#scratch);
      }
    }
  }

  #add(t: number, current: number, y: Float64Array): void {
    const V = y[this.#context.system.layout.voltage];
    const least = Math.min(this.#least, V);
    const most = Math.max(this.#most, V);
    if (!within(least, most) && this.#time.length > 0) {
      this.#keepLongest();
      this.#forget(V);
    } else {
      this.#least = least;
      this.#most = most;
    }
    this.#time.push(t);
    this.#current.push(Math.abs(current));
    this.#voltage.push(V);
  }

  /** Drops the oldest samples, as many as keep the voltage from being constant. */
  #forget(V: number): void {
    let least = V;
    let most = V;
    let first = this.#time.length;
    for (; first > 0; first--) {
      const v = this.#voltage[first - 1];
      if (!within(Math.min(least, v), Math.max(most, v))) break;
      least = Math.min(least, v);
      most = Math.max(most, v);
    }
    this.#time = this.#time.slice(first);
    this.#current = this.#current.slice(first);
    this.#voltage = this.#voltage.slice(first);
    this.#least = least;
    this.#most = most;
  }

  #settledFrom(): number {
    return this.#time[0] + SETTLING_TRANSITS * this.#context.ionTransit;
  }

  #keepLongest(): void {
    if (this.#time.length === 0) return;
    const from = this.#settledFrom();
    const first = this.#time.findIndex((t) => t >= from);
    if (first < 0) return;
    const time = this.#time.slice(first);
    const current = this.#current.slice(first);
    const last = time.length - 1;
    const span = time[last] - time[0];
    const grown = current[0] > 0 && current[last] > current[0] * 10 ** LEAST_DECADES;
    if (!grown || span < LEAST_TRANSITS * this.#context.ionTransit) return;
    if (this.#best !== null && span <= this.#best.time[this.#best.time.length - 1] - this.#best.time[0]) return;
    this.#best = { time, current };
    this.#bestDistorted = this.#ended;
  }
}

function within(least: number, most: number): boolean {
  return most - least < STEADY_VOLTAGE * Math.max(Math.abs(least), Math.abs(most));
}
