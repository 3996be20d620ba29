import { BOLTZMANN } from '../units/constants.ts';

/** molar gas constant [J/(mol K)], exact (SI Brochure, 2019) */
export const MOLAR_GAS_CONSTANT: number = BOLTZMANN * 6.02214076e23;

/** What the flow of a gas through an opening depends on. */
export interface FlowGas {
  readonly name: string;
  /** [kg/mol] */
  readonly molarMass: number;
  /** γ, ratio of specific heats near room temperature */
  readonly heatRatio: number;
  /** dynamic viscosity μ = μ0 (T/T0)^1.5 (T0 + S)/(T + S): [Pa s], [K], [K] */
  readonly viscosity: { readonly value: number; readonly at: number; readonly sutherland: number };
  readonly source: string;
  readonly status: string;
}

/** Molar masses: IUPAC standard atomic weights. γ: 7/5 and 5/3 are the values of rigid linear molecules and of atoms, within 0.5 % up to 400 K.
 *  Viscosities hold within 2 % from 200 to 500 K (water: 280 to 400 K) and up to atmospheric pressure. */
export const FLOW_GASES: Readonly<Record<'air' | 'nitrogen' | 'argon' | 'helium' | 'water', FlowGas>> = {
  air: {
    name: 'air',
    molarMass: 0.0289644,
    heatRatio: 1.4,
    // β = 1.458e-6 kg/(s m K^½), S = 110.4 K, written at 293.15 K
    viscosity: { value: 1.8134e-5, at: 293.15, sutherland: 110.4 },
    source: 'U.S. Standard Atmosphere, 1976: M0, γ, and eq. 51 for the viscosity',
    status: 'from memory (H)',
  },
  nitrogen: {
    name: 'nitrogen',
    molarMass: 0.0280134,
    heatRatio: 1.4,
    viscosity: { value: 1.663e-5, at: 273.15, sutherland: 107 },
    source: 'White, Viscous Fluid Flow, table 1-2 (Sutherland constants)',
    status: 'from memory (M)',
  },
  argon: {
    name: 'argon',
    molarMass: 0.039948,
    heatRatio: 5 / 3,
    viscosity: { value: 2.1e-5, at: 273.15, sutherland: 144 },
    source: 'White, Viscous Fluid Flow, table 1-2 (Sutherland constant); value at 273.15 K: handbooks, 21.0 µPa s',
    status: 'from memory (M)',
  },
  helium: {
    name: 'helium',
    molarMass: 0.0040026,
    heatRatio: 5 / 3,
    viscosity: { value: 1.87e-5, at: 273.15, sutherland: 79.4 },
    source: 'White, Viscous Fluid Flow, table 1-2 (Sutherland constant); value at 273.15 K: handbooks, 18.7 µPa s',
    status: 'from memory (M)',
  },
  water: {
    name: 'water vapour',
    molarMass: 0.0180153,
    heatRatio: 1.33,
    viscosity: { value: 9.55e-6, at: 293.15, sutherland: 423 },
    source: 'viscosity fitted here to the dilute-gas limit of IAPWS R12-08 (2008), 280 to 400 K; γ: steam tables',
    status: 'from memory (H)',
  },
};

/** Dynamic viscosity, independent of pressure.
 *  μ = μ0 (T/T0)^1.5 (T0 + S)/(T + S)
 *  @param temperature  [K], 200…500
 *  @returns [Pa s]
 *  Source: Sutherland, Phil. Mag. 36, 507, 1893
 *  @example viscosity(FLOW_GASES.air, 288.15) // 1.7894e-5 */
export function viscosity(gas: FlowGas, temperature: number): number {
  const { value, at, sutherland } = gas.viscosity;
  return (value * (temperature / at) ** 1.5 * (at + sutherland)) / (temperature + sutherland);
}

/** √(R T/M) [m/s]: the isothermal speed of sound, the speed every flow here is counted in.
 *  @example thermalSpeed(FLOW_GASES.air, 293.15) // 290.09 */
export function thermalSpeed(gas: FlowGas, temperature: number): number {
  return Math.sqrt((MOLAR_GAS_CONSTANT * temperature) / gas.molarMass);
}

/** Mean free path by the viscosity.
 *  λ = (μ/p) √(π R T/(2 M))
 *  @returns [m]
 *  Source: the definition used for the transition data cited here (Dushman, Scientific Foundations of Vacuum Technique, 2nd ed. 1962; from memory M)
 *  @example meanFreePath(FLOW_GASES.air, 293.15, 1) // 0.0066 */
export function meanFreePath(gas: FlowGas, temperature: number, pressure: number): number {
  return (viscosity(gas, temperature) / pressure) * Math.sqrt(Math.PI / 2) * thermalSpeed(gas, temperature);
}
