import { breakdownInTime } from '../help/gas-gap.ts';
import { type Source, within } from './check.ts';

export const raju: Source = {
  source: 'Raju, Gaseous Electronics (chapter abstract); yield of nickel near 40 V/(cm Torr), 1e-3: DeBitetto and Fisher 1956, read',
  checks: [
    {
      check: 'nitrogen, 1 cm at 1 atm: breakdown voltage',
      published: 30400,
      unit: 'V',
      allowed: within(0.05),
      reason: 'a factor of two in the yield moves V by 1.5 %; α known to 20 % moves it by 3 %',
      status: 'read',
      independentOf: 'the voltage: α from constants, the yield another paper’s; no breakdown criterion',
      simulated: true,
      slow: true,
      compute: () => breakdownInTime({ gas: 'nitrogen', torr: 760, ionYield: 1e-3 }, 29_000, 3e-3, '{ cells: 100 }'),
    },
  ],
};
