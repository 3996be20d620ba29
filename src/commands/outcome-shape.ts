import type { Outcome } from '../onset/outcome.ts';

/** What an outcome must look like: a name of a kind, several joined by |, a list of one shape, or the shapes of its keys. */
type Shape = string | readonly [Shape] | { readonly [key: string]: Shape };

const SHAPE: Shape = {
  title: 'text',
  version: 'text',
  case_sha256: 'text',
  verdict: { state: 'holds|breaks-down|undecided', regime: 'dark|glow|arc-risk', self_sustaining: 'flag', reason: 'text' },
  theory: {
    static_breakdown_voltage_V: 'number?',
    upper_breakdown_voltage_V: 'number?',
    lowest_over_paths_V: 'number?',
    paschen_minimum_V: 'number?',
    paschen_minimum_pd_Pa_m: 'number?',
    overvoltage: 'number?',
    pd_Pa_m: 'number',
    reduced_field_Td: 'number',
    alpha_d: 'number',
    feedback: 'number?',
    growth_rate_per_s: 'number?',
    steady_amplification: 'number?',
  },
  onset: {
    threshold_time_s: 'number?',
    space_charge_time_s: 'number?',
    collapse_time_s: 'number?',
    formative_lag_s: 'number?',
    lag_ends_at: 'collapse|space-charge|null',
    gap_voltage_V: 'number?',
    growth_rate_per_s: 'number?',
  },
  peak: { current_A: 'number', time_s: 'number', gap_voltage_V: 'number' },
  final: {
    time_s: 'number',
    stop: 'until|steady|died-out|tripped-out|model-limit|interrupted|failed',
    gap_voltage_V: 'number',
    current_A: 'number',
    cathode_field_V_per_m: 'number',
    cathode_layer_m: 'number?',
  },
  energy: { gap_J: 'number', source_J: 'number', after_trip_J: 'number?' },
  currents: [{ level_A: 'number', time_s: 'number?', gap_voltage_V: 'number?' }],
  cautions: [{ code: 'text', text: 'text', value: 'number?' }],
  numerics: {
    cells: 'number',
    tolerance: 'number',
    steps: 'number',
    rejected: 'number',
    newton: 'number',
    wall_s: 'number',
    charge_defect: 'number',
    worst_undershoot: 'number',
  },
};
const OSCILLATION: Shape = { period_s: 'number', amplitude_V: 'number' };

/** An outcome out of a file, or null where what is there is none: files come from anywhere. */
export function outcomeOf(value: unknown): Outcome | null {
  const oscillation = (value as { oscillation?: unknown } | null)?.oscillation;
  const fits = matches(value, SHAPE) && (oscillation === null || matches(oscillation, OSCILLATION));
  return fits ? (value as Outcome) : null;
}

function matches(value: unknown, shape: Shape): boolean {
  if (typeof shape === 'string') {
    if (shape === 'number') return typeof value === 'number';
    if (shape === 'number?') return typeof value === 'number' || value === null;
    if (shape === 'text') return typeof value === 'string';
    if (shape === 'flag') return typeof value === 'boolean';
    return shape.split('|').includes(String(value));
  }
  if (Array.isArray(shape)) return Array.isArray(value) && value.every((each) => matches(each, shape[0]));
  if (typeof value !== 'object' || value === null) return false;
  return Object.entries(shape).every(([key, inner]) => matches((value as Record<string, unknown>)[key], inner));
}
