import { describe, expect, it } from 'vitest';
import {
  abnormalCathodeLayer,
  type CathodeLayer,
  cathodeLayer,
  layerCurrentDensity,
  normalCathodeLayer,
} from '../../src/theory/cathode-fall.ts';
import { lowCurrentSlope } from '../../src/theory/low-current-slope.ts';

const A = 1e-20;
const B = 5e-19;
const ionYield = 0.01;
const L = Math.log(1 + 1 / ionYield);
const alpha = (x: number): number => (x > 0 ? A * Math.exp(-B / x) : 0);

describe('the cathode layer with a linear field', () => {
  const normal = normalCathodeLayer(alpha, () => ionYield) as CathodeLayer;

  it('of lowest voltage has the constants of the re-solved integral', () => {
    // source: reference-values §8, von Engel–Steenbeck optimum: 3.017, 3.681, 1.639, 4V²/(pd)³ = 0.730 A B²/L (computed)
    expect(Math.abs(normal.voltage / ((B / A) * L) - 3.017)).toBeLessThan(5e-4);
    expect(Math.abs(normal.column / (L / A) - 3.681)).toBeLessThan(1e-3); // flat minimum: the place is known less well
    expect(Math.abs(normal.cathodeReducedField / B - 1.639)).toBeLessThan(5e-4);
    expect(Math.abs((4 * normal.voltage ** 2) / normal.column ** 3 / ((A * B * B) / L) - 0.73)).toBeLessThan(1e-3);
  });

  it('is stationary: 1 % off either way costs only second order', () => {
    for (const factor of [0.99, 1.01]) {
      const off = cathodeLayer(alpha, () => ionYield, factor * normal.cathodeReducedField) as CathodeLayer;
      expect(off.voltage / normal.voltage - 1).toBeGreaterThan(0);
      expect(off.voltage / normal.voltage - 1).toBeLessThan(1e-4);
    }
  });

  it('of a higher voltage is thinner, with a stronger field; below the normal fall there is none', () => {
    const abnormal = abnormalCathodeLayer(alpha, () => ionYield, 2 * normal.voltage) as CathodeLayer;
    expect(abnormal.voltage / normal.voltage).toBeCloseTo(2, 9);
    expect(abnormal.column).toBeLessThan(normal.column);
    expect(abnormal.cathodeReducedField).toBeGreaterThan(normal.cathodeReducedField);
    expect(abnormalCathodeLayer(alpha, () => ionYield, 0.99 * normal.voltage)).toBeNull();
  });

  it('carries 4 ε0 μ V²(1 + γ)/d³', () => {
    // source: von Engel & Steenbeck 1934 (from memory H)
    const N = 1e23;
    const mobility = 0.05;
    const speed = mobility * normal.cathodeReducedField * N;
    const thickness = normal.column / N;
    const expected = (4 * 8.8541878128e-12 * mobility * normal.voltage ** 2 * (1 + ionYield)) / thickness ** 3;
    expect(layerCurrentDensity(normal, ionYield, N, speed) / expected).toBeCloseTo(1, 12);
  });

  it('does not exist in a gas that does not ionise, nor has it a minimum where ionisation is constant', () => {
    expect(
      cathodeLayer(
        () => 0,
        () => ionYield,
        B,
      ),
    ).toBeNull();
    expect(
      normalCathodeLayer(
        () => A,
        () => ionYield,
      ),
    ).toBeNull();
  });
});

describe('the slope of the dark discharge', () => {
  it('changes sign at half of B for the exponential coefficient', () => {
    // source: reference-values §8, falls if E_T < Bp/2, rises if E_T > Bp/2
    for (const share of [0.1, 0.3, 0.49]) expect(lowCurrentSlope(alpha, share * B)).toBe('falls');
    for (const share of [0.51, 0.8, 3]) expect(lowCurrentSlope(alpha, share * B)).toBe('rises');
  });
});
