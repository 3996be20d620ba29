import { closeSync, constants, fstatSync, openSync, readSync } from 'node:fs';
import { isAbsolute, resolve } from 'node:path';

const MAX_BYTES = 64e6;

export type TableText = { readonly ok: true; readonly text: string } | { readonly ok: false; readonly reason: string };

/** Opens the CSV files that a case names, relative to the case's folder.
 *
 *  Only regular files of at most 64 MB, in UTF-8; the size is checked before anything is read, and reading stops there.
 *  Nothing is thrown: what cannot be read comes back as a reason. */
export function tableReader(folder: string): (relativePath: string) => TableText {
  return (relativePath) => {
    if (relativePath.trim() === '' || relativePath.includes('\0')) return { ok: false, reason: 'no file name' };
    if (isAbsolute(relativePath)) return { ok: false, reason: 'an absolute path; tables lie relative to the case file' };
    let file: number;
    try {
      // without O_NONBLOCK, opening a named pipe would wait for a writer
      file = openSync(resolve(folder, relativePath), constants.O_RDONLY | constants.O_NONBLOCK);
    } catch (error) {
      return { ok: false, reason: reasonOf(error) };
    }
    try {
      const stat = fstatSync(file);
      if (!stat.isFile()) return { ok: false, reason: 'not a regular file' };
      if (stat.size > MAX_BYTES) return { ok: false, reason: `${Math.ceil(stat.size / 1e6)} MB, more than 64 MB` };
      const bytes = Buffer.alloc(stat.size);
      let length = 0;
      while (length < stat.size) {
        const read = readSync(file, bytes, length, stat.size - length, null);
        if (read === 0) break; // the file was shortened meanwhile
        length += read;
      }
      return { ok: true, text: new TextDecoder('utf-8', { fatal: true }).decode(bytes.subarray(0, length)) };
    } catch (error) {
      return { ok: false, reason: reasonOf(error) };
    } finally {
      closeSync(file);
    }
  };
}

function reasonOf(error: unknown): string {
  const code = (error as { code?: unknown }).code;
  const known: Record<string, string> = {
    ENOENT: 'no such file',
    EACCES: 'permission denied',
    EISDIR: 'a folder',
    ENXIO: 'not a regular file',
    ERR_ENCODING_INVALID_ENCODED_DATA: 'not UTF-8',
  };
  return typeof code === 'string' ? (known[code] ?? code) : 'unreadable';
}
