import { describe, expect, it } from 'vitest';
import { expOfNegative } from '../../src/numerics/exponential.ts';

describe('e^u for u ≤ 0', () => {
  it('agrees with the language’s own exponential to 4e-16 from 0 to −700', () => {
    let worst = 0;
    for (let i = 0; i <= 200_000; i++) {
      const u = -700 * (i / 200_000) ** 3;
      if (u > -700) worst = Math.max(worst, Math.abs(expOfNegative(u) / Math.exp(u) - 1));
    }
    expect(worst).toBeLessThan(4.5e-16);
  });

  it('is 1 at zero, 0 far below and at minus infinity, and falls throughout', () => {
    expect(expOfNegative(0)).toBe(1);
    expect(expOfNegative(-0)).toBe(1);
    expect(expOfNegative(-700)).toBe(0);
    expect(expOfNegative(-Infinity)).toBe(0);
    let rises = 0;
    for (let u = -1e-9, before = 1; u > -700; u -= 0.0137) {
      const value = expOfNegative(u);
      if (value > before) rises++;
      before = value;
    }
    expect(rises).toBe(0);
  });
});
