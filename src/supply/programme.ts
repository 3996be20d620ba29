import type { Programme } from './settings.ts';

/** A programme as straight pieces: voltage and slope at any time, and the times of its corners. */
export class Voltage {
  readonly #times: Float64Array;
  readonly #values: Float64Array;

  constructor(times: readonly number[], values: readonly number[]) {
    this.#times = Float64Array.from(times);
    this.#values = Float64Array.from(values);
  }

  static of(programme: Programme): Voltage {
    switch (programme.kind) {
      case 'step':
        return programme.riseTime > 0
          ? new Voltage([0, programme.riseTime], [0, programme.voltage])
          : new Voltage([0], [programme.voltage]);
      case 'ramp': {
        const duration = Math.abs(programme.to - programme.from) / programme.rate;
        return duration > 0 ? new Voltage([0, duration], [programme.from, programme.to]) : new Voltage([0], [programme.to]);
      }
      case 'table':
        return new Voltage(programme.times, programme.voltages);
    }
  }

  /** [V] at time t [s]. */
  at(t: number): number {
    const x = this.#times;
    const last = x.length - 1;
    if (t <= x[0]) return this.#values[0];
    if (t >= x[last]) return this.#values[last];
    const i = this.#piece(t);
    return this.#values[i] + ((this.#values[i + 1] - this.#values[i]) * (t - x[i])) / (x[i + 1] - x[i]);
  }

  /** [V/s] just after time t. */
  slopeAfter(t: number): number {
    const x = this.#times;
    if (t < x[0] || t >= x[x.length - 1]) return 0;
    const i = this.#piece(t);
    return (this.#values[i + 1] - this.#values[i]) / (x[i + 1] - x[i]);
  }

  /** Times of the corners after `after` [s], rising. */
  cornersAfter(after: number): number[] {
    return Array.from(this.#times).filter((t) => t > after);
  }

  /** The first corner after t [s]; Infinity if there is none. */
  nextCorner(t: number): number {
    const x = this.#times;
    if (t >= x[x.length - 1]) return Infinity;
    if (t < x[0]) return x[0];
    return x[this.#piece(t) + 1];
  }

  isCorner(t: number): boolean {
    return this.#times.includes(t);
  }

  /** The largest |voltage| from time t [s] on. */
  largestFrom(t: number): number {
    let largest = Math.abs(this.at(t));
    for (let i = 0; i < this.#times.length; i++) if (this.#times[i] > t) largest = Math.max(largest, Math.abs(this.#values[i]));
    return largest;
  }

  /** Does the sign change between two times (or from zero to both signs)? Signs taken by the voltage in [from, to]. */
  signs(from: number, to: number): { positive: boolean; negative: boolean } {
    let positive = this.at(from) > 0 || this.at(to) > 0;
    let negative = this.at(from) < 0 || this.at(to) < 0;
    for (let i = 0; i < this.#times.length; i++) {
      if (this.#times[i] <= from || this.#times[i] >= to) continue;
      positive ||= this.#values[i] > 0;
      negative ||= this.#values[i] < 0;
    }
    return { positive, negative };
  }

  /** index i with times[i] <= t < times[i+1] */
  #piece(t: number): number {
    let low = 0;
    let high = this.#times.length - 1;
    while (high - low > 1) {
      const mid = (low + high) >> 1;
      if (this.#times[mid] <= t) low = mid;
      else high = mid;
    }
    return low;
  }
}
