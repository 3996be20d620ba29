import { deflateRawSync, inflateRawSync, inflateSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type Rgb, SCALE } from '../../src/report/colour.ts';
import { el, inlineJson, markup, visible } from '../../src/report/element.ts';
import { linear, logarithmic, powerLabel } from '../../src/report/figure/scale.ts';
import { packEven, packExact, packLog } from '../../src/report/pack.ts';
import { type Packed, type Quantised, unpredicted, unshuffled, valuesOf } from '../../src/report/packed.ts';
import { pngAddress } from '../../src/report/png.ts';
import type { RunSeries } from '../../src/report/run/data.ts';
import { roundest, TIME_AXES, timeScale } from '../../src/report/run/time-axis.ts';

describe('the scale of the maps', () => {
  const linearLight = (v: number): number => (v / 255 <= 0.04045 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4);
  const toLinear = (rgb: Rgb): number[] => rgb.map(linearLight);
  /** OKLab of linear light (Ottosson 2020, inverse of what makes the scale; from memory, checked below) */
  const lab = ([r, g, b]: number[]): number[] => {
    const l = Math.cbrt(0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b);
    const m = Math.cbrt(0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b);
    const s = Math.cbrt(0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b);
    return [
      0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
      1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
      0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
    ];
  };

  test('the colour space is right for white, black and a grey', () => {
    expect(lab([1, 1, 1])[0]).toBeCloseTo(1, 5);
    expect(lab([0, 0, 0])[0]).toBe(0);
    const [, a, b] = lab([0.2, 0.2, 0.2]);
    expect(Math.hypot(a, b)).toBeLessThan(1e-4);
  });

  test('equal steps of the value are equal steps for the eye', () => {
    const steps = [];
    for (let i = 16; i < 256; i += 16) {
      const [p, q] = [lab(toLinear(SCALE[i])), lab(toLinear(SCALE[i - 16]))];
      steps.push(Math.hypot(p[0] - q[0], p[1] - q[1], p[2] - q[2]));
    }
    // colours are whole numbers of 255ths: that alone moves a step by some percent
    expect(Math.max(...steps) / Math.min(...steps)).toBeLessThan(1.15);
  });

  // Viénot, Brettel and Mollon, Color Res. Appl. 24, 243, 1999, dichromats from linear sRGB; from memory (M)
  const EYES: Readonly<Record<string, readonly (readonly number[])[]>> = {
    'without red cones': [
      [0.11238, 0.88762, 0],
      [0.11238, 0.88762, 0],
      [0.00401, -0.00401, 1],
    ],
    'without green cones': [
      [0.29275, 0.70725, 0],
      [0.29275, 0.70725, 0],
      [-0.02234, 0.02234, 1],
    ],
    'that see no colour': [
      [0.2126, 0.7152, 0.0722],
      [0.2126, 0.7152, 0.0722],
      [0.2126, 0.7152, 0.0722],
    ],
  };
  test.each(Object.keys(EYES))('it rises in lightness all the way for eyes %s', (eyes) => {
    const lightness = SCALE.map((rgb) => lab(EYES[eyes].map((row) => row.reduce((sum, w, i) => sum + w * toLinear(rgb)[i], 0)))[0]);
    for (let i = 8; i < 256; i += 8) expect(lightness[i], `step ${i}`).toBeGreaterThan(lightness[i - 8] + 0.01);
  });
});

describe('texts from a file', () => {
  test('markup, scripts and control characters come out as text', () => {
    const hostile = '</title><script>"&\u001b[2J\u202e\ud800';
    const out = markup(el('p', { title: hostile }, hostile));
    expect(out).toBe(
      `<p title="&lt;/title&gt;&lt;script&gt;&quot;&amp;\\u001b[2J\\u202e\\ud800">&lt;/title&gt;&lt;script&gt;&quot;&amp;\\u001b[2J\\u202e\\ud800</p>`,
    );
    expect(visible('a\tb\nµ😀')).toBe('a\tb\nµ😀');
  });

  test('no text whatever breaks out of an element, an attribute or inlined JSON', () => {
    fc.assert(
      fc.property(
        fc.oneof(fc.string({ unit: 'binary' }), fc.string({ unit: fc.constantFrom('<', '>', '&', '"', "'", '/', '!', '-', 's') })),
        (text) => {
          const out = markup(el('p', { title: text }, text));
          expect(out.match(/[<>]/g)).toEqual(['<', '>', '<', '>']);
          expect(out.split('"')).toHaveLength(3);
          const json = inlineJson({ text });
          expect(json).not.toMatch(/[<>&\u2028\u2029]/);
          expect(JSON.parse(json)).toEqual({ text });
        },
      ),
    );
  });
});

describe('arrays in a page', () => {
  const levelsOf = (packed: Quantised): Float32Array =>
    valuesOf(packed, unpredicted(inflateRawSync(Buffer.from(packed.data, 'base64')), packed.columns));

  test('numbers over time keep every digit', () => {
    const values = Float64Array.from([0, -1e-300, Math.PI, 1e308, 3e-9, Number.NaN]);
    const packed = packExact(values) as Extract<Packed, { kind: 'exact' }>;
    expect(unshuffled(inflateRawSync(Buffer.from(packed.data, 'base64')))).toEqual(values);
  });

  test('a field keeps its values to a thirty-thousandth of its span, whatever its sign', () => {
    const values = Float32Array.from({ length: 600 }, (_, i) => 1e5 * Math.sin(i) - 3e4);
    const back = levelsOf(packEven(values, 20) as never);
    const span = Math.max(...values) - Math.min(...values);
    expect(Math.max(...back.map((v, i) => Math.abs(v - values[i])))).toBeLessThan(span / 3e4);
  });

  test('a density keeps its values to a tenth of a percent over 18 decades, and zero', () => {
    const values = Float32Array.from({ length: 600 }, (_, i) => (i % 7 === 0 ? 0 : i % 11 === 0 ? -1 : 10 ** ((i % 18) + 0.3)));
    const back = levelsOf(packLog(values, 20, 18) as never);
    values.forEach((v, i) => {
      if (v <= 0) expect(back[i]).toBe(0);
      else expect(back[i] / v).toBeCloseTo(1, 3);
    });
  });

  test('fields of one value, of zeros, and with what is no number come back finite', () => {
    for (const value of [0, 5, Number.NaN])
      for (const pack of [packEven, (v: Float32Array, c: number) => packLog(v, c, 18)])
        for (const v of levelsOf(pack(new Float32Array(6).fill(value), 3) as never)) expect(Number.isFinite(v)).toBe(true);
  });

  test('smooth fields take a fraction of their size', () => {
    const values = Float32Array.from({ length: 200 * 100 }, (_, i) =>
      Math.exp(9 * Math.sin((i % 200) / 31) + Math.floor(i / 200) ** 1.3 / 20),
    );
    const { data } = packLog(values, 200, 18) as never as { data: string };
    expect(data.length).toBeLessThan(deflateRawSync(Buffer.from(values.buffer)).length / 3);
  });
});

test('a PNG holds its pixels, row by row', () => {
  const address = pngAddress({ width: 3, height: 2, pixels: Uint8Array.from([0, 1, 2, 2, 1, 0]), palette: SCALE });
  const file = Buffer.from(address.split(',')[1], 'base64');
  expect(file.subarray(1, 4).toString()).toBe('PNG');
  const at = file.indexOf('IDAT');
  expect([...inflateSync(file.subarray(at + 4, at + 4 + file.readUInt32BE(at - 4)))]).toEqual([0, 0, 1, 2, 0, 2, 1, 0]);
  // of the empty last chunk; a fixed number in every PNG file
  expect(file.subarray(-4).toString('hex')).toBe('ae426082');
});

describe('axes', () => {
  const room = { length: 400, apart: 40 };

  test('an even axis ends at round numbers and puts the prefix in its title', () => {
    const axis = linear('Voltage', 'V', 0, 4321, room);
    expect(axis.title).toBe('Voltage [kV]');
    expect(axis.ticks.map(({ label }) => label)).toEqual(['0', '0.5', '1', '1.5', '2', '2.5', '3', '3.5', '4', '4.5']);
    expect(axis.at(4500)).toBeCloseTo(1);
  });

  test('a logarithmic axis labels decades, and keeps labels apart', () => {
    const axis = logarithmic('Current', 'A', 1e-12, 1e-2, room);
    expect(axis.ticks.filter(({ label }) => label !== '').map(({ label }) => label)).toEqual([
      '1 pA',
      '10 pA',
      '100 pA',
      '1 nA',
      '10 nA',
      '100 nA',
      '1 µA',
      '10 µA',
      '100 µA',
      '1 mA',
      '10 mA',
    ]);
    expect(axis.at(0)).toBeNaN();
    expect(axis.at(1e-7)).toBeCloseTo(0.5);
    const tight = logarithmic('Density', 'cm⁻³', 1e-3, 1e15, { length: 100, apart: 20 }, false);
    const shown = tight.ticks.filter(({ label }) => label !== '');
    for (let i = 1; i < shown.length; i++) expect((shown[i].at - shown[i - 1].at) * 100).toBeGreaterThanOrEqual(20);
    expect(powerLabel(3e-9)).toBe('3·10⁻⁹');
  });

  test('any range whatever gives axes with finite ticks', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e300, max: 1e300, noNaN: true }), fc.double({ min: 1e-300, max: 1e300, noNaN: true }), (a, b) => {
        for (const { at, label } of [
          ...linear('x', 'V', Math.min(a, b), Math.max(a, b), room).ticks,
          ...logarithmic('y', 'A', b / 10, b, room).ticks,
        ]) {
          expect(Number.isFinite(at)).toBe(true);
          expect(label).not.toContain('NaN');
        }
      }),
      { numRuns: 1000 },
    );
  });

  test('a range of next to nothing beside its place has few ticks', () => {
    for (const place of [1, -1, 1e20, -1e300]) {
      const { ticks } = linear('x', 'V', place, place + Math.abs(place) * Number.EPSILON, room);
      expect(ticks.length).toBeGreaterThan(0);
      expect(ticks.length).toBeLessThan(20);
    }
  });

  test('the roundest number of a range has the fewest digits', () => {
    expect(roundest(3.28e-5, 3.44e-5)).toEqual({ value: 3.4e-5, digits: 2 });
    expect(roundest(0.9, 1.2)).toEqual({ value: 1, digits: 1 });
    expect(roundest(-1, 1)).toEqual({ value: 0, digits: 1 });
  });
});

describe('time axes', () => {
  /** a quiet microsecond, a collapse within nanoseconds, a quiet millisecond */
  const time = Float64Array.from([0, 1e-7, 5e-7, 1e-6, 1.001e-6, 1.002e-6, 1.003e-6, 1e-5, 1e-3]);
  const voltage = Float64Array.from([0, 300, 300, 300, 250, 200, 150, 150, 150]);
  const none = new Float64Array(time.length);
  const run: RunSeries = {
    time,
    x: Float64Array.from([1e-3, 2e-3]),
    scalars: {
      supplyVoltage: voltage,
      openGapVoltage: voltage,
      gapVoltage: voltage,
      conductionCurrent: Float64Array.from([0, 1e-12, 1e-9, 1e-6, 1e-4, 1e-3, 1e-3, 1e-3, 1e-3]),
      totalCurrent: none,
      supplyCurrent: none,
      gapEnergy: none,
      sourceEnergy: none,
    },
    fields: { electricField: null, electronDensity: null, ionDensity: null, negativeIonDensity: null, ionisationRate: null },
    setting: { spacing: 3e-3, seriesResistance: null, currentLimit: null, seedCurrent: null },
    events: [{ name: 'threshold', time: 1e-7 }],
  };

  test.each(TIME_AXES.map(({ kind }) => kind))(
    'the axis %s rises from end to end, leads back, and has labels that do not overlap',
    (kind) => {
      const scale = timeScale(kind, run)(600);
      const places = Array.from(time, (t) => scale.at(t));
      expect(places[0]).toBeCloseTo(0, 9);
      expect(places[places.length - 1]).toBeCloseTo(1, 9);
      for (let i = 1; i < places.length; i++) expect(places[i]).toBeGreaterThan(places[i - 1]);
      for (const share of [0.05, 0.3, 0.77]) expect(scale.at(scale.from(share))).toBeCloseTo(share, 6);
      const labels = scale.ticks.filter(({ label }) => label !== '');
      expect(labels.length).toBeGreaterThanOrEqual(2);
      for (let i = 1; i < labels.length; i++) expect((labels[i].at - labels[i - 1].at) * 600).toBeGreaterThan(25);
    },
  );

  test('stretched by activity, a collapse of nanoseconds takes more room than the millisecond after it', () => {
    const scale = timeScale('activity', run)(600);
    expect(scale.at(1.003e-6) - scale.at(1e-6)).toBeGreaterThan(scale.at(1e-3) - scale.at(1e-5));
  });
});
