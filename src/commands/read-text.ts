import { closeSync, constants, fstatSync, openSync, readSync } from 'node:fs';

export type TextRead = { readonly ok: true; readonly text: string } | { readonly ok: false; readonly reason: string };

/** Reads a text file: a regular one of at most `maxBytes`, in UTF-8. The size is checked before anything is read, and reading stops there.
 *  Nothing is thrown: what cannot be read comes back as a reason. */
export function readText(path: string, maxBytes: number): TextRead {
  let file: number;
  try {
    // without O_NONBLOCK, opening a named pipe would wait for a writer
    file = openSync(path, constants.O_RDONLY | constants.O_NONBLOCK);
  } catch (error) {
    return { ok: false, reason: reasonOf(error) };
  }
  try {
    const stat = fstatSync(file);
    if (stat.isDirectory()) return { ok: false, reason: 'a folder' };
    if (!stat.isFile()) return { ok: false, reason: 'not a regular file' };
    if (stat.size > maxBytes) return { ok: false, reason: `${(stat.size / 1e6).toPrecision(3)} MB, more than ${maxBytes / 1e6} MB` };
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
}

function reasonOf(error: unknown): string {
  const code = (error as { code?: unknown }).code;
  const known: Record<string, string> = {
    ENOENT: 'no such file',
    ENOTDIR: 'no such file',
    EACCES: 'permission denied',
    EISDIR: 'a folder',
    ENXIO: 'not a regular file',
    ERR_INVALID_ARG_VALUE: 'no file name',
    ERR_ENCODING_INVALID_ENCODED_DATA: 'not UTF-8',
  };
  return typeof code === 'string' ? (known[code] ?? code) : 'unreadable';
}
