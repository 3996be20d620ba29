/** Electrons in any gas by the two-term expansion of the Boltzmann equation: where several curves of src/gases come from, and a check of the published ones.
 *
 *  A steady stream that grows along the field, n ∝ e^{αz}, as in a Townsend gap below breakdown. Energy distribution F(ε), ∫ √ε F dε = 1, per unit density of gas:
 *      J = −(ε/3Q) (E/N dF/dε + α/N F),        W = g ∫ J dε,  g = √(2e/m),
 *      d/dε [ E/N J − 2 (m/M) ε² Q (F + kT/e dF/dε) ] + α/N J = gain − ε (ΣQ_loss + Q_ion + Q_att) F,
 *      α/N = g ∫ ε (Q_ion − Q_att) F dε / W   (by iteration),
 *  with Q the momentum transfer of all collisions together. Electrons that ionise share what is left equally. Equal cells in ε, central differences.
 *
 *  Derived from the Boltzmann equation for these tests; it shares nothing with src. Two terms, equal sharing and isotropic losses are good to some 10 % in mobility and 20 % in α up to
 *  about 1000 Td, less beyond, where electrons begin to run away. */

/** Rows (ε [eV], Q [1e-20 m²]), joined by straight lines in log–log; zero below the first row, falling as 1/ε above the last. */
export type Rows = readonly (readonly [number, number])[];

export interface Loss {
  /** energy lost [eV] */
  readonly threshold: number;
  readonly rows: Rows;
}

/** What electrons meet in one gas. */
export interface Target {
  /** [u] */
  readonly mass: number;
  /** momentum transfer of all collisions together */
  readonly momentum: Rows;
  readonly losses: readonly Loss[];
  readonly ionisation: Loss;
  /** ionisation of the other gases of a mixture */
  readonly alsoIonised?: readonly Loss[];
  readonly attachment?: Rows;
}

export interface Swarm {
  /** μN [1/(m V s)] and D/μ across the field [V] */
  readonly mobility: number;
  readonly energy: number;
  /** mean energy [eV] */
  readonly mean: number;
  /** ionisation and attachment per unit length along the field [m²] */
  readonly ionisation: number;
  readonly attachment: number;
}

const g = Math.sqrt((2 * 1.602176634e-19) / 9.1093837e-31);

/** Cross-section [m²] at ε [eV]. */
export function crossSection(rows: Rows, e: number): number {
  if (e < rows[0][0]) return 0;
  const last = rows[rows.length - 1];
  if (e >= last[0]) return ((last[1] * last[0]) / e) * 1e-20;
  let i = 0;
  while (rows[i + 1][0] <= e) i++;
  const [[x0, y0], [x1, y1]] = [rows[i], rows[i + 1]];
  if (y0 <= 0) return ((y1 * (e - x0)) / (x1 - x0)) * 1e-20;
  return y0 * (y1 / y0) ** (Math.log(e / x0) / Math.log(x1 / x0)) * 1e-20;
}

/** What electrons meet in gases mixed by fraction: cross-sections add up, each times its fraction. No gas hands on what it was excited with. */
export function mixed(parts: readonly (readonly [Target, number])[]): Target {
  const together = (rowsOf: (target: Target) => Rows): Rows => {
    const energies = [...new Set(parts.flatMap(([target]) => rowsOf(target).map(([e]) => e)))].sort((a, b) => a - b);
    return energies.map((e) => [e, parts.reduce((sum, [target, f]) => sum + f * crossSection(rowsOf(target), e) * 1e20, 0)]);
  };
  const thinned = ({ threshold, rows }: Loss, f: number): Loss => ({ threshold, rows: rows.map(([e, q]) => [e, f * q] as const) });
  const [ionisation, ...alsoIonised] = parts.map(([target, f]) => thinned(target.ionisation, f));
  return {
    mass: 1 / parts.reduce((sum, [target, f]) => sum + f / target.mass, 0),
    momentum: together((target) => target.momentum),
    losses: parts.flatMap(([target, f]) => target.losses.map((loss) => thinned(loss, f))),
    ionisation,
    alsoIonised,
    attachment: together((target) => target.attachment ?? [[1, 0]]),
  };
}

/** Transport at E/N [Td], on `cells` equal cells up to `top` [eV]. */
export function swarm(target: Target, td: number, top: number, cells: number): Swarm {
  const EN = td * 1e-21;
  const massRatio = 9.1093837e-31 / (target.mass * 1.66053907e-27);
  const kT = 0.02526;
  const h = top / cells;
  const centre = Float64Array.from({ length: cells }, (_, i) => (i + 0.5) * h);
  const edge = Float64Array.from({ length: cells }, (_, i) => (i === 0 ? 1 : crossSection(target.momentum, i * h)));
  const ionisations = [target.ionisation, ...(target.alsoIonised ?? [])].map(({ threshold, rows }) => ({
    threshold,
    q: centre.map((e) => crossSection(rows, e)),
  }));
  const ionise = centre.map((_, j) => ionisations.reduce((sum, { q }) => sum + q[j], 0));
  const attach = centre.map((e) => (target.attachment ? crossSection(target.attachment, e) : 0));
  const losses = target.losses.map((loss) => ({ threshold: loss.threshold, q: centre.map((e) => crossSection(loss.rows, e)) }));
  let growth = 0;
  for (let round = 0; round < 300; round++) {
    const A = Array.from({ length: cells }, () => new Float64Array(cells));
    for (let i = 0; i < cells - 1; i++) {
      const e = (i + 1) * h;
      // J at the edge between cells i and i + 1 is low F_i + high F_{i+1}, and so is the energy given to recoil
      const open = e / (3 * edge[i + 1]);
      const low = open * (EN / h - growth / 2);
      const high = open * (-EN / h - growth / 2);
      const cooling = 2 * massRatio * e * e * edge[i + 1];
      const recoilLow = cooling * (0.5 - kT / h);
      const recoilHigh = cooling * (0.5 + kT / h);
      A[i][i] += (EN * low - recoilLow) / h + (growth * low) / 2;
      A[i][i + 1] += (EN * high - recoilHigh) / h + (growth * high) / 2;
      A[i + 1][i] -= (EN * low - recoilLow) / h - (growth * low) / 2;
      A[i + 1][i + 1] -= (EN * high - recoilHigh) / h - (growth * high) / 2;
    }
    for (let j = 0; j < cells; j++) {
      const e = centre[j];
      A[j][j] += e * (ionise[j] + attach[j]);
      for (const loss of losses) {
        if (!(loss.q[j] > 0)) continue;
        A[j][j] += e * loss.q[j];
        deposit(A, j, Math.max(0, (e - loss.threshold) / h - 0.5), e * loss.q[j]);
      }
      for (const { threshold, q } of ionisations) if (q[j] > 0) deposit(A, j, Math.max(0, (e - threshold) / 2 / h - 0.5), 2 * e * q[j]);
    }
    for (let j = 0; j < cells; j++) A[0][j] = Math.sqrt(centre[j]) * h; // normalisation replaces one balance
    const F = solveHessenberg(A);
    let made = 0;
    let lost = 0;
    let drift = 0;
    let diffusion = 0;
    let mean = 0;
    for (let j = 0; j < cells; j++) {
      const e = centre[j];
      made += g * e * ionise[j] * F[j] * h;
      lost += g * e * attach[j] * F[j] * h;
      mean += e * Math.sqrt(e) * F[j] * h;
      if (j === 0) continue;
      const open = (g * j * h) / (3 * edge[j]);
      drift -= open * (F[j] - F[j - 1]) * EN;
      diffusion += (open * (F[j] + F[j - 1]) * h) / 2;
    }
    const W = drift - growth * diffusion;
    const next = (made - lost) / W;
    const settled = Math.abs(next - growth) <= 1e-5 * Math.max(Math.abs(next), 1e-26);
    growth = round < 3 ? next / 2 : 0.6 * growth + 0.4 * next; // damped: growth cools the electrons that make it
    if (!settled) continue;
    return { mobility: drift / EN, energy: (diffusion / drift) * EN, mean, ionisation: made / W, attachment: lost / W };
  }
  throw new Error('the growth did not settle');
}

/** electrons lost from cell j reappear at the fractional cell `at` */
function deposit(A: Float64Array[], j: number, at: number, rate: number): void {
  const i = Math.floor(at);
  const f = at - i;
  A[i][j] -= (1 - f) * rate;
  if (f > 0) A[i + 1][j] -= f * rate;
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
    if (f === 0) continue;
    for (let j = i; j < n; j++) A[i + 1][j] -= f * A[i][j];
    b[i + 1] -= f * b[i];
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let j = i + 1; j < n; j++) b[i] -= A[i][j] * b[j];
    b[i] /= A[i][i];
  }
  return b;
}
