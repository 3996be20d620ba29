import { TOWNSEND } from '../units/constants.ts';
import {
  crossSectionFromPerTorr,
  exponentialPerTorr,
  mobilityFromReduced,
  mobilityFromTorr,
  reducedFieldFromPerTorr,
  TABLE_TEMPERATURE,
  thermalIonEnergy,
} from './conversions.ts';
import type { GasData } from './gas.ts';
import { LIEBERMAN } from './sources.ts';

const Td = TOWNSEND;

/** Nitrogen, N2+ as the only ion. */
export const nitrogen: GasData = {
  name: 'nitrogen',
  title: 'Nitrogen',
  set: 'raizer',
  reason:
    'Two pairs of constants that together reach from 27 to 600 V/(cm Torr): wide and dense gaps are covered, which one pair cannot do.',
  coefficients: {
    // α/p = 8.8 exp(−275 p/E) and 12 exp(−342 p/E) 1/(cm Torr), which cross at (342 − 275)/ln(12/8.8) = 216 V/(cm Torr)
    ionisation: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: { kind: 'exponential', A: crossSectionFromPerTorr(8.8), B: reducedFieldFromPerTorr(275) } },
          {
            from: reducedFieldFromPerTorr((342 - 275) / Math.log(12 / 8.8)),
            form: { kind: 'exponential', A: crossSectionFromPerTorr(12), B: reducedFieldFromPerTorr(342) },
          },
        ],
        blend: 0.1,
      },
      range: { from: reducedFieldFromPerTorr(27), to: reducedFieldFromPerTorr(600) },
      source:
        'Raizer, Gas Discharge Physics, 1991, Table 4.1: A 8.8, B 275 for 27 to 200 V/(cm Torr); A 12, B 342 for 100 to 600 (after von Engel, Ionized Gases, 1965)',
      status: 'from memory (M)',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'Chosen over the single pair 11.8, 325 for 100 to 600 V/(cm Torr) of Lieberman and Lichtenberg (2005, Table 14.1) because the two together reach ' +
        'down to 27 V/(cm Torr), where wide or dense gaps break down: at 40 V/(cm Torr) they make the multiplication of a 1 cm gap at 1 atm about 1e3, as ' +
        'DeBitetto and Fisher found (1956), and the single pair only 14. The two agree within 7 % above 200 V/(cm Torr). Joined where they cross, at ' +
        '216 V/(cm Torr), so continuous, with the slope smoothed over 10 % of the field; between 100 and 200 they differ by 43 to 3 % and the low one is used. ' +
        'Pressure taken at 20 °C; at 0 °C α/N and B would be 7 % smaller.',
    },
    attachment: null,
    electronMobility: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: { kind: 'constant', value: mobilityFromTorr(0.42e6) } },
          { from: reducedFieldFromPerTorr(50), form: { kind: 'linear-drift', w0: 7.1e4, w1: 7.4e23, floor: Td } },
        ],
        blend: 0.3,
      },
      range: { from: reducedFieldFromPerTorr(2), to: 2000 * Td },
      source:
        'Raizer, Gas Discharge Physics, 1991, Table 2.1: μp = 0.42e6 cm² Torr/(V s) up to 50 V/(cm Torr); above it the fit for air of Morrow and Lowke, J. Phys. D 30, 614, 1997',
      status: 'from memory (M)',
      uncertainty: 0.25,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'Above 152 Td air stands in for nitrogen, its four fifths. The step between the two (13 %) is blended over 30 % of the field. ' +
        'Pressure taken at 20 °C; at 0 °C the low part would be 7 % higher. Breakdown voltage and ion-fed lag hardly depend on it.',
    },
    electronEnergy: {
      form: {
        kind: 'table',
        law: 'plain',
        x: [10 * Td, 30 * Td, 100 * Td, 200 * Td, 500 * Td, 1000 * Td],
        y: [0.8, 1.1, 1.9, 3.0, 5.5, 8.5],
      },
      range: { from: 10 * Td, to: 1000 * Td },
      source: 'order of published D/μ in nitrogen',
      status: 'from memory (L)',
      uncertainty: 0.3,
      referenceTemperature: null,
      note: 'Rounded recollection of values across the field; along it they are somewhat smaller. Breakdown voltage shifts by far less than 1 % with it.',
    },
    ionMobility: {
      form: { kind: 'falling', low: mobilityFromReduced(1.9), scale: 210 * Td, power: 1.5, fall: 0.33 },
      range: { from: 50 * Td, to: 1000 * Td },
      source:
        'K0 of N2+ in N2, 1.87 to 1.90 cm²/(V s) at low field: Ellis et al., At. Data Nucl. Data Tables 17, 177, 1976; fall with the field: our own fit to values recalled from the same tables',
      status: 'from memory (L)',
      uncertainty: 0.2,
      referenceTemperature: 300,
      note:
        'N2+ is the ion at breakdown fields and moves by resonant charge transfer; the fall follows the form used for Ar+, with K0 0.86 at 1000 Td, as ' +
        'the limit W = sqrt(2 e E λ/(π M)) (Wannier 1953) gives for a transfer cross-section of 4e-19 m². At low field N2+ turns into N4+ ' +
        '(K0 2.33, 23 % faster; Varney 1953), which is not modelled: in dense, weak fields ions are then too slow and lags too long.',
    },
    ionEnergy: thermalIonEnergy,
    negativeIonMobility: null,
    negativeIonEnergy: null,
    electronIonRecombination: null,
    ionIonRecombination: null,
  },
  alternatives: {
    lieberman: {
      reason:
        'One pair of constants for 100 to 600 V/(cm Torr), within 7 % of the default above 200. Below 100 far too little ionisation: V_s too high at large pd, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(11.8, 325),
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(600) },
          source: `${LIEBERMAN}: A 11.8, B 325`,
          status: 'second-hand',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment: null,
  // Handbook minima 240 to 275 V; α moves V_s by roughly half its own 20 %; the yield, known to a factor, is not part of this figure.
  breakdownUncertainty: 0.2,
  notes: [
    'Breakdown voltage uncertain by 20 %, nothing better being known: α carries 20 %, published minima run from 240 to 275 V, and α below 27 V/(cm Torr) is extrapolated.',
    'Recombination is neglected: no effect on breakdown at low pressure; a dense glow comes out slightly too strong.',
    'Metastables that ionise or release electrons at the cathode are only in the net yield of the cathode.',
    'The net yield falls to about 1e-3 at 40 V/(cm Torr) (nickel; DeBitetto and Fisher 1956); a constant yield of a few per cent puts V_s low there, which is safe.',
  ],
  // collision cross-section 0.43 nm², common tables of kinetic theory, from memory (M)
  kineticCrossSection: 4.3e-19,
};
