import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type DimensionName, formatQuantity, parseQuantity } from '../../src/units/index.ts';

describe('a quantity is written for people', () => {
  const cases: [number, string, string][] = [
    [4.381e-3, 'A', '4.38 mA'],
    [5.28e-5, 's', '52.8 µs'],
    [209.3, 'V', '209 V'],
    [0.99996, 'A', '1 A'],
    [999.6, 'V', '1 kV'],
    [0.006, 'm', '6 mm'],
    [10800, 's', '10800 s'],
    [1.2e-3, 'm^2', '12 cm^2'],
    [3e-6, 'm^2', '3 mm^2'],
    [2, 'm^2', '2 m^2'],
    [101325, 'Pa', '101 kPa'],
    [1e5, 'ohm', '100 kohm'],
    [2e-11, 'F', '20 pF'],
    [1.234e6, 'V/m', '1.23e6 V/m'],
    [295, 'K', '295 K'],
    [-420, 'V', '-420 V'],
    [0, 'V', '0 V'],
    [Number.NaN, 'V', '–'],
    [Number.POSITIVE_INFINITY, 'V', '–'],
    [0.25, '', '0.25'],
  ];
  for (const [value, unit, text] of cases) {
    it(`${value} ${unit} reads ${text}`, () => expect(formatQuantity(value, unit)).toBe(text));
  }

  it('four digits on request', () => expect(formatQuantity(4.38149e-3, 'A', 4)).toBe('4.381 mA'));

  it('reading it back gives the value to half a unit of the last digit', () => {
    const kinds: [DimensionName, string][] = [
      ['current', 'A'],
      ['voltage', 'V'],
      ['time', 's'],
      ['length', 'm'],
      ['area', 'm^2'],
      ['resistance', 'ohm'],
      ['pressure', 'Pa'],
      ['field', 'V/m'],
    ];
    const size = fc.double({ min: -20, max: 20, noNaN: true }).map((decades) => 10 ** decades);
    fc.assert(
      fc.property(size, fc.boolean(), fc.constantFrom(...kinds), fc.integer({ min: 3, max: 4 }), (x, negative, [kind, unit], digits) => {
        const value = negative ? -x : x;
        const back = parseQuantity(formatQuantity(value, unit, digits), kind);
        if (!back.ok) throw new Error(formatQuantity(value, unit));
        expect(Math.abs(back.value / value - 1)).toBeLessThan(0.501 * 10 ** (1 - digits));
      }),
      { numRuns: 2000 },
    );
  });
});
