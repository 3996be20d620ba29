/** Runs of many kinds on default settings: what a user brings, not what the solver was tuned on. */
import type { Case } from '../../src/case.ts';
import { builtInCase } from './built-in.ts';
import {
  breakdownVoltageOf,
  type CaseParts,
  caseOf,
  leftOfMinimum,
  type PlainGap,
  rightOfMinimum,
  stepTo,
  withoutDiffusion,
} from './plain-gap.ts';

const seed = { cathodeCurrent: 1e-10 };
const levels = [1e-8, 1e-6, 1e-4, 1e-3];
const glow = { seriesResistance: 1e4, parallelCapacitance: 100e-12 };

/** a step to an overvoltage behind 10 kΩ with 100 pF */
function step(gap: PlainGap, over: number, until: number, parts: CaseParts = {}): Case {
  return caseOf(gap, {
    seed,
    observe: { until, currents: levels },
    ...parts,
    supply: { programme: stepTo((1 + over) * breakdownVoltageOf(gap)), ...glow, ...parts.supply },
  });
}

function ramp(rate: number, parts: CaseParts = {}): Case {
  const to = 300;
  return caseOf(rightOfMinimum, {
    seed,
    observe: { until: (1.05 * to) / rate + 2e-4, currents: levels },
    ...parts,
    supply: { programme: { kind: 'ramp', from: 0, to, rate }, ...glow, ...parts.supply },
  });
}

const argon = { gas: 'argon', torr: 2, spacing: 0.01, area: 1e-3, ionYield: 0.07 } as const;
const nitrogen = { gas: 'nitrogen', torr: 1.5, spacing: 0.01, area: 1e-3, ionYield: 0.03 } as const;
const air = { gas: 'air', torr: 2, spacing: 0.008, area: 2e-3, ionYield: 0.01 } as const;

export const QUICK: readonly (readonly [string, Case])[] = [
  ['a step to 10 % overvoltage', step(rightOfMinimum, 0.1, 5e-4)],
  ['a ramp of 1e6 V/s', ramp(1e6)],
  [
    'argon, a step behind 20 kΩ',
    builtInCase(argon, {
      seed,
      supply: { programme: stepTo(260), seriesResistance: 2e4, parallelCapacitance: 100e-12 },
      observe: { until: 4e-4, currents: levels },
    }),
  ],
  [
    'a trip that opens, with 1 nF of stored charge',
    step(rightOfMinimum, 0.2, 8e-4, {
      supply: { seriesResistance: 1e5, parallelCapacitance: 1e-9, trip: { current: 1e-3, delay: 1e-6, senses: 'gap', action: 'open' } },
    }),
  ],
];

export const KEPT_ASIDE: readonly (readonly [string, Case])[] = [
  ...QUICK,
  ['a step to 2 % overvoltage', step(rightOfMinimum, 0.02, 1.5e-3)],
  ['a step to 50 % overvoltage', step(rightOfMinimum, 0.5, 3e-4)],
  ['a step to 100 % overvoltage', step(rightOfMinimum, 1, 3e-4)],
  ['a step to 10 % overvoltage without diffusion', step(withoutDiffusion(rightOfMinimum), 0.1, 5e-4)],
  ['a step to 10 % overvoltage left of the minimum', step(leftOfMinimum, 0.1, 5e-4)],
  ['a step to 50 % overvoltage left of the minimum, without diffusion', step(withoutDiffusion(leftOfMinimum), 0.5, 5e-4)],
  [
    'a step near the minimum with a picoampere of seed',
    step({ ...rightOfMinimum, torr: 0.7 }, 0.2, 5e-4, { seed: { cathodeCurrent: 1e-12 } }),
  ],
  ['one electron at 20 % overvoltage', step(rightOfMinimum, 0.2, 3e-4, { seed: { cathodeCurrent: 0, electrons: 1 } })],
  ['a yield of 0.005', step({ ...rightOfMinimum, ionYield: 0.005 }, 0.1, 5e-4)],
  ['a long gap at 10 Torr cm', step({ ...rightOfMinimum, torr: 10 }, 0.1, 1e-3)],
  ['a ramp of 1e3 V/s', ramp(1e3)],
  ['a ramp of 1e5 V/s', ramp(1e5)],
  ['a ramp of 1e7 V/s', ramp(1e7)],
  ['a ramp of 1e8 V/s', ramp(1e8)],
  [
    'a trip that drives the supply to zero',
    step(rightOfMinimum, 0.2, 2e-4, { supply: { trip: { current: 1e-3, delay: 5e-7, senses: 'gap', action: 'zero' } } }),
  ],
  ['a limited current behind no resistance', step(rightOfMinimum, 0.2, 5e-4, { supply: { seriesResistance: 0, currentLimit: 2e-3 } })],
  [
    'stored charge alone',
    caseOf(rightOfMinimum, {
      seed,
      supply: { programme: stepTo(0), seriesResistance: 1e8, parallelCapacitance: 1e-9, initialGapVoltage: 250 },
      observe: { until: 2e-4, currents: levels },
    }),
  ],
  [
    'nitrogen, a step behind 20 kΩ',
    builtInCase(nitrogen, {
      seed,
      supply: { programme: stepTo(420), seriesResistance: 2e4, parallelCapacitance: 100e-12 },
      observe: { until: 4e-4, currents: levels },
    }),
  ],
  [
    'nitrogen, a ramp of 1e6 V/s',
    builtInCase(nitrogen, {
      seed,
      supply: { programme: { kind: 'ramp', from: 0, to: 500, rate: 1e6 }, seriesResistance: 5e4, parallelCapacitance: 50e-12 },
      observe: { until: 8e-4, currents: levels },
    }),
  ],
  [
    'air, a step behind 50 kΩ',
    builtInCase(air, {
      seed,
      supply: { programme: stepTo(520), seriesResistance: 5e4, parallelCapacitance: 100e-12 },
      observe: { until: 6e-4, currents: levels },
    }),
  ],
  [
    'argon left of the minimum',
    builtInCase(
      { ...argon, torr: 0.4 },
      {
        seed,
        supply: { programme: stepTo(250), seriesResistance: 2e4, parallelCapacitance: 100e-12 },
        observe: { until: 4e-4, currents: levels },
      },
    ),
  ],
  [
    'argon, a ramp of 1e4 V/s behind 100 kΩ',
    builtInCase(argon, {
      seed,
      supply: { programme: { kind: 'ramp', from: 0, to: 300, rate: 1e4 }, seriesResistance: 1e5, parallelCapacitance: 50e-12 },
      observe: { until: 3.2e-2, currents: levels },
    }),
  ],
];
