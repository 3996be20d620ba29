/** Measures a pressure window as a user runs it: the built program, two workers, cases/balloon-bay-ascent.yaml at default resolution (a bay on a three-hour
 *  ascent, air, yields at both ends of their spread). `node test/bench/window.mjs [--json]`; bar: 20 s on 2 cores, on a quiet machine. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { cpus, loadavg, tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));
const folder = mkdtempSync(join(tmpdir(), 'gapwake-window-bench-'));
const walls = { 1: [], 2: [] };
let outcome;
try {
  for (const workers of [2, 1, 2, 1]) {
    const before = performance.now();
    const args = [
      'window',
      join(root, 'cases/balloon-bay-ascent.yaml'),
      '--workers',
      String(workers),
      '--restart',
      '--json',
      '-o',
      join(folder, 'a.h5'),
    ];
    const out = execFileSync(process.execPath, [join(root, 'dist/main.js'), ...args], { maxBuffer: 1e8 });
    walls[workers].push((performance.now() - before) / 1000);
    outcome = JSON.parse(out);
  }
} finally {
  rmSync(folder, { recursive: true, force: true });
}
const [two, one] = [2, 1].map((workers) => Math.min(...walls[workers]));
const result = {
  date: new Date().toISOString(),
  node: process.version,
  cpu: cpus()[0]?.model ?? 'unknown',
  load: loadavg()[0],
  wall_2_workers_s: two,
  wall_1_worker_s: one,
  instants: outcome.numerics.instants,
  runs: outcome.numerics.runs,
};
if (process.argv.includes('--json')) console.log(JSON.stringify(result));
else {
  console.log(`${result.date.slice(0, 10)}, Node ${result.node}, ${result.cpu}, load ${result.load.toFixed(1)}`);
  console.log(
    `window over a 3-hour ascent: ${two.toFixed(1)} s with 2 workers, ${one.toFixed(1)} s with 1 (${result.instants} instants, ${result.runs} runs)`,
  );
}
