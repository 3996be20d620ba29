/** Yields of cathodes: laws of the ion's energy, averages over a cathode's ions, potential emission, and the rows of the built-in materials. */
import { describe, expect, it } from 'vitest';
import { gases } from '../../src/gases/index.ts';
import { argonAtomYields, argonIonYields } from '../../src/surfaces/argon-yields.ts';
import { cleanYieldFor, surfaceIn, surfaces, yieldFor, yieldInMixture, yieldLawFor } from '../../src/surfaces/index.ts';
import { potentialEmission } from '../../src/surfaces/potential-emission.ts';
import {
  meanImpactEnergy,
  meanYield,
  type YieldData,
  type YieldTerm,
  yieldAt,
  yieldAtEnergy,
  yieldCurve,
} from '../../src/surfaces/yield-law.ts';
import { minimum } from '../gases/townsend.ts';

const Td = 1e-21;
const termsOf = (data: YieldData): readonly YieldTerm[] => {
  if (data.law.kind !== 'ion-energy') throw new Error('not a law of the energy');
  return data.law.terms;
};

describe('yields of argon against energy', () => {
  // Phelps and Petrović, Plasma Sources Sci. Technol. 8, R21, 1999, appendix; formulas from memory (H), values computed from them, to the figures given
  it.each([
    [10, 0.0168],
    [30, 0.03],
    [100, 0.032],
    [200, 0.0547],
    [500, 0.16],
    [1000, 0.373],
  ])('ions of %d eV on technical metal', (energy, value) => {
    expect(Math.abs(yieldAtEnergy(termsOf(argonIonYields.technical), energy) / value - 1)).toBeLessThan(4e-3);
  });
  it.each([
    [1, 0.07],
    [499, 0.07],
    [1000, 0.0865],
    [10000, 0.542],
  ])('ions of %d eV on clean metal', (energy, value) => {
    expect(Math.abs(yieldAtEnergy(termsOf(argonIonYields.clean), energy) / value - 1)).toBeLessThan(2e-3);
  });
  it.each([
    [31, 0],
    [100, 0.0126],
    [1000, 0.561],
  ])('atoms of %d eV on technical metal', (energy, value) => {
    expect(Math.abs(yieldAtEnergy(argonAtomYields.technical, energy) - value)).toBeLessThan(5e-3 * value + 1e-12);
    expect(yieldAtEnergy(argonAtomYields.clean, Math.min(energy, 500))).toBe(0);
  });
});

describe('the yield averaged over arriving ions', () => {
  const plain = { scale: Number.POSITIVE_INFINITY, fall: 1 };
  // exact: ∫ u^n e^{−u} du = Γ(n + 1); above a threshold c: ε̄^n Γ(n + 1) e^{−c/ε̄}
  it.each([
    [0, 0, 1],
    [1, 0, 1],
    [2, 0, 2],
    [1, 30, 1],
    [1.2, 80, 1.1018024908797],
  ])('is exact for (ε − c)^%d above c = %d eV', (power, from, gamma) => {
    for (const mean of [5, 20, 200]) {
      const exact = gamma * mean ** power * Math.exp(-from / mean);
      expect(Math.abs(meanYield([{ factor: 1, from, power, ...plain }], mean) / exact - 1)).toBeLessThan(2e-4);
    }
  });

  it('belongs to ions of the mean energy e E/(N Q)', () => {
    expect(meanImpactEnergy(1000 * Td, 4e-19)).toBeCloseTo(2.5, 12);
  });

  it('is a smooth curve of E/N: finite, not negative, rising for argon, with the slope its differences show', () => {
    for (const data of Object.values(argonIonYields)) {
      const curve = yieldCurve(data.law);
      let last = 0;
      for (let x = 0; x <= 5000; x++) {
        const y = curve.valueAt(x * Td);
        if (!(Number.isFinite(y) && y >= last * (1 - 1e-6) && y < 1)) expect.fail(`${y} at ${x} Td`);
        last = y;
      }
      expect(curve.valueAt(1e5 * Td)).toBeLessThan(1);
      for (const td of [3, 50, 700, 4000]) {
        const h = 1e-5 * td * Td;
        const slope = (curve.valueAt(td * Td + h) - curve.valueAt(td * Td - h)) / (2 * h);
        expect(Math.abs(curve.slopeAt(td * Td) - slope)).toBeLessThan(1e-4 * Math.abs(slope) + 1e-6 * (curve.valueAt(td * Td) / (td * Td)));
      }
    }
  });

  it('follows between the rows of its table what is averaged directly, within 1e-3', () => {
    const { law } = argonIonYields.technical;
    const curve = yieldCurve(law);
    for (const td of [33, 170, 540, 1234, 7000]) {
      expect(
        Math.abs(curve.valueAt(td * Td) / meanYield(termsOf(argonIonYields.technical), meanImpactEnergy(td * Td, 4e-19)) - 1),
      ).toBeLessThan(1e-3);
    }
  });

  it('may also be a number or a function of E/N', () => {
    expect(yieldCurve({ kind: 'constant', value: 0.02 }).valueAt(1e-19)).toBe(0.02);
    const form = { kind: 'table', law: 'plain', x: [1e-19, 1e-18], y: [0.01, 0.03] } as const;
    expect(yieldCurve({ kind: 'reduced-field', form }).valueAt(Math.sqrt(1e-37))).toBeCloseTo(0.02, 12);
    expect(yieldCurve({ kind: 'reduced-field', form }).valueAt(0)).toBe(0.01);
  });

  // von Engel, Ionized Gases, 1965 (from memory, M): argon on iron 265 V at 1.5 Torr cm. The law comes from beams and discharges on other metals, nothing was fitted. 15 % in V: the law carries 50 %, which moves V by 8 %, α 11 %. pd 30 %:
  // a flat minimum, and photons, which matter more at low fields, are not in it.
  it('gives for argon on technical metal the published minimum on iron', () => {
    const law = yieldLawFor('iron', 'argon', 'technical');
    const curve = yieldCurve(law?.law ?? { kind: 'constant', value: Number.NaN });
    const { voltage, pd } = minimum('argon', undefined, (x) => curve.valueAt(x));
    expect(Math.abs(voltage / 265 - 1)).toBeLessThan(0.15);
    expect(Math.abs(pd / 1.5 - 1)).toBeLessThan(0.3);
  });
});

describe('potential emission', () => {
  // values by arithmetic from 0.032 (0.78 E_i − 2 φ), φ 4.5 eV
  it.each([
    [15.76, 0.105],
    [24.59, 0.326],
    [15.58, 0.101],
  ])('of ions of %d eV on a metal of 4.5 eV', (energy, value) => {
    expect(Math.abs(potentialEmission(energy, 4.5) - value)).toBeLessThan(6e-4);
  });

  it('is nothing where the ion brings less than it takes', () => {
    expect(potentialEmission(11, 4.5)).toBe(0);
  });

  // Hagstrum, Phys. Rev. 96, 325 and 104, 317, 1954/56 (from memory, H): tungsten. 25 %: what the formula is good for; xenon, a small difference, aside
  it.each([
    [24.59, 0.29],
    [21.56, 0.21],
    [15.76, 0.095],
    [14.0, 0.05],
  ])('of ions of %d eV on tungsten is within 25 % of the measured %d', (energy, measured) => {
    expect(Math.abs(potentialEmission(energy, 4.565) / measured - 1)).toBeLessThan(0.25);
  });
});

describe('built-in materials', () => {
  it('are the metals of electrodes, stainless steel and graphite, each with a work function except the unspecified one', () => {
    expect(Object.keys(surfaces).sort()).toEqual(
      ['aluminium', 'copper', 'gold', 'graphite', 'iron', 'metal', 'molybdenum', 'nickel', 'silver', 'stainless steel', 'tungsten'].sort(),
    );
    for (const s of Object.values(surfaces)) expect(s.workFunction === null, s.name).toBe(s.name === 'metal');
  });

  it('have a row with its spread for every built-in gas', () => {
    for (const s of Object.values(surfaces)) {
      for (const gas of Object.keys(gases)) {
        const y = yieldFor(s.name, gas)?.ionYield;
        expect(y, `${s.name} in ${gas}`).not.toBe(s.yields.any);
        expect(y?.low, gas).toBeLessThan(y?.typical ?? 0);
        expect(y?.high, gas).toBeGreaterThan(y?.typical ?? 1);
        expect(y?.source.length, gas).toBeGreaterThan(40);
      }
    }
  });

  it('never have a low end above what the clean metal yields', () => {
    for (const s of Object.values(surfaces)) {
      for (const gas of ['helium', 'neon', 'argon', 'krypton', 'xenon', 'nitrogen', 'oxygen', 'carbon dioxide']) {
        const clean = cleanYieldFor(s.name, gas);
        if (clean === null) continue;
        expect(yieldFor(s.name, gas)?.ionYield.low, `${s.name} in ${gas}`).toBeLessThan(clean.high);
        expect(clean.low).toBeLessThan(clean.typical);
        expect(clean.high).toBeGreaterThan(clean.typical);
      }
    }
  });

  // Hagstrum 1954/56 (from memory, H and M)
  it('have as clean tungsten and molybdenum the measured yields', () => {
    expect(cleanYieldFor('tungsten', 'helium')?.typical).toBe(0.29);
    expect(cleanYieldFor('molybdenum', 'argon')?.typical).toBe(0.12);
  });

  it('say nothing where nothing is known', () => {
    expect(cleanYieldFor('metal', 'argon')).toBeNull();
    expect(cleanYieldFor('nickel', 'hydrogen')).toBeNull();
    expect(cleanYieldFor('gold', 'oxygen')).toBeNull(); // 0.0003 by the formula: a small difference of large numbers
    expect(cleanYieldFor('unobtainium', 'argon')).toBeNull();
    expect(cleanYieldFor('constructor', 'argon')).toBeNull();
    expect(cleanYieldFor('tungsten', 'toString')).toBeNull();
    expect(yieldLawFor('iron', 'helium', 'clean')).toBeNull();
    expect(yieldLawFor('graphite', 'argon', 'clean')).toBeNull();
    expect(yieldLawFor('constructor', 'argon', 'clean')).toBeNull();
    expect(yieldLawFor('iron', 'argon', 'clean')).toBe(argonIonYields.clean);
  });

  // Depla et al. 2009 (from memory, M): Ar+ on sputter-target metals 0.08 to 0.16. 10 % beyond
  it('yield for argon on the clean metal what sputter targets do', () => {
    for (const metal of ['nickel', 'copper', 'aluminium', 'molybdenum', 'tungsten', 'iron', 'gold', 'silver']) {
      expect(cleanYieldFor(metal, 'argon')?.typical, metal).toBeGreaterThan(0.9 * 0.08);
      expect(cleanYieldFor(metal, 'argon')?.typical, metal).toBeLessThan(1.1 * 0.16);
    }
  });

  // Normal cathode falls (Cobine 1941; von Engel 1965; Raizer 1991; from memory, M) turned into yields by the relation of von Engel and Steenbeck, V_n = 3.017 (B/A) ln(1 + 1/γ) (computed), with B/A of hydrogen 28.3, oxygen 20.6, carbon
  // dioxide 23.3 V. A model of the fall, so only the spread is tested.
  it.each([
    ['hydrogen', 136 / 4.8, { aluminium: 170, silver: 216, gold: 247, graphite: 240, copper: 214, iron: 250, nickel: 211 }],
    ['oxygen', 20.6, { aluminium: 311, iron: 290 }],
    ['carbon dioxide', 466 / 20, { graphite: 526, copper: 460 }],
  ])('have in %s spreads around the yields from normal cathode falls', (gas, ratio, falls) => {
    for (const [material, V] of Object.entries(falls)) {
      const gamma = 1 / Math.expm1(V / (3.017 * ratio));
      const y = yieldFor(material, gas)?.ionYield;
      expect(gamma, material).toBeGreaterThan(y?.low ?? Number.NaN);
      expect(gamma, material).toBeLessThan(y?.high ?? Number.NaN);
    }
  });
});

describe('a material in a mixture of gases', () => {
  const row = (gas: string): NonNullable<ReturnType<typeof yieldFor>>['ionYield'] => {
    const surface = yieldFor('nickel', gas);
    if (surface === null) throw new Error(gas);
    return surface.ionYield;
  };

  it('has the largest of the yields, so that V_s errs low, and the widest spread', () => {
    for (const pair of [
      ['argon', 'nitrogen'],
      ['oxygen', 'helium', 'neon'],
    ]) {
      const made = yieldInMixture('nickel', pair)?.ionYield;
      const rows = pair.map(row);
      expect(made?.typical).toBe(Math.max(...rows.map((r) => r.typical)));
      expect(made?.low).toBe(Math.min(...rows.map((r) => r.low)));
      expect(made?.high).toBe(Math.max(...rows.map((r) => r.high)));
      expect(yieldInMixture('nickel', pair.toReversed())).toEqual(yieldInMixture('nickel', pair));
    }
  });

  it('has the yield of the gas where there is one gas only, and none where the material is unknown', () => {
    expect(yieldInMixture('nickel', ['argon'])).toEqual(yieldFor('nickel', 'argon'));
    expect(yieldInMixture('unobtainium', ['argon', 'neon'])).toBeNull();
  });
});

describe('a surface in a stated condition', () => {
  it('follows the law of its gas, with the uncertainty as its spread', () => {
    const surface = surfaceIn('iron', 'argon', 'technical');
    expect(surface).toMatchObject({ material: 'iron', condition: 'technical', workFunction: 4.17 });
    expect(surface?.ionYield).toMatchObject({ typical: 1, low: 1 / 1.5, high: 1.5, law: argonIonYields.technical.law });
    // the figure that stands in the note of the law
    if (surface !== null) expect(yieldAt(surface.ionYield, 540 * Td)).toBeCloseTo(0.0026, 4);
  });

  it('is that of slow ions on clean metal in other gases, and unknown elsewhere', () => {
    expect(surfaceIn('tungsten', 'neon', 'clean')?.ionYield).toEqual(cleanYieldFor('tungsten', 'neon'));
    expect(surfaceIn('tungsten', 'neon', 'technical')).toBeNull();
    expect(surfaceIn('graphite', 'argon', 'technical')).toBeNull();
    expect(surfaceIn('unobtainium', 'argon', 'clean')).toBeNull();
  });
});
