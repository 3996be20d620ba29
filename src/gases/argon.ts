import { TOWNSEND } from '../units/constants.ts';
import { exponentialPerTorr, ICE_POINT, reducedFieldFromPerTorr, TABLE_TEMPERATURE, thermalIonEnergy, ward } from './conversions.ts';
import type { GasData } from './gas.ts';
import { LIEBERMAN, RAIZER, WARD } from './sources.ts';

const Td = TOWNSEND;

/** Argon, Ar+ as the only ion. */
export const argon: GasData = {
  name: 'argon',
  title: 'Argon',
  set: 'phelps-petrovic',
  reason:
    'A fit to measurements over 15 to 10000 Td, the widest there is, given against E/N so that no temperature of a pressure is in doubt; Ward’s form agrees with it within 11 % from 30 to 2000 Td, pairs of constants A, B only over a part of that.',
  coefficients: {
    // α/N = 1.1e-22 e^(−72/x) + 5.5e-21 e^(−187/x) + 3.2e-20 e^(−700/x) − 1.5e-20 e^(−10000/x) m², x in Td
    ionisation: {
      form: {
        kind: 'exponential-sum',
        terms: [
          { amplitude: 1.1e-22, scale: 72 * Td },
          { amplitude: 5.5e-21, scale: 187 * Td },
          { amplitude: 3.2e-20, scale: 700 * Td },
          { amplitude: -1.5e-20, scale: 10000 * Td },
        ],
      },
      range: { from: 15 * Td, to: 10000 * Td },
      source: 'Phelps and Petrović, Cold-cathode discharges and breakdown in argon, Plasma Sources Sci. Technol. 8, R21, 1999',
      status: 'from memory (H)',
      uncertainty: 0.11,
      referenceTemperature: null,
      note:
        'Within 11 % of the square-root form of Ward (J. Appl. Phys. 33, 2789, 1962; pressure at 0 °C) over 30 to 2000 Td, which is where the ' +
        'uncertainty comes from. Above 2000 Td it falls 30 to 45 % below Ward and a local α has little meaning. Below about 36 Td ' +
        '(5 to 12 V/(cm Torr)) measured α/p depends on the gap length (resonance radiation), so no α(E/N) describes it.',
    },
    attachment: null,
    // μN = 7.8e23 (x/100 Td)^−0.121 1/(m V s)
    electronMobility: {
      form: { kind: 'power', factor: 7.8e23 * (100 * Td) ** 0.121, exponent: -0.121, floor: 3 * Td },
      range: { from: 3 * Td, to: 1000 * Td },
      source:
        'fit to our own two-term solution of the Boltzmann equation with the cross-sections of Phelps and Petrović (1999), 10 to 1000 Td; ' +
        'beside μp = 0.33e6 cm² Torr/(V s) for 1 to 13 V/(cm Torr) of Raizer, Gas Discharge Physics, 1991, Table 2.1',
      status: 'computed',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'The fit follows the solution within 4 %; the solution’s own α/N lies within 20 % of the fit used here from 50 to 1000 Td. Raizer’s constant (from memory, M; pressure at ' +
        '20 °C) is 9 % lower than the fit at 3 Td, equal near 6 Td and 25 % higher at 40 Td, where its range ends. Breakdown voltage and ion-fed lag hardly depend on it.',
    },
    electronEnergy: {
      form: { kind: 'constant', value: 6 },
      range: { from: 10 * Td, to: 1000 * Td },
      source: 'order of published D/μ in argon, several volts above 10 Td',
      status: 'from memory (L)',
      uncertainty: 0.5,
      referenceTemperature: null,
      note:
        'One value for a quantity that depends on the field and on direction: the two-term solution gives 7.7 to 11 V across the field from 10 to 1000 Td, and ' +
        'diffusion along the field, which counts here, is slower. Far too hot for the nearly field-free part of a glow. Breakdown voltage shifts little with it.',
    },
    // W = 4 x/(1 + (0.007 x)^1.5)^0.33 m/s, x in Td, so that μN = W/(E/N) = (4/1e-21) (1 + (0.007 x)^1.5)^−0.33
    ionMobility: {
      form: { kind: 'falling', low: 4 / Td, scale: Td / 0.007, power: 1.5, fall: 0.33 },
      range: { from: 10 * Td, to: 10000 * Td },
      source: 'Phelps and Petrović, Plasma Sources Sci. Technol. 8, R21, 1999: drift velocity of Ar+ in argon',
      status: 'from memory (H)',
      uncertainty: 0.1,
      referenceTemperature: 300,
      note:
        'K0 = 1.49 cm²/(V s) at zero field; measurements give 1.53 to 1.63. Within 4 % of the values of Ellis et al. ' +
        '(At. Data Nucl. Data Tables 17, 177, 1976; from memory, M) from 10 to 1000 Td.',
    },
    ionEnergy: thermalIonEnergy,
    negativeIonMobility: null,
    negativeIonEnergy: null,
    electronIonRecombination: null,
    ionIonRecombination: null,
  },
  alternatives: {
    ward: {
      reason: 'The square-root form, 11 % lower or higher than the default from 30 to 2000 Td; for comparison with older work.',
      coefficients: {
        ionisation: {
          form: ward(29.22, 26.64),
          range: { from: reducedFieldFromPerTorr(10, ICE_POINT), to: reducedFieldFromPerTorr(700, ICE_POINT) },
          source: `${WARD}: C 29.22, D 26.64, below 700 V/(cm Torr)`,
          status: 'from memory (H)',
          uncertainty: 0.15,
          referenceTemperature: ICE_POINT,
          note: 'Pressure taken at 0 °C; the lower end of the range is ours.',
        },
      },
    },
    raizer: {
      reason:
        'The constants most often copied, 12 and 180 for 100 to 600 V/(cm Torr). Below that too little ionisation: V_s too high at large pd, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(12, 180),
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(600) },
          source: `${RAIZER}: A 12, B 180`,
          status: 'from memory (H)',
          uncertainty: 0.15,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
    lieberman: {
      reason:
        'A 11.5, B 176 for 100 to 600 V/(cm Torr), 2 to 4 % below Raizer’s. Below that too little ionisation: V_s too high at large pd, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(11.5, 176),
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(600) },
          source: `${LIEBERMAN}: A 11.5, B 176`,
          status: 'second-hand',
          uncertainty: 0.15,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment: null,
  // No better figure is known than the spread between handbooks, whose minima for argon run from 137 to 265 V.
  breakdownUncertainty: 0.2,
  notes: [
    'Breakdown voltage uncertain by 20 %: published minima run from 137 to 265 V with cathode and purity, wider than α alone explains.',
    'A trace of another gas lowers the breakdown voltage (Penning ionisation by metastables). It is not modelled: on that point V_s errs high, ' +
      'which is unsafe; take pure-argon results for a clean system only.',
    'Electrons released by photons and metastables are only in the net yield of the cathode. Below about 40 Td they dominate and the yield is uncertain.',
    'Ar2+ and electron-ion recombination are neglected: no effect on breakdown at low pressure; a dense glow comes out slightly too strong.',
  ],
  // kinetic cross-section 0.36 nm², common tables of kinetic theory, from memory (M)
  kineticCrossSection: 3.6e-19,
};
