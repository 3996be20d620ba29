import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { exponentialPerTorr, ICE_POINT, reducedFieldFromPerTorr, TABLE_TEMPERATURE, ward } from './conversions.ts';
import type { GasData } from './gas.ts';
import { hotIonEnergy } from './hot-ions.ts';
import { parentIonMobility } from './ions.ts';
import { ELLIS, LIEBERMAN, RAIZER, WANNIER, WARD } from './sources.ts';

const Td = TOWNSEND;

const ionMobility = parentIonMobility(0.9, 154);

/** Krypton, Kr+ as the only ion. */
export const krypton: GasData = {
  name: 'krypton',
  title: 'Krypton',
  set: 'ward',
  reason:
    'One form over 20 to 900 V/(cm Torr), where pairs of constants A, B fail below 100; three authors agree within 11 % from 200 to 840 V/(cm Torr), our own solution of the Boltzmann equation within 25 % from 300 to 2000 Td.',
  coefficients: {
    ionisation: {
      form: ward(35.7, 28.2),
      range: { from: reducedFieldFromPerTorr(20, ICE_POINT), to: reducedFieldFromPerTorr(900, ICE_POINT) },
      source: `${WARD}: C 35.7, D 28.2, up to 900 V/(cm Torr)`,
      status: 'from memory (H)',
      uncertainty: 0.2,
      referenceTemperature: ICE_POINT,
      note: 'Pressure taken at 0 °C. The upper end of the range is from memory (M), the lower one ours. At 100 Td our own solution gives 1.8 times as much; it rests on recalled cross-sections and is the weaker of the two.',
    },
    attachment: null,
    electronMobility: computedMobility(
      [
        [1, 1.9],
        [3, 0.894],
        [10, 0.87],
        [30, 0.782],
        [100, 0.755],
        [300, 0.748],
        [1000, 0.756],
        [2000, 0.775],
      ],
      'No published figure is at hand; neighbours in the table of elements bracket it.',
    ),
    electronEnergy: computedEnergy([
      [1, 4.98],
      [3, 6.48],
      [10, 5.99],
      [30, 6.28],
      [100, 6.13],
      [300, 5.97],
      [1000, 6.93],
      [2000, 9.57],
    ]),
    ionMobility: {
      form: ionMobility,
      range: { from: 10 * Td, to: 1000 * Td },
      source: `K0 of Kr+ in krypton, 0.90 cm²/(V s): ${ELLIS}; ${WANNIER}`,
      status: 'from memory (M)',
      uncertainty: 0.2,
      referenceTemperature: 300,
      note: 'The fall with the field is our own fit, to K0 0.35 at 1000 Td, as the limit gives for Q = 8.3e-19 m². Kr2+ is not modelled.',
    },
    ionEnergy: hotIonEnergy(ionMobility, 83.8),
    negativeIonMobility: null,
    negativeIonEnergy: null,
    electronIonRecombination: null,
    ionIonRecombination: null,
  },
  alternatives: {
    lieberman: {
      reason: 'A 15.6, B 220 for 100 to 1000 V/(cm Torr); below that too little ionisation: V_s too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(15.6, 220),
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(1000) },
          source: `${LIEBERMAN}: A 15.6, B 220`,
          status: 'from memory (M)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
    raizer: {
      reason:
        'The constants most often copied, 17 and 240 for 100 to 1000 V/(cm Torr). Below that too little ionisation: V_s too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(17, 240),
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(1000) },
          source: `${RAIZER}: A 17, B 240`,
          status: 'from memory (H)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment: null,
  // No published minimum was found to hold it against: α by three authors within 11 %, the yield known to a factor.
  breakdownUncertainty: 0.25,
  notes: [
    'Breakdown voltage uncertain by 25 % for a known yield: no published minimum was found to hold the data against, and yields on technical metals are guesses between clean values and those of argon.',
    'A trace of xenon or of most molecules may be ionised by krypton metastables (Penning). Not modelled, which is unsafe: take these data for clean krypton only.',
    'Photons and metastables release electrons at the cathode as ions do; they are only in the net yield.',
    'Kr2+ and recombination are neglected: no effect on breakdown at low pressure.',
  ],
  // kinetic cross-section 0.42 nm², common tables of kinetic theory, from memory (L)
  kineticCrossSection: 4.2e-19,
};
