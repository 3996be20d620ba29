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

/** The electrode surface of a named material in a mixture of built-in gases.
 *
 *  Which ions reach the cathode is not known: charge passes to the gas that is ionised most easily, and metastables add theirs. So the largest of the yields in its gases is taken, whatever the
 *  fractions, and the widest spread: V_s comes out low, which is safe. A trace of helium thus gives the yield of helium.
 *
 *  @param gases  names of built-in gases
 *  @returns      the surface, or null when the material is not known */
export function yieldInMixture(material: string, gases: readonly string[]): Surface | null {
  const rows = gases.toSorted().flatMap((gas) => {
    const surface = yieldFor(material, gas);
    return surface === null ? [] : [{ gas, surface }];
  });
  if (rows.length === 0) return null;
  const all = rows.map(({ surface }) => surface.ionYield);
  const largest = rows.reduce((a, b) => (b.surface.ionYield.typical > a.surface.ionYield.typical ? b : a));
  if (rows.length === 1) return largest.surface;
  return {
    ...largest.surface,
    ionYield: {
      ...largest.surface.ionYield,
      low: Math.min(...all.map(({ low }) => low)),
      high: Math.max(...all.map(({ high }) => high)),
      source: `the largest of the yields in ${rows.map(({ gas }) => gas).join(', ')}, that in ${largest.gas}: ${largest.surface.ionYield.source}`,
      note: 'Which ions return to the cathode of a mixture is not known: the largest yield gives the lowest breakdown voltage, the safe side.',
    },
  };
}

/** The surface of a material in one gas in a stated condition: by the law of that condition, or, of clean metal, by the yield of slow ions.
 *
 *  @param condition  `clean`: freed of oxide and gas layers in vacuum; `technical`: as washed
 *  @returns          null where no yield is known: technical in all gases but argon, and graphite */
export function surfaceIn(material: string, gas: string, condition: 'clean' | 'technical'): Surface | null {
  if (!Object.hasOwn(surfaces, material)) return null;
  const { name, workFunction } = surfaces[material];
  const data = yieldLawFor(material, gas, condition);
  const ionYield = data !== null ? lawAsYield(data) : condition === 'clean' ? cleanYieldFor(material, gas) : null;
  return ionYield === null ? null : { material: name, ionYield, workFunction: workFunction?.value ?? null, condition };
}

/** A law as it stands, its uncertainty as the spread. */
function lawAsYield({ law, range: _, ...provenance }: YieldData): IonYield {
  const factor = 1 + (provenance.uncertainty ?? 0);
  return { typical: 1, low: 1 / factor, high: factor, ...provenance, law };
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
