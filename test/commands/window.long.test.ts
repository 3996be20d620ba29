import { spawn } from 'node:child_process';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { NOT_A_CLEARANCE } from '../../src/commands/cautions-text.ts';
import { clock } from '../../src/commands/clock.ts';
import { progressLine } from '../../src/commands/progress.ts';
import type { Terminal } from '../../src/commands/terminal.ts';
import { windowProgressText } from '../../src/commands/window-progress.ts';
import { windowText } from '../../src/commands/window-text.ts';
import { readWindowFile } from '../../src/results/window-read.ts';
import type { WindowOfYield, WindowOutcome } from '../../src/search/window/index.ts';
import { climbing } from '../window/cases.ts';
import { ended, openCase, plainEnvironment, realProgram } from './program.ts';

const program = realProgram();
const inFolder = (name: string): string => join(program.folder(), name);
const sleep = (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms));
const leftovers = (): string[] => readdirSync(program.folder()).filter((file) => /part|lock/.test(file));

describe('what a window prints', () => {
  test('the verdict and when turn-on holds first, then windows, history, and that it is no clearance', async () => {
    const path = program.write('print.yaml', climbing());
    const { code, out, err } = await program.run(['window', path]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    const [first] = out.split('\n');
    expect(first).toMatch(/^Breaks down: at 230 V the gap breaks down from \d/);
    expect(out).toMatch(/^Turn-on holds with the margin of 1\.5 /m);
    expect(out).toMatch(/^ {2}lowest hold-off voltage +11\d V at /m);
    expect(out).toMatch(/^ {2}.* s to .* (s|min) +breaks down +11\d V +[\d.]+ µs$/m);
    expect(out).toMatch(/^Written: \S*print\.window\.h5 \(\d+ kB\)\.$/m);
    expect(out.endsWith(`\n${NOT_A_CLEARANCE}\n`)).toBe(true);
    for (const line of out.split('\n')) if (line !== NOT_A_CLEARANCE) expect([...line].length, line).toBeLessThanOrEqual(80);
    // asked again, it is read from its file
    const again = await program.run(['window', path, '--json']);
    expect(JSON.parse(again.out)).toEqual(readWindowFile(inFolder('print.window.h5')).outcome);
    expect(leftovers()).toEqual([]);
  }, 120_000);

  test('with --json is one object of the format of the design, and --csv writes its history', async () => {
    const path = program.write('json.yaml', climbing());
    const { code, out } = await program.run(['window', path, '--json', '--csv', 'json.csv', '--workers', '1', '-o', 'other.h5']);
    expect(code).toBe(0);
    const outcome = JSON.parse(out) as WindowOutcome;
    expect(outcome).toMatchObject({ format: 'gapwake.window/1', title: 'Climbing', duration_s: 200, margin: 1.5, yield_spread: null });
    expect(Object.keys(outcome.windows[0])).toEqual(
      expect.arrayContaining(['from_s', 'to_s', 'state', 'lowest_hold_off_V', 'shortest_lag_s']),
    );
    expect(Object.keys(outcome.lowest_hold_off ?? {})).toEqual(['voltage_V', 'time_s', 'pressure_Pa']);
    expect(Object.keys(outcome.history[0])).toEqual(
      expect.arrayContaining(['time_s', 'pressure_Pa', 'temperature_K', 'supply_V', 'hold_off_V', 'state']),
    );
    expect(outcome.cautions[0].code).toBe('not-a-clearance');
    const rows = readFileSync(inFolder('json.csv'), 'utf8').trimEnd().split('\n');
    expect(rows).toHaveLength(outcome.history.length + 1);
    expect(existsSync(inFolder('json.window.h5'))).toBe(false);
    expect(readWindowFile(inFolder('other.h5')).outcome).toEqual(outcome);
  }, 120_000);

  test('--expect holds is met without a window of breakdown only', async () => {
    const path = program.write('expect.yaml', climbing());
    const broken = await program.run(['window', path, '--expect', 'holds', '--quiet']);
    expect(broken).toMatchObject({ code: 1, out: '', err: 'gapwake: expected holds; there is a window of breakdown\n' });
    expect((await program.run(['window', path, '--expect', 'breaks-down', '--quiet'])).code).toBe(0);
    // marginal at the minimum, and nowhere more
    const marginal = await program.run(['window', path, '--set', 'history.voltage=100 V', '-o', 'low.h5', '--expect', 'holds']);
    expect(marginal.code).toBe(0);
    expect(marginal.out).toMatch(/^Marginal: at 100 V /);
    expect((await program.run(['window', path, '--set', 'history.voltage=100 V', '-o', 'low.h5', '--expect', 'breaks-down'])).code).toBe(1);
  }, 120_000);
});

describe('a window that cannot be', () => {
  test('for want of a history is wrong input', async () => {
    const path = program.write('without.yaml', openCase());
    const { code, out, err } = await program.run(['window', path]);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toMatch(/no history/);
    const json = await program.run(['window', path, '--json']);
    expect(JSON.parse(json.out)).toMatchObject({ format: 'gapwake.problems/1', problems: [{ code: 'missing-key' }] });
  });

  test('written where something else is ends with 4 and leaves that alone', async () => {
    const path = program.write('refused.yaml', climbing());
    program.write('precious.h5', 'precious');
    expect(await program.run(['window', path, '-o', 'precious.h5'])).toMatchObject({ code: 4, out: '' });
    expect(readFileSync(inFolder('precious.h5'), 'utf8')).toBe('precious');
    program.write('precious.csv', 'precious');
    expect(await program.run(['window', path, '--csv', 'precious.csv'])).toMatchObject({ code: 4, out: '' });
    expect(readFileSync(inFolder('precious.csv'), 'utf8')).toBe('precious');
    expect(existsSync(inFolder('refused.window.h5'))).toBe(false);
  });
});

describe('a window that is ended early', () => {
  /** slow enough to be met at work */
  const slow = climbing().replace('cells: 50', 'cells: 200');

  async function begun(name: string): Promise<ReturnType<typeof spawn>> {
    const path = program.write(`${name}.yaml`, slow);
    const child = spawn(process.execPath, [program.main(), 'window', path, '--workers', '1'], {
      cwd: program.folder(),
      env: plainEnvironment(),
    });
    const journal = inFolder(`${name}.window.part`);
    for (let i = 0; i < 600 && !(existsSync(journal) && readFileSync(journal, 'utf8').split('\n').length > 4); i++) await sleep(20);
    expect(child.exitCode).toBe(null);
    return child;
  }

  test('by Ctrl-C keeps what is finished, says how to go on, and goes on', async () => {
    const child = await begun('stopped');
    const sent = performance.now();
    child.kill('SIGINT');
    const { code, out, err } = await ended(child);
    expect(performance.now() - sent).toBeLessThan(2500);
    expect({ code, out }).toEqual({ code: 130, out: '' });
    expect(err.replace(/\s+/g, ' ')).toMatch(
      /^gapwake: interrupted: \d+ answers are finished and kept in \S*stopped\.window\.part\. The same command goes on from there/,
    );
    const whole = await program.run(['window', 'stopped.yaml', '-o', 'whole.h5', '--json']);
    const resumed = await program.run(['window', 'stopped.yaml', '--json']);
    expect(resumed.code).toBe(0);
    expect(resumed.out).toBe(whole.out);
    expect(leftovers()).toEqual([]);
  }, 180_000);

  test('by kill -9 loses nothing that was finished', async () => {
    const child = await begun('killed');
    child.kill('SIGKILL');
    await ended(child);
    const lines = readFileSync(inFolder('killed.window.part'), 'utf8').split('\n').slice(0, -1);
    const again = spawn(process.execPath, [program.main(), 'window', 'killed.yaml', '--json'], {
      cwd: program.folder(),
      env: plainEnvironment(),
    });
    const { code, out } = await ended(again);
    expect(code).toBe(0);
    expect(lines.length).toBeGreaterThan(3);
    const whole = await program.run(['window', 'killed.yaml', '-o', 'whole2.h5', '--json']);
    expect(out).toBe(whole.out);
    expect(leftovers()).toEqual([]);
  }, 180_000);
});

/** A made-up outcome, to see every sentence. */
function outcome(changes: Partial<WindowOutcome>): WindowOutcome {
  const history = [0, 7200, 10800].map((time_s) => ({
    time_s,
    pressure_Pa: 1000,
    temperature_K: 300,
    supply_V: 400,
    hold_off_V: 500,
    hold_off_at_high_yield_V: null,
    lag_s: null,
    state: 'holds' as const,
    note: null,
  }));
  return {
    format: 'gapwake.window/1',
    title: 'Made up',
    version: '',
    case_sha256: '',
    duration_s: 10800,
    margin: 1.5,
    windows: [],
    lowest_hold_off: { voltage_V: 500, time_s: 0, pressure_Pa: 1000 },
    earliest_turn_on_s: 0,
    latest_turn_on_s: 10800,
    worst: null,
    yield_spread: null,
    history,
    notes: [],
    cautions: [],
    numerics: { instants: 3, runs: 3, failures: [] },
    ...changes,
  };
}

type Stretch = WindowOfYield['windows'][number];
const stretch = (state: Stretch['state'], from_s: number, to_s: number, below_paschen_minimum = false): Stretch => ({
  from_s,
  to_s,
  state,
  below_paschen_minimum,
  lowest_hold_off_V: 350,
  shortest_lag_s: null,
});

const plain = (text: string): string => text;
const terminal: Terminal = {
  out: () => undefined,
  err: () => undefined,
  width: 80,
  seen: false,
  live: true,
  errWidth: 80,
  style: { strong: plain, faint: plain, alarm: plain, doubt: plain },
};
/** the sentences before the title, on one line */
function sentences(changes: Partial<WindowOutcome>): string {
  const text = windowText(outcome(changes), { path: 'a.h5', bytes: 1000, computed: 1, csv: null }, terminal);
  for (const line of text.split('\n')) if (line !== NOT_A_CLEARANCE) expect([...line].length, line).toBeLessThanOrEqual(80);
  return text.slice(0, text.indexOf('\n\n')).replaceAll('\n', ' ');
}

describe('the first sentences', () => {
  const broken = stretch('breaks-down', 3600, 7200);

  test('of a hold', () => {
    expect(sentences({})).toBe(
      'Holds: at 400 V the gap holds with the margin of 1.5 throughout, 3 h. Turn-on holds with the margin of 1.5 at any time.',
    );
    expect(sentences({ windows: [stretch('outside-model', 7200, 10800, true)] })).toMatch(/^Holds: /);
  });

  test('of a breakdown', () => {
    expect(sentences({ windows: [broken], earliest_turn_on_s: 7200, latest_turn_on_s: 3500 })).toBe(
      'Breaks down: at 400 V the gap breaks down from 60 min to 2 h. Turn-on holds with the margin of 1.5 from 2 h on, and from the start until 58.3 min, if switched off by then.',
    );
    expect(sentences({ windows: [stretch('breaks-down', 0, 10800)], earliest_turn_on_s: null, latest_turn_on_s: null })).toBe(
      'Breaks down: at 400 V the gap breaks down throughout. Turn-on holds with the margin of 1.5 neither from the start nor from any later time to the end.',
    );
  });

  test('of a hold without the margin, and of one that nothing can be said of', () => {
    expect(sentences({ windows: [stretch('marginal', 3600, 7200)], earliest_turn_on_s: 7200, latest_turn_on_s: 3600 })).toMatch(
      /^Marginal: at 400 V the gap holds throughout, but not with the margin of 1\.5, or not at every yield, from 60 min to 2 h\. /,
    );
    expect(sentences({ windows: [stretch('outside-model', 3600, 10800)], earliest_turn_on_s: null, latest_turn_on_s: 3600 })).toMatch(
      /^Undecided: at 400 V no breakdown is found, but from 60 min to the end nothing can be said: outside the model\. /,
    );
  });

  test('begin with the yields where the verdict changes within their spread', () => {
    const ofYield = { lowest_hold_off: null, earliest_turn_on_s: 0, latest_turn_on_s: 10800 };
    const spread = { low: { ion_yield: 0.001, windows: [], ...ofYield }, high: { ion_yield: 0.1, windows: [broken], ...ofYield } };
    expect(sentences({ yield_spread: spread })).toMatch(
      /^Depends on the ion yield, known only between 0\.001 and 0\.1: at 0\.1 it breaks down from 60 min to 2 h, at 0\.001 it does not break down\. Holds at the typical yield: /,
    );
    const both = { low: { ...spread.low, windows: [broken] }, high: spread.high };
    expect(sentences({ windows: [broken], yield_spread: both })).toMatch(/^Breaks down: /);
  });
});

describe('times', () => {
  test('have about three digits, and are rounded as asked', () => {
    const text = (seconds: number, rounding?: 'up' | 'down'): string => clock(seconds, rounding).replaceAll('\u00a0', ' ');
    expect([0, 0.01234, 12.345, 119].map((t) => text(t))).toEqual(['0 s', '0.0123 s', '12.3 s', '119 s']);
    expect([120, 5744.3, 7200, 86400, 200_000, 864_000].map((t) => text(t))).toEqual([
      '2 min',
      '95.7 min',
      '2 h',
      '24 h',
      '2 d 8 h',
      '10 d',
    ]);
    expect([text(5744.3, 'up'), text(5744.3, 'down')]).toEqual(['95.8 min', '95.7 min']);
    expect([text(8000, 'up'), text(8000, 'down')]).toEqual(['2 h 14 min', '2 h 13 min']);
    expect([text(7260, 'up'), text(7260, 'down')]).toEqual(['2 h 1 min', '2 h 1 min']);
  });
});

describe('progress', () => {
  test('is one line, drawn again, and removed at the end', () => {
    const said: string[] = [];
    let time = 0;
    const line = progressLine({ ...terminal, err: (text) => void said.push(text) }, windowProgressText, () => time);
    line.show({ done: 0, asked: 10 });
    time = 1000;
    line.show({ done: 3, asked: 10 });
    line.end();
    expect(said).toEqual(['\r3 of 10 simulated so far   1 s\u001b[K', '\r\u001b[K']);
  });
});
