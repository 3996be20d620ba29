import type { Case } from '../case.ts';
import { curveOf } from '../gases/curves.ts';
import type { Coefficient } from '../gases/gas.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';
import type { GapLaws, Species } from './gap-equations.ts';

/** The laws of a case: its gas's coefficients as curves, its walls' yields, its seed. */
export function lawsOf(settings: Case): GapLaws {
  const { coefficients: c, density } = settings.gas;
  const species: Species[] = [
    { name: 'electrons', charge: -1, mobility: curveOf(c.electronMobility.form), energy: curveOf(c.electronEnergy.form) },
    { name: 'positive ions', charge: 1, mobility: curveOf(c.ionMobility.form), energy: curveOf(c.ionEnergy.form) },
  ];
  if (c.attachment !== null) {
    const mobility = c.negativeIonMobility ?? c.ionMobility;
    const energy = c.negativeIonEnergy ?? c.ionEnergy;
    species.push({ name: 'negative ions', charge: -1, mobility: curveOf(mobility.form), energy: curveOf(energy.form) });
  }
  return {
    species,
    ionisation: curveOf(c.ionisation.form),
    attachment: c.attachment === null ? null : curveOf(c.attachment.form),
    electronIonRecombination: rate(c.electronIonRecombination),
    ionIonRecombination: rate(c.ionIonRecombination),
    density,
    leftYield: settings.electrodes.left.ionYield,
    rightYield: settings.electrodes.right.ionYield,
    seedFlux: settings.seed.cathodeCurrent / (ELEMENTARY_CHARGE * settings.gap.area),
  };
}

/** Recombination is taken as constant, [m³/s]: the published values are. */
function rate(c: Coefficient | null): number {
  return c === null ? 0 : curveOf(c.form).valueAt(0);
}
