import { argonIonYields } from './argon-yields.ts';
import { metals, type SurfaceData } from './metals.ts';
import { cleanYield } from './potential-emission.ts';
import type { IonYield, Surface } from './surface.ts';
import type { YieldData } from './yield-law.ts';

export type { SurfaceData } from './metals.ts';

/** The built-in cathode materials by the name a case uses. */
export const surfaces: Readonly<Record<string, SurfaceData>> = Object.fromEntries(metals.map((m) => [m.name, m]));

/** The electrode surface of a named material in a named gas.
 *
 *  @param material  name of a built-in material
 *  @param gas       name of a built-in gas, or null when the case brings its own coefficients; a gas without a row takes the wide `any` row
 *  @returns         the surface, or null when the material is not known */
export function yieldFor(material: string, gas: string | null): Surface | null {
  if (!Object.hasOwn(surfaces, material)) return null;
  const { name, yields, workFunction } = surfaces[material];
  const row = gas !== null && Object.hasOwn(yields, gas) ? yields[gas] : yields.any;
  return { material: name, ionYield: row, workFunction: workFunction?.value ?? null };
}

/** The yield of slow ions on the atomically clean material: potential emission, not a net yield of breakdown.
 *
 *  @returns null where the material or gas is unknown or nothing can be said (see `cleanYield`) */
export function cleanYieldFor(material: string, gas: string): IonYield | null {
  if (!Object.hasOwn(surfaces, material)) return null;
  return cleanYield(material, surfaces[material].workFunction?.value ?? null, gas);
}

/** The yield of a material in a gas as a law of the ion's energy at the wall, clean or as technical surfaces are.
 *
 *  @returns null where none is published: all gases but argon, whose law holds for metals in general */
export function yieldLawFor(material: string, gas: string, state: 'clean' | 'technical'): YieldData | null {
  if (!Object.hasOwn(surfaces, material) || material === 'graphite' || gas !== 'argon') return null;
  return argonIonYields[state];
}
