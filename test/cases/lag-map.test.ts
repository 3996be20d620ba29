/** The lag map of cases/ on fewer points: what its opening comment says of it. */
import { copyFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import type { ScanPoint } from '../../src/results/scan-variables.ts';
import { realProgram } from '../commands/program.ts';

const program = realProgram();
const shipped = fileURLToPath(new URL('../../cases/lag-map.yaml', import.meta.url));

test('the lag falls from a millisecond near the threshold to tens of microseconds at twice it, at every pressure', async () => {
  copyFileSync(shipped, join(program.folder(), 'lag-map.yaml'));
  const vary =
    '[{ path: gas.pressure, values: [2 Torr, 5.657 Torr] }, { path: supply.voltage.step, values: [120 V, 180 V, 200 V, 240 V, 300 V] }]';
  const { code, out } = await program.run(['scan', 'lag-map.yaml', '--json', '--set', `scan.vary=${vary}`]);
  expect(code).toBe(0);
  const points = (JSON.parse(out) as { points: ScanPoint[] }).points;
  expect(points.length).toBe(10);
  const lags = points.map(({ outcome }) => outcome?.onset.formative_lag_s ?? null);
  const [low, high] = [lags.slice(0, 5), lags.slice(5)] as const;
  for (const row of [low, high]) {
    // below threshold there is none
    expect(row[0]).toBe(null);
    const falling = row.slice(1) as number[];
    for (let i = 1; i < falling.length; i++) expect(falling[i]).toBeLessThan(falling[i - 1] as number);
  }
  // V_s is 122 V and 176 V; the figures of the comment, to 10 %: the pressures are rounded
  const near = (value: number | null | undefined, expected: number): void =>
    expect(Math.abs((value ?? Number.NaN) / expected - 1)).toBeLessThan(0.1);
  near(points[6]?.outcome?.theory.overvoltage, 0.021);
  near(high[1], 0.9e-3);
  near(high[2], 0.142e-3);
  near(points[3]?.outcome?.theory.overvoltage, 0.96);
  near(low[3], 20.2e-6);
});
