import type { Observer, Step } from '../march/march.ts';
import { carriers } from '../observables/charge.ts';
import { cathodeDistortion, seedShare } from '../observables/walls.ts';
import { distortionFloor, type RunContext } from './context.ts';
import { SPACE_CHARGE_DISTORTION } from './event-watch.ts';
import { Trace } from './trace.ts';

/** Largest share of the seed in the cathode's emission of a discharge that sustains itself. */
const LARGEST_SEED_SHARE = 0.01;
/** Relative fall over one ion transit that counts as decay. */
const DECAY = 0.01;
/** Gap charge below this share of its peak counts as died out. */
const DIED_OUT = 1e-6;

/** Follows whether the discharge sustains itself, has died out, or has settled. */
export class SustainWatch implements Observer {
  readonly #context: RunContext;
  readonly trace: Trace = new Trace();
  /** self-sustaining with distorted field at some time: breakdown */
  brokeDown = false;
  selfSustaining = false;
  distortedNow = false;
  #everAbove = false;
  #peakCarriers = 0;
  carriersNow = 0;
  #lastUnsettled = 0;
  largestArcTime = 0;
  #arcSince: number | null = null;
  arcRisk = false;
  /** lowest current at which q_L first exceeded 1, for the reason */
  currentAtThreshold: number | null = null;

  constructor(context: RunContext) {
    this.#context = context;
  }

  look(step: Step): boolean {
    const { system, settings } = this.#context;
    const { layout, grid } = system;
    const { end, start } = step;
    const y = end.y;
    const V = y[layout.voltage];
    this.trace.add(end.time, end.current, V);
    const q = this.#context.feedback(V);
    const distortion = cathodeDistortion(layout, grid.spacing, distortionFloor(this.#context, V), y);
    this.distortedNow = distortion >= SPACE_CHARGE_DISTORTION;
    this.carriersNow = carriers(grid, layout, y);
    this.#peakCarriers = Math.max(this.#peakCarriers, this.carriersNow);
    if (q >= 1) {
      this.#everAbove = true;
      this.currentAtThreshold ??= Math.abs(end.current);
    }
    if (this.#faded()) this.#everAbove = q >= 1;
    const share = seedShare(system.equations.at, V >= 0, layout.cells);
    this.selfSustaining =
      share < LARGEST_SEED_SHARE &&
      end.current !== 0 &&
      this.growthOverTransit(end.time, end.current) > -DECAY &&
      (q >= 1 || this.#everAbove || this.distortedNow);
    if (this.selfSustaining && this.distortedNow) this.brokeDown = true;
    this.#watchArc(end.time, Math.abs(end.current), Math.abs(V));
    if (end.time > start.time) this.#watchRates(step, q, settings.observe.until);
    return this.stopsAs(end.time, q) !== null;
  }

  /** ln of the growth of |I| over the last ion transit; +Infinity while there is no past to compare with. */
  growthOverTransit(t: number, current: number): number {
    const past = this.trace.currentAt(t - this.#context.ionTransit);
    if (past === null || past === 0) return Infinity;
    return Math.log(Math.abs(current) / past);
  }

  /** Why the run may end at t, or null. */
  stopsAs(t: number, q: number): 'steady' | 'died-out' | 'tripped-out' | 'model-limit' | null {
    const march = this.#context.march();
    if (this.#arcSince !== null && t - this.#arcSince > ARC_SECONDS) return 'model-limit';
    if (march.trip !== null && Number.isFinite(march.trip.actsAt)) return null;
    const { circuit } = march.system;
    if (this.#quiet(t)) return march.trip?.acted ? 'tripped-out' : 'died-out';
    if (circuit.nextCorner(t) < Infinity && circuit.feed !== 'open') return null;
    if (!(q <= 1.0001 || this.distortedNow)) return null;
    const { ionTransit } = this.#context;
    const window = Math.max(10 * ionTransit, 5 * circuit.resistance * march.system.capacitance);
    return t - this.#lastUnsettled >= window ? 'steady' : null;
  }

  /** Gap charge gone, or down to what the seed keeps, and nothing to come that could lift the voltage above V_s. */
  #quiet(t: number): boolean {
    const march = this.#context.march();
    if (!(this.#peakCarriers > 0) || t < this.#context.ionTransit) return false;
    const { system } = march;
    const V = march.state[system.layout.voltage];
    const least = Math.min(this.#context.threshold.positive ?? Infinity, this.#context.threshold.negative ?? Infinity);
    const future = system.circuit.feed === 'open' ? 0 : system.circuit.largestSupplyFrom(t);
    if (Math.max(Math.abs(V), future) >= least) return false;
    return this.#faded();
  }

  #faded(): boolean {
    return this.carriersNow <= DIED_OUT * this.#peakCarriers || (this.#fell && this.#atSeedLevel());
  }

  /** has the charge once been far above what it is now? */
  get #fell(): boolean {
    return this.carriersNow < 1e-2 * this.#peakCarriers;
  }

  #atSeedLevel(): boolean {
    const { settings, feedback } = this.#context;
    const seed = settings.seed.cathodeCurrent;
    const march = this.#context.march();
    const V = march.state[march.system.layout.voltage];
    const q = feedback(V);
    if (!(seed > 0) || q >= 1) return false;
    const share = seedShare(march.system.equations.at, V >= 0, march.system.layout.cells);
    // steady below threshold, the seed's share of the emission is 1 − q
    return share >= 0.9 * (1 - q);
  }

  #watchRates(step: Step, q: number, until: number): void {
    const { settings, system } = this.#context;
    const { start, end } = step;
    const span = end.time - start.time;
    const left = until - end.time;
    const rate = (a: number, b: number): number => (a === b ? 0 : Math.abs(b - a) / (span * Math.max(Math.abs(a), Math.abs(b))));
    const V = system.layout.voltage;
    const fastest = Math.max(rate(start.y[V], end.y[V]), rate(start.current, end.current), rate(this.#previousCarriers, this.carriersNow));
    this.#previousCarriers = this.carriersNow;
    if (fastest * left > settings.numerics.tolerance || !(q <= 1.0001 || this.distortedNow)) this.#lastUnsettled = end.time;
  }

  #previousCarriers = 0;

  #watchArc(t: number, current: number, voltage: number): void {
    const j = current / this.#context.settings.gap.area;
    const power = voltage * j > ARC_POWER_DENSITY;
    const beyond = j > ARC_CURRENT_DENSITY || current > ARC_CURRENT;
    if (beyond) this.arcRisk = true;
    if (!(beyond || power)) {
      this.#arcSince = null;
      return;
    }
    this.#arcSince ??= t;
    if (t - this.#arcSince > ARC_SECONDS) this.arcRisk = true;
  }
}

/** Where a glow may pass into an arc; common practice, from memory. */
const ARC_CURRENT_DENSITY = 1e3; // A/m², 0.1 A/cm²
const ARC_CURRENT = 1; // A
const ARC_POWER_DENSITY = 1e6; // W/m², 100 W/cm²
const ARC_SECONDS = 1e-3;
