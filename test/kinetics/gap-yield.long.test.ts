/** Electrons from a cathode: what is conserved, what scales, and where many of them must agree with a swarm. */
import { describe, expect, test } from 'vitest';
import { argon } from '../../src/kinetics/argon.ts';
import { type CollisionTable, collisionTable } from '../../src/kinetics/collision-table.ts';
import { SPEED_OF_1_EV } from '../../src/kinetics/cross-sections.ts';
import { combineGap, type GapElectrons, type GapYield, gapBatchOf, gapYieldOf, uniformGap } from '../../src/kinetics/gap-yield.ts';
import { thresholdOf } from './threshold.ts';

/** 1 Torr at 20 °C [1/m³] */
const TORR = 3.294e22;
const argonAt = (density: number): CollisionTable => collisionTable(argon, { density, temperature: 0 }, 'isotropic');
const oneTorr = argonAt(TORR);

function yieldOf(request: Partial<GapElectrons> & Pick<GapElectrons, 'field'>): GapYield {
  const found = gapYieldOf({ table: oneTorr, emissionEnergy: 2, particles: 1600, seed: 1, ...request });
  if (found === null) throw new Error('interrupted');
  return found;
}

const sum = (list: Float64Array): number => list.reduce((a, b) => a + b, 0);

describe('electrons of a gap', () => {
  test('are all accounted for: returned, arrived or slow, as many as were emitted and made, on average over those played for', () => {
    for (const [voltage, centimetres] of [
      [250, 1],
      [700, 2],
    ] as const) {
      const { ionsPerElectron, returned, arrived, slow, ions } = yieldOf({ field: uniformGap(voltage, centimetres / 100, 20) });
      expect(ionsPerElectron.value).toBeGreaterThan(voltage === 700 ? 1e4 : 50);
      // one in two of 3200 or more electrons is played for in each of the last cells: some per cent
      expect(Math.abs((returned.value + arrived.value + sum(slow)) / (1 + ionsPerElectron.value) - 1)).toBeLessThan(0.05);
      expect(Math.abs(ions.reduce((sum, x) => sum + x, 0) / ionsPerElectron.value - 1)).toBeLessThan(1e-9);
    }
  });

  // exact: electrons know only how many molecules they pass and how many volts they fall through
  test('are the same at twice the density over half the distance, twice as fast', () => {
    const one = yieldOf({ field: uniformGap(250, 0.01, 16) });
    const other = yieldOf({ table: argonAt(2 * TORR), field: uniformGap(250, 0.005, 16) });
    expect(other.ionsPerElectron).toEqual(one.ionsPerElectron);
    expect(other.returned).toEqual(one.returned);
    expect((one.arrivalTime?.value ?? 0) / (other.arrivalTime?.value ?? 1)).toBeCloseTo(2, 12);
  });

  test('cross an empty gap in the time of free fall and do not come back', () => {
    const empty = argonAt(1);
    const { arrived, returned, ionsPerElectron, arrivalTime, arrivalEnergy } = yieldOf({ table: empty, field: uniformGap(100, 0.01, 7) });
    expect([arrived.value, returned.value, ionsPerElectron.value]).toEqual([1, 0, 0]);
    expect(arrivalEnergy?.value).toBeCloseTo(102, 9);
    // from rest it would take 2 d/v(100 eV)
    const slowest = (2 * 0.01) / (SPEED_OF_1_EV * 10);
    expect(arrivalTime?.value).toBeLessThan(slowest);
    expect(arrivalTime?.value).toBeGreaterThan(0.85 * slowest);
  });

  // far from the cathode a stream grows by the α of a steady stream: two lengths of gap, five errors and 2 % for what is not yet far enough
  test('grow in a long gap as the steady stream of a swarm does', () => {
    const field = 500e-21 * TORR;
    const [short, long] = [0.006, 0.012].map((d) => yieldOf({ field: uniformGap(field * d, d, 10), particles: 6400 }));
    // electrons at the anode, slow ones too, per electron emitted, grow as e^(αd): one for each ion and each emitted one, less those that fell back
    const atAnode = ({ ionsPerElectron, returned }: GapYield): number => 1 + ionsPerElectron.value - returned.value;
    const slope = Math.log(atAnode(long) / atAnode(short)) / 0.006 / TORR;
    const relative = ({ ionsPerElectron: { value, error } }: GapYield): number => error / value;
    const error = Math.hypot(relative(long), relative(short)) / 0.006 / TORR;
    // of swarm-values.long.test.ts and of `gapwake swarm argon --at "500 Td"`: 1.063e-20 m², ± 0.1 %
    expect(Math.abs(slope - 1.063e-20)).toBeLessThan(5 * error + 0.02 * 1.063e-20);
    expect(error).toBeLessThan(0.02 * slope);
  });

  // at 1 Torr cm in argon, 20 % above threshold, an independent program found that about a quarter of the avalanches end at once: the electron fell back
  test('fall back on the cathode as often as an independent program found, and more often when emitted faster', () => {
    const shares = [1, 2, 5].map((emissionEnergy) => yieldOf({ field: uniformGap(220, 0.01, 10), emissionEnergy }).returned);
    expect(shares[1].value).toBeGreaterThan(0.2);
    expect(shares[1].value).toBeLessThan(0.32);
    expect(shares[0].value + 5 * shares[0].error).toBeLessThan(shares[1].value);
    expect(shares[1].value + 5 * shares[1].error).toBeLessThan(shares[2].value);
  });

  test('that stay where no field carries them on end the search when they can no more ionise', () => {
    // 200 V over 2 mm, nothing over 2 cm
    const field = { faces: Float64Array.of(0, 1e-3, 2e-3, 12e-3, 22e-3), force: Float64Array.of(1e5, 1e5, 0, 0) };
    // expected: one electron in every cell, so that none is ever played for
    const { slow, ions, ionsPerElectron, returned, arrived } = yieldOf({ field, particles: 320, expected: new Float64Array(4).fill(1) });
    expect(sum(slow)).toBeGreaterThan(0.1);
    expect(ions[2]).toBeGreaterThan(0);
    expect(Math.abs((returned.value + arrived.value + sum(slow)) / (1 + ionsPerElectron.value) - 1)).toBeLessThan(1e-9);
    // most of them where the field ends; none in the first cell, where it can still give them what it takes
    expect(slow[0]).toBe(0);
    expect(slow[2]).toBeGreaterThan(slow[1]);
  });

  test('are the same whatever the order of batches; errors shrink with their number', () => {
    const request = {
      table: oneTorr,
      field: uniformGap(250, 0.005, 8),
      emissionEnergy: 2,
      particles: 800,
      seed: 3,
      expected: new Float64Array(8).fill(2),
    };
    const backwards = Array.from({ length: 16 }, (_, k) => gapBatchOf(request, 15 - k)).reverse();
    const once = yieldOf(request);
    expect(combineGap(backwards)).toEqual(once);
    // √8 times smaller with eight times as many; an error of 16 batches is known to 18 %, the root mean square of six or two of them to 8 and 13 %
    const errorOf = (particles: number, seeds: readonly number[]): number =>
      Math.sqrt(seeds.reduce((sum, seed) => sum + yieldOf({ ...request, particles, seed }).ionsPerElectron.error ** 2, 0) / seeds.length);
    const ratio = errorOf(800, [3, 4, 5, 6, 7, 8]) / errorOf(6400, [3, 4]);
    expect(ratio).toBeGreaterThan(Math.sqrt(8) * 0.6);
    expect(ratio).toBeLessThan(Math.sqrt(8) * 1.6);
    expect(gapYieldOf(request, () => true)).toBeNull();
  });
});

describe('breakdown by particles', () => {
  const gap = { table: oneTorr, distance: 0.01, emissionEnergy: 2, seed: 1 };

  test('is where every ion frees one electron that takes its place', () => {
    const found = thresholdOf(gap, 0.05, 16_000, 150, 2000);
    if (found === null) throw new Error('none found');
    expect(found.error).toBeLessThan(0.015 * found.value);
    // other random numbers
    const { value, error } = yieldOf({ field: uniformGap(found.value, 0.01, 40), particles: 3200, seed: 2 }).ionsPerElectron;
    // 1 % in voltage is some 3 % in q here
    expect(Math.abs(0.05 * value - 1)).toBeLessThan(5 * Math.hypot(0.05 * error, (4 * found.error) / found.value));
  });

  test('is not found where it is not', () => {
    expect(thresholdOf(gap, 0.05, 3200, 100, 160)).toBeNull();
    // too thin: no voltage makes 20 ions per electron
    expect(thresholdOf({ ...gap, distance: 0.001 }, 0.05, 3200, 100, 2000)).toBeNull();
  });
});
