import type { Case } from '../../case.ts';
import { surfaces } from '../../surfaces/index.ts';
import type { Caution } from '../outcome.ts';

/** Defaults that change the physics when they are not what the hardware has. */
const THAT_MATTER: readonly string[] = ['gas.temperature', 'gas.coefficients.electron_energy'];

/** The caution about defaults that matter; null where none was used.
 *  @param paths of every default used */
export function defaultsCaution(settings: Case, paths: readonly string[]): Caution | null {
  const used = [...THAT_MATTER.filter((path) => paths.includes(path)), ...fallbackYields(settings)];
  if (used.length === 0) return null;
  return { code: 'defaults', text: `The result rests on defaults: ${used.join(', ')}. Give them if you know better.`, value: used.length };
}

/** Electrodes whose yield is the one for any gas, because nothing is known of this metal in this gas. */
function fallbackYields({ electrodes }: Case): string[] {
  const { left, right } = electrodes;
  const fallsBack = ({ material, ionYield }: Case['electrodes']['left']): boolean =>
    material !== null && ionYield.status !== 'given' && ionYield.source === surfaces[material]?.yields.any.source;
  if (fallsBack(left) && right.material === left.material && fallsBack(right)) return ['the ion yield of both electrodes'];
  return [...(fallsBack(left) ? ['electrodes.left.ion_yield'] : []), ...(fallsBack(right) ? ['electrodes.right.ion_yield'] : [])];
}
