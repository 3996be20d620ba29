import { execFileSync } from 'node:child_process';
import { readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { beforeAll, expect, test } from 'vitest';
import { plainEnvironment, realProgram } from './program.ts';

const program = realProgram();
const file = (name: string): string => join(dirname(program.main()), name);

let script: Buffer;
let kept: Buffer;
beforeAll(() => {
  script = readFileSync(file('program.cjs'));
  kept = readFileSync(file('program.cache'));
});

/** Whether a new process takes the compiled code that was kept, and what the program's help says then. */
function load(...flags: readonly string[]): { readonly reused: boolean; readonly help: string } {
  const text = `import(${JSON.stringify(pathToFileURL(file('load.js')))}).then(({ loadScript }) => console.log(loadScript().reused))`;
  const node = (args: readonly string[]): string => execFileSync(process.execPath, args, { encoding: 'utf8', env: plainEnvironment() });
  return { reused: node([...flags, '-e', text]) === 'true\n', help: node([...flags, program.main(), '--help']) };
}

test('the compiled code of the build is taken', () => {
  const { reused, help } = load();
  expect(reused).toBe(true);
  expect(help).toContain('Does a gas gap hold this voltage');
});

test('it is not taken by an engine that compiles otherwise', () => {
  const { reused, help } = load('--jitless');
  expect(reused).toBe(false);
  expect(help).toContain('Does a gas gap hold this voltage');
});

test('it is not taken for another program of the same length', () => {
  writeFileSync(file('program.cjs'), script.toString('latin1').replace('Does a gas gap hold', 'Does a new gap hold'), 'latin1');
  const { reused, help } = load();
  writeFileSync(file('program.cjs'), script);
  expect(reused).toBe(false);
  expect(help).toContain('Does a new gap hold this voltage');
});

test.each([
  ['one bit is wrong', (bytes: Buffer) => bytes.fill((bytes[bytes.length >> 1] as number) ^ 4, bytes.length >> 1, (bytes.length >> 1) + 1)],
  ['half of it is missing', (bytes: Buffer) => bytes.subarray(0, bytes.length >> 1)],
  ['it is empty', () => Buffer.alloc(0)],
])('it is not taken when %s', (_, harm) => {
  writeFileSync(file('program.cache'), harm(Buffer.from(kept)));
  const { reused, help } = load();
  writeFileSync(file('program.cache'), kept);
  expect(reused).toBe(false);
  expect(help).toContain('Does a gas gap hold this voltage');
});
