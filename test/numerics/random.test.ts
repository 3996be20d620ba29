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

describe('whole streams', () => {
  // One million words of three streams as two well-kept libraries give them: the authors' own Random123 1.14.0 for the state (Philox4x32-10, counter =
  // streams, key = seed), and rand_xoshiro 0.6.0 of the Rust project for what follows from it (Xoshiro128PlusPlus); both were run once. First six and last
  // two words, and h ← 31 h + word of all.
  test.each([
    [0, [], [4203364181, 3172999218, 3987853227, 2458982729, 96215356, 1782628989], [3239650834, 2847649165], 842495831],
    [1, [2], [3771393797, 2912971960, 416879491, 1576854563, 2672774770, 4137407503], [2431068357, 3869393142], 352622240],
    [
      1234567890123456,
      [4294967295, 1, 77, 3],
      [1787234070, 1654664908, 1126936305, 3449374931, 3940845915, 3309318521],
      [131196970, 4208592026],
      3185533025,
    ],
  ])('are word for word those of well-kept libraries: seed %d, streams %j', (seed, streams, head, end, hash) => {
    const random = new Random(seed, streams);
    const words: number[] = [];
    let h = 0;
    for (let i = 0; i < 1_000_000; i++) {
      const word = random.word() >>> 0;
      if (i < 6 || i >= 999_998) words.push(word);
      h = (Math.imul(h, 31) + word) | 0;
    }
    expect(words).toEqual([...head, ...end]);
    expect(h >>> 0).toBe(hash);
  });

  /** words of one stream, and taken in turns from many: the first ones of streams that differ by one in a counter, as single electrons use them */
  const sources: readonly (readonly [string, () => () => number])[] = [
    [
      'one stream',
      () => {
        const random = new Random(15);
        return () => random.word() >>> 0;
      },
    ],
    [
      'the beginnings of neighbouring streams',
      () => {
        const random = new Random(0);
        let drawn = 0;
        return () => {
          if (drawn % 16 === 0) random.restart(15, [7, 0, drawn / 16]);
          drawn++;
          return random.word() >>> 0;
        };
      },
    ],
  ];

  // D. E. Knuth, The Art of Computer Programming 2, 3.3.2 (serial test; from memory, H): χ² of 4096 cells, mean 4095, standard deviation √8190; four of them
  test.each(sources)(
    '%s: three words in a row fall equally often into 16³ cells, by their highest, middle and lowest bits',
    (_, source) => {
      const draw = source();
      const triples = 100_000;
      const cells = [28, 14, 0].map(() => new Float64Array(4096));
      for (let k = 0; k < triples; k++) {
        const [a, b, c] = [draw(), draw(), draw()];
        for (const [j, shift] of [28, 14, 0].entries())
          cells[j][(((a >>> shift) & 15) << 8) | (((b >>> shift) & 15) << 4) | ((c >>> shift) & 15)]++;
      }
      for (const counts of cells) {
        const chi2 = counts.reduce((sum, count) => sum + (count - triples / 4096) ** 2 / (triples / 4096), 0);
        expect(Math.abs(chi2 - 4095)).toBeLessThan(4 * Math.sqrt(8190));
      }
    },
  );

  // Birthday spacings (G. Marsaglia, A current view of random number generators, 1985; Knuth 3.3.2 J; from memory, H): of 512 birthdays in a year of 2²⁴ days,
  // the spacings that occur again are Poisson distributed with mean 512³/2²⁶ = 2
  test.each(sources)('%s: spacings of birthdays recur as often as chance says', (_, source) => {
    const draw = source();
    for (const shift of [8, 4, 0]) {
      const years = 400;
      let [sum, square] = [0, 0];
      for (let year = 0; year < years; year++) {
        const days = Float64Array.from({ length: 512 }, () => (draw() >>> shift) & 0xffffff).sort();
        const spacings = days.map((day, i) => day - (i === 0 ? 0 : days[i - 1])).sort();
        let again = 0;
        for (let i = 1; i < 512; i++) if (spacings[i] === spacings[i - 1]) again++;
        sum += again;
        square += (again - 2) ** 2;
      }
      // variance of the mean 2/n, of the mean square about the mean (2 + 2·2²)/n
      expect(Math.abs(sum / years - 2)).toBeLessThan(4 * Math.sqrt(2 / years));
      expect(Math.abs(square / years - 2)).toBeLessThan(4 * Math.sqrt(10 / years));
    }
  });

  // Knuth 3.3.2 G, with the length of each run after a number left out: runs up of exactly r occur with the chance 1/r! − 1/(r + 1)!
  test.each(sources)('%s: runs upwards have the lengths of chance', (_, source) => {
    const draw = source();
    const counts = new Float64Array(6);
    let runs = 0;
    for (; runs < 60_000; runs++) {
      let before = draw();
      let length = 1;
      for (let next = draw(); next > before; next = draw()) {
        length++;
        before = next;
      }
      counts[Math.min(length, 6) - 1]++;
    }
    let chi2 = 0;
    for (let r = 1; r <= 6; r++) {
      const chance = r === 6 ? 1 / factorial(6) : 1 / factorial(r) - 1 / factorial(r + 1);
      chi2 += (counts[r - 1] - runs * chance) ** 2 / (runs * chance);
    }
    // five free: mean 5; a chance of 1e-4 beyond 25.7
    expect(chi2).toBeLessThan(25.7);
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
