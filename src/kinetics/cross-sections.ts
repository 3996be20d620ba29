import type { Provenance } from '../gases/gas.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';

/** What electrons meet in a gas, as the particle engine takes it. Energies in eV, cross-sections in m². */

export type ProcessKind =
  /** integral cross-section of elastic scattering; with isotropic scattering taken as it is */
  | 'elastic'
  /** momentum transfer of elastic scattering alone, inelastic collisions not included */
  | 'momentum-transfer'
  | 'excitation'
  | 'ionisation'
  | 'attachment';

export interface Process {
  readonly kind: ProcessKind;
  /** tells it from others of its kind */
  readonly name: string;
  /** energy lost [eV]; 0 for elastic scattering; below it the process does not happen */
  readonly threshold: number;
  /** [m²] at an energy [eV] */
  readonly crossSection: (energy: number) => number;
}

/** How two electrons share what an ionisation leaves. */
export type Sharing =
  /** C. B. Opal, W. K. Peterson and E. C. Beaty, J. Chem. Phys. 55, 4100, 1971, in the form that integrates in closed form: the ejected electron has
   *  ε with probability ∝ 1/(1 + (ε/w)²), 0 < ε < (E − I)/2 (second-hand; their exponent is 2.1).
   *  `width` w [eV]; null: the ionisation threshold, which it is near in most gases */
  | { readonly kind: 'opal'; readonly width: number | null }
  /** every share equally likely */
  | { readonly kind: 'uniform' }
  /** half each */
  | { readonly kind: 'equal' };

export interface CrossSectionSet extends Provenance {
  /** as the command line names it */
  readonly name: string;
  readonly title: string;
  /** of a molecule [kg] */
  readonly mass: number;
  /** elastic scattering first */
  readonly processes: readonly Process[];
  readonly sharing: Sharing;
  /** energies [eV] over which the set is known */
  readonly range: { readonly from: number; readonly to: number };
  /** gas temperature it is meant for, if it is a model [K] */
  readonly temperature: number | null;
  readonly notes: readonly string[];
}

/** electron mass [kg], 9.1093837015(28)e-31, CODATA 2018 */
export const ELECTRON_MASS = 9.1093837015e-31;
/** atomic mass constant [kg], 1.66053906660(50)e-27, CODATA 2018 */
export const ATOMIC_MASS = 1.6605390666e-27;
/** speed of an electron of 1 eV [m/s], non-relativistic: √(2e/m). Speeds inside the engine are in units of it, so that a speed squared is an energy in eV. */
export const SPEED_OF_1_EV: number = Math.sqrt((2 * ELEMENTARY_CHARGE) / ELECTRON_MASS);

/** A cross-section from rows, energies [eV] rising strictly, values [m²]: straight lines between rows; before the first row 0 for a process with a
 *  threshold and its value otherwise; beyond the last row falling as 1/E. */
export function tabulated(energies: ArrayLike<number>, values: ArrayLike<number>, threshold: number): (energy: number) => number {
  const last = energies.length - 1;
  return (energy) => {
    if (energy <= energies[0]) return threshold > 0 && energy < energies[0] ? 0 : values[0];
    if (energy >= energies[last]) return (values[last] * energies[last]) / energy;
    let [low, high] = [0, last];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (energies[middle] <= energy) low = middle;
      else high = middle;
    }
    return values[low] + ((values[high] - values[low]) * (energy - energies[low])) / (energies[high] - energies[low]);
  };
}
