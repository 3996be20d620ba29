import type { DatasetRead, DatasetReader, Problem, ReadResult, TableReader } from '../../src/casefile/index.ts';
import { readCase } from '../../src/casefile/index.ts';

/** A case without mistakes, one entry per line so that a test can point at it. */
export const GOOD = `title: Test
gap:
  geometry: planar
  spacing: 6 mm
  area: 12 cm^2
gas:
  name: argon
  pressure: 1.2 Torr
electrodes:
  left: { ion_yield: 0.02 }
seed:
  cathode_current: 1 pA
supply:
  voltage: { step: 420 V }
  series_resistance: 100 kohm
observe:
  until: 5 ms
`;

/** A case with its own gas data. */
export const OWN_GAS: string = GOOD.replace(
  '  name: argon\n',
  `  coefficients:
    ionisation: { form: exponential, A: 12 1/(cm Torr), B: 180 V/(cm Torr) }
    electron_mobility: 3.3e5 cm^2 Torr/(V s)
    ion_mobility: 1.5e3 cm^2 Torr/(V s)
`,
);

export function files(contents: Readonly<Record<string, string>>): TableReader {
  return (name) => (Object.hasOwn(contents, name) ? { ok: true, text: contents[name] } : { ok: false, reason: 'no such file' });
}

/** Data sets by `file:path`. */
export function datasets(contents: Readonly<Record<string, DatasetRead>>): DatasetReader {
  return (file, name) => contents[`${file}:${name}`] ?? { ok: false, reason: `no ${name} in ${file}` };
}

export function read(
  text: string,
  overrides: readonly string[] = [],
  tables: Readonly<Record<string, string>> = {},
  sets: Readonly<Record<string, DatasetRead>> = {},
): ReadResult {
  return readCase(text, 'case.yaml', files(tables), overrides, datasets(sets));
}

export function good(
  text: string,
  overrides: readonly string[] = [],
  tables: Readonly<Record<string, string>> = {},
  sets: Readonly<Record<string, DatasetRead>> = {},
): Extract<ReadResult, { ok: true }> {
  const result = read(text, overrides, tables, sets);
  if (!result.ok) throw new Error(JSON.stringify(result.problems, null, 1));
  return result;
}

export function problems(
  text: string,
  overrides: readonly string[] = [],
  tables: Readonly<Record<string, string>> = {},
  sets: Readonly<Record<string, DatasetRead>> = {},
): readonly Problem[] {
  const result = read(text, overrides, tables, sets);
  return result.ok ? [] : result.problems;
}

/** The only problem of a text. */
export function problem(
  text: string,
  overrides: readonly string[] = [],
  tables: Readonly<Record<string, string>> = {},
  sets: Readonly<Record<string, DatasetRead>> = {},
): Problem {
  const all = problems(text, overrides, tables, sets);
  if (all.length !== 1) throw new Error(`${all.length} problems: ${JSON.stringify(all, null, 1)}`);
  return all[0];
}

/** The good case with entries to vary, one a line from line 20 on, and more of `scan` after them. */
export function varied(entries: readonly string[], more = ''): string {
  return `${GOOD}scan:\n  vary:\n${entries.map((entry) => `    - ${entry}\n`).join('')}${more}`;
}

/** The good case with a search at line 19. */
export function searching(find: string): string {
  return `${GOOD}scan:\n  find: ${find}\n`;
}

/** The good case with a pressure history from line 18 on; a duration unless told otherwise. */
export function following(pressure: string, more = '  duration: 3 h\n'): string {
  return `${GOOD}history:\n  pressure: ${pressure}\n${more}`;
}
