import type { Case } from '../../src/case.ts';
import type { Form } from '../../src/gases/forms.ts';
import type { Coefficient } from '../../src/gases/gas.ts';
import { BOLTZMANN } from '../../src/units/constants.ts';
import { openCase } from '../oracles/open-case.ts';

export function coefficient(form: Form): Coefficient {
  return { form, range: null, source: 'test', status: 'given', uncertainty: null };
}

/** α/p = A exp(−B p/E) in 1/(cm Torr) and V/(cm Torr) at temperature T, as α/N against E/N */
export function exponentialForm(A: number, B: number, temperature: number): Form {
  const perTorr = 101325 / 760 / (BOLTZMANN * temperature);
  return { kind: 'exponential', A: (A * 100) / perTorr, B: (B * 100) / perTorr };
}

/** The open case as a Case; parts can be replaced. */
export function makeCase(parts: Partial<Case> = {}): Case {
  const N = openCase.density;
  const surface = (typical: number): Case['electrodes']['left'] => ({
    material: null,
    ionYield: { typical, low: typical, high: typical, source: 'test', status: 'given', uncertainty: null },
    workFunction: null,
  });
  return {
    title: 'open case',
    sha256: '',
    gap: { geometry: 'planar', spacing: openCase.spacing, area: openCase.area, longestPath: openCase.spacing, longestPathGiven: false },
    gas: {
      name: null,
      pressure: openCase.pressure,
      temperature: openCase.temperature,
      density: N,
      breakdownUncertainty: 0.2,
      kineticCrossSection: null,
      coefficients: {
        ionisation: coefficient(exponentialForm(12, 180, 300)),
        attachment: null,
        electronMobility: coefficient({ kind: 'constant', value: openCase.electronMobility * N }),
        electronEnergy: coefficient({ kind: 'constant', value: openCase.electronEnergy }),
        ionMobility: coefficient({ kind: 'constant', value: openCase.ionMobility * N }),
        ionEnergy: coefficient({ kind: 'constant', value: openCase.ionEnergy }),
        negativeIonMobility: null,
        negativeIonEnergy: null,
        electronIonRecombination: null,
        ionIonRecombination: null,
      },
    },
    electrodes: { left: surface(openCase.ionYield), right: surface(openCase.ionYield) },
    seed: { cathodeCurrent: openCase.seedCurrent, electrons: 0 },
    supply: {
      programme: { kind: 'step', voltage: openCase.supplyVoltage, riseTime: 0 },
      seriesResistance: openCase.seriesResistance,
      parallelCapacitance: 0,
      currentLimit: null,
      trip: null,
      initialGapVoltage: 0,
    },
    observe: { until: 1, currents: [] },
    numerics: { cells: null, tolerance: 1e-3 },
    ...parts,
  };
}
