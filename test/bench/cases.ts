import type { Case } from '../../src/case.ts';
import { makeCase } from '../theory/make-case.ts';

/** A canonical run: a fresh case each time, so that nothing remembered of an earlier run helps. */
export interface BenchCase {
  readonly name: string;
  readonly what: string;
  make(cells: number | null, tolerance: number): Case;
}

type Parts = Partial<Omit<Case, 'supply'>> & { supply?: Partial<Case['supply']> };

function build(cells: number | null, tolerance: number, parts: Parts): Case {
  const base = makeCase();
  return makeCase({
    ...parts,
    supply: { ...base.supply, parallelCapacitance: 100e-12, ...parts.supply },
    numerics: { cells, tolerance },
  });
}

/** V_s of the reference gap [V], computed in test/theory. */
const V_S = 209.274207;

export const referenceGlow: BenchCase = {
  name: 'reference-glow',
  what: 'step to a glow at 10 % overvoltage behind 10 kohm with 100 pF, 2 ms',
  make: (cells, tolerance) => build(cells, tolerance, { observe: { until: 2e-3, currents: [1e-6, 1e-5, 1e-4, 1e-3] } }),
};

export const others: readonly BenchCase[] = [
  {
    name: 'growth-only',
    what: 'growth at 10 % overvoltage from 1e-14 A, ends before space charge',
    make: (cells, tolerance) =>
      build(cells, tolerance, {
        seed: { cathodeCurrent: 1e-14, electrons: 0 },
        supply: { seriesResistance: 0, programme: { kind: 'step', voltage: 1.1 * V_S, riseTime: 0 } },
        observe: { until: 110e-6, currents: [1e-9, 1e-8] },
      }),
  },
  {
    name: 'slow-ramp',
    what: 'ramp of 100 V/s from 0 to 500 V, breakdown on the way, 5 s',
    make: (cells, tolerance) =>
      build(cells, tolerance, {
        supply: { programme: { kind: 'ramp', from: 0, to: 500, rate: 100 } },
        observe: { until: 5, currents: [1e-6, 1e-3] },
      }),
  },
  {
    name: 'relaxation-oscillation',
    what: 'a source too weak for the glow: 3 Mohm with 1 nF, 30 ms',
    make: (cells, tolerance) =>
      build(cells, tolerance, {
        supply: { seriesResistance: 3e6, parallelCapacitance: 1e-9 },
        observe: { until: 30e-3, currents: [1e-6] },
      }),
  },
];
