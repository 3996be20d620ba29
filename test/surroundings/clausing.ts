/** Transmission of a round tube by Clausing's integral equation, solved numerically: shares nothing with src.
 *
 *  A wall that scatters by the cosine law, so light-exchange factors between rings and discs apply (Clausing, Ann. Phys. 12, 961, 1932; the factors are
 *  those of textbooks on radiation). Lengths in radii. w(x), the chance to leave by the far end after leaving the wall at x, solves
 *    w(x) = F(L − x) + ∫ K(|x − y|) w(y) dy,
 *  and W = E(L) + ∫ −E′(x) w(x) dx, E the factor between the end discs of a tube of length x.
 *  Nyström's method at n midpoints with the singularity taken out (∫K is known: 1 − F(x) − F(L − x)); error ∝ n⁻², extrapolated. */
export function clausing(length: number): number {
  const [coarse, fine] = [solve(length, 80), solve(length, 160)];
  return fine + (fine - coarse) / 3;
}

const toDisc = (x: number): number => {
  const z = x / 2;
  return (z * z + 0.5) / Math.sqrt(z * z + 1) - z;
};
const toRing = (x: number): number => {
  const z = x / 2;
  return 0.5 * (1 - (z * (2 * z * z + 3)) / (2 * (z * z + 1) ** 1.5));
};
const discs = (x: number): number => 1 + (x * x) / 2 - x * Math.sqrt(1 + (x * x) / 4);
const discsSlope = (x: number): number => x - (1 + (x * x) / 2) / Math.sqrt(1 + (x * x) / 4);

function solve(length: number, n: number): number {
  const h = length / n;
  const x = Array.from({ length: n }, (_, i) => (i + 0.5) * h);
  // rows of (1 − ∫K) w_i + Σ h K_ij (w_i − w_j) = F(L − x_i), the difference smoothing the kink at y = x
  const rows = x.map((xi, i) => {
    const row = new Float64Array(n + 1);
    for (let j = 0; j < n; j++) {
      if (j === i) continue;
      const k = h * toRing(Math.abs(xi - x[j]));
      row[j] -= k;
      row[i] += k;
    }
    row[i] += toDisc(xi) + toDisc(length - xi);
    row[n] = toDisc(length - xi);
    return row;
  });
  for (let k = 0; k < n; k++) {
    for (let r = k + 1; r < n; r++) {
      const share = rows[r][k] / rows[k][k];
      for (let c = k; c <= n; c++) rows[r][c] -= share * rows[k][c];
    }
  }
  const w = new Float64Array(n);
  for (let r = n - 1; r >= 0; r--) {
    let sum = rows[r][n];
    for (let c = r + 1; c < n; c++) sum -= rows[r][c] * w[c];
    w[r] = sum / rows[r][r];
  }
  return x.reduce((sum, xi, i) => sum - h * discsSlope(xi) * w[i], discs(length));
}
