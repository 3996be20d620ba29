import { BOLTZMANN, TOWNSEND } from '../units/constants.ts';
import { TABLE_TEMPERATURE, tableInTd, thermalIonEnergy } from './conversions.ts';
import type { Form } from './forms.ts';
import type { GasData } from './gas.ts';

const Td = TOWNSEND;

const MORROW = 'Morrow, A survey of the electron and ion transport properties of SF6, IEEE Trans. Plasma Sci. PS-14, 234, 1986';

/** α/N = 3.4473e34 x^2.985 and 11.269 x^1.159 m², x in V m² */
const steep: Form = { kind: 'power', factor: 3.4473e34, exponent: 2.985, floor: 0 };
const shallow = { kind: 'power', factor: 11.269, exponent: 1.159, floor: 0 } as const;
/** from here on A exp(−B/x), which has the value and the slope of the power law at this field */
const levelling = 2000 * Td;
const strong: Form = {
  kind: 'exponential',
  A: shallow.factor * levelling ** shallow.exponent * Math.exp(shallow.exponent),
  B: shallow.exponent * levelling,
};

/** η/N [m²]: a cubic from 50 to 200 Td, 7e-21 exp(−2.25e18 x) above */
function attachment(td: number): number {
  const x = td * Td;
  return td < 200 ? 2.0463e-20 - 0.25379 * x + 1.4705e18 * x ** 2 - 3.0078e36 * x ** 3 : 7e-21 * Math.exp(-2.25e18 * x);
}

/** μ [m²/(V s)] at 1 atm and 20 °C → μN */
const ATMOSPHERE = 101325 / (BOLTZMANN * TABLE_TEMPERATURE);

/** (α − η)/p = 27.7 (E/p − 88.5), E/p in kV/(cm bar): 0.0277 per volt, zero at 358 Td */
const critical = (88.5e5 / 1e5) * BOLTZMANN * TABLE_TEMPERATURE;

/** Sulphur hexafluoride: electrons, one positive and one negative ion. */
export const sulphurHexafluoride: GasData = {
  name: 'sulphur hexafluoride',
  title: 'Sulphur hexafluoride',
  set: 'morrow',
  reason:
    'Separate ionisation and attachment, so that the negative ions are counted; they cancel at 362 Td, where measurements put the critical field (about 360 Td), and from 420 to 800 Td the difference is what Boyd and Crichton find at a field at most 8 % away.',
  coefficients: {
    ionisation: {
      form: {
        kind: 'joined',
        pieces: [
          { from: 0, form: steep },
          { from: 460 * Td, form: shallow },
          { from: levelling, form: strong },
        ],
        blend: 0.1,
      },
      range: { from: 100 * Td, to: levelling },
      source: `${MORROW}: 3.4473e34 x^2.985 m² up to 460 Td, 11.269 x^1.159 above (x in V m²); above 2000 Td our own A exp(−B/x) with the same value and slope there`,
      status: 'from memory (M)',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note:
        'The pieces meet within 0.5 % at 460 Td and exactly at 2000 Td, smoothed over 10 % of the field. The power law has no minimum of V_s; the exponential, which levels off at 1.1e-19 m², 1.6 times the largest ionisation ' +
        'cross-section as in other gases, gives it one. Fields of the measured minimum (some 6000 Td) lie beyond all data. Both ends of the range are ours.',
    },
    attachment: {
      form: tableInTd(
        [50, 60, 75, 90, 110, 130, 160, 180, 200, 230, 270, 320, 360, 400, 450, 500, 600, 700, 850, 1000, 1300, 1700, 2200, 3000].map(
          (td) => [td, attachment(td)] as const,
        ),
      ),
      range: { from: 50 * Td, to: 1000 * Td },
      source: `${MORROW}: 2.0463e-20 − 0.25379 x + 1.4705e18 x² − 3.0078e36 x³ m², 50 to 200 Td; 7.0e-21 exp(−2.25e18 x) above (x in V m²); as a table`,
      status: 'from memory (M)',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'Held below 50 Td, where true attachment is larger; nothing is ionised there. The table follows the formulas within 1 %. Below 0.1 % of ionisation, the last value is kept above 3000 Td.',
    },
    // W = 1.027e19 x^0.7424 m/s
    electronMobility: {
      form: { kind: 'power', factor: 1.027e19, exponent: -0.2576, floor: 10 * Td },
      range: { from: 50 * Td, to: levelling },
      source: `${MORROW}: W = 1.027e19 x^0.7424 m/s (x in V m²)`,
      status: 'from memory (M)',
      uncertainty: 0.15,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'μN is held below 10 Td. Both ends of the range are ours.',
    },
    electronEnergy: {
      form: tableInTd([
        [50, 2],
        [100, 3],
        [360, 5],
        [1000, 9],
      ]),
      range: { from: 50 * Td, to: levelling },
      source: 'order of published D/μ in sulphur hexafluoride, about 5 V at the critical field',
      status: 'from memory (L)',
      uncertainty: 0.5,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'The last value is kept above 1000 Td. Breakdown voltage shifts little with it.',
    },
    ionMobility: {
      form: tableInTd(
        [
          [120, 6e-5],
          [200, 6.54e-5],
          [350, 7.2e-5],
          [600, 6.13e-5],
          [1000, 5.16e-5],
          [2000, 3.85e-5],
        ].map(([td, mu]) => [td, mu * ATMOSPHERE] as const),
      ),
      range: { from: Td, to: levelling },
      source: `${MORROW}: at 1 atm 6.0e-5 m²/(V s) below 120 Td, 1.216e-5 ln x + 5.89e-4 to 350 Td, −1.897e-5 ln x − 7.346e-4 above (x in V m²); as a table`,
      status: 'from memory (M)',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'K0 0.56 cm²/(V s) at low field. Density at 1 atm taken at 20 °C. The last value is kept above 2000 Td.',
    },
    ionEnergy: thermalIonEnergy,
    negativeIonMobility: {
      form: tableInTd([50, 100, 150, 200, 300, 400, 500].map((td) => [td, (1.69e32 * (td * Td) ** 2 + 5.3e-5) * ATMOSPHERE] as const)),
      range: { from: Td, to: 500 * Td },
      source: `${MORROW}: at 1 atm 1.69e32 x² + 5.3e-5 m²/(V s) up to 500 Td (x in V m²); as a table`,
      status: 'from memory (M)',
      uncertainty: 0.2,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'K0 0.50 cm²/(V s) at low field. The last value is kept above 500 Td.',
    },
    negativeIonEnergy: thermalIonEnergy,
    electronIonRecombination: {
      form: { kind: 'constant', value: 1e-13 },
      range: null,
      source: 'order of dissociative recombination of molecular ions, 1e-7 cm³/s',
      status: 'from memory (L)',
      uncertainty: 1,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'No effect on breakdown.',
    },
    ionIonRecombination: {
      form: { kind: 'constant', value: 2e-13 },
      range: null,
      source: 'order of two-body recombination of positive and negative ions, 1e-7 to 2e-7 cm³/s',
      status: 'from memory (M)',
      uncertainty: 1,
      referenceTemperature: TABLE_TEMPERATURE,
      note: 'No effect on breakdown. Larger at high pressure, where a third body takes part.',
    },
  },
  alternatives: {
    'boyd-crichton': {
      reason:
        'The measured net coefficient of engineering practice, 75 to 200 kV/(cm bar), as ionisation without attachment: no negative ions. For large pd, where it sets V_s directly; it has no Paschen minimum and means nothing near one.',
      coefficients: {
        ionisation: {
          form: { kind: 'linear', a: -0.0277 * critical, b: 0.0277 },
          range: { from: critical * (75 / 88.5), to: critical * (200 / 88.5) },
          source:
            'Boyd and Crichton 1971, as in Kuffel, Zaengl and Kuffel, High Voltage Engineering Fundamentals, ch. 5: (α − η)/p = 27.7 (E/p − 88.5), p in bar, E in kV/cm',
          status: 'from memory (H)',
          uncertainty: 0.1,
          referenceTemperature: TABLE_TEMPERATURE,
          note: 'Clipped at zero below 358 Td, where the net coefficient is negative. Pressure taken at 20 °C.',
        },
        attachment: null,
        negativeIonMobility: null,
        negativeIonEnergy: null,
      },
      breakdownUncertainty: 0.3,
    },
  },
  detachment:
    'Neglected: V_s comes out too high, which is unsafe in principle. SF6− and SF5− hold their electrons below about 400 Td, so that at large pd, where breakdown needs 360 Td and attachment decides, little comes back.',
  breakdownUncertainty: 0.3,
  notes: [
    'Breakdown voltage uncertain by 30 % near the minimum for a known yield, all of it beyond the data; at large pd, where the critical field of 360 Td decides, by some 5 % in a smooth uniform field.',
    'The measured minimum, 507 V at 0.26 Torr cm, needs a yield of about 1e-4 with these data; the typical yield puts it at 370 V: safe.',
    'At high pressure roughness, particles and edges start breakdown far below the critical field: outside the model.',
    'Detachment is neglected (V_s too high, unsafe in principle). Photons in the gas are left out.',
    'A discharge makes toxic and corrosive products.',
  ],
  // of the order of 0.83 nm², from memory (L)
  kineticCrossSection: 8.3e-19,
};
