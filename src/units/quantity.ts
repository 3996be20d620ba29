import { clip } from './clip.ts';
import { DIMENSIONS, type DimensionName, describeExponents, type Exponents, sameExponents } from './dimension.ts';
import { parseUnit, type UnitError } from './expression.ts';
import type { Unit } from './symbols.ts';

/** Why a text is not the quantity asked for. */
export interface QuantityError {
  readonly ok: false;
  readonly code: 'not-a-quantity' | 'not-finite' | 'missing-unit' | 'unknown-unit' | 'bad-unit' | 'wrong-dimension';
  /** 1-based, into the text given */
  readonly column: number;
  readonly expected: string;
  readonly found: string;
  /** the unit symbol that was probably meant */
  readonly nearest: string | null;
}

/** A number with its unit, in SI, whatever its dimension. */
export type AnyQuantity = { readonly ok: true; readonly value: number; readonly exponents: Exponents } | QuantityError;

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/;

/** Reads a quantity of one kind and returns it in SI.
 *
 *  @param text  a number and a unit: `6 mm`, `12 1/(cm Torr)`, `-20 °C`, `0.1 %`
 *  @param dimension  the kind of quantity that is wanted
 *  @returns the value in the coherent SI unit, or the 1-based column, what was expected and what was found. Never throws.
 *  @example parseQuantity('6 mm', 'length') // { ok: true, value: 0.006 } */
export function parseQuantity(text: string, dimension: DimensionName): { readonly ok: true; readonly value: number } | QuantityError {
  const result = parseAnyOf(text, [dimension]);
  return result.ok ? { ok: true, value: result.value } : result;
}

/** As `parseQuantity`, for a quantity that may be of one of several kinds: `dimension` in the result tells which. */
export function parseAnyOf<Name extends DimensionName>(
  text: string,
  dimensions: readonly Name[],
): { readonly ok: true; readonly value: number; readonly dimension: Name } | QuantityError {
  const expected = expectation(dimensions);
  const read = readQuantity(text, expected);
  if (!read.ok) return read;
  for (const name of dimensions)
    if (sameExponents(DIMENSIONS[name].exponents, read.exponents)) return { ok: true, value: read.value, dimension: name };
  const found = read.unitless ? `${clip(text.trim())} without a unit` : `${clip(text.trim())}, ${describeExponents(read.exponents)}`;
  const code = read.unitless ? 'missing-unit' : 'wrong-dimension';
  return { ok: false, code, column: read.unitIndex + 1, expected, found, nearest: null };
}

/** What a message says is wanted: `a voltage, e.g. 420 V`. */
export function expectation(dimensions: readonly DimensionName[]): string {
  return dimensions.map((name) => `${DIMENSIONS[name].name}, e.g. ${DIMENSIONS[name].example}`).join(', or ');
}

/** The factor from a unit to SI and its dimension, as for a column of a table; for `°C` use `parseQuantity` on each value. */
export function unitFactor(text: string): { readonly ok: true; readonly factor: number; readonly exponents: Exponents } | QuantityError {
  if (text.trim() === '%') return { ok: true, factor: 0.01, exponents: DIMENSIONS.number.exponents };
  const parsed = parseUnit(text);
  if (!parsed.ok) return unitError(parsed, 0, parsed.expected);
  return { ok: true, factor: toSi('1', parsed.unit), exponents: parsed.unit.exponents };
}

interface Read {
  readonly ok: true;
  readonly value: number;
  readonly exponents: Exponents;
  readonly unitless: boolean;
  /** 0-based; where the number starts if there is no unit */
  readonly unitIndex: number;
}

function readQuantity(text: string, expected: string): Read | QuantityError {
  const refuse = (code: QuantityError['code'], index: number, found: string, wanted = expected): QuantityError => ({
    ok: false,
    code,
    column: index + 1,
    expected: wanted,
    found,
    nearest: null,
  });
  const start = text.length - text.trimStart().length;
  const body = text.trimEnd();
  const number = NUMBER.exec(body.slice(start))?.[0];
  if (number === undefined) return refuse('not-a-quantity', start, body.length > start ? clip(body.slice(start)) : 'nothing');
  const afterNumber = start + number.length;
  const unitStart = afterNumber + (body.slice(afterNumber).length - body.slice(afterNumber).trimStart().length);
  const unitText = body.slice(unitStart);
  if (!Number.isFinite(Number(number))) return refuse('not-finite', start, `${clip(number)}, which is not finite`);
  if (/^[,_']\d/.test(unitText))
    return refuse('not-a-quantity', unitStart, clip(body.slice(start)), `${expected}, with a decimal point and no separators`);

  let unit: Unit = { scale: 1, decade: 0, exponents: DIMENSIONS.number.exponents };
  let offset = 0;
  if (unitText === '%') unit = { ...unit, decade: -2 };
  else if (unitText === '\u00b0C') {
    unit = { ...unit, exponents: DIMENSIONS.temperature.exponents };
    offset = 273.15;
  } else if (unitText !== '') {
    const parsed = parseUnit(unitText);
    if (!parsed.ok) {
      return unitError(parsed, unitStart, parsed.expected === 'a unit' ? expected : parsed.expected);
    }
    unit = parsed.unit;
  }
  const value = toSi(number, unit) + offset;
  const vanished = value === 0 && offset === 0 && Number(number) !== 0;
  if (!Number.isFinite(value) || vanished) return refuse('not-finite', start, `${clip(body.slice(start))}, which no double holds in SI`);
  return { ok: true, value, exponents: unit.exponents, unitless: unitText === '', unitIndex: unitText === '' ? start : unitStart };
}

function unitError(error: UnitError, start: number, expected: string): QuantityError {
  const code = error.found.startsWith('unknown unit') ? 'unknown-unit' : 'bad-unit';
  return { ok: false, code, column: start + error.index + 1, expected, found: error.found, nearest: error.nearest };
}

/** number × unit; whole decades go into the decimal exponent, so that 20 pF is the double nearest to 2e-11. */
function toSi(number: string, unit: Unit): number {
  const whole = Math.round(unit.decade);
  const rest = unit.decade - whole;
  const [mantissa, exponent = '0'] = number.toLowerCase().split('e');
  const shifted = Number(`${mantissa}e${Number(exponent) + whole}`);
  return shifted * unit.scale * (Math.abs(rest) < 1e-12 ? 1 : 10 ** rest);
}
