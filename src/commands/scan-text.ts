import { ResultFileError } from '../results/errors.ts';
import type { ScanFile } from '../results/scan-read.ts';
import type { Headline } from '../results/scan-variables.ts';
import type { Preview } from '../scan/pilot.ts';
import { printable } from '../units/printable.ts';
import { lastLines } from './cautions-text.ts';
import { lengthOf, NO_BREAK, wrap } from './layout.ts';
import { quantity } from './quantities.ts';
import { durationText } from './scan-progress.ts';
import type { Terminal } from './terminal.ts';

/** What a scan has found, as far as a page shows it. */
export interface ScanWritten {
  readonly file: ScanFile;
  /** points computed just now; the others were there */
  readonly computed: number;
  readonly bytes: number;
  readonly csv: string | null;
}

/** points shown in the table: all, or the first and the last of them */
const MOST_ROWS = 24;
const FIRST_ROWS = 12;
const LAST_ROWS = 6;
const MOST_FAILURES = 5;

/** What `scan` prints for people: how many hold and break down, what was found, a table, failures, cautions, where the result went. */
export function scanText({ file, computed, bytes, csv }: ScanWritten, terminal: Terminal): string {
  const { style, width } = terminal;
  const table = new Table(file);
  const lines = [...countLines(table, terminal), ...foundLines(table, width), '', ...wrap(printable(file.title), width).map(style.faint)];
  lines.push(...table.lines(terminal));
  const failures = failureLines(table, width);
  if (failures.length > 0) lines.push('', style.strong('Not completed'), ...failures);
  const cautions = cautionLines(table, width);
  if (cautions.length > 0) lines.push('', style.strong('Cautions, and at how many points'), ...cautions);
  const size = bytes < 1e6 ? `${Math.ceil(bytes / 1e3)} kB` : `${(bytes / 1e6).toFixed(1)} MB`;
  const share = file.shard === null ? '' : `, shard ${file.shard.k} of ${file.shard.n} of ${file.total} points`;
  const news = computed === 0 ? ', nothing was left to compute' : computed < file.count ? `, ${computed} of them computed just now` : '';
  const written = [`Written: ${printable(file.path)} (${pointsText(file.count)}${share}, ${size}${news}).`];
  if (csv !== null) written.push(`Table: ${printable(csv)}.`);
  return `${[...lines, '', ...written.flatMap((line) => wrap(line, width)), ...lastLines(terminal)].join('\n')}\n`;
}

/** What `scan --plan` prints for people. */
export function planText(preview: Preview, paths: readonly { readonly path: string; readonly unit: string }[], terminal: Terminal): string {
  const { style, width } = terminal;
  const { total, count, shard, workers, first, pilot, estimate } = preview;
  const share = shard === null ? '' : `, of which shard ${shard.k} of ${shard.n} takes ${count}`;
  const lines = [...wrap(`${pointsText(total)}${share}.`, width).map(style.strong), ''];
  const headers = ['point', 'id', ...paths.map(({ path }) => shortened(path))];
  const rows = first.map(({ index, id, values }) => [
    String(index),
    id.slice(0, 12),
    ...values.map((value, axis) => axisValue(value, paths[axis]?.unit ?? '1')),
  ]);
  lines.push(...gridLines(headers, rows, terminal));
  if (count > first.length) lines.push(`  … and ${count - first.length} more`);
  lines.push('');
  if (pilot.mean === null || estimate === null) {
    lines.push(
      ...wrap(
        `None of ${pointsText(pilot.points)} spread over the plan was finished in the time a pilot has: there is no estimate.`,
        width,
      ),
    );
  } else {
    const range = `${quantity(pilot.least, 's')} to ${quantity(pilot.largest, 's')}, ${quantity(pilot.mean, 's')} on average`;
    const rest = pilot.unfinished === 0 ? '' : `; ${pilot.unfinished} more did not finish`;
    const failed = pilot.failed === 0 ? '' : `; ${pilot.failed} failed`;
    const finished = pilot.points - pilot.unfinished;
    lines.push(...wrap(`${pointsText(finished)} spread over it took ${range}${rest}${failed}.`, width));
    const by = `with ${workers} worker${workers === 1 ? '' : 's'}`;
    const atLeast = pilot.unfinished === 0 ? 'about' : 'more than';
    lines.push(...wrap(`The whole would take ${atLeast} ${durationText(estimate)} ${by}.`, width));
  }
  lines.push('Nothing was written.');
  return `${lines.join('\n')}\n`;
}

function pointsText(count: number): string {
  return `${count}${NO_BREAK}point${count === 1 ? '' : 's'}`;
}

/** Columns of a scan file by name, with what their numbers mean. */
class Table {
  readonly file: ScanFile;
  readonly #columns = new Map<string, ArrayLike<number>>();

  constructor(file: ScanFile) {
    this.file = file;
  }

  has(name: string): boolean {
    return this.file.headlines.some((headline) => headline.name === name);
  }

  headline(name: string): Headline {
    const found = this.file.headlines.find((headline) => headline.name === name);
    if (found === undefined) throw new RangeError(`a scan has no column ${name}`);
    return found;
  }

  column(name: string): ArrayLike<number> {
    const known = this.#columns.get(name);
    if (known !== undefined) return known;
    const values = this.file.column(name);
    this.#columns.set(name, values);
    return values;
  }

  /** the word of a flag at a point */
  word(name: string, position: number): string {
    const headline = this.headline(name);
    const code = this.column(name)[position] ?? -1;
    const word = headline.kind === 'flag' ? headline.meanings[code] : undefined;
    if (word === undefined)
      throw new ResultFileError('damaged', this.file.path, `the file is damaged: ${name} has the unknown value ${code}`);
    return word;
  }

  number(name: string, position: number): number | null {
    const value = this.column(name)[position] ?? Number.NaN;
    return Number.isNaN(value) ? null : value;
  }

  /** how often each word of a flag, or each bit of a mask, occurs */
  counts(name: string): Map<string, number> {
    const headline = this.headline(name);
    const values = this.column(name);
    const meanings = 'meanings' in headline ? headline.meanings : [];
    const counts = new Map(meanings.map((word): [string, number] => [word, 0]));
    for (let i = 0; i < values.length; i++) {
      for (const [code, word] of meanings.entries()) {
        const there = headline.kind === 'mask' ? ((values[i] as number) >> code) & 1 : values[i] === code;
        if (there) counts.set(word, (counts.get(word) as number) + 1);
      }
    }
    return counts;
  }

  axisAt(axis: number, position: number): number {
    const { axes, layout } = this.file;
    const values = axes[axis]?.values ?? new Float64Array();
    if (layout === 'list') return values[position] as number;
    const inner = axes.slice(axis + 1).reduce((product, each) => product * each.values.length, 1);
    return values[Math.floor(position / inner) % values.length] as number;
  }

  lines(terminal: Terminal): string[] {
    const { axes, count } = this.file;
    const shown = (name: string, unit: string) => (position: number) => quantity(this.number(name, position), unit);
    const searched = this.has('found_value');
    const unit = searched ? ((this.headline('found_value') as { units?: string }).units ?? '1') : '1';
    const cells: [header: string, cell: (position: number) => string][] = [
      ...axes.map(({ path, unit: axisUnit }, axis): [string, (position: number) => string] => [
        shortened(path),
        (position) => axisValue(this.axisAt(axis, position), axisUnit),
      ]),
      ...(searched
        ? ([
            [this.file.find ?? '', (position) => this.#found(position, unit)],
            ['theory', shown('found_theory', unit)],
          ] as [string, (position: number) => string][])
        : []),
      ['verdict', (position) => this.word('verdict', position).replace('-', ' ')],
      ['lag', shown('formative_lag', 's')],
      ['V_s', shown('static_breakdown_voltage', 'V')],
      ['peak', shown('peak_current', 'A')],
      ['energy', shown('gap_energy', 'J')],
    ];
    const all = count <= MOST_ROWS;
    const positions = Array.from({ length: count }, (_, i) => i);
    const head = all ? positions : positions.slice(0, FIRST_ROWS);
    const tail = all ? [] : positions.slice(-LAST_ROWS);
    const rows = [...head, ...tail].map((position) => cells.map(([, cell]) => cell(position)));
    const lines = gridLines(
      cells.map(([header]) => header),
      rows,
      terminal,
    );
    if (!all) lines.splice(1 + FIRST_ROWS, 0, `  … ${count - FIRST_ROWS - LAST_ROWS} more …`);
    return lines;
  }

  #found(position: number, unit: string): string {
    const state = this.word('found_state', position);
    return state === 'found' ? quantity(this.number('found_value', position), unit) : state.replaceAll('-', ' ');
  }
}

/** Rows below a header, as many columns as the width has room for. */
function gridLines(headers: readonly string[], rows: readonly (readonly string[])[], terminal: Terminal): string[] {
  const widths = headers.map((header, i) => 2 + Math.max(lengthOf(header), ...rows.map((row) => lengthOf(row[i] ?? ''))));
  let [fitting, used] = [0, 2];
  while (fitting < widths.length && used + (widths[fitting] as number) - 2 <= terminal.width) used += widths[fitting++] as number;
  const cut = Math.max(1, fitting);
  const line = (cells: readonly string[]): string =>
    `  ${cells
      .slice(0, cut)
      .map((cell, i) => cell.replaceAll(NO_BREAK, ' ') + ' '.repeat(Math.max(0, (widths[i] as number) - lengthOf(cell))))
      .join('')}`.trimEnd();
  return [terminal.style.strong(line(headers)), ...rows.map(line)];
}

function countLines(table: Table, { style, width }: Terminal): string[] {
  const counts = table.counts('verdict');
  const parts = (
    [
      ['holds', 'hold', 'holds'],
      ['breaks-down', 'break down', 'breaks down'],
      ['undecided', 'undecided', 'undecided'],
      ['failed', 'not completed', 'not completed'],
    ] as const
  ).flatMap(([word, many, one]) => {
    const count = counts.get(word) ?? 0;
    return count === 0 ? [] : [`${count} ${count === 1 ? one : many}`];
  });
  const alarm = (counts.get('breaks-down') ?? 0) > 0;
  const text = `${pointsText(table.file.count)}: ${parts.join(', ')}.`;
  return wrap(text, width).map(alarm ? style.alarm : style.strong);
}

const FOUND: Readonly<Record<string, string>> = {
  'hold-off': 'Hold-off voltage',
  'trip-delay': 'Longest trip delay',
  'series-resistance': 'Least series resistance',
};

function foundLines(table: Table, width: number): string[] {
  const { find } = table.file;
  if (find === null) return [];
  const unit = (table.headline('found_value') as { units?: string }).units ?? '1';
  const states = table.counts('found_state');
  const values = Array.from(table.column('found_value')).filter((value) => !Number.isNaN(value));
  const found = states.get('found') ?? 0;
  const [least, largest] = extremes(values);
  const range =
    values.length === 0 ? 'found nowhere' : `${quantity(least, unit)} to ${quantity(largest, unit)}, found at ${pointsText(found)}`;
  const others = (
    [
      ['none-breaks-down', 'nothing in the range breaks down'],
      ['none-holds', 'nothing in the range holds'],
      ['undecided', 'undecided'],
      ['failed', 'not completed'],
    ] as const
  ).flatMap(([state, text]) => {
    const count = states.get(state) ?? 0;
    return count === 0 ? [] : [`${text} at ${count}`];
  });
  const changes = table.column('found_changes');
  let several = 0;
  for (let i = 0; i < changes.length; i++) if ((changes[i] as number) > 1) several++;
  if (several > 0) others.push(`the answer changes more than once at ${several}`);
  return wrap(`${FOUND[find] ?? find}: ${[range, ...others].join('; ')}.`, width);
}

/** Least and largest, without spreading a million arguments. */
function extremes(values: readonly number[]): [number, number] {
  let [least, largest] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const value of values) {
    if (value < least) least = value;
    if (value > largest) largest = value;
  }
  return [least, largest];
}

/** The first failures, with their points and reasons. */
function failureLines(table: Table, width: number): string[] {
  const errors = table.column('error');
  let left = 0;
  for (let i = 0; i < errors.length; i++) if (errors[i] !== 0) left++;
  if (left === 0) return [];
  const lines: string[] = [];
  let shown = 0;
  for (const { index, values, error } of table.file.points()) {
    if (error === null) continue;
    const place = values.map((value, axis) => `${table.file.axes[axis]?.path} ${axisValue(value, table.file.axes[axis]?.unit ?? '1')}`);
    lines.push(
      ...wrap(
        printable(`point ${index}${place.length > 0 ? ` (${place.join(', ')})` : ''}: ${error.text} [${error.code}]`),
        width,
        '  ! ',
        '    ',
      ),
    );
    if (++shown === MOST_FAILURES) break;
  }
  if (left > shown) lines.push(`    … and ${left - shown} more`);
  return lines;
}

function cautionLines(table: Table, width: number): string[] {
  const counts = [...table.counts('cautions')].filter(([code, count]) => count > 0 && code !== 'not-a-clearance');
  if (counts.length === 0) return [];
  const text = counts.map(([code, count]) => `${code}${NO_BREAK}${count === table.file.count ? '(all)' : `(${count})`}`).join(', ');
  return wrap(`${text}. Their texts are with each point in --json.`, width, '  ');
}

/** A path that fits above a column: its last keys. */
function shortened(path: string): string {
  const keys = path.split('.');
  while (keys.length > 1 && keys.join('.').length > 16) keys.shift();
  return keys.join('.');
}

function axisValue(value: number, unit: string): string {
  return quantity(value, unit === '1' ? '' : unit, 4);
}
