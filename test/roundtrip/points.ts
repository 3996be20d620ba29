import type { Outcome } from '../../src/onset/outcome.ts';
import type { ScanPoint } from '../../src/results/scan-variables.ts';
import { type ScanAbout, writeScanFile } from '../../src/results/scan-write.ts';
import type { Axis } from '../../src/study.ts';

/** Scans made up for tests of files: no physics. */

export const axis = (path: string, unit: string, values: readonly number[]): Axis => ({ path, unit, values: Float64Array.from(values) });

export function about(axes: readonly Axis[], more: Partial<ScanAbout> = {}): ScanAbout {
  return {
    title: 'Made up',
    version: '1.2.3',
    study: 'c'.repeat(64),
    axes,
    find: null,
    layout: { kind: 'grid' },
    total: axes.reduce((product, { values }) => product * values.length, 1),
    shard: null,
    caseText: 'title: Made up\n',
    coefficientsJson: '{}',
    tablesJson: '[]',
    ...more,
  };
}

/** The point with a number: every seventh failed, values of all kinds among the others. */
export function point(index: number, find: ScanAbout['find'] = null, values: readonly number[] = []): ScanPoint {
  if (index % 7 === 3) {
    const error = { code: 'simulation-failed', text: `no step is small enough, "point ${index}"` } as const;
    return { index, id: `${index}`.padStart(64, '0'), values, outcome: null, error, found: null };
  }
  const breaksDown = index % 3 === 0;
  const outcome: Outcome = {
    format: 'gapwake.outcome/1',
    title: 'Made up',
    version: '1.2.3',
    case_sha256: `${index}`.padStart(64, '0'),
    verdict: {
      state: breaksDown ? 'breaks-down' : 'holds',
      regime: breaksDown ? 'glow' : 'dark',
      self_sustaining: breaksDown,
      reason: `Because ${index}.`,
    },
    theory: {
      static_breakdown_voltage_V: 200 + index / 8,
      upper_breakdown_voltage_V: null,
      lowest_over_paths_V: 190,
      paschen_minimum_V: 111,
      paschen_minimum_pd_Pa_m: 0.8,
      overvoltage: index / 100 - 0.5,
      pd_Pa_m: 4,
      reduced_field_Td: 300,
      alpha_d: 2.5,
      feedback: 0.9,
      growth_rate_per_s: -1e4,
      steady_amplification: 12,
    },
    onset: {
      threshold_time_s: breaksDown ? 1e-6 : null,
      space_charge_time_s: breaksDown ? 5e-5 : null,
      collapse_time_s: null,
      formative_lag_s: breaksDown ? 4.9e-5 + index * 1e-9 : null,
      lag_ends_at: breaksDown ? 'space-charge' : null,
      gap_voltage_V: breaksDown ? 205 : null,
      growth_rate_per_s: breaksDown ? 2e5 : null,
    },
    oscillation: null,
    peak: { current_A: 1e-3 * index, time_s: 6e-5, gap_voltage_V: 200 },
    final: { time_s: 2e-3, stop: 'steady', gap_voltage_V: 180, current_A: 1e-4, cathode_field_V_per_m: 1e5, cathode_layer_m: null },
    energy: { gap_J: 1e-6, source_J: 2e-6, after_trip_J: null },
    currents: [],
    cautions: breaksDown
      ? [
          { code: 'edges', text: 'µ', value: 1 },
          { code: 'defaults', text: 'b', value: null },
        ]
      : [],
    numerics: {
      cells: 140,
      tolerance: 1e-3,
      steps: 100,
      rejected: 1,
      newton: 600,
      wall_s: 0.02,
      charge_defect: 1e-16,
      worst_undershoot: 0,
    },
  };
  const found =
    find === null
      ? null
      : ({
          what: find,
          state: 'found',
          value: 150 + index,
          unit: 'V',
          lower: 150 + index,
          upper: 151 + index,
          theory: null,
          runs: 12,
          changes: [],
          note: null,
        } as const);
  return { index, id: outcome.case_sha256, values, outcome, error: null, found };
}

export async function writePoints(path: string, what: ScanAbout, points: readonly ScanPoint[]): Promise<void> {
  const written = await writeScanFile(
    path,
    what,
    points.map((each) => JSON.stringify(each)),
    () => false,
  );
  if (!written) throw new Error('interrupted');
}
