import type { Case } from '../../case.ts';
import { limitsOf, prospects } from '../../theory/predict.ts';
import type { YieldBand } from './data.ts';

/** Theory over the published spread of the cathode's yield, at each point of a scan: the lowest breakdown voltage over the paths where the hold-off voltage
 *  was searched for, else the time from a sudden step to space charge.
 *  @param cases  of the points; null where there is none
 *  @param column  `found_value` of a search for the hold-off voltage, or `formative_lag` */
export function yieldBand(cases: readonly (Case | null)[], column: 'found_value' | 'formative_lag'): YieldBand {
  const at = (end: 'typical' | 'low' | 'high'): (number | null)[] =>
    cases.map((settings) => (settings === null ? null : theory(withYields(settings, end), column)));
  return { column, typical: at('typical'), low: at('low'), high: at('high') };
}

function theory(settings: Case, column: 'found_value' | 'formative_lag'): number | null {
  const voltage = largest(settings);
  if (column === 'found_value') return limitsOf(settings, voltage).lowest?.voltage ?? null;
  return settings.supply.programme.kind === 'step' ? prospects(settings, voltage).timeToSpaceCharge : null;
}

function withYields(settings: Case, end: 'typical' | 'low' | 'high'): Case {
  const { left, right } = settings.electrodes;
  const changed = (surface: typeof left): typeof left => ({
    ...surface,
    ionYield: { ...surface.ionYield, typical: surface.ionYield[end] },
  });
  return { ...settings, electrodes: { left: changed(left), right: changed(right) } };
}

/** [V] of the programme, with its sign */
function largest({ supply: { programme } }: Case): number {
  const values =
    programme.kind === 'step' ? [programme.voltage] : programme.kind === 'ramp' ? [programme.from, programme.to] : programme.voltages;
  return values.reduce((most, v) => (Math.abs(v) > Math.abs(most) ? v : most), 0);
}
