import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { exitCodeOf } from '../../src/commands/cli.ts';
import type { Terminal } from '../../src/commands/terminal.ts';
import { ended, plainEnvironment, realProgram } from './program.ts';

const program = realProgram();

describe('help and version', () => {
  test('no arguments print the help and are no mistake', async () => {
    const { code, out, err } = await program.run([]);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toMatch(/^Usage: gapwake/);
    expect(out).toContain('check');
    expect(out).toContain('run');
  });

  test('every way to ask for help answers on stdout, within 80 columns', async () => {
    for (const args of [
      ['--help'],
      ['-h'],
      ['help'],
      ['help', 'run'],
      ['run', '--help'],
      ['check', '-h'],
      ['scan', '-h'],
      ['window', '-h'],
      ['report', '-h'],
      ['gas', '-h'],
    ]) {
      const { code, out, err } = await program.run(args);
      expect({ args, code, err }).toEqual({ args, code: 0, err: '' });
      for (const line of out.split('\n')) expect(line.length, line).toBeLessThanOrEqual(80);
    }
  });

  test('help lists only commands that exist', async () => {
    const { out } = await program.run(['--help']);
    const listed = [...out.matchAll(/^ {2}([a-z]+) .*?\b/gm)].map(([, name]) => name).filter((name) => name !== 'gapwake');
    for (const known of ['check', 'run', 'scan', 'window', 'report', 'gas', 'help']) expect(listed).toContain(known);
    for (const name of listed.filter((one) => one !== 'help')) {
      const { code, out: help } = await program.run(['help', name]);
      expect({ name, code }).toEqual({ name, code: 0 });
      expect(help).toMatch(/^Usage: gapwake/);
    }
  });

  test('the version is that of package.json', async () => {
    const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as { version: string };
    expect(await program.run(['--version'])).toMatchObject({ code: 0, out: `${version}\n`, err: '' });
  });
});

describe('usage errors', () => {
  const wrong: readonly (readonly [args: readonly string[], message: RegExp])[] = [
    [['chekc', 'x.yaml'], /unknown command 'chekc' \(Did you mean check\?\)/],
    [['help', 'chekc'], /unknown command 'chekc'/],
    [['run'], /missing required argument 'case'/],
    [['check'], /missing required argument 'case'/],
    [['run', 'x.yaml', '--jsn'], /unknown option '--jsn' \(Did you mean --json\?\)/],
    [['run', 'x.yaml', 'y.yaml'], /too many arguments/],
    [['run', 'x.yaml', '--set'], /argument missing/],
    [['run', 'x.yaml', '-o'], /argument missing/],
    [['run', 'x.yaml', '--expect', 'maybe'], /Allowed choices are holds, breaks-down/],
    [['run', 'x.yaml', '--template'], /unknown option '--template'/],
    [['check', '--template', '--schema'], /cannot be used with/],
    [['check', '--template', 'x.yaml'], /not read with --template/],
    [['--json'], /unknown option/],
  ];

  test('exit with 2, say what is wrong on stderr and where help is', async () => {
    for (const [args, message] of wrong) {
      const { code, out, err } = await program.run(args);
      expect({ args, code, out: args.includes('--json') ? '' : out }).toEqual({ args, code: 2, out: '' });
      expect(err).toMatch(message);
      expect(err).toMatch(/--help shows what it takes\.\n$/);
    }
  });

  test('are one JSON object on stdout with --json', async () => {
    const { code, out, err } = await program.run(['run', 'x.yaml', '--json', '--expct', 'holds']);
    expect(code).toBe(2);
    expect(JSON.parse(out)).toEqual({
      format: 'gapwake.problems/1',
      problems: [
        {
          code: 'usage',
          file: 'arguments',
          line: null,
          column: null,
          path: '',
          expected: 'what gapwake run --help shows',
          found: "unknown option '--expct' (Did you mean --expect?)",
          nearest: '--expect',
        },
      ],
    });
    expect(err).toContain('--expct');
  });

  test('quote control characters escaped', async () => {
    const { code, err } = await program.run(['\u001b[31mred\u009b2J']);
    expect(code).toBe(2);
    expect(err).toContain('\\u001b[31mred\\u009b2J');
    // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
    expect(err).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f]/);
  });
});

test('an older Node gets one friendly line and exit code 2', async () => {
  const old = `Object.defineProperty(process.versions, 'node', { value: '18.19.0' }); import(${JSON.stringify(program.main())});`;
  const { code, out, err } = await ended(spawn(process.execPath, ['--input-type=module', '-e', old], { env: plainEnvironment() }));
  expect({ code, out, err }).toEqual({ code: 2, out: '', err: 'gapwake needs Node 20 or newer; this is v18.19.0\n' });
});

describe('an internal fault', () => {
  const said: string[] = [];
  const plain = (text: string): string => text;
  const broken: Terminal = {
    out: () => {
      throw new TypeError('planted\nin two lines \u001b[1m');
    },
    err: (text) => void said.push(text),
    width: 80,
    seen: false,
    live: false,
    errWidth: 80,
    style: { strong: plain, faint: plain, alarm: plain, doubt: plain },
  };

  test('is one line and exit code 70', async () => {
    said.length = 0;
    expect(await exitCodeOf(['check', '--template'], broken)).toBe(70);
    expect(said).toEqual(['gapwake: internal fault: planted; GAPWAKE_TRACE=1 shows where\n']);
  });

  test('shows where when GAPWAKE_TRACE asks for it', async () => {
    said.length = 0;
    process.env.GAPWAKE_TRACE = '1';
    try {
      expect(await exitCodeOf(['check', '--template'], broken)).toBe(70);
    } finally {
      delete process.env.GAPWAKE_TRACE;
    }
    expect(said.join('')).toMatch(/\n {4}at /);
  });
});
