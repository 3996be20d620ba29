import type { GapSystem } from '../march/gap-system.ts';
import type { Observer, Step } from '../march/march.ts';

interface Level {
  readonly level: number;
  time: number | null;
  voltage: number | null;
}

/** The largest conduction current of a run, and when |I| first reaches each of the levels asked for. */
export class CurrentsWatch implements Observer {
  readonly #system: GapSystem;
  readonly #scratch: Float64Array;
  /** current with its sign [A], and the gap voltage then [V] */
  peak: { readonly current: number; readonly time: number; readonly voltage: number } = { current: 0, time: 0, voltage: 0 };
  readonly levels: readonly Level[];

  /** @param levels [A], rising */
  constructor(system: GapSystem, levels: readonly number[]) {
    this.#system = system;
    this.#scratch = new Float64Array(system.layout.size);
    this.levels = levels.map((level) => ({ level, time: null, voltage: null }));
  }

  look(step: Step): boolean {
    const { start, end } = step;
    const top = this.#top(step);
    this.#take(end.current, end.time, end.y[this.#system.layout.voltage]);
    if (top !== null) this.#take(Math.sign(end.current) * top.current, top.time, this.#voltageAt(step, top.time));
    const most = Math.max(Math.abs(end.current), top?.current ?? 0);
    for (const l of this.levels) {
      if (l.time !== null) continue;
      if (most < l.level) break;
      l.time = Math.abs(start.current) >= l.level ? start.time : this.#reached(step, l.level, top);
      l.voltage = this.#voltageAt(step, l.time);
    }
    return false;
  }

  #take(current: number, time: number, voltage: number): void {
    if (Math.abs(current) > Math.abs(this.peak.current)) this.peak = { current, time, voltage };
  }

  /** The maximum of |I| inside a step, as far as it exceeds both ends and matters; null if there is none. */
  #top(step: Step): { current: number; time: number } | null {
    const { start, end } = step;
    const span = end.time - start.time;
    const first = Math.abs(start.current);
    const last = Math.abs(end.current);
    // while the current still grows by more than half a step, its maximum lies ahead
    const near = last < 1.5 * first && 1.2 * Math.max(first, last) > Math.abs(this.peak.current);
    if (!(span > 0 && near)) return null;
    const at = (theta: number): number => Math.abs(this.#currentAt(step, start.time + theta * span));
    const inside = last < first ? at(0.1) > first : at(0.9) > last;
    if (!inside) return null;
    const best = maximise(at);
    const current = at(best);
    return current > Math.max(first, last) ? { current, time: start.time + best * span } : null;
  }

  /** When |I| passes a level that it is below at the start of the step, on the way to its end or to the top inside. */
  #reached(step: Step, level: number, top: { readonly time: number } | null): number {
    const { start, end } = step;
    if (end.time === start.time) return end.time;
    const excess = (current: number): number => Math.log(Math.max(Math.abs(current), 1e-300) / level);
    const last = excess(end.current);
    if (last >= 0) return step.crossing(excess(start.current), last, (t, y) => excess(step.currentOf(t, y)));
    let low = start.time;
    let high = top?.time ?? end.time;
    for (let k = 0; k < 40; k++) {
      const middle = (low + high) / 2;
      if (excess(this.#currentAt(step, middle)) < 0) low = middle;
      else high = middle;
    }
    return high;
  }

  #currentAt(step: Step, time: number): number {
    step.stateAt(time, this.#scratch);
    return step.currentOf(time, this.#scratch);
  }

  #voltageAt(step: Step, time: number): number {
    return step.unknownAt(time, this.#system.layout.voltage);
  }
}

/** Where f is largest in [0, 1]: the best of three points inside, then three parabolas through the best and its neighbours.
 *  On the smooth dense output of a step that leaves the maximum itself right to 1e-5. */
function maximise(f: (theta: number) => number): number {
  const points = [0, 0.25, 0.5, 0.75, 1].map((theta) => ({ theta, value: f(theta) }));
  for (let k = 0; k < 3; k++) {
    const best = points.reduce((top, p, i) => (p.value > points[top].value ? i : top), 0);
    if (best === 0 || best === points.length - 1) break;
    const [a, b, c] = points.slice(best - 1, best + 2);
    const left = (b.theta - a.theta) * (b.value - c.value);
    const right = (b.theta - c.theta) * (b.value - a.value);
    const theta = b.theta - (0.5 * ((b.theta - a.theta) * left - (b.theta - c.theta) * right)) / (left - right);
    if (!(theta > a.theta && theta < c.theta) || Math.abs(theta - b.theta) < 1e-4) break;
    points.push({ theta, value: f(theta) });
    points.sort((p, q) => p.theta - q.theta);
  }
  return points.reduce((top, p) => (p.value > top.value ? p : top)).theta;
}
