import type { Polarity, YieldEnd } from './instant-case.ts';
import type { Answer, HoldOffRequest } from './request.ts';
import { HOLD_OFF_TOLERANCE } from './simulated.ts';
import type { Beyond, ThresholdCurve } from './threshold.ts';

/** A density at which the hold-off voltage was simulated. */
interface Node {
  readonly logDensity: number;
  /** highest voltage that holds [V]; null when the simulation gave no answer */
  readonly holdOff: number | null;
  /** its logarithm over theory's */
  readonly logRatio: number;
  /** relative width of the bracket above it */
  readonly width: number;
  readonly failure: string | null;
}

/** Relative width of the first stretch looked at where nothing near has been simulated: theory is seldom wrong by more. */
const FIRST_SPREAD = HOLD_OFF_TOLERANCE;
/** How much of the ratio of simulation to theory may change over a factor e in density beyond the simulated ones. */
const UNKNOWN_CHANGE = 0.01;
/** Digits of a density that is simulated: densities closer than that are the same gap. */
const DIGITS = 5;

/** Hold-off voltage against density, for one polarity and one end of the yields: simulated at some densities; in between, theory times the ratio of simulation
 *  to theory, linear in ln N between the nearest simulated ones. The ratio differs from one by little and changes slowly. */
export class HoldOffCurve {
  readonly theory: ThresholdCurve;
  readonly polarity: Polarity;
  readonly yields: YieldEnd;
  readonly #nodes = new Map<number, Node>();
  /** nodes with an answer, rising in density */
  #known: Node[] = [];
  #leans = true;

  constructor(theory: ThresholdCurve, polarity: Polarity, yields: YieldEnd) {
    this.theory = theory;
    this.polarity = polarity;
    this.yields = yields;
  }

  /** Why there is no hold-off voltage at this density; null where there is one. */
  beyond(density: number): Beyond | null {
    const beyond = this.theory.beyond(density);
    return beyond ?? (this.#nodes.get(rounded(density))?.holdOff === null ? 'no-answer' : null);
  }

  /** Hold-off voltage [V], simulated or expected; null where theory has none. */
  at(density: number): number | null {
    const node = this.#nodes.get(rounded(density));
    if (node !== undefined) return node.holdOff;
    const threshold = this.theory.at(density);
    return threshold === null ? null : threshold.voltage * Math.exp(this.#ratioAt(Math.log(density)));
  }

  isSimulated(density: number): boolean {
    return this.#nodes.has(rounded(density));
  }

  /** Why a simulation gave no answer here; null where it did or was not asked. */
  failureAt(density: number): string | null {
    return this.#nodes.get(rounded(density))?.failure ?? null;
  }

  /** Why simulations gave no answer, where they did not. */
  get failures(): string[] {
    return [...this.#nodes.values()].flatMap(({ failure }) => failure ?? []);
  }

  /** What to ask of a simulation at this density; null where theory has no threshold to begin from. */
  request(density: number): HoldOffRequest | null {
    const there = rounded(density);
    const threshold = this.theory.at(there);
    if (threshold === null) return null;
    const { ratio, spread } = this.#expected(Math.log(there));
    return {
      kind: 'hold-off',
      density: there,
      polarity: this.polarity,
      yields: this.yields,
      path: Number(threshold.path.toPrecision(6)),
      expected: Number((threshold.voltage * Math.exp(ratio)).toPrecision(6)),
      spread: Number(spread.toPrecision(3)),
    };
  }

  /** Takes the answer to a request. */
  learn({ density, yields }: HoldOffRequest, answer: Answer): void {
    if (yields !== this.yields || answer.kind === 'lag') throw new Error('the answer to another question');
    const holdOff = answer.kind === 'hold-off' ? answer.lower : null;
    const theory = this.theory.at(density)?.voltage ?? Number.NaN;
    const node: Node = {
      logDensity: Math.log(density),
      holdOff,
      logRatio: holdOff === null ? Number.NaN : Math.log(holdOff / theory),
      width: answer.kind === 'hold-off' && holdOff !== null && answer.upper !== null ? Math.log(answer.upper / holdOff) : 0,
      failure: answer.kind === 'failed' ? answer.reason : holdOff === null ? (answer.note ?? 'no voltage was found to hold') : null,
    };
    this.#nodes.set(density, node);
    if (holdOff === null) return;
    this.#known = [...(this.#leans ? [] : this.#known), node].sort((a, b) => a.logDensity - b.logDensity);
    this.#leans = false;
  }

  /** Takes ratios from another curve as long as nothing of this one has been simulated: a strong seed, say, lowers all of them alike. */
  lean(other: HoldOffCurve): void {
    if (this.#leans) this.#known = other.#known;
  }

  /** ln of simulation over theory */
  #ratioAt(logDensity: number): number {
    const [below, above] = this.#neighbours(logDensity);
    if (below === null || above === null) return (below ?? above)?.logRatio ?? 0;
    if (above.logDensity === below.logDensity) return below.logRatio;
    const share = (logDensity - below.logDensity) / (above.logDensity - below.logDensity);
    return below.logRatio + share * (above.logRatio - below.logRatio);
  }

  /** Middle of the expected bracket, ln over theory, and its width. */
  #expected(logDensity: number): { readonly ratio: number; readonly spread: number } {
    const [below, above] = this.#neighbours(logDensity);
    if (below === null && above === null) return { ratio: 0, spread: FIRST_SPREAD };
    const half = Math.max(below?.width ?? 0, above?.width ?? 0) / 2;
    const change =
      below !== null && above !== null
        ? Math.abs(above.logRatio - below.logRatio)
        : UNKNOWN_CHANGE * Math.abs(logDensity - (below ?? above ?? { logDensity }).logDensity);
    return { ratio: this.#ratioAt(logDensity) + half, spread: Math.max(HOLD_OFF_TOLERANCE, change) };
  }

  #neighbours(logDensity: number): [below: Node | null, above: Node | null] {
    const nodes = this.#known;
    let [low, high] = [-1, nodes.length];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (nodes[middle].logDensity <= logDensity) low = middle;
      else high = middle;
    }
    return [nodes[low] ?? null, nodes[high] ?? null];
  }
}

function rounded(density: number): number {
  return Number(density.toPrecision(DIGITS));
}
