import type { Outcome, Stop } from '../../onset/outcome.ts';
import { prospects } from '../../theory/predict.ts';
import { TOWNSEND } from '../../units/constants.ts';
import { formatQuantity } from '../../units/index.ts';
import type { RunReport } from './report.ts';

/** A number shown in the page; `path` says which number of the outcome it is, null for one computed beside it. */
export interface Shown {
  readonly path: string | null;
  readonly value: number | null;
  readonly text: string;
}

/** A cell: numbers and words between them. */
export type Cell = readonly (Shown | string)[];

export interface KeyRow {
  readonly label: string;
  readonly theory: Cell;
  readonly simulated: Cell;
}

const STOPS: Readonly<Record<Stop, string>> = {
  until: 'observed to the end',
  steady: 'steady',
  'died-out': 'died out',
  'tripped-out': 'tripped and died out',
  'model-limit': 'the model ends here',
  interrupted: 'interrupted',
  failed: 'could not go on',
};

/** The numbers that decide, theory beside simulation. */
export function keyRows(run: RunReport): KeyRow[] {
  const { outcome, settings } = run;
  const { theory, onset, peak, final, energy, oscillation } = outcome;
  const show = (path: string, value: number | null, unit: string): Shown => ({ path, value, text: text(value, unit) });
  const beside = (value: number | null, unit: string, before = ''): Cell =>
    value === null ? [] : [before, { path: null, value, text: text(value, unit) }];
  const ahead =
    settings === null
      ? null
      : prospects(
          settings,
          (peak.gap_voltage_V < 0 ? -1 : 1) * theory.reduced_field_Td * TOWNSEND * settings.gas.density * settings.gap.spacing,
        );
  const rows: KeyRow[] = [
    {
      label: 'Threshold (static breakdown voltage)',
      theory: [show('theory.static_breakdown_voltage_V', theory.static_breakdown_voltage_V, 'V')],
      simulated:
        onset.threshold_time_s === null ? ['not passed'] : ['passed at ', show('onset.threshold_time_s', onset.threshold_time_s, 's')],
    },
  ];
  if (theory.lowest_over_paths_V !== null && theory.lowest_over_paths_V !== theory.static_breakdown_voltage_V)
    rows.push({
      label: 'Lowest over longer paths',
      theory: [show('theory.lowest_over_paths_V', theory.lowest_over_paths_V, 'V')],
      simulated: [],
    });
  if (theory.overvoltage !== null)
    rows.push({
      label: 'Overvoltage',
      theory: [{ path: 'theory.overvoltage', value: theory.overvoltage, text: percent(theory.overvoltage) }],
      simulated: [],
    });
  rows.push(
    { label: 'Feedback q', theory: [show('theory.feedback', theory.feedback, '')], simulated: [] },
    {
      label: 'Growth rate',
      theory: [show('theory.growth_rate_per_s', theory.growth_rate_per_s, '1/s')],
      simulated: [show('onset.growth_rate_per_s', onset.growth_rate_per_s, '1/s')],
    },
  );
  if (onset.space_charge_time_s !== null)
    rows.push({
      label: 'Space charge distorts the field',
      theory: suddenStep(run, onset) ? beside(ahead?.timeToSpaceCharge ?? null, 's', 'after ') : [],
      simulated: ['at ', show('onset.space_charge_time_s', onset.space_charge_time_s, 's')],
    });
  if (onset.collapse_time_s !== null)
    rows.push({ label: 'Voltage collapses', theory: [], simulated: ['at ', show('onset.collapse_time_s', onset.collapse_time_s, 's')] });
  if (onset.formative_lag_s !== null)
    rows.push({
      label: 'Formative lag',
      theory: [],
      simulated: [
        show('onset.formative_lag_s', onset.formative_lag_s, 's'),
        onset.lag_ends_at === 'collapse' ? ', to the collapse at ' : ', to space charge at ',
        show('onset.gap_voltage_V', onset.gap_voltage_V, 'V'),
      ],
    });
  rows.push({
    label: 'Peak current',
    theory: [],
    simulated: [
      show('peak.current_A', peak.current_A, 'A'),
      ' at ',
      show('peak.time_s', peak.time_s, 's'),
      ', with ',
      show('peak.gap_voltage_V', peak.gap_voltage_V, 'V'),
      ' on the gap',
    ],
  });
  const fall = outcome.verdict.regime === 'dark' || !outcome.verdict.self_sustaining ? null : (ahead?.normalCathodeFall ?? null);
  const dark =
    theory.steady_amplification !== null && settings !== null ? theory.steady_amplification * settings.seed.cathodeCurrent : null;
  rows.push(
    { label: 'End', theory: [], simulated: [show('final.time_s', final.time_s, 's'), `: ${STOPS[final.stop]}`] },
    { label: 'Gap voltage at the end', theory: [], simulated: [show('final.gap_voltage_V', final.gap_voltage_V, 'V')] },
    { label: 'Current at the end', theory: beside(dark, 'A'), simulated: [show('final.current_A', final.current_A, 'A')] },
    {
      label: 'Field at the cathode at the end',
      theory: fall === null ? [] : beside(fall.cathodeField, 'V/m', 'normal '),
      simulated: [show('final.cathode_field_V_per_m', final.cathode_field_V_per_m, 'V/m')],
    },
  );
  if (fall !== null || final.cathode_layer_m !== null)
    rows.push({
      label: 'Cathode layer',
      theory: fall === null ? [] : beside(fall.thickness, 'm', 'normal '),
      simulated: [show('final.cathode_layer_m', final.cathode_layer_m, 'm')],
    });
  if (oscillation !== null)
    rows.push({
      label: 'Oscillates',
      theory: [],
      simulated: [
        'every ',
        show('oscillation.period_s', oscillation.period_s, 's'),
        ', by ',
        show('oscillation.amplitude_V', oscillation.amplitude_V, 'V'),
      ],
    });
  rows.push(
    { label: 'Energy into the gap', theory: [], simulated: [show('energy.gap_J', energy.gap_J, 'J')] },
    { label: 'Energy from the supply', theory: [], simulated: [show('energy.source_J', energy.source_J, 'J')] },
  );
  if (energy.after_trip_J !== null)
    rows.push({
      label: 'Energy into the gap after the trip',
      theory: [],
      simulated: [show('energy.after_trip_J', energy.after_trip_J, 'J')],
    });
  outcome.currents.forEach(({ level_A, time_s, gap_voltage_V }, i) => {
    const simulated =
      time_s === null
        ? ['not reached']
        : [
            'at ',
            show(`currents.${i}.time_s`, time_s, 's'),
            ', with ',
            show(`currents.${i}.gap_voltage_V`, gap_voltage_V, 'V'),
            ' on the gap',
          ];
    rows.push({ label: `Current first reaches ${text(level_A, 'A')}`, theory: [], simulated });
  });
  return rows;
}

/** Whether the gap passed its threshold so early that the closed form for a sudden step applies. */
function suddenStep({ settings }: RunReport, { threshold_time_s: threshold, space_charge_time_s: spaceCharge }: Outcome['onset']): boolean {
  if (threshold === null || spaceCharge === null) return false;
  return settings?.supply.programme.kind === 'step' && threshold < 0.05 * (spaceCharge - threshold);
}

/** Fields in V/cm, as the trade reads them. */
export function text(value: number | null, unit: string, digits = 3): string {
  if (value === null) return '–';
  if (unit === 'V/m') return `${formatQuantity(value / 100, 'V', digits)}/cm`;
  return formatQuantity(value, unit, digits);
}

export function percent(share: number, signed = true): string {
  return `${signed && share > 0 ? '+' : ''}${formatQuantity(share * 100, '')} %`;
}

/** Every number of an outcome by its path, in its order. */
export function allNumbers(value: unknown, path = ''): [path: string, value: number | null][] {
  if (typeof value === 'number' || value === null) return [[path, value]];
  if (typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, inner]) => allNumbers(inner, path === '' ? key : `${path}.${key}`));
}
