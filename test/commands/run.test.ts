import { execFileSync } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, readFileSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { NOT_A_CLEARANCE } from '../../src/commands/cautions-text.ts';
import { readRunFile } from '../../src/results/read.ts';
import { openCase, plainEnvironment, realProgram } from './program.ts';

const program = realProgram();

/** below V_s = 209.274 V, above it, and above it for a time much shorter than the lag */
const HOLDS = openCase({ voltage: 'step: 150 V' });
const BREAKS = openCase();
const TOO_SHORT = openCase({ until: '5 us' });

describe('the verdict', () => {
  test('comes first, theory beside simulation follows, and the line that it is no clearance comes last', async () => {
    const { code, out, err } = await program.run(['run', program.write('breaks.yaml', BREAKS)]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toMatch(/^Breaks down \(glow\): /);
    expect(out).toMatch(/^ {2}threshold V_s +209 V +passed at /m);
    expect(out).toMatch(/^ {2}first 1 mA +at 82\.\d µs/m); // 82.868 µs by an independent code
    expect(out).toMatch(/^Nothing was written/m);
    expect(out.endsWith(`\n${NOT_A_CLEARANCE}\n`)).toBe(true);
    for (const line of out.split('\n')) if (line !== NOT_A_CLEARANCE) expect([...line].length, line).toBeLessThanOrEqual(80);
  });

  test('of a gap below threshold is that it holds', async () => {
    const { code, out } = await program.run(['run', program.write('holds.yaml', HOLDS)]);
    expect(code).toBe(0);
    expect(out).toMatch(/^Holds: /);
    expect(out).toMatch(/^ {2}threshold V_s +209 V +not passed$/m);
  });

  test('decides the exit code with --expect, and undecided never meets it', async () => {
    const cases = {
      holds: program.write('holds.yaml', HOLDS),
      breaks: program.write('breaks.yaml', BREAKS),
      short: program.write('short.yaml', TOO_SHORT),
    };
    const expectations: readonly (readonly [path: string, expect: string, code: number, found: string])[] = [
      [cases.holds, 'holds', 0, ''],
      [cases.holds, 'breaks-down', 1, 'holds'],
      [cases.breaks, 'breaks-down', 0, ''],
      [cases.breaks, 'holds', 1, 'breaks-down'],
      [cases.short, 'holds', 1, 'undecided'],
      [cases.short, 'breaks-down', 1, 'undecided'],
    ];
    for (const [path, verdict, code, found] of expectations) {
      const ended = await program.run(['run', path, '--quiet', '--expect', verdict]);
      const err = found === '' ? '' : `gapwake: expected ${verdict}, the verdict is ${found}\n`;
      expect({ path, verdict, ...ended }).toEqual({ path, verdict, code, signal: null, out: '', err });
    }
  });

  test('follows --set', async () => {
    const path = program.write('holds.yaml', HOLDS);
    const { code, out } = await program.run(['run', path, '--set', 'supply.voltage.step=230.202 V', '--expect', 'breaks-down']);
    expect(code).toBe(0);
    expect(out).toMatch(/^Breaks down/);
  });
});

describe('run --json', () => {
  const shape = (value: unknown): unknown =>
    typeof value === 'object' && value !== null && !Array.isArray(value)
      ? Object.fromEntries(Object.entries(value).map(([k, v]) => [k, shape(v)]))
      : true;
  const all = (keys: string): Record<string, true> => Object.fromEntries(keys.split(' ').map((key) => [key, true]));
  const outcomeShape = {
    ...all('format title version case_sha256 oscillation currents cautions'),
    verdict: all('state regime self_sustaining reason'),
    theory: all(
      'static_breakdown_voltage_V upper_breakdown_voltage_V lowest_over_paths_V paschen_minimum_V paschen_minimum_pd_Pa_m overvoltage pd_Pa_m ' +
        'reduced_field_Td alpha_d feedback growth_rate_per_s steady_amplification',
    ),
    onset: all('threshold_time_s space_charge_time_s collapse_time_s formative_lag_s lag_ends_at gap_voltage_V growth_rate_per_s'),
    peak: all('current_A time_s gap_voltage_V'),
    final: all('time_s stop gap_voltage_V current_A cathode_field_V_per_m cathode_layer_m'),
    energy: all('gap_J source_J after_trip_J'),
    numerics: all('cells tolerance steps rejected newton wall_s charge_defect worst_undershoot'),
  };

  test('holds every key of the outcome, whatever the verdict, and nothing else is on stdout', async () => {
    for (const [name, text] of Object.entries({ HOLDS, BREAKS, TOO_SHORT })) {
      const { code, out, err } = await program.run(['run', '--json', program.write(`${name}.yaml`, text)]);
      expect({ name, code, err }).toEqual({ name, code: 0, err: '' });
      const outcome = JSON.parse(out);
      expect(shape(outcome), name).toEqual(outcomeShape);
      expect(outcome.format).toBe('gapwake.outcome/1');
      expect(outcome.currents.map((level: object) => Object.keys(level))).toEqual(Array(2).fill(['level_A', 'time_s', 'gap_voltage_V']));
      for (const caution of outcome.cautions) expect(Object.keys(caution)).toEqual(['code', 'text', 'value']);
    }
  });

  test('is the same twice, wall time aside', async () => {
    const path = program.write('breaks.yaml', BREAKS);
    const [first, second] = await Promise.all([program.run(['run', '--json', path]), program.run(['run', '--json', path])]);
    const withoutWall = (out: string): unknown => ({ ...JSON.parse(out), numerics: { ...JSON.parse(out).numerics, wall_s: 0 } });
    expect(withoutWall(first.out)).toEqual(withoutWall(second.out));
  });
});

describe('the result file', () => {
  test('is written where -o says, reads back, and says so', async () => {
    const { code, out } = await program.run(['run', program.write('breaks.yaml', BREAKS), '-o', 'breaks.h5']);
    expect(code).toBe(0);
    expect(out).toMatch(/^Written: breaks\.h5 \(\d+ snapshots, (\d+ kB|\d\.\d MB)\)\.$/m);
    const result = readRunFile(join(program.folder(), 'breaks.h5'));
    expect(result.outcome).toMatchObject({ format: 'gapwake.outcome/1', title: 'Open case', verdict: { state: 'breaks-down' } });
    expect(result.time.length).toBeGreaterThan(20);
    expect(result.scalars.gapVoltage[result.time.length - 1]).toBeCloseTo(
      (result.outcome.final as { gap_voltage_V: number }).gap_voltage_V,
      6,
    );
    expect(JSON.parse(result.coefficientsJson).coefficients.ionisation).toMatchObject({
      unit: 'm^2',
      status: 'given',
      source: 'case file',
    });
    expect(readdirSync(program.folder()).filter((name) => /part|lock/.test(name))).toEqual([]);
  });

  test('alone leads to the same run: case, --set and tables are in it', async () => {
    program.write('bias.csv', 't [us],bias [V]\n0,0\n1,230\n');
    const text = openCase({ voltage: 'table: { file: bias.csv, time: t, voltage: bias }', until: '5 us' });
    const { code } = await program.run([
      'run',
      program.write('table.yaml', text),
      '-o',
      'table.h5',
      '--set',
      'gas.pressure=2.9 Torr',
      '--set',
      'supply.trip={current: 1 A, delay: 1 us}',
    ]);
    expect(code).toBe(0);
    const { caseText, tablesJson, outcome } = readRunFile(join(program.folder(), 'table.h5'));
    const again = join(program.folder(), 'again');
    mkdirSync(again);
    program.write('again/table.yaml', caseText);
    for (const { file, text: csv } of JSON.parse(tablesJson)) program.write(`again/${file}`, csv);
    const { out } = await program.run(['check', '--json', join(again, 'table.yaml')]);
    expect(JSON.parse(out).case_sha256).toBe(outcome.case_sha256);
    expect(JSON.parse(out).case['gas.pressure']).toBeCloseTo(386.635, 2);
  });

  test('replaces an older result', async () => {
    const path = program.write('short.yaml', TOO_SHORT);
    expect(await program.run(['run', path, '-o', 'twice.h5', '--quiet'])).toMatchObject({ code: 0 });
    expect(await program.run(['run', path, '-o', 'twice.h5', '--quiet', '--set', 'title=second'])).toMatchObject({
      code: 0,
      out: '',
      err: '',
    });
    expect(readRunFile(join(program.folder(), 'twice.h5')).title).toBe('second');
  });

  test('is refused with exit code 4 where it cannot go, before anything is computed', async () => {
    // would take hours
    const path = program.write('long.yaml', openCase({ voltage: 'table: { file: saw.csv, time: t, voltage: bias }', until: '100 s' }));
    program.write('saw.csv', sawTooth(100_000));
    program.write('notes.txt', 'mine');
    mkdirSync(join(program.folder(), 'folder.h5'), { recursive: true });
    symlinkSync('notes.txt', join(program.folder(), 'link.h5'));
    const refused: readonly (readonly [output: string, code: string, reason: RegExp])[] = [
      ['notes.txt', 'foreign', /exists and is not a gapwake result/],
      ['link.h5', 'foreign', /exists and is not a gapwake result/],
      ['no/such/folder/x.h5', 'missing', /there is no folder/],
      ['folder.h5', 'not-a-file', /is a folder/],
      ['/dev/null', 'not-a-file', /not a regular file/],
    ];
    for (const [output, problem, reason] of refused) {
      const { code, out, err } = await program.run(['run', path, '-o', output, '--json']);
      expect({ output, code }).toEqual({ output, code: 4 });
      expect(err).toMatch(reason);
      expect(JSON.parse(out)).toMatchObject({
        format: 'gapwake.problems/1',
        problems: [{ code: problem, file: expect.any(String), line: null }],
      });
    }
    expect(readFileSync(join(program.folder(), 'notes.txt'), 'utf8')).toBe('mine');
    expect(readdirSync(program.folder()).filter((name) => /part|lock/.test(name))).toEqual([]);
  });

  test('is not written without -o', async () => {
    const path = program.write('short.yaml', TOO_SHORT);
    const before = readdirSync(program.folder()).sort();
    await program.run(['run', path]);
    expect(readdirSync(program.folder()).sort()).toEqual(before);
  });
});

describe('pipes and terminals', () => {
  const shell = (command: string, env: NodeJS.ProcessEnv = {}): string =>
    execFileSync('/bin/bash', ['-c', command], {
      cwd: program.folder(),
      env: { ...plainEnvironment(), NODE: process.execPath, GAPWAKE: program.main(), ...env },
      encoding: 'utf8',
    });
  // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
  const colour = /\u001b/;

  test('a reader that has seen enough is no mistake', () => {
    program.write('holds.yaml', HOLDS);
    for (const command of ['check', 'run', 'run --json']) {
      expect(shell(`{ "$NODE" "$GAPWAKE" ${command} holds.yaml; echo "code $?" >&2; } 2>&1 >/dev/null | cat`), command).toBe('code 0\n');
      expect(shell(`{ { "$NODE" "$GAPWAKE" ${command} holds.yaml; echo "code $?" >&2; } | true; } 2>&1`), command).toBe('code 0\n');
    }
  });

  test('an output that cannot be written exits with 4', () => {
    if (!existsSync('/dev/full')) return;
    expect(shell('{ "$NODE" "$GAPWAKE" check holds.yaml >/dev/full; echo "code $?"; } 2>&1')).toBe(
      'gapwake: the output could not be written: ENOSPC\ncode 4\n',
    );
  });

  test('a pipe is never coloured, unless FORCE_COLOR asks for it, and NO_COLOR wins', () => {
    const command = '"$NODE" "$GAPWAKE" run holds.yaml';
    expect(shell(command, { CI: 'true' })).not.toMatch(colour);
    expect(shell(command, { FORCE_COLOR: '1' })).toMatch(colour);
    expect(shell(command, { FORCE_COLOR: '1', NO_COLOR: '1' })).not.toMatch(colour);
  });

  test('a terminal is coloured, never beyond its width, and NO_COLOR is honoured', () => {
    const inTerminal = (columns: number): string =>
      `script -qec 'stty cols ${columns}; "$NODE" "$GAPWAKE" run holds.yaml 2>/dev/null' /dev/null </dev/null`;
    expect(shell(inTerminal(80), { TERM: 'xterm' })).toMatch(colour);
    expect(shell(inTerminal(80), { TERM: 'dumb' })).not.toMatch(colour);
    for (const columns of [80, 60]) {
      const plain = shell(inTerminal(columns), { TERM: 'xterm', NO_COLOR: '1' });
      expect(plain).not.toMatch(colour);
      expect(plain).toMatch(/^Holds: /);
      for (const line of plain.split(/\r?\n/)) expect([...line].length, line).toBeLessThanOrEqual(columns);
    }
  });

  test('a title cannot send control characters to the terminal', async () => {
    const path = program.write('evil.yaml', openCase({ voltage: 'step: 150 V', title: '"\\e[2J\\x9b31mred\\u202e"' }));
    const { out } = await program.run(['run', path]);
    expect(out).toContain('\\u001b[2J\\u009b31mred\\u202e');
    // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
    expect(out).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202e]/);
  });
});

/** a supply with many corners, each of which the simulation must meet */
function sawTooth(rows: number): string {
  let text = 't [us],bias [V]\n';
  for (let i = 0; i < rows; i++) text += `${i},${i % 2 === 0 ? 0 : 100}\n`;
  return text;
}
