/** Measures how long the pages of reports take to open in a browser, from the navigation until all figures are drawn: part of `npm run bench`; alone:
 *  `node test/bench/report.mjs [--json]`. The bars: a run of 2,000 snapshots and a scan of 10,000 points within 2 s. Medians of five, each in a fresh
 *  browser context. Results are appended to bench-results.jsonl. */
import { execFileSync } from 'node:child_process';
import { appendFileSync, existsSync, mkdtempSync, rmSync, statSync } from 'node:fs';
import { loadavg } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';
import { chromium } from 'playwright-core';

const here = fileURLToPath(new URL('.', import.meta.url));
const main = join(here, '../../dist/main.js');
// beside node_modules, where the libraries of the bundle are found
const folder = mkdtempSync(join(here, '../../node_modules/.cache-bench-report-'));
const json = process.argv.includes('--json');

try {
  const executablePath = [process.env.CHROMIUM ?? '', '/usr/bin/chromium', '/usr/bin/chromium-browser'].find(
    (path) => path !== '' && existsSync(path),
  );
  if (executablePath === undefined) throw new Error('no chromium here; CHROMIUM names one');
  const at = (name) => join(folder, name);
  const script = at('report-files.mjs');
  await build({
    entryPoints: [join(here, 'report-files.ts')],
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    outfile: script,
    external: ['h5wasm', 'h5wasm/*', 'vitest'],
    logLevel: 'warning',
    banner: { js: "import{createRequire as __cr}from'node:module';const require=__cr(import.meta.url);" },
  });
  const quiet = { stdio: ['ignore', 'ignore', 'inherit'] };
  execFileSync(
    process.execPath,
    [main, 'run', join(here, '../../cases/feedthrough-step-to-glow.yaml'), '-o', at('short.h5'), '--quiet'],
    quiet,
  );
  execFileSync(process.execPath, [script, at('short.h5'), at('run.h5'), at('scan.h5')], { stdio: ['ignore', 'ignore', 'ignore'] });
  const result = { date: new Date().toISOString(), bench: 'report', load: Number(loadavg()[0].toFixed(2)) };
  for (const kind of ['run', 'scan']) {
    const start = performance.now();
    execFileSync(process.execPath, [main, 'report', at(`${kind}.h5`), '--quiet'], quiet);
    result[`report_${kind}_write_ms`] = Math.round(performance.now() - start);
    result[`report_${kind}_bytes`] = statSync(at(`${kind}.html`)).size;
    result[`report_${kind}_open_ms`] = await opened(executablePath, at(`${kind}.html`));
  }
  appendFileSync(join(here, '../../bench-results.jsonl'), `${JSON.stringify(result)}\n`);
  if (json) console.log(JSON.stringify(result));
  else
    for (const kind of ['run', 'scan'])
      console.log(
        `page of a ${kind}: opens in ${result[`report_${kind}_open_ms`]} ms, ${(result[`report_${kind}_bytes`] / 1e3).toFixed(0)} kB, written in ${result[`report_${kind}_write_ms`]} ms`,
      );
} finally {
  rmSync(folder, { recursive: true, force: true });
}

/** [ms] median of five */
async function opened(executablePath, path) {
  const browser = await chromium.launch({
    executablePath,
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking'],
  });
  const walls = [];
  try {
    for (let k = 0; k < 5; k++) {
      const context = await browser.newContext({ viewport: { width: 1400, height: 900 } });
      const tab = await context.newPage();
      const start = performance.now();
      await tab.goto(pathToFileURL(path).href);
      await tab.waitForSelector('body[data-ready]');
      walls.push(performance.now() - start);
      await context.close();
    }
  } finally {
    await browser.close();
  }
  return Math.round(walls.sort((a, b) => a - b)[2]);
}
