import { formatQuantity } from '../../units/index.ts';
import { html } from '../document.ts';
import { type Element, el } from '../element.ts';
import { withoutScript } from '../linked-section.ts';
import { packExact, packSingle, packTexts } from '../pack.ts';
import type { Packed } from '../packed.ts';
import { coefficientSection } from '../run/coefficient-section.ts';
import { assumptionSection, cautionSection, footer, provenance, together } from '../sections.ts';
import { axisValue, columnOf, type ScanAxisValues, type ScanColumn, type YieldBand } from './data.ts';
import type { ScanReport } from './report.ts';

/** What the page's script reads. */
export interface ScanPageData {
  readonly kind: 'scan';
  readonly axes: readonly ScanAxisValues[];
  readonly layout: 'grid' | 'list';
  readonly count: number;
  readonly columns: readonly (Omit<ScanColumn, 'values'> & { readonly values: Packed })[];
  readonly reasons: Packed;
  readonly band: YieldBand | null;
}

/** points whose numbers keep every digit; of more, seven */
const MOST_EXACT = 2500;

/** The page of a scan. @param script  the bundled script of scan pages */
export function scanPage(scan: ScanReport, script: string): string {
  const { axes, layout, count, band } = scan;
  const pack = count <= MOST_EXACT ? packExact : packSingle;
  const data: ScanPageData = {
    kind: 'scan',
    axes,
    layout,
    count,
    columns: scan.columns.map((column) => ({ ...column, values: (column.kind === 'mask' ? packExact : pack)(column.values) })),
    reasons: packTexts(scan.reasons),
    band,
  };
  return html({
    title: `${scan.title} – gapwake scan`,
    body: [
      el('a', { class: 'skip', href: '#figures' }, 'Skip to the figures'),
      header(scan),
      el(
        'main',
        {},
        el(
          'div',
          { class: 'pair' },
          keySection(scan),
          cautionSection(
            scan.cautions.map(({ caution, points }) => ({
              ...caution,
              text: count === 1 ? caution.text : `At ${points} of ${count} points, for example: ${caution.text}`,
            })),
          ),
        ),
        figures(scan),
        assumptionSection(scan.assumptions, scan.remarks, 'The case before anything is varied:'),
        coefficientSection(scan.coefficients, null),
        provenance({
          facts: [
            ['Result file', `${scan.fileName}, written by gapwake ${scan.version}`],
            ['Study', `SHA-256 ${scan.study}`],
            ['Points', count === scan.total ? String(count) : `${count} of a plan of ${scan.total}`],
          ],
          caseText: scan.caseText,
          tables: scan.tables,
          command: 'gapwake scan case.yaml -o result.h5',
          numbers: [],
        }),
      ),
      footer(scan.reportVersion),
    ],
    data,
    script,
  });
}

function header({ fileName, title, axes, count, find }: ScanReport): Element {
  const over = axes.length === 0 ? 'the case itself' : axes.map(({ path }) => path).join(', ');
  return el(
    'header',
    {},
    el('p', { class: 'kind' }, `Many gaps: ${fileName}`),
    el('h1', {}, title),
    el('p', {}, `${count} point${count === 1 ? '' : 's'} over ${over}${find === null ? '' : `; searched for at each: ${find}`}.`),
  );
}

function keySection(scan: ScanReport): Element {
  const verdict = columnOf(scan, 'verdict');
  const counts = (verdict?.meanings ?? []).map(
    (word, i) => [word, verdict?.values.reduce((n, v) => n + (v === i ? 1 : 0), 0) ?? 0] as const,
  );
  const names = [
    ...(columnOf(scan, 'found_value') === null ? [] : ['found_value']),
    'static_breakdown_voltage',
    'formative_lag',
    'peak_current',
    'gap_energy',
  ];
  return el(
    'section',
    {},
    el('h2', {}, 'Key numbers'),
    el(
      'table',
      {},
      el('caption', {}, 'Points by verdict'),
      el(
        'tbody',
        {},
        counts
          .filter(([word, n]) => n > 0 || word !== 'failed')
          .map(([word, n]) =>
            el('tr', {}, el('th', { scope: 'row' }, word.replace('-', ' ')), el('td', { 'data-count': word, 'data-value': n }, String(n))),
          ),
      ),
    ),
    el(
      'table',
      {},
      el('caption', {}, 'Least and largest values, and where'),
      el('thead', {}, el('tr', {}, el('td', {}, ''), el('th', { scope: 'col' }, 'Least'), el('th', { scope: 'col' }, 'Largest'))),
      el(
        'tbody',
        {},
        names.flatMap((name) => extremes(scan, name)),
      ),
    ),
  );
}

function extremes(scan: ScanReport, name: string): Element[] {
  const column = columnOf(scan, name);
  if (column === null) return [];
  let [least, most] = [-1, -1];
  column.values.forEach((v, i) => {
    if (!Number.isFinite(v)) return;
    if (least < 0 || v < column.values[least]) least = i;
    if (most < 0 || v > column.values[most]) most = i;
  });
  if (least < 0) return [];
  const unit = column.units === '1' ? '' : column.units;
  const cell = (place: number): Element => {
    const where = scan.axes.map(
      (axis, k) => `${axis.path} ${formatQuantity(axisValue(scan, place, k), axis.unit === '1' ? '' : axis.unit)}`,
    );
    return el(
      'td',
      {},
      el(
        'span',
        { class: 'number', 'data-column': name, 'data-place': place, 'data-value': column.values[place] },
        formatQuantity(column.values[place], unit),
      ),
      el('div', { class: 'faint' }, together(where.join(', '))),
    );
  };
  return [el('tr', {}, el('th', { scope: 'row' }, column.longName), cell(least), cell(most))];
}

/** Empty places that the script fills. */
function figures(scan: ScanReport): Element {
  const list = scan.layout === 'list';
  const options = (names: readonly (readonly [value: string, text: string])[]): Element[] =>
    names.map(([value, text]) => el('option', { value }, text));
  const axes = scan.axes.map(({ path }, k) => [String(k), path] as const);
  const choice = (id: string, label: string, entries: Element[]): Element => el('label', {}, `${label} `, el('select', { id }, entries));
  return el(
    'section',
    { id: 'figures', 'aria-labelledby': 'figures-heading' },
    el('h2', { id: 'figures-heading' }, 'Over what is varied'),
    el(
      'p',
      { class: 'faint no-print' },
      'Click a point for what was found there; the arrow keys step from point to point. ',
      scan.axes.length > 2 && !list
        ? 'Choose which two entries the maps are drawn over; the others are held at the values chosen beside them.'
        : '',
    ),
    withoutScript(),
    el(
      'div',
      { class: 'rail', role: 'group', 'aria-label': 'What is shown' },
      scan.axes.length === 0 ? null : choice('x', 'Across', options(axes)),
      scan.axes.length < 2 || list ? null : choice('y', 'Upwards', options([['', 'nothing: curves'], ...axes])),
      choice('quantity', 'Quantity', []),
      el('span', { class: 'choices', id: 'fixed' }),
    ),
    el(
      'div',
      { class: 'bench' },
      el('div', { class: 'time-column', id: 'drawn' }),
      el(
        'div',
        { class: 'now-column' },
        el('section', { class: 'card point', id: 'point', 'aria-live': 'polite', 'aria-label': 'The chosen point' }),
      ),
    ),
  );
}
