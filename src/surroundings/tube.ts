import { effusionSpeed } from './aperture.ts';
import { type FlowGas, meanFreePath, thermalSpeed, viscosity } from './flow-gas.ts';

/** Gas along the bore of a round tube, its exit left out: the part of a vent's resistance that grows with its length. */

/** Length that a short tube's wall seems to have for free molecules.
 *  L' = L {1 + 1/[3 + 3L/(7a)]}
 *  Source: Santeler, J. Vac. Sci. Technol. A 4, 338, 1986; from memory (M); checked against Clausing's equation, solved in test/surroundings
 *  @example effectiveLength(0.02, 0.01) // 0.02518519 */
export function effectiveLength(length: number, radius: number): number {
  return length * (1 + 1 / (3 + (3 * length) / (7 * radius)));
}

/** Chance that a molecule entering a round tube leaves by the other end (diffuse walls).
 *  W = 1/[1 + 3L'/(8a)], L' by `effectiveLength`
 *  @param length, radius  [m]
 *  Source: Dushman's series of an orifice and a long tube with Santeler's length; within 0.7 % of Clausing's values for any L/a
 *  @example transmission(0.02, 0.01) // 0.5142857 */
export function transmission(length: number, radius: number): number {
  return 1 / (1 + (3 * effectiveLength(length, radius)) / (8 * radius));
}

/** Share of the molecular conductance of a long tube that stays beside the viscous one.
 *  Z = (1 + 2.507 a/λ)/(1 + 3.095 a/λ): 1 for free molecules, 0.81 for dense gas
 *  Source: Knudsen, Ann. Phys. 28, 75, 1909, as given by Dushman 1962; from memory (H). Long tubes follow it within 5 %
 *  @example slipShare(1) // 0.856410 */
export function slipShare(radiusOverPath: number): number {
  return (1 + 2.507 * radiusOverPath) / (1 + 3.095 * radiusOverPath);
}

/** Reynolds number at which Blasius' friction 0.316 Re^{−1/4} meets the laminar 64/Re: (64/0.316)^{4/3} */
const TURBULENT = (64 / 0.316) ** (4 / 3);

/** Flow along a tube from p2 + drop to p2.
 *
 *  Q = Z C_m (p1 − p2) + G,  C_m = (8a/(3L')) A √(RT/2πM) (long tube, 12.1 D³/L for air),
 *  G = π D⁴ (p1² − p2²)/(256 μ L) (Poiseuille); where the Reynolds number of G, 4 G M/(π D μ R T), exceeds 1189 the friction is Blasius' and
 *  G becomes G_c (G/G_c)^{4/7}, G_c the flow at 1189.
 *  Between 1189 and about 2300 smooth flow may stay laminar and up to 1.6 times as much gas pass: the whole of the tube's own uncertainty;
 *  elsewhere 5 % (molecular to laminar) and 10 % (turbulent, to Re 1e5).
 *  @returns [Pa m³/s]
 *  Source: Knudsen 1909; Poiseuille in a compressible isothermal gas; Blasius 1913; from memory (H)
 *  @example tubeFlow(FLOW_GASES.air, 293.15, 0.01, 1, 0, 1e-6) // 1.1984e-10 */
export function tubeFlow(gas: FlowGas, temperature: number, diameter: number, length: number, downstream: number, drop: number): number {
  if (!(drop > 0)) return 0;
  const radius = diameter / 2;
  const friction = viscosity(gas, temperature);
  const mean = downstream + drop / 2;
  const long = ((8 * radius) / (3 * effectiveLength(length, radius))) * Math.PI * radius * radius * effusionSpeed(gas, temperature);
  const molecular = slipShare(radius / meanFreePath(gas, temperature, mean)) * long * drop;
  const laminar = (Math.PI * diameter ** 4 * mean * drop) / (128 * friction * length);
  const limit = (TURBULENT * Math.PI * diameter * friction * thermalSpeed(gas, temperature) ** 2) / 4;
  return molecular + (laminar > limit ? limit * (laminar / limit) ** (4 / 7) : laminar);
}
