import { levelsOf } from '../gases/levels.ts';
import type { IonYield } from './surface.ts';

/** The ion that carries the current, where it reaches the wall as it was made; the energy set free when it takes up an electron is the gas's ionisation energy. */
const IONS: Readonly<Record<string, string>> = {
  helium: 'He+',
  neon: 'Ne+',
  argon: 'Ar+',
  krypton: 'Kr+',
  xenon: 'Xe+',
  nitrogen: 'N2+',
  oxygen: 'O2+',
  'carbon dioxide': 'CO2+',
};

/** Slow ions on atomically clean metal, measured: Hagstrum, Phys. Rev. 96, 325, 1954 and 104, 317, 1956. */
const MEASURED: Readonly<
  Record<string, { readonly status: 'from memory (H)' | 'from memory (M)'; readonly yields: Readonly<Record<string, number>> }>
> = {
  tungsten: { status: 'from memory (H)', yields: { helium: 0.29, neon: 0.21, argon: 0.095, krypton: 0.05, xenon: 0.02 } },
  molybdenum: { status: 'from memory (M)', yields: { helium: 0.3, neon: 0.25, argon: 0.12, krypton: 0.07, xenon: 0.02 } },
};

/** below this the formula is a small difference of large numbers and says nothing */
const LEAST = 0.005;

/** Electrons set free by the energy an ion carries, whatever its speed: γ = 0.032 (0.78 E_i − 2 φ), not below zero.
 *
 *  @param ionisationEnergy  E_i [eV]
 *  @param workFunction      φ [eV]
 *  Source: form of Kishinevsky and of Baragiola et al. (from memory, H). Within 25 % of Hagstrum's He+, Ne+, Ar+ and Kr+ on tungsten.
 *  @example  potentialEmission(15.76, 4.5) is 0.105 */
export function potentialEmission(ionisationEnergy: number, workFunction: number): number {
  return Math.max(0, 0.032 * (0.78 * ionisationEnergy - 2 * workFunction));
}

/** Yield of slow ions on the atomically clean metal, reached only by flashing or sputtering in good vacuum: measured for tungsten and molybdenum, else by the formula.
 *
 *  @returns null for an unknown gas or work function, for ions whose charge settles before the wall (H3+, SF5+, hydrates), and where the formula leaves less than 0.005 */
export function cleanYield(material: string, workFunction: number | null, gas: string): IonYield | null {
  const measured = Object.hasOwn(MEASURED, material) ? MEASURED[material] : null;
  if (measured !== null && Object.hasOwn(measured.yields, gas)) {
    const typical = measured.yields[gas];
    return {
      typical,
      low: typical / 1.3,
      high: typical * 1.3,
      source: `${IONS[gas]} on clean ${material}: Hagstrum, Phys. Rev. 96, 325, 1954 and 104, 317, 1956`,
      status: measured.status,
      uncertainty: 0.3,
    };
  }
  const energy = levelsOf(gas)?.ionisation;
  if (workFunction === null || energy === undefined || !Object.hasOwn(IONS, gas)) return null;
  const typical = potentialEmission(energy, workFunction);
  if (typical < LEAST) return null;
  return {
    typical,
    low: typical / 2,
    high: typical * 2,
    source: `${IONS[gas]} on clean ${material} by potential emission, 0.032 (0.78 E_i − 2 φ) (form of Kishinevsky and of Baragiola et al., from memory, H), E_i ${energy} eV, φ ${workFunction} eV`,
    status: 'computed',
    uncertainty: 0.5,
  };
}
