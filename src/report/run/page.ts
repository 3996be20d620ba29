import type { State } from '../../onset/outcome.ts';
import { html } from '../document.ts';
import { type Element, el } from '../element.ts';
import { linkedSection } from '../linked-section.ts';
import { packEven, packExact, packLog } from '../pack.ts';
import type { Packed } from '../packed.ts';
import { assumptionSection, cautionSection, footer, provenance, type TableFile, together } from '../sections.ts';
import { coefficientSection } from './coefficient-section.ts';
import { FIELDS, type RunEvent, type RunField, type RunScalar, type RunSetting, SCALARS } from './data.ts';
import { eventsOf } from './events.ts';
import { allNumbers, type Cell, keyRows } from './key-numbers.ts';
import type { RunReport } from './report.ts';
import { TIME_AXES } from './time-axis.ts';

/** What the page's script reads. */
export interface RunPageData {
  readonly kind: 'run';
  readonly time: Packed;
  readonly x: Packed;
  readonly scalars: Readonly<Record<RunScalar, Packed>>;
  readonly fields: Readonly<Partial<Record<RunField, Packed>>>;
  readonly setting: RunSetting;
  readonly events: readonly RunEvent[];
}

/** decades of densities below their largest value that the page keeps */
const DECADES = 18;

/** The page of a run. @param script  the bundled script of run pages */
export function runPage(run: RunReport, script: string): string {
  return html({
    title: `${run.title} – gapwake run`,
    body: [
      el('a', { class: 'skip', href: '#figures' }, 'Skip to the figures'),
      header(run),
      el(
        'main',
        {},
        summary(run),
        figures(run),
        assumptionSection(run.assumptions, run.remarks),
        coefficientSection(run.coefficients, run),
        evidence(run),
      ),
      footer(run.reportVersion),
    ],
    data: pageData(run),
    script,
  });
}

function pageData(run: RunReport): RunPageData {
  const { fields } = run;
  const columns = run.x.length;
  const packedFields = FIELDS.flatMap((key) => {
    const values = fields[key];
    if (values === null) return [];
    return [[key, key === 'electricField' ? packEven(values, columns) : packLog(values, columns, DECADES)] as const];
  });
  return {
    kind: 'run',
    time: packExact(run.time),
    x: packExact(run.x),
    scalars: Object.fromEntries(SCALARS.map((key) => [key, packExact(run.scalars[key])])) as Record<RunScalar, Packed>,
    fields: Object.fromEntries(packedFields),
    setting: settingOf(run),
    events: eventsOf(run),
  };
}

/** What the figures need of the case. */
export function settingOf({ settings, x }: RunReport): RunSetting {
  const supply = settings?.supply ?? null;
  return {
    // without the case: as much beyond the last cell as before the first
    spacing: settings?.gap.spacing ?? x[0] + x[x.length - 1],
    seriesResistance: supply?.seriesResistance ?? null,
    currentLimit: supply?.currentLimit ?? null,
    seedCurrent: settings?.seed.cathodeCurrent ?? null,
  };
}

const STATES: Readonly<Record<State, string>> = { holds: 'Holds', 'breaks-down': 'Breaks down', undecided: 'Undecided' };

function header(run: RunReport): Element {
  const { state, regime, reason } = run.outcome.verdict;
  return el(
    'header',
    {},
    el('p', { class: 'kind' }, `One gap, energised once: ${run.fileName}`),
    el('h1', {}, run.title),
    el(
      'p',
      { class: `verdict ${state}` },
      el('strong', {}, `${STATES[state]}${state === 'breaks-down' ? ` (${regime})` : ''}.`),
      ` ${together(reason)}`,
    ),
  );
}

function summary(run: RunReport): Element {
  return el('div', { class: 'pair' }, el('section', {}, el('h2', {}, 'Key numbers'), keyTable(run)), cautionSection(run.outcome.cautions));
}

function keyTable(run: RunReport): Element {
  const rows = keyRows(run).map(({ label, theory, simulated }) =>
    el(
      'tr',
      {},
      el('th', { scope: 'row' }, label),
      el('td', { 'data-label': 'theory' }, cellOf(theory)),
      el('td', { 'data-label': 'simulated' }, cellOf(simulated)),
    ),
  );
  return el(
    'table',
    { class: 'stack' },
    el(
      'thead',
      {},
      el('tr', {}, el('td', {}, ''), el('th', { scope: 'col' }, 'Theory, no space charge'), el('th', { scope: 'col' }, 'Simulated')),
    ),
    el('tbody', {}, rows),
  );
}

function cellOf(cell: Cell): (Element | string)[] {
  return cell.map((part) =>
    typeof part === 'string'
      ? part
      : el('span', { class: 'number', 'data-path': part.path, 'data-value': part.value === null ? 'null' : String(part.value) }, part.text),
  );
}

/** Empty places that the script fills. */
function figures(run: RunReport): Element {
  return linkedSection({
    heading: 'What happened, moment by moment',
    shows: 'the profiles and the current–voltage path show',
    moments: run.time.length,
    axes: TIME_AXES,
  });
}

function evidence(run: RunReport): Element {
  const { outcome } = run;
  const { numerics } = outcome;
  const facts: [string, string][] = [
    ['Result file', `${run.fileName}, written by gapwake ${run.version}`],
    ['Case', `SHA-256 ${outcome.case_sha256}`],
    ['Snapshots', `${run.time.length} of ${numerics.steps} steps (${numerics.rejected} more rejected), at ${run.x.length} cells`],
    ['Tolerance', String(numerics.tolerance)],
    ['Linear solves', `${numerics.newton}, in ${numerics.wall_s.toPrecision(3)} s`],
    ['Charge balance', `held to ${numerics.charge_defect.toPrecision(2)} of the charge passed`],
    ['Worst undershoot of a density', `${numerics.worst_undershoot.toPrecision(2)} of its largest value`],
  ];
  return provenance({
    facts,
    caseText: run.caseText,
    tables: run.tables as readonly TableFile[],
    command: 'gapwake run case.yaml -o result.h5',
    numbers: allNumbers(outcome),
  });
}
