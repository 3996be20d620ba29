import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { clip, DIMENSIONS, type DimensionName, nearestSpelling, parseAnyOf, parseQuantity, unitFactor } from '../../src/units/index.ts';

function value(text: string, dimension: DimensionName): number {
  const result = parseQuantity(text, dimension);
  if (!result.ok) throw new Error(`${text}: expected ${result.expected}, found ${result.found}`);
  return result.value;
}

describe('a quantity is read into SI', () => {
  // SI prefixes and the exact values of litre, inch, foot, minute, hour, day, atm and torr: SI Brochure (2019) and definitions, common practice
  const cases: [string, DimensionName, number][] = [
    ['6 mm', 'length', 0.006],
    ['6mm', 'length', 0.006],
    ['1 inch', 'length', 0.0254],
    ['1 ft', 'length', 0.3048],
    ['5 \u00b5m', 'length', 5e-6],
    ['5 \u03bcm', 'length', 5e-6],
    ['5 um', 'length', 5e-6],
    ['12 cm^2', 'area', 12e-4],
    ['12 L', 'volume', 0.012],
    ['4 u', 'mass', 4 * 1.6605390666e-27],
    ['5 min', 'time', 300],
    ['3 h', 'time', 10800],
    ['2 day', 'time', 172800],
    ['760 Torr', 'pressure', 101325],
    ['1 atm', 'pressure', 101325],
    ['10 mbar', 'pressure', 1000],
    ['5 hPa', 'pressure', 500],
    ['5 mTorr', 'pressure', (0.005 * 101325) / 760],
    ['10 Td', 'reducedField', 1e-20],
    ['1 kTd', 'reducedField', 1e-18],
    ['10 T', 'magneticField', 10],
    ['100 kohm', 'resistance', 1e5],
    ['1 Mohm', 'resistance', 1e6],
    ['1 M\u03a9', 'resistance', 1e6],
    ['1 k\u2126', 'resistance', 1000],
    ['20 pF', 'capacitance', 2e-11],
    ['2 eV', 'energy', 3.204353268e-19],
    ['-20 °C', 'temperature', 253.15],
    ['0.1 %', 'number', 0.001],
    ['0.02', 'number', 0.02],
    ['+1.5e-3 A', 'current', 0.0015],
    ['.5 V', 'voltage', 0.5],
    ['5. V', 'voltage', 5],
    ['3 W/A', 'voltage', 3],
    ['12 1/(cm Torr)', 'growthOverPressure', (12 * 100 * 760) / 101325],
    ['12 /(cm Torr)', 'growthOverPressure', (12 * 100 * 760) / 101325],
    ['180 V/(cm Torr)', 'fieldOverPressure', (180 * 100 * 760) / 101325],
    ['180 V/cm/Torr', 'fieldOverPressure', (180 * 100 * 760) / 101325],
    ['26.64 (V/(cm Torr))^0.5', 'rootFieldOverPressure', 26.64 * Math.sqrt((100 * 760) / 101325)],
    ['26.64 (V/(cm Torr))^(1/2)', 'rootFieldOverPressure', 26.64 * Math.sqrt((100 * 760) / 101325)],
    ['5 cm^-1 Torr^-1', 'growthOverPressure', (5 * 100 * 760) / 101325],
    ['3.3e5 cm^2 Torr/(V s)', 'mobilityTimesPressure', (33 * 101325) / 760],
    ['1e-4 mbar L/s', 'gasFlow', 1e-5],
    ['1e-8 Torr L/(s cm^2)', 'outgassingRate', (1e-8 * 1e-3 * 1e4 * 101325) / 760],
    ['1e-7 cm^3/s', 'volumeRate', 1e-13],
  ];
  for (const [text, dimension, expected] of cases) {
    it(`${text} is ${expected} ${DIMENSIONS[dimension].unit}`, () => {
      expect(Math.abs(value(text, dimension) / expected - 1)).toBeLessThan(1e-14);
    });
  }

  it('decimal units give the nearest double, so that equal spellings are equal numbers', () => {
    expect(value('6 mm', 'length')).toBe(0.006);
    expect(value('0.6 cm', 'length')).toBe(0.006);
    expect(value('6000 um', 'length')).toBe(0.006);
    expect(value('20 pF', 'capacitance')).toBe(2e-11);
    expect(value('0.02 nF', 'capacitance')).toBe(2e-11);
  });

  it('tells which of two kinds was given', () => {
    const overPressure = parseAnyOf('180 V/(cm Torr)', ['reducedField', 'fieldOverPressure']);
    expect(overPressure.ok && overPressure.dimension).toBe('fieldOverPressure');
    const reduced = parseAnyOf('180 Td', ['reducedField', 'fieldOverPressure']);
    expect(reduced.ok && reduced.dimension).toBe('reducedField');
  });

  it('every kind accepts its own example and its own SI unit', () => {
    for (const [name, { example, unit }] of Object.entries(DIMENSIONS)) {
      expect(parseQuantity(example, name as DimensionName), name).toMatchObject({ ok: true });
      expect(parseQuantity(`1 ${unit}`, name as DimensionName), name).toEqual({ ok: true, value: 1 });
    }
  });
});

describe('a text that is no such quantity is refused with the place, what was expected and what was found', () => {
  const cases: [string, DimensionName, number, string, string][] = [
    ['5 mm', 'voltage', 3, 'a voltage, e.g. 420 V', '5 mm, a length'],
    ['420', 'voltage', 1, 'a voltage, e.g. 420 V', '420 without a unit'],
    ['420 v', 'voltage', 5, 'a voltage, e.g. 420 V', 'unknown unit "v"'],
    ['  420 volts', 'voltage', 7, 'a voltage, e.g. 420 V', 'unknown unit "volts"'],
    ['', 'voltage', 1, 'a voltage, e.g. 420 V', 'nothing'],
    ['NaN V', 'voltage', 1, 'a voltage, e.g. 420 V', 'NaN V'],
    ['Infinity V', 'voltage', 1, 'a voltage, e.g. 420 V', 'Infinity V'],
    ['1e400 V', 'voltage', 1, 'a voltage, e.g. 420 V', '1e400, which is not finite'],
    ['1e300 TV', 'voltage', 1, 'a voltage, e.g. 420 V', '1e300 TV, which no double holds in SI'],
    ['1e-320 fV', 'voltage', 1, 'a voltage, e.g. 420 V', '1e-320 fV, which no double holds in SI'],
    ['1,5 V', 'voltage', 2, 'a voltage, e.g. 420 V, with a decimal point and no separators', '1,5 V'],
    ['12 cm²', 'area', 6, 'a power written as in cm^2', '"²"'],
    ['5 °C K', 'temperature', 3, '% and °C to stand alone', '"°"'],
    ['5 %/s', 'frequency', 3, '% and °C to stand alone', '"%"'],
    ['1 V^', 'voltage', 5, 'a power between -12 and 12, as in ^2, ^-1, ^0.5 or ^(1/2)', 'the end'],
    ['1 V^(1/0)', 'voltage', 5, 'a power between -12 and 12, as in ^2, ^-1, ^0.5 or ^(1/2)', '"("'],
    ['1 m/(s', 'velocity', 7, '")"', 'the end'],
    ['1 m)', 'length', 4, 'a unit, *, / or the end', '")"'],
    ['1 m/', 'length', 5, 'a length, e.g. 6 mm', 'the end'],
    ['5 2 m', 'length', 3, 'a length, e.g. 6 mm', '"2"'],
    ['5 cd', 'length', 3, 'a length, e.g. 6 mm', 'unknown unit "cd"'],
    ['5 kmin', 'time', 3, 'a time, e.g. 5 ms', 'unknown unit "kmin"'],
    ['5 Td', 'time', 3, 'a time, e.g. 5 ms', '5 Td, a reduced field'],
    ['5 J K', 'voltage', 3, 'a voltage, e.g. 420 V', '5 J K, a quantity in m^2 kg s^-2 K'],
  ];
  for (const [text, dimension, column, expected, found] of cases) {
    it(`"${text}" for ${DIMENSIONS[dimension].name}`, () => {
      expect(parseQuantity(text, dimension)).toMatchObject({ ok: false, column, expected, found });
    });
  }

  it('a quotient followed by a product is refused with both readings', () => {
    for (const text of ['12 1/cm Torr', '12 1/cm*Torr']) {
      const result = parseQuantity(text, 'growthOverPressure');
      expect(result).toMatchObject({ ok: false, column: 5, expected: 'parentheses: 1/(cm Torr) or (1 Torr)/cm' });
    }
    expect(parseQuantity('1 cm^2/V s', 'mobility')).toMatchObject({ ok: false, expected: 'parentheses: cm^2/(V s) or (cm^2 s)/V' });
    expect(parseQuantity('1 A/(V/m s)', 'mobility')).toMatchObject({ ok: false, column: 7, expected: 'parentheses: V/(m s) or (V s)/m' });
  });

  it('a misspelt unit names the nearest one', () => {
    for (const [text, nearest] of [
      ['1.2 torr', 'Torr'],
      ['1 kOhm', 'kohm'],
      ['1 atmm', 'atm'],
      ['1 mbr', 'mbar'],
    ] as const) {
      expect(parseQuantity(text, 'pressure')).toMatchObject({ ok: false, nearest });
    }
    expect(nearestSpelling('preasure', ['pressure', 'voltage'])).toBe('pressure');
    expect(nearestSpelling('banana', ['pressure', 'voltage'])).toBeNull();
  });

  it('a unit of another dimension is not taken for one of two kinds', () => {
    expect(parseAnyOf('5 mm', ['reducedField', 'fieldOverPressure'])).toMatchObject({
      ok: false,
      expected: 'a reduced field, e.g. 100 Td, or a field over pressure, e.g. 180 V/(cm Torr)',
    });
  });
});

describe('properties of the parser', () => {
  const symbols = ['m', 's', 'V', 'A', 'K', 'Torr', 'bar', 'eV', 'Td', 'L', 'inch', 'ohm'];
  const factor = fc.tuple(
    fc.constantFrom(...symbols),
    fc.integer({ min: -3, max: 3 }).filter((p) => p !== 0),
  );
  const write = (factors: readonly (readonly [string, number])[], separator: string): string =>
    factors.map(([s, p]) => `${s}^${p}`).join(separator);

  it('the order of factors does not matter', () => {
    fc.assert(
      fc.property(fc.array(factor, { minLength: 1, maxLength: 5 }), (factors) => {
        const forward = unitFactor(write(factors, ' '));
        const backward = unitFactor(write([...factors].reverse(), '*'));
        if (!forward.ok || !backward.ok) throw new Error('not read');
        expect(Math.abs(forward.factor / backward.factor - 1)).toBeLessThan(1e-12);
        expect(forward.exponents).toEqual(backward.exponents);
      }),
    );
  });

  it('dividing by a product is the same as negative powers', () => {
    fc.assert(
      fc.property(fc.array(factor, { minLength: 1, maxLength: 4 }), (factors) => {
        const divided = unitFactor(`1/(${write(factors, ' ')})`);
        const negative = unitFactor(
          write(
            factors.map(([s, p]) => [s, -p] as const),
            ' ',
          ),
        );
        if (!divided.ok || !negative.ok) throw new Error('not read');
        expect(Math.abs(divided.factor / negative.factor - 1)).toBeLessThan(1e-12);
        for (const [i, power] of divided.exponents.entries()) expect(power).toBeCloseTo(negative.exponents[i], 12);
      }),
    );
  });

  it('a prefix scales the value by its power of ten', () => {
    const prefixes = { f: -15, p: -12, n: -9, u: -6, '\u00b5': -6, '\u03bc': -6, m: -3, c: -2, d: -1, h: 2, k: 3, M: 6, G: 9, T: 12 };
    fc.assert(
      fc.property(fc.constantFrom(...Object.entries(prefixes)), fc.double({ min: 1e-3, max: 1e3, noNaN: true }), ([prefix, power], x) => {
        expect(value(`${x} ${prefix}V`, 'voltage')).toBe(
          Number(`${x.toExponential().split('e')[0]}e${Number(x.toExponential().split('e')[1]) + power}`),
        );
      }),
    );
  });

  it('any finite number survives the round trip through its SI unit', () => {
    fc.assert(
      fc.property(
        fc.double({ noNaN: true, noDefaultInfinity: true }),
        fc.constantFrom(...(Object.keys(DIMENSIONS) as DimensionName[])),
        (x, name) => {
          expect(value(`${x} ${DIMENSIONS[name].unit}`, name)).toBe(x + 0);
        },
      ),
    );
  });

  it('no text makes the parser throw, and a refusal points into the text', () => {
    const pieces = fc.constantFrom(
      '5',
      '1e3',
      ' ',
      '/',
      '*',
      '^',
      '(',
      ')',
      '(1/2)',
      '-1',
      'm',
      'V',
      'Torr',
      '%',
      '°C',
      'µ',
      '1/',
      '².',
      '\u0000',
      '\n',
    );
    const text = fc.oneof(
      fc.string({ unit: 'binary' }),
      fc.array(pieces, { maxLength: 20 }).map((p) => p.join('')),
    );
    fc.assert(
      fc.property(text, fc.constantFrom(...(Object.keys(DIMENSIONS) as DimensionName[])), (t, name) => {
        const result = parseQuantity(t, name);
        if (result.ok) expect(Number.isFinite(result.value)).toBe(true);
        else {
          expect(result.column).toBeGreaterThanOrEqual(1);
          expect(result.column).toBeLessThanOrEqual(Math.max(1, t.length + 1));
          expect(result.found).not.toMatch(/\p{Cc}/u);
          expect(result.expected).not.toMatch(/\p{Cc}/u);
        }
      }),
      { numRuns: 2000 },
    );
  });

  it('a very long or very deep text is refused at once', () => {
    for (const text of [`1 ${'('.repeat(100_000)}`, `1 ${'m '.repeat(100_000)}`, '9'.repeat(100_000)]) {
      const start = performance.now();
      expect(parseQuantity(text, 'voltage').ok).toBe(false);
      expect(performance.now() - start).toBeLessThan(500);
    }
  });

  it('text from outside is quoted with at most 40 characters and no control characters', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 80 }), (t) => {
        expect(clip(t).length).toBeLessThanOrEqual(40);
        expect(clip(t)).not.toMatch(/[\p{Cc}\u202e]/u);
      }),
    );
    expect(clip('x'.repeat(40))).toBe('x'.repeat(40));
    expect(clip('x'.repeat(41))).toBe(`${'x'.repeat(39)}…`);
    expect(clip('\u001b[31m')).toBe('\\u001b[31m');
  });
});
