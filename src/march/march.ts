import type { OpenGap } from '../supply/open-gap.ts';
import type { Trip } from '../supply/trip.ts';
import { type ErrorScale, errorNorm } from './error-norm.ts';
import type { GapSystem } from './gap-system.ts';
import { locate } from './locate.ts';
import type { Particles } from './particles.ts';
import type { Scheme } from './scheme.ts';
import { Stepper } from './stepper.ts';

/** The gap and its circuit at one end of a step. */
export interface Instant {
  readonly time: number;
  readonly y: Float64Array;
  /** conduction current through the gap [A] */
  readonly current: number;
  /** [A] */
  readonly supplyCurrent: number;
  /** [V] */
  readonly supplyVoltage: number;
  /** dV/dt [V/s] */
  readonly voltageRate: number;
  /** I + C_gap dV/dt [A] */
  readonly totalCurrent: number;
}

/** One accepted step, read-only. `start` = `end` once, at t = 0. Between the end of one step and the start of the next the feed
 *  may change, and with it every rate and, behind an ideal supply, the voltage. */
export interface Step {
  readonly start: Instant;
  readonly end: Instant;
  /** open-gap voltage [V] at time t within the step */
  openGapAt(t: number): number;
  /** state at time t within the step, into `out` (third order) */
  stateAt(t: number, out: Float64Array): void;
  /** one integrated unknown (see `Layout`) at time t within the step; cheaper than `stateAt` */
  unknownAt(t: number, index: number): number;
  /** conduction current [A] of a state */
  currentOf(t: number, y: Float64Array): number;
  /** time in the step at which g passes through zero, given g at both ends, of opposite signs */
  crossing(before: number, after: number, g: (t: number, y: Float64Array) => number): number;
}

/** Something that watches a run. */
export interface Observer {
  /** when it wants a step to end next [s], after t; Infinity for no wish */
  nextTime?(t: number): number;
  /** looks at an accepted step. @returns true to end the run */
  look(step: Step): boolean;
}

export interface MarchSettings {
  readonly until: number;
  readonly scheme: Scheme;
  readonly errorScale: ErrorScale;
  /** time in which electrons cross the gap at the highest voltage [s]: sets the first step and, far below it, the smallest one */
  readonly electronTransit: number;
  readonly ionTransit: number;
  /** looks at electrons as particles; null where they follow the local field */
  readonly particles: Particles | null;
}

/** Why a run could not go on. */
export class MarchFailure extends Error {
  readonly time: number;
  readonly step: number;
  readonly cell: number;
  constructor(message: string, time: number, step: number, cell: number) {
    super(message);
    this.time = time;
    this.step = step;
    this.cell = cell;
  }
}

const SAFETY = 0.9;
const MOST_GROWTH = 5;
const LEAST_SHRINK = 0.15;
/** a switch counts as due when its function exceeds this; it is located at zero, so it is not due again at once */
const DUE = 1e-7;

/** How closely observers' events are located, as a share of the step: far closer than dense output is to the truth */
const EVENT_PLACE = 1e-6;

/** The loop: attempt a step, judge it, end it at the first switch or corner inside it, hand it to the observers.
 *
 *  It knows no event by name. Steps end exactly at corners of the supply, at changes of its feed, when the trip acts and at
 *  times that observers ask for. */
export class March {
  readonly system: GapSystem;
  readonly openGap: OpenGap;
  readonly trip: Trip | null;
  readonly #settings: MarchSettings;
  readonly #observers: readonly Observer[];
  readonly #stepper: Stepper;
  readonly #scratch: Float64Array;
  readonly #scratchRates: Float64Array;
  time = 0;
  steps = 0;
  rejected = 0;
  #h: number;
  #grow = true;
  /** error and length of the last accepted step, for the controller; 0 where there is none to go by */
  #lastError = 0;
  #lastSpan = 0;
  #done = false;
  #now: Instant;
  #needed = 0;

  /** @param initial densities and voltage at t = 0+, after `circuit.begin` */
  constructor(
    system: GapSystem,
    openGap: OpenGap,
    trip: Trip | null,
    initial: Float64Array,
    settings: MarchSettings,
    observers: readonly Observer[],
  ) {
    this.system = system;
    this.openGap = openGap;
    this.trip = trip;
    this.#settings = settings;
    this.#observers = observers;
    this.#stepper = new Stepper(system, settings.scheme);
    this.#scratch = new Float64Array(system.layout.size);
    this.#scratchRates = new Float64Array(system.layout.size);
    this.#h = 0.02 * settings.electronTransit;
    this.#stepper.start.set(initial);
    system.settle(this.#stepper.start);
    settings.particles?.look(0, this.#stepper.start);
    this.#stepper.begin(0);
    this.#now = this.#read(0);
  }

  /** Shows the observers the start; to be called once, before the first step. */
  begin(): void {
    const { circuit, layout } = this.system;
    const V = this.state[layout.voltage];
    if (circuit.feed === 'ideal' && circuit.excess(0, V, this.#needed) > 0) {
      circuit.change(0, V, this.#needed);
      this.#stepper.begin(0);
      this.#now = this.#read(0);
    }
    const { trip } = this;
    if (trip && trip.excess(this.#now.current, this.#now.supplyCurrent) > 0) trip.excursion = 0;
    this.#show(this.#now, this.#now);
    if (trip && trip.actsAt <= 0) this.#switches(0);
  }

  get state(): Float64Array {
    return this.#stepper.start;
  }

  /** The present instant, after any switch. */
  get now(): Instant {
    return this.#now;
  }

  get done(): boolean {
    return this.#done;
  }

  /** Linear solves so far. */
  get solves(): number {
    return this.#stepper.solves;
  }

  /** One accepted step. @throws MarchFailure when no step, however small, is acceptable */
  advance(): void {
    const from = this.time;
    if (this.#settings.particles?.look(from, this.#stepper.start)) {
      this.#stepper.begin(from);
      this.#now = this.#read(from);
    }
    const target = this.#target(from);
    let h = this.#fit(this.#h, target - from);
    for (;;) {
      const error = this.#attempt(from, h);
      if (error <= 1) {
        const end = this.#firstSwitch(from, h);
        if (end === null || end <= from) {
          this.#accept(from, h, target, error);
          return;
        }
        // end the step where something switches
        h = end - from;
        if (this.#attempt(from, h) <= 1.5) {
          this.#accept(from, h, end, error);
          return;
        }
      } else {
        this.rejected++;
        this.#grow = false;
        h *= Math.min(0.5, Math.max(LEAST_SHRINK, SAFETY * error ** -0.25));
      }
      if (!(h > this.#smallest(from))) this.#fail(from, h);
    }
  }

  #smallest(t: number): number {
    return Math.max(1e-9 * this.#settings.electronTransit, 4 * Number.EPSILON * t);
  }

  #fail(t: number, h: number): never {
    const cell = worstCell(this.#stepper, this.system);
    throw new MarchFailure(
      `no acceptable step at t = ${t.toPrecision(6)} s: steps of ${h.toPrecision(2)} s still exceed the tolerance`,
      t,
      this.steps,
      cell,
    );
  }

  /** Where the next step must end at the latest. */
  #target(t: number): number {
    let target = Math.min(this.#settings.until, this.system.circuit.nextCorner(t));
    if (this.trip) target = Math.min(target, this.trip.actsAt);
    for (const o of this.#observers) if (o.nextTime) target = Math.min(target, o.nextTime(t));
    return target;
  }

  /** Steps that would leave a crumb before the target are stretched or split evenly. */
  #fit(h: number, room: number): number {
    if (h >= room * 0.999) return room;
    if (h > room * 0.5) return room * 0.5;
    return h;
  }

  #attempt(t: number, h: number): number {
    const { system } = this;
    const stepper = this.#stepper;
    if (stepper.attempt(t, h) >= 0) return Infinity;
    const error = errorNorm(system.grid, system.layout, this.#settings.errorScale, stepper.end, stepper.error);
    const { particles } = this.#settings;
    // the controller takes errors for proportional to the fourth power of the step; the change of the field is to its first
    return particles === null ? error : Math.max(error, particles.overreach(stepper.end) ** 4);
  }

  /** The first time inside the step just attempted at which the feed must change or the trip would act; null if none. */
  #firstSwitch(from: number, h: number): number | null {
    const { circuit, layout } = this.system;
    const { trip } = this;
    const watchFeed = circuit.limit !== null && circuit.feed !== 'open';
    const watchTrip = trip !== null && trip.excursion === null && !trip.acted;
    if (!watchFeed && !watchTrip) return null;
    let first: number | null = null;
    const stepper = this.#stepper;
    const at = (theta: number): number => {
      const t = from + theta * h;
      if (theta === 1) this.#scratch.set(stepper.end);
      else stepper.stateAt(theta, this.#scratch);
      this.system.rates(t, this.#scratch, this.#scratchRates);
      return t;
    };
    if (watchFeed) {
      const excess = (theta: number): number => {
        const t = at(theta);
        return circuit.excess(t, this.#scratch[layout.voltage], this.system.neededCurrent);
      };
      const end = excess(1);
      if (end > DUE) {
        const begin = circuit.excess(from, stepper.start[layout.voltage], this.#needed);
        if (begin > DUE) return from;
        first = from + locate(excess, Math.min(begin, -Number.MIN_VALUE), end) * h;
      }
    }
    if (watchTrip) {
      const excess = (theta: number): number => {
        at(theta);
        return trip.excess(this.system.current, this.system.supplyCurrent);
      };
      const end = excess(1);
      if (end > 0) {
        const begin = trip.excess(this.#now.current, this.#now.supplyCurrent);
        const when = begin > 0 ? from : from + locate(excess, begin, end) * h;
        if (first === null || when <= first) {
          trip.excursion = when;
          const acts = trip.actsAt;
          if (acts < (first ?? from + h)) first = Math.max(acts, when);
        }
      }
    }
    return first;
  }

  #accept(from: number, h: number, target: number, error: number): void {
    const stepper = this.#stepper;
    const { system } = this;
    const to = h >= (target - from) * (1 - 1e-12) ? target : from + h;
    const start = this.#now;
    this.steps++;
    this.time = to;
    const size = Math.max(error, 1e-8);
    let growth = SAFETY * size ** -0.25;
    if (this.#lastError > 0) {
      // where the error has been rising, expect it to go on (Gustafsson's predictive controller)
      growth = Math.min(growth, SAFETY * (h / this.#lastSpan) * (this.#lastError / (size * size)) ** 0.25);
    }
    this.#lastError = Math.max(error, 1e-2);
    this.#lastSpan = h;
    // after a rejection the next step does not grow; a step cut short by a target says nothing against the old size
    const next = h * Math.min(this.#grow ? MOST_GROWTH : 1, Math.max(LEAST_SHRINK, growth));
    this.#h = to === target && error <= 1 ? Math.max(next, this.#h * (error < 0.5 ? 1 : 0)) : next;
    this.#grow = true;
    stepper.proceed(to);
    this.#now = this.#read(to);
    const ends = this.#show(start, this.#now);
    this.openGap.advance(system.circuit, to);
    this.#switches(to);
    if (ends || this.time >= this.#settings.until) this.#done = true;
  }

  /** Corners, changes of feed and the trip, at the end of a step. */
  #switches(t: number): void {
    const { system, trip } = this;
    const { circuit, layout } = system;
    let changed = false;
    const y = this.#stepper.start;
    const take = (voltage: number): void => {
      y[layout.voltage] = voltage;
      system.settle(y);
      this.#stepper.begin(t);
      this.#now = this.#read(t);
      changed = true;
    };
    if (trip && !trip.acted && t >= trip.actsAt) {
      trip.acted = true;
      take(circuit.act(trip.settings.action, t, y[layout.voltage]));
    } else if (circuit.limit !== null && circuit.excess(t, y[layout.voltage], this.#needed) > -DUE) {
      take(circuit.change(t, y[layout.voltage], this.#needed));
    }
    // the new feed may be past its own end at once: an ideal supply whose slope asks for more than the limit
    for (let k = 0; changed && k < 2 && circuit.excess(t, y[layout.voltage], this.#needed) > DUE; k++) {
      take(circuit.change(t, y[layout.voltage], this.#needed));
    }
    if (changed || (t > 0 && circuit.isCorner(t))) this.#h = Math.min(this.#h, 0.05 * this.#settings.ionTransit);
  }

  /** Takes down the rates of the state just linearised. */
  #read(t: number): Instant {
    const { system } = this;
    const { circuit, layout } = system;
    const y = this.#stepper.start;
    this.#needed = system.neededCurrent;
    return {
      time: t,
      y,
      current: system.current,
      supplyCurrent: system.supplyCurrent,
      supplyVoltage: circuit.feed === 'ideal' ? y[layout.voltage] : circuit.supplyVoltage(t),
      voltageRate: system.voltageRate,
      totalCurrent: -system.totalCurrentDensity * system.grid.area,
    };
  }

  #show(start: Instant, end: Instant): boolean {
    const stepper = this.#stepper;
    const { system, openGap } = this;
    const scratch = this.#scratch;
    const rates = this.#scratchRates;
    const from = start.time;
    const span = end.time - from;
    const step: Step = {
      start,
      end,
      openGapAt: (t) => openGap.at(system.circuit, t),
      stateAt: (t, out) => {
        if (t >= end.time) out.set(end.y);
        else if (t <= from) out.set(start.y);
        else stepper.stateAt((t - from) / span, out);
      },
      unknownAt: (t, index) => {
        if (t >= end.time) return end.y[index];
        return t <= from ? start.y[index] : stepper.unknownAt((t - from) / span, index);
      },
      currentOf: (t, y) => {
        system.rates(t, y, rates);
        return system.current;
      },
      crossing: (before, after, g) => {
        const at = (theta: number): number => {
          stepper.stateAt(theta, scratch);
          return g(from + theta * span, scratch);
        };
        return from + span * locate(at, before, after, EVENT_PLACE);
      },
    };
    let ends = false;
    for (const o of this.#observers) if (o.look(step)) ends = true;
    return ends;
  }
}

/** The cell with the largest relative error of the last attempt, for the message of a failure. */
function worstCell(stepper: Stepper, system: GapSystem): number {
  const { layout } = system;
  let worst = 0;
  let cell = 0;
  for (let k = 0; k < layout.species; k++) {
    for (let i = 0; i < layout.cells; i++) {
      const at = k * layout.row + layout.first + i;
      const r = Math.abs(stepper.error[at]) / (Math.abs(stepper.start[at]) + Number.MIN_VALUE);
      if (r > worst || Number.isNaN(r)) {
        worst = r;
        cell = i;
      }
    }
  }
  return cell;
}
