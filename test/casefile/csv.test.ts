import { execFileSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, truncateSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { formatProblem } from '../../src/casefile/index.ts';
import { tableReader } from '../../src/commands/tables.ts';
import { GOOD, good, OWN_GAS, problem, problems } from './help.ts';

const CASE = GOOD.replace('step: 420 V', 'table: { file: bias.csv, time: t, voltage: bias }');
const programme = (csv: string, text = CASE): unknown => good(text, [], { 'bias.csv': csv }).case.supply.programme;
const wrong = (csv: string, text = CASE): ReturnType<typeof problem> => problem(text, [], { 'bias.csv': csv });

describe('a table is read from CSV', () => {
  const expected = { kind: 'table', times: [0, 0.001], voltages: [0, 420] };

  it('with units in the header', () => {
    expect(programme('t [ms],bias [kV]\n0,0\n1,0.42\n')).toEqual(expected);
  });

  it('with units in the case', () => {
    const text = CASE.replace('time: t, voltage: bias', 'time: { column: t, unit: ms }, voltage: { column: bias, unit: kV }');
    expect(programme('t,bias\n0,0\n1,0.42\n', text)).toEqual(expected);
  });

  it('with comments, blank lines, quotes, other columns, carriage returns, a byte order mark and no last line end', () => {
    const csv = '\ufeff# measured\r\n"x, y", bias [V] ,t [s] # header\r\n\r\n1,0,0\r\n# middle\r\n2, 420 ,1e-3';
    expect(programme(csv)).toEqual(expected);
  });

  it('times may start before or after 0 and voltages may have both signs', () => {
    expect(programme('t [s],bias [V]\n-1,-5\n3,5\n')).toEqual({ kind: 'table', times: [-1, 3], voltages: [-5, 5] });
  });
});

describe('mistakes in a table', () => {
  const rows: [string, string, number | null, number | null, string, string, string | null][] = [
    ['no header', '# nothing\n', null, null, 'a header and at least two rows', 'no header', null],
    ['one row', 't [s],bias [V]\n0,0\n', null, null, 'at least two rows', '1', null],
    ['a word for a number', 't [s],bias [V]\n0,0\n1,high\n2,3\n', 3, 3, 'a finite number with a decimal point', 'high', null],
    ['a decimal comma', 't [s],bias [V]\n0,0\n1,"2,5"\n', 3, 3, 'a finite number with a decimal point', '2,5', null],
    ['nothing for a number', 't [s],bias [V]\n0,\n1,2\n', 2, 3, 'a finite number with a decimal point', 'nothing', null],
    ['NaN', 't [s],bias [V]\n0,NaN\n1,2\n', 2, 3, 'a finite number with a decimal point', 'NaN', null],
    ['an infinite number', 't [s],bias [V]\n0,1e999\n1,2\n', 2, 3, 'a finite number with a decimal point', '1e999', null],
    ['a field too many', 't [s],bias [V]\n0,0,0\n1,2\n', 2, 1, '2 fields, as in the header', '3', null],
    ['a column twice', 't [s],bias [V],t [s]\n0,0,0\n1,2,1\n', 1, 16, 'every column name once', 't again', null],
    ['an equal time', '# c\nt [s],bias [V]\n0,0\n0,1\n', 4, 1, 'strictly rising values', '0 after a value not below it', null],
    ['no unit', 't,bias [V]\n0,0\n1,2\n', 1, 1, 'a unit in the header, as in t [s], or in the case', 't without a unit', null],
    ['a wrong unit', 't [m],bias [V]\n0,0\n1,2\n', 1, 1, 'the unit of a time, e.g. 5 ms', 'm', null],
    ['an unknown unit', 't [S],bias [v]\n0,0\n1,2\n', 1, 1, 'the unit of a time', 'S', null],
  ];
  for (const [what, csv, line, column, expected, found, nearest] of rows) {
    it(what, () => {
      const all = problems(CASE, [], { 'bias.csv': csv });
      expect(all[0]).toMatchObject({ code: 'table', file: 'bias.csv', line, column, found, nearest });
      expect(all[0].expected).toContain(expected);
      expect(all[0].path.startsWith('supply.voltage.table.')).toBe(true);
    });
  }

  it('a column that is not there is placed in the case, with the nearest name', () => {
    expect(wrong('t [s],biass [V]\n0,0\n1,2\n')).toMatchObject({
      file: 'case.yaml',
      line: 14,
      path: 'supply.voltage.table.voltage',
      found: 'bias',
      nearest: 'biass',
    });
  });

  it('a second unit in the case is refused', () => {
    const text = CASE.replace('time: t', 'time: { column: t, unit: ms }');
    expect(wrong('t [s],bias [V]\n0,0\n1,2\n', text)).toMatchObject({
      expected: 'no second unit beside [s] in the header',
      found: 'ms',
      line: 14,
    });
  });

  it('several mistakes come together, at most twenty of one table', () => {
    expect(
      problems(CASE.replace('6 mm', '6'), [], { 'bias.csv': 't [s],bias [V]\n0,a\n0,b\n' })
        .map((p) => `${p.file}:${p.line}`)
        .sort(),
    ).toEqual(['bias.csv:2', 'bias.csv:3', 'bias.csv:3', 'case.yaml:4']);
    expect(problems(CASE, [], { 'bias.csv': `t [s],bias [V]\n${'x,y\n'.repeat(1000)}` })).toHaveLength(20);
  });

  it('the text form names the file of the table', () => {
    expect(formatProblem(wrong('t [s],bias [V]\n0,0\n1,high\n'))).toBe(
      'bias.csv:3:3: supply.voltage.table.voltage: expected a finite number with a decimal point, found high',
    );
  });

  it('a table that is 0 V throughout, and one that is not there, are refused in the case', () => {
    expect(wrong('t [s],bias [V]\n0,0\n1,0\n')).toMatchObject({ code: 'inconsistent', line: 14, path: 'supply.voltage.table.voltage' });
    expect(problem(CASE)).toMatchObject({ code: 'unreadable', line: 14, path: 'supply.voltage.table.file', found: 'no such file' });
  });

  it('a million and one rows are refused', () => {
    const csv = `t [s],bias [V]\n${Array.from({ length: 1_000_001 }, (_, i) => `${i},1`).join('\n')}`;
    expect(wrong(csv)).toMatchObject({ expected: 'at most 1000000 rows', line: 1_000_002 });
  });

  it('an ionisation table needs two rows above 0, no zero above them and none at zero field', () => {
    const text = OWN_GAS.replace(/\{ form: exp.*\}/, '{ table: { file: a.csv, reduced_field: x, coefficient: y } }');
    const expected = (rows: string): string => problem(text, [], { 'a.csv': `x [Td],y [m^2]\n${rows}` }).expected;
    expect(expected('1,0\n2,0\n')).toBe('at least two rows above 0');
    expect(expected('1,0\n2,1e-22\n')).toBe('at least two rows above 0');
    expect(expected('1,1e-22\n2,0\n3,1e-22\n')).toContain('zeros only below');
    expect(expected('0,1e-22\n2,1e-22\n')).toBe('0 at no field');
    expect(expected('1,-1e-22\n2,1e-22\n3,2e-22')).toBe('values not below 0');
    expect(good(text, [], { 'a.csv': 'x [Td],y [m^2]\n0,0\n1,1e-22\n2,2e-22\n' }).case.gas.coefficients.ionisation.form.kind).toBe('table');
  });
});

describe('the files of tables', () => {
  let folder = '';
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'gapwake-tables-'));
    writeFileSync(join(folder, 'good.csv'), 't [s],µ [V]\n');
    writeFileSync(join(folder, 'latin.csv'), Buffer.from([0x74, 0xb5, 0x0a]));
    writeFileSync(join(folder, 'large.csv'), '');
    truncateSync(join(folder, 'large.csv'), 70_000_000);
    mkdirSync(join(folder, 'sub'));
    execFileSync('mkfifo', [join(folder, 'pipe')]);
  });
  afterAll(() => rmSync(folder, { recursive: true }));

  it('are read relative to the case, as UTF-8', () => {
    expect(tableReader(folder)('good.csv')).toEqual({ ok: true, text: 't [s],µ [V]\n' });
    expect(tableReader(join(folder, 'sub'))('../good.csv')).toMatchObject({ ok: true });
  });

  it('are refused, without waiting or reading, unless they are regular files of at most 64 MB', () => {
    const reason = (name: string): string => {
      const result = tableReader(folder)(name);
      return result.ok ? '' : result.reason;
    };
    expect(reason('missing.csv')).toBe('no such file');
    expect(reason('sub')).toMatch(/^(a folder|not a regular file)$/);
    expect(reason('pipe')).toBe('not a regular file');
    expect(reason('large.csv')).toMatch(/^70.* MB, more than 64 MB$/);
    expect(reason('latin.csv')).toBe('not UTF-8');
    expect(reason('')).toBe('no file name');
    expect(reason('a\0b')).toBe('no file name');
    expect(reason('/dev/zero')).toMatch(/^an absolute path/);
  });
});
