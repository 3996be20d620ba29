/** Makes the files that the bench of reports opens: a run of 2,000 snapshots over 200 cells from a shorter one, and a scan of 10,000 points. */
import { writeLongRun } from '../report/help/long-run.ts';
import { writeManyPoints } from '../report/help/many-points.ts';

const [, , source, run, scan] = process.argv;
await writeLongRun(source, run, 2000, 200);
await writeManyPoints(scan, 100, 100);
