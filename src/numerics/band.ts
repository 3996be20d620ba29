/** A square matrix with entries only within `lower` places left and `upper` places right of the diagonal, factored in place
 *  without pivoting. Row r, column c is at entries[r·stride + (c − r + lower)], stride = lower + upper + 1.
 *
 *  After `factor` a matrix with lower = upper = 4 holds both triangles divided by their row's pivot (`solve44` shows how they are
 *  used); any other holds the multipliers and the upper triangle as they are. Without pivoting it suits matrices that are dominated by their diagonal blocks; `factor` reports a pivot that has
 *  vanished or is not finite. */
export class BandMatrix {
  readonly size: number;
  readonly lower: number;
  readonly upper: number;
  readonly stride: number;
  readonly entries: Float64Array;
  /** reciprocal pivots, after `factor` */
  readonly inverse: Float64Array;

  constructor(size: number, lower: number, upper: number) {
    this.size = size;
    this.lower = lower;
    this.upper = upper;
    this.stride = lower + upper + 1;
    this.entries = new Float64Array(size * this.stride);
    this.inverse = new Float64Array(size);
  }

  clear(): void {
    this.entries.fill(0);
  }

  /** entries ← L U. @returns the first row whose pivot is unusable, or −1 */
  factor(): number {
    return this.lower === 4 && this.upper === 4
      ? factor44(this.entries, this.inverse, this.size)
      : factorBand(this.entries, this.inverse, this.size, this.lower, this.upper);
  }

  /** b ← A⁻¹ b, after `factor`. */
  solve(b: Float64Array): void {
    if (this.lower === 4 && this.upper === 4) solve44(this.entries, this.inverse, this.size, b);
    else solveBand(this.entries, this.inverse, this.size, this.lower, this.upper, b);
  }
}

function factorBand(a: Float64Array, inverse: Float64Array, n: number, lower: number, upper: number): number {
  const stride = lower + upper + 1;
  for (let k = 0; k < n; k++) {
    const pivotRow = k * stride + lower;
    const inv = 1 / a[pivotRow];
    if (!(Math.abs(inv) > 0 && Math.abs(inv) < Infinity)) return k;
    inverse[k] = inv;
    const last = Math.min(n - 1, k + lower);
    for (let r = k + 1; r <= last; r++) {
      const start = r * stride + lower - (r - k);
      const m = a[start] * inv;
      if (m === 0) continue;
      a[start] = m;
      for (let c = 1; c <= upper; c++) a[start + c] -= m * a[pivotRow + c];
    }
  }
  return -1;
}

function solveBand(a: Float64Array, inverse: Float64Array, n: number, lower: number, upper: number, b: Float64Array): void {
  const stride = lower + upper + 1;
  for (let r = 1; r < n; r++) {
    const reach = Math.min(lower, r);
    const diagonal = r * stride + lower;
    let s = b[r];
    for (let j = 1; j <= reach; j++) s -= a[diagonal - j] * b[r - j];
    b[r] = s;
  }
  for (let r = n - 1; r >= 0; r--) {
    const reach = Math.min(upper, n - 1 - r);
    const diagonal = r * stride + lower;
    let s = b[r];
    for (let j = 1; j <= reach; j++) s -= a[diagonal + j] * b[r + j];
    b[r] = s * inverse[r];
  }
}

/** `factorBand` for lower = upper = 4, row by row with the row held in locals: twice as fast. Rows before the first are read as zero. */
function factor44(a: Float64Array, inverse: Float64Array, n: number): number {
  for (let r = 0; r < n; r++) {
    const o = r * 9;
    let a1 = a[o + 1];
    let a2 = a[o + 2];
    let a3 = a[o + 3];
    let a4 = a[o + 4];
    let a5 = a[o + 5];
    let a6 = a[o + 6];
    let a7 = a[o + 7];
    if (r > 3) {
      const u = o - 32; // diagonal of row r − 4
      const m = a[o];
      a1 -= m * a[u + 1];
      a2 -= m * a[u + 2];
      a3 -= m * a[u + 3];
      a4 -= m * a[u + 4];
    }
    if (r > 2) {
      const u = o - 23;
      const m = a1;
      a[o + 1] = m;
      a2 -= m * a[u + 1];
      a3 -= m * a[u + 2];
      a4 -= m * a[u + 3];
      a5 -= m * a[u + 4];
    }
    if (r > 1) {
      const u = o - 14;
      const m = a2;
      a[o + 2] = m;
      a3 -= m * a[u + 1];
      a4 -= m * a[u + 2];
      a5 -= m * a[u + 3];
      a6 -= m * a[u + 4];
    }
    if (r > 0) {
      const u = o - 5;
      const m = a3;
      a[o + 3] = m;
      a4 -= m * a[u + 1];
      a5 -= m * a[u + 2];
      a6 -= m * a[u + 3];
      a7 -= m * a[u + 4];
    }
    const inv = 1 / a4;
    if (!(Math.abs(inv) > 0 && Math.abs(inv) < Infinity)) return r;
    inverse[r] = inv;
    // both factors are kept divided by their row's pivot, which shortens the chain of operations in `solve44`
    a[o] *= inv;
    a[o + 1] *= inv;
    a[o + 2] *= inv;
    a[o + 3] *= inv;
    a[o + 5] = a5 * inv;
    a[o + 6] = a6 * inv;
    a[o + 7] = a7 * inv;
    a[o + 8] *= inv;
  }
  return -1;
}

function solve44(a: Float64Array, inverse: Float64Array, n: number, b: Float64Array): void {
  let p1 = 0;
  let p2 = 0;
  let p3 = 0;
  let p4 = 0;
  for (let r = 0; r < n; r++) {
    const o = r * 9;
    const s = b[r] * inverse[r] - a[o] * p4 - a[o + 1] * p3 - a[o + 2] * p2 - a[o + 3] * p1;
    p4 = p3;
    p3 = p2;
    p2 = p1;
    p1 = s;
    b[r] = s;
  }
  p1 = p2 = p3 = p4 = 0;
  for (let r = n - 1; r >= 0; r--) {
    const o = r * 9 + 4;
    const s = b[r] - a[o + 4] * p4 - a[o + 3] * p3 - a[o + 2] * p2 - a[o + 1] * p1;
    p4 = p3;
    p3 = p2;
    p2 = p1;
    p1 = s;
    b[r] = s;
  }
}
