/** Writes COUNT snapshots, says so, and waits to be killed: killed-writer.ts FILE COUNT. */
import { openRunFile } from '../../src/results/write.ts';
import { cellCentres, snapshot } from './snapshots.ts';

const [path, count] = process.argv.slice(2) as [string, string];
const writer = await openRunFile(path, { x: cellCentres(100), negativeIons: true });
for (let index = 0; index < Number(count); index++) writer.append(snapshot(index, 100, true));
process.stdout.write('written\n');
setInterval(() => {}, 1000);
