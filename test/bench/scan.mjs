/** Measures scans with the built program: part of `npm run bench`; alone: `node test/bench/scan.mjs [--json]`. The bars (2 cores): 1,000 points of growth and
 *  glow in at most 30 s, 2 workers at least 1.8 times one, at most 1 ms a point outside the solver, a plan of 10^6 points started within 2 s and the
 *  process below 400 MB. Results are appended to bench-results.jsonl. */
import { spawn } from 'node:child_process';
import { appendFileSync, existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { cpus, loadavg, tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const here = fileURLToPath(new URL('.', import.meta.url));
const main = join(here, '../../dist/main.js');
const folder = mkdtempSync(join(tmpdir(), 'gapwake-bench-scan-'));

/** The open case, every point of which grows from 0.1 nA to a glow: 5 to 50 % above threshold, behind 10 to 100 kohm. */
const caseOf = (vary) => `title: Growth and glow
gap: { geometry: planar, spacing: 1 cm, area: 10 cm^2 }
gas:
  pressure: 3 Torr
  temperature: 300 K
  coefficients:
    ionisation: { form: exponential, A: 12 1/(cm Torr), B: 180 V/(cm Torr) }
    electron_mobility: 3e5 cm^2 Torr/(V s)
    ion_mobility: 1400 cm^2 Torr/(V s)
    electron_energy: 1 V
    ion_energy: 0.026 V
    reference_temperature: 300 K
electrodes: { left: { ion_yield: 0.07 } }
seed: { cathode_current: 1e-10 A }
supply: { voltage: { step: 230 V }, series_resistance: 10 kohm, parallel_capacitance: 100 pF }
observe: { until: 2 ms, currents: [1 uA, 10 uA, 100 uA, 1 mA] }
scan: { vary: [${vary}] }
`;
const grid = (voltages, resistances) =>
  caseOf(`{ path: supply.voltage.step, from: 220 V, to: 314 V, points: ${voltages} },
  { path: supply.series_resistance, from: 10 kohm, to: 100 kohm, points: ${resistances}, spacing: log }`);

/** One whole scan. @returns wall time of the process, and of it what the solver took [s] */
async function scan(name, text, workers) {
  const path = join(folder, `${name}.yaml`);
  writeFileSync(path, text);
  const start = performance.now();
  const child = spawn(process.execPath, [main, 'scan', path, '--workers', String(workers), '--json', '--restart']);
  let out = '';
  child.stdout.setEncoding('utf8').on('data', (piece) => {
    out += piece;
  });
  const code = await new Promise((resolve) => child.on('close', resolve));
  const wall = (performance.now() - start) / 1000;
  if (code !== 0) throw new Error(`${name}: exit code ${code}`);
  const points = JSON.parse(out).points;
  const glows = points.filter((point) => point.outcome.verdict.regime === 'glow' || point.outcome.verdict.regime === 'arc-risk').length;
  return { wall, points: points.length, glows, solver: points.reduce((sum, point) => sum + point.outcome.numerics.wall_s, 0) };
}

/** Starts a plan of 10^6 points, waits for the first finished one, watches memory for a while and stops it. */
async function million() {
  const path = join(folder, 'million.yaml');
  const journal = join(folder, 'million.scan.part');
  writeFileSync(path, grid(1000, 1000));
  const start = performance.now();
  const child = spawn(process.execPath, [main, 'scan', path], { stdio: 'ignore' });
  const pause = (ms) => new Promise((resume) => setTimeout(resume, ms));
  // the journal is there once the plan is known and workers are being started; a point takes what it takes
  while (!existsSync(journal)) await pause(2);
  const planned = (performance.now() - start) / 1000;
  const header = statSync(journal).size;
  while (statSync(journal).size <= header) await pause(2);
  const first = (performance.now() - start) / 1000;
  await pause(10_000);
  const status = existsSync(`/proc/${child.pid}/status`) ? readFileSync(`/proc/${child.pid}/status`, 'utf8') : '';
  const memory = Number(/VmHWM:\s+(\d+)/.exec(status)?.[1] ?? Number.NaN) / 1024;
  child.kill('SIGINT');
  await new Promise((resolve) => child.on('close', resolve));
  return { planned_s: planned, first_point_s: first, peak_memory_MB: Number.isNaN(memory) ? null : memory };
}

const load = loadavg()[0];
const single = await scan('single', grid(1, 1).replaceAll(/from: ([^,]+), to: [^,]+, points: 1(, spacing: log)?/g, 'values: [$1]'), 1);
const one = await scan('one', grid(25, 40), 1);
const two = await scan('two', grid(25, 40), 2);
const plan = await million();
rmSync(folder, { recursive: true, force: true });

const results = {
  points: two.points,
  glows: two.glows,
  one_worker_s: one.wall,
  two_workers_s: two.wall,
  ratio: one.wall / two.wall,
  solver_ms_per_point: (one.solver / one.points) * 1000,
  overhead_ms_per_point: ((one.wall - one.solver - (single.wall - single.solver)) / (one.points - 1)) * 1000,
  start_and_end_s: single.wall - single.solver,
  million: plan,
};
const record = { date: new Date().toISOString(), node: process.version, cpu: cpus()[0]?.model ?? 'unknown', load, scan: results };
appendFileSync(join(here, '../../bench-results.jsonl'), `${JSON.stringify(record)}\n`);
if (process.argv.includes('--json')) console.log(JSON.stringify(record));
else {
  console.log(`\nScan of ${results.points} points of growth and glow (load before: ${load.toFixed(1)})`);
  console.log(
    `  2 workers ${results.two_workers_s.toFixed(1)} s, 1 worker ${results.one_worker_s.toFixed(1)} s: ${results.ratio.toFixed(2)} times`,
  );
  console.log(`  a point: solver ${results.solver_ms_per_point.toFixed(1)} ms, all else ${results.overhead_ms_per_point.toFixed(2)} ms`);
  console.log(`  start, end and result file: ${results.start_and_end_s.toFixed(2)} s`);
  const { planned_s, first_point_s, peak_memory_MB } = plan;
  const memory = peak_memory_MB === null ? 'memory unknown' : `${peak_memory_MB.toFixed(0)} MB at most`;
  console.log(`  10^6 points: begun after ${planned_s.toFixed(2)} s, first point after ${first_point_s.toFixed(2)} s, ${memory}`);
}
