/** Exponents of the SI base units [m, kg, s, A, K, mol]; fractions occur, as in (V/(m Pa))^(1/2). */
export type Exponents = readonly [number, number, number, number, number, number];

/** A kind of quantity: what messages call it, an example that is accepted, and its exponents. */
export interface Dimension {
  /** with its article, as in "a voltage" */
  readonly name: string;
  readonly example: string;
  /** the coherent SI unit, as this program's parser reads it; empty for a pure number */
  readonly unit: string;
  readonly exponents: Exponents;
}

const dimension = (name: string, example: string, unit: string, ...exponents: Exponents): Dimension => ({ name, example, unit, exponents });

/** The kinds of quantity a case, a table or a result names. */
export type DimensionName =
  | 'number'
  | 'length'
  | 'area'
  | 'crossSection'
  | 'recombination'
  | 'volume'
  | 'mass'
  | 'time'
  | 'frequency'
  | 'velocity'
  | 'current'
  | 'temperature'
  | 'pressure'
  | 'energy'
  | 'power'
  | 'force'
  | 'charge'
  | 'voltage'
  | 'voltageRate'
  | 'field'
  | 'resistance'
  | 'capacitance'
  | 'inductance'
  | 'magneticField'
  | 'currentDensity'
  | 'density'
  | 'volumeRate'
  | 'gasFlow'
  | 'outgassingRate'
  | 'pressureLength'
  | 'reducedField'
  | 'fieldOverPressure'
  | 'growthOverPressure'
  | 'rootReducedField'
  | 'rootFieldOverPressure'
  | 'mobility'
  | 'mobilityTimesDensity'
  | 'mobilityTimesPressure';

/** Every kind of quantity a case, a table or a result names. The first of two with equal exponents is the name used in messages. */
export const DIMENSIONS: Readonly<Record<DimensionName, Dimension>> = {
  number: dimension('a number', '0.1 %', '', 0, 0, 0, 0, 0, 0),
  length: dimension('a length', '6 mm', 'm', 1, 0, 0, 0, 0, 0),
  area: dimension('an area', '12 cm^2', 'm^2', 2, 0, 0, 0, 0, 0),
  /** α/N: the exponents of an area, under the name that a coefficient asks for */
  crossSection: dimension('a coefficient over density', '1e-20 m^2', 'm^2', 2, 0, 0, 0, 0, 0),
  volume: dimension('a volume', '12 L', 'm^3', 3, 0, 0, 0, 0, 0),
  mass: dimension('a mass', '4 u', 'kg', 0, 1, 0, 0, 0, 0),
  time: dimension('a time', '5 ms', 's', 0, 0, 1, 0, 0, 0),
  frequency: dimension('a frequency', '50 Hz', 'Hz', 0, 0, -1, 0, 0, 0),
  velocity: dimension('a velocity', '5 m/s', 'm/s', 1, 0, -1, 0, 0, 0),
  current: dimension('a current', '1 mA', 'A', 0, 0, 0, 1, 0, 0),
  temperature: dimension('a temperature', '295 K', 'K', 0, 0, 0, 0, 1, 0),
  pressure: dimension('a pressure', '1.2 Torr', 'Pa', -1, 1, -2, 0, 0, 0),
  energy: dimension('an energy', '1 mJ', 'J', 2, 1, -2, 0, 0, 0),
  power: dimension('a power', '10 W', 'W', 2, 1, -3, 0, 0, 0),
  force: dimension('a force', '1 N', 'N', 1, 1, -2, 0, 0, 0),
  charge: dimension('a charge', '1 nC', 'C', 0, 0, 1, 1, 0, 0),
  voltage: dimension('a voltage', '420 V', 'V', 2, 1, -3, -1, 0, 0),
  voltageRate: dimension('a rate of voltage', '100 V/s', 'V/s', 2, 1, -4, -1, 0, 0),
  field: dimension('an electric field', '700 V/cm', 'V/m', 1, 1, -3, -1, 0, 0),
  resistance: dimension('a resistance', '100 kohm', 'ohm', 2, 1, -3, -2, 0, 0),
  capacitance: dimension('a capacitance', '20 pF', 'F', -2, -1, 4, 2, 0, 0),
  inductance: dimension('an inductance', '1 mH', 'H', 2, 1, -2, -2, 0, 0),
  magneticField: dimension('a magnetic field', '10 mT', 'T', 0, 1, -2, -1, 0, 0),
  currentDensity: dimension('a current density', '1 mA/cm^2', 'A/m^2', -2, 0, 0, 1, 0, 0),
  density: dimension('a number density', '1e16 1/cm^3', '1/m^3', -3, 0, 0, 0, 0, 0),
  volumeRate: dimension('a volume per time', '50 L/s', 'm^3/s', 3, 0, -1, 0, 0, 0),
  /** β */
  recombination: dimension('a recombination coefficient', '1e-7 cm^3/s', 'm^3/s', 3, 0, -1, 0, 0, 0),
  gasFlow: dimension('a gas flow', '1e-4 mbar L/s', 'Pa m^3/s', 2, 1, -3, 0, 0, 0),
  outgassingRate: dimension('an outgassing rate', '1e-8 Torr L/(s cm^2)', 'Pa m/s', 0, 1, -3, 0, 0, 0),
  pressureLength: dimension('a pressure times a length', '0.7 Torr cm', 'Pa m', 0, 1, -2, 0, 0, 0),
  /** E/N */
  reducedField: dimension('a reduced field', '100 Td', 'V m^2', 4, 1, -3, -1, 0, 0),
  /** E/p */
  fieldOverPressure: dimension('a field over pressure', '180 V/(cm Torr)', 'V/(m Pa)', 2, 0, -1, -1, 0, 0),
  /** α/p */
  growthOverPressure: dimension('a coefficient over pressure', '12 1/(cm Torr)', '1/(m Pa)', 0, -1, 2, 0, 0, 0),
  /** D of the root form against E/N */
  rootReducedField: dimension('the root of a reduced field', '500 Td^0.5', '(V m^2)^0.5', 2, 0.5, -1.5, -0.5, 0, 0),
  /** D of the root form against E/p */
  rootFieldOverPressure: dimension(
    'the root of a field over pressure',
    '26.64 (V/(cm Torr))^0.5',
    '(V/(m Pa))^0.5',
    1,
    0,
    -0.5,
    -0.5,
    0,
    0,
  ),
  /** μ */
  mobility: dimension('a mobility', '1.5 cm^2/(V s)', 'm^2/(V s)', 0, -1, 2, 1, 0, 0),
  /** μ N */
  mobilityTimesDensity: dimension('a mobility times a density', '1e24 1/(m V s)', '1/(m V s)', -3, -1, 2, 1, 0, 0),
  /** μ p */
  mobilityTimesPressure: dimension('a mobility times a pressure', '1.5e3 cm^2 Torr/(V s)', 'm^2 Pa/(V s)', -1, 0, 0, 1, 0, 0),
};

/** Whether two sets of exponents are the same (to round-off of fractional powers). */
export function sameExponents(a: Exponents, b: Exponents): boolean {
  return a.every((value, i) => Math.abs(value - b[i]) < 1e-9);
}

/** What messages call a set of exponents: its name, or else its base units. */
export function describeExponents(exponents: Exponents): string {
  for (const known of Object.values(DIMENSIONS)) if (sameExponents(known.exponents, exponents)) return known.name;
  const base = ['m', 'kg', 's', 'A', 'K', 'mol'];
  const factors = exponents.flatMap((power, i) =>
    Math.abs(power) < 1e-9 ? [] : power === 1 ? [base[i]] : [`${base[i]}^${Number(power.toPrecision(6))}`],
  );
  return `a quantity in ${factors.join(' ')}`;
}
