import { airAt } from '../../src/surroundings/atmosphere.ts';
import { type Check, type PublishedStatus, type Source, within } from './check.ts';

/** Multiplication factors of clearances against altitude [km], 80 kPa/p, and how far the pressure behind them is rounded [kPa] */
const FACTORS: readonly (readonly [km: number, factor: number, rounding: number, status: PublishedStatus])[] = [
  [2, 1.0, 0.5, 'second-hand'],
  [3, 1.14, 0.5, 'second-hand'],
  [4, 1.29, 0.5, 'second-hand'],
  [5, 1.48, 0.5, 'second-hand'],
  [6, 1.7, 0.5, 'second-hand'],
  [7, 1.95, 0.5, 'second-hand'],
  [8, 2.25, 0.25, 'second-hand'],
  [9, 2.62, 0.5, 'second-hand'],
  [10, 3.02, 0.25, 'second-hand'],
  [15, 6.67, 0.25, 'from memory (H)'],
  [20, 14.5, 0.25, 'from memory (H)'],
];

const row = ([km, factor, rounding, status]: (typeof FACTORS)[number]): Check => {
  const kilopascal = 80 / factor;
  const digit = km === 20 ? 0.05 : 0.005;
  return {
    check: `altitude factor of clearances at ${km} km`,
    published: factor,
    unit: '',
    allowed: within(rounding / kilopascal + digit / factor),
    reason:
      km === 9
        ? 'the table has 30.5 kPa where the atmosphere has 30.8: truncated to half a kPa; and the digits printed'
        : `the pressure behind the factor is rounded by up to ${rounding} kPa; and the digits printed`,
    status,
    independentOf: 'the table: the pressure comes from lapse rates and hydrostatics',
    simulated: false,
    compute: () => 80e3 / airAt(1000 * km).pressure,
  };
};

export const iec60664: Source = { source: 'IEC 60664-1, table A.2', checks: FACTORS.map(row) };
