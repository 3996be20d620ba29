/** The real program: values, tables, mistakes, workers, interruption. */
import { spawn } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { ended, openCase, plainEnvironment, realProgram } from './program.ts';

const program = realProgram();
const ROUGH = ['--accuracy', '5 %'];

interface SwarmJson {
  readonly format: string;
  readonly points: readonly Readonly<Record<string, number | string | boolean | null>>[];
  readonly cautions: readonly { readonly code: string; readonly text: string }[];
}

async function json(args: readonly string[]): Promise<SwarmJson> {
  const { code, out, err } = await program.run(['swarm', ...args, '--json']);
  expect({ args, code, err }).toEqual({ args, code: 0, err: '' });
  return JSON.parse(out) as SwarmJson;
}

const QUANTITIES = [
  'mean_energy_eV',
  'flux_drift_m_per_s',
  'bulk_drift_m_per_s',
  'N_D_transverse_per_m_s',
  'N_D_longitudinal_per_m_s',
  'ionisation_rate_m3_per_s',
  'attachment_rate_m3_per_s',
  'alpha_over_N_m2',
  'eta_over_N_m2',
];

describe('gapwake swarm', () => {
  test("gives Reid's published values with their errors, as JSON", async () => {
    const { format, points, cautions } = await json(['reid-ramp', '--at', '12 Td']);
    expect(format).toBe('gapwake.swarm/1');
    expect(cautions).toEqual([]);
    const [point] = points;
    expect(point).toMatchObject({ state: 'done', accuracy_reached: true });
    expect(point.reduced_field_Td).toBeCloseTo(12, 12);
    for (const name of QUANTITIES) {
      expect(point[name], name).toBeTypeOf('number');
      expect(point[`${name}_error`], name).toBeGreaterThanOrEqual(0);
    }
    // I. D. Reid, Aust. J. Phys. 32, 231, 1979 (from memory, M; another Monte Carlo program within 0.3 %)
    for (const [name, published] of [
      ['mean_energy_eV', 0.269],
      ['flux_drift_m_per_s', 6.837e4],
      ['bulk_drift_m_per_s', 6.837e4],
      ['N_D_transverse_per_m_s', 1.137e24],
      ['N_D_longitudinal_per_m_s', 5.7e23],
    ] as const)
      expect(Math.abs(Number(point[name]) - published), name).toBeLessThan(0.003 * published + 4 * Number(point[`${name}_error`]));
  });

  test('gives the same for one and for two workers, and other numbers for another seed', async () => {
    const args = ['argon', '--at', '500 Td, 300 Td', ...ROUGH];
    const one = await json([...args, '--workers', '1']);
    expect(one.points.map(({ reduced_field_Td }) => Math.round(Number(reduced_field_Td)))).toEqual([500, 300]);
    expect(await json([...args, '--workers', '2'])).toEqual(one);
    const other = await json([...args, '--seed', '2']);
    expect(other.points[0].mean_energy_eV).not.toBe(one.points[0].mean_energy_eV);
  });

  test('spaces fields from --from to --to evenly in the logarithm, and writes a table that a case takes', async () => {
    const path = join(program.folder(), 'argon.csv');
    const { code, out } = await program.run([
      'swarm',
      'argon',
      '--from',
      '100 Td',
      '--to',
      '900 Td',
      '--points',
      '3',
      ...ROUGH,
      '--csv',
      path,
    ]);
    expect(code).toBe(0);
    for (const line of out.split('\n')) expect([...line].length, line).toBeLessThanOrEqual(80);
    const lines = readFileSync(path, 'utf8').split('\n');
    expect(lines.filter((line) => /^\d/.test(line)).map((line) => Number(line.split(',')[0]))).toEqual([100, 300, 900]);
    const entries = lines.filter((line) => line.includes('table:')).map((line) => `    ${line.slice(2)}`);
    expect(entries).toHaveLength(3);
    const text = openCase()
      .replace(/ {4}ionisation:.*\n {4}electron_mobility:.*\n/, `${entries.join('\n')}\n`)
      .replace(/ {4}electron_energy: 1 V\n/, '');
    const checked = await program.run(['check', program.write('own.yaml', text), '--json']);
    expect({ code: checked.code, err: checked.err }).toEqual({ code: 0, err: '' });
    // again over its own table, but over nothing else
    const [args, foreign] = [
      ['swarm', 'reid-ramp', '--at', '12 Td', ...ROUGH, '--quiet', '--csv'],
      program.write('notes.csv', 'a,b\n1,2\n'),
    ];
    expect(await program.run([...args, path])).toMatchObject({ code: 0, out: '' });
    expect(await program.run([...args, foreign])).toMatchObject({ code: 4 });
    expect(readFileSync(foreign, 'utf8')).toBe('a,b\n1,2\n');
  });

  test("a user's set gives what the same set built in gives", async () => {
    // the ramp itself is a straight line, and so is a constant
    const set = program.write(
      'ramp.csv',
      'process,threshold [eV],energy [eV],cross_section [m^2]\nelastic,,0,6e-20\nelastic,,100,6e-20\nexcitation,0.2,0.2,0\nexcitation,0.2,100,9.98e-18\n',
    );
    const own = await json(['--cross-sections', set, '--mass', '4 u', '--temperature', '0 K', '--at', '12 Td', ...ROUGH]);
    const builtIn = await json(['reid-ramp', '--at', '12 Td', ...ROUGH]);
    for (const name of ['mean_energy_eV', 'flux_drift_m_per_s', 'N_D_longitudinal_per_m_s'])
      expect(Math.abs(Number(own.points[0][name]) - Number(builtIn.points[0][name])), name).toBeLessThan(
        5 * Number(own.points[0][`${name}_error`]),
      );
  });

  test('says where a set does not reach, and where there is no steady state', async () => {
    const set = program.write('short.csv', 'process,threshold [eV],energy [eV],cross_section [m^2]\nelastic,,0,1e-19\nelastic,,1,1e-19\n');
    const args = ['--cross-sections', set, '--mass', '2 u', '--at', '1.5 Td', ...ROUGH];
    const { cautions } = await json(args);
    expect(cautions.map(({ code }) => code)).toContain('outside-range');
    const far = await program.run(['swarm', '--cross-sections', set, '--mass', '2 u', '--at', '20000 Td', '--json']);
    expect(far.code).toBe(3);
    expect(JSON.parse(far.out)).toMatchObject({
      points: [{ state: 'runaway', mean_energy_eV: null, mean_energy_eV_error: null }],
      cautions: [{ code: 'runaway' }],
    });
  });

  const bad: readonly (readonly [args: readonly string[], message: RegExp])[] = [
    [[], /a gas, or --cross-sections/],
    [['argn', '--at', '1 Td'], /did you mean argon/],
    [['argon'], /--at "10 Td, 100 Td", or --from and --to/],
    [['argon', '--at', '10'], /10 without a unit/],
    [['argon', '--at', '10 Td,'], /found nothing/],
    [['argon', '--at', '0 Td'], /from 0.001 to 1e5 Td/],
    [['argon', '--at', '1 Td', '--to', '2 Td'], /either --at or --from/],
    [['argon', '--from', '1 Td'], /--from and --to/],
    [['argon', '--from', '1 Td', '--to', '1 Td'], /ends that differ/],
    [['argon', '--from', '1 Td', '--to', '2 Td', '--points', '1'], /whole number from 2 to 200/],
    [['argon', '--at', '1 Td', '--mass', '4 u'], /--mass only beside --cross-sections/],
    [['argon', '--cross-sections', 'x.csv', '--at', '1 Td'], /either a gas or --cross-sections/],
    [['--cross-sections', 'x.csv', '--at', '1 Td'], /without --mass/],
    [['argon', '--at', '1 Td', '--accuracy', '50 %'], /0.01 % to 10 %/],
    [['argon', '--at', '1 Td', '--scattering', 'forward'], /isotropic, screened-coulomb/],
    [['argon', '--at', '1 Td', '--seed', '-1'], /whole number/],
  ];
  test('refuses what it cannot take, with exit code 2', async () => {
    for (const [args, message] of bad) {
      const { code, out, err } = await program.run(['swarm', ...args]);
      expect({ args, code, out }).toEqual({ args, code: 2, out: '' });
      expect(err).toMatch(message);
    }
  });

  test('names file, line and column of what is wrong in a set, and says when there is none', async () => {
    const set = program.write('wrong.csv', 'process,threshold [eV],energy [eV],cross_section [m^2]\nelastic,,1,x\n');
    const { code, err } = await program.run(['swarm', '--cross-sections', set, '--mass', '4 u', '--at', '1 Td']);
    expect(code).toBe(2);
    expect(err).toMatch(/wrong\.csv:2:12: expected a finite number/);
    expect(await program.run(['swarm', '--cross-sections', 'none.csv', '--mass', '4 u', '--at', '1 Td'])).toMatchObject({ code: 4 });
  });

  test('stops at a signal and writes nothing', async () => {
    const path = join(program.folder(), 'never.csv');
    const child = spawn(process.execPath, [program.main(), 'swarm', 'argon', '--at', '10 Td', '--csv', path], {
      cwd: program.folder(),
      env: plainEnvironment(),
    });
    const end = ended(child);
    await new Promise((resume) => setTimeout(resume, 1500));
    child.kill('SIGINT');
    const { code, err } = await end;
    expect(code).toBe(130);
    expect(err).toMatch(/interrupted; 0 of 1 fields were done, nothing was written/);
    expect(existsSync(path)).toBe(false);
  });
});
