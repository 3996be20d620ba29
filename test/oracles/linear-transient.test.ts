import { describe, expect, it } from 'vitest';
import { discountedGain, exactGrowthRate } from './growth-rate.ts';
import { linearTransient, type TransientGap } from './linear-transient.ts';
import { ELEMENTARY_CHARGE, openCase } from './open-case.ts';

function openGap(overvoltage: number, parts: Partial<TransientGap> = {}): TransientGap {
  const field = (openCase.breakdownVoltage * (1 + overvoltage)) / openCase.spacing;
  return {
    alpha: openCase.alpha(field),
    spacing: openCase.spacing,
    ionYield: openCase.ionYield,
    electronSpeed: openCase.electronMobility * field,
    ionSpeed: openCase.ionMobility * field,
    seedCurrent: 1e-14,
    ...parts,
  };
}

/** An independent and much cruder way: electrons and ions carried along their characteristics in a Lagrangian table of emissions,
 *  the integral taken by the trapezoidal rule in steps of T/n; second order, so two of them extrapolate. */
function byTrapezoids(gap: TransientGap, loops: number, n: number): number {
  const a = gap.alpha * gap.spacing;
  const emission = new Float64Array(loops * n + 1);
  const weight = (u: number): number => gap.ionYield * a * Math.exp(a * u);
  for (let m = 0; m < emission.length; m++) {
    const reach = Math.min(m, n);
    let sum = 1;
    for (let k = 1; k <= reach; k++) sum += (weight(k / n) * emission[m - k] * (k === reach ? 0.5 : 1)) / n;
    emission[m] = sum / (1 - weight(0) / (2 * n));
    if (m === 0) emission[m] = 1;
  }
  return emission[emission.length - 1];
}

describe('the linear transient (oracle)', () => {
  it('is closed until the first ions from the anode land', () => {
    // Γ = [1 + γ e^{(1+γ) α d t/T}]/(1 + γ) there: the integral equation differentiated once
    const gap = openGap(0.1);
    const { emission, loopTime } = linearTransient(gap);
    for (const s of [1e-6, 0.2, 0.7, 0.999]) {
      const exact = (1 + gap.ionYield * Math.exp((1 + gap.ionYield) * gap.alpha * gap.spacing * s)) / (1 + gap.ionYield);
      expect(emission(s * loopTime) / 1e-14 / exact).toBeCloseTo(1, 11);
    }
  });

  it.each([0.01, 0.1, 1])('agrees with a crude trapezoidal march at %f overvoltage', (overvoltage) => {
    const gap = openGap(overvoltage);
    const { emission, loopTime } = linearTransient(gap);
    const [coarse, fine] = [byTrapezoids(gap, 3, 1000), byTrapezoids(gap, 3, 2000)];
    // just before the end of the third loop; the jump of the seed makes Γ jump in slope only
    expect(emission(3 * loopTime) / 1e-14 / ((4 * fine - coarse) / 3)).toBeCloseTo(1, 7);
  });

  it.each([0.01, 0.1, 0.5, 1])('grows at the exact rate in the end, at %f overvoltage', (overvoltage) => {
    const gap = openGap(overvoltage);
    const rate = exactGrowthRate(gap);
    const { emission, current, loopTime } = linearTransient(gap);
    // far enough for the complex roots, which shrink against the leading one from loop to loop
    const early = Math.ceil(Math.max(20 / rate / loopTime, 15)) * loopTime;
    const late = early + Math.ceil(5 / rate / loopTime) * loopTime;
    // I = a + b e^{λt}: the constant part is that of a steady state below zero, I₀/(1 − q)
    const q = discountedGain(gap, 0);
    const constant = 1e-14 / (1 - q);
    expect(Math.log((emission(late) - constant) / (emission(early) - constant)) / (late - early) / rate).toBeCloseTo(1, 9);
    const amplified = constant * Math.exp(gap.alpha * gap.spacing);
    expect(Math.log((current(late) - amplified) / (current(early) - amplified)) / (late - early) / rate).toBeCloseTo(1, 9);
  });

  it('starts the growing mode with the residue of the Laplace transform', () => {
    const gap = openGap(0.1);
    const rate = exactGrowthRate(gap);
    const step = rate * 1e-4;
    const delay = (discountedGain(gap, rate - step) - discountedGain(gap, rate + step)) / (2 * step);
    const { emission } = linearTransient(gap);
    const time = 30 / rate;
    expect(emission(time) / (1e-14 * (Math.exp(rate * time) / (rate * delay) + 1 / (1 - discountedGain(gap, 0))))).toBeCloseTo(1, 7);
  });

  it('settles below threshold at the amplified seed current', () => {
    const gap = openGap(-0.1);
    const { current, loopTime } = linearTransient(gap);
    const q = discountedGain(gap, 0);
    expect(current(60 * loopTime) / ((1e-14 * Math.exp(gap.alpha * gap.spacing)) / (1 - q))).toBeCloseTo(1, 9);
  });

  it('passes one charge per pair to the circuit when nothing feeds back', () => {
    const gap = openGap(0.1, { seedCurrent: 0, electrons: 1, ionYield: 0 });
    const { current, loopTime } = linearTransient(gap);
    const electronTime = gap.spacing / gap.electronSpeed;
    const simpson = (from: number, to: number, n: number): number => {
      let sum = 0;
      for (let i = 0; i <= n; i++) {
        // ends taken just inside: the current jumps when the electrons are collected
        const t = from + (to - from) * Math.min(1 - 1e-9, Math.max(1e-9, i / n));
        sum += current(t) * (i === 0 || i === n ? 1 : i % 2 === 1 ? 4 : 2);
      }
      return (sum * (to - from)) / (3 * n);
    };
    const charge = simpson(0, electronTime, 200) + simpson(electronTime, loopTime, 400);
    expect(charge / ELEMENTARY_CHARGE / Math.exp(gap.alpha * gap.spacing)).toBeCloseTo(1, 7);
  });

  it('is linear in its sources, and electrons at t = 0 are the derivative of a seed', () => {
    const both = linearTransient(openGap(0.1, { electrons: 10 }));
    const seed = linearTransient(openGap(0.1));
    const burst = linearTransient(openGap(0.1, { seedCurrent: 0, electrons: 10 }));
    const t = 7.3 * seed.loopTime;
    expect(both.current(t) / (seed.current(t) + burst.current(t))).toBeCloseTo(1, 12);
    const step = 1e-4 * seed.loopTime;
    const slope = (seed.current(t + step) - seed.current(t - step)) / (2 * step);
    expect((burst.current(t) * 1e-14) / (10 * ELEMENTARY_CHARGE) / slope).toBeCloseTo(1, 6);
  });

  it('crosses a level when its current says so', () => {
    for (const gap of [openGap(0.02), openGap(0.5), openGap(0.1, { seedCurrent: 0, electrons: 1 })]) {
      const transient = linearTransient(gap);
      // a single electron is 4e-12 A from the first instant on
      for (const level of [1e-11, 1e-9, 1e-7]) {
        const time = transient.crossingTime(level, 1);
        expect(transient.current(time) / level).toBeCloseTo(1, 9);
        expect(transient.current(time - 1e-3 * transient.loopTime)).toBeLessThan(level);
      }
      expect(transient.crossingTime(1e-9, 1e-9)).toBe(Number.POSITIVE_INFINITY);
    }
  });
});
