import { execFileSync, type SpawnOptions, spawn } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll } from 'vitest';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** What a process said and how it ended. */
export interface Ended {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly out: string;
  readonly err: string;
}

/** The program as `npm run build` makes it, in a folder of its own under node_modules (from where its packages are found), and a temporary
 *  folder for the files of a test. Call once in a test file. */
export function realProgram(): {
  readonly main: () => string;
  readonly folder: () => string;
  /** Writes a file into the folder. @returns its path */
  readonly write: (name: string, text: string | Uint8Array) => string;
  readonly run: (args: readonly string[], options?: SpawnOptions) => Promise<Ended>;
} {
  let built = '';
  let folder = '';
  beforeAll(() => {
    const cache = join(root, 'node_modules', '.cache');
    mkdirSync(cache, { recursive: true });
    built = mkdtempSync(join(cache, 'gapwake-test-'));
    folder = mkdtempSync(join(tmpdir(), 'gapwake-commands-'));
    // into another folder: tests must not take away the program that somebody is using
    execFileSync(process.execPath, [join(root, 'build.mjs'), built]);
  });
  afterAll(() => {
    for (const made of [built, folder]) if (made !== '' && existsSync(made)) rmSync(made, { recursive: true });
  });
  const main = (): string => join(built, 'main.js');
  return {
    main,
    folder: () => folder,
    write: (name, text) => {
      const path = join(folder, name);
      writeFileSync(path, text);
      return path;
    },
    run: (args, options = {}) => ended(spawn(process.execPath, [main(), ...args], { cwd: folder, env: plainEnvironment(), ...options })),
  };
}

/** Without what would colour or trace the output on one machine and not on another. */
export function plainEnvironment(): NodeJS.ProcessEnv {
  const { NO_COLOR: _, FORCE_COLOR: __, GAPWAKE_TRACE: ___, ...rest } = process.env;
  return rest;
}

/** Everything a started process says until it ends. */
export function ended(child: ReturnType<typeof spawn>): Promise<Ended> {
  let [out, err] = ['', ''];
  child.stdout?.setEncoding('utf8').on('data', (text: string) => {
    out += text;
  });
  child.stderr?.setEncoding('utf8').on('data', (text: string) => {
    err += text;
  });
  return new Promise((resolve, reject) => {
    child.on('error', reject);
    child.on('close', (code, signal) => resolve({ code, signal, out, err }));
  });
}

/** The case of docs and issue: a planar gap with simple own coefficients; V_s = 209.274 V. */
export function openCase(
  changes: { readonly voltage?: string; readonly until?: string; readonly title?: string; readonly more?: string } = {},
): string {
  const { voltage = 'step: 230.202 V', until = '2 ms', title = 'Open case', more = '' } = changes;
  return `title: ${title}
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
supply:
  voltage: { ${voltage} }
  series_resistance: 10 kohm
  parallel_capacitance: 100 pF
observe:
  until: ${until}
  currents: [1 uA, 1 mA]
${more}`;
}
