/** A linearly implicit Runge–Kutta (Rosenbrock) scheme in the form
 *  (1/(hγ) − J) Uᵢ = f(t + cᵢh, y + Σ aᵢⱼUⱼ) + Σ gᵢⱼUⱼ/h + dᵢ h ∂f/∂t,  y₁ = y + Σ mᵢUᵢ.
 *
 *  One factorisation and one linear solve a stage: each stage is one Newton iteration with the exact Jacobian, none is
 *  repeated, and every linear invariant of f (Gauss's law, charge) holds to rounding. */
export interface Scheme {
  readonly name: string;
  readonly order: number;
  readonly gamma: number;
  /** aᵢⱼ, gᵢⱼ by rows of j < i */
  readonly a: readonly (readonly number[])[];
  readonly g: readonly (readonly number[])[];
  readonly c: readonly number[];
  readonly d: readonly number[];
  readonly m: readonly number[];
  /** the embedded solution of lower order differs by Σ eᵢUᵢ */
  readonly e: readonly number[];
  /** dense output of third order: y(θ) = (1−θ) y + θ (y₁ + (1−θ)(K + θL)), K = Σ kᵢUᵢ, L = Σ lᵢUᵢ */
  readonly k: readonly number[];
  readonly l: readonly number[];
}

/** RODASP: six stages, order 4 with an embedded 3, L-stable and stiffly accurate, without the usual loss of order on parabolic problems.
 *
 *  Source: Steinebach, Order-reduction of ROW-methods for DAEs and method of lines applications, Preprint 1741, TH Darmstadt,
 *  1995; coefficients from memory, confirmed here by the measured orders 4 and 3 in test/orders. */
export const RODASP: Scheme = {
  name: 'RODASP',
  order: 4,
  gamma: 0.25,
  a: [
    [],
    [3.0],
    [1.831036793486759, 0.4955183967433795],
    [2.304376582692669, -0.05249275245743001, -1.176798761832782],
    [-7.170454962423024, -4.741636671481785, -16.31002631330971, -1.062004044111401],
    [-7.170454962423024, -4.741636671481785, -16.31002631330971, -1.062004044111401, 1.0],
  ],
  g: [
    [],
    [-12.0],
    [-8.791795173947035, -2.207865586973518],
    [10.81793056857153, 6.780270611428266, 19.5348594464241],
    [34.19095006749676, 15.49671153725963, 54.7476087596413, 14.16005392148534],
    [34.62605830930532, 15.30084976114473, 56.99955578662667, 18.40807009793095, -5.714285714285717],
  ],
  c: [0, 0.75, 0.21, 0.63, 1, 1],
  d: [0.25, -0.5, -0.023504, -0.0362, 0, 0],
  m: [-7.170454962423024, -4.741636671481785, -16.31002631330971, -1.062004044111401, 1.0, 1.0],
  e: [0, 0, 0, 0, 0, 1],
  k: [25.09876703708589, 11.62013104361867, 28.49148307714626, -5.664021568594133, 0, 0],
  l: [1.638054557396973, -0.7373619806678748, 8.47791821923899, 15.9925314877952, -1.882352941176471, 0],
};
