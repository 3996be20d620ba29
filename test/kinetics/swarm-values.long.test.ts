/** Swarms against published values, exact relations and themselves. Bounds are five standard errors, or what is said; seeds are fixed. */
import { describe, expect, test } from 'vitest';
import { argon } from '../../src/kinetics/argon.ts';
import { ATOMIC_MASS, type CrossSectionSet, ELECTRON_MASS, SPEED_OF_1_EV } from '../../src/kinetics/cross-sections.ts';
import { helium } from '../../src/kinetics/helium.ts';
import { lucasSaelee, reidRamp } from '../../src/kinetics/model-gases.ts';
import { jackknife, type Measured } from '../../src/kinetics/statistics.ts';
import { batchOf, combine, pilotOf, type SwarmPoint, swarmGas } from '../../src/kinetics/swarm.ts';
import { BOLTZMANN, ELEMENTARY_CHARGE } from '../../src/units/constants.ts';
import { swarm as twoTerm } from '../gases/two-term.ts';

/** a point of `batches` batches */
function pointOf(set: CrossSectionSet, td: number, temperature: number, batches: number, flights = 6e5): SwarmPoint {
  const gas = swarmGas(set, temperature, 'isotropic');
  const field = td * 1e-21;
  const plan = pilotOf(gas, field, 1, 0, flights);
  if (plan.kind !== 'plan') throw new Error(plan.kind);
  const sums = Array.from({ length: batches }, (_, batch) => batchOf(gas, field, plan, 1, 0, batch));
  return combine(
    gas,
    field,
    plan,
    sums.map((batch) => {
      if (batch === null) throw new Error('interrupted');
      return batch;
    }),
  );
}

/** within `sigmas` errors and a share of the value expected */
function expectNear(measured: Measured, expected: number, sigmas: number, share: number): void {
  expect(measured.error).toBeGreaterThan(0);
  expect(Math.abs(measured.value - expected)).toBeLessThan(sigmas * measured.error + share * Math.abs(expected));
}

function expectEqual(one: Measured, other: Measured): void {
  expect(Math.abs(one.value - other.value)).toBeLessThan(5 * Math.hypot(one.error, other.error));
}

/** of a cross-section, for two terms of the Boltzmann equation */
function rowsOf(crossSection: (e: number) => number): (readonly [number, number])[] {
  return Array.from({ length: 400 }, (_, i) => 1e-3 * 10 ** (i / 80))
    .map((e) => [e, crossSection(e) * 1e20] as const)
    .filter(([, q]) => q > 0);
}

describe("Reid's ramp model gas", () => {
  // I. D. Reid, Aust. J. Phys. 32, 231, 1979 (from memory, M; an independent Monte Carlo program agrees within 0.3 %): 0.3 % and three errors
  test('at 12 Td has the published energy, drift and diffusion', () => {
    const point = pointOf(reidRamp, 12, 0, 12, 1e6);
    expectNear(point.meanEnergy, 0.269, 3, 0.003);
    expectNear(point.fluxDrift, 6.837e4, 3, 0.003);
    expectNear(point.transverseDiffusion, 1.137e24, 3, 0.003);
    expectNear(point.longitudinalDiffusion, 5.7e23, 3, 0.003);
    expect(point.meanEnergy.error).toBeLessThan(0.001 * point.meanEnergy.value);
    expect(point.longitudinalDiffusion.error).toBeLessThan(0.01 * point.longitudinalDiffusion.value);
    // nothing is made or lost: flux and bulk are the same, and there is no α
    expectEqual(point.fluxDrift, point.bulkDrift);
    expect(point.ionisation.value).toBe(0);
    expectNear(point.energyBalance, 1, 5, 0);
    expect(point.energyBalance.error).toBeLessThan(1e-3);
  });
});

describe("Lucas and Saelee's model gas at 10 Td", () => {
  // Exact: elastic collisions take the same share of momentum whatever the speed, so that without inelastic ones W = eE/(μν); the few inelastic ones
  // lower it a little. Energy: work = losses.
  const nu = 4e-20 * SPEED_OF_1_EV * (1000 / 1001);
  const elasticDrift = (ELEMENTARY_CHARGE * 10e-21) / (ELECTRON_MASS * nu);

  test('without ionisation drifts a little slower than by elastic collisions alone, and balances its energy', () => {
    const point = pointOf(lucasSaelee(0), 10, 0, 8);
    expect(point.fluxDrift.value).toBeLessThan(elasticDrift * 1.01);
    expect(point.fluxDrift.value).toBeGreaterThan(elasticDrift * 0.96);
    expectEqual(point.fluxDrift, point.bulkDrift);
    expectNear(point.energyBalance, 1, 5, 1e-3);
    // mean energy 5.57 eV, Lucas and Saelee, J. Phys. D 8, 640, 1975, as recomputed by others since (from memory, L): 1 %
    expectNear(point.meanEnergy, 5.57, 3, 0.01);
    // and by two terms of the Boltzmann equation, which with so few inelastic collisions are good to 1 %
    const set = lucasSaelee(0);
    const two = twoTerm(
      {
        mass: set.mass / ATOMIC_MASS,
        momentum: rowsOf((e) => set.processes[0].crossSection(e) + set.processes[1].crossSection(e)),
        losses: [{ threshold: 15.6, rows: rowsOf(set.processes[1].crossSection) }],
        // none
        ionisation: { threshold: 1e5, rows: [[1e5, 1e-9]] },
      },
      10,
      80,
      400,
    );
    expectNear(point.meanEnergy, two.mean, 3, 0.01);
    expectNear(point.fluxDrift, two.mobility * 10e-21, 3, 0.01);
  });

  test('with ionisation is colder, its bulk drifts faster than its flux, and growth, drift and diffusion belong together', () => {
    const point = pointOf(lucasSaelee(1), 10, 0, 12, 1.2e6);
    // mean energy 4.95 eV (from memory, L): 1 %
    expectNear(point.meanEnergy, 4.95, 3, 0.01);
    expect(point.bulkDrift.value).toBeGreaterThan(1.2 * point.fluxDrift.value);
    // a steady stream is the growing pulse seen from one place: k N = α W − α² D_L + …, the next terms small (A. M. Tagashira and others, J. Phys. D 10,
    // 1051, 1977; from memory, M)
    const alpha = point.ionisation.value;
    const growth = alpha * point.bulkDrift.value - alpha * alpha * point.longitudinalDiffusion.value;
    const error = Math.hypot(
      point.ionisation.error * point.bulkDrift.value,
      alpha * point.bulkDrift.error,
      alpha * alpha * point.longitudinalDiffusion.error,
      point.ionisationRate.error,
    );
    expect(Math.abs(growth - point.ionisationRate.value)).toBeLessThan(5 * error + 0.01 * growth);
    expectNear(point.energyBalance, 1, 5, 1e-3);
  });
});

describe('argon', () => {
  // α/N by the fit to measurements of Phelps and Petrović, Plasma Sources Sci. Technol. 8, R21, 1999 (from memory, H), itself good to some 10 %
  const published = (td: number): number =>
    1.1e-22 * Math.exp(-72 / td) + 5.5e-21 * Math.exp(-187 / td) + 3.2e-20 * Math.exp(-700 / td) - 1.5e-20 * Math.exp(-10000 / td);

  test.each([200, 1000])('at %d Td makes as many ions per length as measured, within 10 %', (td) => {
    const point = pointOf(argon, td, 293.15, 8);
    expectNear(point.ionisation, published(td), 3, 0.1);
    expect(point.ionisation.error).toBeLessThan(0.02 * point.ionisation.value);
    expectNear(point.energyBalance, 1, 5, 1e-3);
  });

  test('at 1000 Td its bulk drifts 47 % faster than its flux, as an independent program found', () => {
    const point = pointOf(argon, 1000, 293.15, 6);
    expect(Math.abs(point.bulkDrift.value / point.fluxDrift.value / 1.47 - 1)).toBeLessThan(0.015);
    expect(point.aboveRange).toBe(0);
  });

  test('at 150 Td agrees with two terms of the Boltzmann equation in energy within 3 % and in drift within 5 %', () => {
    const [elastic, excitation, ionisation] = argon.processes;
    const target = {
      mass: 39.948,
      momentum: rowsOf((e) => elastic.crossSection(e) + excitation.crossSection(e) + ionisation.crossSection(e)),
      losses: [{ threshold: 11.5, rows: rowsOf(excitation.crossSection) }],
      ionisation: { threshold: 15.8, rows: rowsOf(ionisation.crossSection) },
    };
    const two = twoTerm(target, 150, 40, 240);
    const point = pointOf(argon, 150, 293.15, 8, 1e6);
    expectNear(point.meanEnergy, two.mean, 3, 0.03);
    expectNear(point.fluxDrift, two.mobility * 150e-21, 3, 0.05);
  });
});

describe('helium', () => {
  // Ward, J. Appl. Phys. 33, 2789, 1962 (from memory, H; pressure at 0 °C): α/p = 4.4 exp(−14/√(E/p)); 25 % for cross-sections recollected to 20 %
  test('at 200 Td makes about as many ions per length as measured', () => {
    const perTorr = 200 / 2.829;
    const ward = (4.4 * Math.exp(-14 / Math.sqrt(perTorr)) * 1e-4) / 3.535e16;
    expectNear(pointOf(helium, 200, 293.15, 6).ionisation, ward, 3, 0.25);
  });
});

describe('a constant collision frequency', () => {
  // Exact. With a = m/(m + M), b = M/(m + M) a collision leaves a² ⟨vᵢvⱼ⟩ + δᵢⱼ b² (2 kT/M + ⟨v²⟩/3) of the mean ⟨vᵢvⱼ⟩, and b is the share of momentum it
  // takes. So W = eE/(mνb), ⟨v²⟩ = 3kT/m + W²/a, (1 − a²) ⟨v_T²⟩ = b² (2 kT/M + ⟨v²⟩/3), ⟨v_L²⟩ = ⟨v²⟩ − 2 ⟨v_T²⟩; and as what is left of any velocity falls
  // as e^(−bνt), D_T = ⟨v_T²⟩/(bν), D_L = (⟨v_L²⟩ − W²)/(bν). Derived here; mean energy and drift as G. H. Wannier, Bell Syst. Tech. J. 32, 170, 1953, has them.
  // Molecules of four electron masses, which make D_L 1.6 times D_T in a cold gas.
  test.each([
    [4, 10, 0],
    [4, 10, 1000],
    [25, 20, 300],
  ])('gives exact energy, drift and diffusion: %d electron masses, %d Td, %d K', (masses, td, T) => {
    const M = masses * ELECTRON_MASS;
    const set: CrossSectionSet = {
      ...reidRamp,
      mass: M,
      processes: [{ kind: 'elastic', name: 'elastic', threshold: 0, crossSection: (e) => 1e-19 / Math.sqrt(e) }],
    };
    const [a, b] = [1 / (1 + masses), masses / (1 + masses)];
    const nu = 1e-19 * SPEED_OF_1_EV;
    const W = (ELEMENTARY_CHARGE * td * 1e-21) / (ELECTRON_MASS * nu * b);
    const kT = BOLTZMANN * T;
    const square = (3 * kT) / ELECTRON_MASS + (W * W) / a;
    const across = (b * b * ((2 * kT) / M + square / 3)) / (1 - a * a);
    const point = pointOf(set, td, T, 16, 1.5e6);
    expectNear(point.fluxDrift, W, 4, 0);
    expectNear(point.bulkDrift, W, 4, 0);
    expectNear(point.meanEnergy, (0.5 * ELECTRON_MASS * square) / ELEMENTARY_CHARGE, 4, 0);
    expectNear(point.transverseDiffusion, across / (b * nu), 4, 0);
    expectNear(point.longitudinalDiffusion, (square - 2 * across - W * W) / (b * nu), 4, 0);
    expect(point.meanEnergy.error).toBeLessThan(0.003 * point.meanEnergy.value);
    for (const { value, error } of [point.transverseDiffusion, point.longitudinalDiffusion]) expect(error).toBeLessThan(0.01 * value);
  });
});

describe('attachment', () => {
  // a rate that does not depend on energy: exact for any distribution, and the mean energy is that without it
  test('at a constant rate comes out exactly, and changes neither energy nor drift', () => {
    const base: CrossSectionSet = {
      ...reidRamp,
      mass: 100 * ELECTRON_MASS,
      processes: [{ kind: 'elastic', name: 'elastic', threshold: 0, crossSection: (e) => 1e-19 / Math.sqrt(e) }],
    };
    const rate = 1e-22 * SPEED_OF_1_EV;
    const attaching: CrossSectionSet = {
      ...base,
      processes: [...base.processes, { kind: 'attachment', name: 'attachment', threshold: 0, crossSection: (e) => 1e-22 / Math.sqrt(e) }],
    };
    const [without, some] = [base, attaching].map((set) => pointOf(set, 5, 300, 12));
    expectNear(some.attachmentRate, rate, 5, 0);
    expectEqual(some.meanEnergy, without.meanEnergy);
    expectEqual(some.fluxDrift, without.fluxDrift);
    expectEqual(some.bulkDrift, without.bulkDrift);
    // per length of a steady stream: η = k N/W + η² D_L/W with a sign: fewer ahead, so −η W − η² D = −k N
    const eta = some.attachment.value;
    const loss = eta * some.bulkDrift.value + eta * eta * some.longitudinalDiffusion.value;
    expect(Math.abs(loss / rate - 1)).toBeLessThan(5 * (some.attachment.error / eta));
    expect(some.attachment.error).toBeLessThan(0.03 * eta);
    // Wannier's mean energy, as in flights.test.ts
    const energy = (1.5 * BOLTZMANN * 300 + 0.5 * 101 * ELECTRON_MASS * without.fluxDrift.value ** 2) / ELEMENTARY_CHARGE;
    expectNear(without.meanEnergy, energy, 5, 2 * (without.fluxDrift.error / without.fluxDrift.value));
    // and exact diffusion: D = kT_eff/(μν), kT_eff = kT + M W²/3, but for terms of the order m/M
    const nu = 1e-19 * SPEED_OF_1_EV * (100 / 101);
    const spread = (BOLTZMANN * 300 + (100 * ELECTRON_MASS * without.fluxDrift.value ** 2) / 3) / (ELECTRON_MASS * nu);
    expectNear(without.transverseDiffusion, spread, 5, 0.02);
    expectNear(without.longitudinalDiffusion, spread, 5, 0.02);
  });
});

describe('points', () => {
  const gas = swarmGas(argon, 0, 'isotropic');
  const field = 300e-21;

  test('are the same whatever the order of their batches, and other batches and seeds give other numbers', () => {
    const plan = pilotOf(gas, field, 1, 0, 5e4);
    if (plan.kind !== 'plan') throw new Error(plan.kind);
    const of = (batch: number, seed = 1): Float64Array | null => batchOf(gas, field, plan, seed, 0, batch);
    const forwards = [of(0), of(1), of(2)];
    const backwards = [of(2), of(1), of(0)].reverse();
    expect(backwards).toEqual(forwards);
    expect(of(1)).not.toEqual(of(0));
    expect(of(0, 2)).not.toEqual(of(0));
    expect(batchOf(gas, field, plan, 1, 1, 0)).not.toEqual(of(0));
  });

  test('are told to be hopeless where electrons gain more than they lose', () => {
    // Coulomb-like: the friction falls with energy
    const thin: CrossSectionSet = {
      ...argon,
      mass: 4 * ATOMIC_MASS,
      processes: [{ kind: 'elastic', name: 'elastic', threshold: 0, crossSection: (e) => 1e-20 / (1 + e * e) }],
    };
    expect(pilotOf(swarmGas(thin, 0, 'isotropic'), 1000e-21, 1, 0, 1e5).kind).toBe('runaway');
  });

  test('say when they are interrupted', () => {
    const plan = pilotOf(gas, field, 1, 0, 5e4);
    if (plan.kind !== 'plan') throw new Error(plan.kind);
    expect(batchOf(gas, field, plan, 1, 0, 0, () => true)).toBeNull();
  });
});

describe('errors', () => {
  test('of a mean are its standard error, and of a ratio what propagation says', () => {
    const batches = Array.from({ length: 40 }, (_, i) => Float64Array.of(3 + Math.sin(7 * i), 2 + 0.1 * Math.cos(5 * i)));
    const values = batches.map(([x]) => x);
    const mean = values.reduce((a, b) => a + b, 0) / 40;
    const error = Math.sqrt(values.reduce((sum, x) => sum + (x - mean) ** 2, 0) / 39 / 40);
    const measured = jackknife(batches, (s) => s[0] / 40);
    expect(measured.value).toBeCloseTo(mean, 12);
    // leaving out one of 40 from a sum over 40 counts
    expect(
      jackknife(
        batches.map(([x]) => Float64Array.of(x, 1)),
        (s) => s[0] / s[1],
      ).error,
    ).toBeCloseTo(error, 12);
    expect(() => jackknife(batches.slice(1, 2), (s) => s[0])).toThrow(/two batches/);
  });
});
