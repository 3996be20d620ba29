import { describe, expect, it } from 'vitest';
import { type ScalarSolution, solveScalar } from '../../src/numerics/ode.ts';

/** largest error at the given number of times, even and not */
function worst(solution: ScalarSolution, exact: (t: number) => number, from: number, to: number, count = 4001): number {
  let error = 0;
  for (let i = 0; i <= count; i++) {
    const t = from + ((to - from) * i) / count;
    error = Math.max(error, Math.abs(solution.at(t) - exact(t)));
  }
  return error;
}

describe('the scalar solver', () => {
  it('is of order 5 at the ends of steps and 4 between them', () => {
    // Hairer and Wanner 1996, IV.5: Radau IIA with three stages. y′ = −2 t y², y = 1/(1 + t²)
    const runs = [1e-5, 1e-7, 1e-9].map((tolerance) => {
      const solution = solveScalar((t, y) => -2 * t * y * y, 0, 3, 1, tolerance);
      return {
        tolerance,
        steps: solution.steps,
        end: Math.abs(solution.at(3) - 0.1),
        between: worst(solution, (t) => 1 / (1 + t * t), 0, 3),
      };
    });
    const order = (a: (typeof runs)[0], b: (typeof runs)[0], key: 'end' | 'between'): number =>
      Math.log(a[key] / b[key]) / Math.log(b.steps / a.steps);
    expect(order(runs[1], runs[2], 'between')).toBeGreaterThan(3.7);
    expect(order(runs[1], runs[2], 'between')).toBeLessThan(4.4);
    expect(order(runs[1], runs[2], 'end')).toBeGreaterThan(4.5);
    expect(order(runs[1], runs[2], 'end')).toBeLessThan(5.6);
    for (const run of runs) expect(run.between).toBeLessThan(3 * run.tolerance);
  });

  it.each([1, 1e3, 1e6, 1e9, 1e12])('keeps to its tolerance, between steps too, with a stiffness of %f/s', (stiffness) => {
    // Prothero and Robinson's problem, started off the slow solution: y = cos t + (y0 − 1) e^{−λt}; an explicit method needs λ steps
    const solution = solveScalar((t, y) => -stiffness * (y - Math.cos(t)) - Math.sin(t), 0, 10, 1.5, 1e-8);
    const exact = (t: number): number => Math.cos(t) + 0.5 * Math.exp(-stiffness * t);
    expect(worst(solution, exact, 0, 10)).toBeLessThan(3e-8);
    expect(worst(solution, exact, 0, Math.min(10, 20 / stiffness))).toBeLessThan(3e-8);
    expect(solution.steps).toBeLessThan(800);
  });

  it('ends steps at corners and keeps its accuracy across them', () => {
    const bend = (t: number): number => Math.abs(t - Math.SQRT2);
    const exact = (t: number): number => (t < Math.SQRT2 ? Math.SQRT2 * t - (t * t) / 2 : 1 + (t - Math.SQRT2) ** 2 / 2);
    const solution = solveScalar(bend, 0, 3, 0, 1e-8, [Math.SQRT2, -1, 3, 99]);
    expect(worst(solution, exact, 0, 3)).toBeLessThan(1e-13);
    // a hundredth of the whole at first, then as long as the error allows
    expect(solution.steps).toBeLessThan(12);
  });

  it('is held at its ends', () => {
    const solution = solveScalar(() => 1, 1, 2, 5, 1e-8);
    expect(solution.at(0)).toBe(5);
    expect(Math.abs(solution.at(7) - 6)).toBeLessThan(1e-14);
  });

  it('gives up with the time and the value where no step is small enough', () => {
    expect(() => solveScalar((_, y) => y * y, 0, 2, 1, 1e-8)).toThrow(/no step small enough at t = (1\.0000|0\.9999)/);
    expect(() => solveScalar(() => Number.NaN, 0, 2, 1, 1e-8)).toThrow(/t = 0, y = 1/);
  });
});
