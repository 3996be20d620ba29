import { curveOf } from '../../src/gases/curves.ts';
import { gases } from '../../src/gases/index.ts';
import { PER_TORR } from '../help/gas-gap.ts';
import { type Check, type Source, within } from './check.ts';

/** N at 1 atm, 20 °C [1/m³] */
const N = 760 * PER_TORR;

/** α of air at 1 atm [1/cm], E [kV/cm] from 45.6 to 182.4 */
const row = (E: number): Check => ({
  check: `α/N in air at ${E} kV/cm and 1 atm`,
  published: Number(((7385 * 100 * Math.exp(-200.8 / E)) / N).toPrecision(4)),
  unit: 'm²',
  allowed: within(0.25),
  reason: 'α of air is known to some 20 % by either author, and the joints of the data at 150 and 466 Td leave a few per cent',
  status: 'from memory (M)',
  independentOf: 'this author: the data are those of Morrow and Lowke, and above 466 Td of Raizer',
  simulated: false,
  compute: () => curveOf(gases.air.coefficients.ionisation.form).valueAt((E * 1e5) / N),
});

export const badaloniGallimberti1972: Source = {
  source: 'Badaloni and Gallimberti, Univ. Padova UPee 72/03, 1972',
  checks: [row(55), row(90), row(160)],
};
