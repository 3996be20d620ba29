import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { exponentialPerTorr, ICE_POINT, reducedFieldFromPerTorr, TABLE_TEMPERATURE, ward } from './conversions.ts';
import type { GasData } from './gas.ts';
import { hotIonEnergy } from './hot-ions.ts';
import { parentIonMobility } from './ions.ts';
import { ELLIS, LIEBERMAN, RAIZER, WANNIER, WARD } from './sources.ts';

const Td = TOWNSEND;

const ionMobility = parentIonMobility(0.53, 236);

/** Xenon, Xe+ as the only ion. */
export const xenon: GasData = {
  name: 'xenon',
  title: 'Xenon',
  set: 'ward',
  reason:
    'One form over 30 to 1200 V/(cm Torr), where pairs of constants A, B fail below 200; three authors agree within 15 % from 200 to 800 V/(cm Torr), our own solution of the Boltzmann equation within 20 % from 300 to 2000 Td.',
  coefficients: {
    ionisation: {
      form: ward(65.3, 36.1),
      range: { from: reducedFieldFromPerTorr(30, ICE_POINT), to: reducedFieldFromPerTorr(1200, ICE_POINT) },
      source: `${WARD}: C 65.3, D 36.1, up to 1200 V/(cm Torr)`,
      status: 'from memory (H)',
      uncertainty: 0.2,
      referenceTemperature: ICE_POINT,
      note: 'Pressure taken at 0 °C. The upper end of the range is from memory (M), the lower one ours. At 100 Td our own solution gives 1.7 times as much; it rests on recalled cross-sections and is the weaker of the two.',
    },
    attachment: null,
    electronMobility: computedMobility(
      [
        [1, 1.29],
        [3, 0.616],
        [10, 0.63],
        [30, 0.599],
        [100, 0.556],
        [300, 0.575],
        [1000, 0.642],
        [2000, 0.677],
      ],
      'No published figure is at hand; neighbours in the table of elements bracket it.',
    ),
    electronEnergy: computedEnergy([
      [1, 3.4],
      [3, 4.48],
      [10, 3.89],
      [30, 3.99],
      [100, 4.07],
      [300, 3.93],
      [1000, 5.13],
      [2000, 7.54],
    ]),
    ionMobility: {
      form: ionMobility,
      range: { from: 10 * Td, to: 1000 * Td },
      source: `K0 of Xe+ in xenon, 0.53 cm²/(V s): ${ELLIS}; ${WANNIER}`,
      status: 'from memory (M)',
      uncertainty: 0.2,
      referenceTemperature: 300,
      note: 'The fall with the field is our own fit, to K0 0.25 at 1000 Td, as the limit gives for Q = 1.05e-18 m². Xe2+ is not modelled.',
    },
    ionEnergy: hotIonEnergy(ionMobility, 131.29),
    negativeIonMobility: null,
    negativeIonEnergy: null,
    electronIonRecombination: null,
    ionIonRecombination: null,
  },
  alternatives: {
    lieberman: {
      reason: 'A 24, B 330 for 200 to 800 V/(cm Torr); below that too little ionisation: V_s too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(24, 330),
          range: { from: reducedFieldFromPerTorr(200), to: reducedFieldFromPerTorr(800) },
          source: `${LIEBERMAN}: A 24, B 330`,
          status: 'from memory (M)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
    raizer: {
      reason:
        'The constants most often copied, 26 and 350 for 200 to 800 V/(cm Torr). Below that too little ionisation: V_s too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(26, 350),
          range: { from: reducedFieldFromPerTorr(200), to: reducedFieldFromPerTorr(800) },
          source: `${RAIZER}: A 26, B 350`,
          status: 'from memory (H)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment: null,
  // No published minimum was found to hold it against: α by three authors within 25 %, the yield known to a factor.
  breakdownUncertainty: 0.25,
  notes: [
    'Breakdown voltage uncertain by 25 % for a known yield: no published minimum was found to hold the data against, and yields on technical metals are guesses between clean values and those of argon.',
    'Few impurities are ionised by xenon metastables (8.3 eV), and molecules rather slow its electrons down: purity matters less than in the lighter rare gases.',
    'Photons and metastables release electrons at the cathode as ions do; they are only in the net yield.',
    'Xe2+ and recombination are neglected: no effect on breakdown at low pressure.',
  ],
  // kinetic cross-section 0.5 nm², common tables of kinetic theory, from memory (L)
  kineticCrossSection: 5e-19,
};
