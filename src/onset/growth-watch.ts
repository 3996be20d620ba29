import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';
import { cathodeDistortion } from '../observables/walls.ts';
import { fitGrowth } from './growth-fit.ts';

/** Largest field distortion, and relative change of the voltage, over which growth counts as undisturbed. */
const LINEAR_DISTORTION = 0.01;
const STEADY_VOLTAGE = 1e-4;
const SETTLING_TRANSITS = 3;
const LEAST_TRANSITS = 2;
const LEAST_DECADES = 1.5;
const SAMPLES_PER_STEP = 4;

/** Collects the current over the longest interval of undisturbed growth and fits its rate. */
export class GrowthWatch implements Observer {
  readonly #system: GapSystem;
  readonly #ionTransit: number;
  readonly #floor: number;
  readonly #scratch: Float64Array;
  #t: number[] = [];
  #I: number[] = [];
  #start = 0;
  #voltage = Number.NaN;
  #best: { t: number[]; I: number[] } | null = null;
  #ended = false;

  /** @param floor of the field that distortion is relative to [V/m] */
  constructor(system: GapSystem, ionTransit: number, floor: number) {
    this.#system = system;
    this.#ionTransit = ionTransit;
    this.#floor = floor;
    this.#scratch = new Float64Array(system.layout.size);
  }

  look(step: Step): boolean {
    if (this.#ended) return false;
    const { layout, grid } = this.#system;
    const { y, time } = step.end;
    const V = y[layout.voltage];
    if (cathodeDistortion(layout, grid.spacing, this.#floor, y) > LINEAR_DISTORTION) {
      this.#sampleUntilDistorted(step);
      this.#close();
      this.#ended = true;
      return false;
    }
    if (!(Math.abs(V - this.#voltage) <= STEADY_VOLTAGE * Math.abs(this.#voltage))) {
      this.#close();
      this.#voltage = V;
      this.#start = time;
      return false;
    }
    this.#sample(step, 1);
    return false;
  }

  /** λ [1/s] of the longest interval; null where none is long enough or the growth too small. */
  rate(): number | null {
    this.#close();
    return this.#best === null ? null : fitGrowth(this.#best.t, this.#best.I);
  }

  #sample(step: Step, share: number): void {
    const from = step.start.time;
    const span = step.end.time - from;
    for (let j = 1; j <= SAMPLES_PER_STEP; j++) {
      const theta = (share * j) / SAMPLES_PER_STEP;
      const t = from + theta * span;
      if (t < this.#start + SETTLING_TRANSITS * this.#ionTransit) continue;
      let current = step.end.current;
      if (theta < 1) {
        step.stateAt(t, this.#scratch);
        current = step.currentOf(t, this.#scratch);
      }
      this.#t.push(t);
      this.#I.push(Math.abs(current));
    }
  }

  #sampleUntilDistorted(step: Step): void {
    const { layout, grid } = this.#system;
    const excess = (y: Float64Array): number => cathodeDistortion(layout, grid.spacing, this.#floor, y) - LINEAR_DISTORTION;
    const before = excess(step.start.y);
    const from = step.start.time;
    const span = step.end.time - from;
    if (!(before < 0) || !(span > 0)) return;
    const when = step.crossing(before, excess(step.end.y), (_t, y) => excess(y));
    this.#sample(step, (when - from) / span);
  }

  #close(): void {
    const t = this.#t;
    const I = this.#I;
    const n = t.length;
    if (n > 1 && t[n - 1] - t[0] >= LEAST_TRANSITS * this.#ionTransit && I[n - 1] > I[0] * 10 ** LEAST_DECADES && I[0] > 0) {
      const span = t[n - 1] - t[0];
      const had = this.#best === null ? 0 : this.#best.t[this.#best.t.length - 1] - this.#best.t[0];
      if (span > had) this.#best = { t, I };
    }
    this.#t = [];
    this.#I = [];
  }
}
