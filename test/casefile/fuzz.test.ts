import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { caseTemplate, formatProblem } from '../../src/casefile/index.ts';
import { GOOD, OWN_GAS, read } from './help.ts';

const TABLES = { 'bias.csv': 't [s],bias [V]\n0,0\n1,5\n', 'odd.csv': '",[]#\n\u0000,,\n' };
const TEXTS = [GOOD, OWN_GAS, caseTemplate(), GOOD.replace('step: 420 V', 'table: { file: bias.csv, time: t, voltage: bias }')];

/** Reads a text and checks what must hold of any answer. */
function survives(text: string, overrides: string[] = []): void {
  const start = performance.now();
  const result = read(text, overrides, TABLES);
  expect(performance.now() - start).toBeLessThan(5000);
  if (result.ok) {
    expect(result.case.gap.spacing).toBeGreaterThan(0);
    expect(Number.isFinite(result.case.gas.density)).toBe(true);
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
    'K0',
    'form: root',
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
    const paths = [...GOOD.matchAll(/^ *(\w+):/gm)].map((m) => m[1]);
    fc.assert(
      fc.property(fc.constantFrom(...paths), fc.json({ maxDepth: 3 }), (key, json) =>
        survives(GOOD.replace(new RegExp(`^( *${key}:).*$`, 'm'), `$1 ${json.replaceAll('$', '$$$$')}`)),
      ),
      { numRuns: 300 },
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
