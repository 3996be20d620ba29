import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { exponentialCrossing, exponentialPerTorr, reducedFieldFromPerTorr, TABLE_TEMPERATURE, thermalIonEnergy } from './conversions.ts';
import type { GasData } from './gas.ts';
import { constantMobility, parentIonMobility } from './ions.ts';
import { RAIZER, TWO_TERM } from './sources.ts';

const Td = TOWNSEND;

/** fit to our own solution from 150 to 500 Td */
const low = { kind: 'exponential', A: 2.28e-20, B: 493 * Td } as const;
const high = exponentialPerTorr(13, 290);

/** Water vapour: electrons, one positive and one negative ion. */
export const waterVapour: GasData = {
  name: 'water vapour',
  title: 'Water vapour',
  set: 'raizer-computed',
  reason:
    'The published constants hold from 150 V/(cm Torr) on and agree with our own solution of the Boltzmann equation within 6 % from 1000 to 2000 Td. Below 450 Td they fall off too fast, and V_s at large pd would come out too high; ' +
    'so that solution takes over where the two cross.',
  coefficients: {
    ionisation: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: low },
          { from: exponentialCrossing(low, high), form: high },
        ],
        blend: 0.1,
      },
      range: { from: 80 * Td, to: reducedFieldFromPerTorr(1000) },
      source: `${RAIZER}: A 13, B 290, 150 to 1000 V/(cm Torr), used from 706 Td; below: A 2.28e-20 m², B 493 Td, fit within 15 % to ${TWO_TERM}`,
      status: 'from memory (M)',
      uncertainty: 0.25,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'Joined where the two cross, so continuous; the slope is smoothed over 10 % of the field. From 455 to 706 Td both are said to hold; the one used is up to 29 % above the published one, the safe side. Pressure taken at 20 °C.',
    },
    attachment: {
      form: {
        kind: 'table',
        law: 'growth',
        x: [30, 50, 70, 100, 150, 200, 300, 500, 1000, 2000].map((td) => td * Td),
        y: [5.4e-23, 4.28e-22, 5.73e-22, 5.72e-22, 4.79e-22, 3.95e-22, 2.81e-22, 1.68e-22, 6.7e-23, 2.2e-23],
      },
      range: { from: 30 * Td, to: 2000 * Td },
      source: `dissociative attachment (H−, O−, OH−), 0.6 of the values of ${TWO_TERM}`,
      status: 'computed',
      uncertainty: 0.5,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'Scaled by 0.6 so that ionisation overtakes it near 130 Td, 43 V/(cm Torr), as measured (from memory, L); less attachment means lower V_s, the safe side. 3 % of ionisation at 500 Td. The last value is kept above 2000 Td.',
    },
    electronMobility: computedMobility(
      [
        [1, 0.435],
        [3, 0.518],
        [10, 0.674],
        [20, 0.93],
        [30, 1.32],
        [50, 1.445],
        [100, 1.21],
        [200, 1.055],
        [500, 0.963],
        [1000, 0.965],
        [2000, 1.02],
      ],
      'No published figure is at hand; the very small mobility at low field comes from the dipole moment of the molecule.',
      3100,
    ),
    electronEnergy: computedEnergy(
      [
        [5, 0.0331],
        [10, 0.0454],
        [20, 0.13],
        [30, 0.505],
        [50, 1.41],
        [100, 2.4],
        [200, 3.3],
        [500, 5.07],
        [1000, 8.12],
        [2000, 15.5],
      ],
      3100,
    ),
    ionMobility: {
      form: parentIonMobility(0.75, 400),
      range: { from: 10 * Td, to: 1000 * Td },
      source: 'order of K0 of H3O+ and its hydrates in water vapour; fall with the field: our own guess',
      status: 'from memory (L)',
      uncertainty: 0.5,
      referenceTemperature: 300,
      note: 'The dipole of the molecule holds ions back at low field and the hydrates break up at high field, so K0 may rise first. Lags are uncertain by a factor of two; V_s does not depend on it.',
    },
    ionEnergy: thermalIonEnergy,
    negativeIonMobility: {
      form: constantMobility(0.75),
      range: { from: Td, to: 300 * Td },
      source: 'as the positive ion, for want of data',
      status: 'from memory (L)',
      uncertainty: 0.5,
      referenceTemperature: 300,
    },
    negativeIonEnergy: thermalIonEnergy,
    electronIonRecombination: {
      form: { kind: 'constant', value: 1e-13 },
      range: null,
      source: 'dissociative recombination of H3O+, of the order of 1e-6 cm³/s at 300 K, taken down to electrons of 1 eV',
      status: 'from memory (L)',
      uncertainty: 1,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'No effect on breakdown; it bounds the density of a dense glow.',
    },
    ionIonRecombination: {
      form: { kind: 'constant', value: 2e-13 },
      range: null,
      source: 'order of two-body recombination of positive and negative ions, 1e-7 to 2e-7 cm³/s',
      status: 'from memory (M)',
      uncertainty: 0.5,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'No effect on breakdown.',
    },
  },
  alternatives: {
    raizer: {
      reason: 'The published constants alone, 150 to 1000 V/(cm Torr). Below that V_s comes out too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: high,
          range: { from: reducedFieldFromPerTorr(150), to: reducedFieldFromPerTorr(1000) },
          source: `${RAIZER}: A 13, B 290`,
          status: 'from memory (H)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment:
    'Neglected: V_s comes out too high, which is unsafe. H− and O− give their electrons back in collisions or turn into OH−, which keeps them. It matters where attachment matters, at large pd near 130 Td; at the minimum attachment ' +
    'is about 1 % of ionisation.',
  breakdownUncertainty: 0.3,
  notes: [
    'Breakdown voltage uncertain by 30 % for a known yield; cathodes covered with water have uncertain ones.',
    'The measured minimum, 480 V at 0.6 Torr cm (Škoro et al. 2011, read), needs a yield of 4e-4 with these data; the typical yield puts it at 350 V and further right: safe for the voltage.',
    'Detachment is neglected (V_s too high, unsafe, at large pd only).',
    'Vapour, not mist: drops, ice and wet surfaces conduct and are outside the model. Above 17.5 Torr at 20 °C water condenses.',
  ],
  // of the order of 0.46 nm², from memory (L)
  kineticCrossSection: 4.6e-19,
};
