import { execFile } from 'node:child_process';
import { availableParallelism } from 'node:os';

/** Converts SVG files to PNG at twice their size, where a converter is at hand.
 *  @param pairs  SVG and PNG paths
 *  @returns how many were made; null where there is no converter */
export async function pngOf(pairs: readonly (readonly [svg: string, png: string])[]): Promise<number | null> {
  const left = [...pairs];
  let made = 0;
  let missing = false;
  const work = async (): Promise<void> => {
    for (let pair = left.shift(); pair !== undefined && !missing; pair = left.shift()) {
      const failure = await convert(...pair);
      if (failure === null) made++;
      else if (failure.code === 'ENOENT') missing = true;
    }
  };
  await Promise.all(Array.from({ length: availableParallelism() }, work));
  return missing ? null : made;
}

function convert(svg: string, png: string): Promise<NodeJS.ErrnoException | null> {
  return new Promise((done) => {
    execFile('rsvg-convert', ['--zoom', '2', '--output', png, svg], (error) => done(error as NodeJS.ErrnoException | null));
  });
}
