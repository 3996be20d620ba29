import { ATOMIC_MASS, type CrossSectionSet } from './cross-sections.ts';
import { fromRows } from './rows.ts';

/** hartree/2 [eV] and the square of the Bohr radius [m²], CODATA 2018 */
const RYDBERG = 13.605693;
const BOHR2 = 2.8002852e-21;

/** up to here effective-range theory is used [eV]; O'Malley and Crompton used it up to 2.2 */
const LOW = 2;

/** Momentum transfer at low energy by modified effective-range theory, atomic units, k² = e/13.6 eV, polarisability α:
 *      tan η₀ = −A k [1 + (4α/3) k² ln k] − (πα/3) k² + D k³ + F k⁴,
 *      tan η₁ = ((π/15) α k² − A₁ k³)/(1 + H k³),   tan η_l = πα k²/((2l+3)(2l+1)(2l−1)) beyond,
 *      Q = (4π/k²) Σ (l+1) sin²(η_l − η_(l+1)).
 *  T. F. O'Malley and R. W. Crompton, J. Phys. B 13, 3451, 1980, who fitted it to the drift velocities that Robertson measured at 77 K.
 *  @param energy  above 0 [eV] */
function effectiveRange(energy: number): number {
  const [alpha, A, D, F, A1, H] = [2.672, 0.2135, 3.86, -2.656, 1.846, 3.29];
  const k2 = energy / RYDBERG;
  const k = Math.sqrt(k2);
  const phase = (l: number): number => {
    if (l === 0)
      return Math.atan(-A * k * (1 + (4 / 3) * alpha * k2 * Math.log(k)) - (Math.PI / 3) * alpha * k2 + D * k ** 3 + F * k2 * k2);
    if (l === 1) return Math.atan(((Math.PI / 15) * alpha * k2 - A1 * k ** 3) / (1 + H * k ** 3));
    return Math.atan((Math.PI * alpha * k2) / ((2 * l + 3) * (2 * l + 1) * (2 * l - 1)));
  };
  let sum = 0;
  for (let l = 0; l < 6; l++) sum += (l + 1) * Math.sin(phase(l) - phase(l + 1)) ** 2;
  return ((4 * Math.PI * BOHR2) / k2) * sum;
}

/** Above: rounded by us. The first row is where the two meet. */
const higher = fromRows(0, [
  [LOW, effectiveRange(LOW) * 1e20],
  [3, 1.77],
  [5, 1.95],
  [7, 2.15],
  [10, 2.4],
  [15, 2.6],
  [20, 2.6],
  [30, 2.45],
  [40, 2.15],
  [50, 1.85],
  [70, 1.4],
  [100, 1],
  [150, 0.65],
  [200, 0.47],
  [300, 0.28],
  [500, 0.14],
  [1000, 0.055],
]);

/** Constants of Lotz: a [m² eV²] (1e-18 is his 1e-14 cm² eV²), b, c; 2p and 2s electrons. Their maximum, 0.76e-20 m² at 180 eV, is 3 % below that of Rapp
 *  and Englander-Golden. The binary-encounter-Bethe form gives a third more, 1.06e-20 m², and is not used. */
const SHELLS = [
  { electrons: 6, binding: 21.565, a: 2.6e-18, b: 0.92, c: 0.19 },
  { electrons: 2, binding: 48.47, a: 4.0e-18, b: 0.7, c: 0.5 },
] as const;

/** Neon by an effective-range formula, rounded tables and the formula of Lotz; sources in the set itself. */
export const neon: CrossSectionSet = {
  name: 'neon',
  title: 'Neon',
  mass: 20.1797 * ATOMIC_MASS,
  processes: [
    {
      kind: 'momentum-transfer',
      name: 'elastic',
      threshold: 0,
      crossSection: (e) => (e < LOW ? effectiveRange(Math.max(e, 1e-6)) : higher(e)),
    },
    {
      kind: 'excitation',
      name: '3s levels',
      threshold: 16.62,
      crossSection: fromRows(16.62, [
        [18, 0.018],
        [20, 0.025],
        [25, 0.04],
        [30, 0.06],
        [40, 0.09],
        [50, 0.105],
        [60, 0.11],
        [100, 0.11],
        [200, 0.09],
        [500, 0.055],
        [1000, 0.034],
      ]),
    },
    {
      kind: 'excitation',
      name: '3p and higher levels',
      threshold: 18.38,
      crossSection: fromRows(18.38, [
        [20, 0.015],
        [25, 0.04],
        [30, 0.055],
        [40, 0.075],
        [50, 0.085],
        [60, 0.09],
        [100, 0.09],
        [200, 0.075],
        [500, 0.045],
        [1000, 0.026],
      ]),
    },
    {
      kind: 'ionisation',
      name: 'ionisation',
      threshold: SHELLS[0].binding,
      // σ = Σ a n ln(E/P)/(E P) [1 − b exp(−c (E/P − 1))]
      crossSection: (e) =>
        SHELLS.reduce((sum, { electrons, binding, a, b, c }) => {
          const ratio = e / binding;
          if (ratio <= 1) return sum;
          return sum + ((a * electrons * Math.log(ratio)) / (e * binding)) * (1 - b * Math.exp(-c * (ratio - 1)));
        }, 0),
    },
  ],
  sharing: { kind: 'opal', width: 24.2 },
  range: { from: 0, to: 1000 },
  temperature: null,
  source:
    'momentum transfer up to 2 eV: O’Malley and Crompton, J. Phys. B 13, 3451, 1980, after the drift velocities of Robertson, J. Phys. B 5, 648, 1972; ' +
    'above rounded after Robertson, and Register and Trajmar, Phys. Rev. A 29, 1785, 1984; excitation: total of de Heer, Jansen and van der Kaay, ' +
    'J. Phys. B 12, 979, 1979, shared out after Register, Trajmar, Steffensen and Poe, Phys. Rev. A 29, 1793, 1984, rounded; ionisation: the formula of Lotz, ' +
    'Z. Phys. 206, 205, 1967',
  status: 'from memory (L)',
  uncertainty: 0.15,
  notes: [
    'Recollected, nobody here has read the tables: momentum transfer to 5 % up to 2 eV (M), to 15 % above (L); excitation to 20 %, near its threshold worse (L); ' +
      'ionisation to 10 % (M). Two excitations stand for all: 16.62 eV for the 3s levels, about half of the total, and 18.38 eV for the rest.',
    'alpha/N is within 5 % of the curves of `gapwake gas neon` from 200 to 1000 Td. Below it is too high against Ward’s form: 18 % at 100 Td, 60 % at 50 Td, ' +
      '2.3 times at 30 Td. The doubtful excitation below 25 eV is the likeliest cause; breakdown voltages come out low there, which is safe.',
    'Ejected electrons by Opal, Peterson and Beaty, J. Chem. Phys. 55, 4100, 1971, width 24.2 eV (from memory, H).',
  ],
};
