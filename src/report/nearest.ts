/** Index of the entry nearest to a value in a rising list; 0 for an empty one. */
export function nearest(list: Float64Array, value: number): number {
  let [low, high] = [0, list.length - 1];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (list[middle] <= value) low = middle;
    else high = middle;
  }
  return high >= 0 && list[high] - value < value - list[low] ? high : Math.max(0, low);
}
