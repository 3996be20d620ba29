import { TOWNSEND } from '../../units/constants.ts';
import { formatQuantity } from '../../units/index.ts';
import { type Element, el } from '../element.ts';
import { percent } from './key-numbers.ts';
import type { CoefficientsUsed, CoefficientUsed, RunReport } from './report.ts';
import { type Visited, visited } from './visited.ts';

/** The table of coefficients: what, from where, where it holds, where the run used it. */
export function coefficientSection(coefficients: CoefficientsUsed, run: RunReport | null): Element {
  const rows = coefficients.entries.map((entry) => row(entry, run === null ? undefined : visited(entry.name, entry.range, run)));
  return el(
    'section',
    { id: 'coefficients' },
    el('h2', {}, 'Where the numbers come from'),
    el(
      'p',
      {},
      gasText(coefficients),
      coefficients.breakdownUncertainty === null
        ? null
        : `A breakdown voltage computed with these data is uncertain by about ${percent(coefficients.breakdownUncertainty, false)}.`,
    ),
    el(
      'div',
      { class: 'scroll', tabindex: 0, role: 'region', 'aria-label': 'Coefficients' },
      el(
        'table',
        { class: 'stack' },
        run === null
          ? null
          : el(
              'caption',
              {},
              'Use is weighed by ionisation for ionisation and by moving particles for the rest. In the strips, from 0.1 Td to 100 kTd on a logarithmic scale, the pale bar is the range ',
              'of the data and the dark one the fields at which the run used them.',
            ),
        el(
          'thead',
          {},
          el(
            'tr',
            {},
            ['Coefficient', 'Value', 'Source', 'Range of the data', ...(run === null ? [] : ['Used by this run'])].map((name) =>
              el('th', { scope: 'col' }, name),
            ),
          ),
        ),
        el('tbody', {}, rows),
      ),
    ),
    ...(coefficients.notes.length === 0
      ? []
      : [
          el('h3', {}, 'Notes on this gas'),
          el(
            'ul',
            {},
            coefficients.notes.map((note) => el('li', {}, note)),
          ),
        ]),
  );
}

function gasText({ gas, entries }: CoefficientsUsed): string {
  if (gas !== null) return `Gas: ${gas}. `;
  const own = entries.every(({ status, name }) => status === 'given' || name.endsWith('_ion_yield'));
  return own ? 'Every coefficient is the case’s own. ' : 'Gas: a mixture, its coefficients made of those of its parts. ';
}

/** @param use  null: not used or not known; undefined: not asked for */
function row(entry: CoefficientUsed, use: Visited | null | undefined): Element {
  const uncertainty = entry.uncertainty === null ? 'uncertainty not stated' : `± ${percent(entry.uncertainty, false)}`;
  return el(
    'tr',
    {},
    el('th', { scope: 'row' }, entry.label),
    el('td', { 'data-label': 'value' }, entry.value),
    el(
      'td',
      { 'data-label': 'source' },
      entry.source === '' ? null : `${entry.source} `,
      el('span', { class: 'faint' }, `(${entry.status}, ${uncertainty})`),
      entry.note === null ? null : el('div', { class: 'faint' }, entry.note),
    ),
    el('td', { 'data-label': 'range' }, entry.range === null ? 'none stated' : rangeText(entry.range)),
    use === undefined ? null : el('td', { 'data-label': 'used' }, use === null ? '–' : [strip(entry, use), usedText(entry, use)]),
  );
}

function rangeText({ from, to }: { readonly from: number; readonly to: number }): string {
  const low = formatQuantity(from / TOWNSEND, '');
  return to / TOWNSEND > 1e12 ? `from ${low} Td` : `${low} to ${formatQuantity(to / TOWNSEND, '')} Td`;
}

function usedText({ range }: CoefficientUsed, use: Visited): string {
  const fields = rangeText(use);
  if (range === null || use.inside === null) return fields;
  const overlap = Math.log(Math.min(range.to, use.to) / Math.max(range.from, use.from, 1e-30));
  const whole = Math.log(range.to / Math.max(range.from, 1e-30));
  const part =
    whole > 0 && whole < 100 && overlap > 0 ? `, ${Math.max(1, Math.round((100 * overlap) / whole))} % of the range (logarithmic)` : '';
  const outside = 1 - use.inside;
  return `${fields}${part}; ${outside < 5e-4 ? 'none of the use' : `${percent(outside, false)} of the use`} lies outside`;
}

const WIDTH = 150;
const [LOW, HIGH] = [0.1 * TOWNSEND, 1e5 * TOWNSEND];

/** range and use on one logarithmic strip */
function strip({ range }: CoefficientUsed, use: Visited): Element {
  const at = (x: number): number => WIDTH * Math.min(1, Math.max(0, Math.log(Math.max(x, 1e-40) / LOW) / Math.log(HIGH / LOW)));
  const bar = (kind: string, from: number, to: number, y: number, height: number): Element =>
    el('rect', { class: kind, x: at(from), y, width: Math.max(1.5, at(to) - at(from)), height });
  const beyond =
    range === null
      ? []
      : [
          use.from < range.from ? bar('outside', use.from, Math.min(range.from, use.to), 3, 6) : null,
          use.to > range.to ? bar('outside', Math.max(range.to, use.from), use.to, 3, 6) : null,
        ];
  return el(
    'svg',
    { class: 'strip', width: WIDTH, height: 12, viewBox: `0 0 ${WIDTH} 12`, 'aria-hidden': 'true' },
    range === null ? null : bar('has', range.from, range.to, 0, 12),
    bar('visited', use.from, use.to, 3, 6),
    beyond,
  );
}
