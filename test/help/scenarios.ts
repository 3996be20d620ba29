/** Runs that between them visit every feed, both trips, both polarities, three species and recombination; short, on default settings. */
import type { Case } from '../../src/case.ts';
import { coefficient } from '../theory/make-case.ts';
import { caseOf, rightOfMinimum, stepTo } from './plain-gap.ts';

const seed = { cathodeCurrent: 1e-10 };

export const SCENARIOS: readonly (readonly [string, Case])[] = [
  [
    'a step to a glow',
    caseOf(rightOfMinimum, {
      seed,
      supply: { programme: stepTo(230.202), seriesResistance: 1e4, parallelCapacitance: 100e-12 },
      observe: { until: 1e-3 },
    }),
  ],
  [
    'a rise and fall of the supply with both polarities',
    caseOf(rightOfMinimum, {
      seed,
      supply: {
        programme: { kind: 'table', times: [0, 5e-5, 1.5e-4, 2.5e-4, 4e-4], voltages: [0, 300, 280, -300, -260] },
        seriesResistance: 2e4,
        parallelCapacitance: 20e-12,
      },
      observe: { until: 4e-4 },
    }),
  ],
  [
    'a ramp behind an ideal supply that reaches its current limit',
    caseOf(rightOfMinimum, {
      seed,
      supply: { programme: { kind: 'ramp', from: 0, to: 280, rate: 5e6 }, parallelCapacitance: 10e-12, currentLimit: 2e-3 },
      observe: { until: 3e-4 },
    }),
  ],
  [
    'a limited current behind a resistance',
    caseOf(rightOfMinimum, {
      seed,
      supply: { programme: stepTo(400), seriesResistance: 1e4, parallelCapacitance: 50e-12, currentLimit: 3e-3 },
      observe: { until: 3e-4 },
    }),
  ],
  [
    'a trip that opens with stored charge',
    caseOf(rightOfMinimum, {
      seed,
      supply: {
        programme: stepTo(260),
        seriesResistance: 1e5,
        parallelCapacitance: 1e-9,
        trip: { current: 1e-3, delay: 2e-6, senses: 'gap', action: 'open' },
      },
      observe: { until: 1.5e-3 },
    }),
  ],
  [
    'a trip that drives the supply to zero',
    caseOf(rightOfMinimum, {
      seed,
      supply: {
        programme: { kind: 'step', voltage: 260, riseTime: 2e-5 },
        seriesResistance: 1e4,
        parallelCapacitance: 100e-12,
        trip: { current: 2e-3, delay: 1e-6, senses: 'supply', action: 'zero' },
      },
      observe: { until: 3e-4 },
    }),
  ],
  [
    'stored charge alone',
    caseOf(rightOfMinimum, {
      seed: { cathodeCurrent: 1e-12, electrons: 10 },
      supply: { programme: stepTo(0), seriesResistance: 1e7, parallelCapacitance: 1e-9, initialGapVoltage: 260 },
      observe: { until: 1e-3 },
    }),
  ],
  [
    'attachment and recombination',
    caseOf(
      { ...rightOfMinimum, attachment: 0.4 },
      {
        seed,
        supply: { programme: stepTo(290), seriesResistance: 2e4, parallelCapacitance: 50e-12 },
        observe: { until: 4e-4 },
        coefficients: {
          electronIonRecombination: coefficient({ kind: 'constant', value: 1e-13 }),
          ionIonRecombination: coefficient({ kind: 'constant', value: 2e-13 }),
        },
      },
    ),
  ],
  [
    'a weak source that fires and recharges',
    caseOf(rightOfMinimum, {
      seed: { cathodeCurrent: 1e-9 },
      supply: { programme: stepTo(240), seriesResistance: 5e6, parallelCapacitance: 20e-12 },
      observe: { until: 1.5e-3 },
    }),
  ],
];
