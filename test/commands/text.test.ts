import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readCase } from '../../src/casefile/index.ts';
import { columns, lengthOf, NO_BREAK, wrap } from '../../src/commands/layout.ts';
import { progressLine, runProgressText } from '../../src/commands/progress.ts';
import type { Terminal } from '../../src/commands/terminal.ts';
import { highestOpenGapVoltage } from '../../src/onset/highest-voltage.ts';
import { printable, printableJson } from '../../src/units/printable.ts';
import { openCase } from './program.ts';

describe('layout', () => {
  test('lines are never wider than asked and lose no word', () => {
    fc.assert(
      fc.property(
        fc.array(fc.string({ maxLength: 30 }).map((s) => s.replaceAll(/\s/g, '_'))),
        fc.integer({ min: 10, max: 80 }),
        (words, width) => {
          const lines = wrap(words.join(' '), width, '- ');
          for (const line of lines) expect(lengthOf(line)).toBeLessThanOrEqual(width);
          expect(lines.join('').replace(/ /g, '')).toBe(`-${words.join('')}`.replace(/ /g, ''));
        },
      ),
    );
  });

  test('a number and its unit stay together', () => {
    expect(wrap(`it carries 12.5${NO_BREAK}mA`, 16)).toEqual(['it carries', '12.5 mA']);
  });

  test('cells wrap inside their columns', () => {
    expect(
      columns(
        [
          ['  label', 'one two', 'x'],
          ['', 'three', ''],
        ],
        [9, 6],
        20,
      ),
    ).toEqual(['  label  one   x', '         two', '         thre', '         e']);
  });
});

test('control characters and changes of direction are escaped, everything else is kept', () => {
  expect(printable('a\u001b[1mb\u009bc\u202ed\ne µ °C é 日本')).toBe('a\\u001b[1mb\\u009bc\\u202ed\\u000ae µ °C é 日本');
  const value = { text: '\u001b\u009b\u202e\n"', number: Number.NaN };
  expect(JSON.parse(printableJson(value))).toEqual({ text: value.text, number: null });
  // biome-ignore lint/suspicious/noControlCharactersInRegex: that is what is looked for
  expect(printableJson(value)).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202e]/);
});

describe('the progress line', () => {
  const progress = { time_s: 1e-3, until_s: 5, current_A: -1.5e-9, gap_voltage_V: -230.2, growth_per_s: 2.3e5, steps: 123456 };
  const plain = (text: string): string => text;
  const terminalThat = (live: boolean, said: string[]): Terminal => ({
    out: () => {
      throw new Error('progress never goes to stdout');
    },
    err: (text) => void said.push(text),
    width: 80,
    seen: true,
    live,
    errWidth: live ? 80 : Number.POSITIVE_INFINITY,
    style: { strong: plain, faint: plain, alarm: plain, doubt: plain },
  });

  test('is one plain line a minute where stderr is no terminal', () => {
    const said: string[] = [];
    let now = 0;
    const line = progressLine(terminalThat(false, said), runProgressText, () => now);
    for (; now <= 150_000; now += 50) line.show(progress);
    line.end();
    expect(said).toHaveLength(2);
    expect(said[0]).toMatch(/^1 ms of 5 s .*-1\.5 nA .*-230 V .*\+2\.3e5 1\/s .*123456 steps .*60 s\n$/);
    expect(said.join('')).not.toContain('\u001b');
  });

  test('is drawn in place on a terminal, not at once, within its width, and removed at the end', () => {
    const said: string[] = [];
    let now = 0;
    const line = progressLine(terminalThat(true, said), runProgressText, () => now);
    for (; now <= 1000; now += 50) line.show(progress);
    line.end();
    expect(said).toHaveLength(9); // from 0.3 s on every 0.1 s, and the removal
    for (const text of said.slice(0, -1)) {
      expect(text.startsWith('\r') && text.endsWith('\u001b[K')).toBe(true);
      expect(lengthOf(text)).toBeLessThanOrEqual(80 + 3);
    }
    expect(said[said.length - 1]).toBe('\r\u001b[K');
  });

  test('leaves no trace of a run that ends at once', () => {
    const said: string[] = [];
    const line = progressLine(terminalThat(true, said), runProgressText, () => 0);
    line.show(progress);
    line.end();
    expect(said).toEqual([]);
  });
});

describe('the highest voltage without conduction', () => {
  const highest = (...overrides: string[]): number => {
    const csv = 't [us],bias [V]\n0,0\n1,-500\n2,300\n3,300\n';
    const read = readCase(openCase(), 'open.yaml', () => ({ ok: true, text: csv }), overrides);
    if (!read.ok) throw new Error(JSON.stringify(read.problems));
    return highestOpenGapVoltage(read.case);
  };

  test('of a step long observed is the step', () => {
    expect(highest()).toBeCloseTo(230.202, 9);
  });

  test('behind no resistance follows every corner, with its sign', () => {
    const table = 'supply.voltage.table={file: x.csv, time: t, voltage: bias}';
    expect(highest(table, 'supply.series_resistance=0 ohm')).toBe(-500);
  });

  test('behind a resistance lies where the gap meets the supply on its way back', () => {
    // dV/dt = (U − V)/τ with U = −500 V/µs · t, then −500 V + 800 V/µs · (t − 1 µs); τ = RC of 1 kohm and 100.885 pF
    const table = 'supply.voltage.table={file: x.csv, time: t, voltage: bias}';
    const tau = 1e3 * (100e-12 + (8.8541878128e-12 * 1e-3) / 1e-2);
    const [down, up] = [-500e6, 800e6];
    const first = down * (1e-6 - tau * (1 - Math.exp(-1e-6 / tau)));
    // V = U − up τ + (first + 500 + up τ) e^(−s/τ); V = U at e^(−s/τ) = up τ/(first + 500 + up τ)
    const s = tau * Math.log((first + 500 + up * tau) / (up * tau));
    expect(highest(table, 'supply.series_resistance=1 kohm')).toBeCloseTo(-500 + up * s, 6);
  });

  test('is what the gap holds at first where the supply stays below', () => {
    expect(highest('supply.initial_gap_voltage=-400 V')).toBe(-400);
  });

  test('within a short observation is what the current limit lets through', () => {
    const C = 100e-12 + (8.8541878128e-12 * 1e-3) / 1e-2;
    const limited = highest('supply.current_limit=1 uA', 'observe.until=10 ms', 'supply.parallel_capacitance=100 pF');
    expect(limited).toBeCloseTo(Math.min(230.202, (1e-6 * 10e-3) / C), 6);
  });
});
