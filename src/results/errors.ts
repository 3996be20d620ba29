/** Why a result file could not be read or written: stable, for exit codes and `--json`. */
export type ResultFileCode =
  /** no such file, or its folder is missing */
  | 'missing'
  /** a folder or a device where a file is expected */
  | 'not-a-file'
  /** the system refused: permission, full disk, input/output error */
  | 'system'
  /** another process is writing it */
  | 'locked'
  /** not written by gapwake: never overwritten, never read */
  | 'foreign'
  /** a gapwake result of another kind than the one asked for */
  | 'other-kind'
  /** unfinished results of another case, version or part */
  | 'other-study'
  /** written by a newer gapwake */
  | 'newer'
  /** cut short or its contents are inconsistent */
  | 'damaged'
  /** larger than this program reads */
  | 'too-large';

/** A result file that cannot be read or written. `message` is one line that names neither the file nor a stack; print it after `path`. */
export class ResultFileError extends Error {
  override readonly name = 'ResultFileError';
  readonly code: ResultFileCode;
  readonly path: string;

  constructor(code: ResultFileCode, path: string, message: string) {
    super(message);
    this.code = code;
    this.path = path;
  }
}

const sentences: Readonly<Record<string, readonly [ResultFileCode, string]>> = {
  ENOENT: ['missing', 'there is no such file'],
  ENOTDIR: ['missing', 'a part of this path is a file, not a folder'],
  EISDIR: ['not-a-file', 'is a folder, not a file'],
  EACCES: ['system', 'permission denied'],
  EPERM: ['system', 'permission denied'],
  EROFS: ['system', 'the file system is read-only'],
  ENOSPC: ['system', 'no space left on the disk'],
  EDQUOT: ['system', 'the disk quota is used up'],
  ENAMETOOLONG: ['system', 'the name is too long'],
};

/** Turns what a call of the system threw into a {@link ResultFileError}; one that is already typed passes unchanged. */
export function resultFileError(path: string, thrown: unknown): ResultFileError {
  if (thrown instanceof ResultFileError) return thrown;
  const systemCode = (thrown as { code?: unknown } | null)?.code;
  const known = typeof systemCode === 'string' ? sentences[systemCode] : undefined;
  if (known) return new ResultFileError(known[0], path, known[1]);
  const text = thrown instanceof Error ? thrown.message : String(thrown);
  return new ResultFileError('system', path, text.split('\n', 1)[0]?.slice(0, 200) ?? '');
}
