import type { Observer, Step } from '../march/march.ts';
import type { RunContext } from './context.ts';
import type { EnergyWatch } from './energy-watch.ts';
import type { ThresholdWatch } from './threshold-watch.ts';

/** A conduction current below this share of the supply's: what trips is the charging current. */
const CONDUCTION_SHARE = 0.01;

/** Takes down when the trip acts, on what current, and the energy that has gone into the gap by then. */
export class TripWatch implements Observer {
  readonly #context: RunContext;
  readonly #energy: EnergyWatch;
  readonly #threshold: ThresholdWatch;
  /** [s]; null until it acts */
  time: number | null = null;
  byCharging = false;
  /** time with q_L ≥ 1 until then [s] */
  timeAbove = 0;
  #energyAtTrip = 0;

  /** @param energy @param threshold look before this one */
  constructor(context: RunContext, energy: EnergyWatch, threshold: ThresholdWatch) {
    this.#context = context;
    this.#energy = energy;
    this.#threshold = threshold;
  }

  look(step: Step): boolean {
    const { trip } = this.#context.march();
    if (trip === null || this.time !== null || step.end.time < trip.actsAt) return false;
    const { time, current, supplyCurrent } = step.end;
    this.time = time;
    this.byCharging = trip.settings.senses === 'supply' && Math.abs(current) < CONDUCTION_SHARE * Math.abs(supplyCurrent);
    this.timeAbove = this.#threshold.time;
    this.#energyAtTrip = this.#energy.gap;
    return false;
  }

  /** Energy into the gap from the trip on [J]; null without a trip. */
  energyAfter(): number | null {
    return this.time === null ? null : this.#energy.gap - this.#energyAtTrip;
  }
}
