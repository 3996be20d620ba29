/** Writes snapshots until it is killed: killed-writer.ts FILE. Says so when the first blocks are on disk. */
import { openRunFile } from '../../src/results/write.ts';
import { cellCentres, snapshot } from './snapshots.ts';

const writer = await openRunFile(process.argv[2] as string, { x: cellCentres(100), negativeIons: true });
for (let index = 0; ; index++) {
  writer.append(snapshot(index, 100, true));
  if (index === 300) process.stdout.write('writing\n');
}
