/** The generator against its authors' vectors, and its numbers against the distributions they are drawn from. */
import { describe, expect, test } from 'vitest';
import { philox, Random } from '../../src/numerics/random.ts';

describe('the generators themselves', () => {
  // test vectors that go with Salmon et al., SC11, 2011, philox4x32-10 (from memory, H): all zeros, all ones, the digits of pi
  test.each([
    [[0, 0, 0, 0], [0, 0], '6627e8d5 e169c58d bc57ac4c 9b00dbd8'],
    [[0xffffffff, 0xffffffff, 0xffffffff, 0xffffffff], [0xffffffff, 0xffffffff], '408f276d 41c83b0e a20bc7c6 6d5451fd'],
    [[0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344], [0xa4093822, 0x299f31d0], 'd16cfe09 94fdcceb 5001e420 24126ea1'],
  ])('Philox4x32-10 turns the published counters into the published words: %j', (counter, [key0, key1], expected) => {
    const words = Uint32Array.from(counter);
    philox(words, key0, key1);
    expect([...words].map((word) => word.toString(16)).join(' ')).toBe(expected);
  });

  // xoshiro128++ of Blackman and Vigna from the state 1, 2, 3, 4: first ten numbers, as other libraries test it (from memory, H)
  test('xoshiro128++ gives the published numbers', () => {
    const random = new Random(1);
    random.start(1, 2, 3, 4);
    const words = Array.from({ length: 10 }, () => random.word() >>> 0);
    expect(words).toEqual([641, 1573767, 3222811527, 3517856514, 836907274, 4247214768, 3867114732, 1355841295, 495546011, 621204420]);
  });
});

describe('streams', () => {
  const firstOf = (seed: number, streams: readonly number[]): string => {
    const random = new Random(seed, streams);
    return [random.word(), random.word(), random.word(), random.word()].join(' ');
  };

  test('are the same for the same seed and counters, whatever was drawn before', () => {
    new Random(7, [1, 2]).normal();
    expect(firstOf(7, [1, 2])).toBe(firstOf(7, [1, 2, 0, 0]));
  });

  test('begin again where they began, whatever was drawn before', () => {
    const random = new Random(1, [9]);
    random.normal();
    random.restart(7, [1, 2]);
    const fresh = new Random(7, [1, 2]);
    expect([random.word(), random.exponential()]).toEqual([fresh.word(), fresh.exponential()]);
  });

  test('differ when the seed or any counter differs', () => {
    const all = new Set<string>();
    let count = 0;
    for (const seed of [0, 1, 2 ** 32, 2 ** 53 - 1])
      for (let a = 0; a < 4; a++)
        for (let b = 0; b < 4; b++)
          for (let c = 0; c < 4; c++)
            for (let d = 0; d < 4; d++) {
              all.add(firstOf(seed, [a, b, c, d]));
              count++;
            }
    expect(all.size).toBe(count);
  });

  test('of neighbouring counters are not correlated', () => {
    // the correlation of n pairs is 0 with a standard deviation of n^-1/2
    const n = 20000;
    for (const [one, other] of [
      [new Random(1, [0, 5]), new Random(1, [0, 6])],
      [new Random(1, [0]), new Random(2, [0])],
    ]) {
      let sum = 0;
      for (let i = 0; i < n; i++) sum += one.signed() * other.signed() * 3;
      expect(Math.abs(sum / n)).toBeLessThan(5 / Math.sqrt(n));
    }
  });

  test('refuse a seed that is no whole number', () => {
    for (const seed of [-1, 0.5, Number.NaN, 2 ** 53]) expect(() => new Random(seed)).toThrow(/seed/);
  });
});

const n = 400_000;
/** 1-based raw moments of n numbers */
function momentsOf(draw: () => number): number[] {
  const sums = [0, 0, 0, 0];
  for (let i = 0; i < n; i++) {
    let power = 1;
    const x = draw();
    for (let k = 0; k < 4; k++) {
      power *= x;
      sums[k] += power;
    }
  }
  return sums.map((sum) => sum / n);
}

describe('distributions', () => {
  // the mean of n powers xᵏ has the standard deviation √((⟨x²ᵏ⟩ − ⟨xᵏ⟩²)/n); five of them
  test.each([
    ['uniform', (k: number) => 1 / (k + 1)],
    ['exponential', (k: number) => factorial(k)],
    ['normal', (k: number) => (k % 2 === 1 ? 0 : doubleFactorial(k - 1))],
    ['signed', (k: number) => (k % 2 === 1 ? 0 : 1 / (k + 1))],
  ] as const)('%s numbers have the first four moments of their law', (name, moment) => {
    const random = new Random(11, [1]);
    const measured = momentsOf(() => random[name]());
    for (const [i, value] of measured.entries()) {
      const k = i + 1;
      const deviation = Math.sqrt((moment(2 * k) - moment(k) ** 2) / n);
      expect(Math.abs(value - moment(k)), `moment ${k}`).toBeLessThan(5 * deviation);
    }
  });

  // χ² of 200 equally likely parts: mean 199, standard deviation √398; five of them. Finds a layer of the ziggurat that is missing or too heavy.
  test.each([
    ['uniform', (u: number) => u],
    ['exponential', (x: number) => 1 - Math.exp(-x)],
    ['normal', normalShare],
  ] as const)('%s numbers fall equally often into equally likely parts', (name, share) => {
    const random = new Random(12, [2]);
    const counts = new Float64Array(200);
    for (let i = 0; i < n; i++) counts[Math.min(199, Math.floor(200 * share(random[name]())))]++;
    const expected = n / 200;
    const chi2 = counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
    expect(Math.abs(chi2 - 199)).toBeLessThan(5 * Math.sqrt(398));
  });

  test('the tails go on beyond the last layer: as many numbers as the law says', () => {
    const random = new Random(13);
    let [beyond8, beyond35] = [0, 0];
    for (let i = 0; i < n; i++) {
      if (random.exponential() > 8) beyond8++;
      if (Math.abs(random.normal()) > 3.5) beyond35++;
    }
    for (const [count, mean] of [
      [beyond8, n * Math.exp(-8)],
      [beyond35, n * 2 * (1 - normalShare(3.5))],
    ])
      expect(Math.abs(count - mean)).toBeLessThan(5 * Math.sqrt(mean));
  });

  test('every bit of a word is set half of the time, and words in a row are not correlated', () => {
    const random = new Random(14);
    const ones = new Float64Array(32);
    let product = 0;
    let before = random.word() * 2 ** -31;
    for (let i = 0; i < n; i++) {
      const word = random.word();
      for (let bit = 0; bit < 32; bit++) ones[bit] += (word >>> bit) & 1;
      product += before * word * 2 ** -31 * 3;
      before = word * 2 ** -31;
    }
    for (const count of ones) expect(Math.abs(count - n / 2)).toBeLessThan(5 * Math.sqrt(n / 4));
    expect(Math.abs(product / n)).toBeLessThan(5 / Math.sqrt(n));
  });
});

function factorial(k: number): number {
  return k <= 1 ? 1 : k * factorial(k - 1);
}

function doubleFactorial(k: number): number {
  return k <= 1 ? 1 : k * doubleFactorial(k - 2);
}

/** Share of a normal distribution below x: Abramowitz and Stegun, Handbook of Mathematical Functions, 1964, 26.2.10 as a series and 26.2.14 as a continued fraction. */
function normalShare(x: number): number {
  if (x < 0) return 1 - normalShare(-x);
  const density = Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);
  if (x > 3) {
    let fraction = 0;
    for (let k = 40; k >= 1; k--) fraction = k / (x + fraction);
    return 1 - density / (x + fraction);
  }
  let [term, sum] = [x, x];
  for (let k = 3; k < 120; k += 2) {
    term *= (x * x) / k;
    sum += term;
  }
  return 0.5 + density * sum;
}
