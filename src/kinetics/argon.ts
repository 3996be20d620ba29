import { ATOMIC_MASS, type CrossSectionSet } from './cross-sections.ts';

/** 1e-20 m² */
const A2 = 1e-20;

/** Argon by the analytic fits of Phelps and Petrović (1999), e in eV, in 1e-20 m²:
 *  Q_m = |6/(1 + e/0.1 + (e/0.6)²)^3.3 − 1.1 e^1.4/((1 + (e/15)^1.2) √(1 + (e/5.5)^2.5 + (e/60)^4.1))| + 0.05/(1 + e/10)² + 0.01 e³/(1 + (e/12)⁶),
 *  Q_x = 0.034 (e − 11.5)^1.1 (1 + (e/15)^2.8)/(1 + (e/23)^5.5) + 0.023 (e − 11.5)/(1 + e/80)^1.9,
 *  Q_i = 970 (e − 15.8)/(70 + e)² + 0.06 (e − 15.8)² exp(−e/9). */
export const argon: CrossSectionSet = {
  name: 'argon',
  title: 'Argon',
  mass: 39.948 * ATOMIC_MASS,
  processes: [
    {
      kind: 'momentum-transfer',
      name: 'elastic',
      threshold: 0,
      crossSection: (e) =>
        A2 *
        (Math.abs(
          6 / (1 + e / 0.1 + (e / 0.6) ** 2) ** 3.3 -
            (1.1 * e ** 1.4) / (1 + (e / 15) ** 1.2) / Math.sqrt(1 + (e / 5.5) ** 2.5 + (e / 60) ** 4.1),
        ) +
          0.05 / (1 + e / 10) ** 2 +
          (0.01 * e ** 3) / (1 + (e / 12) ** 6)),
    },
    {
      kind: 'excitation',
      name: 'all excitation',
      threshold: 11.5,
      crossSection: (e) =>
        e <= 11.5
          ? 0
          : A2 * ((0.034 * (e - 11.5) ** 1.1 * (1 + (e / 15) ** 2.8)) / (1 + (e / 23) ** 5.5) + (0.023 * (e - 11.5)) / (1 + e / 80) ** 1.9),
    },
    {
      kind: 'ionisation',
      name: 'ionisation',
      threshold: 15.8,
      crossSection: (e) => (e <= 15.8 ? 0 : A2 * ((970 * (e - 15.8)) / (70 + e) ** 2 + 0.06 * (e - 15.8) ** 2 * Math.exp(-e / 9))),
    },
  ],
  // from memory (H)
  sharing: { kind: 'opal', width: 10 },
  range: { from: 0, to: 1000 },
  temperature: null,
  source:
    'Phelps and Petrović, Cold-cathode discharges and breakdown in argon, Plasma Sources Sci. Technol. 8, R21, 1999: fits of cross-sections',
  status: 'from memory (H)',
  uncertainty: 0.1,
  notes: [
    'The momentum-transfer fit is read as elastic scattering alone. Read as all collisions together it would lower the share of elastic ones: flux drift velocity 15 % off at 500 Td.',
    'All excitation is one process of 11.5 eV. Ejected electrons by Opal, Peterson and Beaty, J. Chem. Phys. 55, 4100, 1971, width 10 eV (from memory, H).',
  ],
};
