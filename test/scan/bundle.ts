import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';
import { afterAll, beforeAll } from 'vitest';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** A worker's script, bundled as the program's own is: threads cannot load TypeScript. Call once in a test file.
 *  @param script  path below the repository */
export function bundledWorker(script: string): () => URL {
  let folder = '';
  beforeAll(async () => {
    const cache = join(root, 'node_modules', '.cache');
    mkdirSync(cache, { recursive: true });
    folder = mkdtempSync(join(cache, 'gapwake-worker-'));
    await build({
      entryPoints: { worker: join(root, script) },
      bundle: true,
      splitting: true,
      platform: 'node',
      target: 'node20',
      format: 'esm',
      outdir: folder,
      external: ['h5wasm'],
      banner: { js: "import{createRequire as __cr}from'node:module';const require=__cr(import.meta.url);" },
      logLevel: 'warning',
    });
  });
  afterAll(() => {
    if (folder !== '') rmSync(folder, { recursive: true });
  });
  return () => pathToFileURL(join(folder, 'worker.js'));
}
