import type { Observer, Step } from '../march/march.ts';
import { type RunContext, thresholdFor } from './context.ts';
import { type Distortion, SPACE_CHARGE_DISTORTION } from './distortion.ts';
import type { Onset } from './outcome.ts';
import type { Passing, ThresholdWatch } from './threshold-watch.ts';

/** Share of the open-gap voltage through which the gap voltage falls when it collapses. */
const COLLAPSE_SHARE = 0.9;

/** One start of a discharge: the threshold it came from and the space charge it led to. */
interface Rise {
  readonly threshold: Passing;
  spaceCharge: Passing | null;
}

/** Threshold, space charge and collapse, each located within its step on the dense output.
 *
 *  The threshold is the last upward crossing before the lag ends, and the lag ends with the collapse or, in a run without one, with
 *  the first space charge. So every crossing before a collapse begins anew, and the first rise that reached space charge is kept
 *  for the case that no collapse follows. */
export class LagWatch implements Observer {
  readonly #context: RunContext;
  readonly #threshold: ThresholdWatch;
  readonly #distortion: Distortion;
  #latest: Rise | null = null;
  #firstToSpaceCharge: Rise | null = null;
  #collapse: Passing | null = null;
  /** the first distortion of all, for a run that never reaches threshold */
  #firstDistortion: Passing | null = null;
  largestDistortion = 0;

  /** @param threshold looks before this one */
  constructor(context: RunContext, threshold: ThresholdWatch, distortion: Distortion) {
    this.#context = context;
    this.#threshold = threshold;
    this.#distortion = distortion;
  }

  look(step: Step): boolean {
    const { rose } = this.#threshold;
    if (rose !== null && this.#collapse === null) this.#latest = { threshold: rose, spaceCharge: null };
    this.#lookForSpaceCharge(step);
    this.#lookForCollapse(step);
    return false;
  }

  /** Everything but the growth rate. */
  onset(): Omit<Onset, 'growth_rate_per_s'> {
    const rise = this.#collapse === null ? (this.#firstToSpaceCharge ?? this.#latest) : this.#latest;
    const threshold = rise?.threshold ?? null;
    const spaceCharge = rise === null ? this.#firstDistortion : rise.spaceCharge;
    const end = this.#collapse ?? spaceCharge;
    const lag = threshold === null || end === null ? null : { time: end.time - threshold.time, voltage: end.voltage };
    return {
      threshold_time_s: threshold?.time ?? null,
      space_charge_time_s: spaceCharge?.time ?? null,
      collapse_time_s: this.#collapse?.time ?? null,
      formative_lag_s: lag?.time ?? null,
      lag_ends_at: lag === null ? null : this.#collapse === null ? 'space-charge' : 'collapse',
      gap_voltage_V: lag?.voltage ?? null,
    };
  }

  #lookForSpaceCharge(step: Step): void {
    const { start, end } = step;
    const after = this.#distortion.of(end.y);
    this.largestDistortion = Math.max(this.largestDistortion, after);
    const sought = this.#firstDistortion === null || (this.#latest !== null && this.#latest.spaceCharge === null);
    if (after < SPACE_CHARGE_DISTORTION || !sought) return;
    const excess = (y: Float64Array): number => this.#distortion.of(y) - SPACE_CHARGE_DISTORTION;
    const before = excess(start.y);
    const time = before < 0 && end.time > start.time ? step.crossing(before, excess(end.y), (_t, y) => excess(y)) : start.time;
    this.#firstDistortion ??= this.#at(step, time);
    if (this.#latest === null || this.#latest.spaceCharge !== null) return;
    this.#latest.spaceCharge = this.#at(step, Math.max(time, this.#latest.threshold.time));
    this.#firstToSpaceCharge ??= this.#latest;
  }

  #lookForCollapse(step: Step): void {
    if (this.#collapse !== null || this.#latest === null) return;
    const { system, march } = this.#context;
    const { start, end } = step;
    if (end.time === start.time || system.circuit.feed === 'ideal' || march().trip?.acted) return;
    const fallen = (t: number, y: Float64Array): number => {
      const open = step.openGapAt(t);
      return COLLAPSE_SHARE * Math.abs(open) - y[system.layout.voltage] * Math.sign(open);
    };
    const before = fallen(start.time, start.y);
    const after = fallen(end.time, end.y);
    if (!(before < 0 && after >= 0)) return;
    const time = step.crossing(before, after, fallen);
    const open = step.openGapAt(time);
    const least = thresholdFor(this.#context, open);
    if (time < this.#latest.threshold.time || least === null || Math.abs(open) < least) return;
    this.#collapse = this.#at(step, time);
  }

  #at(step: Step, time: number): Passing {
    return { time, voltage: step.unknownAt(time, this.#context.system.layout.voltage) };
  }
}
