/** What a run file holds, in one table: the writer, the reader and the report all go by it.
 *  Names are those of the file; units are spelt as UDUNITS reads them. */

/** One instant of a run, as numbers. NaN: does not apply. */
export interface SnapshotScalars {
  /** [V] voltage of the supply ahead of its series resistance */
  readonly supplyVoltage: number;
  /** [V] what the gap would hold in the same circuit without conduction */
  readonly openGapVoltage: number;
  /** [V] positive: the left electrode is the cathode */
  readonly gapVoltage: number;
  /** [A] positive when it discharges a positive gap voltage */
  readonly conductionCurrent: number;
  /** [A] conduction and displacement current through the gap */
  readonly totalCurrent: number;
  /** [A] through the series resistance */
  readonly supplyCurrent: number;
  /** [J] put into the gas gap since t = 0 */
  readonly gapEnergy: number;
  /** [J] delivered by the supply since t = 0 */
  readonly sourceEnergy: number;
}

/** One instant of a run, as profiles at the cell centres; all of the length of `x`. The writer copies them. */
export interface SnapshotFields {
  /** [m⁻³] */
  readonly electronDensity: Float64Array;
  /** [m⁻³] positive ions */
  readonly ionDensity: Float64Array;
  /** [m⁻³] attaching gases only */
  readonly negativeIonDensity?: Float64Array;
  /** [V/m] true x-component: negative for a positive gap voltage */
  readonly electricField: Float64Array;
  /** [V] zero at x = 0 */
  readonly potential: Float64Array;
  /** [m⁻² s⁻¹] number of electrons along +x */
  readonly electronFlux: Float64Array;
  /** [m⁻² s⁻¹] */
  readonly ionFlux: Float64Array;
  /** [m⁻² s⁻¹] attaching gases only */
  readonly negativeIonFlux?: Float64Array;
  /** [m⁻³ s⁻¹] electron-ion pairs made */
  readonly ionisationRate: Float64Array;
}

export interface Snapshot extends SnapshotScalars, SnapshotFields {
  /** [s] never before that of the snapshot appended last */
  readonly time: number;
}

export type ScalarKey = keyof SnapshotScalars;
export type FieldKey = keyof SnapshotFields;

/** A variable of the file. */
export interface Variable<Key extends string> {
  readonly key: Key;
  readonly name: string;
  readonly units: string;
  readonly longName: string;
}

export const timeVariable: Variable<'time'> = {
  key: 'time',
  name: 'time',
  units: 's',
  longName: 'time since the supply starts its programme',
};

export const xVariable: Variable<'x'> = {
  key: 'x',
  name: 'x',
  units: 'm',
  longName: 'position of the cell centre, from the left (inner) electrode',
};

function variable<Key extends string>(key: Key, name: string, units: string, longName: string): Variable<Key> {
  return { key, name, units, longName };
}

/** Variables over (time), 64-bit. */
export const scalarVariables: readonly Variable<ScalarKey>[] = [
  variable('supplyVoltage', 'supply_voltage', 'V', 'supply voltage ahead of the series resistance'),
  variable('openGapVoltage', 'open_gap_voltage', 'V', 'voltage the gap would hold without conduction'),
  variable('gapVoltage', 'gap_voltage', 'V', 'gap voltage, positive when the left electrode is the cathode'),
  variable('conductionCurrent', 'conduction_current', 'A', 'conduction current, positive when it discharges a positive gap voltage'),
  variable('totalCurrent', 'total_current', 'A', 'conduction and displacement current through the gap'),
  variable('supplyCurrent', 'supply_current', 'A', 'current through the series resistance'),
  variable('gapEnergy', 'gap_energy', 'J', 'energy put into the gas gap since time 0'),
  variable('sourceEnergy', 'source_energy', 'J', 'energy delivered by the supply since time 0'),
];

/** Variables over (time, x), 32-bit: seven digits, more than any of their coefficients has. */
export const fieldVariables: readonly Variable<FieldKey>[] = [
  variable('electronDensity', 'electron_density', 'm-3', 'electron density'),
  variable('ionDensity', 'ion_density', 'm-3', 'positive ion density'),
  variable('negativeIonDensity', 'negative_ion_density', 'm-3', 'negative ion density'),
  variable('electricField', 'electric_field', 'V m-1', 'electric field along x'),
  variable('potential', 'potential', 'V', 'electric potential, zero at x = 0'),
  variable('electronFlux', 'electron_flux', 'm-2 s-1', 'electron flux along x'),
  variable('ionFlux', 'ion_flux', 'm-2 s-1', 'positive ion flux along x'),
  variable('negativeIonFlux', 'negative_ion_flux', 'm-2 s-1', 'negative ion flux along x'),
  variable('ionisationRate', 'ionisation_rate', 'm-3 s-1', 'electron-ion pairs made by ionisation'),
];

/** Fields a run without attachment does not have. */
export const negativeIonFields: ReadonlySet<FieldKey> = new Set<FieldKey>(['negativeIonDensity', 'negativeIonFlux']);

/** Texts of the file: together they reproduce the run. */
export interface RunTexts {
  /** the case as given, YAML */
  readonly caseText: string;
  /** the outcome object, JSON */
  readonly outcomeJson: string;
  /** every coefficient used and its source, JSON */
  readonly coefficientsJson: string;
  /** the CSV inputs, JSON */
  readonly tablesJson: string;
}

export const textVariables: readonly { readonly key: keyof RunTexts; readonly name: string; readonly longName: string }[] = [
  { key: 'caseText', name: 'case_text', longName: 'the case file' },
  { key: 'outcomeJson', name: 'outcome_json', longName: 'the outcome, JSON' },
  { key: 'coefficientsJson', name: 'coefficients_json', longName: 'every coefficient used and its source, JSON' },
  { key: 'tablesJson', name: 'tables_json', longName: 'the tables the case reads, JSON' },
];

/** Value of the global attribute `format` of a run file. */
export const runFormat = 'gapwake.run/1';
