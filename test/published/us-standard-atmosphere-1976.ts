import { airAt } from '../../src/surroundings/atmosphere.ts';
import { type Check, type Source, within } from './check.ts';

/** Bases of the layers: geopotential height [km], pressure [Pa] as printed */
const BASES: readonly (readonly [km: number, pressure: string])[] = [
  [11, '22632'],
  [20, '5474.9'],
  [32, '868.02'],
  [47, '110.91'],
  [51, '66.939'],
  [71, '3.9564'],
];

const row = ([km, text]: (typeof BASES)[number]): Check => {
  const pressure = Number(text);
  const lastDigit = 0.5 * 10 ** -(text.split('.')[1]?.length ?? 0);
  const height = 1000 * km;
  return {
    check: `standard atmosphere at ${km} km geopotential, p`,
    published: pressure,
    unit: 'Pa',
    allowed: within(lastDigit / pressure),
    reason: 'half a unit of the last digit printed',
    status: 'read',
    independentOf: null, // the standard defines the law that the program evaluates
    simulated: false,
    compute: () => airAt((6356766 * height) / (6356766 - height)).pressure,
  };
};

export const usStandardAtmosphere1976: Source = { source: 'U.S. Standard Atmosphere, 1976 (NOAA, NASA, USAF)', checks: BASES.map(row) };
