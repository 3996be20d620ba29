/** Every check, one after the other: types, lint, layers, unused code, then both sets of tests. Ends with `N passed, N failed`.
 *  With CI=true a skipped test counts as failed. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const folder = mkdtempSync(join(tmpdir(), 'gapwake-checks-'));
let passed = 0;
let failed = 0;

function run(name, command, args) {
  console.log(`\n== ${name}`);
  const { status } = spawnSync(command, args, { stdio: 'inherit', env: { ...process.env, FORCE_COLOR: '0' } });
  return status === 0;
}

function check(name, command, args) {
  if (run(name, command, args)) passed++;
  else failed++;
}

function tests(project, workers) {
  const report = join(folder, `${project}.json`);
  const clean = run(`tests: ${project}`, 'npx', [
    'vitest',
    'run',
    '--project',
    project,
    `--maxWorkers=${workers}`,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
  ]);
  let result;
  try {
    result = JSON.parse(readFileSync(report, 'utf8'));
  } catch {
    failed++;
    return;
  }
  const skipped = result.numPendingTests + (result.numTodoTests ?? 0);
  passed += result.numPassedTests;
  failed += result.numFailedTests;
  if (skipped > 0) {
    console.log(`${skipped} skipped`);
    if (process.env.CI === 'true') failed += skipped;
  }
  // a file that fails outside any test, or an unhandled error
  if (!clean && result.numFailedTests === 0) failed++;
}

check('types', 'npx', ['tsc', '--noEmit']);
check('lint', 'npx', ['biome', 'check', '.']);
check('layers', 'npx', ['depcruise', '--config', '.dependency-cruiser.cjs', 'src']);
check('unused code', 'npx', ['knip']);
check('build', 'npm', ['run', '--silent', 'build']);
tests('fast', 2);
// these start programs and workers of their own
tests('long', 1);
rmSync(folder, { recursive: true, force: true });
console.log(`\n${passed} passed, ${failed} failed`);
process.exitCode = failed === 0 ? 0 : 1;
