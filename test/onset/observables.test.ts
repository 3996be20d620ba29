import { describe, expect, it } from 'vitest';
import { cellsFor } from '../../src/gap/cells.ts';
import type { Grid } from '../../src/gap/grid.ts';
import { type Layout, makeLayout } from '../../src/gap/layout.ts';
import { cathodeLayer } from '../../src/observables/cathode-layer.ts';
import { carriers, densityRange, netCharges } from '../../src/observables/charge.ts';
import { cathodeDistortion, cathodeField, seedShare } from '../../src/observables/walls.ts';
import { openCase } from '../oracles/open-case.ts';
import { steadyOnLoadLine } from '../oracles/steady-gap.ts';
import { openCaseWith, outcomeOf, step, V_S } from './set-up.ts';

const d = 0.01;

/** A gap whose field has a given magnitude at a distance from the cathode. */
function gapWith(field: (x: number) => number, cells = 100, leftIsCathode = true): { grid: Grid; layout: Layout; y: Float64Array } {
  const grid = cellsFor(openCaseWith().gap, cells, { left: leftIsCathode, right: !leftIsCathode }, 2e-3);
  const layout = makeLayout(grid.cells, 2);
  const y = new Float64Array(layout.size);
  y[layout.voltage] = leftIsCathode ? 200 : -200;
  for (let j = 0; j <= grid.cells; j++) {
    const x = leftIsCathode ? grid.faces[j] : d - grid.faces[j];
    y[layout.field + j] = (leftIsCathode ? -1 : 1) * field(x);
  }
  return { grid, layout, y };
}

const thickness = (...args: Parameters<typeof gapWith>): number | null => {
  const { grid, layout, y } = gapWith(...args);
  return cathodeLayer(grid, layout, y)?.thickness ?? null;
};

describe('the cathode layer', () => {
  it('of a field that falls along a straight line ends where the line does, on any grid and at either wall', () => {
    const linear = (x: number): number => Math.max(1e5 * (1 - x / 2.5e-3), 1e3);
    for (const cells of [40, 100, 400]) {
      expect(thickness(linear, cells)).toBeCloseTo(2.5e-3, 12);
      expect(thickness(linear, cells, false)).toBeCloseTo(2.5e-3, 12);
    }
  });

  it('of a curved field is the least-squares line over equal lengths, whatever the grid', () => {
    // E = E_c e^{−x/l}, half at L = l ln 2: line through the mean with slope 12 (∫xE − L/2 ∫E)/L³
    const l = 2e-3;
    const L = l * Math.LN2;
    const area = l / 2;
    const moment = l * (l - (l + L) / 2);
    const slope = (12 * (moment - (L / 2) * area)) / L ** 3;
    const expected = L / 2 - area / L / slope;
    const curved = (x: number): number => 1e5 * Math.exp(-x / l);
    const [coarse, fine] = [50, 400].map((cells) => Math.abs((thickness(curved, cells) ?? 0) / expected - 1));
    expect(fine).toBeLessThan(1e-5);
    // only the straight pieces between faces are in the way: second order, give or take where half falls within a cell
    const order = Math.log(coarse / fine) / Math.log(8);
    expect(Math.abs(order - 2)).toBeLessThan(0.3);
  });

  it('counts the cells within it', () => {
    const { grid, layout, y } = gapWith((x) => Math.max(1e5 * (1 - x / 2.5e-3), 1e3), 40);
    const layer = cathodeLayer(grid, layout, y);
    expect(layer?.cells).toBe(Array.from(grid.faces).filter((x) => x > 0 && x <= 2.5e-3).length);
  });

  it('is null where the field does not fall to half, where the line ends beyond the gap, and where it returns electrons', () => {
    expect(thickness(() => 2e4)).toBeNull();
    expect(thickness((x) => 1e5 * (1 - (0.4 * x) / d))).toBeNull();
    // falls to half at 6 mm, the line reaches zero at 12 mm
    expect(thickness((x) => 1e5 * (1 - x / 12e-3))).toBeNull();
    expect(thickness(() => -1e5)).toBeNull();
    expect(thickness(() => 0)).toBeNull();
  });

  it('of the steady glow is that of the oracle', () => {
    const { final } = outcomeOf();
    const oracle = steadyOnLoadLine(openCase, { supplyVoltage: openCase.supplyVoltage, resistance: openCase.seriesResistance });
    const { x, field } = oracle;
    // the same line through the oracle's profile, by sums over many short pieces
    const at = (s: number): number => {
      const j = x.findIndex((position) => position >= s);
      return j <= 0 ? field[0] : field[j - 1] + ((field[j] - field[j - 1]) * (s - x[j - 1])) / (x[j] - x[j - 1]);
    };
    const half = x.find((_s, i) => field[i] <= field[0] / 2) ?? 0;
    const n = 20_000;
    const samples = Array.from({ length: n }, (_, k) => ((k + 0.5) * half) / n).filter((s) => at(s) >= field[0] / 2);
    const mean = (f: (s: number) => number): number => samples.reduce((sum, s) => sum + f(s), 0) / samples.length;
    const [sx, sE] = [mean((s) => s), mean(at)];
    const slope = (mean((s) => s * at(s)) - sx * sE) / (mean((s) => s * s) - sx * sx);
    expect((final.cathode_layer_m ?? 0) / (sx - sE / slope)).toBeCloseTo(1, 2);
  });

  it('is null in the dark', () => {
    expect(outcomeOf({ supply: { programme: step(0.5 * V_S) } }).final.cathode_layer_m).toBeNull();
  });
});

describe('the field at the cathode', () => {
  it('is that of the wall with the lower potential, positive where it draws electrons off', () => {
    for (const left of [true, false]) {
      const { layout, y } = gapWith((x) => 3e4 - 1e6 * x, 40, left);
      expect(cathodeField(layout, y)).toBeCloseTo(3e4, 6);
    }
  });

  it('is distorted relative to V/d, or to the floor where that is larger', () => {
    const { layout, y } = gapWith(() => 3e4, 40);
    // V/d = 2e4
    expect(cathodeDistortion(layout, d, 0, y)).toBeCloseTo(0.5, 12);
    expect(cathodeDistortion(layout, d, 1e5, y)).toBeCloseTo(0.1, 12);
  });
});

describe('the share of the seed in the emission', () => {
  const values = (seed: number, ions: number, cells: number, rightSeed = seed): Parameters<typeof seedShare>[0] => {
    const flux = [new Float64Array(cells + 1), new Float64Array(cells + 1)];
    flux[1][0] = -ions;
    flux[1][cells] = ions;
    return { flux, emissionLeft: 0.1, emissionRight: 0.1, seedLeft: seed, seedRight: rightSeed } as unknown as Parameters<
      typeof seedShare
    >[0];
  };

  it('is the seed over seed and ions at the wall that is the cathode', () => {
    for (const left of [true, false]) {
      expect(seedShare(values(1, 30, 5), left, 5)).toBeCloseTo(0.25, 12);
      expect(seedShare(values(0, 30, 5), left, 5)).toBe(0);
      expect(seedShare(values(1, -30, 5), left, 5)).toBe(1);
      expect(seedShare(values(0, 0, 5), left, 5)).toBe(1);
    }
    expect(seedShare(values(1, 30, 5, 7), true, 5)).toBeCloseTo(0.25, 12);
    expect(seedShare(values(1, 30, 5, 7), false, 5)).toBeCloseTo(0.7, 12);
  });
});

describe('densities', () => {
  const { grid, layout, y } = gapWith(() => 2e4, 40);
  for (let i = 0; i < grid.cells; i++) {
    y[layout.first + i] = 1 + i;
    y[layout.row + layout.first + i] = 3;
  }
  y[layout.first + 7] = -0.5;

  it('have a least and a largest value', () => {
    expect(densityRange(layout, 0, y)).toEqual({ least: -0.5, most: 40 });
    expect(densityRange(layout, 1, y)).toEqual({ least: 3, most: 3 });
  });

  it('add up to carriers of either sign and to net charges', () => {
    const volume = (i: number): number => grid.widths[i] * openCase.area;
    let electrons = 0;
    for (let i = 0; i < grid.cells; i++) electrons += volume(i) * y[layout.first + i];
    const ions = 3 * d * openCase.area;
    expect(carriers(grid, layout, y)).toBeCloseTo(electrons + ions, 12);
    expect(netCharges(grid, layout, [-1, 1], y)).toBeCloseTo(ions - electrons, 12);
  });
});

describe('the worst undershoot', () => {
  it('is small on the open case, and larger on a coarse grid at high overvoltage', () => {
    expect(outcomeOf().numerics.worst_undershoot).toBeLessThan(1e-3);
    const coarse = outcomeOf({ supply: { programme: step(2 * V_S) }, numerics: { cells: 30 } });
    expect(coarse.numerics.worst_undershoot).toBeGreaterThan(1e-2);
  });

  it('is measured against what the density has been, so that what is left of a discharge does not count', () => {
    const died = outcomeOf({ supply: { trip: { current: 1e-3, delay: 1e-6, senses: 'gap', action: 'open' } } });
    expect(died.final.stop).toBe('tripped-out');
    expect(died.numerics.worst_undershoot).toBeLessThan(2e-2);
  });
});
