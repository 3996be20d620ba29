import { isAbsolute, resolve } from 'node:path';
import type { DatasetReader, TableReader } from '../casefile/index.ts';
import { readNumbers } from '../results/numbers.ts';
import { readText } from './read-text.ts';

const MAX_BYTES = 64e6;

/** Opens the CSV files that a case names, relative to the case's folder. */
export function tableReader(folder: string): TableReader {
  return (relativePath) => {
    const reason = refusal(relativePath);
    return reason === null ? readText(resolve(folder, relativePath), MAX_BYTES) : { ok: false, reason };
  };
}

/** Reads data sets of the HDF5 files that a case names, relative to the case's folder. */
export function datasetReader(folder: string): DatasetReader {
  return (relativePath, dataset) => {
    const reason = refusal(relativePath);
    return reason === null ? readNumbers(resolve(folder, relativePath), dataset) : { ok: false, reason };
  };
}

function refusal(relativePath: string): string | null {
  if (relativePath.trim() === '' || relativePath.includes('\0')) return 'no file name';
  if (isAbsolute(relativePath)) return 'an absolute path; tables lie relative to the case file';
  return null;
}
