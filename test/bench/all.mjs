/** Every bench, one after the other: `npm run bench`; with `-- --json` one JSON object of all figures. Each stands alone too: `node test/bench/NAME.mjs`. */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const json = process.argv.includes('--json');
const figures = {};
for (const name of ['bench', 'scan', 'window', 'swarm', 'kinetic', 'report']) {
  const path = fileURLToPath(new URL(`${name}.mjs`, import.meta.url));
  const { status, stdout } = spawnSync(process.execPath, [path, ...process.argv.slice(2)], {
    stdio: ['inherit', json ? 'pipe' : 'inherit', 'inherit'],
    maxBuffer: 1e8,
  });
  if (status !== 0) process.exitCode = 1;
  else if (json) {
    const record = JSON.parse(stdout.toString());
    // scans, windows, swarms and kinetic cases speak of several walls: each under its own name
    Object.assign(figures, name === 'bench' || name === 'report' ? record : { [name]: record });
  }
}
if (json) console.log(JSON.stringify(figures));
