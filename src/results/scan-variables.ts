import type { CautionCode, Outcome, Regime, State, Stop } from '../onset/outcome.ts';
import type { Found } from '../search/found.ts';
import type { Find } from '../study.ts';

/** What a scan says of its points, in two forms: each point whole, and a table of headlines with one column per variable. The result file, the CSV and
 *  the reader all go by the lists here. */

/** One point of a scan, as `scan --json` prints it and the result file keeps it. SI. */
export interface ScanPoint {
  /** in the plan, from 0 */
  readonly index: number;
  /** SHA-256 of the point's full case, and of what is searched there: equal ids mean equal answers */
  readonly id: string;
  /** one for each axis */
  readonly values: readonly number[];
  /** the case itself, simulated; null where that failed */
  readonly outcome: Outcome | null;
  /** why the outcome or what was searched is missing; null where nothing failed */
  readonly error: PointError | null;
  /** null where nothing is searched or the search failed */
  readonly found: Found | null;
}

export interface PointError {
  readonly code: ErrorCode;
  /** one sentence */
  readonly text: string;
}

/** Why a point has no answer. */
export type ErrorCode =
  /** the simulation could not go on */
  | 'simulation-failed'
  /** these values make no valid case */
  | 'invalid-case'
  | 'out-of-memory'
  | 'worker-died'
  | 'internal-fault';

/** A headline: a column of the table. */
export type Headline = NumberHeadline | FlagHeadline | MaskHeadline;

interface NumberHeadline {
  readonly kind: 'number' | 'count';
  readonly name: string;
  /** UDUNITS spelling; `1` for pure numbers */
  readonly units: string;
  readonly longName: string;
  /** null: does not apply; stored as NaN, or -1 for a count */
  readonly of: (point: ScanPoint) => number | null;
}

interface FlagHeadline {
  readonly kind: 'flag';
  readonly name: string;
  readonly longName: string;
  /** the words that the numbers 0, 1, 2, … stand for */
  readonly meanings: readonly string[];
  readonly of: (point: ScanPoint) => string;
}

interface MaskHeadline {
  readonly kind: 'mask';
  readonly name: string;
  readonly longName: string;
  /** the words that the bits 1, 2, 4, … stand for; at most 31 */
  readonly meanings: readonly string[];
  readonly of: (point: ScanPoint) => readonly string[];
}

/** the word of a point without an answer */
const FAILED = 'failed';
const NONE = 'none';

const states = ['holds', 'breaks-down', 'undecided', FAILED] as const satisfies readonly (State | typeof FAILED)[];
const regimes = ['dark', 'glow', 'arc-risk', FAILED] as const satisfies readonly (Regime | typeof FAILED)[];
const stops = ['until', 'steady', 'died-out', 'tripped-out', 'model-limit', 'interrupted', 'failed'] as const satisfies readonly Stop[];
const lagEnds = [NONE, 'collapse', 'space-charge', FAILED] as const;
const errors = [NONE, 'simulation-failed', 'invalid-case', 'out-of-memory', 'worker-died', 'internal-fault'] as const satisfies readonly (
  | ErrorCode
  | typeof NONE
)[];
const foundStates = ['found', 'none-breaks-down', 'none-holds', 'undecided', FAILED] as const satisfies readonly (
  | Found['state']
  | typeof FAILED
)[];

/** bits of a file: a new code goes to the end */
const cautions = [
  'not-a-clearance',
  'outside-range',
  'left-of-minimum',
  'longer-path',
  'double-valued',
  'short-gap',
  'streamer',
  'field-emission',
  'collisionless',
  'arc-risk',
  'partly-covered',
  'few-electrons',
  'seed-lowers-threshold',
  'loaded-by-seed',
  'yield-spread',
  'timescales',
  'mixture',
  'insulator',
  'edges',
  'tolerance',
  'cathode-cells',
  'undershoot',
  'defaults',
] as const satisfies readonly CautionCode[];
/** does not compile when a code is missing above */
const everyCode: [CautionCode] extends [(typeof cautions)[number]] ? readonly string[] : never = cautions;

const number = (name: string, units: string, longName: string, of: (outcome: Outcome) => number | null): NumberHeadline => ({
  kind: 'number',
  name,
  units,
  longName,
  of: ({ outcome }) => (outcome === null ? null : of(outcome)),
});

const flag = (
  name: string,
  longName: string,
  meanings: readonly string[],
  of: (outcome: Outcome) => string,
  otherwise: string = FAILED,
): FlagHeadline => ({ kind: 'flag', name, longName, meanings, of: ({ outcome }) => (outcome === null ? otherwise : of(outcome)) });

const outcomeHeadlines: readonly Headline[] = [
  flag('verdict', 'verdict', states, (o) => o.verdict.state),
  flag('regime', 'regime of the discharge', regimes, (o) => o.verdict.regime),
  flag('self_sustaining', 'whether the discharge sustains itself at the end', ['no', 'yes', FAILED], (o) =>
    o.verdict.self_sustaining ? 'yes' : 'no',
  ),
  number('static_breakdown_voltage', 'V', 'static breakdown voltage V_s by theory', (o) => o.theory.static_breakdown_voltage_V),
  number('overvoltage', '1', 'overvoltage |V|/V_s - 1', (o) => o.theory.overvoltage),
  number('feedback', '1', 'feedback q at the largest open-gap voltage by theory', (o) => o.theory.feedback),
  number('threshold_time', 's', 'time at which the threshold is passed', (o) => o.onset.threshold_time_s),
  number('space_charge_time', 's', 'time at which space charge distorts the field', (o) => o.onset.space_charge_time_s),
  number('collapse_time', 's', 'time at which the gap voltage collapses', (o) => o.onset.collapse_time_s),
  number('formative_lag', 's', 'formative lag', (o) => o.onset.formative_lag_s),
  flag('lag_end', 'what ends the formative lag', lagEnds, (o) => o.onset.lag_ends_at ?? NONE),
  number('onset_gap_voltage', 'V', 'gap voltage at the end of the formative lag', (o) => o.onset.gap_voltage_V),
  number('growth_rate', 's-1', 'growth rate of the current in the simulation', (o) => o.onset.growth_rate_per_s),
  number('peak_current', 'A', 'peak conduction current', (o) => o.peak.current_A),
  number('peak_time', 's', 'time of the peak current', (o) => o.peak.time_s),
  number('final_time', 's', 'time at the end', (o) => o.final.time_s),
  number('final_gap_voltage', 'V', 'gap voltage at the end', (o) => o.final.gap_voltage_V),
  number('final_current', 'A', 'conduction current at the end', (o) => o.final.current_A),
  flag('stop', 'why the run ended', stops, (o) => o.final.stop),
  number('gap_energy', 'J', 'energy put into the gas gap', (o) => o.energy.gap_J),
  number('source_energy', 'J', 'energy delivered by the supply', (o) => o.energy.source_J),
  number('energy_after_trip', 'J', 'energy put into the gas gap after the trip', (o) => o.energy.after_trip_J),
];

const cautionsHeadline: Headline = {
  kind: 'mask',
  name: 'cautions',
  longName: 'cautions of the outcome; their texts are in the points',
  meanings: everyCode,
  of: ({ outcome }) => outcome?.cautions.map(({ code }) => code) ?? [],
};

const errorHeadline: Headline = {
  kind: 'flag',
  name: 'error',
  longName: 'why there is no answer; the text is in the points',
  meanings: errors,
  of: ({ error }) => error?.code ?? NONE,
};

/** unit of what is searched for, and what it is called */
const searched: Readonly<Record<Find['what'], readonly [units: string, longName: string]>> = {
  'hold-off': ['V', 'hold-off voltage: the largest |V| of the programme that holds'],
  'trip-delay': ['s', 'longest trip delay that keeps the energy in the gap below its limit'],
  'series-resistance': ['ohm', 'least series resistance above which no discharge sustains itself'],
};

function foundHeadlines(what: Find['what']): Headline[] {
  const [units, longName] = searched[what];
  const value = (name: string, text: string, of: (found: Found) => number | null): Headline => ({
    kind: 'number',
    name,
    units,
    longName: text,
    of: ({ found }) => (found === null ? null : of(found)),
  });
  return [
    {
      kind: 'flag',
      name: 'found_state',
      longName: 'how the search ended',
      meanings: foundStates,
      of: ({ found }) => found?.state ?? FAILED,
    },
    value('found_value', longName, (f) => f.value),
    value('found_lower', 'lower end of the last bracket', (f) => f.lower),
    value('found_upper', 'upper end of the last bracket', (f) => f.upper),
    value('found_theory', 'closed form beside what was found', (f) => f.theory),
    { kind: 'count', name: 'found_runs', units: '1', longName: 'simulations made by the search', of: ({ found }) => found?.runs ?? null },
    {
      kind: 'count',
      name: 'found_changes',
      units: '1',
      longName: 'changes of the answer over the searched range; more than 1: not monotone',
      of: ({ found }) => found?.changes.length ?? null,
    },
  ];
}

/** The columns of a scan. */
export function headlinesOf(what: Find['what'] | null): readonly Headline[] {
  return [...outcomeHeadlines, ...(what === null ? [] : foundHeadlines(what)), cautionsHeadline, errorHeadline];
}

/** Value of the global attribute `format` of a scan file. */
export const scanFormat = 'gapwake.scan/1';
/** dimension of a list of points, and the variable that gives their indices in the plan */
export const pointVariable = 'point';
/** group that holds every point whole, as lines of JSON in pages */
export const pointsGroup = 'points';

/** Texts of the file: together they reproduce the scan. */
export interface ScanTexts {
  /** the case as given, `--set` applied, YAML */
  readonly caseText: string;
  /** coefficients of the case before anything is varied, and their sources, JSON */
  readonly coefficientsJson: string;
  /** the CSV inputs, JSON */
  readonly tablesJson: string;
}

export const scanTexts: readonly { readonly key: keyof ScanTexts; readonly name: string; readonly longName: string }[] = [
  { key: 'caseText', name: 'case_text', longName: 'the case file' },
  { key: 'coefficientsJson', name: 'coefficients_json', longName: 'every coefficient of the unvaried case and its source, JSON' },
  { key: 'tablesJson', name: 'tables_json', longName: 'the tables the case reads, JSON' },
];

/** An axis as the file has it. */
export interface ScanAxis {
  /** of the entry in the case file */
  readonly path: string;
  readonly unit: string;
  /** of the variable in the file: the path in letters that every reader takes */
  readonly name: string;
}

/** text that says what is scanned. Not attributes: beyond eight the format stores them in a way that not every reader knows */
export const planVariable = 'plan_json';

export interface PlanText {
  /** hash of everything that decides the results */
  readonly study: string;
  readonly layout: 'grid' | 'list';
  /** points of the whole plan */
  readonly total: number;
  readonly shard: { readonly k: number; readonly n: number } | null;
  readonly find: Find['what'] | null;
  readonly axes: readonly ScanAxis[];
}

/** Names of the axes' variables: `gas.pressure` → `gas_pressure`; told apart from each other and from the headlines. */
export function axisNames(paths: readonly string[], what: Find['what'] | null): string[] {
  const taken = new Set([pointVariable, pointsGroup, planVariable, ...scanTexts.map(({ name }) => name)]);
  for (const { name } of headlinesOf(what)) taken.add(name);
  return paths.map((path) => {
    let name = path.replaceAll(/[^A-Za-z0-9_]/g, '_').replace(/^(?![A-Za-z])/, 'x');
    while (taken.has(name)) name += '_';
    taken.add(name);
    return name;
  });
}
