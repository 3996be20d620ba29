/** Where a quantity turned. */
export interface Turn {
  readonly time: number;
  readonly value: number;
  /** +1 maximum, −1 minimum */
  readonly kind: 1 | -1;
}

/** How many turns are kept: enough to compare the last few periods. */
const KEPT = 32;

/** The maxima and minima of a quantity, taken down as it goes. A turn counts once the quantity has moved back by more than the
 *  smallest swing, so that small wiggles on a large swing pass unseen. */
export class Swings {
  readonly #smallest: number;
  #turns: Turn[] = [];
  /** direction of the present swing; 0 before the first */
  #direction: 1 | -1 | 0 = 0;
  #highest: { readonly time: number; readonly value: number } | null = null;
  #lowest: { readonly time: number; readonly value: number } | null = null;

  /** @param smallest swing that counts */
  constructor(smallest: number) {
    this.#smallest = smallest;
  }

  /** the latest turns, in order of time, maxima and minima by turns */
  get turns(): readonly Turn[] {
    return this.#turns;
  }

  add(time: number, value: number): void {
    if (this.#highest === null || value >= this.#highest.value) this.#highest = { time, value };
    if (this.#lowest === null || value <= this.#lowest.value) this.#lowest = { time, value };
    if (this.#direction >= 0 && this.#highest.value - value > this.#smallest) {
      if (this.#direction > 0) this.#keep({ ...this.#highest, kind: 1 });
      this.#direction = -1;
      this.#lowest = { time, value };
    } else if (this.#direction <= 0 && value - this.#lowest.value > this.#smallest) {
      if (this.#direction < 0) this.#keep({ ...this.#lowest, kind: -1 });
      this.#direction = 1;
      this.#highest = { time, value };
    }
  }

  #keep(turn: Turn): void {
    this.#turns.push(turn);
    if (this.#turns.length > 2 * KEPT) this.#turns = this.#turns.slice(-KEPT);
  }
}
