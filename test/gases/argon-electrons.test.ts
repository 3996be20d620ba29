import { describe, expect, it } from 'vitest';
import { curveOf } from '../../src/gases/curves.ts';
import { gases } from '../../src/gases/index.ts';
import { argonElectrons, excitation, ionisation, momentumTransfer } from './argon-two-term.ts';

/* The electron mobility of argon was computed from cross-sections; here it is computed again. */

const Td = 1e-21;
const { coefficients } = gases.argon;

describe('cross-sections of argon', () => {
  // values computed from the fits of Phelps and Petrović (1999; from memory, H), 1e-20 m², to the figures given
  it.each([
    [0.25, 0.123, 0, 0],
    [1, 1.1, 0, 0],
    [5, 7.44, 0, 0],
    [12, 15.78, 0.033, 0],
    [20, 9.47, 0.92, 0.618],
    [50, 3.41, 1.134, 2.575],
    [100, 1.746, 0.732, 2.832],
    [1000, 0.152, 0.17, 0.834],
  ])('are the published fits at %d eV', (e, m, x, i) => {
    expect(Math.abs(momentumTransfer(e) * 1e20 - m)).toBeLessThan(0.0051);
    expect(Math.abs(excitation(e) * 1e20 - x)).toBeLessThan(0.00051);
    expect(Math.abs(ionisation(e) * 1e20 - i)).toBeLessThan(0.00051);
  });
});

describe('electrons in argon by the two-term equation', () => {
  it.each([10, 30, 100, 300, 1000])('drift at %d Td as the data say, within 5 %', (x) => {
    const { mobility } = argonElectrons(x * Td, 600);
    expect(Math.abs(curveOf(coefficients.electronMobility.form).valueAt(x * Td) / mobility - 1)).toBeLessThan(0.05);
  });

  it('are resolved: twice the cells change mobility at 100 Td by less than 0.5 %', () => {
    expect(Math.abs(argonElectrons(100 * Td, 600).mobility / argonElectrons(100 * Td, 1200).mobility - 1)).toBeLessThan(0.005);
  });

  // The fit of Phelps and Petrović follows measurements; two terms and equal sharing are good to 10 to 20 % in α. It shows that the cross-sections are the right ones.
  it.each([50, 100, 200, 300, 500, 1000])('ionise at %d Td within 20 % of the fit of Phelps and Petrović', (x) => {
    expect(Math.abs(argonElectrons(x * Td, 600).ionisation / curveOf(coefficients.ionisation.form).valueAt(x * Td) - 1)).toBeLessThan(0.2);
  });

  it('have D/μ of 7.5 to 11.5 V across the field from 10 to 1000 Td, and the data carry a smaller value for diffusion along it', () => {
    for (const x of [10, 100, 1000]) {
      const { energy } = argonElectrons(x * Td, 600);
      expect(energy).toBeGreaterThan(7.5);
      expect(energy).toBeLessThan(11.5);
      expect(curveOf(coefficients.electronEnergy.form).valueAt(x * Td)).toBeLessThan(energy);
    }
  });
});
