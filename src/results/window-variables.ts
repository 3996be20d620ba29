import type { HistoryEntry } from '../search/window/outcome.ts';

/** What a window file holds, in one table: the writer, the reader and the CSV all go by it. Names are those of the file; units are spelt as UDUNITS reads
 *  them; every variable is over (time). */

/** A quantity; NaN where it does not apply. */
export interface WindowNumber {
  readonly key: Exclude<keyof HistoryEntry, 'state' | 'note' | 'time_s'>;
  readonly name: string;
  readonly units: string;
  readonly longName: string;
}

export const windowTime: { readonly name: string; readonly units: string; readonly longName: string } = {
  name: 'time',
  units: 's',
  longName: 'time since the start of the history',
};

export const windowNumbers: readonly WindowNumber[] = [
  { key: 'pressure_Pa', name: 'pressure', units: 'Pa', longName: 'pressure of the gas around the gap' },
  { key: 'temperature_K', name: 'temperature', units: 'K', longName: 'temperature of the gas' },
  {
    key: 'supply_V',
    name: 'supply_voltage',
    units: 'V',
    longName: 'voltage of the supply, positive when the left electrode is the cathode',
  },
  { key: 'hold_off_V', name: 'hold_off_voltage', units: 'V', longName: 'highest voltage that holds, as a magnitude' },
  {
    key: 'hold_off_at_high_yield_V',
    name: 'hold_off_voltage_at_high_yield',
    units: 'V',
    longName: 'highest voltage that holds at the high end of the ion yields, as a magnitude',
  },
  { key: 'lag_s', name: 'formative_lag', units: 's', longName: 'formative lag at the voltage of the supply' },
];

/** `state`: the place of a word in this list. */
export const windowStates: readonly HistoryEntry['state'][] = ['holds', 'marginal', 'breaks-down', 'outside-model'];
export const windowState: { readonly name: string; readonly longName: string } = {
  name: 'state',
  longName: 'what the gap does at this voltage',
};

/** Texts of the file: together they reproduce the window. */
export interface WindowTexts {
  /** the case as given, YAML */
  readonly caseText: string;
  /** the `gapwake.window/1` object, JSON */
  readonly outcomeJson: string;
  /** every coefficient used and its source, JSON */
  readonly coefficientsJson: string;
  /** the CSV inputs, JSON */
  readonly tablesJson: string;
}

export const windowTexts: readonly { readonly key: keyof WindowTexts; readonly name: string; readonly longName: string }[] = [
  { key: 'caseText', name: 'case_text', longName: 'the case file' },
  { key: 'outcomeJson', name: 'outcome_json', longName: 'the outcome, JSON' },
  { key: 'coefficientsJson', name: 'coefficients_json', longName: 'every coefficient used and its source, JSON' },
  { key: 'tablesJson', name: 'tables_json', longName: 'the tables the case reads, JSON' },
];

/** Value of the global attribute `format` of a window file. */
export const windowFormat = 'gapwake.window/1';
