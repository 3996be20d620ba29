import { describe, expect, it } from 'vitest';
import { breakdownProbability, breakdownProbabilityAt, meanStatisticalLag, survivalAdvance } from '../../src/theory/chance.ts';
import { discountedDelay, discountedFeedback, growthRate, ionDelay, photonDelay, thresholdSlope } from '../../src/theory/growth-rate.ts';
import { emissionThatDistorts, riseTime } from '../../src/theory/rise-time.ts';
import { linearTransient } from '../oracles/linear-transient.ts';
import { openCase } from '../oracles/open-case.ts';
import { steadyAtCurrent } from '../oracles/steady-gap.ts';

const spacing = 0.01;
const delay = ionDelay(2e5, 1e3);
const alphaOfGain = (q: number, ionYield: number): number => Math.log1p(q / ionYield) / spacing;

describe('the growth rate', () => {
  // source: exact roots λ d/w of reference-values §6 (computed there), six decimals
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
  ])('at a yield of %f and a feedback of %f is %f per loop time', (ionYield, q, expected) => {
    const rate = growthRate(alphaOfGain(q, ionYield), 0, spacing, [{ yield: ionYield, delay }]) as number;
    expect(Math.abs(rate * delay * spacing - expected)).toBeLessThan(expected === -0.13305 ? 5.1e-6 : 5.1e-7);
  });

  it('is zero at threshold and leaves it with the published slope', () => {
    // source: reference-values §6, λ d/w = (q − 1)/(1 + γ − 1/(α d))
    const alpha = alphaOfGain(1, 0.07);
    expect(Math.abs((growthRate(alpha, 0, spacing, [{ yield: 0.07, delay }]) as number) * delay * spacing)).toBeLessThan(1e-12);
    const q = 1 + 1e-6;
    const rate = growthRate(alphaOfGain(q, 0.07), 0, spacing, [{ yield: 0.07, delay }]) as number;
    expect((rate * delay * spacing) / (q - 1) / thresholdSlope(alpha, spacing, 0.07)).toBeCloseTo(1, 5);
  });

  it('solves its own equation with ions, photons and attachment together, and lies between the rates of either alone', () => {
    const ions = { yield: 0.02, delay };
    const photons = { yield: 0.02, delay: photonDelay(2e5) };
    const both = growthRate(500, 60, spacing, [ions, photons]) as number;
    expect(discountedFeedback(500, 60, spacing, [ions, photons], both)).toBeCloseTo(1, 10);
    expect(both).toBeGreaterThan(growthRate(500, 60, spacing, [ions]) as number);
    expect(both).toBeGreaterThan(growthRate(500, 60, spacing, [photons]) as number);
    const twice = growthRate(500, 60, spacing, [ions, ions]) as number;
    expect(twice).toBeCloseTo(growthRate(500, 60, spacing, [{ yield: 0.04, delay }]) as number, 6);
  });

  it('stays finite far above threshold, where the feedback itself overflows', () => {
    const rate = growthRate(1e5, 0, spacing, [{ yield: 0.01, delay }]) as number;
    // e^{κd} vanishes there, and κ = −γ α (1 − e^{κd}) leaves λ τ = α + γ α (1 − e^{−10})
    expect(rate * delay).toBeCloseTo(1e5 + 1e3 * (1 - Math.exp(-10)), 2);
  });

  it('does not exist without feedback', () => {
    expect(growthRate(500, 0, spacing, [{ yield: 0, delay }])).toBeNull();
    expect(growthRate(0, 0, spacing, [{ yield: 0.1, delay }])).toBeNull();
  });

  it('scales as 1/t when every length is divided by k and every density multiplied by k', () => {
    const rate = growthRate(500, 0, spacing, [{ yield: 0.02, delay }]) as number;
    expect(growthRate(5000, 0, spacing / 10, [{ yield: 0.02, delay }]) as number).toBeCloseTo(10 * rate, 4);
  });

  it('has the mean delay as its slope', () => {
    const terms = [{ yield: 0.03, delay }];
    for (const lambda of [-2e4, 0, 300 / delay, 300 / delay + 1e-3, 5e4]) {
      const step = 10;
      const numeric =
        (discountedFeedback(300, 0, spacing, terms, lambda - step) - discountedFeedback(300, 0, spacing, terms, lambda + step)) /
        (2 * step);
      expect(discountedDelay(300, 0, spacing, terms, lambda) / numeric).toBeCloseTo(1, 6);
    }
  });
});

describe('the rise to a given emission', () => {
  it('tends to ln[1 + (q − 1) ratio]/λ close above threshold', () => {
    // source: Schade, Z. Phys. 104, 487, 1937 (from memory M)
    const q = 1.0005;
    const alpha = alphaOfGain(q, 0.07);
    const terms = [{ yield: 0.07, delay }];
    const rate = growthRate(alpha, 0, spacing, terms) as number;
    const schade = Math.log(1 + (q - 1) * 1e6) / rate;
    expect((riseTime(alpha, 0, spacing, terms, 1e6) as number) / schade).toBeCloseTo(1, 3);
  });

  it('takes ln 10/λ longer for ten times the ratio, and never ends at or below threshold', () => {
    const terms = [{ yield: 0.07, delay }];
    const alpha = alphaOfGain(1.4, 0.07);
    const rate = growthRate(alpha, 0, spacing, terms) as number;
    const later = (riseTime(alpha, 0, spacing, terms, 1e9) as number) - (riseTime(alpha, 0, spacing, terms, 1e8) as number);
    expect(later * rate).toBeCloseTo(Math.log(10), 6);
    expect(riseTime(alphaOfGain(0.99, 0.07), 0, spacing, terms, 1e6)).toBeNull();
  });
});

describe('against the oracles', () => {
  it.each([
    [0.01, 1e-9],
    [0.1, 1e-6],
  ])('the rise at %f overvoltage ends when the exact transient emits that much', (overvoltage, tolerance) => {
    const field = (openCase.breakdownVoltage * (1 + overvoltage)) / openCase.spacing;
    const [electronSpeed, ionSpeed] = [openCase.electronMobility * field, openCase.ionMobility * field];
    const alpha = openCase.alpha(field);
    const exact = linearTransient({ alpha, spacing, ionYield: 0.07, electronSpeed, ionSpeed, seedCurrent: 1e-14 });
    const time = riseTime(alpha, 0, spacing, [{ yield: 0.07, delay: ionDelay(electronSpeed, ionSpeed) }], 1e6) as number;
    expect(Math.abs(exact.emission(time) / 1e-8 - 1)).toBeLessThan(tolerance);
  });

  it('the emission that distorts the cathode field is that of the steady discharge as its current starts to bend the field', () => {
    const gap = { ...openCase, seedCurrent: 0, electronEnergy: 0, ionEnergy: 0 };
    const state = steadyAtCurrent(gap, 1e-7, { accuracy: 1e-10 });
    const field = state.voltage / spacing;
    const emission = ((openCase.ionYield / (1 + openCase.ionYield)) * 1e-7) / openCase.area;
    const predicted = emissionThatDistorts(
      openCase.alpha(field),
      0,
      spacing,
      openCase.electronMobility * field,
      openCase.ionMobility * field,
      0,
      state.cathodeField - field,
    );
    // electrons, neglected, are μ_i/μ_e = 0.5 % as many per flux; the distortion is 0.2 %
    expect(Math.abs(predicted / emission - 1)).toBeLessThan(0.005);
  });
});

describe('the chance of breakdown', () => {
  it('is 1 − 1/q for an electron from the cathode', () => {
    // source: Wijsman 1949; values computed in reference-values §7
    expect(breakdownProbability(1.1)).toBeCloseTo(0.0909, 4);
    expect(breakdownProbability(2)).toBe(0.5);
    expect(breakdownProbability(5)).toBeCloseTo(0.8, 12);
    expect(breakdownProbability(1)).toBe(0);
    expect(breakdownProbability(0.3)).toBe(0);
  });

  it('of an electron born in the gap falls from the cathode value to zero at the anode', () => {
    const alpha = alphaOfGain(2, 0.07);
    expect(breakdownProbabilityAt(alpha, spacing, 0.07, 0)).toBeCloseTo(0.5, 12);
    expect(breakdownProbabilityAt(alpha, spacing, 0.07, spacing)).toBe(0);
    expect(breakdownProbabilityAt(1e5, spacing, 0.07, 0)).toBe(1);
  });

  it('of the geometric number of successors is the fixed point of its own generating function', () => {
    // 1 − P = G(1 − P) with G(s) = 1/(1 + m(1 − s)): exact for m successors on average, each succeeding with P
    const alpha = alphaOfGain(3, 0.07);
    const fromCathode = breakdownProbability(3);
    const at = breakdownProbabilityAt(alpha, spacing, 0.07, 0.003);
    const mean = 0.07 * Math.expm1(alpha * 0.007);
    expect(1 - at).toBeCloseTo(1 / (1 + mean * fromCathode), 12);
  });

  it('sets the statistical lag and the start won by surviving', () => {
    expect(meanStatisticalLag(0, 0.5)).toBeNull();
    expect(meanStatisticalLag(1e3, 0)).toBeNull();
    expect(meanStatisticalLag(1e3, 0.5)).toBeCloseTo(2e-3, 15);
    expect(survivalAdvance(0.1, 1e4)).toBeCloseTo(Math.log(10) / 1e4, 15);
  });
});
