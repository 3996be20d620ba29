/** Writes a picture of each kind of page at two widths, light and dark, and prints the list: `npm run shots -- [FOLDER]`. */
import { execFileSync } from 'node:child_process';
import { mkdirSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { browserPath, launch } from './help/browser.ts';

const root = fileURLToPath(new URL('../..', import.meta.url));
const folder = resolve(process.argv[2] ?? join(root, 'node_modules', '.cache', 'gapwake-shots'));
const program = join(root, 'dist', 'main.js');
const shipped = (name: string): string => join(root, 'cases', name);

/** Page kinds: a name, and the arguments that make their result. */
const RESULTS: readonly (readonly [name: string, command: string, path: string, more?: readonly string[]])[] = [
  ['run-glow', 'run', shipped('feedthrough-step-to-glow.yaml')],
  ['run-trip', 'run', shipped('trip-without-stored-charge.yaml')],
  ['run-attaching', 'run', shipped('balloon-detector-holds.yaml')],
  ['window', 'window', shipped('chamber-pump-down.yaml')],
  ['scan-map', 'scan', shipped('lag-map.yaml')],
  ['scan-curve', 'scan', join(folder, 'hold-off.yaml')],
];

/** One varied entry, with a search. */
const HOLD_OFF = `title: Hold-off voltage of a feedthrough, over pressure
gap: { geometry: planar, spacing: 5 mm, area: 40 cm^2, longest_path: 20 mm }
gas: { name: argon, pressure: 4 Torr, temperature: 295 K }
electrodes: { left: { material: stainless steel } }
seed: { cathode_current: 1 pA }
supply: { voltage: { step: 220 V }, series_resistance: 100 kohm, parallel_capacitance: 20 pF }
observe: { until: 5 ms }
scan:
  vary: [{ path: gas.pressure, from: 0.3 Torr, to: 20 Torr, points: 12, spacing: log }]
  find: { what: hold-off, from: 60 V, to: 900 V, tolerance: 1 % }
`;

if (browserPath() === null) throw new Error('no chromium here; CHROMIUM names one');
mkdirSync(folder, { recursive: true });
writeFileSync(join(folder, 'hold-off.yaml'), HOLD_OFF);
const browser = await launch();
try {
  for (const [name, command, path, more = []] of RESULTS) {
    const result = join(folder, `${name}.h5`);
    const page = join(folder, `${name}.html`);
    execFileSync(process.execPath, [program, command, path, '-o', result, '--quiet', ...(command === 'run' ? [] : ['--restart']), ...more]);
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
