/** Chance of breakdown by particles in argon, from threshold to twice the threshold voltage. */
import { beforeAll, describe, expect, test } from 'vitest';
import { argon } from '../../src/kinetics/argon.ts';
import { type AvalancheSizes, avalancheSizes, type SeedElectrons } from '../../src/kinetics/avalanches.ts';
import { collisionTable } from '../../src/kinetics/collision-table.ts';
import { uniformGap } from '../../src/kinetics/gap-yield.ts';
import { type SeedChance, seedChanceOf } from '../../src/kinetics/seed-chance.ts';
import { thresholdOf } from './threshold.ts';

const table = collisionTable(argon, { density: 3.294e22, temperature: 0 }, 'isotropic');
const emission = 0.05;
let threshold = 0;

function chanceAt(ratio: number, electrons: number, change: Partial<SeedElectrons> = {}): { sizes: AvalancheSizes; chance: SeedChance } {
  const request = { table, field: uniformGap(ratio * threshold, 0.01, 1), emissionEnergy: 2, electrons, seed: 4, ...change };
  const found = seedChanceOf(request, emission);
  if (found === null) throw new Error('interrupted');
  return { sizes: avalancheSizes(found.avalanches, 10), chance: found.chance };
}

beforeAll(() => {
  const found = thresholdOf({ table, distance: 0.01, emissionEnergy: 2, seed: 1 }, emission, 64_000, 100, 1000);
  if (found === null) throw new Error('no threshold');
  threshold = found.value;
});

describe('one electron in argon at 1 Torr cm', () => {
  // an independent program: P(0) about 0.25 at 20 % above threshold, where Furry's law gives 0.02
  test('at 20 % above threshold makes nothing a quarter of the times, where Furry’s law says one in fifty', () => {
    const { sizes, chance } = chanceAt(1.2, 12_000);
    const [none] = sizes.shares;
    expect(Math.abs(none.value - 0.25)).toBeLessThan(0.02);
    expect(none.error).toBeLessThan(0.005);
    expect(Math.abs(1 / (1 + sizes.mean.value) - 0.02)).toBeLessThan(0.005);
    expect(Math.abs(sizes.fellBack.value - none.value)).toBeLessThan(0.002);
    // less spread than Furry's m + m² in spite of those
    expect(sizes.variance.value).toBeLessThan(0.8 * sizes.mean.value * (1 + sizes.mean.value));
    expect(chance.feedback.value).toBeGreaterThan(2);
  });

  test('has no chance below threshold, more than 1 − 1/q just above it, and less far above', () => {
    const below = chanceAt(0.95, 3000).chance;
    expect(below.feedback.value + 5 * below.feedback.error).toBeLessThan(1);
    expect(below.probability.value).toBe(0);
    const above = chanceAt(1.06, 24_000).chance;
    const simple = 1 - 1 / above.feedback.value;
    expect(above.probability.value).toBeGreaterThan(simple + 4 * above.probability.error);
    const far = chanceAt(2, 3000);
    // q there is above 20; sizes are cut off and give a lower bound
    expect(far.chance.probability.value).toBeLessThan(1 - 1 / 20 - 5 * far.chance.probability.error);
    expect(Math.abs(1 - far.sizes.shares[0].value - far.chance.probability.value)).toBeLessThan(0.01);
  });

  test('has a smaller chance when emitted faster, for it falls back more often', () => {
    const [slow, fast] = [1, 5].map((emissionEnergy) => chanceAt(1.3, 6000, { emissionEnergy }));
    expect(slow.sizes.fellBack.value).toBeLessThan(fast.sizes.fellBack.value - 0.05);
    expect(fast.chance.probability.value).toBeLessThan(slow.chance.probability.value - 0.05);
  });
});
