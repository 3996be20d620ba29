import type { Observer, Step } from '../march/march.ts';
import { cathodeDistortion } from '../observables/walls.ts';
import { distortionFloor, type RunContext, thresholdFor } from './context.ts';

/** Field distortion at which space charge has set in. */
export const SPACE_CHARGE_DISTORTION = 0.1;
/** Share of the open-gap voltage through which the gap voltage falls when it collapses. */
const COLLAPSE_SHARE = 0.9;

/** Threshold, space charge, collapse, current levels and peak, each located within its step on the dense output. */
export class EventWatch implements Observer {
  readonly #context: RunContext;
  readonly #scratch: Float64Array;
  thresholdTime: number | null = null;
  spaceChargeTime: number | null = null;
  spaceChargeVoltage = 0;
  collapseTime: number | null = null;
  collapseVoltage = 0;
  /** the first distortion of all, whatever the threshold */
  #firstDistortion: { time: number; voltage: number } | null = null;
  /** longest unbroken stretch with q_L > 1 [s] and total time [s] */
  aboveThreshold = 0;
  largestOpenGap = 0;
  largestOpenGapSign = 0;
  largestGapVoltage = 0;
  largestDistortion = 0;
  readonly levels: { level: number; time: number | null; voltage: number | null }[];
  peak: { current: number; time: number; voltage: number };
  /** extremes of the gap voltage: time, voltage, +1 maximum / −1 minimum; the latest few hundred */
  extremes: { time: number; voltage: number; kind: 1 | -1 }[] = [];

  constructor(context: RunContext) {
    this.#context = context;
    this.#scratch = new Float64Array(context.system.layout.size);
    this.levels = context.settings.observe.currents.map((level) => ({ level, time: null, voltage: null }));
    this.peak = { current: 0, time: 0, voltage: 0 };
  }

  /** Start of the lag's end: collapse if there is one, else space charge. */
  get lagEnd(): { time: number; voltage: number; kind: 'collapse' | 'space-charge' } | null {
    if (this.thresholdTime === null) return null;
    if (this.collapseTime !== null) return { time: this.collapseTime, voltage: this.collapseVoltage, kind: 'collapse' };
    const space = this.spaceCharge;
    return space === null ? null : { ...space, kind: 'space-charge' };
  }

  /** Onset of space charge: after threshold, or at any time where q_L never reaches 1. */
  get spaceCharge(): { time: number; voltage: number } | null {
    if (this.thresholdTime === null) return this.#firstDistortion;
    return this.spaceChargeTime === null ? null : { time: this.spaceChargeTime, voltage: this.spaceChargeVoltage };
  }

  look(step: Step): boolean {
    this.#open(step);
    this.#threshold(step);
    this.#spaceCharge(step);
    this.#collapse(step);
    this.#levels(step);
    this.#peak(step);
    this.#extremes(step);
    return false;
  }

  #voltage(y: Float64Array): number {
    return y[this.#context.system.layout.voltage];
  }

  #open(step: Step): void {
    this.largestGapVoltage = Math.max(this.largestGapVoltage, Math.abs(this.#voltage(step.end.y)));
    for (const t of [step.start.time, step.end.time]) {
      const open = step.openGapAt(t);
      if (Math.abs(open) <= this.largestOpenGap) continue;
      this.largestOpenGap = Math.abs(open);
      this.largestOpenGapSign = Math.sign(open);
    }
  }

  #threshold(step: Step): void {
    const { start, end } = step;
    const excess = (y: Float64Array): number => this.#context.feedback(this.#voltage(y)) - 1;
    const after = excess(end.y);
    if (end.time === start.time) {
      if (after >= 0) this.thresholdTime = end.time;
      return;
    }
    const before = excess(start.y);
    if (before >= 0 && after >= 0) this.aboveThreshold += end.time - start.time;
    if (this.spaceChargeTime !== null || this.collapseTime !== null) return;
    // a jump of an ideal supply between two steps is a crossing at the start
    if (before >= 0 && this.#wasBelow) this.thresholdTime = start.time;
    if (before < 0 && after >= 0) this.thresholdTime = step.crossing(before, after, (_t, y) => excess(y));
    this.#wasBelow = after < 0;
  }

  #wasBelow = false;

  #distortion(y: Float64Array): number {
    const { system, settings } = this.#context;
    return cathodeDistortion(system.layout, settings.gap.spacing, distortionFloor(this.#context, this.#voltage(y)), y);
  }

  #spaceCharge(step: Step): void {
    const { start, end } = step;
    const after = this.#distortion(end.y) - SPACE_CHARGE_DISTORTION;
    this.largestDistortion = Math.max(this.largestDistortion, after + SPACE_CHARGE_DISTORTION);
    if (after < 0 || (this.spaceChargeTime !== null && this.#firstDistortion !== null)) return;
    const before = this.#distortion(start.y) - SPACE_CHARGE_DISTORTION;
    let time = start.time;
    if (before < 0 && end.time > start.time) time = step.crossing(before, after, (_t, y) => this.#distortion(y) - SPACE_CHARGE_DISTORTION);
    if (this.thresholdTime !== null && time < this.thresholdTime) time = this.thresholdTime;
    const voltage = this.#voltageAt(step, time);
    this.#firstDistortion ??= { time, voltage };
    if (this.thresholdTime !== null && this.spaceChargeTime === null) {
      this.spaceChargeTime = time;
      this.spaceChargeVoltage = voltage;
    }
  }

  #collapse(step: Step): void {
    if (this.collapseTime !== null || this.thresholdTime === null) return;
    const { system } = this.#context;
    const { start, end } = step;
    if (end.time === start.time || system.circuit.feed === 'ideal' || this.#context.march().trip?.acted) return;
    const fallen = (t: number, V: number): number => {
      const open = step.openGapAt(t);
      return COLLAPSE_SHARE * Math.abs(open) - V * Math.sign(open);
    };
    const after = fallen(end.time, this.#voltage(end.y));
    const before = fallen(start.time, this.#voltage(start.y));
    if (!(before < 0 && after >= 0)) return;
    const time = step.crossing(before, after, (t, y) => fallen(t, this.#voltage(y)));
    const open = step.openGapAt(time);
    const least = thresholdFor(this.#context, open);
    if (time < this.thresholdTime || least === null || Math.abs(open) < least) return;
    this.collapseTime = time;
    this.collapseVoltage = this.#voltageAt(step, time);
  }

  #levels(step: Step): void {
    const before = Math.abs(step.start.current);
    const after = Math.abs(step.end.current);
    for (const l of this.levels) {
      if (l.time !== null || after < l.level) continue;
      l.time =
        before >= l.level || step.end.time === step.start.time
          ? step.start.time
          : step.crossing(Math.log(Math.max(before, 1e-300) / l.level), Math.log(after / l.level), (t, y) =>
              Math.log(Math.max(Math.abs(step.currentOf(t, y)), 1e-300) / l.level),
            );
      l.voltage = this.#voltageAt(step, l.time);
    }
  }

  /** A maximum inside a step shows as a current that rises at its start and falls by its end, or the reverse of the ends. */
  #peak(step: Step): void {
    const { start, end } = step;
    const take = (time: number, current: number, y: Float64Array): void => {
      if (Math.abs(current) > Math.abs(this.peak.current)) this.peak = { current, time, voltage: this.#voltage(y) };
    };
    const span = end.time - start.time;
    const first = Math.abs(start.current);
    const last = Math.abs(end.current);
    // while the current still grows by more than half a step, its maximum lies ahead
    const near = last < 1.5 * first && 1.2 * Math.max(first, last) > Math.abs(this.peak.current);
    if (span > 0 && near) {
      const at = (theta: number): number => {
        step.stateAt(start.time + theta * span, this.#scratch);
        return Math.abs(step.currentOf(start.time + theta * span, this.#scratch));
      };
      const inside = last < first ? at(0.1) > first : at(0.9) > last;
      if (inside) {
        const best = maximise(at);
        const current = at(best);
        if (current > Math.max(first, last)) take(start.time + best * span, Math.sign(end.current) * current, this.#scratch);
      }
    }
    take(end.time, end.current, end.y);
  }

  #extremes(step: Step): void {
    const { start, end } = step;
    const span = end.time - start.time;
    if (!(span > 0) || !(start.voltageRate * end.voltageRate < 0)) return;
    const theta = start.voltageRate / (start.voltageRate - end.voltageRate);
    const time = start.time + theta * span;
    this.extremes.push({ time, voltage: this.#voltageAt(step, time), kind: start.voltageRate > 0 ? 1 : -1 });
    if (this.extremes.length > 400) this.extremes = this.extremes.slice(-200);
  }

  #voltageAt(step: Step, time: number): number {
    step.stateAt(time, this.#scratch);
    return this.#voltage(this.#scratch);
  }
}

/** Where f is largest in [0, 1], by golden section to 1e-3: the maximum itself is then right to 1e-6. */
function maximise(f: (theta: number) => number): number {
  const golden = (Math.sqrt(5) - 1) / 2;
  let a = 0;
  let b = 1;
  let x1 = b - golden;
  let x2 = golden;
  let f1 = f(x1);
  let f2 = f(x2);
  while (b - a > 1e-3) {
    if (f1 > f2) {
      b = x2;
      x2 = x1;
      f2 = f1;
      x1 = b - golden * (b - a);
      f1 = f(x1);
    } else {
      a = x1;
      x1 = x2;
      f1 = f2;
      x2 = a + golden * (b - a);
      f2 = f(x2);
    }
  }
  return (a + b) / 2;
}
