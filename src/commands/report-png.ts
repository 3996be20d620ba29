import { spawnSync } from 'node:child_process';

/** Converts SVG files to PNG at twice their size, where a converter is at hand.
 *  @param pairs  SVG and PNG paths
 *  @returns how many were made; null where there is no converter */
export function pngOf(pairs: readonly (readonly [svg: string, png: string])[]): number | null {
  let made = 0;
  for (const [svg, png] of pairs) {
    const { status, error } = spawnSync('rsvg-convert', ['--zoom', '2', '--output', png, svg], { stdio: 'ignore' });
    if ((error as NodeJS.ErrnoException | undefined)?.code === 'ENOENT') return null;
    if (status === 0) made++;
  }
  return made;
}
