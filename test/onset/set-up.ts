/** The open case as the issue states it, with any part replaced. */
import type { Case } from '../../src/case.ts';
import type { Caution, CautionCode, Outcome } from '../../src/onset/outcome.ts';
import { simulateNow } from '../../src/simulate.ts';
import type { Programme } from '../../src/supply/settings.ts';
import { makeCase } from '../theory/make-case.ts';

export interface Changes {
  readonly gap?: Partial<Case['gap']>;
  readonly gas?: Partial<Case['gas']>;
  readonly electrodes?: Case['electrodes'];
  readonly seed?: Partial<Case['seed']>;
  readonly supply?: Partial<Case['supply']>;
  readonly observe?: Partial<Case['observe']>;
  readonly numerics?: Partial<Case['numerics']>;
}

export function openCaseWith(changes: Changes = {}): Case {
  const c = makeCase();
  return {
    ...c,
    gap: { ...c.gap, ...changes.gap },
    gas: { ...c.gas, ...changes.gas },
    electrodes: changes.electrodes ?? c.electrodes,
    seed: { ...c.seed, ...changes.seed },
    supply: { ...c.supply, parallelCapacitance: 100e-12, ...changes.supply },
    observe: { until: 2e-3, currents: [], ...changes.observe },
    numerics: { ...c.numerics, ...changes.numerics },
  };
}

export function outcomeOf(changes: Changes = {}): Outcome {
  return simulateNow(openCaseWith(changes));
}

/** V_s of the open case by its closed form, B p d / ln(A p d / ln(1 + 1/γ)) [V] */
export const V_S: number = (180 * 3) / Math.log((12 * 3) / Math.log1p(1 / 0.07));

/** time in which an ion drifts across the gap at V_s [s] */
export const ION_TRANSIT: number = 0.01 / ((0.14 / 3) * (V_S / 0.01));

export const step = (voltage: number, riseTime = 0): Programme => ({ kind: 'step', voltage, riseTime });
export const ramp = (to: number, rate: number, from = 0): Programme => ({ kind: 'ramp', from, to, rate });
export const table = (...rows: readonly (readonly [time: number, voltage: number])[]): Programme => ({
  kind: 'table',
  times: rows.map(([t]) => t),
  voltages: rows.map(([, v]) => v),
});

export const codes = (cautions: readonly Caution[]): CautionCode[] => cautions.map((c) => c.code);
