import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { exponentialPerTorr, mobilityFromReduced, reducedFieldFromPerTorr, TABLE_TEMPERATURE, thermalIonEnergy } from './conversions.ts';
import type { GasData } from './gas.ts';
import { LIEBERMAN, RAIZER } from './sources.ts';

const Td = TOWNSEND;

/** Hydrogen, H3+ as the only ion. */
export const hydrogen: GasData = {
  name: 'hydrogen',
  title: 'Hydrogen',
  set: 'lieberman',
  reason:
    'One pair of constants over the widest range, 15 to 600 V/(cm Torr), for a gas that follows A exp(−B p/E) better than any other; Raizer’s pair agrees within 8 % where it holds, our own solution of the ' +
    'Boltzmann equation within 25 % from 200 to 1000 Td.',
  coefficients: {
    ionisation: {
      form: exponentialPerTorr(4.8, 136),
      range: { from: reducedFieldFromPerTorr(15), to: reducedFieldFromPerTorr(600) },
      source: `${LIEBERMAN}: A 4.8, B 136`,
      status: 'second-hand',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'Constants second-hand, range too. Pressure taken at 20 °C; at 0 °C α/N and B would be 7 % smaller.',
    },
    attachment: null,
    electronMobility: computedMobility(
      [
        [1, 7.91],
        [3, 4.13],
        [10, 2.13],
        [30, 1.3],
        [50, 1.19],
        [100, 1.3],
        [300, 1.63],
        [1000, 2.13],
      ],
      'Raizer’s single value, μp = 0.37e6 cm² Torr/(V s) for 4 to 30 V/(cm Torr) (Table 2.1; from memory, M), is met within 7 % from 30 to 90 Td.',
      2000,
    ),
    electronEnergy: computedEnergy(
      [
        [1, 0.0463],
        [3, 0.115],
        [10, 0.29],
        [30, 0.685],
        [50, 1.28],
        [100, 2.23],
        [300, 4.63],
        [500, 7.39],
        [1000, 16.2],
      ],
      2000,
    ),
    ionMobility: {
      form: { kind: 'falling', low: mobilityFromReduced(11.1), scale: 700 * Td, power: 2, fall: 0.25 },
      range: { from: Td, to: 1000 * Td },
      source:
        'K0 of H3+ in H2 11.1 ± 0.5 cm²/(V s) at zero field (Graham et al., 1973, read); fall with the field: our own guess, W ∝ √(E/N) at high field',
      status: 'read',
      uncertainty: 0.3,
      referenceTemperature: 300,
      note:
        'H2+ turns into H3+ in nearly every collision, so H3+ carries the current except in strong fields, where H+ and H2+ take part. Only the value at zero field is published; H+ has 15.7 ± 0.6 (read), and the ' +
        'truth above 300 Td may lie 30 % off either way.',
    },
    ionEnergy: thermalIonEnergy,
    negativeIonMobility: null,
    negativeIonEnergy: null,
    electronIonRecombination: {
      form: { kind: 'constant', value: 2e-14 },
      range: null,
      source: 'dissociative recombination of H3+, of the order of 1e-7 cm³/s at 300 K, taken down to electrons of 1 eV by T^−½',
      status: 'from memory (L)',
      uncertainty: 1,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'No effect on breakdown; it bounds the density of a dense glow.',
    },
    ionIonRecombination: null,
  },
  alternatives: {
    raizer: {
      reason: 'A 5, B 130 for 150 to 600 V/(cm Torr): 6 % more ionisation near 300; for comparison with older work.',
      coefficients: {
        ionisation: {
          form: exponentialPerTorr(5, 130),
          range: { from: reducedFieldFromPerTorr(150), to: reducedFieldFromPerTorr(600) },
          source: `${RAIZER}: A 5, B 130`,
          status: 'from memory (H)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment: null,
  breakdownUncertainty: 0.2,
  notes: [
    'Breakdown voltage uncertain by 20 %: α carries 20 %, published minima run from 230 to 295 V.',
    'The computed minimum lies at 1.9 Torr cm, the measured one at 1.05 to 1.25: with a constant yield V_s comes out a third too high at the measured pd and more to its left, which is unsafe; use the minimum voltage itself as the ' +
      'limit there.',
    'The net yield falls to about 1e-3 at 20 V/(cm Torr) (nickel; DeBitetto and Fisher 1956, read); a constant yield of a few per cent puts V_s low at large pd, which is safe.',
    'Photons and fast atoms release electrons at the cathode; they are only in the net yield. H− is left out: its formation is negligible.',
  ],
  // kinetic cross-section 0.27 nm², common tables of kinetic theory, from memory (M)
  kineticCrossSection: 2.7e-19,
};
