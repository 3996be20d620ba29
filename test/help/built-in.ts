/** Cases with the built-in gases, electrodes of the given yield at both walls. */
import type { Case } from '../../src/case.ts';
import { gases } from '../../src/gases/index.ts';
import { BOLTZMANN } from '../oracles/open-case.ts';
import { type CaseParts, caseOf, rightOfMinimum } from './plain-gap.ts';

const PASCAL_PER_TORR = 101325 / 760;

export interface BuiltIn {
  readonly gas: 'argon' | 'nitrogen' | 'air';
  /** [Torr] at 293.15 K */
  readonly torr: number;
  /** [m], [m²] */
  readonly spacing: number;
  readonly area: number;
  readonly ionYield: number;
}

export function builtInCase({ gas, torr, spacing, area, ionYield }: BuiltIn, parts: CaseParts = {}): Case {
  const base = caseOf({ ...rightOfMinimum, spacing, area, ionYield }, parts);
  const { coefficients, ...rest } = gases[gas];
  const pressure = torr * PASCAL_PER_TORR;
  return {
    ...base,
    title: `${gas}, ${torr} Torr, ${spacing} m`,
    gas: {
      name: gas,
      pressure,
      temperature: 293.15,
      density: pressure / (BOLTZMANN * 293.15),
      coefficients: { ...coefficients, ...parts.coefficients },
      breakdownUncertainty: rest.breakdownUncertainty,
      kineticCrossSection: rest.kineticCrossSection,
    },
  };
}
