/** `npm run checks`: every published number beside the program's, with how far the comparison carries; exit 1 when one is out of its tolerance.
 *
 *  `npm run checks -- WORD` keeps the sources and checks that contain the word; `-- --csv` prints a table for other programs, reasons included. */
import { type Check, type Compared, compare, counts, kindOf, toleranceText } from './published/check.ts';
import { sources } from './published/index.ts';

const words = process.argv.slice(2);
const csv = words.includes('--csv');
const wanted = words.filter((word) => !word.startsWith('--')).map((word) => word.toLowerCase());

const COLUMNS: readonly (readonly [title: string, width: number])[] = [
  ['check', 72],
  ['published', 10],
  ['gapwake', 10],
  ['difference', 11],
  ['tolerance', 18],
  ['unit', 18],
  ['status', 16],
  ['kind', 20],
  ['independent of', 0],
];

function short(value: number): string {
  const size = Math.abs(value);
  return size !== 0 && (size < 1e-3 || size >= 1e5) ? value.toExponential(3) : String(Number(value.toPrecision(5)));
}

function percent(share: number): string {
  return `${share > 0 ? '+' : ''}${Number((100 * share).toPrecision(2))} %`;
}

function fields(check: Check, { value, difference, passes, fault }: Compared): string[] {
  const kind = `${kindOf(check)}${check.simulated ? ', run' : ''}`;
  const independent = check.independentOf ?? '–';
  return [
    `${passes ? '' : 'FAILS: '}${check.check}${fault === null ? '' : ` (${fault})`}`,
    short(check.published),
    short(value),
    percent(difference),
    toleranceText(check),
    check.unit,
    check.status,
    kind,
    independent,
  ];
}

function line(cells: readonly string[]): string {
  return cells
    .map((cell, i) => (COLUMNS[i][1] === 0 ? cell : cell.padEnd(COLUMNS[i][1])))
    .join(' ')
    .trimEnd();
}

const quoted = (cell: string): string => (/[",\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell);

const all: { readonly check: Check; readonly passes: boolean }[] = [];
if (csv) console.log([...COLUMNS.map(([title]) => title), 'source', 'reason of the tolerance', 'passes'].join(','));
for (const { source, checks } of sources) {
  const chosen = checks.filter((c) => wanted.every((word) => `${source} ${c.check}`.toLowerCase().includes(word)));
  if (chosen.length === 0) continue;
  if (!csv) console.log(`\n${source}\n${line(COLUMNS.map(([title]) => title))}`);
  for (const check of chosen) {
    const compared = compare(check);
    all.push({ check, passes: compared.passes });
    const cells = fields(check, compared);
    console.log(csv ? [...cells, source, check.reason, String(compared.passes)].map(quoted).join(',') : line(cells));
  }
}

const counted = all.filter(({ check }) => counts(check));
const simulated = counted.filter(({ check }) => check.simulated);
const failing = all.filter(({ passes }) => !passes);
const ofKind = (kind: string): number => all.filter(({ check }) => kindOf(check) === kind).length;
if (!csv)
  console.log(
    [
      '',
      'Tolerances are of the published value; --csv gives the reason for each. A check from memory (M, L) is plausibility only: nobody here has read the source.',
      `${counted.length} rows count, ${simulated.length} of them run the time-dependent solver: ${ofKind('check')} checks, ${ofKind('plausibility')} of plausibility.`,
      `Not counted: ${ofKind('not independent')} not independent (one law or table on both sides, or a number chosen with the published one in view), ${ofKind('known limit')} known limits of the model, pinned where they are.`,
      failing.length === 0 ? 'None fails.' : `${failing.length} fail: ${failing.map(({ check }) => check.check).join('; ')}`,
    ].join('\n'),
  );
process.exitCode = failing.length === 0 ? 0 : 1;
