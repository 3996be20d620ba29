/** Measures cases with electrons as particles: part of `npm run bench`; alone: `node test/bench/kinetic.mjs [--json]`. Wall time of `check` and `run` by the
 *  built program on all cores. The bars: check in 5 s with q within 1 %, a step to a glow in 60 s on 2 cores. Results are appended to bench-results.jsonl. */
import { execFileSync } from 'node:child_process';
import { appendFileSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { cpus, loadavg, tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const here = fileURLToPath(new URL('.', import.meta.url));
const main = join(here, '../../dist/main.js');
const folder = mkdtempSync(join(tmpdir(), 'gapwake-bench-kinetic-'));
/** the canonical glow's gap, by particles */
const glow = `
title: Step to a glow by particles
gap: { geometry: planar, spacing: 1 cm, area: 10 cm^2 }
gas: { name: argon, pressure: 3 Torr, temperature: 300 K }
electrodes: { left: { ion_yield: 0.07 } }
seed: { cathode_current: 0.1 nA }
supply: { voltage: { step: 230 V, rise_time: 1 us }, series_resistance: 10 kohm, parallel_capacitance: 100 pF }
electrons: { closure: kinetic }
observe: { until: 2 ms }
`;
const load = loadavg()[0];
const timed = (...args) => {
  const start = performance.now();
  const answer = JSON.parse(execFileSync(process.execPath, [main, ...args, '--json'], { maxBuffer: 1e8 }).toString());
  return { seconds: (performance.now() - start) / 1000, answer };
};
const record = (path) => {
  const check = timed('check', path);
  const run = timed('run', path);
  const { feedback, feedback_error, breakdown_voltage_V, breakdown_voltage_V_error } = check.answer.kinetics;
  return {
    check_s: check.seconds,
    feedback_relative_error: feedback_error / feedback,
    breakdown_relative_error: breakdown_voltage_V_error / breakdown_voltage_V,
    run_s: run.seconds,
    steps: run.answer.numerics.steps,
    stop: run.answer.final.stop,
  };
};
let cases;
try {
  const path = join(folder, 'glow.yaml');
  writeFileSync(path, glow);
  cases = { '3_Torr_cm': record(path), 'thin-argon-by-particles': record(join(here, '../../cases/thin-argon-by-particles.yaml')) };
} finally {
  rmSync(folder, { recursive: true, force: true });
}
const result = { date: new Date().toISOString(), node: process.version, cpu: cpus()[0]?.model ?? 'unknown', load, cases };
appendFileSync(join(here, '../../bench-results.jsonl'), `${JSON.stringify({ bench: 'kinetic', ...result })}\n`);
if (process.argv.includes('--json')) console.log(JSON.stringify(result));
else {
  console.log(`\nCases by particles (load before: ${load.toFixed(1)})`);
  for (const [name, c] of Object.entries(cases)) {
    const error = (100 * c.feedback_relative_error).toFixed(1);
    console.log(`  ${name}: check ${c.check_s.toFixed(1)} s, q to ${error} %; run ${c.run_s.toFixed(1)} s, ${c.steps} steps, ${c.stop}`);
  }
}
