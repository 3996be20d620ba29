import type { Observer, Step } from '../march/march.ts';
import { OpenGap } from '../supply/open-gap.ts';
import type { RunContext } from './context.ts';
import { followOpenGap, turnOfOpenGap } from './highest-voltage.ts';

/** Missing share of the supply's voltage that still counts as charging. */
const STILL_CHARGING = 0.01;
/** Share of the open-gap voltage that the current must take to load the gap. */
const LOADED = 0.01;

/** The largest open-gap voltages of a run, of either sign, and the largest voltage the gap itself saw. */
export class OpenGapWatch implements Observer {
  readonly #context: RunContext;
  /** V_open of the largest magnitude, with its sign [V]; the first of equals */
  largest = 0;
  highest = 0;
  lowest = 0;
  /** |V| [V] */
  largestGapVoltage = 0;

  constructor(context: RunContext) {
    this.#context = context;
  }

  look(step: Step): boolean {
    const { start, end } = step;
    const { circuit, layout } = this.#context.system;
    this.largestGapVoltage = Math.max(this.largestGapVoltage, Math.abs(start.y[layout.voltage]), Math.abs(end.y[layout.voltage]));
    this.#take(step.openGapAt(start.time));
    if (circuit.feed !== 'open') {
      const turned = turnOfOpenGap(circuit, step.openGapAt, start.time, end.time);
      if (turned !== null) this.#take(turned);
    }
    this.#take(step.openGapAt(end.time));
    return false;
  }

  /** Takes in what the open gap would still see after the run has ended early, so that an early end changes nothing. */
  lookAhead(): void {
    const { march, system, settings } = this.#context;
    const { openGap, time } = march();
    if (system.circuit.feed === 'open') return;
    const ahead = new OpenGap(system.circuit, system.capacitance, openGap.voltage, time);
    followOpenGap(system.circuit, ahead, time, settings.observe.until, (voltage) => this.#take(voltage));
  }

  /** Is the open gap still on its way up to the supply's voltage? */
  charging(): boolean {
    const { march, system } = this.#context;
    const { openGap, time } = march();
    if (system.circuit.feed === 'open') return false;
    return Math.abs(system.circuit.supplyVoltage(time)) > (1 + STILL_CHARGING) * Math.abs(openGap.voltage);
  }

  /** Does the current keep the gap's voltage below that of the open gap now? */
  loaded(): boolean {
    const { march, system } = this.#context;
    const { openGap, state } = march();
    return Math.abs(state[system.layout.voltage]) < (1 - LOADED) * Math.abs(openGap.voltage);
  }

  #take(voltage: number): void {
    if (Math.abs(voltage) > Math.abs(this.largest)) this.largest = voltage;
    this.highest = Math.max(this.highest, voltage);
    this.lowest = Math.min(this.lowest, voltage);
  }
}
