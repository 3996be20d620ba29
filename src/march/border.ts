/** Solves A z = b for a few unknowns, in place: rows of A with b as last column, one after the other. Rows may differ by any factor (scaled partial
 *  pivoting); columns should not differ by more than doubles can bear.
 *  @param n  number of unknowns
 *  @param z  the answer */
export function solveSmall(rows: Float64Array, n: number, z: Float64Array): void {
  const width = n + 1;
  for (let i = 0; i < n; i++) {
    let largest = 0;
    for (let j = 0; j < n; j++) largest = Math.max(largest, Math.abs(rows[i * width + j]));
    if (largest > 0) for (let j = 0; j < width; j++) rows[i * width + j] /= largest;
  }
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(rows[i * width + k]) > Math.abs(rows[pivot * width + k])) pivot = i;
    if (pivot !== k) {
      for (let j = k; j < width; j++) {
        const swapped = rows[k * width + j];
        rows[k * width + j] = rows[pivot * width + j];
        rows[pivot * width + j] = swapped;
      }
    }
    for (let i = k + 1; i < n; i++) {
      const factor = rows[i * width + k] / rows[k * width + k];
      if (factor === 0) continue;
      for (let j = k + 1; j < width; j++) rows[i * width + j] -= factor * rows[k * width + j];
    }
  }
  for (let k = n - 1; k >= 0; k--) {
    let sum = rows[k * width + n];
    for (let j = k + 1; j < n; j++) sum -= rows[k * width + j] * z[j];
    z[k] = sum / rows[k * width + k];
  }
}
