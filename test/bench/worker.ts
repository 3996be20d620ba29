/** One measurement in a fresh process: `CASE CELLS REPEATS`; prints one JSON object. */
import { performance } from 'node:perf_hooks';
import { simulateNow } from '../../src/simulate.ts';
import { others, referenceGlow } from './cases.ts';

const [name, cellsText, repeatsText] = process.argv.slice(2);
const bench = [referenceGlow, ...others].find((b) => b.name === name);
if (!bench) throw new Error(`no case ${name}`);
const cells = cellsText === 'default' ? null : Number(cellsText);
const walls: number[] = [];
let outcome = simulateTimed();
for (let k = 1; k < Number(repeatsText); k++) outcome = simulateTimed();

function simulateTimed() {
  const settings = (bench as typeof referenceGlow).make(cells, 1e-3);
  const start = performance.now();
  const result = simulateNow(settings);
  walls.push(performance.now() - start);
  return result;
}

const first = walls[0];
const warm = walls.slice(Math.min(5, walls.length - 1)).sort((a, b) => a - b);
process.stdout.write(
  JSON.stringify({
    median_ms: warm[warm.length >> 1],
    least_ms: warm[0],
    first_ms: first,
    steps: outcome.numerics.steps,
    rejected: outcome.numerics.rejected,
    newton: outcome.numerics.newton,
    cells: outcome.numerics.cells,
    peak_memory_MB: process.resourceUsage().maxRSS / 1024,
    outcome: {
      crossings: outcome.currents.map((c) => c.time_s),
      peak: outcome.peak.current_A,
      voltage: outcome.final.gap_voltage_V,
      current: outcome.final.current_A,
      gap_J: outcome.energy.gap_J,
      time: outcome.final.time_s,
      growth: outcome.onset.growth_rate_per_s,
      period: outcome.oscillation?.period_s ?? null,
    },
  }),
);
