import { BOLTZMANN, LOSCHMIDT } from '../units/constants.ts';
import type { Coefficient } from './gas.ts';

/** Published units turned into N-based SI, once, where the data are written down.
 *
 *  Older tables give coefficients against pressure. What the electrons feel is the density N = p/(kT), so such a
 *  number means nothing without the temperature of its pressure. The tables used here say neither 0 °C nor 20 °C;
 *  we take 20 °C throughout. Had 0 °C been meant, N-based values would shift by 293.15/273.15 − 1 = 7.3 %
 *  (α/N and B lower, μN higher), and with them the pd of a minimum; the minimum voltage depends on B/A only and stays. */

/** 1 Torr [Pa] = 101325/760, by definition */
const TORR = 101325 / 760;

/** temperature of the pressure in p-based tables [K], our choice (see above) */
export const TABLE_TEMPERATURE = 293.15;

/** N of 1 Torr at the table temperature [1/m³], 3.294e22 */
const DENSITY_PER_TORR: number = TORR / (BOLTZMANN * TABLE_TEMPERATURE);

/** A of α/p [1/(cm Torr)] → α/N [m²] */
export function crossSectionFromPerTorr(perCmTorr: number): number {
  return (perCmTorr * 100) / DENSITY_PER_TORR;
}

/** E/p [V/(cm Torr)] → E/N [V m²]; 1 V/(cm Torr) = 3.036 Td */
export function reducedFieldFromPerTorr(voltPerCmTorr: number): number {
  return (voltPerCmTorr * 100) / DENSITY_PER_TORR;
}

/** μp [cm² Torr/(V s)] → μN [1/(m V s)] */
export function mobilityFromTorr(cm2TorrPerVs: number): number {
  return cm2TorrPerVs * 1e-4 * DENSITY_PER_TORR;
}

/** mobility at 760 Torr and the table temperature [cm²/(V s)] → μN [1/(m V s)] */
export function mobilityFromOneAtmosphere(cm2PerVs: number): number {
  return mobilityFromTorr(cm2PerVs * 760);
}

/** reduced mobility K0 [cm²/(V s)], at 273.15 K and 760 Torr by definition → μN [1/(m V s)] */
export function mobilityFromReduced(K0: number): number {
  return K0 * 1e-4 * LOSCHMIDT;
}

/** D/μ [V] of ions: kT/e at 293.15 K, the Einstein relation at low field.
 *
 *  It is held at this value whatever the gas temperature, so that equal N gives identical answers at any temperature. */
export const thermalIonEnergy: Coefficient = {
  form: { kind: 'constant', value: 0.02526 },
  range: null,
  source: 'Einstein relation, D/μ = kT/e at 293.15 K',
  status: 'computed',
  uncertainty: null,
  note:
    'Held at the value for 293.15 K whatever the gas temperature, so that equal density gives identical answers. ' +
    'In strong fields ions are hotter than the gas and the true D/μ is larger, up to volts; ions cross a gap by drift, ' +
    'and breakdown voltage and lag hardly depend on it.',
};
