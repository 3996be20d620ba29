import type { TripSettings } from './settings.ts';

/** A latching trip: acts `delay` after the sensed current first exceeds its level. */
export class Trip {
  readonly settings: TripSettings;
  /** when the sensed current first exceeded the level [s] */
  excursion: number | null = null;
  acted = false;

  constructor(settings: TripSettings) {
    this.settings = settings;
  }

  /** How far the sensed current is above the level, relative to it; positive on excursion.
   *  @param conduction current through the gap [A]
   *  @param supply current of the supply, charging current included [A] */
  excess(conduction: number, supply: number): number {
    return Math.abs(this.settings.senses === 'gap' ? conduction : supply) / this.settings.current - 1;
  }

  /** When the trip acts [s]; Infinity while nothing has exceeded its level, and after it has acted. */
  get actsAt(): number {
    return this.excursion === null || this.acted ? Infinity : this.excursion + this.settings.delay;
  }
}
