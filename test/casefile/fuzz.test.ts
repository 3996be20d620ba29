import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { caseTemplate, formatProblem } from '../../src/casefile/index.ts';
import { following, GOOD, OWN_GAS, read, varied } from './help.ts';

const TABLES = { 'bias.csv': 't [s],bias [V]\n0,0\n1,5\n', 'yield.csv': 'EN [Td],gamma\n9,0.1\n99,0.2\n', 'odd.csv': '",[]#\n\u0000,,\n' };
const SETS = {
  'log.h5:/p': { ok: true, values: Float64Array.of(1, 2), units: 'Pa' },
  'log.h5:/t': { ok: true, values: Float64Array.of(1, 2), units: 's' },
} as const;
const STUDIES = [
  varied(
    ['{ path: gas.pressure, from: 1 Pa, to: 1 kPa, points: 100, spacing: log }', '{ path: gap.spacing, values: [1 mm] }'],
    '  find: { what: hold-off, from: 1 V, to: 1 kV, tolerance: 1 % }\n',
  ),
  following(
    '{ bay: { volume: 1 L, start: 1 bar, outside: { ascent: { from: 0 km, to: 9 km, rate: 5 m/s } }, vents: [{ diameter: 1 mm, length: 1 mm, count: 2 }], pump: { speed: 1 L/s }, outgassing: [{ area: 1 m^2, rate_at_1h: 1e-6 Pa m/s, exponent: 1 }] } }',
    '  duration: 1 h\n  temperature: 300 K\n  voltage: { table: { file: bias.csv, time: t, voltage: bias } }\n',
  ),
  following('{ dataset: { file: log.h5, dataset: /p, time: /t } }', ''),
];
const CHOICES = [
  GOOD.replace('name: argon', 'mixture: { argon: 0.9, nitrogen: 10 %, "carbon dioxide": 0 }'),
  GOOD.replace('name: argon', 'name: helium\n  data: raizer').replace('0.02', '{ low: 0.01, typical: 0.02, high: 0.08 }'),
  GOOD.replace('{ ion_yield: 0.02 }', '{ material: nickel, surface: clean }'),
  GOOD.replace('0.02', '{ table: { file: yield.csv, reduced_field: EN, yield: gamma }, low: 0.5, high: 2 }'),
];
const TEXTS = [
  ...CHOICES,
  GOOD,
  OWN_GAS,
  caseTemplate(),
  GOOD.replace('step: 420 V', 'table: { file: bias.csv, time: t, voltage: bias }'),
  ...STUDIES,
];

/** Reads a text and checks what must hold of any answer. */
function survives(text: string, overrides: string[] = []): void {
  const start = performance.now();
  const result = read(text, overrides, TABLES, SETS);
  expect(performance.now() - start).toBeLessThan(5000);
  if (result.ok) {
    expect(result.case.gap.spacing).toBeGreaterThan(0);
    expect(Number.isFinite(result.case.gas.density)).toBe(true);
    const { scan, window } = result;
    // any scan that is accepted has a point, at least one of whose ends makes a case
    if (scan !== null) {
      const ends = [0, -1].map((end) => result.at(scan.axes.map(({ values }) => values.at(end) ?? Number.NaN)));
      expect(scan.axes.length > 1 || ends.every((end) => end.ok)).toBe(true);
    }
    if (window !== null) {
      expect(window.history.duration).toBeGreaterThan(0);
      expect(window.margin).toBeGreaterThanOrEqual(1);
    }
    return;
  }
  expect(result.problems.length).toBeGreaterThan(0);
  const lines = text.split('\n');
  for (const problem of result.problems) {
    expect(formatProblem(problem)).not.toMatch(/\p{Cc}/u);
    if (problem.file === 'case.yaml' && problem.line !== null) {
      expect(problem.line).toBeGreaterThanOrEqual(1);
      expect(problem.line).toBeLessThanOrEqual(lines.length);
      expect(problem.column).toBeGreaterThanOrEqual(1);
      expect(problem.column ?? 0).toBeLessThanOrEqual(lines[problem.line - 1].length + 1);
    }
  }
}

const scrap = fc.oneof(
  fc.constantFrom(
    '{',
    '}',
    '[',
    ']',
    ':',
    ': ',
    ',',
    '- ',
    '\n',
    '  ',
    '&a ',
    '*a',
    '!x ',
    '!!str ',
    '"',
    "'",
    '|',
    '>',
    '%',
    '#',
    '\t',
    '\u0000',
    '---\n',
    '? ',
    '<<: ',
  ),
  fc.constantFrom(
    '5 mm',
    '420 V',
    '.nan',
    '1e999 V',
    'null',
    'true',
    '0',
    '-1',
    '°C',
    '1/',
    '(cm',
    '^',
    '__proto__',
    'table',
    'file: odd.csv',
    'path: gas',
    'values: [',
    'points: 3',
    'spacing: log',
    '1e6',
    'zip: true',
    'what: trip-delay',
    'length: 5',
    'K0',
    'form: root',
    'mixture: {',
    'argon: 1',
    'surface: clean',
    'typical: 0.1',
  ),
  fc.string({ unit: 'binary', maxLength: 6 }),
);

/** A text with a few pieces cut out, put in or doubled. */
const mutated = fc
  .tuple(fc.constantFrom(...TEXTS), fc.array(fc.tuple(fc.nat(3000), fc.nat(12), scrap), { minLength: 1, maxLength: 6 }))
  .map(([text, edits]) =>
    edits.reduce((t, [at, length, piece]) => t.slice(0, at % (t.length + 1)) + piece + t.slice((at % (t.length + 1)) + length), text),
  );

describe('no text crashes, hangs or throws', () => {
  it('mutations of valid cases', () => {
    fc.assert(
      fc.property(mutated, (text) => survives(text)),
      { numRuns: 300 },
    );
  });

  it('arbitrary text', () => {
    fc.assert(
      fc.property(
        fc.oneof(
          fc.string({ unit: 'binary', maxLength: 200 }),
          fc.array(scrap, { maxLength: 40 }).map((p) => p.join('')),
        ),
        (text) => survives(text),
      ),
      { numRuns: 300 },
    );
  });

  it('any value anywhere', () => {
    const places = [GOOD, ...CHOICES, ...STUDIES].flatMap((text) => [...text.matchAll(/\b(\w+):/g)].map((m) => ({ text, key: m[1] })));
    fc.assert(
      fc.property(fc.constantFrom(...places), fc.json({ maxDepth: 3 }), ({ text, key }, json) =>
        survives(text.replace(new RegExp(`\\b(${key}:)( *[^,{}\\n\\[\\]]*)`), `$1 ${json.replaceAll('$', '$$$$')}`)),
      ),
      { numRuns: 400 },
    );
  });

  it('any --set', () => {
    const path = fc.oneof(
      fc.constantFrom(
        'gap',
        'gap.spacing',
        'supply.voltage.table',
        'observe.currents.0',
        'gas.coefficients.ionisation.C',
        'electrodes.left',
        'electrodes.left.ion_yield',
        'electrodes.left.ion_yield.table',
        'electrodes.left.surface',
        'gas.mixture',
        'gas.mixture.argon',
        'gas.data',
        'scan',
        'scan.vary.0.path',
        'scan.vary.0.values',
        'scan.vary.0.points',
        'scan.find',
        'history.pressure',
        'history.pressure.bay.vents',
        'history.voltage',
        '',
        '__proto__',
        '0.0',
      ),
      fc.string({ maxLength: 10 }),
    );
    const override = fc.tuple(path, fc.oneof(scrap, fc.json({ maxDepth: 2 }))).map(([p, v]) => `${p}=${v}`);
    fc.assert(
      fc.property(fc.constantFrom(...TEXTS), fc.array(override, { maxLength: 3 }), (text, overrides) => survives(text, overrides)),
      { numRuns: 300 },
    );
  });
});
