import { TABLE_TEMPERATURE } from '../gases/conversions.ts';
import type { GasData } from '../gases/gas.ts';
import { dataSets, gasData, gases } from '../gases/index.ts';
import { type SurfaceData, surfaces } from '../surfaces/index.ts';
import { BOLTZMANN, TOWNSEND } from '../units/constants.ts';
import { clip, nearestSpelling, parseAnyOf } from '../units/index.ts';
import { printableJson } from '../units/printable.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { gasCsv } from './gas-csv.ts';
import { gasJson, listJson, surfaceJson } from './gas-json.ts';
import { listText } from './gas-list-text.ts';
import { surfaceText } from './gas-surface-text.ts';
import { gasText, valuesText } from './gas-text.ts';
import type { Terminal } from './terminal.ts';

export interface GasOptions {
  readonly data?: string;
  readonly at?: string;
  readonly csv?: boolean;
  readonly figures?: string;
  readonly json?: boolean;
}

/** What is built in: all of it in short, or one gas or cathode material with every source; values at some fields; curves as a table. */
export async function gas(words: readonly string[], options: GasOptions, terminal: Terminal): Promise<void> {
  if (words.length === 0) {
    const useless = uselessOf(options);
    if (useless !== null) throw refusal('usage', `${useless} needs the name of a gas`, 'gapwake gas NAME', useless, null);
    terminal.out(options.json ? printableJson(listJson()) : listText(terminal));
    return;
  }
  const found = named(words.join(' '));
  if ('yields' in found) {
    const useless = uselessOf(options);
    if (useless !== null) throw refusal('usage', `${useless} is for gases, and ${found.name} is a material`, 'a gas', useless, null);
    terminal.out(options.json ? printableJson(surfaceJson(found)) : surfaceText(found, terminal));
    return;
  }
  const data = withSet(found, options.data);
  if (options.figures !== undefined) {
    const { writeGasFigures } = await import('./gas-figures.ts');
    terminal.out(`${await writeGasFigures(data, options.figures)}\n`);
    return;
  }
  const fields = options.at === undefined ? null : fieldsOf(options.at);
  if (options.json) terminal.out(printableJson(gasJson(data, fields)));
  else if (options.csv) terminal.out(gasCsv(data));
  else terminal.out(fields === null ? gasText(data, terminal) : valuesText(data, fields, terminal));
}

/** an option that means nothing without a gas; null where none was given */
function uselessOf({ data, at, csv, figures }: GasOptions): string | null {
  if (data !== undefined) return '--data';
  if (at !== undefined) return '--at';
  if (figures !== undefined) return '--figures';
  return csv ? '--csv' : null;
}

function named(name: string): GasData | SurfaceData {
  if (Object.hasOwn(gases, name)) return gases[name];
  if (Object.hasOwn(surfaces, name)) return surfaces[name];
  const known = [...Object.keys(gases), ...Object.keys(surfaces)];
  throw refusal('unknown-name', `no gas or material ${clip(name)}`, `one of ${known.join(', ')}`, clip(name), nearestSpelling(name, known));
}

function withSet(standard: GasData, set: string | undefined): GasData {
  const data = gasData(standard.name, set);
  if (data !== null) return data;
  const known = dataSets(standard.name);
  const found = clip(set ?? '');
  throw refusal(
    'unknown-data',
    `${standard.name} has no data ${found}`,
    `one of ${known.join(', ')}`,
    found,
    nearestSpelling(set ?? '', known),
  );
}

const MOST_FIELDS = 100;
/** where every form is known to be finite [Td] */
const HIGHEST_TD = 1e5;

/** E/N [V m²] of a list such as `10 Td, 100 Td`; E/p is taken at 20 °C, as that of the tables. */
function fieldsOf(text: string): number[] {
  const parts = text.split(/[,;]/);
  if (parts.length > MOST_FIELDS)
    throw refusal('out-of-range', `--at takes at most ${MOST_FIELDS} fields`, `at most ${MOST_FIELDS}`, String(parts.length), null);
  return parts.map((part) => {
    const read = parseAnyOf(part, ['reducedField', 'fieldOverPressure']);
    if (!read.ok) throw refusal(read.code, `--at: ${read.found}`, read.expected, read.found, read.nearest);
    const x = read.dimension === 'fieldOverPressure' ? read.value * BOLTZMANN * TABLE_TEMPERATURE : read.value;
    if (!(x >= 0 && x / TOWNSEND <= HIGHEST_TD * (1 + 1e-12)))
      throw refusal('out-of-range', `--at ${clip(part.trim())}`, `from 0 to ${HIGHEST_TD} Td`, clip(part.trim()), null);
    return x;
  });
}

function refusal(code: string, message: string, expected: string, found: string, nearest: string | null): Failure {
  const lines = [`gapwake: ${message}; expected ${expected}${nearest === null ? '' : `. Did you mean ${nearest}?`}`];
  return new Failure(EXIT.wrongInput, lines, [problemWithoutPlace(code, 'arguments', expected, found, nearest)]);
}
