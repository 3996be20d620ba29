import type { CurvePoint, Kinetics } from '../theory/kinetic.ts';
import { columns } from './layout.ts';
import { percent, pressureDistance, quantity } from './quantities.ts';

/** What particles say beside the local field, as rows for people. */
export function kineticRows(k: Kinetics): (readonly [label: string, value: string])[] {
  const at = quantity(Math.abs(k.gap_voltage_V), 'V');
  return [
    [
      'breakdown voltage V_s',
      `${thresholdText(k)}; by the local field with the net yield ${orNone(k.local_field_breakdown_voltage_V, 'V')}${apart(k)}`,
    ],
    ['feedback q', `${within(k.feedback, k.feedback_error, '')} at ${at}; by the local field ${quantity(k.local_field_feedback, '')}`],
    ['ions per electron', `${within(k.ions_per_electron, k.ions_per_electron_error, '')}, for each emitted; ± is one standard error`],
    ['fall back on the cathode', `${within(k.returned_fraction, k.returned_fraction_error, '')} for each emitted`],
    ...(k.breakdown_probability === null
      ? []
      : [
          [
            'chance of one electron',
            `${within(k.breakdown_probability, k.breakdown_probability_error ?? 0, '')} lead to breakdown (1 − 1/q: ${quantity(Math.max(0, 1 - 1 / k.feedback), '')}); ${within(k.silent_fraction ?? 0, k.silent_fraction_error ?? 0, '')} make no ion`,
          ] as const,
        ]),
    [
      'yield',
      `${quantity(k.emitted_per_ion, '')} electrons emitted per ion; less those that fall back, a net yield of ${quantity(k.net_per_ion, '')}, which is what breakdown measurements give with a local α`,
    ],
  ];
}

function thresholdText({ breakdown_voltage_V: voltage, breakdown_voltage_V_error: error }: Kinetics): string {
  return voltage === null ? 'none' : within(voltage, error ?? 0, 'V');
}

function orNone(value: number | null, unit: string): string {
  return value === null ? 'none' : quantity(value, unit);
}

/** How far the two thresholds are apart. */
function apart({ breakdown_voltage_V: particles, local_field_breakdown_voltage_V: local }: Kinetics): string {
  return particles === null || local === null ? '' : `, ${percent(particles / local - 1, true)} apart`;
}

function within(value: number, error: number, unit: string): string {
  return `${quantity(value, unit)} ± ${quantity(error, unit)}`;
}

/** The same in one sentence, beside a run. */
export function kineticSentence(k: Kinetics): string {
  const local = k.local_field_breakdown_voltage_V === null ? 'none' : quantity(k.local_field_breakdown_voltage_V, 'V');
  return `Electrons as particles: V_s ${thresholdText(k)} (local field with the net yield ${quantity(k.net_per_ion, '')}: ${local}), q ${within(k.feedback, k.feedback_error, '')}; the given yield counts electrons emitted, of which ${quantity(k.returned_fraction, '')} per electron emitted fall back. Growth and lag carry the error of q − 1.`;
}

/** The breakdown curve as a table. */
export function curveLines(curve: readonly CurvePoint[], width: number): string[] {
  const rows = curve.map((point) => [
    `  ${pressureDistance(point.pd_Pa_m)}`,
    point.breakdown_voltage_V === null ? 'none' : within(point.breakdown_voltage_V, point.breakdown_voltage_V_error ?? 0, 'V'),
    orNone(point.local_field_breakdown_voltage_V, 'V'),
    point.net_per_ion === null ? '' : quantity(point.net_per_ion, ''),
  ]);
  return columns([['  pressure × spacing', 'V_s by particles', 'local field', 'with net yield'], ...rows], [30, 20, 14], width);
}
