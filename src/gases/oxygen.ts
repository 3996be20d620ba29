import { TOWNSEND } from '../units/constants.ts';
import { computedEnergy, computedMobility } from './computed-electrons.ts';
import { exponentialCrossing, exponentialPerTorr, reducedFieldFromPerTorr, TABLE_TEMPERATURE, thermalIonEnergy } from './conversions.ts';
import type { GasData } from './gas.ts';
import { hotIonEnergy } from './hot-ions.ts';
import { constantMobility, parentIonMobility } from './ions.ts';
import { ELLIS, LIEBERMAN, TWO_TERM, WANNIER } from './sources.ts';

const Td = TOWNSEND;

const low = exponentialPerTorr(6.5, 190);
/** fit to our own solution from 500 to 3000 Td: α/p about 15.2 exp(−314 p/E) 1/(cm Torr) */
const high = { kind: 'exponential', A: 4.62e-20, B: 953 * Td } as const;
const ionMobility = parentIonMobility(2.24, 150);

/** Oxygen: electrons, O2+ and O−. */
export const oxygen: GasData = {
  name: 'oxygen',
  title: 'Oxygen',
  set: 'lieberman-computed',
  reason:
    'The only published constants at hand end at 130 V/(cm Torr), a fifth of the field at the measured minimum; beyond, they level off at half of what nitrogen ionises and would let no gap of 0.7 Torr cm break down at all, where the ' +
    'measured minimum lies. So our own solution of the Boltzmann equation, which agrees with them within 20 % from 150 to 400 Td, takes over.',
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
      range: { from: reducedFieldFromPerTorr(30), to: 3000 * Td },
      source: `${LIEBERMAN}: A 6.5, B 190, 50 to 130 V/(cm Torr), used up to 442 Td; above: A 4.62e-20 m², B 953 Td, fit within 10 % to ${TWO_TERM}`,
      status: 'from memory (M)',
      uncertainty: 0.3,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'Joined where the two cross, so continuous; the slope is smoothed over 10 % of the field. The same solution meets the published constants of other gases within 25 % at 500 to 2000 Td, which is where 30 % comes from. ' +
        'The lower end of the range, 30 V/(cm Torr), is ours.',
    },
    attachment: {
      form: {
        kind: 'table',
        law: 'growth',
        x: [10, 20, 30, 50, 70, 100, 150, 200, 300, 500, 1000].map((td) => td * Td),
        y: [1.8e-23, 1.29e-22, 1.95e-22, 2.23e-22, 2.11e-22, 1.84e-22, 1.45e-22, 1.18e-22, 8.7e-23, 6.4e-23, 5.6e-23],
      },
      range: { from: 10 * Td, to: 1000 * Td },
      source: `two-body (dissociative) attachment, 0.6 of the values of ${TWO_TERM}`,
      status: 'computed',
      uncertainty: 0.5,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'Scaled by 0.6 so that ionisation overtakes it at 35 to 40 V/(cm Torr) (106 to 121 Td), as measured (from memory, M); less attachment means lower V_s, the safe side. Three-body attachment (∝ N²), which dominates ' +
        'below 10 Td, is left out: at low pressure it is small, and leaving it out is safe. The last value is kept above 1000 Td, below 1 % of ionisation.',
    },
    electronMobility: computedMobility(
      [
        [1, 9.67],
        [3, 5],
        [10, 2.79],
        [30, 2],
        [100, 1.465],
        [300, 1.07],
        [1000, 0.782],
        [2000, 0.689],
      ],
      'The fit for air of Morrow and Lowke (1997), a fifth oxygen, is 24 % lower at 100 Td and 23 % lower at 300 Td.',
      3000,
    ),
    electronEnergy: computedEnergy(
      [
        [1, 0.154],
        [3, 0.352],
        [10, 0.918],
        [30, 1.64],
        [100, 2.65],
        [300, 4.36],
        [1000, 8.62],
        [2000, 13.8],
      ],
      3000,
    ),
    ionMobility: {
      form: ionMobility,
      range: { from: 10 * Td, to: 1000 * Td },
      source: `K0 of O2+ in O2 2.25 cm²/(V s) at zero field, W ∝ √(E/p) at high field: Varney, Phys. Rev. 89, 708, 1953 (read); 2.24: ${ELLIS} (from memory, M); ${WANNIER}`,
      status: 'read',
      uncertainty: 0.2,
      referenceTemperature: 300,
      note: 'The scale of the fall, 150 Td, is ours: K0 0.87 at 1000 Td, as the limit gives for Q = 3.5e-19 m². O4+ is not modelled.',
    },
    ionEnergy: hotIonEnergy(ionMobility, 32),
    negativeIonMobility: {
      form: constantMobility(3.2),
      range: { from: Td, to: 300 * Td },
      source: `K0 of O− in O2 3.2 cm²/(V s): ${ELLIS}`,
      status: 'from memory (M)',
      uncertainty: 0.3,
      referenceTemperature: 300,
      note: 'Dissociative attachment makes O−, which may turn into O2− (K0 2.16) or O3−: slower. Constant with the field, for want of data.',
    },
    negativeIonEnergy: thermalIonEnergy,
    electronIonRecombination: {
      form: { kind: 'constant', value: 1.5e-14 },
      range: null,
      source: 'dissociative recombination of O2+, 2e-7 (300 K/T)^0.7 cm³/s, at electrons of 1 eV',
      status: 'from memory (M)',
      uncertainty: 0.5,
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
    lieberman: {
      reason:
        'The published constants alone. Only for gaps that break down between 50 and 130 V/(cm Torr), some 8 to 100 Torr cm: left of that they give V_s far too high, which is unsafe.',
      coefficients: {
        ionisation: {
          form: low,
          range: { from: reducedFieldFromPerTorr(50), to: reducedFieldFromPerTorr(130) },
          source: `${LIEBERMAN}: A 6.5, B 190`,
          status: 'from memory (M)',
          uncertainty: 0.2,
          referenceTemperature: TABLE_TEMPERATURE,
        },
      },
    },
  },
  detachment:
    'Neglected: V_s comes out too high, which is unsafe. O− gives its electron back in collisions above some 100 Td. It matters where attachment matters, at large pd near 120 Td: there V_s may be too high by the few per cent by which ' +
    'attachment raises it. At the minimum attachment is below 1 % of ionisation and detachment of no account.',
  breakdownUncertainty: 0.3,
  notes: [
    'Breakdown voltage uncertain by 30 % for a known yield: α at the fields of the minimum is our own calculation.',
    'The measured minimum, 450 V at 0.7 Torr cm, needs a yield of 3e-4 with these data; cathodes oxidise in oxygen. The typical yield, ten times larger, puts the minimum at 330 V: safe.',
    'Detachment is neglected (V_s too high, unsafe, at large pd only); three-body attachment is neglected (V_s too low, safe).',
    'Photons and metastables (a¹Δ, b¹Σ) are only in the net yield of the cathode.',
  ],
  // kinetic cross-section 0.40 nm², common tables of kinetic theory, from memory (M)
  kineticCrossSection: 4e-19,
};
