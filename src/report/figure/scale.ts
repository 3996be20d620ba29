import { formatQuantity } from '../../units/index.ts';

/** A mark on an axis, at a share 0 … 1 of its length. */
export interface Tick {
  readonly at: number;
  /** empty: a mark only */
  readonly label: string;
}

/** Where a value lies on an axis, as a share 0 … 1 of its length from its low end; NaN for what it cannot show. */
export interface Scale {
  at(value: number): number;
  /** the value at a share */
  from(share: number): number;
  readonly ticks: readonly Tick[];
  /** name and unit, for beside the axis */
  readonly title: string;
}

/** How much room labels need: the length of the axis and the least distance of two labels [px]. */
export interface Room {
  readonly length: number;
  readonly apart: number;
}

/** Units that scale as a whole: the prefix stands in the title, not at every tick. */
const STEPS: readonly (readonly [prefix: string, factor: number])[] = [
  ['f', 1e-15],
  ['p', 1e-12],
  ['n', 1e-9],
  ['µ', 1e-6],
  ['m', 1e-3],
  ['', 1],
  ['k', 1e3],
  ['M', 1e6],
  ['G', 1e9],
];
const WITH_PREFIX = new Set(['V', 'A', 'J', 's', 'm', 'V/cm', 'Pa', 'Td', 'ohm', 'F']);
/** nobody writes kilo- or megaseconds, or megametres */
const LARGEST: Readonly<Record<string, number>> = { s: 1, m: 1e3, Td: 1 };

/** The prefix under which numbers up to `size` read well. */
export function prefixFor(size: number, unit: string): { readonly prefix: string; readonly factor: number } {
  if (!WITH_PREFIX.has(unit) || !(size > 0)) return { prefix: '', factor: 1 };
  const largest = LARGEST[unit] ?? 1e9;
  const smallest = unit === 'Td' ? 1 : 1e-15;
  const fitting = STEPS.filter(([, f]) => f <= largest && f >= smallest && f <= size * 1.0001);
  const [prefix, factor] = fitting[fitting.length - 1] ?? STEPS[0];
  return { prefix, factor };
}

/** Least range of an axis, as a share of the numbers on it. */
const NARROWEST = 1e-9;

/** An even axis over a range widened to round numbers. */
export function linear(name: string, unit: string, from: number, to: number, room: Room, widen = true): Scale {
  const size = Math.max(Math.abs(from), Math.abs(to));
  // a range next to nothing beside its own place is drawn as a billionth of that: numbers closer than that cannot be told apart
  const span = to > from ? Math.max(to - from, NARROWEST * size) : Math.max(size, 1e-300);
  const step = roundStep(span, Math.max(2, Math.floor(room.length / room.apart)));
  const low = widen ? Math.floor(from / step + 1e-9) * step : from;
  const high = widen ? Math.ceil((from + span) / step - 1e-9) * step : from + span;
  const { prefix, factor } = prefixFor(Math.max(Math.abs(low), Math.abs(high)), unit);
  const ticks: Tick[] = [];
  for (let k = Math.ceil(low / step - 1e-9); k * step <= high + 1e-9 * step; k++)
    ticks.push({ at: (k * step - low) / (high - low), label: plain((k * step) / factor) });
  return {
    at: (value) => (value - low) / (high - low),
    from: (share) => low + share * (high - low),
    ticks,
    title: withUnit(name, `${prefix}${unit}`),
  };
}

/** A logarithmic axis with decades labelled. @param engineering  labels as `1 nA` instead of `10⁻⁹` */
export function logarithmic(
  name: string,
  unit: string,
  from: number,
  to: number,
  room: Room,
  engineering: boolean = WITH_PREFIX.has(unit),
): Scale {
  const [low, high] = [Math.log10(from), Math.log10(Math.max(to, from * 1.0001))];
  const at = (value: number): number => (Math.log10(value) - low) / (high - low);
  return {
    at: (value) => (value > 0 ? at(value) : Number.NaN),
    from: (share) => 10 ** (low + share * (high - low)),
    ticks: decades(low, high, room).map(({ value, labelled }) => ({
      at: at(value),
      label: !labelled ? '' : engineering ? engineeringLabel(value, unit) : powerLabel(value),
    })),
    title: withUnit(name, unit),
  };
}

function decades(low: number, high: number, { length, apart }: Room): { value: number; labelled: boolean }[] {
  const perDecade = length / (high - low);
  const marks: { value: number; labelled: boolean }[] = [];
  const first = Math.floor(low);
  const last = Math.ceil(high);
  const every = [1, 2, 3, 6, 12, 24].find((k) => k * perDecade >= apart) ?? 48;
  const within = (value: number): boolean => Math.log10(value) >= low - 1e-9 && Math.log10(value) <= high + 1e-9;
  // fewer than two decades fit: their parts are labelled too
  const digits = high - low < 1 ? [1, 2, 3, 4, 5, 6, 7, 8, 9] : high - low < 2.2 ? [1, 2, 5] : [1];
  let lastLabel = Number.NEGATIVE_INFINITY;
  for (let k = first; k <= last; k++) {
    for (let digit = 1; digit <= 9; digit++) {
      const value = Number(`${digit}e${k}`);
      if (!within(value)) continue;
      const position = (Math.log10(value) - low) * perDecade;
      const wanted = digits.includes(digit) && (digit > 1 || k % every === 0) && position - lastLabel >= apart;
      if (digit > 1 && !wanted && perDecade < 40) continue;
      if (wanted) lastLabel = position;
      marks.push({ value, labelled: wanted });
    }
  }
  return marks;
}

/** Steps of 1, 2 or 5 times a power of ten, at most `count` of them over `span`. */
function roundStep(span: number, count: number): number {
  const raw = span / count;
  const power = 10 ** Math.floor(Math.log10(raw));
  return ([1, 2, 5, 10].find((m) => m * power >= raw * 0.9999) ?? 10) * power;
}

function plain(value: number): string {
  const rounded = Number(value.toPrecision(6));
  return String(Object.is(rounded, -0) ? 0 : rounded).replace('-', '−');
}

export function engineeringLabel(value: number, unit: string): string {
  return formatQuantity(value, unit.replace('/cm', ''), 3).replace(/$/, unit.endsWith('/cm') ? '/cm' : '');
}

const RAISED = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** 3e-9 → 3·10⁻⁹, 1e5 → 10⁵, 10 → 10 */
export function powerLabel(value: number): string {
  const exponent = Math.floor(Math.log10(value) + 1e-9);
  const digit = Math.round(value / 10 ** exponent);
  if (exponent >= -2 && exponent <= 2) return String(Number((digit * 10 ** exponent).toPrecision(3)));
  const raised = [...String(exponent)].map((c) => (c === '-' ? '⁻' : RAISED[Number(c)])).join('');
  return `${digit === 1 ? '' : `${digit}·`}10${raised}`;
}

function withUnit(name: string, unit: string): string {
  return unit === '' || unit === '1' ? name : `${name} [${unit}]`;
}
