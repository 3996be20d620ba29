import { describe, expect, it } from 'vitest';
import type { Findings } from '../../src/onset/findings.ts';
import { judge } from '../../src/onset/judge.ts';
import type { Onset } from '../../src/onset/outcome.ts';
import type { Polarity } from '../../src/onset/polarity.ts';

const noOnset: Onset = {
  threshold_time_s: null,
  space_charge_time_s: null,
  collapse_time_s: null,
  formative_lag_s: null,
  lag_ends_at: null,
  gap_voltage_V: null,
  growth_rate_per_s: null,
};
const collapsed: Onset = {
  threshold_time_s: 2e-6,
  space_charge_time_s: 7e-5,
  collapse_time_s: 8.2e-5,
  formative_lag_s: 8e-5,
  lag_ends_at: 'collapse',
  gap_voltage_V: 207,
  growth_rate_per_s: 1e5,
};
const gap: Polarity = { cathode: null, largest: 150, breakdown: 200, upper: null, lowest: { voltage: 200, path: 0.01 } };

/** a quiet gap at three quarters of V_s, unless told otherwise */
type Changes = Partial<Omit<Findings, 'end'>> & { readonly end?: Partial<Findings['end']> };
const judged = ({ end, ...changes }: Changes): ReturnType<typeof judge> =>
  judge({
    brokeDown: false,
    arcRisk: false,
    largestDistortion: 0,
    onset: noOnset,
    oscillation: null,
    supplyChanges: false,
    above: { time: 0, stretches: 0, decades: null },
    trip: null,
    end: {
      stop: 'steady',
      time: 1e-3,
      current: 1e-9,
      voltage: 150,
      loaded: false,
      selfSustaining: false,
      feedback: 0.5,
      distortion: 0,
      growth: 0,
      theoreticalGrowth: -1e4,
      ...end,
    },
    ionTransit: 1e-5,
    largestGapVoltage: 150,
    stillCharging: false,
    polarities: [gap],
    thresholdOutsideData: false,
    overvoltage: -0.25,
    breakdownUncertainty: 0.2,
    ...changes,
  });
const reasonOf = (changes: Changes): string => judged(changes).reason;

describe('the order of the verdicts', () => {
  const open = { end: { feedback: 1.2, stop: 'until' as const } };
  it('puts a breakdown before everything', () => {
    expect(judged({ ...open, brokeDown: true, onset: collapsed, thresholdOutsideData: true, overvoltage: 0.1 }).state).toBe('breaks-down');
    expect(judged({ brokeDown: true, onset: collapsed, end: { stop: 'interrupted' } }).state).toBe('breaks-down');
  });

  it('puts a steady discharge that sustains itself next', () => {
    expect(judged({ end: { selfSustaining: true }, trip: { time: 1e-6, byCharging: false, timeAbove: 0 } }).state).toBe('breaks-down');
    expect(judged({ end: { selfSustaining: true, stop: 'until' } }).state).toBe('undecided');
  });

  it('puts doubt before a hold', () => {
    expect(judged(open).state).toBe('undecided');
    expect(judged({}).state).toBe('holds');
  });
});

describe('the regime', () => {
  it('is the furthest reached', () => {
    expect(judged({ largestDistortion: 0.09 }).regime).toBe('dark');
    expect(judged({ largestDistortion: 0.1 }).regime).toBe('glow');
    expect(judged({ largestDistortion: 0.5, arcRisk: true }).regime).toBe('arc-risk');
  });
});

describe('the reason of a breakdown', () => {
  const broken = (changes: Changes): string => reasonOf({ brokeDown: true, onset: collapsed, ...changes });
  const start = 'The gap broke down 80 µs after threshold, when its voltage fell through 207 V';

  it.each<[string, Changes, string]>([
    ['steady', { end: { current: 4.38e-3, voltage: 186, selfSustaining: true } }, `${start}; a steady discharge carries 4.38 mA at 186 V.`],
    [
      'still going',
      { end: { stop: 'until', current: 4e-3, voltage: 190, selfSustaining: true } },
      `${start}; it carries 4 mA at 190 V at the end.`,
    ],
    ['ceasing', { end: { stop: 'until' } }, `${start}; at the end it no longer sustains itself.`],
    [
      'oscillating',
      { oscillation: { period_s: 4.7e-3, amplitude_V: 30 }, end: { stop: 'until' } },
      `${start}; it fires again every 4.7 ms.`,
    ],
    [
      'following an alternating supply',
      { oscillation: { period_s: 4e-4, amplitude_V: 30 }, supplyChanges: true, end: { stop: 'until' } },
      `${start}; the gap voltage repeats every 400 µs.`,
    ],
    ['died out', { end: { stop: 'died-out' } }, `${start}; the discharge died out by 1 ms.`],
    [
      'tripped',
      { end: { stop: 'tripped-out' }, trip: { time: 9e-5, byCharging: false, timeAbove: 8e-5 } },
      `${start}; the trip acted at 90 µs; the discharge died out by 1 ms.`,
    ],
    [
      'tripped before',
      { end: { stop: 'tripped-out' }, trip: { time: 3e-5, byCharging: false, timeAbove: 2e-5 } },
      'After the trip at 30 µs the charge stored across the gap broke it down 80 µs after threshold, when its voltage fell through 207 V; the discharge died out by 1 ms.',
    ],
    [
      'tripped by recharging',
      { end: { stop: 'until' }, trip: { time: 9e-4, byCharging: true, timeAbove: 8e-5 } },
      `${start}; the supply was tripped by charging current at 900 µs; the discharge no longer sustains itself.`,
    ],
    [
      'in the range of arcs',
      { arcRisk: true, end: { stop: 'model-limit', current: 1.5, voltage: 300 } },
      `${start}; it carries 1.5 A at 300 V, in the range of arcs, where the model ends.`,
    ],
    ['interrupted', { end: { stop: 'interrupted' } }, `${start}; the run was interrupted at 1 ms.`],
    ['failed', { end: { stop: 'failed' } }, `${start}; the simulation could not go on past 1 ms.`],
    [
      'without collapse, at negative voltage',
      { onset: { ...collapsed, collapse_time_s: null, lag_ends_at: 'space-charge', gap_voltage_V: -230 } },
      'The gap broke down 80 µs after threshold, when space charge set in at 230 V; a steady discharge carries 1 nA at 150 V.',
    ],
    [
      'carried by the seed',
      { onset: { ...noOnset, space_charge_time_s: 7e-6 } },
      'Space charge took over at 7 µs although the feedback never reached 1: so strong a seed lowers the threshold; a steady discharge carries 1 nA at 150 V.',
    ],
  ])('%s', (_name, changes, sentence) => {
    expect(broken(changes)).toBe(sentence);
  });

  it('of a Townsend discharge tells that it does not change the field', () => {
    expect(reasonOf({ end: { selfSustaining: true, current: 2e-8, voltage: 209 } })).toBe(
      'A self-sustaining Townsend discharge of 20 nA settles at 209 V, too weak to change the field.',
    );
  });
});

describe('the reason of a hold', () => {
  const sided = (cathode: 'left' | 'right', largest: number, breakdown: number): Polarity => ({
    ...gap,
    cathode,
    largest,
    breakdown,
    lowest: { voltage: breakdown, path: 0.01 },
  });

  it.each<[string, Changes, string]>([
    ['below', {}, 'The highest voltage, 150 V, stays 25 % below the breakdown voltage of 200 V.'],
    [
      'just below, with digits enough to tell',
      { polarities: [{ ...gap, largest: 199.8 }] },
      'The highest voltage, 199.8 V, stays 0.1 % below the breakdown voltage of 200 V.',
    ],
    [
      'of one electrode',
      { polarities: [sided('right', 150, 200), sided('left', 100, 300)] },
      'The highest voltage, 150 V with the right electrode as cathode, stays 25 % below the breakdown voltage of 200 V.',
    ],
    [
      'below that of a longer path',
      { polarities: [{ ...gap, lowest: { voltage: 180, path: 0.03 } }] },
      'The highest voltage, 150 V, stays 16.7 % below the 180 V from which on a path of 30 mm breaks down.',
    ],
    [
      'still charging',
      { stillCharging: true },
      'The highest voltage, 150 V, stays 25 % below the breakdown voltage of 200 V, with the gap still charging at the end.',
    ],
    [
      'loaded',
      { polarities: [{ ...gap, largest: 230 }], largestGapVoltage: 195 },
      'Loaded by the current that the seed draws, the gap saw at most 195 V of 230 V, below its breakdown voltage of 200 V.',
    ],
    [
      'above the upper breakdown voltage',
      { polarities: [{ ...gap, largest: 5000, upper: 4000 }] },
      'The voltage went straight to 5 kV, above the 4 kV from which on the feedback is below 1 again.',
    ],
    [
      'where nothing breaks it down',
      { polarities: [{ ...gap, breakdown: null, lowest: null }] },
      'No voltage up to 1e4 Td sustains a discharge over this gap; the highest was 150 V.',
    ],
    ['without voltage', { polarities: [{ ...gap, largest: 0 }] }, 'No voltage was applied.'],
    [
      'after a time above threshold',
      { above: { time: 3.75e-5, stretches: 1, decades: 2.46 } },
      'The voltage was above threshold for 37.5 µs, in which the current rose by 2.5 decades: space charge did not set in.',
    ],
    [
      'after several',
      { above: { time: 3.75e-5, stretches: 3, decades: 2.46 } },
      'The voltage was above threshold for 37.5 µs, in 3 stretches, in one of which the current rose by 2.5 decades: space charge did not set in.',
    ],
    [
      'after one in which nothing grew',
      { above: { time: 1e-8, stretches: 1, decades: null } },
      'The voltage was above threshold for 10 ns: space charge did not set in.',
    ],
    [
      'after space charge without a discharge',
      { above: { time: 1e-5, stretches: 1, decades: 1 }, onset: { ...noOnset, threshold_time_s: 0, space_charge_time_s: 1e-6 } },
      'The voltage was above threshold for 10 µs, in which the current rose by 1.0 decades: no discharge sustained itself.',
    ],
  ])('%s', (_name, changes, sentence) => {
    const verdict = judged(changes);
    expect(verdict.state).toBe('holds');
    expect(verdict.reason).toBe(sentence);
  });
});

describe('the reason of a doubt', () => {
  it.each<[string, Changes, string]>([
    ['interrupted', { end: { stop: 'interrupted' } }, 'Interrupted at 1 ms, before breakdown; nothing can be said of what follows.'],
    [
      'failed',
      { end: { stop: 'failed' } },
      'The simulation could not go on past 1 ms, before breakdown; nothing can be said of what follows.',
    ],
    ['beyond the model', { end: { stop: 'model-limit' } }, 'At 1 ms the current left the range of the model, before breakdown.'],
    [
      'tripped',
      { trip: { time: 3e-5, byCharging: false, timeAbove: 2e-5 } },
      'The trip acted at 30 µs, after 20 µs above threshold and before space charge set in.',
    ],
    [
      'tripped by charging',
      { trip: { time: 3e-7, byCharging: true, timeAbove: 0 } },
      'The supply was tripped by charging current at 300 ns, before the gap reached its breakdown voltage.',
    ],
    [
      'outside the data',
      { thresholdOutsideData: true, overvoltage: -0.15 },
      'E/N at the breakdown voltage lies outside the data of ionisation, and the highest voltage is within 20 % of it.',
    ],
    [
      'of a longer path',
      { polarities: [{ ...gap, largest: 190, lowest: { voltage: 180, path: 0.03 } }] },
      'The gap itself holds, but a path of 30 mm breaks down from 180 V on, and the highest voltage was 190 V.',
    ],
    [
      'of a longer path where the gap itself never breaks down',
      { polarities: [{ ...gap, breakdown: null, largest: 190, lowest: { voltage: 180, path: 0.03 } }] },
      'The gap itself holds, but a path of 30 mm breaks down from 180 V on, and the highest voltage was 190 V.',
    ],
    [
      'growing above threshold',
      { end: { feedback: 2, distortion: 1e-3, growth: 1, theoreticalGrowth: 1e5 } },
      `The gap is above threshold at the end and space charge needs about 46 µs more: extend observe.until.`,
    ],
    [
      'above threshold, not yet growing',
      { end: { feedback: 2, distortion: 1e-3, growth: null, theoreticalGrowth: 2e5 } },
      `The gap is above threshold at the end and space charge needs about 23 µs more: extend observe.until.`,
    ],
    [
      'above threshold, who knows how long',
      { end: { feedback: 1.1, theoreticalGrowth: 1e3 } },
      'The gap is above threshold at the end: extend observe.until.',
    ],
    [
      'above threshold without charge',
      { end: { feedback: 2, current: 0, growth: null } },
      'The gap is above threshold at the end, but no charge has started to multiply: extend observe.until.',
    ],
    [
      'growing below threshold',
      { end: { stop: 'until', growth: Math.log(1.1), theoreticalGrowth: -1e4 } },
      `The current still grows at the end, by 10 % in an ion transit; to settle it needs about 230 µs more: extend observe.until.`,
    ],
    [
      'held at the threshold by the circuit',
      { end: { stop: 'until', selfSustaining: true, loaded: true, current: 2e-8, feedback: 1.001, growth: 0.02 } },
      'A discharge of 20 nA sustains itself at the end without having settled: extend observe.until.',
    ],
    [
      'sustaining itself without having settled',
      { end: { stop: 'until', selfSustaining: true, current: 2e-8 } },
      'A discharge of 20 nA sustains itself at the end without having settled: extend observe.until.',
    ],
  ])('%s', (_name, changes, sentence) => {
    const verdict = judged(changes);
    expect(verdict.state).toBe('undecided');
    expect(verdict.reason).toBe(sentence);
  });

  it('is none where the data end but the voltage is far from V_s', () => {
    expect(judged({ thresholdOutsideData: true, overvoltage: -0.25 }).state).toBe('holds');
  });

  it('is none where a trip came after space charge', () => {
    const onset = { ...noOnset, space_charge_time_s: 1e-5 };
    expect(judged({ trip: { time: 2e-5, byCharging: false, timeAbove: 0 }, onset }).state).toBe('holds');
  });

  it('is none where the current grows by less than 1 % in an ion transit', () => {
    expect(judged({ end: { stop: 'until', growth: 0.009 } }).state).toBe('holds');
    expect(judged({ end: { stop: 'until', growth: 0.011 } }).state).toBe('undecided');
  });
});
