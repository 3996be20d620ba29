/** The conduction current over the last stretch of time, for comparing it with what it was. */
export class RecentCurrent {
  readonly #span: number;
  #time: number[] = [];
  #current: number[] = [];
  #head = 0;

  /** @param span how far back it remembers [s] */
  constructor(span: number) {
    this.#span = span;
  }

  add(time: number, current: number): void {
    this.#time.push(time);
    this.#current.push(Math.abs(current));
    // the newest entry that is old enough stays
    while (this.#head + 1 < this.#time.length && this.#time[this.#head + 1] <= time - this.#span) this.#head++;
    if (this.#head > 1024 && this.#head > this.#time.length / 2) {
      this.#time = this.#time.slice(this.#head);
      this.#current = this.#current.slice(this.#head);
      this.#head = 0;
    }
  }

  /** ln of the growth of |I| over the last span [s], the past taken by linear interpolation of ln |I|; null while there is no
   *  current so far back, −∞ where there is none any more. */
  growth(): number | null {
    const last = this.#time.length - 1;
    const past = last < 0 ? null : this.#at(this.#time[last] - this.#span);
    return past === null || past === 0 ? null : Math.log(this.#current[last] / past);
  }

  #at(time: number): number | null {
    const k = this.#head;
    if (time < this.#time[k]) return null;
    const a = this.#current[k];
    const next = k + 1;
    if (next >= this.#time.length) return a;
    const b = this.#current[next];
    const share = (time - this.#time[k]) / (this.#time[next] - this.#time[k]);
    return a > 0 && b > 0 ? a * (b / a) ** share : a + share * (b - a);
  }
}
