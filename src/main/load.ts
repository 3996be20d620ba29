import { createHash } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { Script } from 'node:vm';

type Program = typeof import('./program.ts');

/** The built program: `program.cjs` beside this file. Compiling it takes longer than most checks of a case, so the build leaves what the engine made of
 *  it in `program.cache`. The engine refuses what another version of it, or other flags, have made, and compiles as ever.
 *  @throws Error when the program is not there */
export function loadProgram(): Program {
  return loadScript().program;
}

/** The same, for the build: `keep` gives a sum over program and compiled code, then the code as compiled up to the moment of the call.
 *  `reused`: whether what was kept before was taken */
export function loadScript(): { readonly program: Program; readonly reused: boolean; readonly keep: () => Buffer } {
  const path = fileURLToPath(new URL('./program.cjs', import.meta.url));
  const bytes = readFileSync(path);
  const cachedData = kept(fileURLToPath(new URL('./program.cache', import.meta.url)), bytes);
  // the bundler writes ASCII, which is quicker to read as such
  const source = `(function (exports, module, require, load, url) {${bytes.toString('latin1')}\n})`;
  const script = new Script(source, { filename: path, ...(cachedData === null ? {} : { cachedData }) });
  const module = { exports: {} as Program };
  const load = (name: string): Promise<unknown> => import(name);
  script.runInThisContext()(module.exports, module, createRequire(import.meta.url), load, import.meta.url);
  const keep = (): Buffer => {
    const data = script.createCachedData();
    return Buffer.concat([sumOf(bytes, data), data]);
  };
  return { program: module.exports, reused: script.cachedDataRejected === false, keep };
}

/** Compiled code, if there is some that belongs to the program as it stands: the engine itself would take code of another text of equal length, and
 *  fall over where a bit of it is wrong. */
function kept(path: string, program: Buffer): Buffer | null {
  if (!existsSync(path)) return null;
  const bytes = readFileSync(path);
  const data = bytes.subarray(SUM_LENGTH);
  return sumOf(program, data).equals(bytes.subarray(0, SUM_LENGTH)) ? data : null;
}

const SUM_LENGTH = 32;

function sumOf(program: Buffer, data: Buffer): Buffer {
  return createHash('sha256').update(program).update(data).digest();
}
