import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { readScanFile } from '../../src/results/scan-read.ts';
import { ended, plainEnvironment, realProgram } from '../commands/program.ts';
import { scanCase, withoutWall } from './studies.ts';

/** The real program, killed with SIGKILL at random instants of its life, thirty times: reading the case, starting workers, computing, building the file. */
const KILLS = 30;
const POINTS = 48;
const SEED = Number(process.env.GAPWAKE_KILL_SEED ?? 20261201);

const program = realProgram();

/** Numbers from 0 to 1 that are the same each time: a linear congruential generator, modulus 2^32. */
function randomNumbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/** Finished points in a journal, by this test's own reading of the format: whole lines whose sums are right. */
function finishedIn(path: string): string[] {
  const text = readFileSync(path, 'utf8');
  const lines = text
    .slice(0, text.lastIndexOf('\n') + 1)
    .split('\n')
    .slice(0, -1);
  for (const line of lines) {
    const sum = createHash('sha256').update(line.slice(17)).digest('hex').slice(0, 16);
    expect(line.startsWith(`${sum} `), line.slice(0, 60)).toBe(true);
  }
  expect(lines[0] ?? '').toMatch(/^([0-9a-f]{16} gapwake\.journal\/1 \{.*\})?$/);
  return lines.slice(1);
}

const keyOf = (line: string): string => line.split(' ', 2)[1] as string;

test(`${KILLS} kills at any instant lose no finished point, compute none twice, and end in the same bytes`, {
  timeout: 600_000,
}, async () => {
  const path = program.write('kill.yaml', scanCase(`{ vary: [{ path: supply.voltage.step, from: 150 V, to: 300 V, points: ${POINTS} }] }`));
  const file = (name: string): string => join(program.folder(), name);
  const args = [program.main(), 'scan', path, '--workers', '2', '--json'];

  const began = performance.now();
  const uninterrupted = await program.run([...args.slice(1), '-o', file('whole.h5')]);
  const life = performance.now() - began;
  expect(uninterrupted).toMatchObject({ code: 0, err: '' });
  const expected = withoutWall([uninterrupted.out]);

  const random = randomNumbers(SEED);
  let kills = 0;
  let rounds = 0;
  let before: string[] = [];
  const killedWhile = { nothing: 0, some: 0, all: 0 };
  while (kills < KILLS || before.length > 0) {
    const child = spawn(process.execPath, args, { cwd: program.folder(), env: plainEnvironment() });
    // once there were enough kills the last round is let end
    const timer = kills < KILLS ? setTimeout(() => child.kill('SIGKILL'), random() * life) : undefined;
    const { code, signal, out, err } = await ended(child);
    clearTimeout(timer);
    const journal = file('kill.scan.part');
    const after = existsSync(journal) ? finishedIn(journal) : [];
    if (existsSync(file('kill.scan.h5'))) {
      // complete, whatever came then: all points, the same bytes
      expect(withoutWall(readScanFile(file('kill.scan.h5')).lines())).toEqual(withoutWall(readScanFile(file('whole.h5')).lines()));
    } else {
      // nothing that was finished is lost or changed, and nothing is there twice
      expect(after.slice(0, before.length), `kill ${kills}, seed ${SEED}`).toEqual(before);
      expect(new Set(after.map(keyOf)).size).toBe(after.length);
    }
    if (signal === 'SIGKILL') {
      kills++;
      killedWhile[after.length === 0 ? 'nothing' : after.length < POINTS ? 'some' : 'all']++;
      before = after;
      continue;
    }
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(withoutWall([out])).toEqual(expected);
    expect(readdirSync(program.folder()).filter((name) => /^kill\.scan/.test(name))).toEqual(['kill.scan.h5']);
    rmSync(file('kill.scan.h5'));
    before = [];
    rounds++;
  }
  expect(kills).toBe(KILLS);
  expect(rounds).toBeGreaterThan(0);
  // most kills must hit work in progress, else this tests little
  expect(killedWhile.some, JSON.stringify(killedWhile)).toBeGreaterThan(KILLS / 6);
});
