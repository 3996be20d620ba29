/** Writes a picture of each kind of page at two widths, light and dark, and prints the list: `npm run shots -- [FOLDER]`. */
import { execFileSync } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { browserPath, launch } from './help/browser.ts';

const root = fileURLToPath(new URL('../..', import.meta.url));
const folder = resolve(process.argv[2] ?? join(root, 'node_modules', '.cache', 'gapwake-shots'));
const program = join(root, 'dist', 'main.js');

/** Page kinds: name, and the arguments that make their result. */
const RESULTS: readonly (readonly [name: string, command: string, file: string, more: readonly string[]])[] = [
  ['run-glow', 'run', 'feedthrough-step-to-glow.yaml', []],
  ['run-trip', 'run', 'trip-without-stored-charge.yaml', []],
];

if (browserPath() === null) throw new Error('no chromium here; CHROMIUM names one');
mkdirSync(folder, { recursive: true });
const browser = await launch();
try {
  for (const [name, command, file, more] of RESULTS) {
    const result = join(folder, `${name}.h5`);
    const page = join(folder, `${name}.html`);
    execFileSync(process.execPath, [program, command, join(root, 'cases', file), '-o', result, '--quiet', ...more]);
    execFileSync(process.execPath, [program, 'report', result, '-o', page, '--quiet']);
    for (const width of [1400, 420])
      for (const colorScheme of ['light', 'dark'] as const) {
        const context = await browser.newContext({ viewport: { width, height: 900 }, colorScheme });
        const tab = await context.newPage();
        await tab.goto(pathToFileURL(page).href);
        await tab.waitForSelector('body[data-ready]');
        const shot = join(folder, `${name}-${width}-${colorScheme}.png`);
        await tab.screenshot({ path: shot, fullPage: true });
        console.log(shot);
        await context.close();
      }
  }
} finally {
  await browser.close();
}
