/** Every bench, one after the other: `npm run bench`; with `-- --json` one JSON object a line. */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

for (const name of ['bench.mjs', 'scan.mjs', 'report.mjs']) {
  const { status } = spawnSync(process.execPath, [fileURLToPath(new URL(name, import.meta.url)), ...process.argv.slice(2)], {
    stdio: 'inherit',
  });
  if (status !== 0) process.exitCode = 1;
}
