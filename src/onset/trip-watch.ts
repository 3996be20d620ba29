import type { Observer, Step } from '../march/march.ts';
import type { RunContext } from './context.ts';
import type { EnergyWatch } from './energy-watch.ts';

/** A conduction current below this share of the supply's: what trips is the charging current. */
const CONDUCTION_SHARE = 0.01;

/** Takes down when the trip acts, on what current, and the energy that has gone into the gap by then. */
export class TripWatch implements Observer {
  readonly #context: RunContext;
  readonly #energy: EnergyWatch;
  /** [s]; null until it acts */
  time: number | null = null;
  byCharging = false;
  #energyAtTrip = 0;

  /** @param energy looks before this one */
  constructor(context: RunContext, energy: EnergyWatch) {
    this.#context = context;
    this.#energy = energy;
  }

  look(step: Step): boolean {
    const { trip } = this.#context.march();
    if (trip === null || this.time !== null || step.end.time < trip.actsAt) return false;
    const { time, current, supplyCurrent } = step.end;
    this.time = time;
    this.byCharging = trip.settings.senses === 'supply' && Math.abs(current) < CONDUCTION_SHARE * Math.abs(supplyCurrent);
    this.#energyAtTrip = this.#energy.gap;
    return false;
  }

  /** Energy into the gap from the trip on [J]; null without a trip. */
  energyAfter(): number | null {
    return this.time === null ? null : this.#energy.gap - this.#energyAtTrip;
  }
}
