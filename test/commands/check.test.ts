import { mkdirSync, readdirSync, readFileSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { NOT_A_CLEARANCE } from '../../src/commands/cautions-text.ts';
import { openCase, realProgram } from './program.ts';

const program = realProgram();

const argonCase = `title: Counter bias at 1.2 Torr
gap: { geometry: planar, spacing: 6 mm, area: 12 cm^2, longest_path: 40 mm }
gas: { name: argon, pressure: 1.2 Torr, temperature: 295 K }
electrodes: { left: { material: nickel } }
seed: { cathode_current: 1 pA }
supply:
  voltage: { table: { file: bias.csv, time: t, voltage: bias } }
  series_resistance: 100 kohm
  parallel_capacitance: 20 pF
  trip: { current: 1 mA, delay: 20 us }
observe: { until: 5 ms }
`;

describe('what check prints for people', () => {
  test('says what the case means, marks defaults, and ends with the line that it is no clearance', async () => {
    const { code, out, err } = await program.run(['check', program.write('open.yaml', openCase())]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toMatch(/^Open case\n/);
    expect(out).toMatch(/^ {2}pressure +400 Pa = 3 Torr = 4 mbar$/m);
    expect(out).toMatch(/^ {2}gap voltage at t = 0 +0 V \(default\)$/m);
    expect(out).toMatch(/^ {2}series resistance +10 kohm$/m);
    // V_s of the case in closed form, Townsend's criterion: 209.274 V
    expect(out).toMatch(/^ {2}breakdown voltage V_s +209 V/m);
    expect(out).toMatch(/^ {2}overvoltage +\+10 %/m);
    expect(out.endsWith(`\n${NOT_A_CLEARANCE}\n`)).toBe(true);
  });

  test('gives no verdict', async () => {
    const { out } = await program.run(['check', program.write('open.yaml', openCase())]);
    expect(out).not.toMatch(/^(Holds|Breaks down|Undecided)/m);
  });

  test('names source, status, range and uncertainty of built-in data', async () => {
    program.write('bias.csv', 't [ms],bias [V]\n0,0\n1,420\n2,0\n');
    const { code, out } = await program.run(['check', program.write('argon.yaml', argonCase)]);
    expect(code).toBe(0);
    expect(out).toMatch(/ionisation α\/N: from memory \(H\), ± 11 %, 15 to 10000 Td/);
    expect(out.replace(/\s+/g, ' ')).toContain('Plasma Sources Sci. Technol. 8, R21, 1999');
    expect(out).toMatch(/supply: table +3 rows, 0 s to 2 ms, between 0 V and 420 V/);
    expect(out).toMatch(/trip senses +the current through the gap \(default\)/);
  });

  test('keeps to 80 columns, the last line excepted, which is one line by contract', async () => {
    program.write('bias.csv', 't [ms],bias [V]\n0,0\n1,420\n');
    const long = argonCase.replace('Counter bias', 'x'.repeat(150));
    const { out } = await program.run(['check', program.write('argon.yaml', long)]);
    for (const line of out.split('\n')) if (line !== NOT_A_CLEARANCE) expect([...line].length, line).toBeLessThanOrEqual(80);
  });

  test('validates a scan and a history, and says with one line each who uses them', async () => {
    const more = `scan:
  vary:
    - { path: gas.pressure, from: 1 Torr, to: 5 Torr, points: 5 }
    - { path: supply.voltage.step, values: [150 V, 200 V] }
  find: { what: hold-off, from: 100 V, to: 400 V }
history:
  duration: 2 h
  pressure: { ascent: { from: 0 km, to: 35 km, rate: 5 m/s } }
`;
    const path = program.write('studies.yaml', openCase({ voltage: 'step: 150 V', more }));
    const { code, out } = await program.run(['check', path]);
    expect(code).toBe(0);
    expect(out.replace(/\n +/g, ' ')).toContain('Its scan (10 points, hold-off at each) is not used here but by gapwake scan.');
    expect(out).toContain('Its pressure history (7200 s) is not used here but by gapwake window.');
    const ran = (await program.run(['run', path])).out;
    expect(ran).toContain('Its scan (10 points, hold-off at each) is not used here but by gapwake scan.\nIts pressure history');
    const plain = await program.run(['check', program.write('open.yaml', openCase())]);
    expect(plain.out).not.toMatch(/scan|history/);
    const resolved = JSON.parse((await program.run(['check', path, '--json'])).out).case;
    expect(resolved).toMatchObject({
      'scan.vary.0.points': 5,
      'scan.vary.1.to': 200,
      'scan.find.what': 'hold-off',
      'history.duration': 7200,
      'history.pressure.ascent.to': 35000,
      'history.voltage': 150,
    });
    expect((await program.run(['run', program.write('bad.yaml', openCase({ more: more.replace('2 h', '2 V') }))])).code).toBe(2);
  });

  test('escapes control characters of the title', async () => {
    const { out } = await program.run(['check', program.write('evil.yaml', openCase({ title: '"\\e[2J\\x9b31mred\\u202e"' }))]);
    expect(out).toMatch(/^\\u001b\[2J\\u009b31mred\\u202e\n/);
    // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
    expect(out).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202e]/);
  });

  test('--quiet prints nothing about a sound case', async () => {
    const { code, out, err } = await program.run(['check', '--quiet', program.write('open.yaml', openCase())]);
    expect({ code, out, err }).toEqual({ code: 0, out: '', err: '' });
  });
});

describe('check --json', () => {
  test('is one object with the case in SI by path, theory and cautions', async () => {
    const { code, out, err } = await program.run(['check', '--json', program.write('open.yaml', openCase())]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    const answer = JSON.parse(out);
    expect(Object.keys(answer)).toEqual(['format', 'title', 'version', 'case_sha256', 'case', 'theory', 'gas', 'ion_yield', 'cautions']);
    expect(answer.format).toBe('gapwake.check/1');
    expect(answer.case_sha256).toMatch(/^[0-9a-f]{64}$/);
    expect(answer.case['gap.spacing']).toBe(0.01);
    expect(answer.case['supply.voltage.step']).toBe(230.202);
    expect(answer.theory.static_breakdown_voltage_V).toBeCloseTo(209.274, 2);
    expect(answer.cautions.map(({ code }: { code: string }) => code)).toContain('not-a-clearance');
  });

  test('theory is taken at the highest voltage that the gap would see without conduction', async () => {
    // behind 1 Gohm and 100 pF (and 0.885 pF of the gap) the gap follows with 0.1 s: in 0.1 s it reaches 63 %
    const path = program.write('slow.yaml', openCase({ until: '0.1008854 s' }));
    const { out } = await program.run(['check', '--json', path, '--set', 'supply.series_resistance=1 Gohm']);
    const { theory } = JSON.parse(out);
    expect((theory.overvoltage + 1) * theory.static_breakdown_voltage_V).toBeCloseTo(230.202 * (1 - Math.exp(-1)), 2);
  });

  test('--set changes what is read, left to right', async () => {
    const path = program.write('open.yaml', openCase());
    const { out } = await program.run(['check', '--json', path, '--set', 'gas.pressure=1 Torr', '--set', 'gas.pressure=2 Torr']);
    expect(JSON.parse(out).case['gas.pressure']).toBeCloseTo(266.6447, 3);
  });

  test('--set of one arm of an either-or removes the other', async () => {
    const path = program.write('open.yaml', openCase());
    const { out } = await program.run(['check', '--json', path, '--set', 'supply.voltage.ramp={from: 0 V, to: 500 V, rate: 100 V/s}']);
    const { case: values } = JSON.parse(out);
    expect(values['supply.voltage.ramp.rate']).toBe(100);
    expect(values).not.toHaveProperty('supply.voltage.step');
  });

  test('control characters stay escaped on the way to a terminal', async () => {
    const { out } = await program.run(['check', '--json', program.write('evil.yaml', openCase({ title: '"\\x9b31m\\u202e"' }))]);
    expect(out).toContain('"title": "\\u009b31m\\u202e"');
    expect(JSON.parse(out).title).toBe('\u009b31m\u202e');
  });
});

describe('template and schema', () => {
  test('the template is a case that passes check', async () => {
    const { code, out } = await program.run(['check', '--template']);
    expect(code).toBe(0);
    expect(await program.run(['check', '--quiet', program.write('template.yaml', out)])).toMatchObject({ code: 0, out: '', err: '' });
  });

  test('the schema is a JSON Schema', async () => {
    const { code, out } = await program.run(['check', '--schema']);
    expect(code).toBe(0);
    expect(JSON.parse(out)).toMatchObject({ $schema: expect.stringContaining('json-schema.org'), type: 'object' });
  });
});

describe('wrong input', () => {
  test('every mistake is reported at once with its place, exit code 2, nothing on stdout', async () => {
    const text = openCase()
      .replace('spacing: 1 cm', 'spacing: 1')
      .replace('3 Torr', '5 mm')
      .replace('series_resistance', 'series_resistence')
      .replace('1e-10 A', '.nan');
    const path = program.write('wrong.yaml', text);
    for (const command of ['check', 'run']) {
      const { code, out, err } = await program.run([command, path]);
      expect({ code, out }).toEqual({ code: 2, out: '' });
      expect(err).toMatch(/wrong\.yaml:2:35: gap\.spacing: expected .*found 1/);
      expect(err).toMatch(/wrong\.yaml:4:15: gas\.pressure: /);
      expect(err).toMatch(/series_resistence.*did you mean series_resistance\?/);
      expect(err).toMatch(/seed\.cathode_current/);
      expect(err).toMatch(/\d problems; nothing was computed or written\.\n$/);
    }
  });

  test('problems are one JSON object on stdout with --json, and text on stderr', async () => {
    const path = program.write('wrong.yaml', openCase().replace('3 Torr', '5 mm'));
    const { code, out, err } = await program.run(['check', path, '--json']);
    expect(code).toBe(2);
    const { format, problems } = JSON.parse(out);
    expect(format).toBe('gapwake.problems/1');
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code: 'wrong-dimension', file: path, line: 4, column: 15, path: 'gas.pressure' });
    expect(Object.keys(problems[0])).toEqual(['code', 'file', 'line', 'column', 'path', 'expected', 'found', 'nearest']);
    expect(err).toContain('gas.pressure');
  });

  test('a wrong --set is placed at the argument', async () => {
    const path = program.write('open.yaml', openCase());
    const { code, err } = await program.run(['check', path, '--set', 'gas.pressure=5 mm']);
    expect(code).toBe(2);
    expect(err).toMatch(/^--set gas\.pressure: expected /);
  });

  test('a key that is to come is refused by name', async () => {
    const path = program.write('later.yaml', openCase().replace('seed: {', 'seed: { gas_ionisation: 1 1/(m^3 s), '));
    const { code, err } = await program.run(['check', path]);
    expect(code).toBe(2);
    expect(err).toMatch(/gas_ionisation.*not supported yet/);
  });

  test('file text is quoted with control characters escaped', async () => {
    const { code, err } = await program.run(['check', program.write('evil.yaml', openCase().replace('3 Torr', '"\\e[2J"'))]);
    expect(code).toBe(2);
    // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
    expect(err).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f]/);
  });

  test('what is no text, too long or empty exits with 2', async () => {
    const files = [
      program.write('binary.yaml', Uint8Array.from([0xff, 0xfe, 0x00, 0x80])),
      program.write('long.yaml', `# ${'x'.repeat(1_000_001)}`),
      program.write('huge.yaml', `# ${'x'.repeat(17e6)}`),
      program.write('empty.yaml', ''),
    ];
    for (const file of files) expect(await program.run(['check', file]), file).toMatchObject({ code: 2, out: '' });
  });

  test('a case that cannot be read exits with 4', async () => {
    mkdirSync(join(program.folder(), 'a-folder.yaml'), { recursive: true });
    symlinkSync('circular.yaml', join(program.folder(), 'circular.yaml'));
    for (const [path, reason] of [
      ['missing.yaml', 'no such file'],
      ['a-folder.yaml', 'a folder'],
      ['circular.yaml', 'ELOOP'],
      ['/dev/zero', 'not a regular file'],
    ]) {
      const { code, out, err } = await program.run(['check', path as string]);
      expect({ path, code, out }).toEqual({ path, code: 4, out: '' });
      expect(err).toContain(reason);
    }
  });

  test('leaves nothing behind', async () => {
    const path = program.write('wrong.yaml', openCase().replace('3 Torr', '5 mm'));
    const before = readdirSync(program.folder()).sort();
    await program.run(['run', path, '-o', 'result.h5']);
    expect(readdirSync(program.folder()).sort()).toEqual(before);
    expect(readFileSync(path, 'utf8')).toContain('5 mm');
  });
});
