import { BOLTZMANN, LOSCHMIDT, TOWNSEND } from '../units/constants.ts';
import type { Form } from './forms.ts';
import type { Coefficient } from './gas.ts';

/** Published units turned into N-based SI, once, where the data are written down.
 *
 *  Older tables give coefficients against pressure. What the electrons feel is the density N = p/(kT), so such a
 *  number means nothing without the temperature of its pressure. The tables of textbooks say neither 0 °C nor 20 °C;
 *  we take 20 °C for them (for Ward's constants 0 °C, see `ward`). Had 0 °C been meant, N-based values would shift by 293.15/273.15 − 1 = 7.3 %
 *  (α/N and B lower, μN higher), and with them the pd of a minimum; the minimum voltage depends on B/A only and stays. */

/** 1 Torr [Pa] = 101325/760, by definition */
const TORR = 101325 / 760;

/** temperature of the pressure in p-based tables [K], our choice (see above) */
export const TABLE_TEMPERATURE = 293.15;

/** temperature of the pressure p0 in older papers [K] */
export const ICE_POINT = 273.15;

/** N of 1 Torr at the table temperature [1/m³], 3.294e22 */
const DENSITY_PER_TORR: number = TORR / (BOLTZMANN * TABLE_TEMPERATURE);

/** A of α/p [1/(cm Torr)] → α/N [m²], p at a temperature [K] */
export function crossSectionFromPerTorr(perCmTorr: number, temperature: number = TABLE_TEMPERATURE): number {
  return (perCmTorr * 100 * (temperature / TABLE_TEMPERATURE)) / DENSITY_PER_TORR;
}

/** E/p [V/(cm Torr)] → E/N [V m²], p at a temperature [K]; 1 V/(cm Torr) = 3.036 Td at 20 °C, 2.829 Td at 0 °C */
export function reducedFieldFromPerTorr(voltPerCmTorr: number, temperature: number = TABLE_TEMPERATURE): number {
  return (voltPerCmTorr * 100 * (temperature / TABLE_TEMPERATURE)) / DENSITY_PER_TORR;
}

/** α/p = A exp(−B p/E), A in 1/(cm Torr), B in V/(cm Torr), p at 20 °C */
export function exponentialPerTorr(A: number, B: number): Extract<Form, { kind: 'exponential' }> {
  return { kind: 'exponential', A: crossSectionFromPerTorr(A), B: reducedFieldFromPerTorr(B) };
}

/** α/p = C exp(−D √(p/E)), C in 1/(cm Torr), D in (V/(cm Torr))^½, p at 0 °C: for argon that basis agrees with N-based data within 11 %, 20 °C would not */
export function ward(C: number, D: number): Extract<Form, { kind: 'root' }> {
  return { kind: 'root', C: crossSectionFromPerTorr(C, ICE_POINT), D: D * Math.sqrt(reducedFieldFromPerTorr(1, ICE_POINT)) };
}

/** Lowest E/N [V m²] at which C exp(−D/√x) falls below A exp(−B/x); they must cross. */
export function crossing(root: Extract<Form, { kind: 'root' }>, other: Extract<Form, { kind: 'exponential' }>): number {
  // B u² − D u + ln(C/A) = 0 with u = 1/√x; the larger root is the lower field
  const u = (root.D + Math.sqrt(root.D ** 2 - 4 * other.B * Math.log(root.C / other.A))) / (2 * other.B);
  return 1 / (u * u);
}

/** E/N [V m²] at which A₁ exp(−B₁/x) and A₂ exp(−B₂/x) cross. */
export function exponentialCrossing(a: Extract<Form, { kind: 'exponential' }>, b: Extract<Form, { kind: 'exponential' }>): number {
  return (b.B - a.B) / Math.log(b.A / a.A);
}

/** rows (E/N [Td], value) as a table of a slowly varying coefficient, its end values kept outside */
export function tableInTd(rows: readonly (readonly [number, number])[]): Form {
  return { kind: 'table', law: 'plain', x: rows.map(([td]) => td * TOWNSEND), y: rows.map(([, y]) => y) };
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
  referenceTemperature: TABLE_TEMPERATURE,
  note:
    'Held at the value for 293.15 K whatever the gas temperature, so that equal density gives identical answers. ' +
    'In strong fields ions are hotter than the gas and the true D/μ is larger, up to volts; ions cross a gap by drift, ' +
    'and breakdown voltage and lag hardly depend on it.',
};
