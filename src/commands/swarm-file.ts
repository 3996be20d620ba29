import { dataLines, NUMBER, readHeader, splitFields } from '../casefile/csv.ts';
import type { ProcessKind } from '../kinetics/cross-sections.ts';
import type { UserProcess } from '../kinetics/user-set.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';
import { clip, DIMENSIONS, nearestSpelling, sameExponents, unitFactor } from '../units/index.ts';

/** A user's cross-sections from CSV: a header, then a row for each process and energy.
 *
 *      process, threshold [eV], energy [eV], cross_section [m^2]
 *      elastic, 0, 0.01, 5.2e-20
 *
 *  Columns in any order, units in brackets; `name`, where there is such a column, tells processes of one kind apart. Rows of a process with rising energy
 *  and one threshold; no threshold (nothing, or 0) for elastic scattering. One process `elastic` or `momentum-transfer`, not both. */

export interface SetProblem {
  /** 1-based; null for the file as a whole */
  readonly line: number | null;
  readonly column: number | null;
  readonly expected: string;
  readonly found: string;
  readonly nearest: string | null;
}

export type SetRead =
  | { readonly ok: true; readonly processes: readonly UserProcess[] }
  | { readonly ok: false; readonly problems: readonly SetProblem[] };

const KINDS: readonly ProcessKind[] = ['elastic', 'momentum-transfer', 'excitation', 'ionisation', 'attachment'];
const MOST_PROBLEMS = 20;
const MOST_ROWS = 200_000;
const MOST_PROCESSES = 200;

const COLUMNS = {
  process: null,
  threshold: { dimension: 'energy', example: 'threshold [eV]', si: ELEMENTARY_CHARGE },
  energy: { dimension: 'energy', example: 'energy [eV]', si: ELEMENTARY_CHARGE },
  cross_section: { dimension: 'crossSection', example: 'cross_section [m^2]', si: 1 },
} as const;

interface Building {
  readonly kind: ProcessKind;
  readonly name: string;
  readonly threshold: number;
  readonly line: number;
  readonly energies: number[];
  readonly values: number[];
}

export function readSet(text: string): SetRead {
  const problems: SetProblem[] = [];
  const add = (line: number | null, column: number | null, expected: string, found: string, nearest: string | null = null): void => {
    if (problems.length < MOST_PROBLEMS) problems.push({ line, column, expected, found, nearest });
  };
  const lines = dataLines(text.startsWith('\ufeff') ? text.slice(1) : text);
  const first = lines.next();
  if (first.done) {
    add(null, null, 'a header with process, threshold [eV], energy [eV] and cross_section [m^2]', 'no header');
    return { ok: false, problems };
  }
  const columns = readColumns(first.value, add);
  if (columns === null) return { ok: false, problems };

  const processes = new Map<string, Building>();
  let rows = 0;
  for (const { line, text: row } of lines) {
    if (problems.length >= MOST_PROBLEMS) break;
    if (++rows > MOST_ROWS) {
      add(line, 1, `at most ${MOST_ROWS} rows`, 'more');
      break;
    }
    const fields = splitFields(row);
    if (fields.length !== columns.count) {
      add(line, 1, `${columns.count} fields, as in the header`, `${fields.length}`);
      continue;
    }
    const number = (name: 'threshold' | 'energy' | 'cross_section', empty: number | null): number | null => {
      const { at, factor } = columns[name];
      const field = fields[at];
      if (field.text === '' && empty !== null) return empty;
      const value = NUMBER.test(field.text) ? Number(field.text) * factor : Number.NaN;
      if (Number.isFinite(value) && value >= 0) return value;
      add(line, field.column, 'a finite number, not negative, with a decimal point', clip(field.text) || 'nothing');
      return null;
    };
    const word = fields[columns.process.at];
    const kind = KINDS.find((known) => known === word.text);
    if (kind === undefined) {
      add(line, word.column, `one of ${KINDS.join(', ')}`, clip(word.text) || 'nothing', nearestSpelling(word.text, KINDS));
      continue;
    }
    const threshold = number('threshold', kind === 'excitation' || kind === 'ionisation' ? null : 0);
    const energy = number('energy', null);
    const value = number('cross_section', null);
    if (threshold === null || energy === null || value === null) continue;
    const named = columns.name === null ? '' : fields[columns.name].text;
    const key = `${kind}\n${named}`;
    const known = processes.get(key);
    if (known === undefined) {
      const place = fields[columns.threshold.at].column;
      const needs = kind === 'excitation' || kind === 'ionisation';
      if (needs && threshold === 0) add(line, place, `a threshold above 0 for ${kind}`, '0');
      if ((kind === 'elastic' || kind === 'momentum-transfer') && threshold > 0)
        add(line, place, 'no threshold for elastic scattering', `${threshold} eV`);
      processes.set(key, { kind, name: named === '' ? kind : named, threshold, line, energies: [energy], values: [value] });
    } else {
      if (threshold !== known.threshold)
        add(
          line,
          fields[columns.threshold.at].column,
          `the threshold of line ${known.line}, ${known.threshold} eV; another process of this kind has another \`name\``,
          `${threshold} eV`,
        );
      const before = known.energies[known.energies.length - 1];
      if (energy <= before)
        add(line, fields[columns.energy.at].column, 'energies of a process in strictly rising order', `${energy} eV after ${before} eV`);
      known.energies.push(energy);
      known.values.push(value);
    }
    if (energy < threshold && value > 0)
      add(
        line,
        fields[columns.cross_section.at].column,
        `0 below the threshold, ${threshold} eV`,
        clip(fields[columns.cross_section.at].text),
      );
  }
  if (problems.length === 0) checkWhole([...processes.values()], add);
  if (problems.length > 0) return { ok: false, problems };
  return { ok: true, processes: [...processes.values()].map(({ line: _, ...process }) => process) };
}

type Add = (line: number | null, column: number | null, expected: string, found: string, nearest?: string | null) => void;

interface Columns {
  readonly count: number;
  readonly process: { readonly at: number };
  readonly threshold: { readonly at: number; readonly factor: number };
  readonly energy: { readonly at: number; readonly factor: number };
  readonly cross_section: { readonly at: number; readonly factor: number };
  readonly name: number | null;
}

function readColumns({ line, text }: { readonly line: number; readonly text: string }, add: Add): Columns | null {
  const header = splitFields(text).map((field) => ({ ...readHeader(field.text), column: field.column }));
  const names = header.map(({ name }) => name);
  let sound = true;
  const refuse: Add = (...problem) => {
    sound = false;
    add(...problem);
  };
  for (const [i, name] of names.entries()) {
    if (names.indexOf(name) < i) refuse(line, header[i].column, 'every column once', `${clip(name)} again`);
    if (name !== 'name' && !Object.hasOwn(COLUMNS, name))
      refuse(
        line,
        header[i].column,
        'only process, threshold, energy, cross_section and name',
        clip(name) || 'a column without a name',
        nearestSpelling(name, [...Object.keys(COLUMNS), 'name']),
      );
  }
  const place = (name: keyof typeof COLUMNS): { readonly at: number; readonly factor: number } => {
    const at = names.indexOf(name);
    const request = COLUMNS[name];
    if (at < 0) {
      refuse(line, 1, `a column ${request?.example ?? name}`, 'none');
      return { at: 0, factor: 1 };
    }
    if (request === null) return { at, factor: 1 };
    const { unit, column } = header[at];
    const factor = unit === null ? null : unitFactor(unit);
    if (factor === null || !factor.ok || !sameExponents(factor.exponents, DIMENSIONS[request.dimension].exponents)) {
      refuse(line, column, `the column as ${request.example}`, unit === null ? `${name} without a unit` : `[${clip(unit)}]`);
      return { at, factor: 1 };
    }
    // 15 digits, so that 15 eV is 15
    return { at, factor: Number((factor.factor / request.si).toPrecision(15)) };
  };
  const columns = {
    count: header.length,
    process: place('process'),
    threshold: place('threshold'),
    energy: place('energy'),
    cross_section: place('cross_section'),
    name: names.includes('name') ? names.indexOf('name') : null,
  };
  return sound ? columns : null;
}

function checkWhole(processes: readonly Building[], add: Add): void {
  const elastic = processes.filter(({ kind }) => kind === 'elastic' || kind === 'momentum-transfer');
  if (elastic.length === 0) add(null, null, 'a process `elastic` or `momentum-transfer`', 'none');
  for (const { line, kind, name } of elastic.slice(1))
    add(line, null, 'one process of elastic scattering', `${kind} ${clip(name)} beside that of line ${elastic[0].line}`);
  if (processes.length > MOST_PROCESSES) add(null, null, `at most ${MOST_PROCESSES} processes`, `${processes.length}`);
  for (const { line, kind, name, energies, values } of processes) {
    if (energies.length < 2) add(line, null, 'at least two rows for each process', `one for ${kind} ${clip(name)}`);
    else if (!values.some((value) => value > 0)) add(line, null, 'a cross-section above 0 somewhere', `none for ${kind} ${clip(name)}`);
  }
}
