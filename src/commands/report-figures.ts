import { execFile } from 'node:child_process';
import { mkdirSync, writeFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import type { FigureFile } from '../report/svg-file.ts';
import { resultFileError } from '../results/errors.ts';
import { printable } from '../units/printable.ts';

/** Writes figures into a folder, made if need be, as SVG and, where a converter is at hand, as PNG.
 *  @returns what was written, for people
 *  @throws ResultFileError */
export async function writeFigures(folder: string, files: readonly FigureFile[]): Promise<string> {
  try {
    mkdirSync(folder, { recursive: true });
    for (const { name, svg } of files) writeFileSync(join(folder, `${name}.svg`), svg);
  } catch (thrown) {
    throw resultFileError(folder, thrown);
  }
  const pictures = await pngOf(files.map(({ name }) => [join(folder, `${name}.svg`), join(folder, `${name}.png`)]));
  const also = pictures === null ? '; no PNG, because rsvg-convert is not installed' : ` and ${pictures} PNG`;
  return `Written: ${printable(folder)} (${files.length} SVG${also}).`;
}

/** Converts SVG files to PNG at twice their size, where a converter is at hand.
 *  @param pairs  SVG and PNG paths
 *  @returns how many were made; null where there is no converter */
async function pngOf(pairs: readonly (readonly [svg: string, png: string])[]): Promise<number | null> {
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
