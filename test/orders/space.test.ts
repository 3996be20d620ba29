/** Orders of the scheme in space: drift 3 inside, every wall condition and the diffusion 2, the whole 2.
 *
 *  The face values are measured alone, on averages of a smooth profile over the graded cells of a run; the whole against the collocation
 *  oracle of the steady glow, where every part of the scheme acts at once. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { type Grid, makeGrid } from '../../src/gap/grid.ts';
import { fluxAtFaces, makeStencils } from '../../src/laws/drift-diffusion.ts';
import { caseOf, type PlainGap, rightOfMinimum, steadyGapOf, stepTo, withoutDiffusion } from '../help/plain-gap.ts';
import { rigOf, run } from '../help/rig.ts';
import { ordersOf, printTable } from '../help/table.ts';
import { steadyOnLoadLine } from '../oracles/steady-gap.ts';
import { coefficient } from '../theory/make-case.ts';

const show = (orders: readonly number[], i: number): number | string => (i === 0 ? '' : orders[i - 1]);

// ---- face values alone

const SPACING = 0.01;
/** n(x) = 3 + sin(k x + 1) with its integral and slope */
const K = 300;
const density = (x: number): number => 3 + Math.sin(K * x + 1);
const integral = (x: number): number => 3 * x - Math.cos(K * x + 1) / K;
const slope = (x: number): number => K * Math.cos(K * x + 1);

function grid(cells: number): Grid {
  const gap = { geometry: 'planar', spacing: SPACING, area: 1e-3, longestPath: SPACING, longestPathGiven: false } as const;
  return makeGrid(gap, cells, { left: true, right: false, length: 0.2 * SPACING, ratio: 4 });
}

/** Γ at every face for averages of n, with velocity v [m/s] and diffusion D [m²/s]; no wall emits. */
function faceFluxes(g: Grid, v: number, D: number): Float64Array {
  const n = new Float64Array(g.cells + 4);
  for (let i = 0; i < g.cells; i++) n[i + 2] = (integral(g.faces[i + 1]) - integral(g.faces[i])) / g.widths[i];
  const everywhere = (value: number): Float64Array => new Float64Array(g.cells + 1).fill(value);
  const flux = new Float64Array(g.cells + 1);
  // a positive charge of mobility 1 in a field v
  fluxAtFaces(makeStencils(g), 1, n, 2, everywhere(v), 0, everywhere(1), everywhere(D), flux);
  return flux;
}

const CELLS = [40, 80, 160, 320];

/** The errors of a face flux over the grids of CELLS. */
function errorsOf(v: number, D: number, faces: (g: Grid) => number[], exact: (x: number) => number): number[] {
  return CELLS.map((cells) => {
    const g = grid(cells);
    const flux = faceFluxes(g, v, D);
    return Math.max(...faces(g).map((f) => Math.abs(flux[f] - exact(g.faces[f]))));
  });
}

const inside = (g: Grid): number[] => Array.from({ length: g.cells - 3 }, (_, i) => i + 2);

const PARTS: readonly { readonly name: string; readonly order: number; readonly errors: () => number[] }[] = [
  { name: 'drift towards +x, inside', order: 3, errors: () => errorsOf(1, 0, inside, density) },
  { name: 'drift towards −x, inside', order: 3, errors: () => errorsOf(-1, 0, inside, (x) => -density(x)) },
  { name: 'diffusion, inside', order: 2, errors: () => errorsOf(0, 1, inside, (x) => -slope(x)) },
  { name: 'first face off an emitting left wall', order: 2, errors: () => errorsOf(1, 0, () => [1], density) },
  {
    name: 'first face off an emitting right wall',
    order: 2,
    errors: () =>
      errorsOf(
        -1,
        0,
        (g) => [g.cells - 1],
        (x) => -density(x),
      ),
  },
  {
    name: 'outflow through the left wall',
    order: 2,
    errors: () =>
      errorsOf(
        -1,
        0,
        () => [0],
        (x) => -density(x),
      ),
  },
  { name: 'outflow through the right wall', order: 2, errors: () => errorsOf(1, 0, (g) => [g.cells], density) },
];

describe('the face flux on graded cells', () => {
  const rows: (string | number)[][] = [];
  for (const { name, order, errors } of PARTS) {
    it(`has order ${order} within 0.15: ${name}`, () => {
      const found = errors();
      const orders = ordersOf(CELLS, found).map((p) => -p);
      rows.push([name, order, ...orders, found[3]]);
      expect(Math.abs(orders[2] - order)).toBeLessThan(0.15);
    });
  }

  it('lets nothing flow in at a wall', () => {
    const g = grid(40);
    expect(Math.abs(faceFluxes(g, 1, 1)[0])).toBe(0);
    expect(Math.abs(faceFluxes(g, -1, 1)[g.cells])).toBe(0);
  });

  it('prints its orders', () => {
    printTable('orders of face fluxes', ['', 'declared', '40 → 80', '80 → 160', '160 → 320', 'error at 320'], rows);
    expect(rows.length).toBe(PARTS.length);
  });
});

// ---- the whole scheme

const load = { supplyVoltage: 230.202, resistance: 1e4 };

function glow(gap: PlainGap, cells: number, coefficients: Partial<Case['gas']['coefficients']> = {}): { current: number; field: number } {
  const settings = caseOf(gap, {
    seed: { cathodeCurrent: 1e-10 },
    supply: { programme: stepTo(load.supplyVoltage), seriesResistance: load.resistance },
    observe: { until: 1 },
    numerics: { cells, tolerance: 1e-3 },
    coefficients,
  });
  const { march, system } = run(rigOf(settings));
  return { current: march.now.current, field: Math.abs(march.state[system.layout.field]) };
}

describe('the steady glow', () => {
  const gaps: readonly (readonly [string, PlainGap])[] = [
    ['of the open case', rightOfMinimum],
    ['with strong diffusion', { ...rightOfMinimum, electronEnergy: 3, ionEnergy: 0.5 }],
    ['without diffusion', withoutDiffusion(rightOfMinimum)],
  ];
  for (const [name, gap] of gaps) {
    it(`tends to the collocation oracle at order 2 within 0.15, current and cathode field, ${name}`, () => {
      const exact = steadyOnLoadLine(steadyGapOf(gap, 1e-10), load, { accuracy: 1e-8 });
      const cells = [70, 140, 280, 560];
      const found = cells.map((n) => glow(gap, n));
      const current = found.map((f) => f.current / exact.current - 1);
      const field = found.map((f) => f.field / exact.cathodeField - 1);
      const orders = [current, field].map((errors) => ordersOf(cells, errors.map(Math.abs)).map((p) => -p));
      printTable(
        `steady glow against cells, ${name}`,
        ['cells', 'current', 'order', 'cathode field', 'order'],
        cells.map((n, i) => [n, current[i], show(orders[0], i), field[i], show(orders[1], i)]),
      );
      expect(Math.abs(orders[0][2] - 2)).toBeLessThan(0.15);
      // with strong diffusion the third order of the drift still shows at the cathode
      expect(orders[1][2]).toBeGreaterThan(2 - 0.15);
      expect(orders[1][2]).toBeLessThan(name === 'with strong diffusion' ? 2.4 : 2.15);
      // the default has 140 cells or more
      expect(Math.abs(current[1])).toBeLessThan(5e-3);
    });
  }

  it('converges on itself at order 2 within 0.15 with attachment and recombination', () => {
    const gap = { ...rightOfMinimum, attachment: 0.1 };
    // attachment that vanishes with the field: one that does not makes an ion–ion plasma with a front at its edge, nothing smooth
    const coefficients = {
      attachment: coefficient({ kind: 'linear', a: 0, b: 4e-4 }),
      ionIonRecombination: coefficient({ kind: 'constant', value: 1e-13 }),
    };
    const cells = [140, 280, 560, 1120];
    const found = cells.map((n) => glow(gap, n, coefficients).current);
    const steps = [0, 1, 2].map((i) => Math.abs(found[i] / found[i + 1] - 1));
    const orders = ordersOf(cells.slice(0, 3), steps).map((p) => -p);
    printTable(
      'steady glow with attachment and recombination',
      ['cells', 'current A', 'change', 'order'],
      cells.map((n, i) => [n, found[i], i === 0 ? '' : steps[i - 1], i < 2 ? '' : orders[i - 2]]),
    );
    expect(Math.abs(orders[1] - 2)).toBeLessThan(0.15);
  });
});
