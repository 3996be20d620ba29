import { TOWNSEND } from '../units/constants.ts';
import { formatQuantity } from '../units/index.ts';
import { NO_BREAK } from './layout.ts';

/** Values in the units that the trade reads; null, where a value does not apply, is a dash. A number and its unit stay on one line. */

const NONE = '–';
const TORR = 101325 / 760;

export function quantity(value: number | null, unit: string, digits = 3): string {
  return value === null ? NONE : text(value, unit, digits);
}

/** [Pa], in the units on the dials of gauges */
export function pressure(pascal: number): string {
  return `${text(pascal, 'Pa')} = ${text(pascal / TORR, 'Torr')} = ${text(pascal / 100, 'mbar')}`;
}

/** pd [Pa m] */
export function pressureDistance(value: number | null): string {
  if (value === null) return NONE;
  return `${text(value, 'Pa m')} = ${text((value / TORR) * 100, 'Torr cm')}`;
}

/** [V/m] */
export function field(value: number | null): string {
  return value === null ? NONE : `${text(value / 100, 'V')}/cm`;
}

/** E/N [V m²] */
export function reducedField(value: number | null): string {
  return value === null ? NONE : text(value / TOWNSEND, 'Td');
}

/** [A/m²] */
export function currentDensity(value: number): string {
  return `${text(value / 1e4, 'A')}/cm²`;
}

/** a share, with its sign where it is a change */
export function percent(share: number, signed = false): string {
  return `${signed && share > 0 ? '+' : ''}${text(share * 100, '')}${NO_BREAK}%`;
}

/** a rate [1/s] with the time in which it makes a factor e */
export function rate(perSecond: number | null): string {
  if (perSecond === null) return NONE;
  if (perSecond === 0) return '0 1/s';
  return `${text(perSecond, '1/s')}, ${perSecond > 0 ? 'a factor e' : 'down by e'} in ${text(1 / Math.abs(perSecond), 's')}`;
}

function text(value: number, unit: string, digits = 3): string {
  return formatQuantity(value, unit, digits).replaceAll(' ', NO_BREAK);
}
