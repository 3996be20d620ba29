/** The steady voltage–current curve from the dark discharge to the abnormal glow, against the collocation oracle of the steady equations,
 *  and its lowest point against the cathode layer of von Engel and Steenbeck, resolved here. */
import { describe, expect, it } from 'vitest';
import { simulateNow } from '../../src/simulate.ts';
import {
  alphaIn,
  breakdownVoltageOf,
  caseOf,
  leftOfMinimum,
  type PlainGap,
  rightOfMinimum,
  steadyGapOf,
  stepTo,
} from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';
import { voltageCurrentCurve } from '../oracles/steady-gap.ts';

const SEED = 1e-12;

interface Point {
  readonly current: number;
  readonly voltage: number;
  readonly cathodeField: number;
  readonly layer: number | null;
}

/** A run on default settings behind a resistance that makes the supply nearly a current source: where it settles. */
function settle(gap: PlainGap, current: number, voltage: number): Point {
  const resistance = (5 * voltage) / current;
  const outcome = simulateNow(
    caseOf(gap, {
      seed: { cathodeCurrent: SEED },
      supply: { programme: stepTo(voltage + resistance * current), seriesResistance: resistance },
      observe: { until: Math.max(0.02, 1e-10 * resistance) },
    }),
  );
  expect(outcome.final.stop, `at ${current} A`).toBe('steady');
  expect(outcome.verdict.state).toBe('breaks-down');
  const { current_A, gap_voltage_V, cathode_field_V_per_m, cathode_layer_m } = outcome.final;
  return { current: current_A, voltage: gap_voltage_V, cathodeField: cathode_field_V_per_m, layer: cathode_layer_m };
}

const CURRENTS = [1e-8, 1e-7, 1e-6, 1e-5, 1e-4, 1e-3, 3e-3, 1e-2, 2e-2];

const GAPS: readonly (readonly [string, PlainGap])[] = [
  ['right of the Paschen minimum', rightOfMinimum],
  ['near the Paschen minimum', { ...rightOfMinimum, torr: 0.7 }],
  ['left of the Paschen minimum', leftOfMinimum],
];

describe('the steady voltage–current curve', () => {
  for (const [name, gap] of GAPS) {
    it(`is that of the steady equations within 0.5 %, voltage and cathode field, from dark to abnormal glow, ${name}`, () => {
      const least = breakdownVoltageOf(gap);
      // where the oracle says, so that all of the branches are visited; then compared at the current that the run found
      const guess = voltageCurrentCurve(steadyGapOf(gap, SEED), CURRENTS, { accuracy: 1e-4 });
      const points = CURRENTS.map((current, i) => settle(gap, current, guess[i].voltage));
      const exact = voltageCurrentCurve(
        steadyGapOf(gap, SEED),
        points.map((p) => p.current),
        { accuracy: 1e-6 },
      );
      const rows = points.map((p, i) => [
        p.current,
        p.voltage,
        p.voltage / exact[i].voltage - 1,
        p.cathodeField,
        p.cathodeField / exact[i].cathodeField - 1,
        p.layer === null ? '' : p.layer / layerOf(exact[i].x, exact[i].field) - 1,
      ]);
      printTable(`V(j) ${name}, V_s = ${least.toPrecision(6)} V`, ['current A', 'V', 'error', 'cathode field V/m', 'error', 'layer'], rows);
      for (const row of rows) {
        expect(Math.abs(Number(row[2])), `V at ${row[0]} A`).toBeLessThan(5e-3);
        expect(Math.abs(Number(row[4])), `cathode field at ${row[0]} A`).toBeLessThan(5e-3);
        expect(Math.abs(Number(row[5])), `cathode layer at ${row[0]} A`).toBeLessThan(5e-3);
      }
    });
  }
});

/** Where the least-squares line through the field, from the cathode to where it has fallen to half, reaches zero; every length counts alike. */
function layerOf(x: Float64Array, field: Float64Array): number {
  const half = field[0] / 2;
  const points: [number, number][] = [];
  for (let i = 0; field[i] > half; i++) {
    // ten points to an interval, so that a graded mesh counts by length
    for (let k = 0; k < 10; k++) points.push([x[i] + ((x[i + 1] - x[i]) * k) / 10, field[i] + ((field[i + 1] - field[i]) * k) / 10]);
  }
  const weights = points.map(([at], i) => ((points[i + 1]?.[0] ?? at) - (points[i - 1]?.[0] ?? at)) / 2);
  const sum = (f: (x: number, e: number) => number): number =>
    points.reduce((total, [at, e], i) => (e >= half ? total + weights[i] * f(at, e) : total), 0);
  const n = sum(() => 1);
  const [sx, se, sxx, sxe] = [sum((at) => at), sum((_, e) => e), sum((at) => at * at), sum((at, e) => at * e)];
  const slope = (n * sxe - sx * se) / (n * sxx - sx * sx);
  return (sx - se / slope) / n;
}

/** The linear cathode layer of lowest voltage: E = E_c (1 − x/d_c), ∫α dx = ln(1 + 1/γ), V_c = ½ E_c d_c least.
 *  (von Engel & Steenbeck 1934; here by Simpson's rule and a golden section) */
function normalLayer(gap: PlainGap): { field: number; thickness: number; voltage: number } {
  const needed = Math.log1p(1 / gap.ionYield);
  const layer = (field: number): { field: number; thickness: number; voltage: number } => {
    const n = 2000;
    let sum = 0;
    for (let i = 0; i <= n; i++) sum += (i === 0 || i === n ? 1 : i % 2 === 1 ? 4 : 2) * alphaIn(gap, (field * i) / n);
    const thickness = needed / (sum / (3 * n));
    return { field, thickness, voltage: (field * thickness) / 2 };
  };
  let low = Math.log(10 * gap.B * gap.torr);
  let high = Math.log(1e4 * gap.B * gap.torr);
  const golden = (Math.sqrt(5) - 1) / 2;
  while (high - low > 1e-9) {
    const [a, b] = [high - golden * (high - low), low + golden * (high - low)];
    if (layer(Math.exp(a)).voltage < layer(Math.exp(b)).voltage) high = b;
    else low = a;
  }
  return layer(Math.exp(low));
}

describe('the cathode layer of von Engel and Steenbeck', () => {
  it('has the constants of its resolved form: E_c = 1.639 B p, d_c = 3.681 ln(1+1/γ)/(A p), V_c = 3.017 (B/A) ln(1+1/γ)', () => {
    const { field, thickness, voltage } = normalLayer(rightOfMinimum);
    const { A, B, torr, ionYield } = rightOfMinimum;
    const L = Math.log1p(1 / ionYield);
    expect(field / (100 * B * torr)).toBeCloseTo(1.639, 3);
    expect((thickness * 100 * A * torr) / L).toBeCloseTo(3.681, 3);
    expect(voltage / ((B / A) * L)).toBeCloseTo(3.017, 3);
  });

  // gaps of about four layers: in a much longer one the column beyond the layer moves the minimum of V to a stronger field
  for (const [name, gap] of [
    ['at a yield of 0.07', rightOfMinimum],
    ['at a yield of 0.02', { ...rightOfMinimum, ionYield: 0.02, torr: 4 }],
    ['at a yield of 0.2', { ...rightOfMinimum, ionYield: 0.2, torr: 2 }],
  ] as const) {
    it(`is that of the simulated V(j) at its lowest voltage, field within 5 %, layer and ½ field × layer within 15 %, ${name}`, () => {
      const theory = normalLayer(gap);
      // the minimum is broad: nine currents over a decade around the density of the theory, a parabola in ln I through the lowest three
      const mobility = (gap.ionMobility * 1e-4) / gap.torr;
      const density = (1.07 * 8.8541878128e-12 * mobility * theory.field ** 2) / theory.thickness;
      const currents = Array.from({ length: 9 }, (_, i) => density * gap.area * 10 ** ((i - 5) / 8));
      const guess = voltageCurrentCurve(steadyGapOf(gap, SEED), currents, { accuracy: 1e-3 });
      const points = currents.map((current, i) => settle(gap, current, guess[i].voltage));
      let k = 0;
      points.forEach((p, i) => {
        if (p.voltage < points[k].voltage) k = i;
      });
      expect(k).toBeGreaterThan(0);
      expect(k).toBeLessThan(points.length - 1);
      const near = [points[k - 1], points[k], points[k + 1]];
      const [a, , c] = near.map((p) => p.voltage);
      const shift = (0.5 * (a - c)) / (a - 2 * points[k].voltage + c);
      const at = (pick: (p: Point) => number): number => {
        const [l, m, r] = near.map(pick);
        return m + 0.5 * shift * (r - l) + 0.5 * shift ** 2 * (l - 2 * m + r);
      };
      const field = at((p) => p.cathodeField);
      const layer = at((p) => p.layer ?? Number.NaN);
      printTable(
        `cathode layer at the minimum of V(j), ${name}: ${points[k].current.toPrecision(3)} A, V = ${points[k].voltage.toPrecision(5)} V`,
        ['', 'von Engel–Steenbeck', 'run', 'difference'],
        [
          ['cathode field V/m', theory.field, field, field / theory.field - 1],
          ['layer m', theory.thickness, layer, layer / theory.thickness - 1],
          ['½ field × layer V', theory.voltage, (field * layer) / 2, (field * layer) / 2 / theory.voltage - 1],
        ],
      );
      expect(Math.abs(field / theory.field - 1)).toBeLessThan(0.05);
      expect(Math.abs(layer / theory.thickness - 1)).toBeLessThan(0.15);
      expect(Math.abs((field * layer) / 2 / theory.voltage - 1)).toBeLessThan(0.15);
    });
  }
});
