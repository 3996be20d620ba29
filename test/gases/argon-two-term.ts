/** Electrons in argon by the two-term expansion of the Boltzmann equation: where the electron mobility of src/gases/argon.ts comes from.
 *
 *  Steady energy distribution F(ε), ∫ √ε F dε = 1, of electrons that multiply at the rate ν (per unit N), in a cold-ish gas:
 *      d/dε [ −(E/N)²/3 · ε/Q · dF/dε − 2 (m/M) ε² Q_m (F + kT/e · dF/dε) ] = gain − ε (Q_exc + Q_ion) F − √ε (ν/g) F,
 *      Q = Q_m + Q_exc + Q_ion + ν/(g √ε),  g = √(2e/m),  ν = g ∫ ε Q_ion F dε  (by iteration).
 *  An ionising electron shares what is left equally with the new one. Equal cells in ε, central differences. Textbook equation, written for this test. */

/** Cross-sections of argon [m²], ε in eV: Phelps and Petrović, Plasma Sources Sci. Technol. 8, R21, 1999; from memory (H). */
export function momentumTransfer(e: number): number {
  const a = 6 / (1 + e / 0.1 + (e / 0.6) ** 2) ** 3.3;
  const b = (1.1 * e ** 1.4) / (1 + (e / 15) ** 1.2) / Math.sqrt(1 + (e / 5.5) ** 2.5 + (e / 60) ** 4.1);
  return (Math.abs(a - b) + 0.05 / (1 + e / 10) ** 2 + (0.01 * e ** 3) / (1 + (e / 12) ** 6)) * 1e-20;
}
export function excitation(e: number): number {
  if (e <= 11.5) return 0;
  const above = e - 11.5;
  return ((0.034 * above ** 1.1 * (1 + (e / 15) ** 2.8)) / (1 + (e / 23) ** 5.5) + (0.023 * above) / (1 + e / 80) ** 1.9) * 1e-20;
}
export function ionisation(e: number): number {
  if (e <= 15.8) return 0;
  const above = e - 15.8;
  return ((970 * above) / (70 + e) ** 2 + 0.06 * above ** 2 * Math.exp(-e / 9)) * 1e-20;
}

export interface Transport {
  /** μN [1/(m V s)] */
  readonly mobility: number;
  /** D/μ across the field [V] */
  readonly energy: number;
  /** ionisation per unit drift, ν/(W) [m²] */
  readonly ionisation: number;
}

/** @param EN E/N [V m²] */
export function argonElectrons(EN: number, cells: number): Transport {
  const g = Math.sqrt((2 * 1.602176634e-19) / 9.1093837e-31);
  const massRatio = 9.1093837e-31 / (39.948 * 1.66053907e-27);
  const kT = 0.02526;
  const top = EN < 60e-21 ? 40 : 60 + 0.5 * (EN / 1e-21);
  const h = top / cells;
  const centre = Float64Array.from({ length: cells }, (_, i) => (i + 0.5) * h);
  let nu = 0;
  for (let round = 0; round < 100; round++) {
    const total = (e: number): number => momentumTransfer(e) + excitation(e) + ionisation(e) + nu / (g * Math.sqrt(e));
    // rows: cells; the gains come from higher energies, so the matrix is upper Hessenberg
    const A = Array.from({ length: cells }, () => new Float64Array(cells));
    for (let i = 0; i < cells - 1; i++) {
      const e = (i + 1) * h;
      const cooling = 2 * massRatio * e * e * momentumTransfer(e);
      const a = ((EN * EN * e) / 3 / total(e) + cooling * kT) / h;
      A[i][i] += (a - cooling / 2) / h;
      A[i][i + 1] += (-a - cooling / 2) / h;
      A[i + 1][i] -= (a - cooling / 2) / h;
      A[i + 1][i + 1] -= (-a - cooling / 2) / h;
    }
    for (let j = 0; j < cells; j++) {
      const e = centre[j];
      const exciting = e * excitation(e);
      const ionising = e * ionisation(e);
      A[j][j] += exciting + ionising + (Math.sqrt(e) * nu) / g;
      deposit(A, j, (e - 11.5) / h - 0.5, exciting);
      if (ionising > 0) deposit(A, j, (e - 15.8) / 2 / h - 0.5, 2 * ionising);
    }
    for (let j = 0; j < cells; j++) A[0][j] = Math.sqrt(centre[j]) * h; // normalisation replaces one balance
    const F = solveHessenberg(A);
    let next = 0;
    for (let j = 0; j < cells; j++) next += g * centre[j] * ionisation(centre[j]) * F[j] * h;
    const settled = Math.abs(next - nu) <= 1e-6 * next;
    nu = next;
    if (!settled) continue;
    let mobility = 0;
    let diffusion = 0;
    for (let j = 0; j < cells; j++) {
      diffusion += ((g / 3) * centre[j] * F[j] * h) / total(centre[j]);
      if (j > 0) mobility -= ((g / 3) * j * h * (F[j] - F[j - 1])) / total(j * h);
    }
    return { mobility, energy: diffusion / mobility, ionisation: nu / (mobility * EN) };
  }
  throw new Error('the ionisation rate did not settle');
}

/** electrons lost from cell j reappear at the fractional cell `at` */
function deposit(A: Float64Array[], j: number, at: number, rate: number): void {
  if (rate === 0) return;
  const i = Math.max(0, Math.floor(at));
  const f = Math.max(0, at - i);
  A[i][j] -= (1 - f) * rate;
  A[i + 1][j] -= f * rate;
}

/** A x = (1, 0, 0, …) for an upper Hessenberg A, by elimination with row exchange; A is overwritten */
function solveHessenberg(A: Float64Array[]): Float64Array {
  const n = A.length;
  const b = new Float64Array(n);
  b[0] = 1;
  for (let i = 0; i < n - 1; i++) {
    if (Math.abs(A[i + 1][i]) > Math.abs(A[i][i])) {
      [A[i], A[i + 1]] = [A[i + 1], A[i]];
      [b[i], b[i + 1]] = [b[i + 1], b[i]];
    }
    const f = A[i + 1][i] / A[i][i];
    for (let j = i; j < n; j++) A[i + 1][j] -= f * A[i][j];
    b[i + 1] -= f * b[i];
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let j = i + 1; j < n; j++) b[i] -= A[i][j] * b[j];
    b[i] /= A[i][i];
  }
  return b;
}
