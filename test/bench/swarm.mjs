/** Measures electrons as particles: part of `npm run bench`; alone: `node test/bench/swarm.mjs [--json]`. Real collisions per second of one core in argon, in
 *  a fresh process, and the wall time of a swarm request by the built program with one and two workers. The bars: 1.0e7 at 100 Td, 2 workers at least 1.8
 *  times one. Results are appended to bench-results.jsonl. */
import { execFileSync } from 'node:child_process';
import { appendFileSync, mkdtempSync, rmSync } from 'node:fs';
import { cpus, loadavg, tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const here = fileURLToPath(new URL('.', import.meta.url));
const main = join(here, '../../dist/main.js');
const folder = mkdtempSync(join(tmpdir(), 'gapwake-bench-swarm-'));
const load = loadavg()[0];
let collisions;
const walls = { 1: [], 2: [] };
try {
  const worker = join(folder, 'worker.mjs');
  await build({
    entryPoints: [join(here, 'swarm-worker.ts')],
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    outfile: worker,
    logLevel: 'warning',
  });
  collisions = Object.fromEntries(
    [20, 100, 500].map((td) => [`${td}_Td`, JSON.parse(execFileSync(process.execPath, [worker, String(td), '12']))]),
  );
  for (const workers of [2, 1, 2, 1]) {
    const start = performance.now();
    const args = [
      'swarm',
      'argon',
      '--from',
      '100 Td',
      '--to',
      '400 Td',
      '--points',
      '6',
      '--accuracy',
      '1 %',
      '--workers',
      String(workers),
      '--json',
    ];
    execFileSync(process.execPath, [main, ...args], { maxBuffer: 1e8 });
    walls[workers].push((performance.now() - start) / 1000);
  }
} finally {
  rmSync(folder, { recursive: true, force: true });
}

const [two, one] = [2, 1].map((workers) => Math.min(...walls[workers]));
const result = {
  date: new Date().toISOString(),
  node: process.version,
  cpu: cpus()[0]?.model ?? 'unknown',
  load,
  collisions_per_s: collisions['100_Td'].collisions_per_s,
  collisions,
  one_worker_s: one,
  two_workers_s: two,
  ratio: one / two,
};
appendFileSync(join(here, '../../bench-results.jsonl'), `${JSON.stringify({ bench: 'swarm', ...result })}\n`);
if (process.argv.includes('--json')) console.log(JSON.stringify(result));
else {
  console.log(`\nElectrons as particles, argon (load before: ${load.toFixed(1)})`);
  for (const [field, rate] of Object.entries(collisions)) {
    const [median, best] = [rate.collisions_per_s, rate.best_collisions_per_s].map((value) => (value / 1e6).toFixed(1));
    console.log(`  ${field.replace('_', ' ')}: ${median} million real collisions a second and core, at best ${best}`);
  }
  console.log(`  swarm of 6 fields: 2 workers ${two.toFixed(1)} s, 1 worker ${one.toFixed(1)} s: ${(one / two).toFixed(2)} times`);
}
