import { ATOMIC_MASS, type CrossSectionSet } from './cross-sections.ts';
import { fromRows } from './rows.ts';

/** Constants of Lotz for helium, 4.0e-14 cm² eV², 0.75 and 0.46, two electrons. */
const LOTZ = { a: 4.0e-18, b: 0.75, c: 0.46, electrons: 2, binding: 24.587 };

/** Helium. */
export const helium: CrossSectionSet = {
  name: 'helium',
  title: 'Helium',
  mass: 4.002602 * ATOMIC_MASS,
  processes: [
    {
      kind: 'momentum-transfer',
      name: 'elastic',
      threshold: 0,
      // up to 6 eV Crompton, Elford and Robertson; above rounded by us
      crossSection: fromRows(0, [
        [0.001, 4.97],
        [0.008, 5.18],
        [0.01, 5.21],
        [0.02, 5.35],
        [0.03, 5.46],
        [0.05, 5.62],
        [0.07, 5.74],
        [0.1, 5.86],
        [0.15, 6.04],
        [0.2, 6.16],
        [0.3, 6.35],
        [0.5, 6.59],
        [0.7, 6.73],
        [1, 6.85],
        [1.5, 6.96],
        [2, 6.99],
        [2.5, 6.96],
        [3, 6.89],
        [4, 6.6],
        [5, 6.26],
        [6, 6.0],
        [8, 5.3],
        [10, 4.7],
        [12, 4.2],
        [15, 3.6],
        [20, 2.8],
        [25, 2.3],
        [30, 1.9],
        [40, 1.35],
        [50, 1],
        [70, 0.7],
        [100, 0.45],
        [200, 0.2],
        [500, 0.08],
        [1000, 0.04],
      ]),
    },
    {
      kind: 'excitation',
      name: 'all excitation',
      threshold: 19.82,
      crossSection: fromRows(19.82, [
        [22, 0.035],
        [25, 0.07],
        [30, 0.1],
        [40, 0.13],
        [60, 0.17],
        [100, 0.19],
        [200, 0.16],
        [500, 0.09],
        [1000, 0.052],
      ]),
    },
    {
      kind: 'ionisation',
      name: 'ionisation',
      threshold: LOTZ.binding,
      // σ = a ξ ln(E/P)/(E P) [1 − b exp(−c (E/P − 1))]
      crossSection: (e) => {
        const ratio = e / LOTZ.binding;
        if (ratio <= 1) return 0;
        const { a, b, c, electrons, binding } = LOTZ;
        return ((a * electrons * Math.log(ratio)) / (e * binding)) * (1 - b * Math.exp(-c * (ratio - 1)));
      },
    },
  ],
  // from memory (H)
  sharing: { kind: 'opal', width: 15.8 },
  range: { from: 0.001, to: 1000 },
  temperature: null,
  source:
    'momentum transfer up to 6 eV: Crompton, Elford and Robertson, Aust. J. Phys. 23, 667, 1970, above rounded from common tables; ' +
    'ionisation: the formula of Lotz, Z. Phys. 206, 205, 1967; excitation: rounded from common tables, one process of 19.82 eV',
  status: 'from memory (L)',
  uncertainty: 0.15,
  notes: [
    'Recollected, nobody here has read the tables: momentum transfer below 6 eV to some 1 % (M), ionisation within 2 % of measured maxima (M), excitation to 20 % (L).',
    'Ejected electrons by Opal, Peterson and Beaty, J. Chem. Phys. 55, 4100, 1971, width 15.8 eV (from memory, H).',
  ],
};
