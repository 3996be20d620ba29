import { isAbsolute, resolve } from 'node:path';
import { readText, type TextRead } from './read-text.ts';

const MAX_BYTES = 64e6;

/** Opens the CSV files that a case names, relative to the case's folder. */
export function tableReader(folder: string): (relativePath: string) => TextRead {
  return (relativePath) => {
    if (relativePath.trim() === '' || relativePath.includes('\0')) return { ok: false, reason: 'no file name' };
    if (isAbsolute(relativePath)) return { ok: false, reason: 'an absolute path; tables lie relative to the case file' };
    return readText(resolve(folder, relativePath), MAX_BYTES);
  };
}
