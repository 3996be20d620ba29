import { describe, expect, it } from 'vitest';
import { discountedGain, exactGrowthRate, type UniformGap } from './growth-rate.ts';

/** a gap of gain q: α d = ln(1 + q/γ), all lengths and speeds 1 apart from the electrons', which are much faster */
function gapOfGain(q: number, ionYield: number): UniformGap {
  return { alpha: Math.log(1 + q / ionYield), spacing: 1, ionYield, electronSpeed: 200, ionSpeed: 1 };
}

describe('the exact growth rate (oracle)', () => {
  // source: exact roots λd/w of reference-values §6, computed there independently
  it.each([
    [0.01, 0.9, -0.13305],
    [0.01, 1.01, 0.012541],
    [0.01, 1.1, 0.119951],
    [0.01, 1.5, 0.507737],
    [0.01, 2, 0.864118],
    [0.01, 5, 1.980431],
    [0.01, 10, 2.808652],
    [0.1, 1.01, 0.014567],
    [0.1, 1.1, 0.139329],
    [0.1, 2, 1.002269],
    [0.1, 10, 3.226753],
    [0.001, 1.01, 0.01162],
    [0.001, 1.1, 0.111209],
    [0.001, 2, 0.804377],
    [0.001, 10, 2.638869],
  ])('at a yield of %f and a gain of %f is %f per loop time', (ionYield, q, expected) => {
    const gap = gapOfGain(q, ionYield);
    const loop = gap.spacing * (1 / gap.electronSpeed + 1 / gap.ionSpeed);
    expect(exactGrowthRate(gap) * loop).toBeCloseTo(expected, 5);
  });

  it('makes the discounted gain one, with attachment and photons too', () => {
    const gap = { ...gapOfGain(3, 0.02), eta: 0.7, photonYield: 0.004 };
    expect(discountedGain(gap, exactGrowthRate(gap))).toBeCloseTo(1, 12);
  });

  it('is much faster for photons, whose loop is the electron transit alone', () => {
    const byPhotons: UniformGap = { ...gapOfGain(1.5, 0.01), ionYield: 0, photonYield: 0.01 };
    expect(exactGrowthRate(byPhotons) / 200).toBeCloseTo(0.507737, 5);
  });
});
