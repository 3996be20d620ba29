import type { HistoryEntry, WindowOfYield, WindowOutcome } from '../search/window/index.ts';
import { printable } from '../units/printable.ts';
import { cautionLines, lastLines } from './cautions-text.ts';
import { clock } from './clock.ts';
import { columns, lengthOf, NO_BREAK, wrap } from './layout.ts';
import { pressure, quantity } from './quantities.ts';
import type { Terminal } from './terminal.ts';

/** Where a window's result went. */
export interface WindowWritten {
  readonly path: string;
  readonly bytes: number;
  /** simulated just now; 0: the result was there */
  readonly computed: number;
  readonly csv: string | null;
}

type State = HistoryEntry['state'];
type Stretch = WindowOfYield['windows'][number];

const LABELS = 28;
/** columns of the windows: time, state, hold-off voltage, lag */
const WINDOWS = [28, 16, 18];
/** columns of the history: time, pressure, supply, hold-off, state */
const HISTORY = [14, 14, 14, 14];
const MOST_ROWS = 14;
const MOST_WINDOWS = 12;

/** What `window` prints for people: the verdict, when turn-on holds, the windows, what the yields change, a table of the history, cautions, where the
 *  result went. */
export function windowText(outcome: WindowOutcome, written: WindowWritten, terminal: Terminal): string {
  const { style, width } = terminal;
  const lines = [
    ...verdictLines(outcome, terminal),
    ...wrap(turnOnText(outcome), width),
    '',
    ...wrap(printable(outcome.title), width).map(style.faint),
    ...windowLines(outcome, terminal),
    ...factLines(outcome, width),
    '',
    ...historyLines(outcome, terminal),
    ...outcome.notes.flatMap((note) => wrap(printable(note), width, '  ').map(style.faint)),
    ...wrap(LIT, width, '  ').map(style.faint),
  ];
  const cautions = cautionLines(outcome.cautions, terminal);
  if (cautions.length > 0) lines.push('', style.strong('Cautions'), ...cautions);
  lines.push('', ...wrap(writtenText(written), width));
  if (written.csv !== null) lines.push(...wrap(`Table: ${printable(written.csv)}.`, width));
  return `${[...lines, ...lastLines(terminal)].join('\n')}\n`;
}

const LIT = 'Windows say when a dark gap breaks down. A discharge that burns may go on burning after its window has closed.';

const WORDS: Readonly<Record<State, string>> = {
  holds: 'holds',
  marginal: 'marginal',
  'breaks-down': 'breaks down',
  'outside-model': 'outside model',
};

/** The sentences that count. If the verdict changes within the spread of the yields, the first one says so. */
function verdictLines(outcome: WindowOutcome, { style, width }: Terminal): string[] {
  const { word, text } = verdictOf(outcome);
  const spread = spreadText(outcome);
  const paint = word === 'Breaks down' ? style.alarm : word === 'Holds' ? style.strong : style.doubt;
  const opening = `${word}${spread === null ? '' : ' at the typical yield'}:`;
  const [first, ...rest] = wrap(text, width, `${opening} `, '');
  // the opening holds no part that wrapping could have broken
  const verdict = [paint(opening) + [...first].slice(lengthOf(opening)).join(''), ...rest];
  return spread === null ? verdict : [...wrap(spread, width).map(style.doubt), ...verdict];
}

export function verdictOf(outcome: WindowOutcome): { readonly word: string; readonly text: string } {
  const { windows, margin, duration_s } = outcome;
  const of = (state: State): Stretch[] => windows.filter((w) => w.state === state && !w.below_paschen_minimum);
  const supply = supplyText(outcome);
  const at = (stretches: readonly Stretch[]): string => stretchesText(stretches, duration_s);
  const broken = of('breaks-down');
  if (broken.length > 0) return { word: 'Breaks down', text: `${supply} the gap breaks down ${at(broken)}.` };
  const beyond = of('outside-model');
  const marginal = of('marginal');
  const little = marginal.length > 0 ? ` Without the margin of ${margin}, or not at every yield, it holds ${at(marginal)}.` : '';
  if (beyond.length > 0)
    return {
      word: 'Undecided',
      text: `${supply} no breakdown is found, but ${at(beyond)} nothing can be said: outside the model.${little}`,
    };
  if (marginal.length > 0)
    return {
      word: 'Marginal',
      text: `${supply} the gap holds throughout, but not with the margin of ${margin}, or not at every yield, ${at(marginal)}.`,
    };
  return { word: 'Holds', text: `${supply} the gap holds with the margin of ${margin} throughout, ${clock(duration_s)}.` };
}

function supplyText({ history }: WindowOutcome): string {
  const magnitudes = history.map(({ supply_V }) => supply_V);
  const [low, high] = [Math.min(...magnitudes), Math.max(...magnitudes)];
  return low === high ? `at ${quantity(high, 'V')}` : `at ${quantity(low, 'V')} to ${quantity(high, 'V')} in time`;
}

/** The verdict at either end of the yields, if it is not the same everywhere. */
export function spreadText(outcome: WindowOutcome): string | null {
  const { yield_spread: spread, duration_s } = outcome;
  if (spread === null) return null;
  const broken = ({ windows }: WindowOfYield): Stretch[] => windows.filter(({ state }) => state === 'breaks-down');
  const answers = [spread.low, outcome, spread.high].map((each) => broken(each).length > 0);
  if (answers.every((each) => each === answers[0])) return null;
  const say = (each: WindowOfYield): string =>
    broken(each).length > 0 ? `it breaks down ${stretchesText(broken(each), duration_s)}` : 'it does not break down';
  const { low, high } = spread;
  return `Depends on the ion yield, known only between ${low.ion_yield} and ${high.ion_yield}: at ${high.ion_yield} ${say(high)}, at ${low.ion_yield} ${say(low)}.`;
}

export function turnOnText({ earliest_turn_on_s: earliest, latest_turn_on_s: latest, margin }: WindowOutcome): string {
  const start = `Turn-on holds with the margin of ${margin}`;
  if (earliest === 0) return `${start} at any time.`;
  const from = earliest === null ? null : `from ${clock(earliest, 'up')} on`;
  const until = latest === null ? null : `until ${clock(latest, 'down')}, if switched off by then`;
  if (from !== null) return until === null ? `${start} ${from}, not from the start.` : `${start} ${from}, and from the start ${until}.`;
  return until === null
    ? `Turn-on holds with the margin of ${margin} neither from the start nor from any later time to the end.`
    : `${start} from the start ${until}; from no later time does it hold to the end.`;
}

function stretchesText(stretches: readonly Stretch[], duration: number): string {
  const shown = stretches.slice(0, 3).map((stretch) => stretchText(stretch, duration));
  if (stretches.length > shown.length) shown.push(`${stretches.length - shown.length} more times`);
  return shown.length === 1 ? shown[0] : `${shown.slice(0, -1).join(', ')} and ${shown[shown.length - 1]}`;
}

function stretchText({ from_s, to_s }: Stretch, duration: number): string {
  const [from, to] = [clock(from_s, 'down'), clock(to_s, 'up')];
  if (from_s === 0 && to_s === duration) return 'throughout';
  if (from_s === 0) return `from the start to ${to}`;
  return to_s === duration ? `from ${from} to the end` : `from ${from} to ${to}`;
}

function windowLines({ windows }: WindowOutcome, { style, width }: Terminal): string[] {
  if (windows.length === 0) return [];
  const rows = windows.slice(0, MOST_WINDOWS).map((w) => {
    const word = w.below_paschen_minimum ? 'below minimum' : WORDS[w.state];
    const times = `${clock(w.from_s, 'down')} to ${clock(w.to_s, 'up')}`.replaceAll(' ', NO_BREAK);
    return [`  ${times}`, word, quantity(w.lowest_hold_off_V, 'V'), quantity(w.shortest_lag_s, 's')];
  });
  const more = windows.length - rows.length;
  return [
    ...columns([['Windows', '', 'lowest hold-off', 'shortest lag']], WINDOWS, width).map(style.strong),
    ...columns(rows, WINDOWS, width),
    ...(more > 0 ? [`  … and ${more} more`] : []),
  ];
}

function factLines(outcome: WindowOutcome, width: number): string[] {
  const { duration_s, lowest_hold_off: lowest, worst, yield_spread: spread } = outcome;
  const rows: (readonly [string, string])[] = [
    ['earliest turn-on', earliestText(outcome, 'none that holds to the end')],
    ['latest turn-on', latestText(outcome, 'none: it does not hold from the start')],
    [
      'lowest hold-off voltage',
      lowest === null
        ? 'none inside the model'
        : `${quantity(lowest.voltage_V, 'V')} at ${clock(lowest.time_s)}, ${pressure(lowest.pressure_Pa)}`,
    ],
  ];
  if (worst !== null) {
    const lag = worst.lag_s === null ? '' : `, breaks down in ${quantity(worst.lag_s, 's')}`;
    const share = quantity(Math.abs(worst.supply_V) / worst.hold_off_V, '');
    rows.push(['worst instant', `${clock(worst.time_s)}: ${quantity(worst.supply_V, 'V')}, ${share} of the hold-off voltage${lag}`]);
  }
  const beyond = beyondText(outcome);
  if (beyond !== null) rows.push(['outside the model', beyond]);
  if (spread !== null) {
    for (const end of [spread.low, spread.high]) rows.push([`at an ion yield of ${end.ion_yield}`, endText(end, duration_s)]);
  }
  return columns(
    rows.map(([label, text]) => [`  ${label}`, text]),
    [LABELS],
    width,
  );
}

/** Why the model says nothing, in words; null where it always does. */
const BEYOND: Readonly<Record<string, string>> = {
  'no-threshold': 'no voltage up to 1e4 Td breaks down any path',
  'field-above-data': 'E/N at the breakdown voltage is above the data of ionisation',
  collisionless: 'electrons cross with few collisions',
};

function beyondText({ history }: WindowOutcome): string | null {
  const outside = history.filter(({ state }) => state === 'outside-model');
  if (outside.length === 0) return null;
  const words = outside.map(({ note }) =>
    note === null ? 'in dense gas the breakdown voltage is extrapolated' : (BEYOND[note] ?? 'no answer'),
  );
  return [...new Set(words)].join('; ');
}

function earliestText({ earliest_turn_on_s: seconds }: WindowOfYield, none: string): string {
  if (seconds === null) return none;
  return seconds === 0 ? 'from the start on' : clock(seconds, 'up');
}

function latestText({ earliest_turn_on_s: earliest, latest_turn_on_s: seconds }: WindowOfYield, none: string): string {
  if (seconds === null) return none;
  return earliest === 0 ? 'the end' : clock(seconds, 'down');
}

function endText(end: WindowOfYield, duration: number): string {
  const broken = end.windows.filter(({ state }) => state === 'breaks-down');
  const lowest = end.lowest_hold_off === null ? '' : `, holds ${quantity(end.lowest_hold_off.voltage_V, 'V')} at worst`;
  const what = broken.length > 0 ? `breaks down ${stretchesText(broken, duration)}` : 'no breakdown';
  return `${what}${lowest}; earliest turn-on ${earliestText(end, 'none')}, latest ${latestText(end, 'none')}`;
}

/** A table of the history: its ends, where the state changes, the lowest hold-off voltage, the worst instant, and some in between. */
function historyLines({ history, lowest_hold_off, worst }: WindowOutcome, { style, width }: Terminal): string[] {
  const last = history.length - 1;
  const at = (seconds: number | undefined): number[] => {
    const index = history.findIndex(({ time_s }) => time_s === seconds);
    return index < 0 ? [] : [index];
  };
  const changes = history.flatMap(({ state }, i) => (i > 0 && state !== history[i - 1].state ? [i] : []));
  const shown = new Set([0, last, ...at(lowest_hold_off?.time_s), ...at(worst?.time_s), ...changes].slice(0, MOST_ROWS));
  for (let parts = 2; shown.size < Math.min(MOST_ROWS, history.length); parts++)
    for (let k = 1; k < parts && shown.size < MOST_ROWS; k++) shown.add(Math.round((k * last) / parts));
  const rows = [...shown]
    .sort((a, b) => a - b)
    .map((i) => {
      const { time_s, pressure_Pa, supply_V, hold_off_V, state } = history[i];
      return [`  ${clock(time_s)}`, quantity(pressure_Pa, 'Pa'), quantity(supply_V, 'V'), quantity(hold_off_V, 'V'), WORDS[state]];
    });
  return [
    ...columns([['History', 'pressure', 'supply', 'hold-off', 'state']], HISTORY, width).map(style.strong),
    ...columns(rows, HISTORY, width),
  ];
}

function writtenText({ path, bytes, computed }: WindowWritten): string {
  const news = computed === 0 ? '; nothing was left to compute' : '';
  return `Written: ${printable(path)} (${Math.ceil(bytes / 1e3)} kB${news}).`;
}
