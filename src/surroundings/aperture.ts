import { type FlowGas, thermalSpeed, viscosity } from './flow-gas.ts';

/** Gas through a round hole in a thin wall, from free molecules to a choked jet.
 *
 *  Flows are p dV/dt [Pa m³/s] at the gas temperature, the same on both sides; c = √(R T/M); A, a: area and radius of the hole. */

/** Share of the ideal jet that passes a sharp or short round opening.
 *  Source: reference range of handbooks, 0.6 to 0.85; status: from memory (M) */
export const DISCHARGE_COEFFICIENT = { typical: 0.7, low: 0.6, high: 0.85 } as const;

/** Free-molecular conductance of a hole per area: molecules that arrive on either side pass.
 *  C/A = √(R T/(2π M)), with the flow C (p1 − p2)
 *  @returns [m/s]; 1 m/s = 0.1 L/(s cm²)
 *  Source: kinetic theory (Knudsen 1909)
 *  @example effusionSpeed(FLOW_GASES.air, 293.15) // 115.73 */
export function effusionSpeed(gas: FlowGas, temperature: number): number {
  return thermalSpeed(gas, temperature) / Math.sqrt(2 * Math.PI);
}

/** Pressure ratio p2/p1 below which the jet is choked.
 *  r* = (2/(γ + 1))^{γ/(γ−1)}
 *  @example criticalRatio(1.4) // 0.52828 */
export function criticalRatio(heatRatio: number): number {
  return (2 / (heatRatio + 1)) ** (heatRatio / (heatRatio - 1));
}

/** Isentropic jet into a lower pressure, over A p1 c; constant below the critical ratio.
 *  ψ = √{2γ/(γ−1) [r^{2/γ} − r^{(γ+1)/γ}]},  r = p2/p1 = 1 − drop/p1
 *  @param drop  (p1 − p2)/p1, 0…1: given instead of the ratio so that small drops keep their digits
 *  Source: Saint-Venant and Wantzel 1839; any text on gas dynamics
 *  @example jetFunction(1.4, 1) // 0.68473 */
export function jetFunction(heatRatio: number, drop: number): number {
  const choked = 1 - criticalRatio(heatRatio);
  const log = Math.log1p(-Math.min(drop, choked));
  const rest = -Math.expm1(((heatRatio - 1) / heatRatio) * log);
  return Math.sqrt(((2 * heatRatio) / (heatRatio - 1)) * Math.exp((2 / heatRatio) * log) * rest);
}

/** Share of the way from effusion to the jet at a rarefaction parameter.
 *  θ = (1 + 1.2688/√δ)/(1 + 4.559/δ + 3.094/δ²),  δ = a p1/(μ √(2RT/M)) = (√π/2) a/λ
 *  This is (W − 1)/0.4733 of the published fit to simulated flow of a monatomic gas through a thin orifice into vacuum, W = flow over effusion,
 *  1 % there. It is held at 1 above δ = 13.9, where the fit overshoots by at most 9 % of the rise (3 % of W): so flows stay monotone.
 *  Source: Sharipov, J. Fluid Mech. 518, 35, 2004; from memory (M). Carried over to other gases, discharge coefficients and pressure ratios we
 *  reckon with 10 %
 *  @example continuumShare(1) // 0.262198 */
export function continuumShare(rarefaction: number): number {
  if (!(rarefaction > 0)) return 0;
  const root = Math.sqrt(rarefaction);
  // over δ² on both sides, so that small δ stays finite
  return Math.min(1, (rarefaction * (rarefaction + 1.2688 * root)) / (rarefaction * (rarefaction + 4.559) + 3.094));
}

/** Flow through a thin round hole from p2 + drop to p2.
 *
 *  Q = Q_e + X: effusion Q_e = A √(RT/2πM) (p1 − p2) and an excess due to collisions, which is
 *  - in a jet θ(δ) (C_d A p1 c ψ − Q_e), so that Q goes from effusion to the jet;
 *  - in creeping flow that of Sampson, X = a³ (p1² − p2²)/(6 μ).
 *  The smaller of the two counts (rounded off, (X₁⁻⁴ + X₂⁻⁴)^{−1/4}): a jet needs inertia, creeping flow has none.
 *  @param diameter  [m]   @param coefficient  of discharge, 0…1, in viscous flow only   @param drop  p1 − p2 ≥ 0 [Pa]
 *  @returns [Pa m³/s]
 *  Source: Sharipov 2004 (θ); Sampson, Phil. Trans. R. Soc. A 182, 449, 1891; from memory (M). 10 % beside the discharge coefficient
 *  @example apertureFlow(FLOW_GASES.air, 293.15, 0.01, 1, 0, 1e5) // 1560.1 */
export function apertureFlow(
  gas: FlowGas,
  temperature: number,
  diameter: number,
  coefficient: number,
  downstream: number,
  drop: number,
): number {
  if (!(drop > 0)) return 0;
  const radius = diameter / 2;
  const area = Math.PI * radius * radius;
  const upstream = downstream + drop;
  const speed = thermalSpeed(gas, temperature);
  const friction = viscosity(gas, temperature);
  const effusion = area * effusionSpeed(gas, temperature) * drop;
  const share = continuumShare((radius * upstream) / (friction * Math.SQRT2 * speed));
  const jet = share * (coefficient * area * upstream * speed * jetFunction(gas.heatRatio, drop / upstream) - effusion);
  // a discharge coefficient below that of effusion, 0.58 in air, makes the excess negative
  if (!(jet > 0)) return effusion + jet;
  const creeping = (radius ** 3 * (upstream + downstream) * drop) / (6 * friction);
  const ratio = (creeping / jet) ** 4;
  return effusion + (ratio > 1 ? jet / (1 + 1 / ratio) ** 0.25 : creeping / (1 + ratio) ** 0.25);
}
