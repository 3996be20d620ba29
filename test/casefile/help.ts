import type { Problem, ReadResult, TableReader } from '../../src/casefile/index.ts';
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

export function read(text: string, overrides: readonly string[] = [], tables: Readonly<Record<string, string>> = {}): ReadResult {
  return readCase(text, 'case.yaml', files(tables), overrides);
}

export function good(
  text: string,
  overrides: readonly string[] = [],
  tables: Readonly<Record<string, string>> = {},
): Extract<ReadResult, { ok: true }> {
  const result = read(text, overrides, tables);
  if (!result.ok) throw new Error(JSON.stringify(result.problems, null, 1));
  return result;
}

export function problems(
  text: string,
  overrides: readonly string[] = [],
  tables: Readonly<Record<string, string>> = {},
): readonly Problem[] {
  const result = read(text, overrides, tables);
  return result.ok ? [] : result.problems;
}

/** The only problem of a text. */
export function problem(text: string, overrides: readonly string[] = [], tables: Readonly<Record<string, string>> = {}): Problem {
  const all = problems(text, overrides, tables);
  if (all.length !== 1) throw new Error(`${all.length} problems: ${JSON.stringify(all, null, 1)}`);
  return all[0];
}
