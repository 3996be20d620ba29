/** A value with its standard error; null where it could not be measured. */
export interface Measured {
  readonly value: number;
  readonly error: number;
}

/** A quantity of the sums over batches, with the error that leaving out one batch after the other shows (jackknife): right for ratios and differences
 *  too, as long as batches are independent and there are many.
 *
 *  θ of all sums; error = √((n − 1)/n Σ (θ₍ⱼ₎ − θ̄)²), θ₍ⱼ₎ without batch j.
 *  Source: R. G. Miller, The jackknife: a review, Biometrika 61, 1, 1974 (from memory, H).
 *  @param batches  sums of each batch, arrays of equal length; at least two */
export function jackknife(batches: readonly Float64Array[], quantity: (sums: Float64Array) => number): Measured {
  const n = batches.length;
  if (n < 2) throw new Error('an error needs at least two batches');
  const all = new Float64Array(batches[0].length);
  for (const batch of batches) for (let k = 0; k < all.length; k++) all[k] += batch[k];
  const without = new Float64Array(all.length);
  const estimates = batches.map((batch) => {
    for (let k = 0; k < all.length; k++) without[k] = all[k] - batch[k];
    return quantity(without);
  });
  const mean = estimates.reduce((sum, x) => sum + x, 0) / n;
  const squares = estimates.reduce((sum, x) => sum + (x - mean) ** 2, 0);
  return { value: quantity(all), error: Math.sqrt(((n - 1) / n) * squares) };
}
