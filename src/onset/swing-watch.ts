import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';
import { Swings } from './swings.ts';

/** Follows the swings of the gap voltage. */
export class SwingWatch implements Observer {
  readonly #system: GapSystem;
  readonly swings: Swings;

  /** @param smallest swing that counts [V] */
  constructor(system: GapSystem, smallest: number) {
    this.#system = system;
    this.swings = new Swings(smallest);
  }

  look(step: Step): boolean {
    const { start, end } = step;
    if (end.time > start.time && start.voltageRate * end.voltageRate < 0) this.#turn(step);
    this.swings.add(end.time, this.#voltage(end.y));
    return false;
  }

  /** Where dV/dt, taken as straight over the step, is zero: the voltage there is right to second order in what that misses. */
  #turn(step: Step): void {
    const { start, end } = step;
    const time = start.time + ((end.time - start.time) * start.voltageRate) / (start.voltageRate - end.voltageRate);
    this.swings.add(time, step.unknownAt(time, this.#system.layout.voltage));
  }

  #voltage(y: Float64Array): number {
    return y[this.#system.layout.voltage];
  }
}
