import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { threshold } from '../../src/theory/breakdown-voltage.ts';
import { feedback } from '../../src/theory/feedback.ts';
import { type Multiplication, sustainingColumn, uniformFeedback } from '../../src/theory/multiplication.ts';
import { exponentialBreakdownVoltage, exponentialMinimum, lowestOverPaths, paschenMinimum, rootMinimum } from '../../src/theory/paschen.ts';
import { steadyAmplification } from '../../src/theory/steady-current.ts';

/** E/N of 1 V/(cm Torr) and 1/N of 1/(cm Torr) at 300 K, to compare with p-based tables */
const TORR_DENSITY = 101325 / 760 / (1.380649e-23 * 300);
const FIELD = 100 / TORR_DENSITY;

function exponential(A: number, B: number, ionYield: number): Multiplication {
  return {
    ionisation: (x) => (x > 0 ? ((A * 100) / TORR_DENSITY) * Math.exp((-B * FIELD) / x) : 0),
    attachment: () => 0,
    ionYield: () => ionYield,
  };
}

/** N d of p d in Torr cm */
const column = (pd: number): number => (pd * TORR_DENSITY) / 100;

describe('feedback', () => {
  it('is continuous where attachment balances ionisation', () => {
    const at = (eta: number): number => feedback(300, eta, 0.01, 0.07);
    expect(at(300)).toBeCloseTo(0.07 * 3, 12);
    for (const gap of [1e-3, 1e-5, 1e-7, 1e-9]) {
      expect(Math.abs(at(300 + gap) + at(300 - gap) - 2 * at(300))).toBeLessThan(1e-10);
      expect(at(300 - gap)).toBeGreaterThanOrEqual(at(300));
    }
  });

  it('keeps its digits when the avalanche hardly multiplies', () => {
    expect(feedback(1e-9, 0, 0.01, 0.07) / (0.07 * 1e-11)).toBeCloseTo(1, 10);
  });

  it('tends to γ α/(η − α) in a long attaching gap, so a weak field never sustains itself', () => {
    expect(feedback(100, 300, 10, 0.07)).toBeCloseTo(0.07 / 2, 12);
    const attaching: Multiplication = { ionisation: () => 1e-22, attachment: () => 3e-22, ionYield: () => 0.07 };
    expect(sustainingColumn(attaching, 1e-19)).toBeNull();
    // the limit decides: γ α/(η − α) = 2/3 never reaches 1, 2 does
    const strongCathode = { ...attaching, ionYield: () => 0.5 };
    expect(sustainingColumn({ ...strongCathode, attachment: () => 1.75e-22 }, 1e-19)).toBeNull();
    const column = sustainingColumn({ ...strongCathode, attachment: () => 1.25e-22 }, 1e-19) as number;
    expect(feedback(1e-22, 1.25e-22, column, 0.5)).toBeCloseTo(1, 12);
  });
});

describe('the static breakdown voltage', () => {
  it('of the open case is 209.274 V', () => {
    // source: closed form, given with the issue: α/p = 12 exp(−180 p/E), 3 Torr cm at 300 K, γ = 0.07
    const { breakdown, upper } = threshold(exponential(12, 180, 0.07), column(3), 1);
    expect(breakdown).toBeCloseTo(209.274, 3);
    expect(upper).toBeNull();
  });

  it('equals the closed form of the exponential coefficient to 1e-12', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 30, noNaN: true }),
        fc.double({ min: 30, max: 500, noNaN: true }),
        fc.double({ min: 1e-3, max: 0.3, noNaN: true }),
        fc.double({ min: 1.05, max: 100, noNaN: true }),
        (A, B, ionYield, beyondAsymptote) => {
          const pd = (beyondAsymptote * Math.log1p(1 / ionYield)) / A;
          const exact = exponentialBreakdownVoltage(A, B, pd, ionYield) as number;
          fc.pre(exact / pd < 3000); // below 1e4 Td
          const found = threshold(exponential(A, B, ionYield), column(pd), 1).breakdown as number;
          expect(Math.abs(found / exact - 1)).toBeLessThan(1e-12);
        },
      ),
    );
  });

  it('does not exist left of the vertical asymptote', () => {
    const asymptote = Math.log1p(1 / 0.07) / 12;
    expect(exponentialBreakdownVoltage(12, 180, 0.99 * asymptote, 0.07)).toBeNull();
    expect(threshold(exponential(12, 180, 0.07), column(0.99 * asymptote), 1)).toEqual({ breakdown: null, upper: null });
  });

  it('depends on N d only', () => {
    const gas = exponential(12, 180, 0.07);
    expect(threshold(gas, 1e23, 0.01).breakdown).toBeCloseTo(threshold(gas, 1e21, 1).breakdown as number, 9);
  });

  it('is the lowest of several crossings, and the voltage where the gap holds again is told apart', () => {
    // ionisation that peaks at 100 Td, vanishes, and comes back stronger
    const bump = (x: number): number => {
      const td = x / 1e-21;
      return 1e-20 * Math.exp(-((Math.log(td / 100) / 0.3) ** 2)) + (td > 1000 ? 3e-20 * (1 - Math.exp(-(td - 1000) / 1000)) : 0);
    };
    const gas: Multiplication = { ionisation: bump, attachment: () => 0, ionYield: () => 0.05 };
    const { breakdown, upper } = threshold(gas, 1e23, 0.005);
    const q = (V: number): number => uniformFeedback(gas, V / 5e20, 5e20);
    expect(q(breakdown as number)).toBeCloseTo(1, 10);
    expect(q(upper as number)).toBeCloseTo(1, 10);
    expect(q((breakdown as number) * 0.999)).toBeLessThan(1);
    expect(q((upper as number) * 1.001)).toBeLessThan(1);
    expect((breakdown as number) / 5e20 / 1e-21).toBeLessThan(100);
    expect((upper as number) / 5e20 / 1e-21).toBeGreaterThan(100);
  });

  it('finds a window narrower than the steps of the search', () => {
    const at = 1.011e-19; // between two scanned fields
    const narrow: Multiplication = {
      ionisation: (x) => 1e-20 * Math.exp(-(Math.log(x / at) ** 2) / 4),
      attachment: () => 0,
      ionYield: () => 0.05,
    };
    // the column at which the top of the bump is only just above threshold
    const barely = (sustainingColumn(narrow, at) as number) * 1.000002;
    const { breakdown, upper } = threshold(narrow, barely, 1);
    expect((breakdown as number) / barely).toBeLessThan(at);
    expect((upper as number) / barely).toBeGreaterThan(at);
    expect((upper as number) / (breakdown as number)).toBeLessThan(1.023);
  });

  it('follows a yield that depends on the field', () => {
    const constant = exponential(12, 180, 0.07);
    const rising: Multiplication = { ...constant, ionYield: (x) => 0.07 * (x / (70 * FIELD)) };
    const { breakdown } = threshold(rising, column(3), 1);
    expect(uniformFeedback(rising, (breakdown as number) / column(3), column(3))).toBeCloseTo(1, 11);
    expect(breakdown).toBeCloseTo(threshold(constant, column(3), 1).breakdown as number, 0);
  });
});

describe('the Paschen minimum', () => {
  // source: reference-values §1, formula minima V = e(B/A)L, p d = e L/A at γ = 0.01 (exact algebra; A, B of Raizer 1991)
  it.each([
    ['air', 15, 365, 305, 0.836],
    ['nitrogen', 12, 342, 358, 1.045],
    ['argon', 12, 180, 188, 1.045],
    ['hydrogen', 5, 130, 326, 2.51],
    ['helium', 3, 34, 142, 4.18],
    ['neon', 4, 100, 314, 3.14],
    ['carbon dioxide', 20, 466, 292, 0.627],
    ['water vapour', 13, 290, 280, 0.965],
  ])('of %s with A = %f, B = %f is %f V at %f Torr cm', (_, A, B, voltage, pd) => {
    const closed = exponentialMinimum(A, B, 0.01);
    expect(Math.abs(closed.voltage - voltage)).toBeLessThan(0.5);
    expect(closed.column / pd).toBeCloseTo(1, 2);
    const found = paschenMinimum(exponential(A, B, 0.01));
    expect(Math.abs((found?.voltage as number) / closed.voltage - 1)).toBeLessThan(1e-12);
    expect((found?.column as number) / column(closed.column)).toBeCloseTo(1, 6);
  });

  // source: the same section, rare-gas form with Ward's C, D at γ = 0.07
  it.each([
    ['helium', 4.4, 14, 224, 4.58],
    ['neon', 8.2, 17, 178, 2.46],
    ['argon', 29.22, 26.64, 122, 0.69],
    ['krypton', 35.7, 28.2, 112, 0.564],
    ['xenon', 65.3, 36.1, 101, 0.309],
  ])('of %s with C = %f, D = %f is %f V at %f Torr cm', (_, C, D, voltage, pd) => {
    const closed = rootMinimum(C, D, 0.07);
    expect(Math.abs(closed.voltage - voltage)).toBeLessThan(0.5);
    expect(closed.column / pd).toBeCloseTo(1, 2);
    const gas: Multiplication = {
      ionisation: (x) => ((C * 100) / TORR_DENSITY) * Math.exp(-D * Math.sqrt(FIELD / x)),
      attachment: () => 0,
      ionYield: () => 0.07,
    };
    expect(paschenMinimum(gas)?.voltage).toBeCloseTo(closed.voltage, 8);
  });

  it('is touched by no breakdown voltage from below, and met at its own p d', () => {
    const gas = exponential(12, 180, 0.07);
    const minimum = paschenMinimum(gas) as NonNullable<ReturnType<typeof paschenMinimum>>;
    expect(threshold(gas, minimum.column, 1).breakdown).toBeCloseTo(minimum.voltage, 8);
    for (const factor of [0.5, 0.9, 1.1, 3]) {
      expect(threshold(gas, factor * minimum.column, 1).breakdown as number).toBeGreaterThan(minimum.voltage);
    }
  });
});

describe('the lowest voltage over longer paths', () => {
  const gas = exponential(12, 180, 0.07);
  const minimum = exponentialMinimum(12, 180, 0.07);
  const at = (pd: number): number => threshold(gas, column(pd), 1).breakdown as number;
  const lowest = (pd: number, longest: number): { voltage: number; path: number } =>
    lowestOverPaths(gas, column(1), pd, longest) as { voltage: number; path: number };

  it('right of the minimum is that of the gap itself', () => {
    expect(lowest(3, 30).path).toBe(3);
    expect(lowest(3, 30).voltage).toBeCloseTo(at(3), 9);
  });

  it('left of the minimum is that of the longest path, until that reaches the minimum', () => {
    const short = 0.45 * minimum.column;
    const longer = 0.8 * minimum.column;
    expect(lowest(short, longer).path).toBe(longer);
    expect(lowest(short, longer).voltage).toBeCloseTo(at(longer), 9);
    expect(lowest(short, 5 * minimum.column).voltage).toBeCloseTo(minimum.voltage, 8);
    expect(lowest(short, 5 * minimum.column).path / minimum.column).toBeCloseTo(1, 6);
  });

  it('exists where the gap itself cannot break down but a longer path can', () => {
    const short = 0.2 * minimum.column;
    expect(threshold(gas, column(short), 1).breakdown).toBeNull();
    expect(lowest(short, minimum.column).voltage).toBeCloseTo(minimum.voltage, 8);
    expect(lowestOverPaths(gas, column(1), short, short)).toBeNull();
  });

  it('equals the lowest of many paths tried one by one', () => {
    const short = 0.6 * minimum.column;
    const paths = Array.from({ length: 400 }, (_, i) => short + (i / 399) * minimum.column);
    const tried = Math.min(...paths.map(at));
    const found = lowest(short, short + minimum.column).voltage;
    expect(found).toBeLessThanOrEqual(tried);
    expect(tried / found - 1).toBeLessThan(1e-5);
  });
});

describe('the steady current below threshold', () => {
  it('is the seed times the avalanche when the cathode does not emit', () => {
    expect(steadyAmplification(200, 0, 0.01, 0)).toBeCloseTo(Math.exp(2), 12);
  });

  it('with attachment counts electrons and negative ions, continuously through α = η', () => {
    const closed = (200 * Math.exp(1) - 100) / 100;
    expect(steadyAmplification(200, 100, 0.01, 0)).toBeCloseTo(closed, 12);
    const balanced = steadyAmplification(200, 200, 0.01, 0.07) as number;
    expect(balanced).toBeCloseTo((1 + 2) / (1 - 0.14), 12);
    expect(steadyAmplification(200, 200.0001, 0.01, 0.07)).toBeCloseTo(balanced, 5);
  });

  it('diverges at threshold and does not exist above', () => {
    const alphaD = Math.log1p(1 / 0.07);
    expect(steadyAmplification(alphaD * 0.9999, 0, 1, 0.07) as number).toBeGreaterThan(1e4);
    expect(steadyAmplification(alphaD * 1.0001, 0, 1, 0.07)).toBeNull();
  });
});
