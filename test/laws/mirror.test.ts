/** The mirror image of a gap does the same with the signs of V and I turned. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import type { GapSystem } from '../../src/march/gap-system.ts';
import type { Observer } from '../../src/march/march.ts';
import { simulateNow } from '../../src/simulate.ts';
import type { Programme } from '../../src/supply/settings.ts';
import { caseOf, rightOfMinimum } from '../help/plain-gap.ts';
import { rigOf, run } from '../help/rig.ts';
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

/** scalars and profiles at one time */
interface Frame {
  readonly scalars: readonly number[];
  readonly profiles: readonly Float64Array[];
}

/** Steps that a run is asked for at least: so many that almost all of them end where they are asked to. Where steps end by their error
 *  estimates, rounding in these moves the ends, each step further than the last (up to 1e-5 of a step while a field reverses), and with them
 *  the solution by that share of a step's own error. */
const STEPS = 3000;

/** The run at 60 even times.
 *  @param sign −1 turns what changes sign in the mirror image, and reverses profiles */
function follow(settings: Case, sign: 1 | -1): Frame[] {
  const frames: Frame[] = [];
  const times = Array.from({ length: 60 }, (_, i) => ((i + 1) * settings.observe.until) / 60);
  const watch = (system: GapSystem): Observer => {
    const { layout } = system;
    const y = new Float64Array(layout.size);
    const profile = (from: number, length: number, factor: number): Float64Array => {
      const copy = y.slice(from, from + length).map((v) => factor * v);
      return sign < 0 ? copy.reverse() : copy;
    };
    const spacing = settings.observe.until / STEPS;
    return {
      nextTime: (t) => (Math.floor(t / spacing + 1e-6) + 1) * spacing,
      look: (step) => {
        while (frames.length < times.length && times[frames.length] <= step.end.time) {
          const t = times[frames.length];
          step.stateAt(t, y);
          const current = step.currentOf(t, y);
          frames.push({
            scalars: [sign * y[layout.voltage], sign * current, sign * step.openGapAt(t)],
            // E is an x-component: it turns too; densities do not
            profiles: [
              ...Array.from({ length: layout.species }, (_, k) => profile(k * layout.row + layout.first, layout.cells, 1)),
              profile(layout.field, layout.cells + 1, sign),
            ],
          });
        }
        return false;
      },
    };
  };
  run(rigOf(settings, (system) => [watch(system)]));
  return frames;
}

const largestOf = (values: Float64Array): number => values.reduce((most, v) => Math.max(most, Math.abs(v)), 0);

const withWalls = (settings: Case, left: number, right: number): Case => {
  const wall = (typical: number): Case['electrodes']['left'] => ({
    ...settings.electrodes.left,
    ionYield: { ...settings.electrodes.left.ionYield, typical },
  });
  return { ...settings, electrodes: { left: wall(left), right: wall(right) } };
};

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
  ],
  [
    'released electrons and a trip on stored charge',
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
  ],
];

describe('the mirror image of a gap', () => {
  for (const [name, settings] of CASES) {
    it(`does the same at every time within 1e-9: ${name}`, () => {
      const one = follow(settings, 1);
      const other = follow(mirrored(settings), -1);
      expect(one.length).toBe(60);
      expect(other.length).toBe(60);
      const scalarScales = one[0].scalars.map((_, i) => Math.max(...one.map((f) => Math.abs(f.scalars[i]))));
      const profileScales = one[0].profiles.map((_, i) => Math.max(...one.map((f) => largestOf(f.profiles[i]))));
      one.forEach((frame, n) => {
        frame.scalars.forEach((value, i) => {
          expect(Math.abs(other[n].scalars[i] - value), `scalar ${i}, frame ${n}`).toBeLessThanOrEqual(1e-9 * scalarScales[i]);
        });
        frame.profiles.forEach((values, i) => {
          const off = values.reduce((most, v, x) => Math.max(most, Math.abs(other[n].profiles[i][x] - v)), 0);
          expect(off, `profile ${i}, frame ${n}`).toBeLessThanOrEqual(1e-9 * profileScales[i]);
          // and against the profile of that instant, which rounding of larger ones before it still blurs where a discharge dies away
          expect(off, `profile ${i}, frame ${n}`).toBeLessThanOrEqual(1e-8 * largestOf(values) + 1e-13 * profileScales[i]);
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
