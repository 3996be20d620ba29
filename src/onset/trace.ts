/** Conduction current and gap voltage against time, kept thin: when it is full, every second entry goes. */
export class Trace {
  readonly #most: number;
  time: Float64Array;
  current: Float64Array;
  voltage: Float64Array;
  length = 0;
  #stride = 1;
  #skipped = 0;

  constructor(most = 16384) {
    this.#most = most;
    this.time = new Float64Array(most);
    this.current = new Float64Array(most);
    this.voltage = new Float64Array(most);
  }

  add(t: number, current: number, voltage: number): void {
    if (++this.#skipped < this.#stride) return;
    this.#skipped = 0;
    if (this.length === this.#most) this.#thin();
    this.time[this.length] = t;
    this.current[this.length] = current;
    this.voltage[this.length] = voltage;
    this.length++;
  }

  /** |I| at time t by linear interpolation of ln |I|; null before the first entry. */
  currentAt(t: number): number | null {
    if (this.length === 0 || t < this.time[0]) return null;
    let low = 0;
    let high = this.length - 1;
    if (t >= this.time[high]) return Math.abs(this.current[high]);
    while (high - low > 1) {
      const mid = (low + high) >> 1;
      if (this.time[mid] <= t) low = mid;
      else high = mid;
    }
    const a = Math.abs(this.current[low]);
    const b = Math.abs(this.current[high]);
    const share = (t - this.time[low]) / (this.time[high] - this.time[low]);
    return a > 0 && b > 0 ? a * (b / a) ** share : a + share * (b - a);
  }

  #thin(): void {
    let kept = 0;
    for (let i = 0; i < this.length; i += 2) {
      this.time[kept] = this.time[i];
      this.current[kept] = this.current[i];
      this.voltage[kept] = this.voltage[i];
      kept++;
    }
    this.length = kept;
    this.#stride *= 2;
  }
}
