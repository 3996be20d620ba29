import type { Exponents } from './dimension.ts';

/** A unit as scale × 10^decade times base units: keeping the decimal part apart makes 5 mm and 0.5 cm the same double. */
export interface Unit {
  readonly scale: number;
  readonly decade: number;
  readonly exponents: Exponents;
}

interface Symbol_ extends Unit {
  readonly takesPrefix: boolean;
}

const si = (decade: number, ...exponents: Exponents): Symbol_ => ({ scale: 1, decade, exponents, takesPrefix: true });
const scaled = (takesPrefix: boolean, scale: number, decade: number, ...exponents: Exponents): Symbol_ => ({
  scale,
  decade,
  exponents,
  takesPrefix,
});

/** Symbols by name. SI units: SI Brochure, 9th edition, 2019, tables 2 to 4. Non-SI units: value beside each. */
const SYMBOLS: ReadonlyMap<string, Symbol_> = new Map(
  Object.entries({
    m: si(0, 1, 0, 0, 0, 0, 0),
    g: si(-3, 0, 1, 0, 0, 0, 0),
    s: si(0, 0, 0, 1, 0, 0, 0),
    A: si(0, 0, 0, 0, 1, 0, 0),
    K: si(0, 0, 0, 0, 0, 1, 0),
    mol: si(0, 0, 0, 0, 0, 0, 1),
    Hz: si(0, 0, 0, -1, 0, 0, 0),
    N: si(0, 1, 1, -2, 0, 0, 0),
    Pa: si(0, -1, 1, -2, 0, 0, 0),
    J: si(0, 2, 1, -2, 0, 0, 0),
    W: si(0, 2, 1, -3, 0, 0, 0),
    C: si(0, 0, 0, 1, 1, 0, 0),
    V: si(0, 2, 1, -3, -1, 0, 0),
    F: si(0, -2, -1, 4, 2, 0, 0),
    ohm: si(0, 2, 1, -3, -2, 0, 0),
    '\u03a9': si(0, 2, 1, -3, -2, 0, 0), // Ω, Greek capital omega
    '\u2126': si(0, 2, 1, -3, -2, 0, 0), // Ω, the ohm sign
    S: si(0, -2, -1, 3, 2, 0, 0),
    Wb: si(0, 2, 1, -2, -1, 0, 0),
    T: si(0, 0, 1, -2, -1, 0, 0),
    H: si(0, 2, 1, -2, -2, 0, 0),
    // exact by definition
    L: si(-3, 3, 0, 0, 0, 0, 0),
    bar: si(5, -1, 1, -2, 0, 0, 0),
    Td: si(-21, 4, 1, -3, -1, 0, 0), // 1e-17 V cm²
    eV: scaled(true, 1.602176634, -19, 2, 1, -2, 0, 0, 0), // SI Brochure 2019
    Torr: scaled(true, 101325 / 760, 0, -1, 1, -2, 0, 0, 0),
    atm: scaled(false, 101325, 0, -1, 1, -2, 0, 0, 0),
    min: scaled(false, 60, 0, 0, 0, 1, 0, 0, 0),
    h: scaled(false, 3600, 0, 0, 0, 1, 0, 0, 0),
    day: scaled(false, 86400, 0, 0, 0, 1, 0, 0, 0),
    inch: scaled(false, 254, -4, 1, 0, 0, 0, 0, 0), // 25.4 mm
    ft: scaled(false, 3048, -4, 1, 0, 0, 0, 0, 0), // 0.3048 m
    u: scaled(false, 1.6605390666, -27, 0, 1, 0, 0, 0, 0), // CODATA 2018, 1.66053906660(50)e-27 kg
  }),
);

const PREFIXES: ReadonlyMap<string, number> = new Map([
  ['f', -15],
  ['p', -12],
  ['n', -9],
  ['\u00b5', -6], // micro sign
  ['\u03bc', -6], // Greek mu
  ['u', -6],
  ['m', -3],
  ['c', -2],
  ['d', -1],
  ['h', 2],
  ['k', 3],
  ['M', 6],
  ['G', 9],
  ['T', 12],
]);

/** The unit of a symbol, or null. The whole symbol wins over prefix + symbol (min, ft, h, Td, Torr, T). */
export function lookUpSymbol(symbol: string): Unit | null {
  const whole = SYMBOLS.get(symbol);
  if (whole) return whole;
  const prefix = PREFIXES.get(symbol.slice(0, 1));
  const rest = SYMBOLS.get(symbol.slice(1));
  if (prefix === undefined || !rest?.takesPrefix) return null;
  return { scale: rest.scale, decade: rest.decade + prefix, exponents: rest.exponents };
}

/** Every symbol that is accepted, for the nearest spelling of an unknown one. */
export function allSymbols(): string[] {
  const symbols: string[] = [];
  for (const [name, unit] of SYMBOLS) {
    symbols.push(name);
    if (unit.takesPrefix) for (const prefix of PREFIXES.keys()) if (!SYMBOLS.has(prefix + name)) symbols.push(prefix + name);
  }
  return symbols;
}
