import { describe, expect, it } from 'vitest';
import { type BoundaryProblem, halved, type MeshFunction, solveOnMesh } from './collocation.ts';

const fixed = (index: number, wanted: number): BoundaryProblem['left'][number] => ({
  value: (y) => y[index] - wanted,
  gradient: (_, out) => {
    out.fill(0);
    out[index] = 1;
  },
});

/** y″ = 2 y³, y(0) = 1, y(1) = 1/2: y = 1/(1 + x) */
const problem: BoundaryProblem = {
  size: 2,
  rate: (y, out) => {
    out[0] = y[1];
    out[1] = 2 * y[0] ** 3;
  },
  rateJacobian: (y, out) => {
    out.set([0, 1, 6 * y[0] ** 2, 0]);
  },
  left: [fixed(0, 1)],
  right: [fixed(0, 0.5)],
};

function worstError(x: Float64Array): number {
  const start: MeshFunction = { x, values: new Float64Array(2 * x.length) };
  for (let i = 0; i < x.length; i++) start.values.set([1 - x[i] / 2, -0.5], 2 * i);
  const { values } = solveOnMesh(problem, start, new Float64Array([1, 1]));
  return Math.max(...x.map((xi, i) => Math.abs(values[2 * i] - 1 / (1 + xi))));
}

describe('collocation for boundary value problems (tool of the oracles)', () => {
  it('converges with the fourth power of the mesh on a nonlinear problem, uneven meshes included', () => {
    const uneven = Float64Array.from({ length: 13 }, (_, i) => (i / 12) ** 1.5);
    for (const coarse of [Float64Array.from({ length: 13 }, (_, i) => i / 12), uneven]) {
      const order = Math.log2(worstError(coarse) / worstError(halved(coarse)));
      expect(Math.abs(order - 4)).toBeLessThan(0.15);
    }
  });

  it('keeps a layer that grows and one that decays apart by exchanging rows', () => {
    // y″ = k² y on [0, 1] with 30 mesh widths per layer: both exponentials, one from either end
    const k = 200;
    const layers: BoundaryProblem = {
      size: 2,
      rate: (y, out) => {
        out[0] = k * y[1];
        out[1] = k * y[0];
      },
      rateJacobian: (_, out) => {
        out.set([0, k, k, 0]);
      },
      left: [fixed(0, 1)],
      right: [fixed(0, 1)],
    };
    const x = Float64Array.from({ length: 6001 }, (_, i) => i / 6000);
    const { values } = solveOnMesh(layers, { x, values: new Float64Array(2 * x.length) }, new Float64Array([1, 1]));
    for (const i of [30, 60, 5940]) {
      const exact = Math.exp(-k * x[i]) + Math.exp(k * (x[i] - 1));
      expect(values[2 * i] / exact).toBeCloseTo(1, 7);
    }
  });
});
