import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { crossing, exponentialPerTorr, ICE_POINT, reducedFieldFromPerTorr, TABLE_TEMPERATURE, ward } from './conversions.ts';
import type { GasData } from './gas.ts';
import { hotIonEnergy } from './hot-ions.ts';
import { parentIonMobility } from './ions.ts';
import { ELLIS, LIEBERMAN, RAIZER, WANNIER, WARD } from './sources.ts';

const Td = TOWNSEND;

/** α/p = 8.2 exp(−17 √(p/E)) and 4.4 exp(−111 p/E) 1/(cm Torr), which cross at 329 Td */
const low = ward(8.2, 17);
const high = exponentialPerTorr(4.4, 111);
const ionMobility = parentIonMobility(4.1, 90);

/** Neon, Ne+ as the only ion. */
export const neon: GasData = {
  name: 'neon',
  title: 'Neon',
  set: 'ward-lieberman',
  reason:
    'The two together reach from wide gaps to left of the minimum, and agree within 7 % where they overlap; so do the constants of Raizer and, within 20 %, our own solution of the Boltzmann equation.',
  coefficients: {
    ionisation: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: low },
          { from: crossing(low, high), form: high },
        ],
        blend: 0.1,
      },
      range: { from: reducedFieldFromPerTorr(10, ICE_POINT), to: reducedFieldFromPerTorr(400) },
      source: `${WARD}: C 8.2, D 17, below 250 V/(cm Torr), used up to 329 Td; above: ${LIEBERMAN}: A 4.4, B 111, 100 to 400 V/(cm Torr)`,
      status: 'from memory (H)',
      uncertainty: 0.15,
      referenceTemperature: ICE_POINT,
      note:
        'Joined where the two cross, so continuous; the slope is smoothed over 10 % of the field. Ward’s pressure taken at 0 °C, the other at 20 °C. The lower end of the range, 10 V/(cm Torr), is ours. ' +
        'Above 1000 Td our solution levels off at 1.0e-20 m² where the form goes on to 1.3e-20: V_s low there, which is safe.',
    },
    attachment: null,
    electronMobility: computedMobility(
      [
        [1, 5.63],
        [3, 3.88],
        [10, 3.61],
        [30, 3.18],
        [100, 2.67],
        [300, 2.25],
        [500, 2.13],
      ],
      'Raizer’s single value, μp = 1.5e6 cm² Torr/(V s) for 0.4 to 2 V/(cm Torr) (Table 2.1; from memory, M), lies between those at 1 and 3 Td.',
      1200,
    ),
    electronEnergy: computedEnergy(
      [
        [1, 2.19],
        [3, 3.73],
        [10, 4.16],
        [30, 5.01],
        [100, 6.69],
        [300, 10.1],
        [500, 13.2],
      ],
      1200,
    ),
    ionMobility: {
      form: ionMobility,
      range: { from: 10 * Td, to: 1000 * Td },
      source: `K0 of Ne+ in neon: 4.4 (Hornbeck, Phys. Rev. 84, 615, 1951) and 4.1 (Oskam and Mittelstadt, Phys. Rev. 132, 1435, 1963), both read, 4.08 (${ELLIS}; from memory, M); ${WANNIER}`,
      status: 'from memory (L)',
      uncertainty: 0.2,
      referenceTemperature: 300,
      note: 'K0 4.1 at zero field is read; the fall with the field is our own fit, to K0 1.22 at 1000 Td, as the limit gives for Q = 2.8e-19 m². Ne2+ (K0 6.5) is not modelled: lags come out long at high pressure.',
    },
    ionEnergy: hotIonEnergy(ionMobility, 20.18),
    negativeIonMobility: null,
    negativeIonEnergy: null,
    electronIonRecombination: null,
    ionIonRecombination: null,
  },
  alternatives: {
    ward: {
      reason: 'Ward’s form alone; within 7 % of the default up to 1100 Td.',
      coefficients: {
        ionisation: {
          form: low,
          range: { from: reducedFieldFromPerTorr(10, ICE_POINT), to: reducedFieldFromPerTorr(250, ICE_POINT) },
          source: `${WARD}: C 8.2, D 17, below 250 V/(cm Torr)`,
          status: 'from memory (H)',
          uncertainty: 0.15,
          referenceTemperature: ICE_POINT,
          note: 'Pressure taken at 0 °C; the lower end of the range is ours.',
        },
      },
    },
    lieberman: {
      reason: 'One pair of constants for 100 to 400 V/(cm Torr). Below that too little ionisation: V_s too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: high,
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(400) },
          source: `${LIEBERMAN}: A 4.4, B 111`,
          status: 'second-hand',
          uncertainty: 0.15,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
    raizer: {
      reason:
        'The constants most often copied, 4 and 100 for 100 to 400 V/(cm Torr). Below that too little ionisation: V_s too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(4, 100),
          range: { from: reducedFieldFromPerTorr(100), to: reducedFieldFromPerTorr(400) },
          source: `${RAIZER}: A 4, B 100`,
          status: 'from memory (H)',
          uncertainty: 0.15,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment: null,
  breakdownUncertainty: 0.2,
  notes: [
    'Breakdown voltage uncertain by 20 % for a known yield: sources of α agree within 15 %, but neon is rarely as pure as its tables.',
    'A trace of argon or any other gas is ionised by neon metastables (Penning): 0.1 % of argon can lower the breakdown voltage by a factor of two or more. Not modelled, which is unsafe: ' +
      'take these data for clean neon only.',
    'Photons and metastables release electrons at the cathode as ions do; they are only in the net yield.',
    'Ne2+ and recombination are neglected: no effect on breakdown at low pressure.',
  ],
  // kinetic cross-section 0.24 nm², common tables of kinetic theory, from memory (M)
  kineticCrossSection: 2.4e-19,
};
