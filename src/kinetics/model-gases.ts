import { ATOMIC_MASS, type CrossSectionSet, ELECTRON_MASS } from './cross-sections.ts';

/* Gases that exist on paper only, for which results are published or exact. */

/** 1e-20 m² */
const A2 = 1e-20;

/** Reid's ramp: elastic 6e-20 m², inelastic 10 (e − 0.2) 1e-20 m² above 0.2 eV, 4 u, cold, isotropic. */
export const reidRamp: CrossSectionSet = {
  name: 'reid-ramp',
  title: "Reid's ramp model gas",
  mass: 4 * ATOMIC_MASS,
  processes: [
    { kind: 'elastic', name: 'elastic', threshold: 0, crossSection: () => 6 * A2 },
    { kind: 'excitation', name: 'ramp', threshold: 0.2, crossSection: (e) => (e <= 0.2 ? 0 : 10 * (e - 0.2) * A2) },
  ],
  sharing: { kind: 'equal' },
  range: { from: 0, to: 1e5 },
  temperature: 0,
  source:
    'I. D. Reid, An investigation of the accuracy of numerical solutions of Boltzmann’s equation for electron swarms, Aust. J. Phys. 32, 231, 1979',
  status: 'from memory (M)',
  uncertainty: 0,
  notes: ['A model, no real gas.'],
};

/** Lucas and Saelee's gas: elastic 4 e^−1/2, excitation 0.1 (1 − F)(e − 15.6), ionisation 0.1 F (e − 15.6), all 1e-20 m², m/M = 1e-3, cold, isotropic,
 *  every share of what an ionisation leaves equally likely.
 *  @param F  share of ionisation, 0 to 1 */
export function lucasSaelee(F: number): CrossSectionSet {
  const above = (share: number) => (e: number) => (e <= 15.6 ? 0 : 0.1 * share * (e - 15.6) * A2);
  return {
    name: `lucas-saelee-${F}`,
    title: `Lucas and Saelee's model gas, F = ${F}`,
    mass: 1000 * ELECTRON_MASS,
    processes: [
      { kind: 'elastic', name: 'elastic', threshold: 0, crossSection: (e) => (4 / Math.sqrt(e)) * A2 },
      ...(F < 1 ? [{ kind: 'excitation', name: 'excitation', threshold: 15.6, crossSection: above(1 - F) } as const] : []),
      ...(F > 0 ? [{ kind: 'ionisation', name: 'ionisation', threshold: 15.6, crossSection: above(F) } as const] : []),
    ],
    sharing: { kind: 'uniform' },
    range: { from: 0, to: 1e5 },
    temperature: 0,
    source:
      'J. Lucas and H. T. Saelee, A comparison of a Monte Carlo simulation and the Boltzmann solution for electron swarm motion in gases, J. Phys. D 8, 640, 1975',
    status: 'from memory (H)',
    uncertainty: 0,
    notes: ['A model, no real gas.'],
  };
}
