import { curveOf } from '../gases/curves.ts';
import type { Coefficient, GasData } from '../gases/gas.ts';
import { surfaces } from '../surfaces/index.ts';
import type { IonYield } from '../surfaces/surface.ts';
import { type PaschenPoint, paschenMinimum } from '../theory/paschen.ts';

/** What the lists and pages of `gapwake gas` say beyond the tables themselves. */

/** the cathode for which a minimum is given when no material is named */
export const COMMON_CATHODE = 'metal';

/** The row of yields that a material has for a gas: its own or the wide one. */
export function yieldRow(material: string, gas: string): IonYield {
  const { yields } = surfaces[material];
  return Object.hasOwn(yields, gas) ? yields[gas] : yields.any;
}

/** Lowest breakdown voltage of a uniform field, in closed form; null where there is none. */
export function minimumOf(gas: GasData, ionYield: number): PaschenPoint | null {
  const { ionisation, attachment } = gas.coefficients;
  const alpha = curveOf(ionisation.form);
  const eta = attachment === null ? null : curveOf(attachment.form);
  return paschenMinimum({
    ionisation: (x) => alpha.valueAt(x),
    attachment: (x) => eta?.valueAt(x) ?? 0,
    ionYield: () => ionYield,
  });
}

/** Whether a reduced field [V m²] is one for which the source of a coefficient does not vouch. */
export function isOutside({ range }: Coefficient, x: number): boolean {
  return range !== null && (x < range.from || x > range.to);
}

/** Things of which several share one value: each value once, with the names that have it. */
export function grouped<T>(entries: Iterable<readonly [string, T]>): { readonly names: string[]; readonly value: T }[] {
  const groups = new Map<T, string[]>();
  for (const [name, value] of entries) groups.set(value, [...(groups.get(value) ?? []), name]);
  return [...groups].map(([value, names]) => ({ names, value }));
}
