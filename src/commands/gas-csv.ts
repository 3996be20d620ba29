import { type Curve, curveOf } from '../gases/curves.ts';
import type { GasData } from '../gases/gas.ts';
import { TOWNSEND } from '../units/constants.ts';
import { VERSION } from '../version.ts';
import { type NamedCoefficient, namedCoefficients } from './coefficients.ts';
import { number } from './gas-formula.ts';

/** fields of a decade to begin with */
const ROWS_PER_DECADE = 40;
/** how far a table may be off half-way between two rows before a row is added there, as a share of the value (of a thousandth of the largest where it is smaller) */
const CLOSE = 2e-4;
const MOST_ROUNDS = 8;
/** what a range that is not stated, or open, is taken for [Td] */
const LOWEST = 1;
const HIGHEST = 1e4;

/** Every curve of a set of data as the tables that a case's `gas.coefficients` takes: one file, E/N in Td, the rest in SI.
 *
 *  From the lowest to the highest field for which any coefficient claims validity, within 1 to 1e4 Td. Comments say how to use it, and where each coefficient holds. */
export function gasCsv(gas: GasData): string {
  const named = namedCoefficients(gas.coefficients);
  const bounds = named.flatMap(({ coefficient: { range } }) => (range === null ? [] : [range]));
  const lowest = Math.max(LOWEST, Math.min(...bounds.map(({ from }) => from / TOWNSEND)));
  const highest = Math.min(HIGHEST, Math.max(...bounds.map(({ to }) => to / TOWNSEND)));
  const curves = named.map(({ coefficient }) => curveOf(coefficient.form));
  const lines = [...comments(gas, named), ['EN [Td]', ...named.map(({ name, unit }) => `${name} [${unit}]`)].join(',')];
  for (const td of refined(fieldsBetween(lowest, highest), named, curves))
    lines.push([td, ...curves.map((curve) => curve.valueAt(td * TOWNSEND))].map((value) => String(Number(value.toPrecision(7)))).join(','));
  return `${lines.join('\n')}\n`;
}

/** even in the logarithm, both ends included */
function fieldsBetween(lowest: number, highest: number): number[] {
  const steps = Math.ceil(ROWS_PER_DECADE * Math.log10(highest / lowest));
  return Array.from({ length: steps + 1 }, (_, i) => Number((lowest * (highest / lowest) ** (i / steps)).toPrecision(7)));
}

/** More fields where a coefficient bends so much, or begins so suddenly, that a case's table would leave its curve. */
function refined(fields: readonly number[], named: readonly NamedCoefficient[], curves: readonly Curve[]): readonly number[] {
  let now = fields;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const x = now.map((td) => td * TOWNSEND);
    const tables = named.map(({ name }, k) => {
      const y = x.map((v) => curves[k].valueAt(v));
      const law = name === 'ionisation' || name === 'attachment' ? 'growth' : 'plain';
      return { curve: curves[k], table: curveOf({ kind: 'table', law, x, y }), least: 1e-3 * Math.max(...y) };
    });
    const added = now.slice(1).flatMap((to, i) => {
      const td = Number(Math.sqrt(now[i] * to).toPrecision(7));
      const strays = tables.some(({ curve, table, least }) => {
        const y = curve.valueAt(td * TOWNSEND);
        return Math.abs(table.valueAt(td * TOWNSEND) - y) > CLOSE * Math.max(y, least);
      });
      return strays && td > now[i] && td < to ? [td] : [];
    });
    if (added.length === 0) break;
    now = [...now, ...added].sort((a, b) => a - b);
  }
  return now;
}

function comments({ name, set }: GasData, named: readonly NamedCoefficient[]): string[] {
  const lines = [
    `gapwake ${VERSION}, gas ${name}, data ${set}; gapwake gas "${name}" names the sources.`,
    'In a case, for each coefficient (a constant one may as well be given as a quantity):',
    '  gas:',
    '    coefficients:',
  ];
  for (const { name: key, coefficient } of named) {
    if (key.endsWith('_recombination')) continue;
    const range = coefficient.range === null ? '' : `, ${rangeKeys(coefficient.range)}`;
    lines.push(`      ${key}: { table: { file: THIS FILE, reduced_field: EN, coefficient: ${key} }${range} }`);
  }
  const recombination = named.find(({ name: key }) => key === 'electron_ion_recombination');
  if (recombination?.coefficient.form.kind === 'constant')
    lines.push(`      recombination: ${number(recombination.coefficient.form.value)} m^3/s   # one number for electrons and ions`);
  lines.push('Beyond valid_from and valid_to the columns are extrapolated.');
  return lines.map((line) => `# ${line}`);
}

function rangeKeys({ from, to }: { readonly from: number; readonly to: number }): string {
  const low = `valid_from: ${number(from / TOWNSEND)} Td`;
  return to / TOWNSEND > 1e12 ? low : `${low}, valid_to: ${number(to / TOWNSEND)} Td`;
}
