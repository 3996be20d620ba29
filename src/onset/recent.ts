/** A quantity over the last stretch of time, for comparing it with what it was. */
export class Recent {
  readonly #span: number;
  #time: number[] = [];
  #value: number[] = [];
  #head = 0;

  /** @param span how far back it remembers [s] */
  constructor(span: number) {
    this.#span = span;
  }

  /** @param time [s], later than before
   *  @param value of either sign; its magnitude counts */
  add(time: number, value: number): void {
    this.#time.push(time);
    this.#value.push(Math.abs(value));
    // the newest entry that is old enough stays
    while (this.#head + 1 < this.#time.length && this.#time[this.#head + 1] <= time - this.#span) this.#head++;
    if (this.#head > 1024 && this.#head > this.#time.length / 2) {
      this.#time = this.#time.slice(this.#head);
      this.#value = this.#value.slice(this.#head);
      this.#head = 0;
    }
  }

  /** ln of the growth over the last span, the past taken by linear interpolation of the logarithm; null while there is nothing so
   *  far back, −∞ where nothing is left. */
  growth(): number | null {
    const last = this.#time.length - 1;
    const past = last < 0 ? null : this.#at(this.#time[last] - this.#span);
    return past === null || past === 0 ? null : Math.log(this.#value[last] / past);
  }

  #at(time: number): number | null {
    const k = this.#head;
    if (!(time >= this.#time[k])) return null;
    const next = k + 1;
    if (next >= this.#time.length) return this.#value[k];
    const a = this.#value[k];
    const b = this.#value[next];
    const share = (time - this.#time[k]) / (this.#time[next] - this.#time[k]);
    return a > 0 && b > 0 ? a * (b / a) ** share : a + share * (b - a);
  }
}
