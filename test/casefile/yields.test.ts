/** The yield of an electrode: a number, a number with its spread, a table against the field, or the condition of a material's surface. */
import { describe, expect, it } from 'vitest';
import { cleanYieldFor, yieldLawFor } from '../../src/surfaces/index.ts';
import { yieldAt } from '../../src/surfaces/yield-law.ts';
import { GOOD, good, OWN_GAS, problem, problems, varied } from './help.ts';

const left = (text: string): string => GOOD.replace('{ ion_yield: 0.02 }', text);
const TABLES = {
  'yield.csv': 'EN [Td],gamma\n100,0.01\n300,0.02\n1000,0.05\n',
  'percent.csv': 'EN [V m^2],gamma [%]\n1e-19,1\n3e-19,2\n1e-18,5\n',
  'field.csv': 'Ep [V/(cm Torr)],gamma\n100,0.01\n300,0.02\n',
  'large.csv': 'EN [Td],gamma\n100,0.01\n300,20\n',
  'one.csv': 'EN [Td],gamma\n100,0.01\n',
};
const table = (file: string, more = ''): string =>
  left(`{ ion_yield: { table: { file: ${file}, reduced_field: ${file === 'field.csv' ? 'Ep' : 'EN'}, yield: gamma }${more} } }`);
const Td = 1e-21;

describe('ion_yield with its spread', () => {
  it('is a yield with two ends, given by the case', () => {
    const { case: c, resolved } = good(left('{ ion_yield: { low: 0.005, typical: 2 %, high: 0.08 } }'));
    expect(c.electrodes.left.ionYield).toEqual({
      low: 0.005,
      typical: 0.02,
      high: 0.08,
      source: 'case file',
      status: 'given',
      uncertainty: null,
    });
    expect(c.electrodes.right).toBe(c.electrodes.left);
    expect(resolved).toMatchObject({
      'electrodes.left.ion_yield.low': 0.005,
      'electrodes.left.ion_yield.typical': 0.02,
      'electrodes.left.ion_yield.high': 0.08,
    });
    expect(resolved).not.toHaveProperty('electrodes.left.ion_yield');
  });

  it('without ends is the number alone, to the hash too', () => {
    const { case: c, resolved } = good(left('{ ion_yield: { typical: 0.02 } }'));
    expect(c.sha256).toBe(good(GOOD).case.sha256);
    expect(resolved['electrodes.left.ion_yield']).toBe(0.02);
    expect(good(left('{ ion_yield: { typical: 0.02, high: 0.03 } }')).case.electrodes.left.ionYield).toMatchObject({
      low: 0.02,
      high: 0.03,
    });
    expect(good(left('{ ion_yield: { typical: 0.02, high: 0.03 } }')).case.sha256).not.toBe(c.sha256);
  });

  it.each([
    ['no typical value', '{ low: 0.01, high: 0.02 }', 'typical', 'missing-key', 'typical, required without table', 'nothing'],
    ['an empty mapping', '{}', 'typical', 'missing-key', 'typical, required without table', 'nothing'],
    ['a low end above', '{ low: 0.03, typical: 0.02 }', 'low', 'inconsistent', 'not above typical', '0.03 beside typical 0.02'],
    ['a high end below', '{ typical: 0.02, high: 0.01 }', 'high', 'inconsistent', 'not below typical', '0.01 beside typical 0.02'],
    ['a negative end', '{ low: -0.1, typical: 0.02 }', 'low', 'out-of-range', 'from 0', '-0.1'],
    ['a yield of 11', '{ typical: 11 }', 'typical', 'out-of-range', 'from 0 to 10', '11'],
    ['a high end of 11', '{ typical: 0.02, high: 11 }', 'high', 'out-of-range', 'from 0 to 10', '11'],
    ['a unit', '{ typical: 0.02 V }', 'typical', 'wrong-dimension', 'electrons per ion', '0.02 V, a voltage'],
    ['NaN', '{ typical: .nan }', 'typical', 'not-finite', 'electrons per ion', 'NaN'],
    [
      'an unknown key',
      '{ typical: 0.02, hihg: 0.03 }',
      'hihg',
      'unknown-key',
      'a key of electrodes.left.ion_yield (low, typical, high, table)',
      'hihg',
    ],
  ])('refuses %s', (_, text, key, code, expected, found) => {
    const one = problem(left(`{ ion_yield: ${text} }`));
    expect(one).toMatchObject({ path: `electrodes.left.ion_yield.${key}`, line: 10, code, found });
    expect(one.expected).toContain(expected);
  });

  it.each([
    ['[0.02]', 'wrong-type', 'a list'],
    ['true', 'wrong-type', 'true'],
    ['abc', 'not-a-quantity', 'abc'],
    ['-1', 'out-of-range', '-1'],
    ['.nan', 'not-finite', 'NaN'],
  ])('refuses %s in its place', (text, code, found) => {
    const one = problem(left(`{ ion_yield: ${text} }`));
    expect(one).toMatchObject({ path: 'electrodes.left.ion_yield', code, found });
    expect(one.expected).toContain('electrons per ion from 0 to 10, e.g. 0.02');
  });

  it('tells both wrong ends at once', () => {
    const all = problems(left('{ ion_yield: { low: 0.5, typical: 0.02, high: 0.01 } }'));
    expect(all.map((p) => p.path)).toEqual(['electrodes.left.ion_yield.low', 'electrodes.left.ion_yield.high']);
  });
});

describe('ion_yield as a table against E/N', () => {
  it('is interpolated between its rows, held at its ends, with factors for the ends of the spread', () => {
    const { case: c, resolved, tables } = good(table('yield.csv', ', low: 0.5, high: 2'), [], TABLES);
    const { ionYield } = c.electrodes.left;
    expect(ionYield).toMatchObject({ typical: 1, low: 0.5, high: 2, status: 'given' });
    for (const [td, value] of [
      [1, 0.01],
      [100, 0.01],
      [300, 0.02],
      [1000, 0.05],
      [9000, 0.05],
    ])
      expect(yieldAt(ionYield, td * Td)).toBeCloseTo(value, 12);
    const between = yieldAt(ionYield, 200 * Td);
    expect(between).toBeGreaterThan(0.01);
    expect(between).toBeLessThan(0.02);
    expect(resolved['electrodes.left.ion_yield.table']).toMatch(/^sha256:[0-9a-f]{64}$/);
    expect(resolved).toMatchObject({ 'electrodes.left.ion_yield.low': 0.5, 'electrodes.left.ion_yield.high': 2 });
    expect(tables).toEqual([{ path: 'electrodes.left.ion_yield.table', file: 'yield.csv', text: TABLES['yield.csv'] }]);
  });

  it('has a hash of its numbers, in whatever units they stand', () => {
    const [a, b] = ['yield.csv', 'percent.csv'].map((file) => good(table(file), [], TABLES).case);
    const ends = [a, b].map(({ electrodes }) => yieldAt(electrodes.left.ionYield, 300 * Td));
    expect(ends[0]).toBeCloseTo(ends[1], 12);
    expect(a.sha256).not.toBe(good(GOOD).case.sha256);
    expect(good(table('yield.csv', ', high: 2'), [], TABLES).case.sha256).not.toBe(a.sha256);
    const changed = { 'yield.csv': TABLES['yield.csv'].replace('0.05', '0.06') };
    expect(good(table('yield.csv'), [], changed).case.sha256).not.toBe(a.sha256);
  });

  it.each([
    ['a missing file', table('none.csv'), 'table.file', 'unreadable'],
    ['a field against pressure, whose temperature nobody states', table('field.csv'), 'table.reduced_field', 'table'],
    ['a yield of 20', table('large.csv'), 'table.yield', 'out-of-range'],
    ['one row', table('one.csv'), 'table.file', 'table'],
    ['a factor above 1 at the low end', table('yield.csv', ', low: 2'), 'low', 'inconsistent'],
    ['a factor below 1 at the high end', table('yield.csv', ', high: 0.5'), 'high', 'inconsistent'],
    ['a typical value beside it', table('yield.csv', ', typical: 0.02'), 'table', 'either-or'],
  ])('refuses %s', (_, text, path, code) => {
    expect(problem(text, [], TABLES)).toMatchObject({ path: `electrodes.left.ion_yield.${path}`, code });
  });
});

describe('the condition of a surface', () => {
  it('takes the law of argon on clean or technical metal, its uncertainty as the spread', () => {
    for (const [condition, uncertainty] of [
      ['clean', 0.3],
      ['technical', 0.5],
    ] as const) {
      const { case: c, resolved } = good(left(`{ material: nickel, surface: ${condition} }`));
      const { ionYield } = c.electrodes.left;
      expect(ionYield.law).toEqual(yieldLawFor('nickel', 'argon', condition)?.law);
      expect(ionYield).toMatchObject({ typical: 1, high: 1 + uncertainty, status: 'from memory (H)' });
      expect(ionYield.low).toBeCloseTo(1 / (1 + uncertainty), 12);
      expect(c.electrodes.left.workFunction).toBe(4.74);
      expect(resolved).toMatchObject({ 'electrodes.left.material': 'nickel', 'electrodes.left.surface': condition });
      expect(c.sha256).not.toBe(good(left('{ material: nickel }')).case.sha256);
    }
  });

  it('clean also takes the yield of slow ions in other gases', () => {
    const text = left('{ material: tungsten, surface: clean }').replace('name: argon', 'name: helium');
    expect(good(text).case.electrodes.left.ionYield).toEqual(cleanYieldFor('tungsten', 'helium'));
  });

  const inGas = (gas: string, electrode: string): string => left(electrode).replace('name: argon', gas);
  it.each([
    [
      'technical in nitrogen',
      inGas('name: nitrogen', '{ material: nickel, surface: technical }'),
      'that of technical nickel in nitrogen is not',
    ],
    ['clean graphite in argon', left('{ material: graphite, surface: technical }'), 'that of technical graphite in argon is not'],
    ['clean in hydrogen', inGas('name: hydrogen', '{ material: nickel, surface: clean }'), 'that of clean nickel in hydrogen is not'],
    [
      'any in a mixture',
      inGas('mixture: { argon: 0.9, neon: 0.1 }', '{ material: nickel, surface: clean }'),
      'that of clean nickel in a mixture is not',
    ],
    [
      'any with coefficients of the case alone',
      OWN_GAS.replace('{ ion_yield: 0.02 }', '{ material: nickel, surface: clean }'),
      'in this gas is not',
    ],
  ])('refuses %s', (_, text, expected) => {
    const one = problem(text);
    expect(one).toMatchObject({ path: 'electrodes.left.surface', code: 'inconsistent' });
    expect(one.expected).toContain(expected);
  });

  it('is refused without a material, beside a yield, and by another name', () => {
    expect(problem(left('{ material: nickel, surface: clean, ion_yield: 0.1 }'))).toMatchObject({
      path: 'electrodes.left.surface',
      code: 'either-or',
    });
    expect(problems(left('{ surface: clean }')).map((p) => p.path)).toEqual(['electrodes.left', 'electrodes.left.surface']);
    expect(problem(left('{ material: nickel, surface: cleen }'))).toMatchObject({ code: 'unknown-name', nearest: 'clean' });
  });

  it('of a mixture of one gas is that in the gas', () => {
    expect(good(inGas('mixture: { argon: 1 }', '{ material: nickel, surface: clean }')).case.electrodes.left.condition).toBe('clean');
  });
});

describe('--set of yields', () => {
  const nickel = left('{ material: nickel, surface: technical }');

  it('of a yield removes the material with its surface, and the other way round', () => {
    expect(good(nickel, ['electrodes.left.ion_yield={ low: 0.01, typical: 0.02, high: 0.03 }']).case.electrodes.left).toMatchObject({
      material: null,
      ionYield: { low: 0.01, typical: 0.02, high: 0.03 },
    });
    expect(good(nickel, ['electrodes.left.ion_yield.typical=0.02']).case.sha256).toBe(good(GOOD).case.sha256);
    expect(good(GOOD, ['electrodes.left.material=nickel', 'electrodes.left.surface=clean']).case.electrodes.left.condition).toBe('clean');
  });

  it('keeps the surface when another material is set', () => {
    expect(good(nickel, ['electrodes.left.material=copper']).case.electrodes.left).toMatchObject({
      material: 'copper',
      condition: 'technical',
    });
  });

  it('of a table removes the numbers, whose ends mean something else, and the other way round', () => {
    const spread = left('{ ion_yield: { low: 0.01, typical: 0.02, high: 0.03 } }');
    const asTable = good(
      spread,
      ['electrodes.left.ion_yield.table={ file: yield.csv, reduced_field: EN, yield: gamma }', 'electrodes.left.ion_yield.high=3'],
      TABLES,
    );
    expect(asTable.case.electrodes.left.ionYield).toMatchObject({ typical: 1, low: 1, high: 3 });
    const back = good(table('yield.csv', ', low: 0.5'), ['electrodes.left.ion_yield.typical=0.02'], TABLES);
    expect(back.case.sha256).toBe(good(GOOD).case.sha256);
  });
});

describe('a scan over yields', () => {
  const entry = (path: string): string[] => [`{ path: electrodes.left.${path}, values: [0.01, 0.03] }`];
  const spread = (path: string): string =>
    varied(entry(path)).replace('{ ion_yield: 0.02 }', '{ ion_yield: { low: 0.005, typical: 0.02, high: 0.08 } }');

  it('varies a number as a number, and the typical value of a mapping with its ends kept', () => {
    const plain = good(varied(entry('ion_yield'))).at([0.03]);
    expect(plain.ok && plain.case.electrodes.left.ionYield).toMatchObject({ low: 0.03, typical: 0.03, high: 0.03 });
    const mapped = good(spread('ion_yield.typical')).at([0.03]);
    expect(mapped.ok && mapped.case.electrodes.left.ionYield).toMatchObject({ low: 0.005, typical: 0.03, high: 0.08 });
    const high = good(spread('ion_yield.high').replace('0.01, 0.03', '0.03, 0.1')).at([0.1]);
    expect(high.ok && high.case.electrodes.left.ionYield).toMatchObject({ typical: 0.02, high: 0.1 });
  });

  it('refuses to put a number in place of a mapping, and of a table', () => {
    expect(problem(spread('ion_yield'))).toMatchObject({
      path: 'scan.vary.0.path',
      code: 'inconsistent',
      found: 'electrodes.left.ion_yield',
      nearest: 'electrodes.left.ion_yield.typical',
    });
    for (const path of ['ion_yield', 'ion_yield.typical']) {
      const text = varied(entry(path)).replace(
        '{ ion_yield: 0.02 }',
        '{ ion_yield: { table: { file: yield.csv, reduced_field: EN, yield: gamma } } }',
      );
      expect(problem(text, [], TABLES).expected).toContain('leaves the table of the yield in place');
    }
  });

  it('varies the factors of a table', () => {
    const text = varied(['{ path: electrodes.left.ion_yield.high, values: [1.5, 3] }']).replace(
      '{ ion_yield: 0.02 }',
      '{ ion_yield: { table: { file: yield.csv, reduced_field: EN, yield: gamma } } }',
    );
    const point = good(text, [], TABLES).at([3]);
    expect(point.ok && point.case.electrodes.left.ionYield).toMatchObject({ low: 1, high: 3 });
  });

  it('finds ends of the range that leave the spread', () => {
    const one = problems(spread('ion_yield.typical').replace('0.01, 0.03', '0.001, 0.03'));
    expect(one[0].found).toContain('electrodes.left.ion_yield.low: expected a yield not above typical');
  });
});
