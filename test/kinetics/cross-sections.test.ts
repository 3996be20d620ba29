import { describe, expect, test } from 'vitest';
import { argon } from '../../src/kinetics/argon.ts';
import { BINS, binEdge, collisionTable } from '../../src/kinetics/collision-table.ts';
import { SPEED_OF_1_EV, tabulated } from '../../src/kinetics/cross-sections.ts';
import { lucasSaelee, reidRamp } from '../../src/kinetics/model-gases.ts';
import { ejectedEnergy, screenedCosine, screenedMomentumShare, screening } from '../../src/kinetics/scattering.ts';

describe('sets of cross-sections', () => {
  // values of the fits of Phelps and Petrović, 1999 (from memory, H), worked out once outside of this program, 1e-20 m²; one of the last digit
  test.each([
    [0.01, 4.43, 0, 0],
    [0.25, 0.123, 0, 0],
    [1, 1.1, 0, 0],
    [5, 7.44, 0, 0],
    [10, 14.83, 0, 0],
    [12, 15.78, 0.033, 0],
    [20, 9.47, 0.92, 0.618],
    [50, 3.41, 1.134, 2.575],
    [100, 1.746, 0.732, 2.832],
    [200, 0.873, 0.506, 2.451],
    [1000, 0.152, 0.17, 0.834],
  ])('argon at %d eV: momentum transfer %d, excitation %d, ionisation %d', (energy, ...expected) => {
    for (const [p, value] of expected.entries()) {
      const digit = p === 0 && value >= 1.1 && value !== 1.746 ? 0.01 : 0.001;
      expect(Math.abs(argon.processes[p].crossSection(energy) * 1e20 - value)).toBeLessThan(digit);
    }
  });

  test("Reid's ramp and Lucas and Saelee's gas are what their definitions say", () => {
    expect(reidRamp.processes.map(({ crossSection }) => crossSection(0.5) * 1e20)).toEqual([expect.closeTo(6, 10), expect.closeTo(3, 10)]);
    const half = lucasSaelee(0.5);
    expect(half.processes.map(({ crossSection }) => crossSection(25.6) * 1e20)).toEqual([
      expect.closeTo(4 / Math.sqrt(25.6), 10),
      expect.closeTo(0.5, 10),
      expect.closeTo(0.5, 10),
    ]);
    expect(lucasSaelee(0).processes.map(({ kind }) => kind)).toEqual(['elastic', 'excitation']);
    expect(lucasSaelee(1).processes.map(({ kind }) => kind)).toEqual(['elastic', 'ionisation']);
  });

  test('rows are joined by straight lines, nothing happens below a threshold, and the end falls as 1/E', () => {
    const inelastic = tabulated([10, 20, 40], [0, 2, 1], 10);
    expect([5, 10, 15, 30, 40, 80].map(inelastic)).toEqual([0, 0, 1, 1.5, 1, 0.5]);
    expect(tabulated([1, 2], [3, 4], 0)(0.1)).toBe(3);
    expect(tabulated([10, 20], [3, 4], 10)(9.99)).toBe(0);
  });
});

describe('the table that the engine reads', () => {
  const density = 1e22;

  test.each([['isotropic' as const], ['screened-coulomb' as const]])(
    'follows the fits within 2e-4 between thresholds, and its limits are never exceeded (%s)',
    (angular) => {
      const table = collisionTable(argon, { density, temperature: 0 }, angular);
      const count = table.kinds.length;
      for (let bin = 0; bin < BINS; bin += 7) {
        const [low, high] = [binEdge(bin), binEdge(bin + 1)];
        for (const share of [0.01, 0.37, 0.99]) {
          const energy = low + share * (high - low);
          let total = 0;
          for (let p = 0; p < count; p++) {
            const at = 2 * (bin * count + p);
            const value = Math.max(0, table.lines[at] + table.lines[at + 1] * energy);
            total += value;
            const share = p === 0 && angular === 'screened-coulomb' ? screenedMomentumShare(screening(energy)) : 1;
            const exact = (density * argon.processes[p].crossSection(energy) * SPEED_OF_1_EV * Math.sqrt(energy)) / share;
            const onset = energy < 1.1 * table.thresholds[p];
            if (!onset) expect(Math.abs(value / exact - 1), `${table.names[p]} at ${energy} eV`).toBeLessThan(energy < 0.5 ? 2e-3 : 2e-4);
          }
          expect(total).toBeLessThanOrEqual(table.limits[bin] * (1 + 1e-12));
        }
      }
    },
  );

  test('a line starts at a threshold, also where that lies inside of a bin', () => {
    const table = collisionTable(argon, { density, temperature: 0 }, 'isotropic');
    const count = table.kinds.length;
    let bin = 0;
    while (binEdge(bin + 1) <= 15.8) bin++;
    expect(binEdge(bin)).toBeLessThan(15.8);
    const at = 2 * (bin * count + 2);
    const rate = (e: number): number => table.lines[at] + table.lines[at + 1] * e;
    expect(Math.abs(rate(15.8))).toBeLessThan(1e-5 * rate(binEdge(bin + 1)));
  });

  test('refuses a set without elastic scattering, with two of it, or with a value that is no cross-section', () => {
    const gas = { density, temperature: 0 };
    const [elastic, excitation] = argon.processes;
    expect(() => collisionTable({ ...argon, processes: [excitation] }, gas, 'isotropic')).toThrow(/elastic/);
    expect(() => collisionTable({ ...argon, processes: [elastic, elastic] }, gas, 'isotropic')).toThrow(/elastic/);
    expect(() => collisionTable({ ...argon, processes: [{ ...elastic, crossSection: () => -1 }] }, gas, 'isotropic')).toThrow(/-1 m²/);
  });
});

describe('after a collision', () => {
  const draws = 200_000;
  const uniforms = Array.from({ length: draws }, (_, i) => (i + 0.5) / draws);

  // exact: the mean of cos χ is 1 less the share of momentum transfer in the integral
  test.each([0.01, 1, 30, 1000])('screened Coulomb scattering at %d eV has the mean cosine of its momentum transfer', (energy) => {
    const xi = screening(energy);
    const mean = uniforms.reduce((sum, u) => sum + screenedCosine(xi, u), 0) / draws;
    expect(Math.abs(mean - (1 - screenedMomentumShare(xi)))).toBeLessThan(1e-4);
  });

  // Opal, Peterson and Beaty: density ∝ 1/(1 + (ε/w)²) up to half of what is left, so that the share below ε is atan(ε/w)/atan(E/2w)
  test('electrons are ejected by the law of Opal, Peterson and Beaty', () => {
    const sharing = { kind: 'opal', width: 10 } as const;
    const energies = uniforms.map((u) => ejectedEnergy(sharing, 80, 15.8, u));
    for (const e of [1, 5, 10, 30]) {
      const below = energies.filter((x) => x < e).length / draws;
      expect(Math.abs(below - Math.atan(e / 10) / Math.atan(4))).toBeLessThan(1e-4);
    }
    expect(Math.max(...energies.slice(-1))).toBeLessThanOrEqual(40);
    expect(ejectedEnergy({ kind: 'opal', width: null }, 80, 15.8, 0.5)).toBe(ejectedEnergy({ kind: 'opal', width: 15.8 }, 80, 15.8, 0.5));
    expect(ejectedEnergy({ kind: 'uniform' }, 80, 15.8, 0.9)).toBeCloseTo(72);
    expect(ejectedEnergy({ kind: 'equal' }, 80, 15.8, 0.9)).toBe(40);
  });
});
