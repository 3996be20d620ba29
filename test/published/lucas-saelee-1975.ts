import { lucasSaelee } from '../../src/kinetics/model-gases.ts';
import type { Source } from './check.ts';
import { type SwarmRow, swarmRows } from './swarm-rows.ts';

const energy = (published: number): SwarmRow => ({
  at: 10,
  quantity: 'meanEnergy',
  published,
  share: 0.01,
  reason: 'a gas by definition; three digits recollected as others recomputed them since, known to 1 % at best',
  status: 'from memory (L)',
  independentOf: 'these results: the engine has the definition of the gas alone',
});

export const lucasSaelee1975: Source = {
  source:
    'Lucas and Saelee, A comparison of a Monte Carlo simulation and the Boltzmann solution for electron swarm motion in gases, J. Phys. D 8, 640, 1975',
  checks: [...swarmRows(lucasSaelee(0), 12, 1e6, [energy(5.57)]), ...swarmRows(lucasSaelee(1), 12, 1e6, [energy(4.95)])],
};
