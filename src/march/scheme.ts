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

/** RODAS: six stages, order 4 with an embedded 3, L-stable and stiffly accurate.
 *
 *  Source: Hairer and Wanner, Solving Ordinary Differential Equations II, Springer, 1991, section VI.4 (RODAS); coefficients from
 *  memory, confirmed here by the measured orders 4, 3 and 3 (dense output) in test/orders. Of the schemes tried it follows
 *  exponential growth best for its estimate: half the error of Steinebach's RODASP (1995) at equal steps, which was the other candidate. */
export const RODAS: Scheme = {
  name: 'RODAS',
  order: 4,
  gamma: 0.25,
  a: [
    [],
    [1.544],
    [0.9466785280815826, 0.2557011698983284],
    [3.314825187068521, 2.896124015972201, 0.9986419139977817],
    [1.221224509226641, 6.019134481288629, 12.53708333932087, -0.687886036105895],
    [1.221224509226641, 6.019134481288629, 12.53708333932087, -0.687886036105895, 1],
  ],
  g: [
    [],
    [-5.6688],
    [-2.430093356833875, -0.2063599157091915],
    [-0.1073529058151375, -9.594562251023355, -20.47028614809616],
    [7.496443313967647, -10.24680431464352, -33.99990352819905, 11.7089089320616],
    [8.083246795921522, -7.981132988064893, -31.52159432874371, 16.31930543123136, -6.058818238834054],
  ],
  c: [0, 0.386, 0.21, 0.63, 1, 1],
  d: [0.25, -0.1043, 0.1035, -0.0362, 0, 0],
  m: [1.221224509226641, 6.019134481288629, 12.53708333932087, -0.687886036105895, 1, 1],
  e: [0, 0, 0, 0, 0, 1],
  k: [10.12623508344586, -7.487995877610167, -34.80091861555747, -7.992771707568823, 1.025137723295662, 0],
  l: [-0.6762803392801253, 6.087714651680015, 16.43084320892478, 24.76722511418386, -6.594389125716872, 0],
};
