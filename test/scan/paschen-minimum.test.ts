/** The Paschen minimum as a user finds it: a scan over pressure with a search for the hold-off voltage at each point. Closed form of
 *  α/p = A exp(−B p/E): V = e (B/A) ln(1 + 1/γ) at p d = (e/A) ln(1 + 1/γ). Source: Townsend's criterion; e.g. Raizer, Gas Discharge
 *  Physics, 1991, section 7.2 (from memory). The runs know neither formula: each voltage lies between one that held and one that did not. */
import { expect, it } from 'vitest';
import { realProgram } from '../commands/program.ts';
import { printTable } from '../help/table.ts';

const [A, B, ionYield] = [12, 180, 0.07];
const loops = Math.log(1 + 1 / ionYield);
const exact = { voltage: (Math.E * B * loops) / A, column: (Math.E * loops) / A };

const CASE = `gap: { geometry: planar, spacing: 1 cm, area: 10 cm^2 }
gas:
  pressure: 1 Torr
  temperature: 300 K
  coefficients:
    ionisation: { form: exponential, A: ${A} 1/(cm Torr), B: ${B} V/(cm Torr) }
    electron_mobility: 3e5 cm^2 Torr/(V s)
    ion_mobility: 1400 cm^2 Torr/(V s)
    electron_energy: 1 V
    ion_energy: 0.026 V
    reference_temperature: 300 K
electrodes: { left: { ion_yield: ${ionYield} } }
seed: { cathode_current: 1e-14 A }
supply: { voltage: { step: 100 V }, series_resistance: 0 ohm }
observe: { until: 0.3 s }
numerics: { cells: 60 }
scan:
  vary: [{ path: gas.pressure, from: 0.5 Torr, to: 0.76 Torr, points: 7, spacing: log }]
  find: { what: hold-off, from: 60 V, to: 400 V, tolerance: 0.05 % }
`;

interface Point {
  readonly values: readonly number[];
  readonly found: { readonly state: string; readonly lower: number; readonly upper: number };
}

/** The lowest point of the parabola through ln V against ln p, by least squares. */
function lowest(points: readonly { readonly x: number; readonly y: number }[]): { x: number; y: number } {
  const n = points.length;
  const middle = points.reduce((sum, p) => sum + p.x, 0) / n;
  const u = points.map((p) => p.x - middle);
  const mean = (f: (i: number) => number): number => points.reduce((sum, _, i) => sum + f(i), 0) / n;
  // evenly spaced in x: odd moments vanish
  const [s2, s4] = [mean((i) => u[i] ** 2), mean((i) => u[i] ** 4)];
  const [y0, y1, y2] = [mean((i) => points[i].y), mean((i) => points[i].y * u[i]), mean((i) => points[i].y * u[i] ** 2)];
  const slope = y1 / s2;
  const bend = (y2 - s2 * y0) / (s4 - s2 * s2);
  const at = -slope / (2 * bend);
  return { x: middle + at, y: y0 - bend * s2 + slope * at + bend * at * at };
}

const program = realProgram();

it('a scan over pressure with a hold-off search finds the Paschen minimum, voltage within 0.2 % and pd within 1.5 %', async () => {
  const { code, out, err } = await program.run(['scan', program.write('minimum.yaml', CASE), '--json']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  const points = (JSON.parse(out) as { points: readonly Point[] }).points;
  for (const { found } of points) expect(found.state).toBe('found');
  const { x, y } = lowest(
    points.map(({ values, found }) => ({ x: Math.log(values[0]), y: Math.log(Math.sqrt(found.lower * found.upper)) })),
  );
  const [column, voltage] = [Math.exp(x) / 133.322368, Math.exp(y)];
  printTable(
    'Paschen minimum by scan',
    ['V closed form', 'V by scan', 'error', 'pd closed form', 'pd by scan', 'error'],
    [[exact.voltage, voltage, voltage / exact.voltage - 1, exact.column, column, column / exact.column - 1]],
  );
  // over ±h in ln p a parabola misses the cubic part of the curve, −u³/3, which moves its lowest point by h²/5: 0.9 % for h = 0.21
  expect(Math.abs(voltage / exact.voltage - 1)).toBeLessThan(2e-3);
  expect(Math.abs(column / exact.column - 1)).toBeLessThan(0.015);
});
