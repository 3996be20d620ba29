import type { YieldData, YieldTerm } from './yield-law.ts';

/* Argon on metal against energy. Above some 100 eV, and for fast atoms, the metal matters little; its state decides. */

const SOURCE = 'Phelps and Petrović, Cold-cathode discharges and breakdown in argon, Plasma Sources Sci. Technol. 8, R21, 1999, appendix';

/** Backward scattering of Ar+ in argon, (Qm − Qi)/2 of Phelps (J. Appl. Phys. 76, 747, 1994; from memory, H): 4.4e-19 m² at 1 eV, 3.8e-19 at 10 eV. Rounded, 15 %. */
const CHARGE_EXCHANGE = 4e-19;

const without = { scale: Number.POSITIVE_INFINITY, fall: 1 };

/** Ar+ on clean metal: 0.07, and above 500 eV kinetic emission 1e-5 (ε − 500)^1.2/(1 + (ε/70000)^0.7). */
const cleanIons: readonly YieldTerm[] = [
  { factor: 0.07, from: -1, power: 0, ...without },
  { factor: 1e-5, from: 500, power: 1.2, scale: 70000, fall: 0.7 },
];

/** Ar+ on dirty metal: 0.002 ε/(1 + (ε/30)^1.5), and above 80 eV 1.05e-4 (ε − 80)^1.2/(1 + (ε/8000)^1.5). */
const technicalIons: readonly YieldTerm[] = [
  { factor: 0.002, from: 0, power: 1, scale: 30, fall: 1.5 },
  { factor: 1.05e-4, from: 80, power: 1.2, scale: 8000, fall: 1.5 },
];

/** Yields of Ar+ against its energy at the wall [eV]. */
export const argonIonYields: { readonly clean: YieldData; readonly technical: YieldData } = {
  clean: {
    law: { kind: 'ion-energy', terms: cleanIons, chargeExchange: CHARGE_EXCHANGE },
    range: { from: 0, to: 1e4 },
    source: SOURCE,
    status: 'from memory (H)',
    uncertainty: 0.3,
    note: 'Metal freed of oxide and gas layers by heating or sputtering. Fast atoms are not in it.',
  },
  technical: {
    law: { kind: 'ion-energy', terms: technicalIons, chargeExchange: CHARGE_EXCHANGE },
    range: { from: 0, to: 1e4 },
    source: SOURCE,
    status: 'from memory (H)',
    uncertainty: 0.5,
    note:
      'Their “dirty” metal: oxide and gas layers as on any electrode that was only washed. Ions alone: photons, metastables and fast atoms, which a net yield contains, add to it, most of all at low fields. ' +
      'At the 540 Td of the minimum of argon on iron it is 0.0026; that minimum, 265 V, needs a net yield of 0.0019.',
  },
};

/** Yields of fast argon atoms against their energy [eV]: they come from charge exchange, several for each ion in a cathode fall. No net yield of a breakdown gap needs them below 100 eV. */
export const argonAtomYields: { readonly clean: readonly YieldTerm[]; readonly technical: readonly YieldTerm[] } = {
  clean: [cleanIons[1]],
  technical: [
    { factor: 1e-4, from: 90, power: 1.2, scale: 8000, fall: 1.5 },
    { factor: 7e-5, from: 32, power: 1.2, scale: 2800, fall: 1.5 },
  ],
};
