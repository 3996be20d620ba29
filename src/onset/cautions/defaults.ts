import type { Case } from '../../case.ts';
import { surfaces } from '../../surfaces/index.ts';
import type { Caution } from '../outcome.ts';

/** Defaults that change the physics when they are not what the hardware has. */
const THAT_MATTER: readonly string[] = [
  'gas.temperature',
  'gas.coefficients.electron_energy',
  'electrodes.left.ion_yield',
  'electrodes.right.ion_yield',
];

/** The caution about defaults that matter; null where none was used.
 *  @param paths of every default used, `fallbackYields` among them */
export function defaultsCaution(paths: readonly string[]): Caution | null {
  const used = paths.filter((path) => THAT_MATTER.includes(path));
  if (used.length === 0) return null;
  return { code: 'defaults', text: `The result rests on defaults: ${used.join(', ')}. Give them if you know better.`, value: used.length };
}

/** Paths of the yields that are those for any gas, because nothing is known of the metal in this gas. */
export function fallbackYields({ electrodes }: Case): string[] {
  return (['left', 'right'] as const).flatMap((side) => {
    const { material, ionYield } = electrodes[side];
    const fallsBack = material !== null && ionYield.status !== 'given' && ionYield.source === surfaces[material]?.yields.any.source;
    return fallsBack ? [`electrodes.${side}.ion_yield`] : [];
  });
}
