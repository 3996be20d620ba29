import { TOWNSEND } from '../units/constants.ts';
import {
  crossSectionFromPerTorr,
  mobilityFromOneAtmosphere,
  reducedFieldFromPerTorr,
  TABLE_TEMPERATURE,
  thermalIonEnergy,
} from './conversions.ts';
import type { Form } from './forms.ts';
import type { Coefficient, GasData } from './gas.ts';
import { RAIZER } from './sources.ts';

const Td = TOWNSEND;

/** The fits of Morrow and Lowke are in cm, s and E/N in V cm²: 1 V cm² = 1e-4 V m². */
const MORROW_LOWKE = 'Morrow and Lowke, Streamer propagation in air, J. Phys. D 30, 614, 1997, appendix';
const V_CM2 = 1e-4;
const CM2 = 1e-4;
const CM3 = 1e-6;

/** α/N = A exp(−B/(E/N)) of the low and high range of Morrow and Lowke, A in cm², B in V cm² */
const lowRange: Form = { kind: 'exponential', A: 6.619e-17 * CM2, B: 5.593e-15 * V_CM2 };
const highRange: Form = { kind: 'exponential', A: 2.0e-16 * CM2, B: 7.248e-15 * V_CM2 };
/** α/p = 15 exp(−365 p/E) 1/(cm Torr) */
const strongFields: Form = { kind: 'exponential', A: crossSectionFromPerTorr(15), B: reducedFieldFromPerTorr(365) };
/** where the last two cross [V m²], 466 Td */
const crossing = (strongFields.B - highRange.B) / Math.log(strongFields.A / highRange.A);

/** A drift velocity W = slope (E/N) + offset cm/s, E/N in V cm² */
function drift(slope: number, offset: number): Form {
  return { kind: 'linear-drift', w0: offset * 1e-2, w1: (slope * 1e-2) / V_CM2, floor: 0.05 * Td };
}

const recombination: Coefficient = {
  form: { kind: 'constant', value: 2e-7 * CM3 },
  range: null,
  source: MORROW_LOWKE,
  status: 'from memory (H)',
  uncertainty: 0.5,
  referenceTemperature: TABLE_TEMPERATURE,
  note: '2e-7 cm³/s, meant for 1 atm and used at every density. No effect on breakdown; it bounds the density of a dense glow.',
};

/** Dry air: electrons, one positive and one negative ion. */
export const air: GasData = {
  name: 'air',
  title: 'Dry air',
  set: 'morrow-raizer',
  reason:
    'Streamer data of dense air up to 466 Td, the constants of low-pressure breakdown above: each where it was made, and joined where they cross. Either alone is wrong on the other’s ground.',
  coefficients: {
    ionisation: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: lowRange },
          { from: 1.5e-15 * V_CM2, form: highRange },
          { from: crossing, form: strongFields },
        ],
        blend: 0.1,
      },
      range: { from: 0, to: reducedFieldFromPerTorr(800) },
      source: `${MORROW_LOWKE}, up to 466 Td; above: α/p = 15 exp(−365 p/E) 1/(cm Torr), 100 to 800 V/(cm Torr), Raizer, Gas Discharge Physics, 1991, Table 4.1`,
      status: 'from memory (H)',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'Morrow and Lowke fitted streamers in dense air; at the 1000 Td and more of the Paschen minimum their α is 35 % below Raizer’s, and the minimum would ' +
        'come out 40 % above the measured 327 V, which is unsafe. So Raizer’s constants take over where the two cross, at 466 Td. The joint at 150 Td has a ' +
        'step of 0.3 %; both joints are smoothed over 10 % of the field. At 300 Td Raizer’s α is a third lower than the one used here; a third source, Badaloni and Gallimberti ' +
        '(1972, from memory, M), lies between −4 and +25 % of it from 150 to 730 Td. ' +
        'Raizer’s pressure taken at 20 °C; at 0 °C its α/N and B would be 7 % smaller.',
    },
    // η/N = 6.089e-4 x − 2.893e-19 cm² below 1.05e-15 V cm², 8.889e-5 x + 2.567e-19 above, x = E/N in V cm²
    attachment: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: { kind: 'linear', a: -2.893e-19 * CM2, b: 6.089e-4 } },
          { from: 1.05e-15 * V_CM2, form: { kind: 'linear', a: 2.567e-19 * CM2, b: 8.889e-5 } },
        ],
        blend: 0.05,
      },
      range: null,
      source: `${MORROW_LOWKE}: two-body attachment`,
      status: 'from memory (H)',
      uncertainty: 0.3,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'Zero below 48 Td. The pieces meet within 1e-4; the slope is smoothed over 5 % of the field. Three-body attachment (∝ N²) is left out: at low pressure it is ' +
        'small, and leaving attachment out lowers V_s, which is safe. Detachment is left out too: that raises V_s, which is unsafe, but above 500 Td ' +
        'attachment is below 2 % of ionisation; the doubt is largest near 120 Td, at large pd. The fit keeps growing with the field where real attachment falls: below 1 % of α from 1000 to 2000 Td, 20 % at 1e5 Td.',
    },
    electronMobility: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: drift(6.87e22, 3.38e4) },
          { from: 2.6e-17 * V_CM2, form: drift(7.2973e21, 1.63e6) },
          { from: 1e-16 * V_CM2, form: drift(1.03e22, 1.3e6) },
          { from: 2e-15 * V_CM2, form: drift(7.4e21, 7.1e6) },
        ],
        blend: 0.1,
      },
      range: null,
      source: `${MORROW_LOWKE}: electron drift velocity`,
      status: 'from memory (H)',
      uncertainty: 0.1,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'The joint at 10 Td has a step of 1.3 %; all joints are smoothed over 10 % of the field. Below 0.05 Td μN is held at 1.4e25 1/(m V s), ' +
        'since the offset of the fit would make it infinite at zero field.',
    },
    // D/μ = 0.3341e9 (E/N)^0.54069 V, E/N in V cm²; held at kT/e = 0.025 V below 0.019 Td
    electronEnergy: {
      form: { kind: 'power', factor: 0.3341e9 * (1 / V_CM2) ** 0.54069, exponent: 0.54069, floor: 0.019 * Td },
      range: null,
      source: `${MORROW_LOWKE}: electron diffusion over drift`,
      status: 'from memory (M)',
      uncertainty: 0.3,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'Held at 0.025 V, thermal electrons, below 0.019 Td. Above about 1000 Td an extrapolation.',
    },
    ionMobility: {
      form: { kind: 'constant', value: mobilityFromOneAtmosphere(2.34) },
      range: null,
      source: `${MORROW_LOWKE}: W = 2.34 E p0/p cm/s, E in V/cm, p0 = 760 Torr`,
      status: 'from memory (H)',
      uncertainty: 0.4,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'Density at p0 taken at 20 °C (K0 = 2.18 cm²/(V s)); at 0 °C μN would be 7 % higher. Constant, as for dense air. ' +
        'Ions slow down relative to it in strong fields (N2+ in nitrogen to half at 800 Td): at low pressure lags may come out too short, ' +
        'by up to a factor of two, which is the safe side for a trip or a pulse. V_s does not depend on it.',
    },
    ionEnergy: thermalIonEnergy,
    negativeIonMobility: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: { kind: 'constant', value: mobilityFromOneAtmosphere(1.86) } },
          { from: 5e-16 * V_CM2, form: { kind: 'constant', value: mobilityFromOneAtmosphere(2.7) } },
        ],
        blend: 0.3,
      },
      range: null,
      source: `${MORROW_LOWKE}: W = 1.86 E p0/p cm/s below 50 Td, 2.7 E p0/p above`,
      status: 'from memory (H)',
      uncertainty: 0.3,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'The source steps by 45 % at 50 Td; here the step is spread over 35 to 65 Td. Density at p0 taken at 20 °C.',
    },
    negativeIonEnergy: thermalIonEnergy,
    electronIonRecombination: recombination,
    ionIonRecombination: recombination,
  },
  alternatives: {
    raizer: {
      reason:
        'The constants alone, 15 and 365 for 100 to 800 V/(cm Torr). Below 300 Td up to a third less ionisation: V_s too high at large pd, which is unsafe.',
      coefficients: {
        ionisation: {
          form: strongFields,
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(800) },
          source: `${RAIZER}: A 15, B 365`,
          status: 'second-hand',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
    'morrow-lowke': {
      reason:
        'The streamer data alone, for dense air. At the Paschen minimum 35 % less ionisation than the default: V_s 40 % too high there, which is unsafe.',
      coefficients: {
        ionisation: {
          form: {
            kind: 'joined',
            pieces: [
              { from: 0, form: lowRange },
              { from: 1.5e-15 * V_CM2, form: highRange },
            ],
            blend: 0.1,
          },
          range: { from: 0, to: 600 * Td },
          source: MORROW_LOWKE,
          status: 'from memory (H)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
          note: 'The joint at 150 Td has a step of 0.3 %, smoothed over 10 % of the field. The upper end of the range is ours.',
        },
      },
    },
  },
  detachment:
    'Neglected: V_s comes out too high, which is unsafe. Above 500 Td attachment is below 2 % of ionisation and it does not matter; the doubt is largest near 120 Td, at large pd.',
  // With the yield 0.01 V_s lies 6 % below the measured minimum and 1.5 % above to 11 % below the uniform-field formula from 3 to 760 Torr cm.
  breakdownUncertainty: 0.15,
  notes: [
    'Breakdown voltage uncertain by 15 %: with a yield of 0.01 it comes out 6 % below the measured minimum of 327 V and, from 3 to 760 Torr cm, between ' +
      '1.5 % above and 11 % below the uniform-field formula V = 24.22 x + 6.08 √x kV.',
    'The computed minimum lies at 0.83 Torr cm, the measured one at 0.57: left of the minimum V_s comes out too high, which is unsafe; ' +
      'use the minimum voltage itself as the limit there.',
    'Three-body attachment is neglected (V_s too low, safe); detachment is neglected (V_s too high, unsafe, small above 500 Td and largest near 120 Td).',
    'Photons from the gas release electrons at the cathode and in the gas; they are only in the net yield.',
    'Dry air. Water vapour attaches electrons and changes the ions; it is not modelled.',
  ],
  // collision cross-section 0.42 nm², between 0.43 of nitrogen and 0.40 of oxygen in common tables of kinetic theory, from memory (M)
  kineticCrossSection: 4.2e-19,
};
