/** Swarms to high accuracy: minutes of one core. */
import { describe, expect, test } from 'vitest';
import { argon } from '../../src/kinetics/argon.ts';
import type { CrossSectionSet } from '../../src/kinetics/cross-sections.ts';
import { reidRamp } from '../../src/kinetics/model-gases.ts';
import type { Measured } from '../../src/kinetics/statistics.ts';
import { batchOf, combine, pilotOf, type SwarmPlan, type SwarmPoint, swarmGas } from '../../src/kinetics/swarm.ts';

function pointOf(
  set: CrossSectionSet,
  td: number,
  temperature: number,
  batches: number,
  flights: number,
  change?: Partial<SwarmPlan>,
): SwarmPoint {
  const gas = swarmGas(set, temperature, 'isotropic');
  const field = td * 1e-21;
  const found = pilotOf(gas, field, 7, 0, flights);
  if (found.kind !== 'plan') throw new Error(found.kind);
  const plan = { ...found, ...change };
  const sums = Array.from({ length: batches }, (_, batch) => batchOf(gas, field, plan, 7, 0, batch)).filter((batch) => batch !== null);
  return combine(gas, field, plan, sums);
}

describe("Reid's ramp model gas", () => {
  // I. D. Reid, Aust. J. Phys. 32, 231, 1979 (from memory, M; an independent Monte Carlo program agrees within 0.3 %): within three of our standard errors,
  // with that of rounding to the digits given, and within 0.5 %
  test.each([
    [1, 0.1015, 1.272e4, 9.77e23, 7.59e23, 240, 5e6],
    [12, 0.269, 6.837e4, 1.137e24, 5.7e23, 48, 5e6],
  ])('at %d Td has the published energy, drift and diffusion', (td, energy, drift, across, along, batches, flights) => {
    const point = pointOf(reidRamp, td, 0, batches, flights);
    const check = ({ value, error }: Measured, published: number, what: string): void => {
      // half of the last of four (energy, drift) or three digits
      const rounding = 0.5 * 10 ** (Math.floor(Math.log10(published)) - (what === 'along' || what === 'across' ? 2 : 3));
      expect(Math.abs(value - published), what).toBeLessThan(3 * Math.hypot(error, rounding));
      expect(Math.abs(value - published), what).toBeLessThan(0.005 * published);
      expect(error, what).toBeLessThan(0.0025 * published);
    };
    check(point.meanEnergy, energy, 'energy');
    check(point.fluxDrift, drift, 'flux drift');
    check(point.bulkDrift, drift, 'bulk drift');
    check(point.transverseDiffusion, across, 'across');
    check(point.longitudinalDiffusion, along, 'along');
    expect(Math.abs(point.energyBalance.value - 1)).toBeLessThan(1e-3);
  });
});

describe('argon', () => {
  // Phelps and Petrović, Plasma Sources Sci. Technol. 8, R21, 1999: the fit of α/N to measurements (from memory, H)
  const published = (td: number): number =>
    1.1e-22 * Math.exp(-72 / td) + 5.5e-21 * Math.exp(-187 / td) + 3.2e-20 * Math.exp(-700 / td) - 1.5e-20 * Math.exp(-10000 / td);

  test.each([
    [50, 0.2],
    [100, 0.1],
    [150, 0.1],
    [300, 0.1],
    [500, 0.1],
    [700, 0.1],
    [1000, 0.1],
  ])('at %d Td makes as many ions per length as measured, within a share of %d', (td, share) => {
    const { ionisation, energyBalance } = pointOf(argon, td, 293.15, 24, 2e6);
    expect(Math.abs(ionisation.value - published(td))).toBeLessThan(share * published(td) + 3 * ionisation.error);
    expect(ionisation.error).toBeLessThan(0.02 * ionisation.value);
    expect(Math.abs(energyBalance.value - 1)).toBeLessThan(5 * energyBalance.error + 1e-3);
  });

  test('does not depend on how many electrons a batch follows', () => {
    const [few, many] = [400, 4000].map((electrons) =>
      pointOf(argon, 1000, 0, 32, 2e6, { electrons, windows: Math.round(16000 / electrons) }),
    );
    for (const key of ['meanEnergy', 'fluxDrift', 'bulkDrift', 'ionisation', 'longitudinalDiffusion', 'transverseDiffusion'] as const) {
      const [one, other] = [few[key], many[key]];
      expect(Math.abs(one.value - other.value), key).toBeLessThan(5 * Math.hypot(one.error, other.error));
      expect(one.error, key).toBeLessThan(0.015 * one.value);
    }
  });
});
