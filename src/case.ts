import type { PlanarGap } from './gap/geometry.ts';
import type { Gas } from './gases/gas.ts';
import type { SupplySettings } from './supply/settings.ts';
import type { Surface } from './surfaces/surface.ts';

/** One gap, energised once: everything in SI, every default resolved. Plain frozen data: it can be hashed, stored and sent to a worker. */
export interface Case {
  readonly title: string;
  /** SHA-256 of the resolved case (SI, table contents by hash), hexadecimal */
  readonly sha256: string;
  readonly gap: PlanarGap;
  readonly gas: Gas;
  readonly electrodes: { readonly left: Surface; readonly right: Surface };
  readonly seed: {
    /** [A], ≥ 0, leaves whichever wall is the cathode */
    readonly cathodeCurrent: number;
    /** electrons released at the cathode at t = 0, ≥ 0 */
    readonly electrons: number;
  };
  readonly supply: SupplySettings;
  /** electrons as particles; absent: they follow the local field */
  readonly electrons?: KineticElectrons;
  readonly observe: {
    /** [s] */
    readonly until: number;
    /** conduction-current levels to report [A], rising */
    readonly currents: readonly number[];
  };
  readonly numerics: {
    /** null: the program's choice (≤ 200) */
    readonly cells: number | null;
    readonly tolerance: number;
  };
}

/** How electrons are followed as particles. */
export interface KineticElectrons {
  readonly closure: 'kinetic';
  /** with which electrons leave the cathode [eV] */
  readonly emissionEnergy: number;
  /** electrons emitted for one answer, at most */
  readonly particles: number;
  /** of the random numbers */
  readonly seed: number;
}
