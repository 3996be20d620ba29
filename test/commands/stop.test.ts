import { type ChildProcess, spawn } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { readRunFile } from '../../src/results/read.ts';
import { ended, openCase, plainEnvironment, realProgram } from './program.ts';

const program = realProgram();
const sleep = (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms));

/** Starts a run that would take minutes and waits until it has begun to write. */
async function longRun(name: string, ...args: string[]): Promise<ChildProcess> {
  let csv = 't [us],bias [V]\n';
  for (let i = 0; i < 60_000; i++) csv += `${i},${i % 2 === 0 ? 50 : 100}\n`;
  program.write('saw.csv', csv);
  const path = program.write('long.yaml', openCase({ voltage: 'table: { file: saw.csv, time: t, voltage: bias }', until: '60 ms' }));
  const child = spawn(process.execPath, [program.main(), 'run', path, '-o', `${name}.h5`, ...args], {
    cwd: program.folder(),
    env: plainEnvironment(),
  });
  for (let i = 0; i < 300 && !existsSync(join(program.folder(), `${name}.part.h5`)); i++) await sleep(50);
  await sleep(1000); // the simulation itself
  expect(child.exitCode).toBe(null);
  return child;
}

describe('a signal', () => {
  test.each([
    ['SIGINT', 130],
    ['SIGTERM', 143],
  ] as const)('%s ends a run long before its end, as interrupted, with exit code %i and a file that reads', async (signal, exitCode) => {
    const child = await longRun(signal);
    child.kill(signal);
    const { code, out, err } = await ended(child);
    expect({ code, err }).toEqual({ code: exitCode, err: '' });
    expect(out).toMatch(/^Undecided: /);
    expect(out).toMatch(/^ {2}end +.*: interrupted$/m);
    const { outcome, time } = readRunFile(join(program.folder(), `${signal}.h5`));
    expect(outcome).toMatchObject({ verdict: { state: 'undecided' }, final: { stop: 'interrupted' } });
    expect(time.length).toBeGreaterThan(0);
    expect(readdirSync(program.folder()).filter((file) => /part|lock/.test(file))).toEqual([]);
  });

  test('leaves the outcome on stdout with --json', async () => {
    const child = await longRun('json', '--json');
    child.kill('SIGINT');
    const { code, out } = await ended(child);
    expect(code).toBe(130);
    expect(JSON.parse(out)).toMatchObject({ format: 'gapwake.outcome/1', final: { stop: 'interrupted' } });
  });

  test('wins over an expectation', async () => {
    const child = await longRun('expect', '--expect', 'holds', '--quiet');
    child.kill('SIGINT');
    expect(await ended(child)).toMatchObject({ code: 130, out: '' });
  });
});

describe('a second signal', () => {
  /** a process that notes the wish to stop and does not follow it */
  async function stubborn(): Promise<ChildProcess> {
    const signals = fileURLToPath(new URL('../../src/commands/signals.ts', import.meta.url));
    const script = `import { listenForStop } from ${JSON.stringify(signals)};
      const stop = listenForStop();
      setInterval(() => process.stdout.write(String(stop.exitCode) + '\\n'), 20);`;
    const child = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', script], { env: plainEnvironment() });
    await says(child, 'null');
    return child;
  }
  const says = (child: ChildProcess, word: string): Promise<void> =>
    new Promise((resolve) => {
      const look = (text: Buffer): void => {
        if (!text.toString().includes(word)) return;
        child.stdout?.off('data', look);
        resolve();
      };
      child.stdout?.on('data', look);
    });

  test('ends the process at once', async () => {
    const child = await stubborn();
    child.kill('SIGINT');
    await says(child, '130');
    await sleep(400);
    expect(child.exitCode).toBe(null);
    child.kill('SIGTERM');
    expect(await ended(child)).toMatchObject({ code: null, signal: 'SIGTERM' });
  });

  test('that arrives with the first is the same wish: one key press can come twice', async () => {
    const child = await stubborn();
    child.kill('SIGINT');
    await says(child, '130');
    child.kill('SIGINT');
    await sleep(400);
    expect(child.exitCode ?? child.signalCode).toBe(null);
    child.kill('SIGINT');
    expect(await ended(child)).toMatchObject({ code: null, signal: 'SIGINT' });
  });
});
