import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeEach, describe, expect, test, vi } from 'vitest';
import { NOT_A_CLEARANCE } from '../../src/commands/cautions-text.ts';
import { exitCodeOf } from '../../src/commands/cli.ts';
import type { Terminal } from '../../src/commands/terminal.ts';
import { MarchFailure } from '../../src/march/march.ts';
import type { Outcome } from '../../src/onset/outcome.ts';
import { readRunFile } from '../../src/results/read.ts';
import { openCase } from './program.ts';

/** A simulation that cannot go on after some steps. A real case that fails would be a defect to mend, so the failure is planted: the true
 *  simulation runs, is stopped and reports what it has found, as it does when no step is accepted any more. */
vi.mock('../../src/simulate.ts', async (original) => {
  const real = await original<typeof import('../../src/simulate.ts')>();
  return {
    ...real,
    simulate: async (...[settings, watch]: Parameters<typeof real.simulate>): Promise<Outcome> => {
      let polls = 0;
      const outcome = await real.simulate(settings, { ...watch, interrupted: () => ++polls > 20 });
      if (settings.title === 'fault') throw new TypeError('planted fault');
      const { time_s } = outcome.final;
      const cause = new MarchFailure(`no acceptable step at t = ${time_s} s`, time_s, 20, 7);
      throw new real.SimulationFailure(cause, 'try more \u001b[1m cells', { ...outcome, final: { ...outcome.final, stop: 'failed' } });
    },
  };
});

const folder = mkdtempSync(join(tmpdir(), 'gapwake-failure-'));
afterAll(() => rmSync(folder, { recursive: true }));
const path = join(folder, 'open.yaml');
writeFileSync(path, openCase());

let out = '';
let err = '';
beforeEach(() => {
  out = '';
  err = '';
});
const plain = (text: string): string => text;
const terminal: Terminal = {
  out: (text) => {
    out += text;
  },
  err: (text) => {
    err += text;
  },
  width: 80,
  seen: false,
  live: false,
  errWidth: Number.POSITIVE_INFINITY,
  style: { strong: plain, faint: plain, alarm: plain, doubt: plain },
};

describe('a simulation that cannot go on', () => {
  test('exits with 3, says where and what to try, and shows what was found', async () => {
    expect(await exitCodeOf(['run', path], terminal)).toBe(3);
    expect(err).toMatch(
      /^gapwake: the simulation could not be completed: no acceptable step at t = .* \(step 20, cell 7\); try more \\u001b\[1m cells\n$/,
    );
    expect(out).toMatch(/^ {2}end +.*: could not go on$/m);
    expect(out.endsWith(`${NOT_A_CLEARANCE}\n`)).toBe(true);
  });

  test('is a problem with --json, and nothing else is on stdout', async () => {
    expect(await exitCodeOf(['run', path, '--json'], terminal)).toBe(3);
    expect(JSON.parse(out)).toMatchObject({
      format: 'gapwake.problems/1',
      problems: [{ code: 'simulation-failed', file: path, line: null, found: expect.stringContaining('step 20, cell 7') }],
    });
  });

  test('leaves a file up to the last good state', async () => {
    const output = join(folder, 'open.h5');
    expect(await exitCodeOf(['run', path, '-o', output], terminal)).toBe(3);
    const { outcome, time } = readRunFile(output);
    expect(outcome).toMatchObject({ final: { stop: 'failed' } });
    expect(time[time.length - 1]).toBeCloseTo((outcome.final as Outcome['final']).time_s, 12);
    expect(readdirSync(folder).sort()).toEqual(['open.h5', 'open.yaml']);
  });

  test('wins over an expectation', async () => {
    expect(await exitCodeOf(['run', path, '--expect', 'holds', '--quiet'], terminal)).toBe(3);
    expect(out).toBe('');
  });
});

test('an internal fault on the way leaves neither a file nor a lock', async () => {
  const before = readdirSync(folder).sort();
  expect(await exitCodeOf(['run', path, '--set', 'title=fault', '-o', join(folder, 'fault.h5')], terminal)).toBe(70);
  expect(err).toBe('gapwake: internal fault: planted fault; GAPWAKE_TRACE=1 shows where\n');
  expect(readdirSync(folder).sort()).toEqual(before);
});
