import { TOWNSEND } from '../units/constants.ts';
import { TABLE_TEMPERATURE, tableInTd } from './conversions.ts';
import type { Coefficient } from './gas.ts';
import { TWO_TERM } from './sources.ts';

/* Electron curves rounded from our own solution of the Boltzmann equation: test/gases/two-term.test.ts computes them again and compares. */

type Row = readonly [td: number, value: number];

function rangeOf(rows: readonly Row[], to: number | undefined): { from: number; to: number } {
  return { from: rows[0][0] * TOWNSEND, to: (to ?? rows[rows.length - 1][0]) * TOWNSEND };
}

/** μN [1/(m V s)] from rows (Td, 1e24/(m V s)).
 *  @param beside  a published figure to hold it against
 *  @param to      [Td] to which the last value may be used, where that is beyond the last row */
export function computedMobility(rows: readonly Row[], beside: string, to?: number): Coefficient {
  return {
    form: tableInTd(rows.map(([td, value]) => [td, value * 1e24] as const)),
    range: rangeOf(rows, to),
    source: TWO_TERM,
    status: 'computed',
    uncertainty: 0.2,
    referenceTemperature: TABLE_TEMPERATURE,
    note: `${beside} The last value is kept above ${rows[rows.length - 1][0]} Td. Breakdown voltage and ion-fed lag hardly depend on it.`,
  };
}

/** D/μ [V] from rows (Td, V).
 *  @param to  [Td] to which the last value may be used, where that is beyond the last row */
export function computedEnergy(rows: readonly Row[], to?: number): Coefficient {
  return {
    form: tableInTd(rows),
    range: rangeOf(rows, to),
    source: TWO_TERM,
    status: 'computed',
    uncertainty: 0.4,
    referenceTemperature: TABLE_TEMPERATURE,
    note:
      '0.7 of the value across the field: diffusion along it, which counts here, is slower, by a factor of 0.4 to 0.9 that we round. Not below 0.0253 V, thermal electrons. ' +
      `The last value is kept above ${rows[rows.length - 1][0]} Td, where electrons of the local field become a fiction. Breakdown voltage shifts little with it.`,
  };
}
