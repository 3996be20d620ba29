/** Oracle: the current of a uniform field that is switched on at t = 0, without diffusion and without space charge.
 *
 *  Contains: the cathode's emission Γ(t) and the conduction current I(t) of a constant seed switched on at t = 0 and of electrons
 *  released at the cathode at t = 0, and the times at which I crosses given levels. Exact equation: every electron leaving at t'
 *  makes α e^{αx} dx ions at x, which land at t' + x/W_e + x/W_i, so
 *      Γ(t) = Γ_seed + N δ(t) + γ ∫₀^T k(u) Γ(t − u) du,   k(u) = (α d/T) e^{α d u/T},   T = d (1/W_e + 1/W_i),
 *      I(t) = e A ∫₀¹ e^{αdy} {Γ(t − y d/W_e) + (α W_i)[G(t − y d/W_e) − G(t − y T)]} dy,   G = ∫ Γ dt.
 *  Γ is smooth inside every interval [kT, (k+1)T]: there it is a polynomial through Chebyshev points that satisfies the integral
 *  equation at each of them (collocation, spectral accuracy; one small matrix serves all intervals). The unit tests find 1e-9.
 *  Does not contain: attachment, photons, diffusion, a voltage that changes, displacement current. */

import { ELEMENTARY_CHARGE } from './open-case.ts';

export interface TransientGap {
  /** [1/m], [m] */
  readonly alpha: number;
  readonly spacing: number;
  readonly ionYield: number;
  /** [m/s] */
  readonly electronSpeed: number;
  readonly ionSpeed: number;
  /** [A] from t = 0 on */
  readonly seedCurrent: number;
  /** released at the cathode at t = 0, default 0 */
  readonly electrons?: number;
}

export interface LinearTransient {
  /** T [s], from an electron's start to the landing of the ions it makes at the anode */
  readonly loopTime: number;
  /** e A Γ(t) [A], without the burst of electrons at t = 0 itself */
  readonly emission: (time: number) => number;
  /** conduction current [A] */
  readonly current: (time: number) => number;
  /** first time [s] at which the conduction current reaches the level [A]; Infinity when not before `latest` [s] */
  readonly crossingTime: (level: number, latest: number) => number;
}

const POINTS = 56;

export function linearTransient(gap: TransientGap): LinearTransient {
  const { spacing, ionYield, electronSpeed, ionSpeed } = gap;
  const a = gap.alpha * spacing;
  const electronTime = spacing / electronSpeed;
  const ionTime = spacing / ionSpeed;
  const loopTime = electronTime + ionTime;
  const burst = ((gap.electrons ?? 0) * ELEMENTARY_CHARGE) / loopTime; // as a current over one loop time
  const { nodes, weights } = chebyshevNodes(POINTS);
  const interpolate = barycentric(nodes, weights);

  // time in loops from here on: kernel γ a e^{au} on [0, 1]
  const kernel = (u: number): number => ionYield * a * Math.exp(a * u);
  const own = new Float64Array(POINTS * POINTS);
  const previous = new Float64Array(POINTS * POINTS);
  const integration = new Float64Array(POINTS * POINTS);
  const basis = new Float64Array(POINTS);
  for (let i = 0; i < POINTS; i++) {
    const s = nodes[i];
    gauss(0, s, (v, w) => {
      basisAt(nodes, weights, v, basis);
      for (let j = 0; j < POINTS; j++) {
        own[i * POINTS + j] += w * kernel(s - v) * basis[j];
        integration[i * POINTS + j] += w * basis[j];
      }
    });
    gauss(s, 1, (v, w) => {
      basisAt(nodes, weights, v, basis);
      for (let j = 0; j < POINTS; j++) previous[i * POINTS + j] += w * kernel(1 + s - v) * basis[j];
    });
  }
  const whole = new Float64Array(POINTS);
  gauss(0, 1, (v, w) => {
    basisAt(nodes, weights, v, basis);
    for (let j = 0; j < POINTS; j++) whole[j] += w * basis[j];
  });
  const system = own.map((value, k) => (k % (POINTS + 1) === 0 ? 1 : 0) - value);
  const solve = denseSolver(system, POINTS);

  // per interval: Γ at the nodes, and G there counted from the start of everything
  const emissions: Float64Array[] = [];
  const charges: Float64Array[] = [];
  let chargeSoFar = burst;
  const extendTo = (interval: number): void => {
    while (emissions.length <= interval) {
      const k = emissions.length;
      const right = new Float64Array(POINTS).fill(gap.seedCurrent);
      for (let i = 0; i < POINTS; i++) {
        if (k === 0) right[i] += burst * kernel(nodes[i]);
        else for (let j = 0; j < POINTS; j++) right[i] += previous[i * POINTS + j] * emissions[k - 1][j];
      }
      const values = solve(right);
      const charge = new Float64Array(POINTS).fill(chargeSoFar);
      for (let i = 0; i < POINTS; i++) {
        for (let j = 0; j < POINTS; j++) charge[i] += integration[i * POINTS + j] * values[j];
        chargeSoFar += whole[i] * values[i];
      }
      emissions.push(values);
      charges.push(charge);
    }
  };
  const read = (table: Float64Array[], loops: number): number => {
    if (loops < 0) return 0;
    const k = Math.floor(loops);
    extendTo(k);
    return interpolate(table[k], loops - k);
  };

  const electronShare = electronTime / loopTime;
  const current = (time: number): number => {
    const t = time / loopTime;
    if (t < 0) return 0;
    const since = t - Math.floor(t);
    // where Γ and G pass from one polynomial to the next
    const joints = [0, since, since / electronShare, 1].filter((y) => y >= 0 && y <= 1).sort((p, q) => p - q);
    let sum = 0;
    for (let k = 0; k + 1 < joints.length; k++) {
      gauss(joints[k], joints[k + 1], (y, w) => {
        const leaving = t - y * electronShare;
        const ions = read(charges, leaving) - read(charges, t - y);
        sum += w * Math.exp(a * y) * (read(emissions, leaving) + (a / (1 - electronShare)) * ions);
      });
    }
    // the burst itself on its way to the anode
    if (t < electronShare) sum += (burst * Math.exp((a * t) / electronShare)) / electronShare;
    return sum;
  };

  /** fine enough to see the first avalanche of a burst; a constant seed alone only ever rises, so the ends of the intervals do */
  const samples = (k: number): number[] => {
    if (burst === 0) return [k, k + 1];
    const fast = Array.from({ length: 9 }, (_, i) => k + (electronShare * i) / 8);
    const slow = Array.from({ length: 32 }, (_, i) => k + electronShare + ((1 - electronShare) * (i + 1)) / 32);
    return [...fast, ...slow];
  };
  const crossingTime = (level: number, latest: number): number => {
    for (let k = 0; k * loopTime <= latest; k++) {
      const times = samples(k);
      for (let i = 0; i + 1 < times.length; i++) {
        if (current(times[i + 1] * loopTime) < level) continue;
        let [low, high] = [times[i], times[i + 1]];
        for (let n = 0; n < 48; n++) {
          const middle = (low + high) / 2;
          if (current(middle * loopTime) < level) low = middle;
          else high = middle;
        }
        return high * loopTime <= latest ? high * loopTime : Number.POSITIVE_INFINITY;
      }
    }
    return Number.POSITIVE_INFINITY;
  };

  return { loopTime, emission: (time) => read(emissions, time / loopTime), current, crossingTime };
}

/** Chebyshev points of the first kind on [0, 1] and their barycentric weights (Berrut & Trefethen, SIAM Review 46, 501, 2004) */
function chebyshevNodes(n: number): { nodes: Float64Array; weights: Float64Array } {
  const angle = (i: number): number => ((2 * i + 1) * Math.PI) / (2 * n);
  return {
    nodes: Float64Array.from({ length: n }, (_, i) => (1 - Math.cos(angle(i))) / 2),
    weights: Float64Array.from({ length: n }, (_, i) => (i % 2 === 0 ? 1 : -1) * Math.sin(angle(i))),
  };
}

function basisAt(nodes: Float64Array, weights: Float64Array, s: number, out: Float64Array): void {
  let total = 0;
  for (let j = 0; j < nodes.length; j++) {
    if (s === nodes[j]) {
      out.fill(0);
      out[j] = 1;
      return;
    }
    out[j] = weights[j] / (s - nodes[j]);
    total += out[j];
  }
  for (let j = 0; j < nodes.length; j++) out[j] /= total;
}

function barycentric(nodes: Float64Array, weights: Float64Array): (values: Float64Array, s: number) => number {
  return (values, s) => {
    let above = 0;
    let below = 0;
    for (let j = 0; j < nodes.length; j++) {
      const distance = s - nodes[j];
      if (distance === 0) return values[j];
      const share = weights[j] / distance;
      above += share * values[j];
      below += share;
    }
    return above / below;
  };
}

const RULE = gaussLegendre(40);

/** visits the points of a 40-point Gauss rule between a and b */
function gauss(a: number, b: number, visit: (x: number, weight: number) => void): void {
  if (b <= a) return;
  for (let i = 0; i < RULE.nodes.length; i++) visit(a + (b - a) * RULE.nodes[i], (b - a) * RULE.weights[i]);
}

/** nodes and weights on [0, 1], by Newton on the Legendre polynomial */
function gaussLegendre(n: number): { nodes: Float64Array; weights: Float64Array } {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 1;
    for (let pass = 0; pass < 50; pass++) {
      let [p0, p1] = [1, x];
      for (let k = 2; k <= n; k++) [p0, p1] = [p1, ((2 * k - 1) * x * p1 - (k - 1) * p0) / k];
      slope = (n * (x * p1 - p0)) / (x * x - 1);
      const step = p1 / slope;
      x -= step;
      if (Math.abs(step) < 1e-15) break;
    }
    nodes[i] = (1 - x) / 2;
    weights[i] = 1 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}

/** factors a full matrix once (rows exchanged), to solve for many right-hand sides */
function denseSolver(matrix: Float64Array, n: number): (right: Float64Array) => Float64Array {
  const m = matrix.slice();
  const order = new Int32Array(n);
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let r = k + 1; r < n; r++) if (Math.abs(m[r * n + k]) > Math.abs(m[pivot * n + k])) pivot = r;
    order[k] = pivot;
    for (let c = 0; c < n; c++) [m[k * n + c], m[pivot * n + c]] = [m[pivot * n + c], m[k * n + c]];
    for (let r = k + 1; r < n; r++) {
      const factor = m[r * n + k] / m[k * n + k];
      m[r * n + k] = factor;
      for (let c = k + 1; c < n; c++) m[r * n + c] -= factor * m[k * n + c];
    }
  }
  return (right) => {
    const x = right.slice();
    for (let k = 0; k < n; k++) [x[k], x[order[k]]] = [x[order[k]], x[k]];
    for (let r = 1; r < n; r++) for (let c = 0; c < r; c++) x[r] -= m[r * n + c] * x[c];
    for (let r = n - 1; r >= 0; r--) {
      for (let c = r + 1; c < n; c++) x[r] -= m[r * n + c] * x[c];
      x[r] /= m[r * n + r];
    }
    return x;
  };
}
