import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { exponentialPerTorr, ICE_POINT, reducedFieldFromPerTorr, TABLE_TEMPERATURE, ward } from './conversions.ts';
import type { GasData } from './gas.ts';
import { hotIonEnergy } from './hot-ions.ts';
import { parentIonMobility } from './ions.ts';
import { LIEBERMAN, RAIZER, WANNIER, WARD } from './sources.ts';

const Td = TOWNSEND;

const ionMobility = parentIonMobility(10.6, 59);

/** Helium, He+ as the only ion. */
export const helium: GasData = {
  name: 'helium',
  title: 'Helium',
  set: 'ward',
  reason:
    'One form from wide gaps to left of the minimum, which our own solution of the Boltzmann equation meets within 20 % from 50 to 700 Td; the pair of Lieberman and Lichtenberg lies within 24 % of it from 135 Td on. With the high yields of helium ions ' +
    '(0.2 to 0.3 on clean metal) it gives the measured minimum, 150 to 156 V at 2.5 to 4 Torr cm. The constants 3, 34 of older books ionise 2.7 times as much at 100 Td and need a yield of 0.01.',
  coefficients: {
    ionisation: {
      form: ward(4.4, 14),
      range: { from: reducedFieldFromPerTorr(10, ICE_POINT), to: reducedFieldFromPerTorr(250, ICE_POINT) },
      source: `${WARD}: C 4.4, D 14, below 100 V/(cm Torr)`,
      status: 'from memory (H)',
      uncertainty: 0.2,
      referenceTemperature: ICE_POINT,
      note:
        'Pressure taken at 0 °C. The source gives it below 100 V/(cm Torr); we use it to 250, where our solution is still within 10 %, and from 10. Above, electrons run away: our solution levels off at 5e-21 m² where the form goes on ' +
        'to 9e-21, so that V_s comes out low, which is safe.',
    },
    attachment: null,
    electronMobility: computedMobility(
      [
        [1, 4.86],
        [3, 2.84],
        [10, 2.15],
        [30, 2.22],
        [100, 2.47],
        [300, 3.41],
      ],
      'Raizer’s single value, μp = 0.86e6 cm² Torr/(V s) for 0.6 to 10 V/(cm Torr) (Table 2.1; from memory, M), is the same at 3 Td and 30 % higher at 10 Td.',
      800,
    ),
    electronEnergy: computedEnergy(
      [
        [1, 0.308],
        [3, 0.865],
        [10, 2.96],
        [30, 3.95],
        [100, 5.63],
        [300, 12.3],
      ],
      800,
    ),
    ionMobility: {
      form: ionMobility,
      range: { from: Td, to: 1000 * Td },
      source:
        'K0 of He+ in helium: 10.8 (Hornbeck, Phys. Rev. 84, 615, 1951), 10.7 (Oskam and Mittelstadt, Phys. Rev. 132, 1435, 1963), calculated 10.54 at 1 Td and 4.57 at 300 Td ' +
        `(Barata and Conde, Nucl. Instrum. Meth. A 619, 2010), all read; ${WANNIER}`,
      status: 'read',
      uncertainty: 0.1,
      referenceTemperature: 293,
      note:
        'Our own fit K0 10.6, s 59 Td through those values; at 1000 Td K0 is 2.56, as the limit gives for Q = 3.2e-19 m². Within 6 % of Ward’s drift velocity at 71 Td (from memory, H). ' +
        'He2+ (K0 16 to 17), which forms at high pressure, is not modelled: lags come out long there.',
    },
    ionEnergy: hotIonEnergy(ionMobility, 4.0026),
    negativeIonMobility: null,
    negativeIonEnergy: null,
    electronIonRecombination: null,
    ionIonRecombination: null,
  },
  alternatives: {
    lieberman: {
      reason:
        'One pair of constants for 30 to 250 V/(cm Torr), up to 24 % more ionisation from 155 Td on: the minimum comes out 9 % lower, at half the pd. Below 30 far too little ionisation: V_s too high at large pd, which is unsafe.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(2.8, 77),
          range: { from: reducedFieldFromPerTorr(30), to: reducedFieldFromPerTorr(250) },
          source: `${LIEBERMAN}: A 2.8, B 77`,
          status: 'second-hand',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
    raizer: {
      reason:
        'The constants most often copied, 3 and 34, after Townsend’s measurements. They ionise 2.7 times as much at 100 Td than the others and belong with a yield of about 0.01 (minimum 142 V). With a ' +
        'helium yield of 0.18 they would give 58 V. Lowest V_s of all: the safe choice where the yield is unknown.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(3, 34),
          range: { from: reducedFieldFromPerTorr(20), to: reducedFieldFromPerTorr(150) },
          source: `${RAIZER}: A 3, B 34`,
          status: 'from memory (H)',
          uncertainty: 0.5,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
      breakdownUncertainty: 0.5,
    },
  },
  detachment: null,
  // α moves V_s by about its own 20 %; handbook minima, 150 to 156 V, agree better than the yields behind them.
  breakdownUncertainty: 0.2,
  notes: [
    'Breakdown voltage uncertain by 20 % for a known yield; the yield of helium ions, 0.03 to 0.3, adds as much again. The sets `ward` and `raizer` differ by a factor of two.',
    'A trace of any other gas is ionised by helium metastables (Penning): real, impure helium breaks down at a lower voltage. Not modelled, which is unsafe: add margin unless the gas is clean.',
    'Photons, metastables and fast atoms release electrons at the cathode as ions do; they are only in the net yield.',
    'Left of the minimum electrons run away in helium more than in other gases, and curves double back: take the minimum voltage as the limit there.',
    'He2+ and recombination are neglected: no effect on breakdown at low pressure.',
  ],
  // kinetic cross-section 0.21 nm², common tables of kinetic theory, from memory (M)
  kineticCrossSection: 2.1e-19,
};
