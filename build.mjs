/** Bundles the program: `npm run build`; into another folder: `node build.mjs FOLDER`. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('.', import.meta.url));
const folder = resolve(process.argv[2] ?? join(root, 'dist'));
const source = (name) => join(root, 'src', name);
const all = { absWorkingDir: root, bundle: true, logLevel: 'warning' };
const node = { ...all, platform: 'node', target: 'node20' };

rmSync(folder, { recursive: true, force: true });
const [, program] = await Promise.all([
  // what is started: small files that load the program
  build({
    ...node,
    entryPoints: ['main.ts', 'main/worker.ts', 'main/load.ts'].map(source),
    entryNames: '[name]',
    splitting: true,
    format: 'esm',
    outdir: folder,
  }),
  // the program: one script, as the engine keeps what it compiled of scripts only; names stay, for messages and traces
  build({
    ...node,
    entryPoints: [source('main/program.ts')],
    external: ['h5wasm'],
    format: 'cjs',
    define: { 'import.meta.url': 'url' },
    minifyWhitespace: true,
    minifySyntax: true,
    lineLimit: 160,
    write: false,
  }),
  build({
    ...all,
    entryPoints: ['run', 'scan', 'window'].map((page) => source(`report/page/${page}.ts`)),
    format: 'esm',
    target: 'es2022',
    minify: true,
    outdir: join(folder, 'page'),
  }),
]);
// Node 20 forgets how a script imports packages when its code was kept: `load` does it for the script
const text = program.outputFiles[0].text.replaceAll(/\bimport\((?="[^"]+"\))/g, 'load(');
writeFileSync(join(folder, 'program.cjs'), text);
await keepCompiled();

/** Uses the program as most do and writes down what the engine has compiled of it: see src/main/load.ts. */
async function keepCompiled() {
  const { loadScript } = await import(pathToFileURL(join(folder, 'load.js')));
  const { program, keep } = loadScript();
  const work = mkdtempSync(join(tmpdir(), 'gapwake-build-'));
  const path = join(work, 'case.yaml');
  let said = '';
  const write = process.stdout.write;
  process.stdout.write = (text) => {
    said += text;
    return true;
  };
  try {
    await program.start(['check', '--template']);
    writeFileSync(path, said);
    for (const command of ['check', 'run']) {
      await program.start([command, path]);
      if (process.exitCode !== 0) throw new Error(`${command} does not work`);
    }
  } finally {
    process.stdout.write = write;
    rmSync(work, { recursive: true });
  }
  writeFileSync(join(folder, 'program.cache'), keep());
}
