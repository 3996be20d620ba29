const PREFIXES: readonly (readonly [string, number])[] = [
  ['f', -15],
  ['p', -12],
  ['n', -9],
  ['\u00b5', -6],
  ['m', -3],
  ['', 0],
  ['k', 3],
  ['M', 6],
  ['G', 9],
  ['T', 12],
];

/** Units that people write with prefixes; of seconds nobody writes kilo-, of metres nobody writes mega-. */
const HIGHEST: Readonly<Record<string, number>> = {
  A: 12,
  V: 12,
  J: 12,
  W: 12,
  C: 12,
  F: 12,
  ohm: 12,
  Pa: 12,
  Hz: 12,
  eV: 12,
  s: 0,
  m: 3,
  T: 0,
  g: 3,
};

/** A quantity for people: three significant digits by default and an engineering prefix where the unit takes one.
 *
 *  @param value  in `unit`
 *  @param unit  a unit without prefix, such as `A`, `s`, `V/m`; areas in `m^2` read in mm^2, cm^2 or m^2
 *  @param digits  significant digits, 1 … 15; a whole number below 10⁴ that takes no prefix is kept whole (`1234 s`)
 *  @returns `4.38 mA`, `52.8 µs`, `209 V`, `1 kV`; an en dash for what is not finite
 *  @example formatQuantity(5.28e-5, 's') // '52.8 µs' */
export function formatQuantity(value: number, unit: string, digits = 3): string {
  if (!Number.isFinite(value)) return '–';
  const suffix = (name: string): string => (name === '' ? '' : ` ${name}`);
  if (value === 0) return `0${suffix(unit)}`;
  if (unit === 'm^2') {
    const size = Math.abs(value);
    if (size < 1e-5 && size >= 1e-9) return `${plain(value * 1e6, digits)} mm^2`;
    if (size < 0.1 && size >= 1e-9) return `${plain(value * 1e4, digits)} cm^2`;
    return `${plain(value, digits)} m^2`;
  }
  const highest = HIGHEST[unit];
  if (highest === undefined) return `${plain(value, digits)}${suffix(unit)}`;
  // round first, so that 999.96 mA becomes 1 A and not 1000 mA
  const rounded = Number(value.toPrecision(digits));
  const decade = Math.floor(Math.log10(Math.abs(rounded)) + 1e-12);
  const group = Math.min(highest, Math.max(-15, 3 * Math.floor(decade / 3)));
  const prefix = PREFIXES.find(([, exponent]) => exponent === group) ?? ['', 0];
  return `${plain(Number(`${value.toPrecision(15).replace(/e.*/, '')}e${exponentOf(value) - prefix[1]}`), digits)} ${prefix[0]}${unit}`;
}

/** the decimal exponent in the 15-digit text of a value, 0 where it has none */
function exponentOf(value: number): number {
  return Number(/e(.*)$/.exec(value.toPrecision(15))?.[1] ?? 0);
}

/** A number without trailing zeros; scientific below 1e-3 and from 1e5 on. */
function plain(value: number, digits: number): string {
  const rounded = Number(value.toPrecision(digits));
  const size = Math.abs(rounded);
  if (size >= 1e-3 && size < 1e4 && Number.isInteger(Number(value.toPrecision(12)))) return String(Number(value.toPrecision(12)));
  if (size >= 1e-3 && size < 1e5) return String(rounded);
  return rounded.toExponential().replace('e+', 'e');
}
