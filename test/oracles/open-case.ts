/** The open case: the gap whose numbers several tests compare, in plain SI numbers and plain functions.
 *
 *  Contains: the constants, the coefficients, the published-in-the-issue results. No solver.
 *  Coefficients: α/p = 12 exp(−180 p/E) 1/(cm Torr) (argon's exponential form, Raizer 1991 table 4.1, from memory H),
 *  γ = 0.07 (argon ions on clean metal, Phelps & Petrović 1999, from memory H), mobilities and energies of the issue. */

/** SI Brochure, 9th edition, 2019 (exact) and CODATA 2018 (ε0): kept apart from src/ on purpose */
export const ELEMENTARY_CHARGE = 1.602176634e-19;
export const BOLTZMANN = 1.380649e-23;
export const VACUUM_PERMITTIVITY = 8.8541878128e-12;

const PASCAL_PER_TORR = 101325 / 760;

const torr = 3;

export interface OpenCase {
  readonly spacing: number;
  readonly area: number;
  readonly pressureTorr: number;
  readonly pressure: number;
  readonly temperature: number;
  readonly density: number;
  readonly ionYield: number;
  readonly ionisationAmplitude: number;
  readonly ionisationScale: number;
  readonly alpha: (field: number) => number;
  readonly electronMobility: number;
  readonly ionMobility: number;
  readonly electronEnergy: number;
  readonly ionEnergy: number;
  readonly seedCurrent: number;
  readonly supplyVoltage: number;
  readonly seriesResistance: number;
  readonly breakdownVoltage: number;
  readonly steadyVoltage: number;
  readonly steadyCurrent: number;
  readonly steadyCathodeField: number;
}

export const openCase: OpenCase = {
  /** [m] */
  spacing: 0.01,
  /** [m²] */
  area: 1e-3,
  /** [Torr], at 300 K, which is the reference temperature of the coefficients too */
  pressureTorr: torr,
  /** [Pa] */
  pressure: torr * PASCAL_PER_TORR,
  /** [K] */
  temperature: 300,
  /** [1/m³] */
  density: (torr * PASCAL_PER_TORR) / (BOLTZMANN * 300),
  ionYield: 0.07,
  /** A p [1/m] */
  ionisationAmplitude: 12 * 100 * torr,
  /** B p [V/m] */
  ionisationScale: 180 * 100 * torr,
  /** α [1/m] of the field [V/m] */
  alpha: (field: number): number => (field === 0 ? 0 : 12 * 100 * torr * Math.exp((-180 * 100 * torr) / Math.abs(field))),
  /** [m²/(V s)], μ_e p = 3e5 cm² Torr/(V s) */
  electronMobility: 30 / torr,
  /** [m²/(V s)], μ_i p = 1400 cm² Torr/(V s) */
  ionMobility: 0.14 / torr,
  /** D/μ [V] */
  electronEnergy: 1,
  ionEnergy: 0.026,
  /** [A] */
  seedCurrent: 1e-10,
  supplyVoltage: 230.202,
  seriesResistance: 1e4,
  /** given with the issue: closed form, then the steady state of two codes that agree to 3e-5 */
  breakdownVoltage: 209.274,
  steadyVoltage: 186.414,
  steadyCurrent: 4.3788e-3,
  steadyCathodeField: 1.41143e5,
};
