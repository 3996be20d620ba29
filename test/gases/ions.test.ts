/** Ions of the built-in gases: mobility at low field, its limit at high field, diffusion. */
import { describe, expect, it } from 'vitest';
import { curveOf } from '../../src/gases/curves.ts';
import { hotIonEnergy } from '../../src/gases/hot-ions.ts';
import { gases } from '../../src/gases/index.ts';

const LOSCHMIDT = 101325 / (1.380649e-23 * 273.15);
const K0 = (gas: string, td: number, key: 'ionMobility' | 'negativeIonMobility' = 'ionMobility'): number => {
  const coefficient = gases[gas].coefficients[key];
  if (coefficient === null) throw new Error(`${gas} has no ${key}`);
  return curveOf(coefficient.form).valueAt(td * 1e-21) / LOSCHMIDT / 1e-4;
};
const speed = (gas: string, td: number): number => K0(gas, td) * 1e-4 * LOSCHMIDT * td * 1e-21;

describe('ions at low field', () => {
  /* Reduced mobility [cm²/(V s)] at zero field. Read: Hornbeck, Phys. Rev. 84, 615, 1951 (He+ 10.8, Ne+ 4.4, Ar+ 1.63); Oskam and Mittelstadt, Phys. Rev. 132, 1435, 1963 (10.7, 4.1, 1.6); Varney, Phys. Rev. 89, 708, 1953 (O2+ 2.25);
   * Graham et al. 1973 (H3+ 11.1 ± 0.5); Barata and Conde 2010 (He+ 10.54 at 1 Td, calculated). From memory (M): Ellis et al. 1976/78 (He+ 10.4, Ne+ 4.08, Ar+ 1.53, Kr+ 0.90, Xe+ 0.53, N2+ 1.87 to 1.90, O2+ 2.24, O− in O2 3.2, CO2+ 1.09), ± 3 to 5 %.
   * Within the published values, 5 % beyond. */
  it.each([
    ['helium', 10.4, 10.8],
    ['neon', 4.08, 4.4],
    ['argon', 1.53, 1.63],
    ['krypton', 0.9, 0.9],
    ['xenon', 0.53, 0.53],
    ['hydrogen', 10.6, 11.6],
    ['nitrogen', 1.87, 1.9],
    ['oxygen', 2.24, 2.25],
    ['carbon dioxide', 1.09, 1.09],
  ])('have in %s a reduced mobility of %d to %d, within 5 %', (gas, from, to) => {
    expect(K0(gas, 1)).toBeGreaterThan(0.95 * from);
    expect(K0(gas, 1)).toBeLessThan(1.05 * to);
  });

  it('have as O− in oxygen 3.2, within 5 %', () => {
    expect(Math.abs(K0('oxygen', 10, 'negativeIonMobility') / 3.2 - 1)).toBeLessThan(0.05);
  });

  // Polarisation limit K0 = 13.853/√(α m_r) (Langevin; from memory, H), α [Å³] He 0.205, Ne 0.396, Ar 1.64, Kr 2.48, Xe 4.04 (handbook, from memory, H): charge exchange in the parent gas holds an ion below it.
  it.each([
    ['helium', 0.205, 4.0026],
    ['neon', 0.396, 20.18],
    ['argon', 1.64, 39.95],
    ['krypton', 2.48, 83.8],
    ['xenon', 4.04, 131.29],
  ])('are in %s slower than polarisation alone would have them, by 1.5 to 3', (gas, polarisability, mass) => {
    const limit = 13.853 / Math.sqrt((polarisability * mass) / 2);
    expect(limit / K0(gas, 1)).toBeGreaterThan(1.5);
    expect(limit / K0(gas, 1)).toBeLessThan(3);
  });
});

describe('ions in strong fields', () => {
  // Barata and Conde, Nucl. Instrum. Meth. A 619, 2010 (read, a calculation at 293 K): 28.31 m/s at 1 Td, 3685 m/s at 300 Td. 3 %: the fit goes between this calculation and the measured K0 at low field.
  it('drift in helium at 1 and 300 Td as calculated', () => {
    expect(Math.abs(speed('helium', 1) / 28.31 - 1)).toBeLessThan(0.03);
    expect(Math.abs(speed('helium', 300) / 3685 - 1)).toBeLessThan(0.03);
  });

  // Ward 1962 (from memory, H): W(He+) = 8e3 X (1 − 8e-3 X) up to 25 V/(cm Torr), 4.1e4 √X (1 − 27.44/X^1.5) above, cm/s, p at 0 °C. 15 %: at 100 V/(cm Torr) he lies 12 % above Barata and Conde too.
  it.each([5, 10, 25, 50, 100])('drift in helium at %d V/(cm Torr) within 15 % of Ward', (X) => {
    const ward = X <= 25 ? 8e3 * X * (1 - 8e-3 * X) : 4.1e4 * Math.sqrt(X) * (1 - 27.44 / X ** 1.5);
    expect(Math.abs((speed('helium', X * 2.829) * 100) / ward - 1)).toBeLessThan(0.15);
  });

  // Wannier 1953 (from memory, H), resonant charge transfer: W ∝ √(E/N). 2 % in the exponent.
  it.each(['helium', 'neon', 'argon', 'krypton', 'xenon', 'nitrogen', 'oxygen', 'carbon dioxide'])(
    'drift in %s as the square root of the field beyond 5000 Td',
    (gas) => {
      expect(Math.abs(Math.log(speed(gas, 10000) / speed(gas, 5000)) / Math.LN2 - 0.5)).toBeLessThan(0.02);
    },
  );

  /* The same limit gives the cross-section that the drift at 1000 Td implies, Q = 2 e (E/N)/(π M W²). Charge exchange at a few eV: helium about 2.2, neon 2.5, argon 4.5, krypton 6, xenon 8, nitrogen 4, oxygen 4, carbon dioxide
   * 5 (1e-19 m², from memory, L); elastic collisions add up to half as much again. A factor of 1.7 either way. */
  it.each([
    ['helium', 4.0026, 2.2],
    ['neon', 20.18, 2.5],
    ['argon', 39.95, 4.5],
    ['krypton', 83.8, 6],
    ['xenon', 131.29, 8],
    ['nitrogen', 28.01, 4],
    ['oxygen', 32, 4],
    ['carbon dioxide', 44.01, 5],
  ])('imply in %s a charge-exchange cross-section near the known one', (gas, mass, expected) => {
    const Q = (2 * 1.602e-19 * 1e-18) / (Math.PI * mass * 1.6605e-27 * speed(gas, 1000) ** 2);
    expect(Q / (expected * 1e-19)).toBeGreaterThan(1 / 1.7);
    expect(Q / (expected * 1e-19)).toBeLessThan(1.7);
  });
});

describe('diffusion of ions by charge exchange', () => {
  // Ions fall over exponential paths from rest, again and again; drift and growth of the spread by counting 40000 of them at two times. D/μ = (1 − π/4) M W²/e, 0.2146 M W²/e. 4 %: three times what chance leaves.
  it('is that of a renewal process', () => {
    // acceleration 1, mean path 1: a path takes 1.2533 on average
    const times = [40, 120];
    const count = 40000;
    const sums = times.map(() => ({ z: 0, zz: 0 }));
    const random = mulberry(7);
    for (let ion = 0; ion < count; ion++) {
      let t = 0;
      let z = 0;
      let next = 0;
      while (next < times.length) {
        const path = -Math.log(1 - random());
        const time = Math.sqrt(2 * path);
        while (next < times.length && t + time > times[next]) {
          const at = z + (times[next] - t) ** 2 / 2;
          sums[next].z += at;
          sums[next].zz += at * at;
          next++;
        }
        t += time;
        z += path;
      }
    }
    const [early, late] = sums.map(({ z, zz }) => ({ mean: z / count, variance: zz / count - (z / count) ** 2 }));
    const W = (late.mean - early.mean) / 80;
    const D = (late.variance - early.variance) / 160;
    expect(Math.abs(W / Math.sqrt(2 / Math.PI) - 1)).toBeLessThan(0.005);
    // with e E/M = 1, D/μ in units of M W²/e is D/W³
    expect(Math.abs(D / W ** 3 / (1 - Math.PI / 4) - 1)).toBeLessThan(0.04);
  });

  it('adds to kT/e what the drift brings: argon of 1500 m/s 0.20 V', () => {
    const { form } = hotIonEnergy({ kind: 'constant', value: 1500 / 1e-18 }, 39.948);
    const expected = 0.02526 + (1 - Math.PI / 4) * ((39.948 * 1.66053907e-27 * 1500 ** 2) / 1.602176634e-19);
    expect(expected).toBeCloseTo(0.225, 3);
    expect(Math.abs(curveOf(form).valueAt(1e-18) / expected - 1)).toBeLessThan(2e-3);
  });
});

/** 32-bit generator of uniform numbers in [0, 1), seeded: the same every time */
function mulberry(seed: number): () => number {
  let a = seed;
  return () => {
    a = (a + 0x6d2b79f5) | 0;
    let t = Math.imul(a ^ (a >>> 15), 1 | a);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}
