/** The linear solve of the implicit step against the equations themselves: (a − J) U = r, where J U is a central difference of the rates
 *  along U. An error anywhere in the derivatives, the elimination of the field or the border shows here. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { curveOf } from '../../src/gases/curves.ts';
import { FastElectrons } from '../../src/laws/fast-electrons.ts';
import { GapEquations } from '../../src/laws/gap-equations.ts';
import { lawsOf } from '../../src/laws/of-case.ts';
import { GapSystem } from '../../src/march/gap-system.ts';
import { Circuit } from '../../src/supply/circuit.ts';
import { caseOf, type PlainGap, rightOfMinimum } from '../help/plain-gap.ts';
import { systemOf } from '../help/rig.ts';
import { coefficient } from '../theory/make-case.ts';

const CELLS = 24;
const Td = 1e-21;

/** numbers in [−1, 1) from a seed, the same on every machine (a linear congruence; Numerical Recipes, 3rd ed. 2007, §7.1.2, from memory) */
function noise(seed: number): () => number {
  let state = (seed * 2654435761 + 1) >>> 0;
  return () => {
    state = (1664525 * state + 1013904223) >>> 0;
    return state / 2 ** 31 - 1;
  };
}

interface State {
  /** how far the field varies over the gap, relative to V/d; above 2 it changes direction inside */
  readonly distortion: number;
  readonly voltage: number;
  /** densities as large as these bend the field only with their difference [1/m³] */
  readonly density: number;
  readonly seed: number;
}

/** A rough state: positive densities, and a space charge that bends the field as far as asked. */
function roughState(system: GapSystem, state: State): Float64Array {
  const { layout, grid } = system;
  const random = noise(state.seed);
  const y = new Float64Array(layout.size);
  const charge = (state.distortion * (Math.abs(state.voltage) / grid.spacing) * 8.8541878128e-12) / (1.602176634e-19 * grid.spacing);
  for (let i = 0; i < layout.cells; i++) {
    for (let k = 0; k < layout.species; k++) y[k * layout.row + layout.first + i] = state.density * (1.2 + random());
    const share = 0.5 + 0.5 * random();
    y[layout.first + i] =
      y[layout.row + layout.first + i] - (layout.species > 2 ? y[2 * layout.row + layout.first + i] : 0) - charge * share;
  }
  y[layout.voltage] = state.voltage;
  system.settle(y);
  return y;
}

/** How far a U − J U differs from r, each kind of unknown against its own size, with J U as the difference that disagrees least: a wide
 *  one errs by the curvature of the rates (and where an electron flux changes sign), a narrow one by rounding, a wrong derivative by neither. */
function residualOf(system: GapSystem, y: Float64Array, a: number, seed: number): number {
  const { layout } = system;
  const random = noise(seed + 77);
  const time = 1e-6;
  const rates = new Float64Array(layout.size);
  system.linearise(time, y, rates);
  if (system.factor(y, a) >= 0) throw new Error('no factorisation');
  // a right-hand side that obeys Gauss's law as rates do
  const r = new Float64Array(layout.size);
  for (let k = 0; k < layout.species; k++) {
    for (let i = 0; i < layout.cells; i++) {
      const at = k * layout.row + layout.first + i;
      r[at] = a * y[at] * 0.1 * random();
    }
  }
  r[layout.voltage] = system.circuit.feed === 'ideal' ? 0 : a * y[layout.voltage] * 0.1 * random();
  system.settle(r);
  const U = new Float64Array(layout.size);
  system.solve(r, U);
  const product = new Float64Array(layout.size);
  const residuals = [1e-2, 1e-3, 1e-4, 1e-5].map((share) => {
    directionalDerivative(system, time, y, U, share, product);
    const rows = Array.from({ length: layout.species }, (_, k) => [k * layout.row, (k + 1) * layout.row]);
    const unknowns = [...rows, [layout.leftField, layout.leftField + 1], [layout.voltage, layout.voltage + 1]];
    return Math.max(
      ...unknowns.map(([from, to]) => {
        let size = 1e-300;
        let off = 0;
        for (let i = from; i < to; i++) {
          size = Math.max(size, Math.abs(product[i]), Math.abs(a * U[i]), Math.abs(r[i]));
          off = Math.max(off, Math.abs(a * U[i] - product[i] - r[i]));
        }
        return off / size;
      }),
    );
  });
  return Math.min(...residuals);
}

/** J U by the central difference of fourth order, over steps that move no density by more than `share` of itself. */
function directionalDerivative(system: GapSystem, time: number, y: Float64Array, U: Float64Array, share: number, out: Float64Array): void {
  const { layout } = system;
  let largest = Math.abs(U[layout.voltage] / y[layout.voltage]);
  for (let k = 0; k < layout.species; k++) {
    for (let i = 0; i < layout.cells; i++) {
      const at = k * layout.row + layout.first + i;
      largest = Math.max(largest, Math.abs(U[at] / y[at]));
    }
  }
  const epsilon = share / largest;
  const at = (steps: number): Float64Array => {
    const moved = y.slice();
    const rates = new Float64Array(layout.size);
    for (let i = 0; i < layout.unknowns; i++) moved[i] += steps * epsilon * U[i];
    system.rates(time, moved, rates);
    return rates;
  };
  const [a, b, c, d] = [at(-2), at(-1), at(1), at(2)];
  for (let i = 0; i < layout.unknowns; i++) out[i] = (a[i] - d[i] + 8 * (c[i] - b[i])) / (12 * epsilon);
}

/** coefficients that all depend on the field, so that no derivative hides */
function fieldDependent(gap: PlainGap): Partial<Case['gas']['coefficients']> {
  const { electronMobility, ionMobility } = caseOf(gap).gas.coefficients;
  const at = (c: Case['gas']['coefficients']['ionMobility']): number => (c.form.kind === 'constant' ? c.form.value : Number.NaN);
  return {
    electronMobility: coefficient({ kind: 'power', factor: at(electronMobility) * (200 * Td) ** 0.2, exponent: -0.2, floor: 1 * Td }),
    electronEnergy: coefficient({ kind: 'power', factor: 2 * (200 * Td) ** -0.5, exponent: 0.5, floor: 0.1 * Td }),
    ionMobility: coefficient({ kind: 'falling', low: at(ionMobility), scale: 150 * Td, power: 1.5, fall: 0.33 }),
    ionEnergy: coefficient({ kind: 'power', factor: 0.1 * (200 * Td) ** -0.3, exponent: 0.3, floor: 0.1 * Td }),
  };
}

const RESISTOR = { seriesResistance: 1e4, parallelCapacitance: 20e-12 };

function settingsOf(name: string): Case {
  const base = { seed: { cathodeCurrent: 1e-6 }, numerics: { cells: CELLS } };
  const attaching = { ...rightOfMinimum, attachment: 0.4 };
  switch (name) {
    case 'constant mobilities':
      return caseOf(rightOfMinimum, { ...base, supply: RESISTOR });
    case 'coefficients that depend on the field':
      return caseOf(rightOfMinimum, { ...base, supply: RESISTOR, coefficients: fieldDependent(rightOfMinimum) });
    case 'yields that depend on the field': {
      const plain = caseOf(rightOfMinimum, { ...base, supply: RESISTOR });
      const { left } = plain.electrodes;
      // of another slope at either wall, so that a mistake at one of them shows
      const surface = (b: number): Case['electrodes']['left'] => ({
        ...left,
        ionYield: { ...left.ionYield, law: { kind: 'reduced-field', form: { kind: 'linear', a: 0.5, b } } },
      });
      return { ...plain, electrodes: { left: surface(3e18), right: surface(-1e18) } };
    }
    case 'an ideal supply':
      return caseOf(rightOfMinimum, { ...base, coefficients: fieldDependent(rightOfMinimum) });
    case 'attachment and three species':
      return caseOf(attaching, {
        ...base,
        supply: RESISTOR,
        coefficients: {
          ...fieldDependent(attaching),
          attachment: coefficient({ kind: 'linear', a: 1e-22, b: 2e-3 }),
        },
      });
    case 'recombination':
      return caseOf(rightOfMinimum, {
        ...base,
        supply: RESISTOR,
        coefficients: { ...fieldDependent(rightOfMinimum), electronIonRecombination: coefficient({ kind: 'constant', value: 1e-9 }) },
      });
    default:
      return caseOf(attaching, {
        ...base,
        supply: RESISTOR,
        coefficients: {
          ...fieldDependent(attaching),
          attachment: coefficient({ kind: 'linear', a: 1e-22, b: 2e-3 }),
          electronIonRecombination: coefficient({ kind: 'constant', value: 1e-9 }),
          ionIonRecombination: coefficient({ kind: 'constant', value: 3e-9 }),
        },
      });
  }
}

const MODELS = [
  'constant mobilities',
  'coefficients that depend on the field',
  'yields that depend on the field',
  'an ideal supply',
  'attachment and three species',
  'recombination',
  'attachment and both kinds of recombination',
];

describe('the linear solve of a step', () => {
  for (const name of MODELS) {
    it(`inverts a − J of the discrete equations to the accuracy of a central difference with ${name}`, () => {
      const { system } = systemOf(settingsOf(name));
      fc.assert(
        fc.property(
          fc.record({
            distortion: fc.constantFrom(-3, -0.4, 0.01, 0.5, 3),
            voltage: fc.constantFrom(230, -230),
            density: fc.constantFrom(1e13, 1e15),
            seed: fc.integer({ min: 0, max: 1000 }),
          }),
          fc.constantFrom(1e6, 1e9, 1e11),
          (state, a) => {
            expect(residualOf(system, roughState(system, state), a, state.seed)).toBeLessThan(1e-6);
          },
        ),
        { numRuns: 60 },
      );
    });
  }
});

/** The same gap with fast electrons in front of one wall; profile and exponents are invented. */
function withFastElectrons(settings: Case, cathodeIsLeft: boolean): GapSystem {
  const { system: plain } = systemOf(settings);
  const { grid, layout } = plain;
  const fast = new FastElectrons(grid);
  const random = noise(5);
  const profile = (): Float64Array => Float64Array.from({ length: grid.cells }, () => (1 + random()) / grid.cells);
  const [ions, slow] = [profile().map((n) => 12 * n), profile().map((n) => 5 * n)];
  fast.set({ cathodeIsLeft, ions, slow, returned: 0.4, voltage: 240, cathodeField: 30e3, byVoltage: 5, byField: -1.7 });
  return new GapSystem(new GapEquations(grid, layout, lawsOf(settings), fast), new Circuit(settings.supply));
}

describe('the linear solve with fast electrons', () => {
  for (const name of ['an ideal supply', 'yields that depend on the field', 'recombination']) {
    it(`inverts a − J to the accuracy of a central difference in front of either wall with ${name}`, () => {
      for (const left of [true, false]) {
        const system = withFastElectrons(settingsOf(name), left);
        fc.assert(
          fc.property(
            fc.record({
              distortion: fc.constantFrom(-0.4, 0.01, 0.5, 3),
              voltage: fc.constantFrom(left ? 230 : -230, left ? 240 : -200),
              density: fc.constantFrom(1e13, 1e15),
              seed: fc.integer({ min: 0, max: 1000 }),
            }),
            fc.constantFrom(1e6, 1e9, 1e11),
            (state, a) => {
              expect(residualOf(system, roughState(system, state), a, state.seed)).toBeLessThan(1e-6);
            },
          ),
          { numRuns: 60 },
        );
      }
    });
  }
});

describe('the assembly written out for two species', () => {
  it('gives the same solution as the one for any number of species, which an attachment of zero selects', () => {
    const settings = caseOf(rightOfMinimum, {
      seed: { cathodeCurrent: 1e-6 },
      supply: RESISTOR,
      numerics: { cells: CELLS },
      coefficients: fieldDependent(rightOfMinimum),
    });
    const { system: two } = systemOf(settings);
    const zero = curveOf({ kind: 'constant', value: 0 });
    const any = new GapSystem(
      new GapEquations(two.grid, two.layout, { ...lawsOf(settings), attachment: zero }),
      new Circuit(settings.supply),
    );
    const { layout } = two;
    for (const voltage of [230, -230]) {
      for (const distortion of [-3, 0.5, 3]) {
        const y = roughState(two, { distortion, voltage, density: 1e14, seed: 3 });
        const solutions = [two, any].map((system) => {
          const rates = new Float64Array(layout.size);
          system.linearise(0, y, rates);
          expect(system.factor(y, 1e9)).toBe(-1);
          const U = new Float64Array(layout.size);
          system.solve(rates, U);
          return { rates, U };
        });
        for (const key of ['rates', 'U'] as const) {
          const [a, b] = solutions.map((s) => s[key]);
          for (let k = 0; k < layout.species; k++) {
            const row = a.subarray(k * layout.row, (k + 1) * layout.row);
            const size = row.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
            for (let i = 0; i < layout.row; i++) expect(Math.abs(row[i] - b[k * layout.row + i])).toBeLessThan(1e-12 * size);
          }
          for (let i = layout.leftField; i < layout.unknowns; i++) expect(b[i] / a[i]).toBeCloseTo(1, 9);
        }
      }
    }
  });
});
