/** Physical constants in SI. Exact values: SI Brochure, 9th edition, 2019. ε0: CODATA 2018 recommended value. */

/** elementary charge [C], exact */
export const ELEMENTARY_CHARGE = 1.602176634e-19;
/** Boltzmann constant [J/K], exact */
export const BOLTZMANN = 1.380649e-23;
/** vacuum permittivity [F/m], 8.8541878128(13)e-12, CODATA 2018 */
export const VACUUM_PERMITTIVITY = 8.8541878128e-12;
/** Loschmidt number density at 273.15 K and 101325 Pa [1/m³], computed from exact constants */
export const LOSCHMIDT: number = 101325 / (BOLTZMANN * 273.15);
/** one townsend [V m²], exact by definition */
export const TOWNSEND = 1e-21;
