import type { Caution, CautionCode } from '../onset/outcome.ts';
import { type Element, el } from './element.ts';

/** Parts that pages of every kind share. */

/** A number stays on one line with the unit after it. */
export function together(text: string): string {
  return text.replace(/(\d) (?=(?:[fpnµmkMGT]?(?:V|A|s|J|W|Pa|ohm|m|Torr|bar|Td|K)|%|1\/)(?![A-Za-z]))/g, '$1\u00a0');
}

/** cautions about people and hardware; the others limit the model or its numbers */
const SAFETY: ReadonlySet<CautionCode> = new Set<CautionCode>([
  'not-a-clearance',
  'arc-risk',
  'longer-path',
  'few-electrons',
  'yield-spread',
  'seed-lowers-threshold',
  'insulator',
  'edges',
  'streamer',
  'field-emission',
]);

/** The cautions, safety first, under what always holds. */
export function cautionSection(cautions: readonly Caution[]): Element {
  const shown = cautions.filter(({ code }) => code !== 'not-a-clearance');
  const ordered = [...shown.filter(({ code }) => SAFETY.has(code)), ...shown.filter(({ code }) => !SAFETY.has(code))];
  return el(
    'section',
    { id: 'cautions' },
    el('h2', {}, 'Cautions'),
    el(
      'p',
      { class: 'clearance' },
      'Not a clearance. Stored charge and defeated interlocks can kill: discharge stored charge, keep interlocks, test at pressure. ',
      'A model’s “holds” permits nobody to approach or to certify; local codes and licensed practice decide.',
    ),
    el(
      'ul',
      { class: 'cautions' },
      ordered.map(({ code, text }) =>
        el('li', { class: SAFETY.has(code) ? 'safety' : null }, together(text), ' ', el('code', { class: 'faint' }, code)),
      ),
    ),
  );
}

/** Every value of the case, and the model that it was given to. */
export function assumptionSection(
  assumptions: readonly (readonly [label: string, value: string])[],
  remarks: readonly string[],
  also = '',
): Element {
  const rows = assumptions.map(([label, value]) => el('tr', {}, el('th', { scope: 'row' }, label), el('td', {}, value)));
  return el(
    'section',
    { id: 'assumptions' },
    el('h2', {}, 'What was assumed'),
    also === '' ? null : el('p', {}, also),
    rows.length === 0
      ? el('p', {}, 'This version of the program cannot resolve the case of this file; its text is below.')
      : el('table', { class: 'narrow' }, el('tbody', {}, rows)),
    remarks.length === 0
      ? null
      : el(
          'ul',
          {},
          remarks.map((note) => el('li', {}, note)),
        ),
    el(
      'p',
      {},
      'The model: one dimension between bare, parallel electrodes; electrons, positive ions and, in attaching gases, negative ions drift, diffuse and ',
      'multiply with coefficients of the local field; space charge and the supply act back through Gauss’s law and the circuit. Insulators, edges, ',
      'photons, metastables and the heating of the gas are outside it unless a row above says otherwise.',
    ),
  );
}

export interface TableFile {
  readonly file: string;
  readonly text: string;
}

/** Where the numbers come from and how to make them again. */
export function provenance({
  facts,
  caseText,
  tables,
  command,
  numbers,
}: {
  readonly facts: readonly (readonly [label: string, value: string])[];
  readonly caseText: string;
  readonly tables: readonly TableFile[];
  readonly command: string;
  readonly numbers: readonly (readonly [path: string, value: number | null])[];
}): Element {
  return el(
    'section',
    { id: 'provenance' },
    el('h2', {}, 'Provenance'),
    el(
      'table',
      {},
      el(
        'tbody',
        {},
        facts.map(([label, value]) => el('tr', {}, el('th', { scope: 'row' }, label), el('td', {}, value))),
      ),
    ),
    el('h3', {}, 'To make it again'),
    el(
      'p',
      {},
      `Save the case below as case.yaml${tables.length === 0 ? '' : ', and each table beside it under its name'}, then: `,
      el('code', {}, command),
      '. The same version gives the same numbers; the hash of the case says whether it is the same case.',
    ),
    el('details', { open: true }, el('summary', {}, 'The case'), el('pre', { tabindex: 0, 'aria-label': 'The case' }, caseText)),
    ...tables.map(({ file, text }) =>
      el('details', {}, el('summary', {}, `Table ${file}`), el('pre', { tabindex: 0, 'aria-label': `Table ${file}` }, text)),
    ),
    ...(numbers.length === 0
      ? []
      : [
          el(
            'details',
            {},
            el('summary', {}, 'Every number of the outcome, SI'),
            el(
              'table',
              {},
              el(
                'tbody',
                {},
                numbers.map(([path, value]) =>
                  el(
                    'tr',
                    {},
                    el('th', { scope: 'row' }, el('code', {}, path)),
                    el('td', { 'data-outcome': path }, value === null ? 'null' : String(value)),
                  ),
                ),
              ),
            ),
          ),
        ]),
  );
}

export function footer(version: string): Element {
  return el(
    'footer',
    {},
    el('p', {}, `Page written by gapwake ${version}. It holds everything it shows and asks nothing of any network.`),
    el('p', {}, 'Not a clearance: discharge stored charge, keep interlocks, test at pressure; local codes and licensed practice decide.'),
  );
}
