import { describe, expect, test } from 'vitest';
import { readCase } from '../../src/casefile/index.ts';
import { gasCsv } from '../../src/commands/gas-csv.ts';
import { formulaOf } from '../../src/commands/gas-formula.ts';
import { listText } from '../../src/commands/gas-list-text.ts';
import { surfaceText } from '../../src/commands/gas-surface-text.ts';
import { gasText, valuesText } from '../../src/commands/gas-text.ts';
import type { Terminal } from '../../src/commands/terminal.ts';
import { curveOf } from '../../src/gases/curves.ts';
import type { Coefficient } from '../../src/gases/gas.ts';
import { dataSets, gasData, gases } from '../../src/gases/index.ts';
import { surfaces } from '../../src/surfaces/index.ts';
import { predict } from '../../src/theory/predict.ts';
import { minimum } from '../gases/townsend.ts';
import { realProgram } from './program.ts';

const program = realProgram();
const json = async (...args: string[]): Promise<unknown> => {
  const { code, out, err } = await program.run(['gas', ...args, '--json']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  return JSON.parse(out);
};
const same = (text: string): string => text;
const terminalOf = (width: number): Terminal => ({
  out: () => undefined,
  err: () => undefined,
  width,
  seen: false,
  live: false,
  errWidth: width,
  style: { strong: same, faint: same, alarm: same, doubt: same },
});
const oneLine = (text: string): string => text.replace(/\s+/g, ' ');
const everySet = Object.keys(gases).flatMap((gas) => dataSets(gas).map((set) => [gas, set] as const));

describe('gapwake gas without a name', () => {
  test('lists every gas with its data and every cathode material', async () => {
    const { code, out, err } = await program.run(['gas']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
    const lines = out.split('\n');
    for (const { name, set } of Object.values(gases)) expect(lines.find((l) => l.startsWith(`${name} `))).toContain(set);
    for (const { name } of Object.values(surfaces))
      expect(
        lines.some((l) => l.startsWith(`${name} `)),
        name,
      ).toBe(true);
    for (const line of lines) expect([...line].length, line).toBeLessThanOrEqual(80);
    expect(lines.find((l) => l.startsWith('nickel '))).toMatch(/4\.74 eV +0\.01 +0\.03 +0\.07/);
  });

  // test/gases/townsend.ts writes Townsend's criterion out for itself and searches in steps
  test('gives the breakdown minimum of each gas, as a search over fields finds it', async () => {
    const { gases: list } = (await json()) as {
      gases: { name: string; minimum: { voltage_V: number; pd_Pa_m: number; reduced_field_Td: number; ion_yield: number } }[];
    };
    expect(list.map(({ name }) => name)).toEqual(Object.keys(gases));
    for (const { name, minimum: given } of list) {
      const found = minimum(name, undefined, () => given.ion_yield);
      expect(Math.abs(given.voltage_V / found.voltage - 1), name).toBeLessThan(2e-5);
      expect(Math.abs(given.reduced_field_Td / found.td - 1), name).toBeLessThan(5e-3);
      expect(Math.abs(given.pd_Pa_m / (found.pd * 1.33322) - 1), name).toBeLessThan(5e-3);
    }
  });

  test('names the other sets of data', async () => {
    const { out } = await program.run(['gas']);
    expect(oneLine(out)).toContain('helium (lieberman, raizer)');
  });
});

describe('the page of a gas', () => {
  test.each(Object.keys(gases))('of %s has every coefficient of every set with range, source, standing and note', (gas) => {
    const page = oneLine(gasText(gases[gas], terminalOf(80)));
    const all = dataSets(gas).flatMap((set) => Object.values(gasData(gas, set)?.coefficients ?? {}) as (Coefficient | null)[]);
    expect(all.length).toBeGreaterThan(9);
    for (const coefficient of all) {
      if (coefficient === null) continue;
      expect(page).toContain(oneLine(coefficient.source));
      expect(page).toContain(oneLine(`${coefficient.status}, ${coefficient.uncertainty === null ? 'uncertainty not stated' : '± '}`));
      if (coefficient.note) expect(page).toContain(oneLine(coefficient.note));
      expect(page).toContain(oneLine(formulaOf(coefficient.form).replaceAll('\u00a0', ' ')));
    }
    for (const set of dataSets(gas)) expect(page).toContain(oneLine(gasData(gas, set)?.reason ?? '?'));
    for (const note of gases[gas].notes) expect(page).toContain(oneLine(note));
    expect(page).toContain(`Detachment from negative ions: ${oneLine(gases[gas].detachment ?? 'none')}`);
  });

  test('gives the yields of every material in it, from low to high, and what is known of clean ones', async () => {
    const { out } = await program.run(['gas', 'argon']);
    expect(out).toMatch(/^ {2}nickel +0\.07 +0\.017 to 0\.16 +0\.09 +4\.74 eV$/m);
    // Hagstrum 1954/56 (from memory, H): Ar+ on clean tungsten 0.095; von Engel 1965: 0.0019 gives the minimum on iron
    expect(out).toMatch(/^ {2}tungsten +0\.07 +0\.017 to 0\.16 +0\.095 +4\.565 eV$/m);
    expect(out).toMatch(/^ {2}iron +0\.07 +0\.0019 to 0\.16/m);
    expect(oneLine(out)).toContain('law of the ion energy, technical metal: from memory (H), ± 50 %');
  });

  test('takes a set of data by name, and says which is the default', async () => {
    const { out } = await program.run(['gas', 'helium', '--data', 'raizer']);
    expect(oneLine(out)).toContain('Data raizer, chosen; others: ward, lieberman');
    expect(out).toMatch(/^Data ward \(default\)$/m);
    // exact algebra, 3 and 34 with the typical yield 0.18: e (34/3) ln(1 + 1/0.18) = 57.9 V
    expect(oneLine(out)).toContain('Breakdown minimum, closed form: 57.9 V');
  });

  test('takes a name of two words with or without quotes', async () => {
    const [bare, quoted] = await Promise.all([
      program.run(['gas', 'carbon', 'dioxide', '--json']),
      program.run(['gas', 'carbon dioxide', '--json']),
    ]);
    expect(bare.out).toBe(quoted.out);
    expect(JSON.parse(bare.out).gas.name).toBe('carbon dioxide');
  });

  test('keeps to the width of the terminal, from 40 to 80 columns, as the list and the materials do', () => {
    for (const width of [40, 60, 80]) {
      const terminal = terminalOf(width);
      const pages = [
        listText(terminal),
        ...Object.values(gases).map((gas) => gasText(gas, terminal)),
        ...Object.values(gases).map((gas) => valuesText(gas, [1e-20, 1e-19, 1e-18, 1e-17], terminal)),
        ...Object.values(surfaces).map((surface) => surfaceText(surface, terminal)),
      ];
      // below 70 columns tables of five columns may stand out
      const limit = width < 70 ? 80 : width;
      for (const line of pages.join('\n').split('\n')) expect([...line].length, line).toBeLessThanOrEqual(limit);
    }
    for (const line of listText(terminalOf(40)).split('\n')) expect([...line].length, line).toBeLessThanOrEqual(40);
  });
});

describe('the page of a cathode material', () => {
  test('has its work function and its yield in every gas, each with its source', async () => {
    const { out } = await program.run(['gas', 'stainless', 'steel']);
    const page = oneLine(out);
    // Riviere 1957 gives no stainless steel: a handbook figure
    expect(page).toContain('Work function 4.4 eV ± 0.2 eV: from memory (M). about 4.4 eV, common handbook figure.');
    for (const gas of Object.keys(gases))
      expect(page).toContain(oneLine((surfaces['stainless steel'].yields[gas] ?? { source: '?' }).source));
    const given = (await json('nickel')) as {
      surface: { work_function: { value_eV: number }; ion_yields: Record<string, { typical: number }> };
    };
    expect(given.surface.work_function.value_eV).toBe(4.74);
    expect(given.surface.ion_yields.argon.typical).toBe(0.07);
  });
});

describe('gapwake gas NAME --at', () => {
  test('prints the value of every coefficient at every field, and marks what lies outside its range', async () => {
    const { code, out } = await program.run(['gas', 'argon', '--at', '100 Td, 5000 Td']);
    expect(code).toBe(0);
    // α/N computed from the fit of Phelps and Petrović (from memory, H): 9.304e-22 at 100 Td, 3.120e-20 at 5000 Td, valid to 10000
    expect(out).toMatch(/^ {2}ionisation α\/N \[m\^2\] +9\.304e-22 +3\.12e-20$/m);
    // mobility valid to 1000 Td: 7.8e23 at 100 Td, (50)^−0.121 of it at 5000
    expect(out).toMatch(/^ {2}electron mobility \[1\/\(m V s\)\] +7\.8e23 +4\.859e23\*$/m);
    // W = 4 x/(1 + (0.007 x)^1.5)^0.33 m/s: 343.6 at 100 Td
    expect(out).toMatch(/^ {2}drift of ions \[m\/s\] +343\.6 +/m);
    // Ward, 29.22 and 26.64 at 0 °C, 2.829 Td per V/(cm Torr): 29.22e2/3.535e22 e^{−26.64 √(2.829/100)} = 9.36e-22
    expect(out).toMatch(/^ {2}α\/N, data ward \[m\^2\] +9\.36\de-22 +/m);
    expect(out).toContain('* outside the range of the source');
  });

  test('reads E/p at 20 °C', async () => {
    const { gas } = (await json('nitrogen', '--at', '100 V/(cm Torr)')) as { gas: { at: { reduced_field_Td: number }[] } };
    // 1 V/(cm Torr) = 3.036 Td at 20 °C (computed)
    expect(Math.abs(gas.at[0].reduced_field_Td / 303.6 - 1)).toBeLessThan(1e-3);
  });

  test('has values at zero field and at 1e5 Td, and none beyond', async () => {
    const { gas } = (await json('air', '--at', '0 Td; 1e5 Td')) as {
      gas: { at: { coefficients: Record<string, { value: number; outside_range: boolean }> }[] };
    };
    expect(gas.at[0].coefficients.ionisation).toEqual({ value: 0, outside_range: false });
    expect(gas.at[1].coefficients.ionisation.outside_range).toBe(true);
    for (const at of gas.at) for (const { value } of Object.values(at.coefficients)) expect(value).toBeGreaterThanOrEqual(0);
    expect((await program.run(['gas', 'air', '--at', '1.1e5 Td'])).code).toBe(2);
  });
});

describe('gapwake gas NAME --csv', () => {
  const caseWith = (gas: string, torr: number): string => `
gap: { geometry: planar, spacing: 1 cm, area: 10 cm^2 }
gas: { ${gas}, pressure: ${torr} Torr, temperature: 293.15 K }
electrodes: { left: { ion_yield: 0.02 } }
seed: { cathode_current: 1 pA }
supply: { voltage: { step: 300 V }, series_resistance: 1 kohm }
observe: { until: 1 ms }
`;

  // monotone cubics through 40 rows a decade: 1e-3 in V_s is far below what any α is known to
  test.each(everySet)('is what a case takes: %s, %s, has the V_s of the built-in data within 1e-3', (name, set) => {
    const data = gasData(name, set);
    if (data === null) throw new Error('no such set');
    const csv = gasCsv(data);
    // the lines that the comments say to use
    const advised = csv.split('\n').filter((line) => /^# {7}\w/.test(line));
    const used = advised.map((line) =>
      line
        .replace(/^# {7}/, '')
        .replace('THIS FILE', 'g.csv')
        .replace(/ +#.*/, ''),
    );
    expect(used.length).toBeGreaterThan(4);
    for (const torr of [0.6, 3, 30]) {
      const table = readCase(caseWith(`coefficients: { ${used.join(', ')} }`, torr), 'gas.yaml', () => ({ ok: true, text: csv }));
      if (!table.ok) throw new Error(JSON.stringify(table.problems));
      const from = predict({ ...table.case, gas: { ...table.case.gas, coefficients: data.coefficients } }, 300);
      const { static_breakdown_voltage_V: found } = predict(table.case, 300);
      const { static_breakdown_voltage_V: expected } = from;
      if (expected === null || found === null) expect(found).toBe(expected);
      else expect(Math.abs(found / expected - 1), `${torr} Torr`).toBeLessThan(1e-3);
    }
  });

  test('has the values of every curve in its rows, and ranges for the case', async () => {
    const { code, out } = await program.run(['gas', 'argon', '--csv']);
    expect(code).toBe(0);
    const rows = out.split('\n').filter((line) => line !== '' && !line.startsWith('#'));
    expect(rows[0]).toBe(
      'EN [Td],ionisation [m^2],electron_mobility [1/(m V s)],electron_energy [V],ion_mobility [1/(m V s)],ion_energy [V]',
    );
    const [td, alpha, mobility] = rows[60].split(',').map(Number);
    expect(Math.abs(alpha / curveOf(gases.argon.coefficients.ionisation.form).valueAt(td * 1e-21) - 1)).toBeLessThan(1e-6);
    expect(Math.abs(mobility / (7.8e23 * (td / 100) ** -0.121) - 1)).toBeLessThan(1e-3);
    expect(out).toContain('coefficient: ionisation }, valid_from: 15 Td, valid_to: 10000 Td }');
    expect([Number(rows[1].split(',')[0]), Number(rows[rows.length - 1].split(',')[0])]).toEqual([3, 10000]);
  });
});

describe('gapwake gas NAME --json', () => {
  test('has the documented keys, the sets complete or with what they replace', async () => {
    const answer = (await json('helium')) as Record<string, unknown> & {
      gas: {
        sets: { name: string; coefficients: Record<string, unknown> }[];
        coefficients: Record<string, { unit: string; range_Td: unknown }>;
      };
    };
    expect(answer.format).toBe('gapwake.gas/1');
    expect(Object.keys(answer)).toEqual(['format', 'version', 'gases', 'surfaces', 'gas', 'surface']);
    expect([answer.gases, answer.surfaces, answer.surface]).toEqual([null, null, null]);
    expect(answer.gas.sets.map(({ name }) => name)).toEqual(['ward', 'lieberman', 'raizer']);
    expect(Object.keys(answer.gas.sets[0].coefficients)).toEqual(Object.keys(answer.gas.coefficients));
    expect(Object.keys(answer.gas.sets[1].coefficients)).toEqual(['ionisation']);
    expect(answer.gas.coefficients.ionisation.unit).toBe('m^2');
    const keys = ['unit', 'form', 'range_Td', 'source', 'status', 'uncertainty', 'reference_temperature_K', 'note'];
    for (const [name, coefficient] of Object.entries(answer.gas.coefficients)) expect(Object.keys(coefficient), name).toEqual(keys);
  });
});

describe('mistakes', () => {
  test('in a name: the nearest spelling, exit 2', async () => {
    const { code, out, err } = await program.run(['gas', 'argn']);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toMatch(/^gapwake: no gas or material argn; expected one of argon, nitrogen, .*graphite, metal\. Did you mean argon\?\n$/);
    const problems = JSON.parse((await program.run(['gas', 'Nickel', '--json'])).out).problems;
    expect(problems).toMatchObject([{ code: 'unknown-name', found: 'Nickel', nearest: 'nickel' }]);
  });

  test.each([
    [['gas', 'helium', '--data', 'wrad'], 'Did you mean ward?'],
    [['gas', 'argon', '--at', '100'], '100 without a unit'],
    [['gas', 'argon', '--at', '5 mm'], '5 mm'],
    [['gas', 'argon', '--at', '-1 Td'], 'from 0 to'],
    [['gas', '--at', '100 Td'], '--at needs the name of a gas'],
    [['gas', '--csv'], '--csv needs the name of a gas'],
    [['gas', 'nickel', '--csv'], 'is a material'],
    [['gas', 'argon', '--csv', '--at', '1 Td'], 'cannot be used with'],
    [['gas', 'constructor'], 'no gas or material'],
    [['gas', 'argon', '--data', 'toString'], 'argon has no data'],
  ])('%j: exit 2, and nothing on stdout', async (args, message) => {
    const { code, out, err } = await program.run(args);
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toContain(message);
  });

  test('of a terminal: control characters in a name come out escaped', async () => {
    const { err } = await program.run(['gas', 'ar\u001b[2Jgon']);
    expect(err).not.toContain('\u001b');
  });
});
