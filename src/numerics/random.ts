import { exponentialLayers, NORMAL_TAIL, normalLayers } from './random-layers.ts';

const { inside: exponentialInside, width: exponentialWidth } = exponentialLayers;
const { inside: normalInside, width: normalWidth } = normalLayers;

/** Random numbers in streams that are told apart by counters: the same counters give the same numbers, whoever draws them and in whatever order.
 *
 *  The four words of state come from the counter-based generator Philox4x32-10, keyed with the seed; from there the stream runs by xoshiro128++.
 *  Streams of different counters start at states without any relation to each other; that two of them overlap within 2⁴⁰ numbers has a chance of
 *  some 2⁻⁸⁷ a pair.
 *
 *  Sources: J. K. Salmon et al., Parallel random numbers: as easy as 1, 2, 3, SC11, 2011; D. Blackman and S. Vigna, Scrambled linear pseudorandom
 *  number generators, ACM Trans. Math. Softw. 47, 36, 2021; both with their authors' test vectors (from memory, H). */
export class Random {
  // Not #a: code that reads such names is longer, and seven times `word` is then more than the compiler puts in the place of calls in one loop.
  private a = 0;
  private b = 0;
  private c = 0;
  private d = 0;

  /** @param seed     whole number from 0 to 2⁵³ − 1
   *  @param streams  up to four whole numbers below 2³² that tell this stream from others of the same seed */
  constructor(seed: number, streams: readonly number[] = []) {
    this.restart(seed, streams);
  }

  /** Goes to the beginning of a stream: afterwards it is as if made new with the same arguments. */
  restart(seed: number, streams: readonly number[] = []): void {
    if (!Number.isSafeInteger(seed) || seed < 0) throw new Error(`a seed is a whole number from 0 to 2^53 - 1, not ${seed}`);
    if (streams.length > 4) throw new Error('a stream is told apart by four numbers at most');
    const counter = Uint32Array.from({ length: 4 }, (_, i) => streams[i] ?? 0);
    philox(counter, seed >>> 0, Math.floor(seed / 2 ** 32) >>> 0);
    this.start(counter[0], counter[1], counter[2], counter[3]);
  }

  /** Sets the four words of state, not all of them 0. */
  start(a: number, b: number, c: number, d: number): void {
    this.a = a | 0;
    this.b = b | 0;
    this.c = c | 0;
    this.d = d | 0;
    if ((this.a | this.b | this.c | this.d) === 0) this.a = 1; // the one state that it never leaves
  }

  /** 32 random bits as a signed whole number. */
  word(): number {
    const a = this.a;
    const d = this.d;
    const sum = (a + d) | 0;
    const word = (((sum << 7) | (sum >>> 25)) + a) | 0;
    const b = this.b;
    const c = this.c ^ a;
    const e = d ^ b;
    this.b = b ^ c;
    this.a = a ^ e;
    this.c = c ^ (b << 9);
    this.d = (e << 11) | (e >>> 21);
    return word;
  }

  /** Uniform in (0, 1): the middles of 2³² equal parts. */
  uniform(): number {
    return (this.word() >>> 0) * 2 ** -32 + 2 ** -33;
  }

  /** Uniform in (−1, 1). */
  signed(): number {
    return this.word() * 2 ** -31 + 2 ** -32;
  }

  /** Exponentially distributed with mean 1.
   *  Source: G. Marsaglia and W. W. Tsang, The ziggurat method for generating random variables, J. Stat. Softw. 5 (8), 2000; layer and place within it
   *  from different bits. */
  exponential(): number {
    const word = this.word();
    const layer = word & 255;
    const place = word >>> 8;
    const x = place * exponentialWidth[layer];
    return place < exponentialInside[layer] ? x : this.exponentialRest(layer, x);
  }

  /** Normally distributed with mean 0 and variance 1. Source as for {@link Random.exponential}. */
  normal(): number {
    const word = this.word();
    const layer = word & 127;
    const place = word >> 8; // with its sign
    const x = place * normalWidth[layer];
    return Math.abs(place) < normalInside[layer] ? x : this.normalRest(layer, x);
  }

  /** What {@link Random.exponential} does with the one number in 90 that does not lie under the curve for certain. For inner loops that do the rest
   *  themselves: a call that returns a number which is not whole allocates it. */
  exponentialRest(layer: number, x: number): number {
    // beyond the last edge the distribution is the same again
    if (layer === 0) return exponentialLayers.edge + this.exponential();
    const { height } = exponentialLayers;
    const under = height[layer] + this.uniform() * (height[layer - 1] - height[layer]) < Math.exp(-x);
    return under ? x : this.exponential();
  }

  /** As {@link Random.exponentialRest}, of {@link Random.normal}. */
  normalRest(layer: number, x: number): number {
    if (layer === 0) return x < 0 ? -this.#normalTail() : this.#normalTail();
    const { height } = normalLayers;
    const under = height[layer] + this.uniform() * (height[layer - 1] - height[layer]) < Math.exp(-0.5 * x * x);
    return under ? x : this.normal();
  }

  #normalTail(): number {
    for (;;) {
      const x = this.exponential() / NORMAL_TAIL;
      if (2 * this.exponential() > x * x) return NORMAL_TAIL + x;
    }
  }
}

/** Philox4x32-10: replaces the four words of a counter by four random ones. */
export function philox(words: Uint32Array, key0: number, key1: number): void {
  let [k0, k1] = [key0 >>> 0, key1 >>> 0];
  for (let round = 0; round < 10; round++) {
    const [a, b, c, d] = words;
    const high0 = highProduct(0xd2511f53, a);
    const high1 = highProduct(0xcd9e8d57, c);
    words[0] = high1 ^ b ^ k0;
    words[1] = Math.imul(0xcd9e8d57, c);
    words[2] = high0 ^ d ^ k1;
    words[3] = Math.imul(0xd2511f53, a);
    k0 = (k0 + 0x9e3779b9) >>> 0;
    k1 = (k1 + 0xbb67ae85) >>> 0;
  }
}

/** The upper 32 bits of a product of two 32-bit numbers. */
function highProduct(a: number, b: number): number {
  const [a1, a0, b1, b0] = [a >>> 16, a & 0xffff, b >>> 16, b & 0xffff];
  const middle = a1 * b0 + ((a0 * b0) >>> 16);
  const low = a0 * b1 + (middle & 0xffff);
  // sums below 2³³: whole numbers in doubles, so divided and not shifted
  return (a1 * b1 + Math.floor(middle / 0x10000) + Math.floor(low / 0x10000)) >>> 0;
}
