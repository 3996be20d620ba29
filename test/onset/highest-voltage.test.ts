import { describe, expect, it } from 'vitest';
import { highestOpenGapVoltage } from '../../src/onset/highest-voltage.ts';
import { type Changes, openCaseWith, outcomeOf, ramp, step, table, V_S } from './set-up.ts';

const C = 100e-12 + 8.8541878128e-12 * 0.1;
const highest = (changes: Changes): number => highestOpenGapVoltage(openCaseWith(changes));

describe('the highest open-gap voltage', () => {
  it('of a step is what the gap has charged to by the end of the run', () => {
    expect(highest({ supply: { programme: step(200) } })).toBeCloseTo(200, 9);
    expect(highest({ supply: { programme: step(-200) } })).toBeCloseTo(-200, 9);
    const slow = { supply: { programme: step(200), seriesResistance: 1e9 }, observe: { until: 50e-3 } };
    expect(highest(slow)).toBeCloseTo(200 * (1 - Math.exp(-50e-3 / (1e9 * C))), 6);
  });

  it('of a ramp lags behind the supply by RC', () => {
    const [R, rate, until] = [1e8, 1e3, 0.1];
    expect(highest({ supply: { programme: ramp(500, rate), seriesResistance: R }, observe: { until } })).toBeCloseTo(
      rate * (until - R * C * (1 - Math.exp(-until / (R * C)))),
      6,
    );
  });

  it('of a pulse behind a resistance is reached after its apex, where gap and supply meet', () => {
    const [R, top, rise] = [1e7, 150, 2e-3];
    const tau = R * C;
    const slope = top / rise;
    const atApex = slope * (rise - tau * (1 - Math.exp(-rise / tau)));
    const c = atApex - top - slope * tau;
    const s = tau * Math.log(-c / (slope * tau));
    const programme = table([0, 0], [rise, top], [2 * rise, 0]);
    expect(highest({ supply: { programme, seriesResistance: R }, observe: { until: 10e-3 } })).toBeCloseTo(top - slope * s, 6);
  });

  it('counts what the gap holds at the start, but not behind a supply without resistance, which sets it at once', () => {
    expect(highest({ supply: { programme: step(50), initialGapVoltage: -180 } })).toBe(-180);
    expect(highest({ supply: { programme: step(50), initialGapVoltage: -180, seriesResistance: 0 } })).toBe(50);
  });

  it('is the first of two that are equal', () => {
    const swing = (sign: number): Changes => ({
      supply: { programme: table([0, 0], [1e-4, sign * 150], [3e-4, -sign * 150], [4e-4, 0]), seriesResistance: 0 },
    });
    expect(highest(swing(1))).toBeCloseTo(150, 9);
    expect(highest(swing(-1))).toBeCloseTo(-150, 9);
  });

  it('is that at which a run evaluates the theory', () => {
    for (const changes of [
      { supply: { programme: step(0.9 * V_S), currentLimit: 1e-4 } },
      { supply: { programme: table([0, 0], [1e-3, 150], [2e-3, -170]), seriesResistance: 3e6 } },
      { supply: { programme: ramp(-180, 1e5), seriesResistance: 1e6 } },
      { supply: { programme: step(100), initialGapVoltage: 150 } },
    ] satisfies Changes[]) {
      expect(outcomeOf(changes).theory.overvoltage).toBeCloseTo(Math.abs(highest(changes)) / V_S - 1, 6);
    }
  });
});
