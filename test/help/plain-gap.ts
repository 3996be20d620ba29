/** Test gaps in plain numbers, and each of them as the program's Case and as the gaps of the oracles.
 *
 *  α = A p exp(−B p/E), η/p, mobilities times p and energies D/μ are constant. The oracles get plain SI numbers and
 *  plain functions made here; the program gets the same numbers as coefficient forms against E/N. */
import type { Case } from '../../src/case.ts';
import type { DiffusiveGap } from '../oracles/diffusive-growth-rate.ts';
import type { TransientGap } from '../oracles/linear-transient.ts';
import { BOLTZMANN } from '../oracles/open-case.ts';
import type { SteadyGap } from '../oracles/steady-gap.ts';
import { coefficient, makeCase } from '../theory/make-case.ts';

const PASCAL_PER_TORR = 101325 / 760;
const TEMPERATURE = 300;

export interface PlainGap {
  /** [m], [m²] */
  readonly spacing: number;
  readonly area: number;
  /** [Torr] at 300 K */
  readonly torr: number;
  /** α/p [1/(cm Torr)] and B [V/(cm Torr)] */
  readonly A: number;
  readonly B: number;
  /** η/p [1/(cm Torr)]; 0 for a gas that does not attach */
  readonly attachment: number;
  readonly ionYield: number;
  /** μp [cm² Torr/(V s)] */
  readonly electronMobility: number;
  readonly ionMobility: number;
  readonly negativeIonMobility: number;
  /** D/μ [V] */
  readonly electronEnergy: number;
  readonly ionEnergy: number;
}

/** The gap of the open case (right of the Paschen minimum). */
export const rightOfMinimum: PlainGap = {
  spacing: 0.01,
  area: 1e-3,
  torr: 3,
  A: 12,
  B: 180,
  attachment: 0,
  ionYield: 0.07,
  electronMobility: 3e5,
  ionMobility: 1400,
  negativeIonMobility: 1800,
  electronEnergy: 1,
  ionEnergy: 0.026,
};

/** The same gas at 0.45 Torr cm; the minimum lies at e ln(1 + 1/γ)/A = 0.618 Torr cm. */
export const leftOfMinimum: PlainGap = { ...rightOfMinimum, torr: 0.45 };

/** Both sides of the minimum, by name. */
export const BRANCHES: readonly (readonly [string, PlainGap])[] = [
  ['right of the Paschen minimum', rightOfMinimum],
  ['left of the Paschen minimum', leftOfMinimum],
];

export function withoutDiffusion(gap: PlainGap): PlainGap {
  return { ...gap, electronEnergy: 0, ionEnergy: 0 };
}

/** α [1/m] and η [1/m] in a field [V/m] */
export function alphaIn(gap: PlainGap, field: number): number {
  return field === 0 ? 0 : 100 * gap.A * gap.torr * Math.exp((-100 * gap.B * gap.torr) / Math.abs(field));
}

export function etaOf(gap: PlainGap): number {
  return 100 * gap.attachment * gap.torr;
}

/** q = γ α (e^{(α−η)d} − 1)/(α − η) at a voltage, the definition of physics.md */
export function feedbackAt(gap: PlainGap, voltage: number): number {
  const alpha = alphaIn(gap, voltage / gap.spacing);
  const net = alpha - etaOf(gap);
  return (gap.ionYield * alpha * Math.expm1(net * gap.spacing)) / net;
}

/** V_s [V]. Without attachment the closed form B p d/[ln(A p d) − ln ln(1 + 1/γ)]; with it the same equation q = 1, bisected. */
export function breakdownVoltageOf(gap: PlainGap): number {
  const pd = 100 * gap.torr * gap.spacing;
  if (gap.attachment === 0) return (gap.B * pd) / (Math.log(gap.A * pd) - Math.log(Math.log1p(1 / gap.ionYield)));
  let low = 1;
  let high = 2;
  while (feedbackAt(gap, high) < 1) high *= 2;
  for (;;) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) return middle;
    if (feedbackAt(gap, middle) < 1) low = middle;
    else high = middle;
  }
}

/** The uniform field at a voltage, for exactGrowthRate and diffusiveGrowthRate. */
export function uniformAt(gap: PlainGap, voltage: number): DiffusiveGap {
  const field = voltage / gap.spacing;
  const electronMobility = (gap.electronMobility * 1e-4) / gap.torr;
  const ionMobility = (gap.ionMobility * 1e-4) / gap.torr;
  return {
    alpha: alphaIn(gap, field),
    eta: etaOf(gap),
    spacing: gap.spacing,
    ionYield: gap.ionYield,
    electronSpeed: electronMobility * field,
    ionSpeed: ionMobility * field,
    electronDiffusion: electronMobility * gap.electronEnergy,
    ionDiffusion: ionMobility * gap.ionEnergy,
  };
}

export function transientAt(gap: PlainGap, voltage: number, seedCurrent: number): TransientGap {
  const { alpha, spacing, ionYield, electronSpeed, ionSpeed } = uniformAt(gap, voltage);
  return { alpha, spacing, ionYield, electronSpeed, ionSpeed, seedCurrent };
}

export function steadyGapOf(gap: PlainGap, seedCurrent: number): SteadyGap {
  return {
    spacing: gap.spacing,
    area: gap.area,
    alpha: (field) => alphaIn(gap, field),
    ionYield: gap.ionYield,
    electronMobility: (gap.electronMobility * 1e-4) / gap.torr,
    ionMobility: (gap.ionMobility * 1e-4) / gap.torr,
    electronEnergy: gap.electronEnergy,
    ionEnergy: gap.ionEnergy,
    seedCurrent,
  };
}

/** The gap as a Case on default settings: at rest behind an ideal supply of 0 V; parts are replaced as given. */
export function caseOf(gap: PlainGap, parts: CaseParts = {}): Case {
  const base = makeCase();
  const perTorr = PASCAL_PER_TORR / (BOLTZMANN * TEMPERATURE);
  const N = gap.torr * perTorr;
  const mobility = (cm2Torr: number) => coefficient({ kind: 'constant', value: cm2Torr * 1e-4 * perTorr });
  const surface = { ...base.electrodes.left, ionYield: { ...base.electrodes.left.ionYield, typical: gap.ionYield } };
  const attaches = gap.attachment > 0;
  return {
    ...base,
    title: 'test gap',
    gap: { geometry: 'planar', spacing: gap.spacing, area: gap.area, longestPath: gap.spacing, longestPathGiven: false },
    gas: {
      ...base.gas,
      pressure: gap.torr * PASCAL_PER_TORR,
      temperature: TEMPERATURE,
      density: N,
      coefficients: {
        ...base.gas.coefficients,
        ionisation: coefficient({ kind: 'exponential', A: (100 * gap.A) / perTorr, B: (100 * gap.B) / perTorr }),
        attachment: attaches ? coefficient({ kind: 'constant', value: (100 * gap.attachment) / perTorr }) : null,
        electronMobility: mobility(gap.electronMobility),
        electronEnergy: coefficient({ kind: 'constant', value: gap.electronEnergy }),
        ionMobility: mobility(gap.ionMobility),
        ionEnergy: coefficient({ kind: 'constant', value: gap.ionEnergy }),
        negativeIonMobility: attaches ? mobility(gap.negativeIonMobility) : null,
        negativeIonEnergy: attaches ? coefficient({ kind: 'constant', value: gap.ionEnergy }) : null,
        ...parts.coefficients,
      },
    },
    electrodes: { left: surface, right: surface },
    seed: { cathodeCurrent: 1e-10, electrons: 0, ...parts.seed },
    supply: {
      programme: { kind: 'step', voltage: 0, riseTime: 0 },
      seriesResistance: 0,
      parallelCapacitance: 0,
      currentLimit: null,
      trip: null,
      initialGapVoltage: 0,
      ...parts.supply,
    },
    observe: { until: 1e-3, currents: [], ...parts.observe },
    numerics: { cells: null, tolerance: 1e-3, ...parts.numerics },
  };
}

export interface CaseParts {
  readonly coefficients?: Partial<Case['gas']['coefficients']>;
  readonly seed?: Partial<Case['seed']>;
  readonly supply?: Partial<Case['supply']>;
  readonly observe?: Partial<Case['observe']>;
  readonly numerics?: Partial<Case['numerics']>;
}

/** A jump to a constant voltage. */
export function stepTo(voltage: number): Case['supply']['programme'] {
  return { kind: 'step', voltage, riseTime: 0 };
}
