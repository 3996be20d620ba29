import { metals, type SurfaceData } from './metals.ts';
import type { Surface } from './surface.ts';

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
