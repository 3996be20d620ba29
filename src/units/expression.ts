import { clip } from './clip.ts';
import type { Exponents } from './dimension.ts';
import { nearestSpelling } from './spelling.ts';
import { allSymbols, lookUpSymbol, type Unit } from './symbols.ts';

/** Where and why a text is no unit. */
export interface UnitError {
  readonly ok: false;
  /** 0-based, into the text given */
  readonly index: number;
  readonly expected: string;
  readonly found: string;
  readonly nearest: string | null;
}

export type UnitResult = { readonly ok: true; readonly unit: Unit } | UnitError;

/** Longer texts are no unit anybody writes; the limit also bounds the depth of parentheses. */
const MAX_LENGTH = 200;

class Refusal extends Error {
  readonly detail: UnitError;
  constructor(detail: UnitError) {
    super(detail.expected);
    this.detail = detail;
  }
}

/** Reads a unit: `V`, `cm^2 Torr/(V s)`, `1/(cm Torr)`, `(V/(cm Torr))^(1/2)`.
 *
 *  Space and `*` multiply; `/` divides the one factor after it, so `a/b c` is refused with both readings; powers are
 *  decimal (`^0.5`), whole (`^-1`) or fractions in parentheses (`^(1/2)`). `%` and `°C` stand alone and are not read here.
 *  Never throws. */
export function parseUnit(text: string): UnitResult {
  if (text.length > MAX_LENGTH)
    return {
      ok: false,
      index: MAX_LENGTH,
      expected: `a unit of at most ${MAX_LENGTH} characters`,
      found: `${text.length} characters`,
      nearest: null,
    };
  try {
    return { ok: true, unit: new Reader(text).readAll() };
  } catch (error) {
    if (error instanceof Refusal) return error.detail;
    throw error;
  }
}

const ONE: Unit = { scale: 1, decade: 0, exponents: [0, 0, 0, 0, 0, 0] };

function combine(a: Unit, b: Unit, sign: 1 | -1): Unit {
  return {
    scale: sign > 0 ? a.scale * b.scale : a.scale / b.scale,
    decade: a.decade + sign * b.decade,
    exponents: a.exponents.map((value, i) => value + sign * b.exponents[i]) as unknown as Exponents,
  };
}

function raise(unit: Unit, power: number): Unit {
  return {
    scale: unit.scale ** power,
    decade: unit.decade * power,
    exponents: unit.exponents.map((value) => value * power) as unknown as Exponents,
  };
}

/** Recursive descent over product := factor { ('*' | ' ' | '/') factor }, factor := primary [ '^' power ]. */
class Reader {
  readonly #text: string;
  #at = 0;

  constructor(text: string) {
    this.#text = text;
  }

  readAll(): Unit {
    this.#skipSpace();
    if (this.#at >= this.#text.length) this.#refuse(this.#at, 'a unit', 'nothing');
    const unit = this.#product();
    if (this.#at < this.#text.length) this.#refuse(this.#at, 'a unit, *, / or the end', JSON.stringify(this.#text[this.#at]));
    return unit;
  }

  #product(): Unit {
    this.#skipSpace();
    const start = this.#at;
    // `/(cm Torr)` after a number reads as 1/(cm Torr)
    let unit = this.#peek() === '/' ? ONE : this.#factor(true);
    let firstSlash = -1;
    for (;;) {
      const endOfFactor = this.#at;
      this.#skipSpace();
      const sign = this.#peek();
      if (sign === '/') {
        if (firstSlash < 0) firstSlash = this.#at;
        this.#at++;
        this.#skipSpace();
        unit = combine(unit, this.#factor(false), -1);
      } else if (sign === '*' || (sign !== '' && sign !== ')' && this.#at > endOfFactor)) {
        if (firstSlash >= 0) this.#refuseTwoReadings(start, firstSlash, endOfFactor);
        if (sign === '*') this.#at++;
        this.#skipSpace();
        unit = combine(unit, this.#factor(false), 1);
      } else {
        this.#at = endOfFactor;
        this.#skipSpace();
        return unit;
      }
    }
  }

  #factor(leading: boolean): Unit {
    const base = this.#primary(leading);
    if (this.#peek() !== '^') return base;
    this.#at++;
    return raise(base, this.#power());
  }

  #primary(leading: boolean): Unit {
    const start = this.#at;
    if (this.#peek() === '(') {
      this.#at++;
      const inner = this.#product();
      if (this.#peek() !== ')') this.#refuse(this.#at, '")"', this.#here());
      this.#at++;
      return inner;
    }
    // a lone 1 may only be divided, as in 1/(cm Torr)
    if (leading && /^1\s*\//.test(this.#text.slice(start))) {
      this.#at++;
      return ONE;
    }
    const symbol = /^[\p{L}\u00b5\u2126]+/u.exec(this.#text.slice(start))?.[0];
    if (symbol === undefined) {
      if (/^[\u00b2\u00b3\u00b9\u2070-\u207f]/.test(this.#text.slice(start)))
        this.#refuse(start, 'a power written as in cm^2', this.#here());
      if (/^[%\u00b0]/.test(this.#text.slice(start))) this.#refuse(start, '% and °C to stand alone', this.#here());
      this.#refuse(start, 'a unit', this.#here());
    }
    this.#at += symbol.length;
    const unit = lookUpSymbol(symbol);
    if (unit === null) {
      throw new Refusal({
        ok: false,
        index: start,
        expected: 'a unit',
        found: `unknown unit "${clip(symbol)}"`,
        nearest: nearestSpelling(symbol, allSymbols()),
      });
    }
    const next = this.#text.slice(this.#at);
    if (/^[\u00b2\u00b3\u00b9\u2070-\u207f]/.test(next)) this.#refuse(this.#at, 'a power written as in cm^2', this.#here());
    return unit;
  }

  #power(): number {
    const start = this.#at;
    const rest = this.#text.slice(start);
    const plain = /^[+-]?\d{1,3}(?:\.\d{1,6})?/.exec(rest);
    const fraction = /^\(\s*([+-]?\d{1,3}(?:\.\d{1,6})?)\s*(?:\/\s*(\d{1,3}))?\s*\)/.exec(rest);
    const match = plain ?? fraction;
    const value = plain ? Number(plain[0]) : fraction ? Number(fraction[1]) / Number(fraction[2] ?? 1) : Number.NaN;
    if (match === null || !Number.isFinite(value) || Math.abs(value) > 12)
      this.#refuse(start, 'a power between -12 and 12, as in ^2, ^-1, ^0.5 or ^(1/2)', this.#here());
    this.#at += match[0].length;
    return value;
  }

  #refuseTwoReadings(start: number, slash: number, endOfDivisor: number): never {
    // everything up to the next slash, closing parenthesis or end belongs to the doubtful product
    const tail = /^[^/)]*\)?/.exec(this.#text.slice(endOfDivisor))?.[0] ?? '';
    const rest = (tail.endsWith(')') && !tail.includes('(') ? tail.slice(0, -1) : tail).replace(/^[\s*]+/, '').trim();
    const upper = this.#text.slice(start, slash).trim();
    const divisor = this.#text.slice(slash + 1, endOfDivisor).trim();
    const readings = [`${upper}/(${divisor} ${rest})`, `(${upper} ${rest})/${divisor}`].map(clip);
    this.#refuse(slash, `parentheses: ${readings.join(' or ')}`, `${clip(`${upper}/${divisor} ${rest}`)}, which reads both ways`);
  }

  #peek(): string {
    return this.#text[this.#at] ?? '';
  }

  #here(): string {
    return this.#at < this.#text.length ? JSON.stringify(String.fromCodePoint(this.#text.codePointAt(this.#at) ?? 0)) : 'the end';
  }

  #skipSpace(): void {
    while (this.#peek() === ' ' || this.#peek() === '\t' || this.#peek() === '\u00a0') this.#at++;
  }

  #refuse(index: number, expected: string, found: string): never {
    throw new Refusal({ ok: false, index, expected, found, nearest: null });
  }
}
