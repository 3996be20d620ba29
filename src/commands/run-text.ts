import type { Case } from '../case.ts';
import { type YieldEnd, type YieldSpread, yieldSpread } from '../onset/cautions/yield-ends.ts';
import type { Outcome, State, Stop } from '../onset/outcome.ts';
import type { Prospects } from '../theory/predict.ts';
import { printable } from '../units/printable.ts';
import { cautionLines, lastLines } from './cautions-text.ts';
import { yieldConsequences } from './check-spread.ts';
import { kineticSentence } from './kinetics-text.ts';
import { columns, lengthOf, wrap } from './layout.ts';
import { currentDensity, field, percent, quantity } from './quantities.ts';
import type { Terminal } from './terminal.ts';

export interface FileWritten {
  readonly path: string;
  readonly snapshots: number;
  readonly bytes: number;
}

export interface RunAnswer {
  readonly settings: Case;
  readonly outcome: Outcome;
  /** at which theory was evaluated [V], with its sign */
  readonly voltage: number;
  readonly prospects: Prospects;
  /** null when no file was asked for */
  readonly written: FileWritten | null;
  /** what the case asks for and a run does not do, one sentence each */
  readonly unused: readonly string[];
}

type Row = readonly [label: string, theory: string, simulated: string];

const LABELS = 26;
const THEORY = 21;

/** What `run` prints for people: the verdict, theory beside simulation, cautions, where the result went. */
export function runText(answer: RunAnswer, terminal: Terminal): string {
  const { settings, outcome, voltage, written, unused } = answer;
  const { style, width } = terminal;
  const table = (rows: readonly Row[]): string[] =>
    columns(
      rows.map(([label, ...cells]) => [`  ${label}`, ...cells]),
      [LABELS, THEORY],
      width,
    );
  const levels = outcome.currents.map(({ level_A, time_s, gap_voltage_V }): Row => {
    const when = time_s === null ? 'not reached' : `at ${quantity(time_s, 's')}, gap voltage ${quantity(gap_voltage_V, 'V')}`;
    return [`first ${quantity(level_A, 'A')}`, '', when];
  });
  const lines = [
    ...verdictLines(answer, terminal),
    '',
    ...wrap(printable(settings.title), width).map(style.faint),
    ...columns([['', `theory at ${quantity(voltage, 'V')}`, 'simulated']], [LABELS, THEORY], width).map(style.strong),
    ...table([...onsetRows(answer), ...endRows(answer), ...levels]),
    ...(outcome.kinetics === undefined ? [] : wrap(kineticSentence(outcome.kinetics), width, '  ')),
    ...wrap(numericsText(outcome), width, '  ').map(style.faint),
  ];
  const cautions = cautionLines(outcome.cautions, terminal);
  if (cautions.length > 0) lines.push('', style.strong('Cautions'), ...cautions);
  const where = written === null ? 'Nothing was written; -o FILE.h5 keeps the result.' : writtenText(written);
  return `${[...lines, '', ...[...unused, where].flatMap((line) => wrap(line, width)), ...lastLines(terminal)].join('\n')}\n`;
}

const STATES: Readonly<Record<State, string>> = { holds: 'Holds', 'breaks-down': 'Breaks down', undecided: 'Undecided' };

/** The word that counts stands out; "holds" is no colour of safety, because it is no clearance. Where the yield decides, the first sentence says that the verdict is that of the typical
 *  one, and a second one what the ends make of it. */
function verdictLines({ settings, outcome, voltage }: RunAnswer, { style, width }: Terminal): string[] {
  const { state, regime, reason } = outcome.verdict;
  const spread = yieldSpread(settings, voltage);
  const typical = spread?.decides ? ' with the typical ion yield' : '';
  const word = `${STATES[state]}${state === 'breaks-down' ? ` (${regime})` : ''}${typical}:`;
  const paint = { holds: style.strong, 'breaks-down': style.alarm, undecided: style.doubt }[state];
  const [first, ...rest] = wrap(printable(reason), width, `${word} `, '');
  // the word holds no part that wrapping could have broken
  const lines = [paint(word) + [...first].slice(lengthOf(word)).join(''), ...rest];
  return spread?.decides ? [...lines, ...wrap(whatYieldDecides(spread, voltage), width).map(style.doubt)] : lines;
}

function whatYieldDecides({ low, high, byLaw }: YieldSpread, voltage: number): string {
  const known = byLaw ? `the law of the ion yield times ${quantity(high.given, '')}` : `an ion yield of ${quantity(high.given, '')}`;
  const at = byLaw ? `times ${quantity(low.given, '')}` : `with ${quantity(low.given, '')}`;
  const never = low.breakdown === null ? 'nowhere' : `at ${quantity(low.breakdown, 'V')}`;
  return `The yield decides: with ${known} the gap breaks down at ${quantity(high.breakdown, 'V')}, ${at} ${never}; the ${quantity(Math.abs(voltage), 'V')} lie between (closed form, not simulated).`;
}

function onsetRows({ settings, outcome, voltage, prospects }: RunAnswer): Row[] {
  const { theory, onset } = outcome;
  const { threshold_time_s: threshold, space_charge_time_s: spaceCharge } = onset;
  const rows: Row[] = [
    [
      'threshold V_s',
      quantity(theory.static_breakdown_voltage_V, 'V'),
      threshold === null ? 'not passed' : `passed at ${quantity(threshold, 's')}`,
    ],
  ];
  const spread = yieldConsequences(settings, voltage);
  if (spread !== null) {
    const at = ({ breakdown }: YieldEnd): string => (breakdown === null ? 'none' : quantity(breakdown, 'V'));
    rows.push(['  over the ion yields', `${at(spread.high)} to ${at(spread.low)}`, '']);
  }
  if (theory.overvoltage !== null) rows.push(['overvoltage', percent(theory.overvoltage, true), '']);
  rows.push(['growth rate', quantity(theory.growth_rate_per_s, '1/s'), quantity(onset.growth_rate_per_s, '1/s')]);
  if (spaceCharge !== null) {
    const sinceThreshold =
      threshold === null ? `at ${quantity(spaceCharge, 's')}` : `${quantity(spaceCharge - threshold, 's')} after the threshold`;
    const isSudden = sudden(settings, threshold, spaceCharge);
    rows.push(['space charge', isSudden ? quantity(prospects.timeToSpaceCharge, 's') : '', sinceThreshold]);
    if (isSudden && spread !== null) {
      const time = (seconds: number | null): string => (seconds === null ? 'never' : quantity(seconds, 's'));
      rows.push(['  over the ion yields', `${time(spread.timeAtHigh)} to ${time(spread.timeAtLow)}`, '']);
    }
  }
  if (onset.formative_lag_s !== null) {
    const end = onset.lag_ends_at === 'collapse' ? 'the collapse' : 'space charge';
    rows.push(
      ['formative lag', '', `${quantity(onset.formative_lag_s, 's')}, to ${end}`],
      ['gap voltage there', '', quantity(onset.gap_voltage_V, 'V')],
    );
  }
  return rows;
}

/** Whether the gap passed its threshold so early that the closed form for a sudden step applies. */
function sudden({ supply }: Case, threshold: number | null, spaceCharge: number): boolean {
  return supply.programme.kind === 'step' && threshold !== null && threshold < 0.05 * (spaceCharge - threshold);
}

const STOPS: Readonly<Record<Stop, string>> = {
  until: 'observed to the end',
  steady: 'steady',
  'died-out': 'died out',
  'tripped-out': 'tripped and died out',
  'model-limit': 'the model ends here',
  interrupted: 'interrupted',
  failed: 'could not go on',
};

function endRows({ settings, outcome, prospects }: RunAnswer): Row[] {
  const { peak, final, energy, oscillation, theory, verdict } = outcome;
  // of use only beside a glow that burns
  const fall = verdict.regime === 'dark' || !verdict.self_sustaining ? null : prospects.normalCathodeFall;
  const dark = theory.steady_amplification !== null ? quantity(theory.steady_amplification * settings.seed.cathodeCurrent, 'A') : '';
  const density = Math.abs(final.current_A) / settings.gap.area;
  const rows: Row[] = [
    ['peak current', '', `${quantity(peak.current_A, 'A')} at ${quantity(peak.time_s, 's')}, ${quantity(peak.gap_voltage_V, 'V')}`],
    ['end', '', `${quantity(final.time_s, 's')}: ${STOPS[final.stop]}`],
    ['  gap voltage', '', quantity(final.gap_voltage_V, 'V')],
    ['  current', dark, quantity(final.current_A, 'A')],
    ['  current density', fall === null ? '' : `normal ${currentDensity(fall.currentDensity)}`, currentDensity(density)],
    ['  field at the cathode', fall === null ? '' : `normal ${field(fall.cathodeField)}`, field(final.cathode_field_V_per_m)],
  ];
  if (fall !== null || final.cathode_layer_m !== null)
    rows.push(['  cathode layer', fall === null ? '' : `normal ${quantity(fall.thickness, 'm')}`, quantity(final.cathode_layer_m, 'm')]);
  if (oscillation !== null)
    rows.push(['  oscillates', '', `every ${quantity(oscillation.period_s, 's')}, by ${quantity(oscillation.amplitude_V, 'V')}`]);
  rows.push(['energy into the gap', '', quantity(energy.gap_J, 'J')], ['energy from the supply', '', quantity(energy.source_J, 'J')]);
  if (energy.after_trip_J !== null) rows.push(['energy after the trip', '', quantity(energy.after_trip_J, 'J')]);
  return rows;
}

function numericsText({ numerics }: Outcome): string {
  const { cells, tolerance, steps, rejected, wall_s } = numerics;
  return `${cells} cells, tolerance ${quantity(tolerance, '')}, ${steps} steps (${rejected} rejected), computed in ${quantity(wall_s, 's')}.`;
}

function writtenText({ path, snapshots, bytes }: FileWritten): string {
  const size = bytes < 1e6 ? `${Math.ceil(bytes / 1e3)} kB` : `${(bytes / 1e6).toFixed(1)} MB`;
  return `Written: ${printable(path)} (${snapshots} snapshot${snapshots === 1 ? '' : 's'}, ${size}).`;
}
