import { readRunFile } from '../../../src/results/read.ts';
import { fieldVariables, type Snapshot, scalarVariables } from '../../../src/results/variables.ts';
import { openRunFile } from '../../../src/results/write.ts';

/** A run file with many snapshots and cells: those of another run, with as many as needed in between, so that it is as smooth as a real one. */
export async function writeLongRun(source: string, path: string, snapshots: number, cells: number): Promise<void> {
  const run = readRunFile(source);
  const columns = run.x.length;
  const x = Float64Array.from({ length: cells }, (_, k) => at(run.x, (k / (cells - 1)) * (columns - 1)));
  const fields = fieldVariables.flatMap(({ key }) => {
    const values = run.fields[key];
    return values === null ? [] : [{ key, values: values.data }];
  });
  const writer = await openRunFile(path, { x, negativeIons: run.fields.negativeIonDensity !== null });
  for (let i = 0; i < snapshots; i++) {
    const place = (i / (snapshots - 1)) * (run.time.length - 1);
    const row = Math.min(run.time.length - 2, Math.floor(place));
    const profile = (values: Float32Array): Float64Array => {
      const [before, after] = [
        values.subarray(row * columns, (row + 1) * columns),
        values.subarray((row + 1) * columns, (row + 2) * columns),
      ];
      return Float64Array.from({ length: cells }, (_, k) => {
        const column = (k / (cells - 1)) * (columns - 1);
        return between(at(before, column), at(after, column), place - row);
      });
    };
    writer.append({
      time: at(run.time, place),
      ...Object.fromEntries(scalarVariables.map(({ key }) => [key, at(run.scalars[key], place)])),
      ...Object.fromEntries(fields.map(({ key, values }) => [key, profile(values)])),
    } as unknown as Snapshot);
  }
  const { title, version, caseText, outcomeJson, coefficientsJson, tablesJson } = run;
  writer.finish({ title, version, caseText, outcomeJson, coefficientsJson, tablesJson });
}

function at(values: ArrayLike<number>, place: number): number {
  const low = Math.min(values.length - 2, Math.floor(place));
  return between(values[low], values[low + 1], place - low);
}

/** as things grow: in the logarithm where both have one sign */
function between(a: number, b: number, share: number): number {
  return a > 0 && b > 0 ? a ** (1 - share) * b ** share : a + share * (b - a);
}
