import { type ChildProcess, spawn } from 'node:child_process';
import {
  cpSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  realpathSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { NOT_A_CLEARANCE } from '../../src/commands/cautions-text.ts';
import { progressLine } from '../../src/commands/progress.ts';
import { durationText, scanProgressText } from '../../src/commands/scan-progress.ts';
import type { Terminal } from '../../src/commands/terminal.ts';
import { readScanFile } from '../../src/results/scan-read.ts';
import { GRID, scanCase, withoutWall } from '../scan/studies.ts';
import { ended, openCase, plainEnvironment, realProgram } from './program.ts';

const program = realProgram();
const inFolder = (name: string): string => join(program.folder(), name);
const root = fileURLToPath(new URL('../..', import.meta.url));
const sleep = (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms));

/** four points: two hold, two break down */
const FOUR = '{ vary: [{ path: supply.voltage.step, values: [150 V, 180 V, 240 V, 260 V] }] }';
/** more than anyone waits for */
const ENDLESS =
  '{ vary: [{ path: gas.pressure, from: 2 Torr, to: 4 Torr, points: 1000 }, { path: gap.area, from: 1 cm^2, to: 10 cm^2, points: 100 }] }';

describe('what a scan prints', () => {
  test('counts first, then a table, where the result went, and that it is no clearance', async () => {
    const path = program.write('four.yaml', scanCase(FOUR));
    const { code, out, err } = await program.run(['scan', path, '-o', 'printed.h5']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toMatch(/^4 points: 2 hold, 2 break down\.\n/);
    expect(out).toMatch(/^ {2}voltage\.step +verdict +lag +V_s +peak +energy$/m);
    expect(out).toMatch(/^ {2}150 V +holds +– +209 V /m);
    expect(out).toMatch(/^ {2}260 V +breaks down +\d+(\.\d+)? µs +209 V /m);
    expect(out).toMatch(/^Written: \S*printed\.h5 \(4 points, \d+ kB\)\.$/m);
    expect(out.endsWith(`\n${NOT_A_CLEARANCE}\n`)).toBe(true);
    for (const line of out.split('\n')) if (line !== NOT_A_CLEARANCE) expect([...line].length, line).toBeLessThanOrEqual(80);
  });

  test('of many points the first and the last, of many axes as many columns as fit', async () => {
    const axes = ['gas.pressure', 'gap.area', 'seed.cathode_current', 'supply.series_resistance', 'observe.until'];
    const values = ['[2 Torr, 3 Torr]', '[1 cm^2, 10 cm^2]', '[1e-10 A, 2e-10 A]', '[10 kohm, 20 kohm]', '[1 us, 2 us]'];
    const vary = axes.map((each, i) => `{ path: ${each}, values: ${values[i]} }`).join(', ');
    const { code, out } = await program.run(['scan', program.write('many.yaml', scanCase(`{ vary: [${vary}] }`)), '-o', 'many.h5']);
    expect(code).toBe(0);
    expect(out).toMatch(/^32 points: /);
    expect(out).toMatch(/^ {2}… 14 more …$/m);
    for (const line of out.split('\n')) if (line !== NOT_A_CLEARANCE) expect([...line].length, line).toBeLessThanOrEqual(80);
  });

  test('with --quiet is nothing', async () => {
    const { code, out, err } = await program.run(['scan', program.write('four.yaml', scanCase(FOUR)), '-o', 'printed.h5', '--quiet']);
    expect({ code, out, err }).toEqual({ code: 0, out: '', err: '' });
  });

  test('goes to <case>.scan.h5 beside the case by default, from whatever folder, and is not computed again', async () => {
    mkdirSync(inFolder('sub'));
    program.write('sub/case.v2.yaml', scanCase(FOUR));
    expect((await program.run(['scan', 'sub/case.v2.yaml', '--quiet'])).code).toBe(0);
    expect(readdirSync(inFolder('sub')).sort()).toEqual(['case.v2.scan.h5', 'case.v2.yaml']);
    const before = readFileSync(inFolder('sub/case.v2.scan.h5'));
    const again = await program.run(['scan', 'case.v2.yaml'], { cwd: inFolder('sub') });
    expect(again.out).toMatch(/nothing was left to\s+compute\)/);
    expect(readFileSync(inFolder('sub/case.v2.scan.h5')).equals(before)).toBe(true);
  });
});

describe('--json', () => {
  test('is gapwake.scan/1: axes, then a line for each point, in the order of the plan', async () => {
    const path = program.write('grid.yaml', scanCase(GRID));
    const { code, out, err } = await program.run(['scan', path, '--json']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    const scan = JSON.parse(out);
    expect(Object.keys(scan)).toEqual(['format', 'axes', 'points']);
    expect(scan.format).toBe('gapwake.scan/1');
    expect(scan.axes.map((axis: { path: string; unit: string; values: number[] }) => [axis.path, axis.unit, axis.values.length])).toEqual([
      ['gas.pressure', 'Pa', 3],
      ['supply.voltage.step', 'V', 4],
    ]);
    expect(scan.points.map((point: { index: number }) => point.index)).toEqual(Array.from({ length: 12 }, (_, i) => i));
    for (const [i, point] of scan.points.entries()) {
      expect(Object.keys(point)).toEqual(['index', 'id', 'values', 'outcome', 'error', 'found']);
      expect(point.values).toEqual([scan.axes[0].values[Math.floor(i / 4)], scan.axes[1].values[i % 4]]);
      expect(point.outcome.format).toBe('gapwake.outcome/1');
      expect(point.outcome.case_sha256).toBe(point.id);
    }
    // the same as a run of its own
    const one = await program.run(['run', path, '--json', '--set', 'gas.pressure=3 Torr', '--set', 'supply.voltage.step=230 V']);
    expect(withoutWall([JSON.stringify(JSON.parse(one.out))])).toEqual(withoutWall([JSON.stringify(scan.points[6].outcome)]));
  });

  test('hands a terminal no control characters of a title', async () => {
    const text = scanCase(FOUR, { title: '"a\\u202eb\\u009b"' });
    const { out } = await program.run(['scan', program.write('title.yaml', text), '--json']);
    expect(['\u009b', '\u202e'].some((character) => out.includes(character))).toBe(false);
    expect(JSON.parse(out).points[0].outcome.title).toBe('a\u202eb\u009b');
  });

  test('may be cut off by its reader', async () => {
    const path = program.write('grid.yaml', scanCase(GRID));
    expect((await program.run(['scan', path, '--quiet'])).code).toBe(0);
    const child = spawn('/bin/sh', ['-c', `"${process.execPath}" "${program.main()}" scan "${path}" --json | head -c 10`], {
      env: plainEnvironment(),
    });
    expect(await ended(child)).toMatchObject({ code: 0, err: '' });
  });
});

describe('--csv', () => {
  test('is the table of axes and headlines, with units, as the result file has it', async () => {
    const path = program.write('grid.yaml', scanCase(GRID));
    const { code, out } = await program.run(['scan', path, '--csv', 'grid.csv']);
    expect(code).toBe(0);
    expect(out).toMatch(/^Table: grid\.csv\.$/m);
    const [header = '', ...rows] = readFileSync(inFolder('grid.csv'), 'utf8').trimEnd().split('\n');
    const columns = header.split(',');
    expect(columns.slice(0, 5)).toEqual(['index', 'id', 'gas.pressure [Pa]', 'supply.voltage.step [V]', 'verdict']);
    expect(columns).toContain('formative_lag [s]');
    expect(rows.length).toBe(12);
    const file = readScanFile(inFolder('grid.scan.h5'));
    const lags = rows.map((row) => row.split(',')[columns.indexOf('formative_lag [s]')]);
    expect(lags.map((lag) => (lag === '' ? Number.NaN : Number(lag)))).toEqual([...file.column('formative_lag')]);
  });

  test('replaces an older table and nothing else, and says so before anything is computed', async () => {
    const path = program.write('grid.yaml', scanCase(GRID));
    expect((await program.run(['scan', path, '--csv', 'grid.csv', '--quiet'])).code).toBe(0);
    program.write('notes.csv', 'my notes, which took weeks\n');
    const refused = await program.run(['scan', path, '--csv', 'notes.csv', '-o', 'never.h5']);
    expect(refused).toMatchObject({
      code: 4,
      out: '',
      err: expect.stringMatching(/notes\.csv: exists and is not a table of a gapwake scan; it is not replaced/),
    });
    expect(readFileSync(inFolder('notes.csv'), 'utf8')).toBe('my notes, which took weeks\n');
    expect((await program.run(['scan', path, '--csv', 'none/grid.csv', '-o', 'never.h5'])).err).toMatch(/there is no folder/);
    expect(existsSync(inFolder('never.h5'))).toBe(false);
    // a case that was meant for the argument before
    expect((await program.run(['scan', path, '--csv', path])).code).toBe(4);
  });
});

describe('the exit code', () => {
  test('is 1 when a point has another verdict than expected', async () => {
    const path = program.write('four.yaml', scanCase(FOUR));
    const both = await program.run(['scan', path, '--quiet', '--expect', 'holds']);
    expect(both).toMatchObject({ code: 1, out: '', err: 'gapwake: expected holds at every point; 2 of 4 differ\n' });
    const low = ['scan', path, '--quiet', '--set', 'scan.vary.0.values=[150 V, 180 V]', '-o', 'low.h5'];
    expect(await program.run([...low, '--expect', 'holds'])).toMatchObject({ code: 0, err: '' });
    expect((await program.run([...low, '--expect', 'breaks-down'])).code).toBe(1);
  });

  test('is 3 when a point could not be computed; the others are there, and the reason is', async () => {
    // a path shorter than the gap between two that are right
    const path = program.write('fails.yaml', scanCase('{ vary: [{ path: gap.longest_path, values: [1 cm, 5 mm, 2 cm] }] }'));
    const { code, out, err } = await program.run(['scan', path, '--expect', 'holds']);
    expect(code).toBe(3);
    expect(out).toMatch(/^3 points: .*1 not completed\./);
    expect(out).toMatch(/^Not completed\n {2}! point 1 \(gap\.longest_path 5 mm\): gap\.longest_path: expected/m);
    expect(err).toMatch(/^gapwake: 1 of 3 points could not be completed; the others are saved\n/);
    const json = await program.run(['scan', path, '--json']);
    expect(json.code).toBe(3);
    const points = JSON.parse(json.out).points;
    expect(points[1]).toMatchObject({ outcome: null, error: { code: 'invalid-case' }, found: null });
    expect(points[2].outcome.verdict.state).toBeDefined();
  });

  test.each([
    ['a case without a scan', openCase(), [], /the case has no scan/],
    ['0 workers', scanCase(FOUR), ['--workers', '0'], /Expected a whole number from 1 to 1024/],
    ['a shard beyond the last', scanCase(FOUR), ['--shard', '5/4'], /Expected k\/n with k from 1 to n, as in 3\/8/],
    ['more shards than points', scanCase(FOUR), ['--shard', '1/5'], /5 shards of 4 points would leave some empty/],
    ['a shard to gather', scanCase(FOUR), ['--shard', '1/2', '--gather', 'a.h5'], /cannot be used with/],
    ['a plan with an output', scanCase(FOUR), ['--plan', '-o', 'a.h5'], /cannot be used with/],
    ['a path that leads nowhere', scanCase('{ vary: [{ path: gas.presure, values: [1 Torr] }] }'), [], /gas\.pressure/],
  ])('is 2 for %s', async (_, text, options, message) => {
    const { code, err } = await program.run(['scan', program.write('wrong.yaml', text), ...options]);
    expect({ code, err }).toEqual({ code: 2, err: expect.stringMatching(message) });
    expect(existsSync(inFolder('wrong.scan.h5'))).toBe(false);
  });

  test('is 4 when the result has no place', async () => {
    const path = program.write('four.yaml', scanCase(FOUR));
    program.write('foreign.h5', 'precious');
    for (const [output, message] of [
      ['foreign.h5', /exists and is not a gapwake result; it is not replaced/],
      ['none/a.h5', /there is no folder/],
    ] as const) {
      const { code, err } = await program.run(['scan', path, '-o', output]);
      expect({ code, err }).toEqual({ code: 4, err: expect.stringMatching(message) });
    }
    const json = await program.run(['scan', path, '-o', 'foreign.h5', '--json']);
    expect(JSON.parse(json.out)).toMatchObject({ format: 'gapwake.problems/1', problems: [{ code: 'foreign' }] });
  });
});

describe('--plan', () => {
  test('counts, names the first points and estimates from a pilot; it writes nothing', async () => {
    const path = program.write('planned.yaml', scanCase(GRID));
    const { code, out, err } = await program.run(['scan', path, '--plan']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toMatch(/^12 points\.\n/);
    expect(out).toMatch(/^ {2}0 +[0-9a-f]{12} +266\.6 Pa +150 V$/m);
    expect(out).toMatch(/^ {2}… and 7 more$/m);
    expect(out).toMatch(/^8 points spread over it took \S+ \S+ to \S+ \S+, \S+ \S+ on average\.$/m);
    expect(out).toMatch(/^The whole would take about \d+ (m?s|min|h).* with \d+ workers?\.$/m);
    expect(out).toMatch(/^Nothing was written\.$/m);
    expect(readdirSync(program.folder()).filter((name) => name.startsWith('planned.'))).toEqual(['planned.yaml']);
  });

  test('says the same as JSON, and ids are those of the points', async () => {
    const path = program.write('planned.yaml', scanCase(GRID));
    const plan = JSON.parse((await program.run(['scan', path, '--plan', '--json', '--shard', '2/3', '--workers', '1'])).out);
    expect(plan).toMatchObject({ format: 'gapwake.plan/1', points: 12, shard: { k: 2, n: 3, points: 4 }, workers: 1 });
    expect(plan.pilot).toMatchObject({ points: 4, unfinished: 0, failed: 0 });
    expect(plan.estimated_s).toBeGreaterThan(0);
    const scan = JSON.parse((await program.run(['scan', path, '--json'])).out);
    for (const { index, id, values } of plan.first) expect(scan.points[index]).toMatchObject({ id, values });
  });

  test('of a million points starts at once', async () => {
    const text = scanCase(ENDLESS.replace('points: 100 }', 'points: 1000 }'));
    const { out } = await program.run(['scan', program.write('million.yaml', text), '--plan']);
    expect(out).toMatch(/^1000000 points\.\n/);
  });
});

describe('shards', () => {
  test('go into files of their own, and are gathered to the same bytes', async () => {
    const path = program.write('shards.yaml', scanCase(GRID));
    for (const k of [1, 2]) expect((await program.run(['scan', path, '--shard', `${k}/2`, '--quiet'])).code).toBe(0);
    const names = ['shards.scan.shard-1-of-2.h5', 'shards.scan.shard-2-of-2.h5'];
    expect(readdirSync(program.folder()).filter((name) => name.startsWith('shards.scan'))).toEqual(names);
    const missing = await program.run(['scan', path, '--gather', names[0] as string]);
    expect(missing).toMatchObject({ code: 4, err: expect.stringMatching(/shard-1-of-2\.h5: is one of 2 shards; missing: 2/) });
    const gathered = await program.run(['scan', path, '--json', '--gather', ...names]);
    expect(gathered.code).toBe(0);
    const whole = await program.run(['scan', path, '--json', '-o', 'whole.h5']);
    expect(withoutWall([gathered.out])).toEqual(withoutWall([whole.out]));
    const file = readScanFile(inFolder('shards.scan.h5'));
    expect({ layout: file.layout, count: file.count }).toEqual({ layout: 'grid', count: 12 });
  });
});

describe('a signal', () => {
  /** Starts a scan that would take hours and waits until points are finished. */
  async function endless(name: string, ...args: string[]): Promise<ChildProcess> {
    const path = program.write(`${name}.yaml`, scanCase(ENDLESS));
    const child = spawn(process.execPath, [program.main(), 'scan', path, ...args], { cwd: program.folder(), env: plainEnvironment() });
    const journal = inFolder(`${name}.scan.part`);
    for (let i = 0; i < 600 && !(existsSync(journal) && statSync(journal).size > 5000); i++) await sleep(50);
    expect(child.exitCode).toBe(null);
    return child;
  }

  test.each([
    ['SIGINT', 130],
    ['SIGTERM', 143],
  ] as const)('%s ends a scan soon with exit code %i, keeps what is finished and says how to go on', async (signal, exitCode) => {
    const child = await endless(signal);
    const sent = performance.now();
    child.kill(signal);
    const { code, out, err } = await ended(child);
    expect(performance.now() - sent).toBeLessThan(3000);
    expect({ code, out }).toEqual({ code: exitCode, out: '' });
    expect(err).toMatch(
      /^gapwake: interrupted: \d+ of 100000 points are finished and kept in \S+\.scan\.part\. The same command goes on from there; --restart starts anew\.\n$/,
    );
    const kept =
      readFileSync(inFolder(`${signal}.scan.part`), 'utf8')
        .trimEnd()
        .split('\n').length - 1;
    expect(Number(/(\d+) of/.exec(err)?.[1])).toBe(kept);
    expect(readdirSync(program.folder()).filter((file) => file.startsWith(`${signal}.scan`))).toEqual([`${signal}.scan.part`]);
  });

  test('with --json says so on stdout too; another case is then refused, and --restart deletes what there was', async () => {
    const child = await endless('json', '--json');
    child.kill('SIGINT');
    const { code, out } = await ended(child);
    expect(code).toBe(130);
    expect(JSON.parse(out)).toMatchObject({ format: 'gapwake.problems/1', problems: [{ code: 'interrupted' }] });
    const path = program.write('json.yaml', scanCase(FOUR));
    const refused = await program.run(['scan', path]);
    expect(refused).toMatchObject({
      code: 4,
      err: expect.stringMatching(/json\.scan\.part: holds unfinished results of another case.*--restart deletes them and starts anew/),
    });
    const restarted = await program.run(['scan', path, '--restart', '--json']);
    expect(JSON.parse(restarted.out).points.length).toBe(4);
  });

  test('ends a plan', async () => {
    let csv = 't [us],bias [V]\n';
    for (let i = 0; i < 60_000; i++) csv += `${i},${i % 2 === 0 ? 50 : 100}\n`;
    program.write('saw.csv', csv);
    const vary = '{ vary: [{ path: supply.series_resistance, from: 1 kohm, to: 10 kohm, points: 100 }] }';
    const text = scanCase(vary, { voltage: 'table: { file: saw.csv, time: t, voltage: bias }', until: '60 ms' });
    const child = spawn(process.execPath, [program.main(), 'scan', program.write('slow.yaml', text), '--plan'], {
      cwd: program.folder(),
      env: plainEnvironment(),
    });
    await sleep(3000);
    expect(child.exitCode).toBe(null);
    const sent = performance.now();
    child.kill('SIGINT');
    expect(await ended(child)).toMatchObject({ code: 130, out: '', err: 'gapwake: interrupted; nothing was written\n' });
    expect(performance.now() - sent).toBeLessThan(3000);
  });
});

describe('progress', () => {
  const terminalThat = (live: boolean, said: string[]): Terminal => ({
    out: () => {},
    err: (text) => void said.push(text),
    width: 80,
    seen: live,
    live,
    errWidth: live ? 80 : Number.POSITIVE_INFINITY,
    style: { strong: String, faint: String, alarm: String, doubt: String },
  });

  test('is one line with what is done, failed and left, the rate and the time to go', () => {
    expect(scanProgressText({ done: 312, failed: 1, total: 1000, computed: 300 }, 6)).toBe(
      '312 done, 1 failed, 688 left   50/s   14 s to go',
    );
    expect(scanProgressText({ done: 5, failed: 0, total: 10, computed: 0 }, 1)).toBe('5 done, 0 failed, 5 left');
    expect(scanProgressText({ done: 10, failed: 0, total: 100, computed: 10 }, 600)).toBe(
      '10 done, 0 failed, 90 left   1/min   1 h 30 min to go',
    );
    const longest = scanProgressText({ done: 333_333, failed: 333_333, total: 1_000_000, computed: 333_333 }, 33_333_300);
    expect(longest.length).toBeLessThan(80);
  });

  test('is drawn again on a terminal, and plain once a minute elsewhere', () => {
    let time = 0;
    const said: string[] = [];
    const live = progressLine(terminalThat(true, said), scanProgressText, () => time);
    const at = (line: typeof live, ms: number): void => {
      time = ms;
      line.show({ done: 1, failed: 0, total: 9, computed: 1 });
    };
    for (const ms of [0, 299, 301, 400, 502]) at(live, ms);
    expect(said.length).toBe(2);
    expect(said[0]?.startsWith('\r1 done') && said[0].endsWith('\u001b[K')).toBe(true);
    live.end();
    expect(said.pop()).toBe('\r\u001b[K');
    said.length = 0;
    time = 0;
    const plain = progressLine(terminalThat(false, said), scanProgressText, () => time);
    for (const ms of [0, 59_000, 60_001, 61_000, 120_002]) at(plain, ms);
    plain.end();
    expect(said).toEqual([expect.stringMatching(/^1 done, 0 failed, 8 left {3}1\/min.*\n$/), expect.stringMatching(/\n$/)]);
  });

  test.each([
    [0.2, '1 s'],
    [61, '1 min 1 s'],
    [4000, '1 h 6 min'],
    [400_000, '4 d 15 h'],
  ])('%f s is %s', (seconds, text) => {
    expect(durationText(seconds)).toBe(text);
  });
});

test('workers start from an installed copy, in a path with spaces, called through a link from another folder', async () => {
  const prefix = inFolder('a prefix with spaces (ü)');
  const installed = join(prefix, 'lib', 'node_modules', 'gapwake');
  mkdirSync(join(prefix, 'bin'), { recursive: true });
  cpSync(dirname(program.main()), join(installed, 'dist'), { recursive: true });
  writeFileSync(join(installed, 'package.json'), readFileSync(join(root, 'package.json')));
  mkdirSync(join(installed, 'node_modules'));
  symlinkSync(realpathSync(join(root, 'node_modules', 'h5wasm')), join(installed, 'node_modules', 'h5wasm'));
  symlinkSync(join('..', 'lib', 'node_modules', 'gapwake', 'dist', 'main.js'), join(prefix, 'bin', 'gapwake'));
  mkdirSync(inFolder('else where'));
  writeFileSync(inFolder('else where/my case.yaml'), scanCase(FOUR));
  const child = spawn(process.execPath, [join(prefix, 'bin', 'gapwake'), 'scan', '../else where/my case.yaml', '--quiet'], {
    cwd: prefix,
    env: plainEnvironment(),
  });
  expect(await ended(child)).toMatchObject({ code: 0, out: '', err: '' });
  expect(readScanFile(inFolder('else where/my case.scan.h5')).count).toBe(4);
  rmSync(prefix, { recursive: true });
});
