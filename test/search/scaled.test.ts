import { describe, expect, it } from 'vitest';
import { driveOf } from '../../src/search/open-gap.ts';
import { largestVoltage, scaled } from '../../src/search/scaled.ts';
import { openCaseWith, ramp, step, table } from '../onset/set-up.ts';

describe('a case scaled to a voltage', () => {
  it('steps to that voltage with the sign and rise time it had', () => {
    expect(scaled(openCaseWith({ supply: { programme: step(-230, 1e-6) } }), 460).supply.programme).toEqual(step(-460, 1e-6));
  });

  it('ramps between scaled ends in the time it took', () => {
    const { programme } = scaled(openCaseWith({ supply: { programme: ramp(-400, 50, -100) } }), 800).supply;
    expect(programme).toEqual(ramp(-800, 100, -200));
  });

  it('keeps a ramp down to a lower voltage in proportion', () => {
    const { programme } = scaled(openCaseWith({ supply: { programme: ramp(50, 10, -200) } }), 100).supply;
    expect(programme).toEqual(ramp(25, 5, -100));
  });

  it('scales every row of a table and keeps its times, to the very voltage asked for', () => {
    const { programme } = scaled(
      openCaseWith({ supply: { programme: table([0, 0], [1e-6, 0.3], [2e-6, -0.7], [3e-6, 0.1]) } }),
      1234.5678,
    ).supply;
    expect(programme).toMatchObject({ times: [0, 1e-6, 2e-6, 3e-6] });
    expect(largestVoltage({ ...openCaseWith().supply, programme })).toBe(1234.5678);
    expect(programme.kind === 'table' && programme.voltages[1] / programme.voltages[2]).toBeCloseTo(-3 / 7, 14);
  });

  it('scales what the gap holds at the start too, which may be the largest voltage of all', () => {
    const { supply } = scaled(openCaseWith({ supply: { programme: step(100), initialGapVoltage: -250 } }), 500);
    expect(supply.initialGapVoltage).toBe(-500);
    expect(supply.programme).toEqual(step(200));
  });

  it('drives the open gap in proportion at every instant, so that one number says how hard', () => {
    const settings = openCaseWith({
      supply: { programme: ramp(300, 1e6, 40), initialGapVoltage: 120, seriesResistance: 1e6 },
      observe: { until: 2e-4 },
    });
    const [once, thrice] = [driveOf(settings), driveOf(scaled(settings, 900))];
    for (const key of ['highest', 'lowest', 'largest', 'last', 'later'] as const) expect(thrice[key]).toBeCloseTo(3 * once[key], 9);
  });

  it('shares gas, gap and electrodes with the case it comes from, so that what theory knows of them is found once', () => {
    const settings = openCaseWith();
    const other = scaled(settings, 400);
    expect(other.gas).toBe(settings.gas);
    expect(other.gap).toBe(settings.gap);
    expect(other.electrodes).toBe(settings.electrodes);
  });

  it('is refused where the supply never leaves 0 V', () => {
    expect(() => scaled(openCaseWith({ supply: { programme: step(0) } }), 400)).toThrow(RangeError);
  });
});
