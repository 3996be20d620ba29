/** The engine against exact results: no collisions, thermal equilibrium, electrons that lose nothing, cells. */
import { describe, expect, test } from 'vitest';
import { argon } from '../../src/kinetics/argon.ts';
import { collisionTable } from '../../src/kinetics/collision-table.ts';
import { ATOMIC_MASS, type CrossSectionSet, ELECTRON_MASS, SPEED_OF_1_EV } from '../../src/kinetics/cross-sections.ts';
import { Electrons } from '../../src/kinetics/electrons.ts';
import { clearTally, Flights, type ForceField, uniformForce } from '../../src/kinetics/flights.ts';
import { Random } from '../../src/numerics/random.ts';
import { BOLTZMANN, ELEMENTARY_CHARGE } from '../../src/units/constants.ts';

const density = 3.2e22;

/** a gas of one elastic process */
function elasticGas(mass: number, crossSection: (e: number) => number): CrossSectionSet {
  return { ...argon, name: 'elastic', mass, processes: [{ kind: 'elastic', name: 'elastic', threshold: 0, crossSection }] };
}

function electronsOf(count: number, energy: number, random: Random): Electrons {
  const electrons = new Electrons(2 * count);
  for (let k = 0; k < count; k++) {
    const i = electrons.add(1);
    const cosine = random.signed();
    electrons.ux[i] = Math.sqrt(energy) * cosine;
    electrons.uy[i] = Math.sqrt(energy * (1 - cosine * cosine));
  }
  return electrons;
}

const energyOf = ({ ux, uy, uz }: Electrons, i: number): number => ux[i] ** 2 + uy[i] ** 2 + uz[i] ** 2;

/** parts in which energies and directions are counted */
const PARTS = 60;

/** Share of a Maxwellian below x kT: the incomplete gamma function P(3/2, x) by its series (Abramowitz and Stegun, Handbook of Mathematical Functions, 1964,
 *  6.5.29). */
function maxwellShare(x: number): number {
  let term = (x ** 1.5 * Math.exp(-x)) / (0.75 * Math.sqrt(Math.PI));
  let sum = 0;
  for (let a = 2.5; a < 100; a++) {
    sum += term;
    term *= x / a;
  }
  return Math.min(sum, 1 - 1e-12);
}

describe('thermal equilibrium without a field', () => {
  const T = 1000;
  const kT = (BOLTZMANN * T) / ELEMENTARY_CHARGE;

  // Maxwell: the mean of ε is 3/2 kT with variance 3/2 (kT)², that of ε² is 15/4 (kT)² with variance (945/16 − 225/16)(kT)⁴. A light molecule, so that it is reached soon.
  test.each([
    ['a constant cross-section', () => 1e-19],
    ['a constant collision frequency', (e: number) => 1e-19 / Math.sqrt(e)],
    ['one that rises with energy', (e: number) => 1e-18 * e],
  ])('is reached with %s, from far above', (_, crossSection) => {
    const random = new Random(3, [1]);
    const table = collisionTable(elasticGas(40 * ELECTRON_MASS, crossSection), { density, temperature: T }, 'isotropic');
    const engine = new Flights(table, uniformForce(0), random);
    const n = 1500;
    const electrons = electronsOf(n, 5 * kT, random);
    let time = 0;
    let samples = 0;
    let [first, second] = [0, 0];
    const [energies, cosines] = [new Float64Array(PARTS), new Float64Array(PARTS)];
    // 30 collisions are one time constant of cooling, 80 between samples leave them hardly correlated
    const collision = 1 / (density * crossSection(1.5 * kT) * SPEED_OF_1_EV * Math.sqrt(1.5 * kT));
    for (let k = 0; k < 12; k++) {
      time += (k === 0 ? 400 : 80) * collision;
      engine.run(electrons, time);
      for (let i = 0; i < n; i++) {
        first += energyOf(electrons, i) / kT;
        second += (energyOf(electrons, i) / kT) ** 2;
        energies[Math.floor(PARTS * maxwellShare(energyOf(electrons, i) / kT))]++;
        cosines[Math.floor((PARTS / 2) * (1 + electrons.ux[i] / Math.sqrt(energyOf(electrons, i))))]++;
      }
      samples += n;
    }
    expect(Math.abs(first / samples - 1.5)).toBeLessThan(5 * Math.sqrt(1.5 / samples));
    expect(Math.abs(second / samples - 3.75)).toBeLessThan(5 * Math.sqrt(45 / samples));
    // in detail: energies by their law and every direction as often; χ² of equally likely parts, mean PARTS − 1 with variance 2 (PARTS − 1)
    for (const [what, counts] of Object.entries({ energies, cosines })) {
      const each = samples / PARTS;
      const chi2 = counts.reduce((sum, count) => sum + (count - each) ** 2 / each, 0);
      expect(Math.abs(chi2 - (PARTS - 1)), what).toBeLessThan(4 * Math.sqrt(2 * (PARTS - 1)));
    }
  });
});

describe('a constant collision frequency', () => {
  // exact for any distribution (G. H. Wannier, Bell Syst. Tech. J. 32, 170, 1953; from memory, H): W = eE/(μν) with the reduced mass μ, since a collision
  // takes the share M/(m + M) of the momentum; mean energy 3/2 kT + (m + M) W²/2
  test.each([
    [1, 0],
    [1, 300],
    [3, 300],
  ])('gives the exact drift velocity and mean energy at %d Td and %d K', (td, T) => {
    const random = new Random(4, [1]);
    const mass = 300 * ELECTRON_MASS;
    const Q = 1e-19;
    const table = collisionTable(
      elasticGas(mass, (e) => Q / Math.sqrt(e)),
      { density, temperature: T },
      'isotropic',
    );
    const force = td * 1e-21 * density;
    const engine = new Flights(table, uniformForce(force), random);
    const nu = density * Q * SPEED_OF_1_EV;
    const drift = (ELEMENTARY_CHARGE * force) / (ELECTRON_MASS * nu * (mass / (mass + ELECTRON_MASS)));
    const energy = (1.5 * BOLTZMANN * T + 0.5 * (mass + ELECTRON_MASS) * drift * drift) / ELEMENTARY_CHARGE;
    const electrons = electronsOf(600, energy, random);
    const cooling = mass / (2 * ELECTRON_MASS) / nu;
    engine.run(electrons, 6 * cooling);
    const [drifts, energies] = [[] as number[], [] as number[]];
    for (let k = 0; k < 12; k++) {
      clearTally(engine.tally);
      engine.run(electrons, (8 + 2 * k) * cooling);
      drifts.push(engine.tally.way[0] / engine.tally.time[0]);
      energies.push(engine.tally.energy[0] / engine.tally.time[0]);
    }
    for (const [values, exact] of [
      [drifts, drift],
      [energies, energy],
    ] as const) {
      const { mean, error } = meanOf(values);
      expect(Math.abs(mean - exact)).toBeLessThan(5 * error);
      expect(error).toBeLessThan(0.03 * exact);
    }
  });

  test('attachment at a constant rate takes away its share and leaves the mean energy as it is', () => {
    const run = (attach: boolean): { left: number; energy: number; error: number } => {
      const random = new Random(5, [1]);
      const base = elasticGas(100 * ELECTRON_MASS, (e) => 1e-19 / Math.sqrt(e));
      const set: CrossSectionSet = attach
        ? {
            ...base,
            processes: [
              ...base.processes,
              { kind: 'attachment', name: 'attachment', threshold: 0, crossSection: (e) => 1e-22 / Math.sqrt(e) },
            ],
          }
        : base;
      const engine = new Flights(collisionTable(set, { density, temperature: 0 }, 'isotropic'), uniformForce(1e-21 * density), random);
      const electrons = electronsOf(6000, 1, random);
      engine.run(electrons, 1 / (density * 1e-22 * SPEED_OF_1_EV));
      electrons.removeGone();
      const { mean, error } = meanOf(Array.from({ length: electrons.count }, (_, i) => energyOf(electrons, i)));
      return { left: electrons.count, energy: mean, error };
    };
    const [without, some] = [run(false), run(true)];
    expect(without.left).toBe(6000);
    const share = Math.exp(-1);
    expect(Math.abs(some.left / 6000 - share)).toBeLessThan(5 * Math.sqrt((share * (1 - share)) / 6000));
    expect(Math.abs(some.energy - without.energy)).toBeLessThan(5 * Math.hypot(some.error, without.error));
  });
});

describe('energy', () => {
  test.each([
    ['isotropic' as const, 0],
    ['screened-coulomb' as const, 0],
    ['isotropic' as const, 600],
  ])('that the field gives is in the electrons or was taken by collisions, to rounding: %s, %d K', (angular, temperature) => {
    const random = new Random(6, [1]);
    const force = 500e-21 * density;
    const engine = new Flights(collisionTable(argon, { density, temperature }, angular), uniformForce(force), random);
    const electrons = electronsOf(500, 3, random);
    engine.run(electrons, 5e-9);
    let stored = 0;
    for (let i = 0; i < electrons.count; i++) stored += energyOf(electrons, i);
    const { way, losses, counts } = engine.tally;
    const given = 500 * 3 + force * way[0];
    expect(counts[2]).toBeGreaterThan(100);
    expect(Math.abs((stored + losses[0] + losses[1]) / given - 1)).toBeLessThan(1e-9);
    // and the losses of an ionisation are its threshold, but for recoil
    expect(Math.abs(losses[1] / (counts[1] * 11.5 + counts[2] * 15.8) - 1)).toBeLessThan(2e-3);
  });
});

describe('thresholds', () => {
  test('a process that sets in with a step does not happen below it, also within one bin of energy, and takes its energy above', () => {
    const step: CrossSectionSet = {
      ...argon,
      processes: [
        { kind: 'elastic', name: 'elastic', threshold: 0, crossSection: () => 1e-21 },
        { kind: 'excitation', name: 'step', threshold: 11.53, crossSection: (e) => (e > 11.53 ? 1e-19 : 0) },
      ],
    };
    const table = collisionTable(step, { density, temperature: 0 }, 'isotropic');
    for (const [energy, happens] of [
      [11.529, false],
      [11.531, true],
    ] as const) {
      const random = new Random(10);
      const engine = new Flights(table, uniformForce(0), random);
      const electrons = electronsOf(400, energy, random);
      engine.run(electrons, 2e-9);
      // but for those that lost a little by recoil before
      if (happens) expect(engine.tally.counts[1]).toBeGreaterThan(350);
      else {
        expect(engine.tally.counts[1]).toBe(0);
        expect(engine.tally.counts[0]).toBeGreaterThan(10);
      }
      let lowest: number = energy;
      for (let i = 0; i < electrons.count; i++) lowest = Math.min(lowest, energyOf(electrons, i));
      expect(lowest > 11).toBe(!happens);
    }
  });
});

describe('slow electrons', () => {
  test.each([['isotropic' as const], ['screened-coulomb' as const]])(
    'are given over after the collision that makes them slow, all of them and no other (%s)',
    (angular) => {
      const table = collisionTable(
        elasticGas(20 * ELECTRON_MASS, () => 1e-19),
        { density, temperature: 0 },
        angular,
      );
      const thinning = { slowBelow: Float64Array.of(0.5), weight: Float64Array.of(1) };
      let before = 0;
      for (const until of [4e-9, 6e-9, 9e-9, 1e-6]) {
        const random = new Random(11);
        const engine = new Flights(table, uniformForce(0), random, thinning);
        const electrons = electronsOf(300, 1, random);
        for (let i = 0; i < 300; i++) electrons.keys[2 * i] = i;
        engine.run(electrons, until);
        let left = 0;
        for (let i = 0; i < 300; i++) {
          if (electrons.weight[i] === 0) continue;
          left++;
          expect(energyOf(electrons, i)).toBeGreaterThanOrEqual(0.5);
        }
        const [slow] = engine.tally.slow;
        expect(slow + left).toBe(300);
        expect(slow).toBeGreaterThan(before);
        before = slow;
      }
      expect(before).toBe(300);
    },
  );
});

describe('cells', () => {
  const empty = collisionTable(
    elasticGas(4 * ATOMIC_MASS, () => 1e-40),
    { density: 1, temperature: 0 },
    'isotropic',
  );

  test('without collisions an electron crosses a gap in the exact time with the exact energy', () => {
    // 3 V over the first 1 mm, nothing over 2 mm, −1 V over the last: from rest
    const field: ForceField = { faces: Float64Array.of(0, 1e-3, 3e-3, 4e-3), force: Float64Array.of(3e3, 0, -1e3) };
    const engine = new Flights(empty, field, new Random(1));
    const electrons = new Electrons();
    electrons.add(2);
    engine.run(electrons, 1);
    const { left, leftTime, leftEnergy, time, way } = engine.tally;
    expect([...left]).toEqual([0, 2]);
    expect(leftEnergy[1] / 2).toBeCloseTo(2, 12);
    const v = (volts: number): number => SPEED_OF_1_EV * Math.sqrt(volts);
    const exact = [(2 * 1e-3) / v(3), 2e-3 / v(3), (2 * 1e-3) / (v(3) + v(2))];
    for (const [cell, seconds] of exact.entries()) expect(Math.abs(time[cell] / (2 * seconds) - 1)).toBeLessThan(1e-12);
    for (const [cell, metres] of [1e-3, 2e-3, 1e-3].entries()) expect(Math.abs(way[cell] / (2 * metres) - 1)).toBeLessThan(1e-12);
    expect(Math.abs(leftTime[1] / 2 / (exact[0] + exact[1] + exact[2]) - 1)).toBeLessThan(1e-12);
    expect(electrons.weight[0]).toBe(0);
  });

  test('an electron that the field turns back leaves where it came from, also when it crosses a face and returns within one flight', () => {
    const field: ForceField = { faces: Float64Array.of(0, 1e-3, 2e-3), force: Float64Array.of(0, -4e3) };
    const engine = new Flights(empty, field, new Random(1));
    const electrons = new Electrons();
    electrons.add(1);
    electrons.ux[0] = Math.sqrt(2);
    engine.run(electrons, 1);
    const v = SPEED_OF_1_EV * Math.sqrt(2);
    // 2 eV against 4 V/mm: half a millimetre in and back
    expect([...engine.tally.left]).toEqual([1, 0]);
    expect(Math.abs(engine.tally.leftTime[0] / ((2 * 1e-3) / v + (4 * 0.5e-3) / v) - 1)).toBeLessThan(1e-12);
    expect(engine.tally.leftEnergy[0]).toBeCloseTo(2, 12);
  });

  test('an electron whose parabola leads through a wall and back in is gone at the wall', () => {
    // 1 eV towards the wall, 0.5 mm away, against 1.5 V/mm: it would turn 0.17 mm behind the wall
    const engine = new Flights(empty, { faces: Float64Array.of(0, 2e-3), force: Float64Array.of(1.5e3) }, new Random(1));
    const electrons = new Electrons();
    electrons.add(1);
    electrons.x[0] = 5e-4;
    electrons.ux[0] = -1;
    const turn = (2 * (1 / 1.5e3)) / SPEED_OF_1_EV;
    engine.run(electrons, 2 * turn);
    expect([...engine.tally.left]).toEqual([1, 0]);
    expect(engine.tally.leftEnergy[0]).toBeCloseTo(0.25, 12);
  });

  test('that all have the same field are the same as no cells', () => {
    const force = 300e-21 * density;
    const table = collisionTable(argon, { density, temperature: 0 }, 'isotropic');
    const faces = Float64Array.from({ length: 42 }, (_, i) => (i === 0 ? -1 : i === 41 ? 1 : (i - 3) * 1.3e-4));
    const means = [uniformForce(force), { faces, force: new Float64Array(41).fill(force) }].map((field, k) => {
      const energies: number[] = [];
      const drifts: number[] = [];
      const rates: number[] = [];
      for (let batch = 0; batch < 8; batch++) {
        const random = new Random(9, [k, batch]);
        const engine = new Flights(table, field, random);
        const electrons = electronsOf(150, 8, random);
        electrons.cell.fill(k === 0 ? 0 : 3);
        engine.run(electrons, 2e-8);
        const sum = (values: Float64Array): number => values.reduce((a, b) => a + b, 0);
        const { tally } = engine;
        energies.push(sum(tally.energy) / sum(tally.time));
        drifts.push(sum(tally.way) / sum(tally.time));
        rates.push(tally.counts.reduce((total, count, i) => total + (i % 3 === 2 ? count : 0), 0) / sum(tally.time));
      }
      return [energies, drifts, rates].map(meanOf);
    });
    for (let q = 0; q < 3; q++) {
      const [one, other] = [means[0][q], means[1][q]];
      expect(Math.abs(one.mean - other.mean)).toBeLessThan(5 * Math.hypot(one.error, other.error));
    }
  });
});

describe('weights', () => {
  test('choosing electrons anew keeps what they stand for, and takes each as often as its weight says', () => {
    const random = new Random(8);
    const electrons = new Electrons(4);
    for (let i = 0; i < 1000; i++) {
      electrons.add(1 + (i % 7));
      electrons.x[i] = i;
      electrons.cell[i] = i % 3;
    }
    const before = electrons.totalWeight();
    const mean = electrons.x.reduce((sum, x, i) => sum + x * electrons.weight[i], 0) / before;
    const firsts: number[] = [];
    for (let k = 0; k < 400; k++) {
      const copy = new Electrons(2048);
      for (let i = 0; i < 1000; i++) {
        const j = copy.add(electrons.weight[i]);
        copy.x[j] = electrons.x[i];
        copy.cell[j] = electrons.cell[i];
      }
      copy.resample(137, random.uniform());
      expect(copy.count).toBe(137);
      expect(copy.totalWeight()).toBeCloseTo(before, 6);
      for (let i = 0; i < 137; i++) expect(copy.cell[i]).toBe(copy.x[i] % 3);
      let sum = 0;
      for (let i = 0; i < 137; i++) sum += copy.x[i];
      firsts.push(sum / 137);
    }
    const chosen = meanOf(firsts);
    expect(Math.abs(chosen.mean - mean)).toBeLessThan(5 * chosen.error);
  });

  test('those that are gone are removed, the others keep their order', () => {
    const electrons = new Electrons(2);
    for (let i = 0; i < 5; i++) {
      electrons.add(i % 2);
      electrons.x[i] = i;
    }
    electrons.removeGone();
    expect([electrons.count, electrons.x[0], electrons.x[1]]).toEqual([2, 1, 3]);
  });
});

function meanOf(values: readonly number[]): { readonly mean: number; readonly error: number } {
  const mean = values.reduce((sum, x) => sum + x, 0) / values.length;
  const variance = values.reduce((sum, x) => sum + (x - mean) ** 2, 0) / (values.length - 1);
  return { mean, error: Math.sqrt(variance / values.length) };
}
