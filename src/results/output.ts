import { closeSync, fsyncSync, openSync, readSync, realpathSync, renameSync, rmSync, statSync } from 'node:fs';
import { basename, dirname, resolve } from 'node:path';
import { ResultFileError, resultFileError } from './errors.ts';
import type { Lock } from './lock.ts';
import { acquireLock } from './lock.ts';
import { isGapwakeResult } from './read.ts';

/** A result file to be: written under another name, renamed when complete. */
export interface Output {
  /** where it will be */
  readonly path: string;
  /** where it is written */
  readonly partPath: string;
  /** where work that takes long keeps what is finished; untouched by {@link Output.publish} and {@link Output.discard} */
  readonly journalPath: string;
  /** Brings the closed part file safely to disk and to its name, and releases the lock. */
  publish(): void;
  /** Removes the part file and releases the lock; the target stays as it was. May be called at any time. */
  discard(): void;
}

/** Checks that a result may be written at `path`, and locks it: for `run.h5` the part file is `run.part.h5`, the lock `run.lock` and the journal,
 *  if there is one, `run.part`.
 *  An existing file is replaced only if it is a gapwake result; nothing is changed before {@link Output.publish}.
 *  @throws ResultFileError */
export function claimOutput(path: string): Output {
  const target = realTarget(path);
  const base = target.endsWith('.h5') && basename(target) !== '.h5' ? target.slice(0, -'.h5'.length) : target;
  const partPath = `${base}.part.h5`;
  checkParent(path, dirname(target));
  checkReplaceable(path, target);

  const lock = lockFor(path, `${base}.lock`);
  try {
    checkPart(partPath);
  } catch (thrown) {
    lock.release();
    throw thrown;
  }

  let done = false;
  const discard = (): void => {
    if (done) return;
    done = true;
    try {
      rmSync(partPath, { force: true });
    } catch {
      // What cannot be removed is recognised and written over by the next run.
    }
    lock.release();
  };
  return {
    path: target,
    partPath,
    journalPath: `${base}.part`,
    discard,
    publish: () => {
      try {
        // Again: a run may take hours, and something else may have been put there.
        checkReplaceable(path, target);
        syncToDisk(partPath);
        renameSync(partPath, target);
      } catch (thrown) {
        discard();
        throw resultFileError(path, thrown);
      }
      done = true;
      lock.release();
      try {
        syncToDisk(dirname(target));
      } catch {
        // Some file systems cannot sync a folder; the file itself is safe.
      }
    },
  };
}

/** What the system refuses for the lock it refuses for the result: said of the result, whose name the user knows. */
function lockFor(path: string, lockPath: string): Lock {
  try {
    return acquireLock(lockPath);
  } catch (thrown) {
    if (!(thrown instanceof ResultFileError) || thrown.code !== 'system') throw thrown;
    throw new ResultFileError('system', path, `cannot be written: ${thrown.message}`);
  }
}

/** A symbolic link stays one: the file it points to is replaced. */
function realTarget(path: string): string {
  try {
    return realpathSync(path);
  } catch {
    return resolve(path);
  }
}

function checkParent(path: string, folder: string): void {
  try {
    if (statSync(folder).isDirectory()) return;
  } catch (thrown) {
    if ((thrown as NodeJS.ErrnoException).code !== 'ENOENT') throw resultFileError(path, thrown);
    throw new ResultFileError('missing', path, `cannot be written: there is no folder ${folder}`);
  }
  throw new ResultFileError('missing', path, `cannot be written: ${folder} is not a folder`);
}

function checkReplaceable(path: string, target: string): void {
  const status = statSync(target, { throwIfNoEntry: false });
  if (!status) return;
  if (status.isDirectory()) throw new ResultFileError('not-a-file', path, 'is a folder, not a file');
  if (!status.isFile()) throw new ResultFileError('not-a-file', path, 'is not a regular file');
  if (!isGapwakeResult(target)) throw new ResultFileError('foreign', path, 'exists and is not a gapwake result; it is not replaced');
}

/** A part file whose writer died is written over; a file that only bears its name is not. */
function checkPart(partPath: string): void {
  const status = statSync(partPath, { throwIfNoEntry: false });
  if (!status || (status.isFile() && (status.size === 0 || isGapwakeResult(partPath) || beganAsResult(partPath)))) return;
  throw new ResultFileError(
    'foreign',
    partPath,
    'is in the way and is not an unfinished gapwake result; choose another output name or move it',
  );
}

/** What an HDF5 file begins with, and the size below which it holds nothing yet. */
const SIGNATURE = '\x89HDF\r\n\x1a\n';
const NOTHING_YET = 256;

/** Whether a file that no reader understands was to be a result: its writer was killed while its parts went to the disk one by one. The name of the format is
 *  written first, near the beginning, and stays there. */
function beganAsResult(path: string): boolean {
  const file = openSync(path, 'r');
  try {
    const head = Buffer.alloc(1024);
    const length = readSync(file, head, 0, head.length, 0);
    const text = head.toString('latin1', 0, length);
    return text.startsWith(SIGNATURE) && (length < NOTHING_YET || /gapwake\.[a-z]+\/[0-9]/.test(text));
  } finally {
    closeSync(file);
  }
}

function syncToDisk(path: string): void {
  const descriptor = openSync(path, 'r');
  try {
    fsyncSync(descriptor);
  } finally {
    closeSync(descriptor);
  }
}
