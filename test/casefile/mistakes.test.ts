import { describe, expect, it } from 'vitest';
import { formatProblem } from '../../src/casefile/index.ts';
import { GOOD, good, OWN_GAS, problem, problems } from './help.ts';

/** [what is wrong, text replaced, replacement, line:column, path, code, part of what is expected, found, nearest] */
type Row = [string, string, string, string, string, string, string, string, string | null];

const ROWS: Row[] = [
  [
    'a wrong dimension',
    'step: 420 V',
    'step: 5 mm',
    '14:22',
    'supply.voltage.step',
    'wrong-dimension',
    'a voltage',
    '5 mm, a length',
    null,
  ],
  ['a missing unit', '6 mm', '6', '4:12', 'gap.spacing', 'missing-unit', 'a length', '6 without a unit', null],
  ['a missing unit in quotes', '6 mm', '"6"', '4:12', 'gap.spacing', 'missing-unit', 'a length', '6 without a unit', null],
  ['a zero without unit', '1 pA', '0', '12:20', 'seed.cathode_current', 'missing-unit', 'a current', '0 without a unit', null],
  ['an unknown unit', '1.2 Torr', '1.2 torr', '8:17', 'gas.pressure', 'unknown-unit', 'a pressure', 'unknown unit "torr"', 'Torr'],
  [
    'two readings of a unit',
    '100 kohm',
    '100 V/A m',
    '15:27',
    'supply.series_resistance',
    'bad-unit',
    'V/(A m) or (V m)/A',
    'V/A m, which reads both ways',
    null,
  ],
  ['an unknown key', 'spacing:', 'spacin:', '4:3', 'gap.spacin', 'unknown-key', 'a key of gap', 'spacin', 'spacing'],
  ['a non-positive gap', '6 mm', '-6 mm', '4:12', 'gap.spacing', 'out-of-range', 'a length above 0', '-6 mm', null],
  ['a gap of zero', '6 mm', '0 mm', '4:12', 'gap.spacing', 'out-of-range', 'a length above 0', '0 mm', null],
  ['an area of zero', '12 cm^2', '0 cm^2', '5:9', 'gap.area', 'out-of-range', 'an area above 0', '0 cm^2', null],
  ['NaN', '1.2 Torr', '.nan', '8:13', 'gas.pressure', 'not-finite', 'a pressure', 'NaN', null],
  ['NaN with a unit', '1.2 Torr', 'NaN Torr', '8:13', 'gas.pressure', 'not-a-quantity', 'a pressure', 'NaN Torr', null],
  ['an infinite number', '1.2 Torr', '1e999 Torr', '8:13', 'gas.pressure', 'not-finite', 'a pressure', '1e999, which is not finite', null],
  ['a pressure too low', '1.2 Torr', '1e-9 Pa', '8:13', 'gas.pressure', 'out-of-range', 'from 1e-3 Pa to 1e6 Pa', '1e-9 Pa', null],
  ['a pressure too high', '1.2 Torr', '11 bar', '8:13', 'gas.pressure', 'out-of-range', 'from 1e-3 Pa to 1e6 Pa', '11 bar', null],
  ['a duration of zero', '5 ms', '0 s', '17:10', 'observe.until', 'out-of-range', 'a time above 0', '0 s', null],
  [
    'a negative resistance',
    '100 kohm',
    '-1 ohm',
    '15:22',
    'supply.series_resistance',
    'out-of-range',
    'a resistance from 0',
    '-1 ohm',
    null,
  ],
  ['a negative seed', '1 pA', '-1 pA', '12:20', 'seed.cathode_current', 'out-of-range', 'a current not below 0', '-1 pA', null],
  ['no seed at all', '1 pA', '0 A', '12:20', 'seed.cathode_current', 'inconsistent', 'a current above 0, or electrons', '0 A', null],
  ['a list for a quantity', '6 mm', '[6 mm]', '4:12', 'gap.spacing', 'wrong-type', 'a length', 'a list', null],
  ['a mapping for a quantity', '6 mm', '{ mm: 6 }', '4:12', 'gap.spacing', 'wrong-type', 'a length', 'a mapping', null],
  ['a boolean for a quantity', '6 mm', 'true', '4:12', 'gap.spacing', 'wrong-type', 'a length', 'true', null],
  ['no value for a quantity', '6 mm', '', '4:3', 'gap.spacing', 'missing-key', 'a length', 'nothing', null],
  ['a number for the title', 'title: Test', 'title: 7', '1:8', 'title', 'wrong-type', 'text', '7', null],
  ['an unknown geometry', 'planar', 'planer', '3:13', 'gap.geometry', 'unknown-name', 'planar', 'planer', 'planar'],
  ['an unknown gas', 'argon', 'argn', '7:9', 'gas.name', 'unknown-name', 'argon', 'argn', 'argon'],
  [
    'an unknown material',
    'ion_yield: 0.02',
    'material: nickle',
    '10:21',
    'electrodes.left.material',
    'unknown-name',
    'nickel',
    'nickle',
    'nickel',
  ],
  ['a negative yield', '0.02', '-0.02', '10:22', 'electrodes.left.ion_yield', 'out-of-range', 'from 0 to 10', '-0.02', null],
  [
    'a yield with a unit',
    '0.02',
    '0.02 V',
    '10:27',
    'electrodes.left.ion_yield',
    'wrong-dimension',
    'electrons per ion',
    '0.02 V, a voltage',
    null,
  ],
  [
    'no electrode data',
    '{ ion_yield: 0.02 }',
    '{}',
    '10:9',
    'electrodes.left',
    'missing-key',
    'a material or an ion_yield',
    'neither',
    null,
  ],
  [
    'no voltage',
    '{ step: 420 V }',
    '{}',
    '14:12',
    'supply.voltage',
    'either-or',
    'exactly one of step, ramp and table',
    'none of them',
    null,
  ],
  ['a step of 0 V', '420 V', '0 V', '14:20', 'supply.voltage.step', 'inconsistent', 'differs from 0 V', '0 V', null],
  [
    'a ramp from 0 V to 0 V',
    'step: 420 V',
    'ramp: { from: 0 V, to: 0 V, rate: 1 V/s }',
    '14:37',
    'supply.voltage.ramp.to',
    'inconsistent',
    'differs from 0 V',
    '0 V',
    null,
  ],
  [
    'a ramp without rate',
    'step: 420 V',
    'ramp: { from: 0 V, to: 9 V }',
    '14:20',
    'supply.voltage.ramp.rate',
    'missing-key',
    'a rate of voltage',
    'nothing',
    null,
  ],
  [
    'a ramp of no rate',
    'step: 420 V',
    'ramp: { from: 0 V, to: 9 V, rate: 0 V/s }',
    '14:48',
    'supply.voltage.ramp.rate',
    'out-of-range',
    'above 0',
    '0 V/s',
    null,
  ],
  [
    'two arms',
    'step: 420 V',
    'step: 420 V, ramp: { from: 0 V, to: 9 V, rate: 1 V/s }',
    '14:33',
    'supply.voltage.ramp',
    'either-or',
    'exactly one of',
    'step and ramp',
    null,
  ],
  [
    'a rise time with a ramp',
    'step: 420 V',
    'rise_time: 1 s, ramp: { from: 0 V, to: 9 V, rate: 1 V/s }',
    '14:25',
    'supply.voltage.rise_time',
    'either-or',
    'only with step',
    'rise_time',
    null,
  ],
  ['a coaxial gap', 'planar', 'coaxial', '3:13', 'gap.geometry', 'not-supported-yet', 'not supported yet', 'coaxial', null],
  ['a spherical gap', 'planar', 'spherical', '3:13', 'gap.geometry', 'not-supported-yet', 'not supported yet', 'spherical', null],
  [
    'particles beside the local field',
    'title: Test',
    'electrons: { particles: 20000 }',
    '1:25',
    'electrons.particles',
    'inconsistent',
    'particles only beside closure: kinetic',
    'closure: local-field',
    null,
  ],
  [
    'an inner electrode',
    '  left:',
    '  inner: { ion_yield: 1 }\n  left:',
    '10:3',
    'electrodes.inner',
    'not-supported-yet',
    'not supported yet',
    'inner',
    null,
  ],
  [
    'a photon yield',
    '0.02 }',
    '0.02, photon_yield: 1 }',
    '10:28',
    'electrodes.left.photon_yield',
    'not-supported-yet',
    'not supported yet',
    'photon_yield',
    null,
  ],
  [
    'a gas ionisation seed',
    '1 pA',
    '1 pA\n  gas_ionisation: 1',
    '13:3',
    'seed.gas_ionisation',
    'not-supported-yet',
    'not supported yet',
    'gas_ionisation',
    null,
  ],
  [
    'a path shorter than the gap',
    '12 cm^2',
    '12 cm^2\n  longest_path: 5 mm',
    '6:17',
    'gap.longest_path',
    'inconsistent',
    'not below gap.spacing',
    '5 mm',
    null,
  ],
  [
    'a temperature in bare numbers',
    '1.2 Torr',
    '1.2 Torr\n  temperature: 295',
    '9:16',
    'gas.temperature',
    'missing-unit',
    'a temperature',
    '295 without a unit',
    null,
  ],
  [
    'a temperature out of range',
    '1.2 Torr',
    '1.2 Torr\n  temperature: 3 K',
    '9:16',
    'gas.temperature',
    'out-of-range',
    'from 4 K to 3000 K',
    '3 K',
    null,
  ],
  [
    'a current limit of zero',
    '100 kohm',
    '100 kohm\n  current_limit: 0 A',
    '16:18',
    'supply.current_limit',
    'out-of-range',
    'a current above 0',
    '0 A',
    null,
  ],
  [
    'a trip without delay',
    '100 kohm',
    '100 kohm\n  trip: { current: 1 mA }',
    '16:9',
    'supply.trip.delay',
    'missing-key',
    'a time',
    'nothing',
    null,
  ],
  [
    'a trip that senses nothing known',
    '100 kohm',
    '100 kohm\n  trip: { current: 1 mA, delay: 0 s, senses: gas }',
    '16:46',
    'supply.trip.senses',
    'unknown-name',
    'gap or supply',
    'gas',
    'gap',
  ],
  [
    'a jump behind 0 ohm',
    '100 kohm',
    '0 ohm\n  trip: { current: 1 mA, delay: 0 s, action: zero }',
    '16:46',
    'supply.trip.action',
    'inconsistent',
    'series_resistance or current_limit',
    'zero behind 0 ohm',
    null,
  ],
  [
    'a current level that is none',
    '5 ms',
    '5 ms\n  currents: [1 nA, 1 V]',
    '18:22',
    'observe.currents.1',
    'wrong-dimension',
    'a current',
    '1 V, a voltage',
    null,
  ],
  [
    'levels that are no list',
    '5 ms',
    '5 ms\n  currents: 1 nA',
    '18:13',
    'observe.currents',
    'wrong-type',
    'a list of currents',
    '1 nA',
    null,
  ],
  [
    'half a cell',
    '5 ms',
    '5 ms\nnumerics: { cells: 99.5 }',
    '18:20',
    'numerics.cells',
    'out-of-range',
    'a whole number from 20 to 5000',
    '99.5',
    null,
  ],
  [
    'too few cells',
    '5 ms',
    '5 ms\nnumerics: { cells: 19 }',
    '18:20',
    'numerics.cells',
    'out-of-range',
    'a whole number from 20 to 5000',
    '19',
    null,
  ],
  [
    'too many cells',
    '5 ms',
    '5 ms\nnumerics: { cells: 5001 }',
    '18:20',
    'numerics.cells',
    'out-of-range',
    'a whole number from 20 to 5000',
    '5001',
    null,
  ],
  [
    'a tolerance too tight',
    '5 ms',
    '5 ms\nnumerics: { tolerance: 1e-9 }',
    '18:24',
    'numerics.tolerance',
    'out-of-range',
    'from 1e-8 to 0.1',
    '1e-9',
    null,
  ],
  [
    'a tolerance too loose',
    '5 ms',
    '5 ms\nnumerics: { tolerance: 20 % }',
    '18:24',
    'numerics.tolerance',
    'out-of-range',
    'from 1e-8 to 0.1',
    '20 %',
    null,
  ],
  [
    'a key twice',
    'area: 12 cm^2',
    'area: 12 cm^2\n  area: 12 cm^2',
    '6:3',
    '',
    'duplicate-key',
    'every key once',
    'area: 12 cm^2 again',
    null,
  ],
  ['a custom tag', '6 mm', '!x 6 mm', '4:15', '', 'tag', 'no tags', '!x', null],
  ['a tag of YAML 1.1', '6 mm', '!!binary aaaa', '4:21', '', 'tag', 'no tags', 'tag:yaml.org,2002:binary', null],
  ['an alias to nothing', '6 mm', '*d', '4:12', 'gap.spacing', 'aliases', 'an anchor of that name', '*d', null],
  ['text that is no YAML', '6 mm', '6 mm: x', '4:12', '', 'yaml', 'YAML 1.2', '6 mm: x', null],
];

describe('each mistake is reported with line, column, path, expectation, finding and nearest spelling:', () => {
  for (const [what, from, to, place, path, code, expected, found, nearest] of ROWS) {
    it(what, () => {
      expect(GOOD).toContain(from);
      const all = problems(GOOD.replace(from, to));
      const match = all.find((p) => p.code === code && p.path === path);
      expect(match, JSON.stringify(all, null, 1)).toBeDefined();
      expect(match).toMatchObject({ file: 'case.yaml', found, nearest });
      expect(`${match?.line}:${match?.column}`).toBe(place);
      expect(match?.expected).toContain(expected);
      // a misspelt required key is also a missing one; nothing else comes in twice
      if (all.length > 1) expect(all.map((p) => p.code).sort()).toEqual(['missing-key', 'unknown-key']);
    });
  }

  it('the case that they were made from has none', () => {
    expect(problems(GOOD)).toEqual([]);
    expect(problems(OWN_GAS)).toEqual([]);
  });

  for (const key of ['gap', 'gas', 'electrodes', 'seed', 'supply', 'observe']) {
    it(`a case without ${key}`, () => {
      const lines = GOOD.split('\n');
      const start = lines.indexOf(`${key}:`);
      const length = lines.slice(start + 1).findIndex((line) => !line.startsWith(' ')) + 1;
      lines.splice(start, length);
      expect(problem(lines.join('\n'))).toMatchObject({ code: 'missing-key', path: key, line: 1, column: 1, found: 'nothing' });
    });
  }

  for (const [path, line] of [
    ['gap.geometry', '  geometry: planar\n'],
    ['gap.spacing', '  spacing: 6 mm\n'],
    ['gap.area', '  area: 12 cm^2\n'],
    ['gas.pressure', '  pressure: 1.2 Torr\n'],
    ['seed', '  cathode_current: 1 pA\n'],
    ['supply.voltage', '  voltage: { step: 420 V }\n'],
    ['supply.series_resistance', '  series_resistance: 100 kohm\n'],
    ['observe', '  until: 5 ms\n'],
  ] as const) {
    it(`a case without ${path}, placed at the key of its section`, () => {
      const text = GOOD.replace(line, '');
      const section = path.split('.')[0];
      const place = text.split('\n').findIndex((l) => l.startsWith(`${section}:`)) + 1;
      expect(problems(text).find((p) => p.path === path)).toMatchObject({ code: 'missing-key', line: place, column: 1, found: 'nothing' });
    });
  }
});

describe('own gas data are refused where they are wrong:', () => {
  const rows: [string, string, string, string, string, string][] = [
    [
      'a bare mobility, with the hint K0',
      '1.5e3 cm^2 Torr/(V s)',
      '1.5 cm^2/(V s)',
      'gas.coefficients.ion_mobility',
      'wrong-dimension',
      '{ K0: 1.5 cm^2/(V s) }',
    ],
    [
      'a K0 that is none',
      '1.5e3 cm^2 Torr/(V s)',
      '{ K0: 1.5e3 cm^2 Torr/(V s) }',
      'gas.coefficients.ion_mobility.K0',
      'wrong-dimension',
      'a mobility above 0',
    ],
    [
      'a value and a K0',
      '1.5e3 cm^2 Torr/(V s)',
      '{ K0: 1.5 cm^2/(V s), value: 1e24 1/(m V s) }',
      'gas.coefficients.ion_mobility.K0',
      'either-or',
      'exactly one of value, K0 and table',
    ],
    [
      'a misspelt key beside K0',
      '1.5e3 cm^2 Torr/(V s)',
      '{ K0: 1.5 cm^2/(V s), valid_form: 1 Td }',
      'gas.coefficients.ion_mobility.valid_form',
      'unknown-key',
      'valid_from',
    ],
    ['a list for a mobility', '1.5e3 cm^2 Torr/(V s)', '[1]', 'gas.coefficients.ion_mobility', 'wrong-type', 'a mobility times a pressure'],
    [
      'a number for a mobility',
      '1.5e3 cm^2 Torr/(V s)',
      '3',
      'gas.coefficients.ion_mobility',
      'missing-unit',
      'a mobility times a pressure',
    ],
    ['no B', ', B: 180 V/(cm Torr)', '', 'gas.coefficients.ionisation.B', 'missing-key', 'required with form: exponential'],
    [
      'a C in an exponential',
      'B: 180 V/(cm Torr)',
      'B: 180 V/(cm Torr), C: 1 1/(cm Torr)',
      'gas.coefficients.ionisation.C',
      'either-or',
      'only A and B',
    ],
    ['no form', 'form: exponential, ', '', 'gas.coefficients.ionisation', 'either-or', 'exactly one of form and table'],
    ['a B in the wrong dimension', '180 V/(cm Torr)', '180 V', 'gas.coefficients.ionisation.B', 'wrong-dimension', 'a field over pressure'],
    [
      'a validity the wrong way round',
      'B: 180 V/(cm Torr)',
      'B: 180 V/(cm Torr), valid_from: 9 Td, valid_to: 8 Td',
      'gas.coefficients.ionisation.valid_to',
      'inconsistent',
      'above valid_from',
    ],
    [
      'a missing table',
      '{ form: exponential, A: 12 1/(cm Torr), B: 180 V/(cm Torr) }',
      '{ table: { file: a.csv, reduced_field: x, coefficient: y } }',
      'gas.coefficients.ionisation.table.file',
      'unreadable',
      'can be read',
    ],
  ];
  for (const [what, from, to, path, code, expected] of rows) {
    it(what, () => {
      expect(OWN_GAS).toContain(from);
      const found = problem(OWN_GAS.replace(from, to));
      expect(found).toMatchObject({ path, code });
      expect(found.expected).toContain(expected);
      expect(found.line).toBeGreaterThan(6);
    });
  }

  it('without a gas name, the three coefficients that have no default are required', () => {
    const text = GOOD.replace('  name: argon', '  coefficients: { electron_energy: 1 V }');
    expect(problems(text).map((p) => p.path)).toEqual(
      ['ionisation', 'electron_mobility', 'ion_mobility'].map((k) => `gas.coefficients.${k}`),
    );
    expect(problem(GOOD.replace('  name: argon\n', ''))).toMatchObject({
      path: 'gas',
      expected: 'a name or a mixture, coefficients, or both',
    });
  });
});

describe('mistakes together', () => {
  it('many mistakes are reported at once, in the order of the file', () => {
    const text = GOOD.replace('6 mm', '-6 mm')
      .replace('1.2 Torr', '1.2 torr')
      .replace('step: 420 V', 'step: 5 mm')
      .replace('until', 'untl')
      .replace('100 kohm', '0 ohm\n  trip: { current: 0 A, delay: 1 s, action: zero }');
    expect(problems(text).map((p) => `${p.line}:${p.path}:${p.code}`)).toEqual([
      '4:gap.spacing:out-of-range',
      '8:gas.pressure:unknown-unit',
      '14:supply.voltage.step:wrong-dimension',
      '16:supply.trip.current:out-of-range',
      '16:supply.trip.action:inconsistent',
      '17:observe.until:missing-key',
      '18:observe.untl:unknown-key',
    ]);
  });

  it('the text form is file:line:column: path: expected …, found …; did you mean …?', () => {
    expect(formatProblem(problem(GOOD.replace('1.2 Torr', '1.2 torr')))).toBe(
      'case.yaml:8:17: gas.pressure: expected a pressure from 1e-3 Pa to 1e6 Pa, e.g. 1.2 Torr, found unknown unit "torr"; did you mean Torr?',
    );
  });

  it('what is quoted from the file is escaped and at most 40 characters long', () => {
    const found = problem(GOOD.replace('6 mm', `"\\e[31m${'x'.repeat(100)}"`));
    expect(found.found.length).toBeLessThanOrEqual(40);
    expect(found.found).toContain('\\u001b');
    expect(formatProblem(found)).not.toContain('\u001b');
  });

  it('a title may hold anything; control characters stay in the data only', () => {
    expect(good(GOOD.replace('Test', '"a\\e[31m"')).case.title).toBe('a\u001b[31m');
  });
});

describe('limits', () => {
  it('a text above 1 MB is refused', () => {
    expect(problem(`${GOOD}#${'x'.repeat(1_000_000)}`)).toMatchObject({ code: 'too-large', line: null, expected: 'at most 1 MB of text' });
  });

  it('nesting above 20 is refused, at any depth, without recursion', () => {
    expect(problem(`a: ${'['.repeat(19)}${']'.repeat(19)}`.replace('a', 'title') + GOOD.replace('title: Test', ''))).toMatchObject({
      code: 'wrong-type',
    });
    expect(problem(`a: ${'['.repeat(20)}${']'.repeat(20)}`)).toMatchObject({ code: 'too-deep' });
    for (const opening of ['[', '{', '- ', '? ', '[{', 'a: [']) {
      expect(problems(opening.repeat(100_000))[0].code).toBe('too-deep');
    }
  });

  it('fifty aliases are accepted and fifty-one refused', () => {
    const levels = (n: number): string => GOOD.replace('until: 5 ms', `until: 5 ms\n  currents: [&a 1 nA${', *a'.repeat(n)}]`);
    expect(good(levels(50)).case.observe.currents).toEqual([1e-9]);
    expect(problem(levels(51))).toMatchObject({ code: 'aliases', expected: 'at most 50 aliases', found: '51' });
  });

  it('aliases that multiply are refused without being written out', () => {
    const rows = ['a: &a [x, x, x, x, x, x, x, x, x]'];
    for (const [of, name] of ['ab', 'bc', 'cd', 'de', 'ef']) rows.push(`${name}: &${name} [${Array(9).fill(`*${of}`).join(', ')}]`);
    expect(problems(rows.join('\n')).some((p) => p.code === 'aliases')).toBe(true);
    expect(problem('a: &a [*a]')).toMatchObject({ code: 'aliases', line: 1, column: 8 });
  });

  it('YAML 1.1 and several documents are refused', () => {
    expect(problem(`%YAML 1.1\n---\n${GOOD}`)).toMatchObject({ code: 'yaml', found: '%YAML 1.1' });
    expect(problem(`${GOOD}---\na: 1\n`)).toMatchObject({ code: 'yaml' });
  });

  it('what is no mapping is refused', () => {
    expect(problem('[1, 2]')).toMatchObject({ code: 'wrong-type', found: 'a list', line: 1, column: 1 });
    expect(problem('hello')).toMatchObject({ code: 'wrong-type', found: 'hello' });
    expect(problems('').map((p) => p.path)).toEqual(['gap', 'gas', 'electrodes', 'seed', 'supply', 'observe']);
  });
});

describe('kinetic electrons', () => {
  const kinetic = GOOD.replace('title: Test', 'title: Test\nelectrons: { closure: kinetic }');

  it('need a gas with built-in cross-sections, by its name', () => {
    expect(good(kinetic).case.electrons).toEqual({ closure: 'kinetic', emissionEnergy: 2, particles: 20000, seed: 1 });
    for (const [gas, what] of [
      ['name: xenon', 'xenon'],
      ['mixture: { argon: 0.9, nitrogen: 0.1 }', 'a mixture'],
    ] as const) {
      const [found, ...others] = problems(kinetic.replace('name: argon', gas));
      expect(others).toEqual([]);
      expect(found).toMatchObject({ path: 'electrons.closure', code: 'inconsistent', found: `kinetic with ${what}`, line: 2, column: 23 });
      expect(found.expected).toContain('(argon, nitrogen, helium, neon) for kinetic');
    }
  });

  it('are not for pressure histories', () => {
    const text = `${kinetic}\nhistory: { pressure: { ascent: { rate: 5 m/s } } }\n`;
    expect(problems(text).map(({ path, found }) => [path, found])).toContainEqual(['electrons.closure', 'kinetic with a history']);
  });
});
