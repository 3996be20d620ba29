import { electronMobilityInTime } from '../help/transit.ts';
import { alphaRow } from './alpha-rows.ts';
import { type Check, factor, type Source } from './check.ts';

/** μp of electrons, Table 2.1 [1e6 cm² Torr/(V s)], for a range of E/p; E/N at which a swarm is timed, near the middle of it on a logarithmic scale, in helium a little below, before it ionises [Td] */
const MOBILITIES: readonly (readonly [gas: string, mobility: number, td: number])[] = [
  ['helium', 0.86, 6],
  ['neon', 1.5, 2.7],
  ['argon', 0.33, 11],
  ['hydrogen', 0.37, 33],
  ['air', 0.45, 43],
  ['carbon dioxide', 1.1, 30],
];

const mobility = ([gas, published, td]: (typeof MOBILITIES)[number]): Check => ({
  check: `electrons in ${gas}: μp, timed in two gaps at ${td} Td`,
  published,
  unit: '1e6 cm² Torr/(V s)',
  allowed: factor(1.3),
  reason:
    'one value for a quantity that falls by up to a factor of two over the range it is given for, so 1.25 either way at best; the pressure may mean 0 °C, 7 %',
  status: 'from memory (M)',
  independentOf:
    gas === 'air' ? 'this table: the data are a fit by Morrow and Lowke' : 'this table: the data are our own Boltzmann solution',
  simulated: true,
  compute: () => electronMobilityInTime(gas, td, published * 1e6) / 1e6,
});

export const raizer1991: Source = {
  source: 'Raizer, Gas Discharge Physics, 1991, Tables 2.1 and 4.1',
  checks: [
    ...MOBILITIES.map(mobility),
    // A [1/(cm Torr)], B [V/(cm Torr)], at a field [V/(cm Torr)] in the middle of the range that both authors claim
    alphaRow({ gas: 'argon', author: [12, 180], at: 250, share: 0.25, status: 'from memory (H)', ours: 'a fit by Phelps and Petrović' }),
    alphaRow({
      gas: 'neon',
      author: [4, 100],
      at: 200,
      share: 0.25,
      status: 'from memory (H)',
      ours: 'Ward’s form, then constants of Lieberman and Lichtenberg',
    }),
    alphaRow({ gas: 'krypton', author: [17, 240], at: 400, share: 0.25, status: 'from memory (H)', ours: 'Ward’s form' }),
    alphaRow({ gas: 'xenon', author: [26, 350], at: 400, share: 0.25, status: 'from memory (H)', ours: 'Ward’s form' }),
    alphaRow({
      gas: 'hydrogen',
      author: [5, 130],
      at: 300,
      share: 0.25,
      status: 'from memory (H)',
      ours: 'constants of Lieberman and Lichtenberg',
    }),
    alphaRow({ gas: 'air', author: [15, 365], at: 130, share: 0.25, status: 'second-hand', ours: 'Morrow and Lowke’s streamer data' }),
  ],
};
