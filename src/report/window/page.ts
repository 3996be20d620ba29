import { formatQuantity } from '../../units/index.ts';
import { html } from '../document.ts';
import { type Element, el } from '../element.ts';
import { linkedSection } from '../linked-section.ts';
import { coefficientSection } from '../run/coefficient-section.ts';
import { allNumbers } from '../run/key-numbers.ts';
import { assumptionSection, cautionSection, footer, provenance, together } from '../sections.ts';
import type { WindowSeries } from './data.ts';
import type { WindowReport } from './report.ts';
import { seriesOf } from './series.ts';
import { clockText, WINDOW_AXES } from './time-axis.ts';

/** What the page's script reads. */
export interface WindowPageData extends WindowSeries {
  readonly kind: 'window';
}

/** The page of a window. @param script  the bundled script of window pages */
export function windowPage(report: WindowReport, script: string): string {
  const { outcome } = report;
  const data: WindowPageData = { kind: 'window', ...seriesOf(report) };
  return html({
    title: `${report.title} – gapwake window`,
    body: [
      el('a', { class: 'skip', href: '#figures' }, 'Skip to the figures'),
      header(report),
      el(
        'main',
        {},
        el('div', { class: 'pair' }, keySection(report), cautionSection(outcome.cautions)),
        linkedSection({
          heading: 'Pressure, hold-off voltage and supply',
          shows: 'the path against pd shows',
          moments: outcome.history.length,
          axes: WINDOW_AXES,
        }),
        assumptionSection(report.assumptions, [...report.remarks, ...outcome.notes]),
        coefficientSection(report.coefficients, null),
        provenance({
          facts: [
            ['Result file', `${report.fileName}, written by gapwake ${report.version}`],
            ['Case', `SHA-256 ${outcome.case_sha256}`],
            ['Instants', `${outcome.numerics.instants}, decided by ${outcome.numerics.runs} simulations`],
            ...(outcome.numerics.failures.length === 0 ? [] : [['Without an answer', outcome.numerics.failures.join('; ')] as const]),
          ],
          caseText: report.caseText,
          tables: report.tables,
          command: 'gapwake window case.yaml -o result.h5',
          numbers: allNumbers(outcome),
        }),
      ),
      footer(report.reportVersion),
    ],
    data,
    script,
  });
}

const STATES: Readonly<Record<string, string>> = { Holds: 'holds', 'Breaks down': 'breaks-down' };

function header({ fileName, title, verdict, spread, turnOn }: WindowReport): Element {
  return el(
    'header',
    {},
    el('p', { class: 'kind' }, `One gap in changing surroundings: ${fileName}`),
    el('h1', {}, title),
    el(
      'p',
      { class: `verdict ${STATES[verdict.word] ?? 'undecided'}` },
      el('strong', {}, `${verdict.word}${spread === null ? '' : ' at the typical yield'}:`),
      ` ${together(verdict.text)}`,
    ),
    spread === null ? null : el('p', { class: 'verdict undecided' }, together(spread)),
    el('p', {}, together(turnOn)),
  );
}

function keySection({ outcome }: WindowReport): Element {
  const { windows, lowest_hold_off: lowest, worst, yield_spread: spread } = outcome;
  return el(
    'section',
    {},
    el('h2', {}, 'Windows'),
    windows.length === 0
      ? el('p', {}, 'None: the gap holds with the margin throughout.')
      : el(
          'table',
          { class: 'stack' },
          el(
            'thead',
            {},
            el(
              'tr',
              {},
              ['From', 'To', 'State', 'Lowest hold-off', 'Shortest lag'].map((name) => el('th', { scope: 'col' }, name)),
            ),
          ),
          el(
            'tbody',
            {},
            windows.map((each, i) =>
              el(
                'tr',
                {},
                el('td', { 'data-label': 'from' }, time(`windows.${i}.from_s`, each.from_s)),
                el('td', { 'data-label': 'to' }, time(`windows.${i}.to_s`, each.to_s)),
                el(
                  'td',
                  { 'data-label': 'state' },
                  each.below_paschen_minimum ? 'outside the model, below the minimum' : each.state.replace('-', ' '),
                ),
                el('td', { 'data-label': 'lowest hold-off' }, shown(`windows.${i}.lowest_hold_off_V`, each.lowest_hold_off_V, 'V')),
                el('td', { 'data-label': 'shortest lag' }, shown(`windows.${i}.shortest_lag_s`, each.shortest_lag_s, 's')),
              ),
            ),
          ),
        ),
    el('h3', {}, 'Key numbers'),
    el(
      'table',
      {},
      el(
        'tbody',
        {},
        row('Earliest turn-on that holds to the end', [time('earliest_turn_on_s', outcome.earliest_turn_on_s)]),
        row('Latest turn-on, switched off by then', [time('latest_turn_on_s', outcome.latest_turn_on_s)]),
        lowest === null
          ? null
          : row('Lowest hold-off voltage', [
              shown('lowest_hold_off.voltage_V', lowest.voltage_V, 'V'),
              ' at ',
              time('lowest_hold_off.time_s', lowest.time_s),
              ', ',
              shown('lowest_hold_off.pressure_Pa', lowest.pressure_Pa, 'Pa'),
            ]),
        worst === null
          ? null
          : row('Worst instant', [
              time('worst.time_s', worst.time_s),
              ': ',
              shown('worst.supply_V', worst.supply_V, 'V'),
              ' where it holds ',
              shown('worst.hold_off_V', worst.hold_off_V, 'V'),
            ]),
        row('Margin on the voltage', [shown('margin', outcome.margin, '')]),
        spread === null ? null : [end('low', spread.low), end('high', spread.high)],
      ),
    ),
    el(
      'p',
      { class: 'faint' },
      'Windows say when a dark gap breaks down. A discharge that burns may go on burning after its window has closed.',
    ),
  );
}

function end(name: 'low' | 'high', at: NonNullable<WindowReport['outcome']['yield_spread']>['low']): Element {
  const path = `yield_spread.${name}`;
  const broken = at.windows.filter(({ state }) => state === 'breaks-down').length;
  return row(`At an ion yield of ${at.ion_yield}`, [
    broken === 0 ? 'no breakdown' : `breaks down in ${broken} window${broken === 1 ? '' : 's'}`,
    ...(at.lowest_hold_off === null
      ? []
      : [', holds ', shown(`${path}.lowest_hold_off.voltage_V`, at.lowest_hold_off.voltage_V, 'V'), ' at worst']),
  ]);
}

function row(label: string, cell: readonly (Element | string)[]): Element {
  return el('tr', {}, el('th', { scope: 'row' }, label), el('td', {}, cell));
}

function time(path: string, seconds: number | null): Element {
  return number(path, seconds, seconds === null ? 'none' : clockText(seconds));
}

function shown(path: string, value: number | null, unit: string): Element {
  return number(path, value, value === null ? '–' : formatQuantity(value, unit));
}

function number(path: string, value: number | null, text: string): Element {
  return el('span', { class: 'number', 'data-path': path, 'data-value': value === null ? 'null' : String(value) }, text);
}
