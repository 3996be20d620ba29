/** What `check` and `run` say of sets of data, mixtures and the spread of a yield. */
import { describe, expect, test } from 'vitest';
import { readCase } from '../../src/casefile/index.ts';
import type { LoadedCase } from '../../src/commands/case-source.ts';
import { gasJson, yieldJson } from '../../src/commands/check-spread.ts';
import { checkText } from '../../src/commands/check-text.ts';
import { runText } from '../../src/commands/run-text.ts';
import type { Terminal } from '../../src/commands/terminal.ts';
import { highestOpenGapVoltage } from '../../src/onset/highest-voltage.ts';
import { prognosisCautions } from '../../src/onset/prognosis.ts';
import { simulateNow } from '../../src/simulate.ts';
import { exponentialBreakdownVoltage } from '../../src/theory/paschen.ts';
import { predict, prospects } from '../../src/theory/predict.ts';
import { minimum } from '../gases/townsend.ts';
import { openCase } from './program.ts';

const plain = (text: string): string => text;
const terminal: Terminal = {
  out: () => {},
  err: () => {},
  width: 80,
  seen: false,
  live: false,
  errWidth: 80,
  style: { strong: plain, faint: plain, alarm: plain, doubt: plain },
};

const TABLE = 'EN [Td],gamma\n100,0.07\n1000,0.07\n';

function load(overrides: readonly string[]): LoadedCase {
  const text = openCase();
  const result = readCase(text, 'open.yaml', () => ({ ok: true, text: TABLE }), overrides);
  if (!result.ok) throw new Error(JSON.stringify(result.problems, null, 1));
  return { ...result, text };
}

/** with single spaces, as layout wraps it anywhere */
function checked(overrides: readonly string[]): string {
  const loaded = load(overrides);
  const voltage = highestOpenGapVoltage(loaded.case);
  const answer = {
    loaded,
    path: 'open.yaml',
    voltage,
    theory: predict(loaded.case, voltage),
    prospects: prospects(loaded.case, voltage),
    kinetics: null,
    curve: null,
    cautions: prognosisCautions(loaded.case, []),
  };
  return checkText(answer, terminal).replace(/\s+/g, ' ');
}

function ran(overrides: readonly string[]): string {
  const settings = load(overrides).case;
  const voltage = highestOpenGapVoltage(settings);
  const answer = { settings, outcome: simulateNow(settings), voltage, prospects: prospects(settings, voltage), written: null, unused: [] };
  return runText(answer, terminal);
}

const inGas = (gas: string, ...more: readonly string[]): string[] => [`gas=${gas}`, ...more];
const helium = inGas('{ name: helium, pressure: 3 Torr }');
const spread = 'electrodes.left.ion_yield={ low: 0.02, typical: 0.07, high: 0.16 }';
/** V_s of the open case by its closed form [V] */
const V = (gamma: number): string => `${(exponentialBreakdownVoltage(12, 180, 3, gamma) ?? Number.NaN).toPrecision(3)} V`;

describe('the set of data', () => {
  test('is named with its reason, and V_s with every other set stands beside it', () => {
    const out = checked(helium);
    expect(out).toContain('set of data ward (default)');
    expect(out).toContain('Set ward: ');
    expect(out).toMatch(/V_s over the data sets 85\.\d V to 2\d\d V: raizer 85\.\d V, lieberman 2\d\d V, ward 2\d\d V \(used\)/);
    expect(checked(inGas('{ name: helium, data: raizer, pressure: 3 Torr }'))).toMatch(/set of data raizer .*Set raizer: .*raizer/);
  });

  test('gives V_s as a closed form written elsewhere does, at the minimum of each set', () => {
    for (const set of ['ward', 'lieberman', 'raizer']) {
      const { voltage, pd } = minimum('helium', set, () => 0.1);
      const { case: settings } = load([
        `gas={ name: helium, pressure: ${pd} Torr, temperature: 293.15 K }`,
        'gap.spacing=1 cm',
        'electrodes.left.ion_yield=0.1',
      ]);
      const json = gasJson(settings, 200) as { set: string; sets: { set: string; used: boolean; static_breakdown_voltage_V: number }[] };
      expect(json.set).toBe('ward');
      expect(json.sets.map((s) => [s.set, s.used])).toEqual([
        ['ward', true],
        ['lieberman', false],
        ['raizer', false],
      ]);
      const found = json.sets.find((s) => s.set === set)?.static_breakdown_voltage_V ?? Number.NaN;
      expect(Math.abs(found / voltage - 1)).toBeLessThan(1e-4);
    }
  });

  test('is not asked for where the ionisation is the case’s own', () => {
    expect(gasJson(load([]).case, 230)).toBeNull();
    const own = load([...helium, 'gas.coefficients.ionisation={ form: exponential, A: 3 1/(cm Torr), B: 34 V/(cm Torr) }']).case;
    expect(gasJson(own, 230)).toMatchObject({ name: 'helium', set: 'ward', sets: [] });
  });

  test('of a mixture is a rule, with every set of every gas in turn', () => {
    const overrides = inGas('{ mixture: { argon: 0.9, nitrogen: 0.1 }, pressure: 3 Torr }');
    const out = checked(overrides);
    expect(out).toContain('gas mixture: 0.9 argon + 0.1 nitrogen');
    expect(out).toContain('Set mixing rule: ');
    expect(out).toMatch(/V_s over the data sets \d+ V to \d+ V: .*nitrogen lieberman \d+ V/);
    expect(out).toContain('Wieland, ETZ-A 94, 370, 1973');
    expect(out).toContain('[mixture]');
    const json = gasJson(load(overrides).case, 230) as {
      mixture: unknown;
      sets: { gas: string; used: boolean; static_breakdown_voltage_V: number }[];
    };
    expect(json.mixture).toEqual([
      { gas: 'argon', fraction: 0.9 },
      { gas: 'nitrogen', fraction: 0.1 },
    ]);
    expect(json.sets.filter((s) => s.used).map((s) => s.gas)).toEqual(['argon', 'nitrogen']);
    expect(json.sets.length).toBe(6);
    // each set has a voltage of its own, but for the default of either gas, which is one mixture
    expect(new Set(json.sets.map((s) => s.static_breakdown_voltage_V)).size).toBe(5);
  });
});

describe('the spread of the yield', () => {
  test('is shown by what it does to V_s, in closed form', () => {
    const out = checked([spread]);
    expect(out).toContain(`V_s over the yields ${V(0.16)} to ${V(0.02)} (yield 0.16 to 0.02)`);
    expect(out).toContain('ion yield 0.07 (given: 0.02 to 0.16)');
    expect(out).toMatch(/space charge, by yield [\d.]+ \S+ to never/);
    expect(out).toContain('the yield decides whether the gap holds 230 V: they lie between');
    expect(checked([])).not.toMatch(/over the yields|the yield decides/);
    expect(checked([spread, 'supply.voltage.step=400 V'])).not.toContain('the yield decides');
  });

  test('of a law is told in factors', () => {
    const law = 'electrodes.left.ion_yield={ table: { file: y.csv, reduced_field: EN, yield: gamma }, low: 0.5, high: 2 }';
    const out = checked([law]);
    expect(out).toContain('ion yield by the field at the wall, times 0.5 to 2');
    expect(out).toContain(`V_s over the yields ${V(0.14)} to ${V(0.035)} (yield 2 to 0.5 times its law, 0.07 at V_s)`);
    const json = yieldJson(load([law]).case, 230) as Record<'low' | 'high', { factor: number; at_breakdown: number }>;
    expect(json.low.factor).toBe(0.5);
    expect(json.low.at_breakdown).toBeCloseTo(0.035, 12);
    expect(
      checked(inGas('{ name: argon, pressure: 3 Torr }', 'electrodes.left.material=nickel', 'electrodes.left.surface=technical')),
    ).toContain('nickel, technical surface, ion yield by the energy of the ions at the wall, times 0.667 to 1.5');
  });

  test('stands in JSON with V_s at each end and whether the verdict depends on it', () => {
    expect(yieldJson(load([]).case, 230)).toBeNull();
    const json = yieldJson(load([spread]).case, 230) as { high: { static_breakdown_voltage_V: number; time_to_space_charge_s: number } };
    expect(json).toMatchObject({
      cathode: 'left',
      low: { ion_yield: 0.02, time_to_space_charge_s: null },
      typical: { ion_yield: 0.07 },
      verdict_depends_on_it: true,
    });
    expect(json.high.static_breakdown_voltage_V).toBeCloseTo(exponentialBreakdownVoltage(12, 180, 3, 0.16) ?? Number.NaN, 6);
    expect(json.high.time_to_space_charge_s).toBeGreaterThan(0);
    expect(yieldJson(load([spread]).case, 400)).toMatchObject({ verdict_depends_on_it: false });
  });

  test('is in the first sentence of a run whose verdict it decides, and what it does in the next', () => {
    const out = ran([spread]);
    expect(out).toMatch(/^Breaks down \((glow|dark)\) with the typical ion yield: The gap broke down/);
    expect(out.replace(/\s+/g, ' ')).toContain(
      `The yield decides: with an ion yield of 0.16 the gap breaks down at ${V(0.16)}, with 0.02 at ${V(0.02)}; the 230 V lie between (closed form, not simulated).`,
    );
    expect(out).toMatch(new RegExp(`over the ion yields +${V(0.16)} to ${V(0.02)}`));
    const holds = ran([spread, 'supply.voltage.step=200 V']);
    expect(holds).toMatch(/^Holds with the typical ion yield: The highest voltage/);
  });

  test('leaves the first sentence alone where every yield leads to the same', () => {
    for (const overrides of [[], [spread, 'supply.voltage.step=300 V']]) {
      const out = ran(overrides);
      expect(out).toMatch(/^Breaks down \((glow|dark)\): /);
      expect(out).not.toContain('The yield decides');
    }
  });
});
