import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { exponentialCrossing, exponentialPerTorr, reducedFieldFromPerTorr, TABLE_TEMPERATURE, thermalIonEnergy } from './conversions.ts';
import type { GasData } from './gas.ts';
import { hotIonEnergy } from './hot-ions.ts';
import { constantMobility, parentIonMobility } from './ions.ts';
import { ELLIS, RAIZER, TWO_TERM, WANNIER } from './sources.ts';

const Td = TOWNSEND;

/** between 7e-23 m² at 103 Td and our own solution at 500 Td */
const low = { kind: 'exponential', A: 1.63e-20, B: 561 * Td } as const;
const high = exponentialPerTorr(20, 466);
const ionMobility = parentIonMobility(1.09, 300);

/** Carbon dioxide: electrons, CO2+ and one negative ion. */
export const carbonDioxide: GasData = {
  name: 'carbon dioxide',
  title: 'Carbon dioxide',
  set: 'raizer-computed',
  reason:
    'The published constants hold from 500 V/(cm Torr) on and agree there with our own solution of the Boltzmann equation within 8 %. Below, they fall off far too fast: a gap of 1 cm at 1 atm would hold 50 kV. ' +
    'So an exponential of our own takes over below 650 Td, through that solution at 500 Td and the known dielectric strength at 103 Td.',
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
      source: `${RAIZER}: A 20, B 466, 500 to 1000 V/(cm Torr), used from 649 Td; below: A 1.63e-20 m², B 561 Td, our own, through 5.3e-21 m² at 500 Td (${TWO_TERM}) and 7e-23 m² at 103 Td (what 0.85 of the strength of nitrogen at 1 atm and 1 cm asks for)`,
      status: 'from memory (L)',
      uncertainty: 0.35,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'From 500 V/(cm Torr) from memory (H), 15 %; below 650 Td (L), a factor of 1.5 to 2 near 200 Td, where our own solution gives half as much: more ionisation is the safe side. Joined where the two cross, so continuous; the slope ' +
        'is smoothed over 10 % of the field. Pressure taken at 20 °C.',
    },
    attachment: {
      form: {
        kind: 'table',
        law: 'growth',
        x: [50, 70, 100, 150, 200, 300, 500, 1000, 2000].map((td) => td * Td),
        y: [6.65e-24, 2.04e-23, 3.59e-23, 4.31e-23, 4.18e-23, 3.55e-23, 2.57e-23, 1.38e-23, 6.3e-24],
      },
      range: { from: 50 * Td, to: 2000 * Td },
      source: `dissociative attachment, ${TWO_TERM}`,
      status: 'computed',
      uncertainty: 0.5,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'Ionisation overtakes it at 92 Td, measured 80 to 90 Td (from memory, L). Below 1 % of ionisation from 400 Td on. The last value is kept above 2000 Td.',
    },
    electronMobility: computedMobility(
      [
        [3, 1.73],
        [10, 1.95],
        [20, 2.87],
        [30, 3.13],
        [50, 2.23],
        [100, 1.36],
        [200, 1.01],
        [500, 0.745],
        [1000, 0.619],
        [2000, 0.544],
      ],
      'Raizer’s single value, μp = 1.1e6 cm² Torr/(V s) for 3 to 30 V/(cm Torr) (Table 2.1; from memory, M), is 16 % higher at 30 Td.',
      3100,
    ),
    electronEnergy: computedEnergy(
      [
        [5, 0.0262],
        [10, 0.047],
        [20, 0.2],
        [30, 0.53],
        [50, 1.13],
        [100, 2.11],
        [200, 3.12],
        [500, 4.74],
        [1000, 6.6],
        [2000, 10.1],
      ],
      3100,
    ),
    ionMobility: {
      form: ionMobility,
      range: { from: 10 * Td, to: 1000 * Td },
      source: `K0 of CO2+ in CO2 1.09 cm²/(V s): ${ELLIS}; ${WANNIER}`,
      status: 'from memory (M)',
      uncertainty: 0.25,
      referenceTemperature: 300,
      note: 'The scale of the fall, 300 Td, is ours: K0 0.57 at 1000 Td, as the limit gives for Q = 6e-19 m². O2+ and clusters, which form at high pressure, are not modelled.',
    },
    ionEnergy: hotIonEnergy(ionMobility, 44.01),
    negativeIonMobility: {
      form: constantMobility(1.3),
      range: { from: Td, to: 300 * Td },
      source: 'order of K0 of O− and CO3− in CO2',
      status: 'from memory (L)',
      uncertainty: 0.3,
      referenceTemperature: 300,
      note: 'Constant with the field, for want of data.',
    },
    negativeIonEnergy: thermalIonEnergy,
    electronIonRecombination: {
      form: { kind: 'constant', value: 6e-14 },
      range: null,
      source: 'dissociative recombination of CO2+, of the order of 4e-7 (300 K/T)^½ cm³/s, at electrons of 1 eV',
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
      reason:
        'The published constants alone. Only where breakdown needs 500 V/(cm Torr) or more, left of 0.6 Torr cm or so: at large pd V_s comes out far too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: high,
          range: { from: reducedFieldFromPerTorr(500), to: reducedFieldFromPerTorr(1000) },
          source: `${RAIZER}: A 20, B 466`,
          status: 'from memory (H)',
          uncertainty: 0.15,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment:
    'Neglected: V_s comes out too high, which is unsafe, but O− in CO2 turns into CO3−, which holds its electron, so that little comes back. It matters at large pd, near 90 Td, if anywhere.',
  breakdownUncertainty: 0.25,
  notes: [
    'Breakdown voltage uncertain by 25 % for a known yield: α is published only above 500 V/(cm Torr).',
    'The measured minimum, 420 V at 0.5 to 0.57 Torr cm, needs a yield of about 1e-3 with these data; the typical yield puts it at 370 V: safe.',
    'Detachment is neglected (V_s too high, unsafe, at large pd only).',
    'A discharge splits CO2 into CO and oxygen; long burning changes the gas.',
  ],
  // kinetic cross-section 0.52 nm², common tables of kinetic theory, from memory (M)
  kineticCrossSection: 5.2e-19,
};
