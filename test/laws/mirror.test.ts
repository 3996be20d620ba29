/** The mirror image of a gap does the same with the signs of V and I turned. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import type { Outcome } from '../../src/onset/outcome.ts';
import { simulateNow } from '../../src/simulate.ts';
import type { Programme } from '../../src/supply/settings.ts';
import { caseOf, rightOfMinimum } from '../help/plain-gap.ts';
import { coefficient } from '../theory/make-case.ts';

function turned(programme: Programme): Programme {
  switch (programme.kind) {
    case 'step':
      return { ...programme, voltage: -programme.voltage };
    case 'ramp':
      return { ...programme, from: -programme.from, to: -programme.to };
    case 'table':
      return { ...programme, voltages: programme.voltages.map((v) => -v) };
  }
}

function mirrored(settings: Case): Case {
  const { electrodes, supply } = settings;
  return {
    ...settings,
    electrodes: { left: electrodes.right, right: electrodes.left },
    supply: { ...supply, programme: turned(supply.programme), initialGapVoltage: -supply.initialGapVoltage },
  };
}

interface Followed {
  readonly outcome: Outcome;
  readonly frames: readonly { readonly scalars: readonly number[]; readonly profiles: readonly Float64Array[] }[];
}

/** @param sign −1 turns what changes sign in the mirror image, and reverses profiles */
function follow(settings: Case, sign: 1 | -1): Followed {
  const frames: Followed['frames'][number][] = [];
  const profile = (a: Float64Array, factor: number): Float64Array => {
    const copy = a.map((v) => factor * v);
    return sign < 0 ? copy.reverse() : copy;
  };
  const outcome = simulateNow(settings, {
    snapshot: (s) =>
      frames.push({
        scalars: [s.time, sign * s.gapVoltage, sign * s.conductionCurrent, sign * s.supplyCurrent, s.gapEnergy, s.sourceEnergy],
        // E and the fluxes are x-components: they turn too; densities do not
        profiles: [profile(s.electronDensity, 1), profile(s.ionDensity, 1), profile(s.electricField, sign), profile(s.ionFlux, sign)],
      }),
  });
  return { outcome, frames };
}

const withWalls = (settings: Case, left: number, right: number): Case => {
  const wall = (typical: number): Case['electrodes']['left'] => ({
    ...settings.electrodes.left,
    ionYield: { ...settings.electrodes.left.ionYield, typical },
  });
  return { ...settings, electrodes: { left: wall(left), right: wall(right) } };
};

/** Where a dense plasma stays while the field turns, rounding is magnified by the turn of every upwind stencil: on default settings 1.4e-9 of the
 *  largest density is seen there, with a tighter tolerance less than the bar. */
const finer = (settings: Case): Case => ({ ...settings, numerics: { cells: null, tolerance: 3e-4 } });

const CASES: readonly (readonly [string, Case])[] = [
  [
    'a step to a glow, with unlike walls',
    withWalls(
      caseOf(rightOfMinimum, {
        supply: { programme: { kind: 'step', voltage: 240, riseTime: 0 }, seriesResistance: 1e4, parallelCapacitance: 100e-12 },
        observe: { until: 2e-4, currents: [1e-6, 1e-3] },
      }),
      0.07,
      0.02,
    ),
  ],
  [
    'a table that changes sign midway, with unlike walls, attachment and recombination',
    finer(
      withWalls(
        caseOf(
          { ...rightOfMinimum, attachment: 0.2 },
          {
            seed: { cathodeCurrent: 1e-9 },
            supply: {
              programme: { kind: 'table', times: [0, 1e-5, 1e-4, 1.2e-4, 2.5e-4], voltages: [0, 280, 280, -300, -300] },
              seriesResistance: 2e4,
              parallelCapacitance: 20e-12,
            },
            observe: { until: 2.5e-4, currents: [1e-6, 1e-3] },
            coefficients: {
              electronIonRecombination: coefficient({ kind: 'constant', value: 1e-13 }),
              ionIonRecombination: coefficient({ kind: 'constant', value: 1e-13 }),
            },
          },
        ),
        0.07,
        0.1,
      ),
    ),
  ],
  [
    'released electrons and a trip on stored charge',
    finer(
      withWalls(
        caseOf(rightOfMinimum, {
          seed: { cathodeCurrent: 0, electrons: 1000 },
          supply: {
            programme: { kind: 'step', voltage: 250, riseTime: 0 },
            seriesResistance: 1e5,
            parallelCapacitance: 200e-12,
            initialGapVoltage: 230,
            trip: { current: 1e-3, delay: 1e-6, senses: 'gap', action: 'zero' },
          },
          observe: { until: 2e-4, currents: [1e-6, 1e-3] },
        }),
        0.07,
        0.02,
      ),
    ),
  ],
];

describe('the mirror image of a gap', () => {
  for (const [name, settings] of CASES) {
    it(`does the same at every snapshot within 1e-9: ${name}`, () => {
      const one = follow(settings, 1);
      const other = follow(mirrored(settings), -1);
      expect(other.frames.length).toBe(one.frames.length);
      const scale = (pick: (f: Followed['frames'][number]) => number): number => Math.max(...one.frames.map((f) => Math.abs(pick(f))));
      const scalarScales = one.frames[0].scalars.map((_, i) => scale((f) => f.scalars[i]));
      const largestOf = (values: Float64Array): number => values.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
      const profileScales = one.frames[0].profiles.map((_, i) => scale((f) => largestOf(f.profiles[i])));
      one.frames.forEach((frame, n) => {
        frame.scalars.forEach((value, i) => {
          expect(Math.abs(other.frames[n].scalars[i] - value), `scalar ${i} at ${frame.scalars[0]} s`).toBeLessThanOrEqual(
            1e-9 * scalarScales[i],
          );
        });
        frame.profiles.forEach((values, i) => {
          const off = values.reduce((most, v, x) => Math.max(most, Math.abs(other.frames[n].profiles[i][x] - v)), 0);
          const where = `profile ${i} at ${frame.scalars[0]} s`;
          expect(off, where).toBeLessThanOrEqual(1e-9 * profileScales[i]);
          // and against the profile of that instant, which rounding of larger ones before it still blurs where a discharge dies away
          expect(off, where).toBeLessThanOrEqual(1e-8 * largestOf(values) + 1e-13 * profileScales[i]);
        });
      });
    });

    it(`has the same onset, peak and verdict: ${name}`, () => {
      const a = simulateNow(settings);
      const b = simulateNow(mirrored(settings));
      expect(b.verdict.state).toBe(a.verdict.state);
      expect(b.verdict.regime).toBe(a.verdict.regime);
      expect(a.verdict.state).toBe('breaks-down');
      const pairs: [string, number | null, number | null][] = [
        ['collapse time', a.onset.collapse_time_s, b.onset.collapse_time_s],
        ['space-charge time', a.onset.space_charge_time_s, b.onset.space_charge_time_s],
        ['peak time', a.peak.time_s, b.peak.time_s],
        ['peak current', a.peak.current_A, -b.peak.current_A],
        ['voltage at the peak', a.peak.gap_voltage_V, -b.peak.gap_voltage_V],
        ['final voltage', a.final.gap_voltage_V, -b.final.gap_voltage_V],
        ['source energy', a.energy.source_J, b.energy.source_J],
        ...a.currents.map((c, i): [string, number | null, number | null] => [`crossing of ${c.level_A} A`, c.time_s, b.currents[i].time_s]),
      ];
      for (const [what, x, y] of pairs) {
        if (x === null) expect(y, what).toBeNull();
        else expect(Math.abs((y ?? Number.NaN) / x - 1), what).toBeLessThan(1e-9);
      }
    });
  }
});
