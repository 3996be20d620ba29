/** Measures the canonical cases, each in a fresh process: `npm run bench`, or `npm run bench -- --json` for one JSON object.
 *  Times are wall times of one run on one core; `first` is the first run of a process. Errors are against a converged run
 *  (4 times the cells, a hundredth of the tolerance), kept beside this file by version; results are appended to bench-results.jsonl. */
import { execFileSync } from 'node:child_process';
import { appendFileSync, mkdtempSync, rmSync } from 'node:fs';
import { cpus, tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const here = fileURLToPath(new URL('.', import.meta.url));
const json = process.argv.includes('--json');
const folder = mkdtempSync(join(tmpdir(), 'gapwake-bench-'));
const banner = { js: "import{createRequire as __cr}from'node:module';const require=__cr(import.meta.url);" };

async function bundle(name) {
  const outfile = join(folder, `${name}.mjs`);
  await build({
    entryPoints: [join(here, `${name}.ts`)],
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    outfile,
    banner,
    logLevel: 'warning',
  });
  return outfile;
}

const worker = await bundle('worker');
const converge = await bundle('converge');
const measure = (name, cells, repeats) =>
  JSON.parse(execFileSync(process.execPath, [worker, name, String(cells), String(repeats)], { maxBuffer: 1e8 }));
const exact = (name) => JSON.parse(execFileSync(process.execPath, [converge, name], { maxBuffer: 1e8 }));

function relative(a, b) {
  if (a === null || b === null || b === 0) return null;
  return Math.abs(a / b - 1);
}

/** The largest relative error over what the bars name: crossing times, peak, final voltage and current, energy. */
function errorOf(run, best) {
  const parts = {
    crossings: Math.max(0, ...run.outcome.crossings.map((t, i) => relative(t, best.crossings[i]) ?? 0)),
    peak: relative(run.outcome.peak, best.peak),
    voltage: relative(run.outcome.voltage, best.voltage),
    current: relative(run.outcome.current, best.current),
    // runs that end early as steady end at different times, and energy goes on growing: compare it only over the same time
    energy: Math.abs(run.outcome.time / best.time - 1) < 1e-9 ? relative(run.outcome.gap_J, best.gap_J) : null,
  };
  return { largest: Math.max(...Object.values(parts).map((v) => v ?? 0)), ...parts };
}

function entry(name, cells, repeats, best) {
  const run = measure(name, cells, repeats);
  return {
    median_ms: run.median_ms,
    least_ms: run.least_ms,
    first_ms: run.first_ms,
    cells: run.cells,
    steps: run.steps,
    rejected: run.rejected,
    newton: run.newton,
    ns_per_cell_and_newton: (run.median_ms * 1e6) / (run.cells * run.newton),
    peak_memory_MB: run.peak_memory_MB,
    error: errorOf(run, best).largest,
    errors: errorOf(run, best),
  };
}

const glow = exact('reference-glow');
const results = {
  'reference-glow': Object.fromEntries([200, 400, 'default'].map((cells) => [String(cells), entry('reference-glow', cells, 120, glow)])),
};
for (const name of ['growth-only', 'slow-ramp', 'relaxation-oscillation']) {
  results[name] = { default: entry(name, 'default', name === 'relaxation-oscillation' ? 4 : 40, exact(name)) };
}
results.node_ms = wallOf(['-e', '0']);
results.help_ms = wallOf([join(here, '../../dist/main.js'), '--help']);
const record = { date: new Date().toISOString(), node: process.version, cpu: cpus()[0]?.model ?? 'unknown', ...results };
appendFileSync(join(here, '../../bench-results.jsonl'), `${JSON.stringify(record)}\n`);
rmSync(folder, { recursive: true, force: true });

if (json) console.log(JSON.stringify(record));
else table(record);

/** Median wall time of a whole Node process [ms]. `node -e 0` tells how fast the machine is at the moment. */
function wallOf(argv) {
  const walls = [];
  for (let k = 0; k < 15; k++) {
    const start = performance.now();
    execFileSync(process.execPath, argv);
    walls.push(performance.now() - start);
  }
  return walls.sort((a, b) => a - b)[7];
}

function table(r) {
  console.log(`${r.date.slice(0, 10)}, Node ${r.node}, ${r.cpu}`);
  console.log('case                            cells  median    first   steps  newton  ns/cell  memory   error');
  for (const [name, sizes] of Object.entries(r)) {
    if (typeof sizes !== 'object' || sizes === null) continue;
    for (const [size, e] of Object.entries(sizes)) {
      const label = `${name}${name === 'reference-glow' ? ` (${size})` : ''}`;
      console.log(
        `${label.padEnd(31)} ${String(e.cells).padStart(5)} ${`${e.median_ms.toFixed(1)} ms`.padStart(8)} ${`${e.first_ms.toFixed(0)} ms`.padStart(7)} ${String(e.steps).padStart(7)} ${String(e.newton).padStart(7)} ${e.ns_per_cell_and_newton.toFixed(0).padStart(8)} ${`${e.peak_memory_MB.toFixed(0)} MB`.padStart(7)} ${`${(100 * e.error).toFixed(2)} %`.padStart(7)}`,
      );
    }
  }
  console.log(`gapwake --help: ${r.help_ms.toFixed(0)} ms; a bare Node process at the same time: ${r.node_ms.toFixed(0)} ms`);
}
