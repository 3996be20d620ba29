/** A quantity against time, given by rows: linear between them, held at the ends. */
export interface Rows {
  /** [s], strictly rising, at least one */
  readonly times: ArrayLike<number>;
  /** as many, SI */
  readonly values: ArrayLike<number>;
}

/** A quantity against time, and the times at which it bends. */
export interface Series {
  at(t: number): number;
  readonly corners: readonly number[];
}

/** The same value at all times. */
export function constant(value: number): Series {
  return { at: () => value, corners: [] };
}

/** Linear between rows, held at the ends.
 *  @example fromRows({ times: [0, 10], values: [2, 4] }).at(2.5) // 2.5 */
export function fromRows(rows: Rows): Series {
  const times = Float64Array.from(rows.times);
  const values = Float64Array.from(rows.values);
  if (times.length === 0 || times.length !== values.length) throw new RangeError(`${times.length} times for ${values.length} values`);
  const last = times.length - 1;
  const at = (t: number): number => {
    if (t <= times[0]) return values[0];
    if (t >= times[last]) return values[last];
    let low = 0;
    let high = last;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (times[middle] <= t) low = middle;
      else high = middle;
    }
    return values[low] + ((values[high] - values[low]) * (t - times[low])) / (times[high] - times[low]);
  };
  return { at, corners: Array.from(times) };
}
