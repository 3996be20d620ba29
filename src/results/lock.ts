import { closeSync, openSync, readFileSync, renameSync, statSync, unlinkSync, writeSync } from 'node:fs';
import { ResultFileError, resultFileError } from './errors.ts';

/** One writer per result file: a lock file that holds the process id of the writer. */
export interface Lock {
  /** Removes the lock file; may be called twice. */
  release(): void;
}

/** Locks this process holds. One that bears its id and is not here was left by an earlier process of the same id,
 *  which is usual in containers. */
const held = new Set<string>();

/** [ms] a lock file without a process id may be one that is being written; after this time it is a left-over */
const writingTime = 2000;

/** Creates the lock file. A lock of a process that lives refuses, one of a dead process is taken over, and a file that is no lock is left
 *  alone (a `.lock` beside the result may well belong to something else).
 *  @throws ResultFileError */
export function acquireLock(lockPath: string): Lock {
  // Twice: a dead lock is first moved out of the way; if another process is faster then, its lock is a live one.
  for (let attempt = 0; attempt < 2; attempt++) {
    if (create(lockPath)) {
      held.add(lockPath);
      return {
        release: () => {
          if (held.delete(lockPath)) removeIfThere(lockPath);
        },
      };
    }
    const content = settledContentOf(lockPath);
    if (content === null) continue;
    refuseUnlessDead(lockPath, content);
    takeAway(lockPath, content);
  }
  throw new ResultFileError('locked', lockPath, 'another process has just taken this lock');
}

function create(lockPath: string): boolean {
  try {
    const descriptor = openSync(lockPath, 'wx');
    try {
      writeSync(descriptor, `${process.pid}\n`);
    } catch (thrown) {
      // A full disk: the file was made, its content was not.
      removeIfThere(lockPath);
      throw thrown;
    } finally {
      closeSync(descriptor);
    }
    return true;
  } catch (thrown) {
    if ((thrown as NodeJS.ErrnoException).code === 'EEXIST') return false;
    throw resultFileError(lockPath, thrown);
  }
}

/** Content of a lock file, once there is some. An empty one is being written, or was left by a process killed between making it and writing it:
 *  it is given the time that writing may take, and is then a left-over. */
function settledContentOf(lockPath: string): string | null {
  for (;;) {
    const content = contentOf(lockPath);
    if (content !== '' || Date.now() - (statSync(lockPath, { throwIfNoEntry: false })?.mtimeMs ?? 0) > writingTime) return content;
    Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, 50);
  }
}

function contentOf(lockPath: string): string | null {
  try {
    if (!statSync(lockPath).isFile()) throw new ResultFileError('foreign', lockPath, 'is in the way and is not a lock of gapwake');
    return readFileSync(lockPath, 'latin1');
  } catch (thrown) {
    if ((thrown as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw resultFileError(lockPath, thrown);
  }
}

function refuseUnlessDead(lockPath: string, content: string): void {
  if (content === '') return;
  if (!/^[1-9][0-9]{0,9}\n?$/.test(content)) {
    throw new ResultFileError('foreign', lockPath, 'is in the way and is not a lock of gapwake; choose another output name or move it');
  }
  const pid = Number(content);
  const alive = pid === process.pid ? held.has(lockPath) : lives(pid);
  if (!alive) return;
  throw new ResultFileError('locked', lockPath, `process ${pid} is writing this result; if it is no gapwake, remove the lock file`);
}

function lives(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (thrown) {
    // Not permitted: it lives, under another user.
    return (thrown as NodeJS.ErrnoException).code === 'EPERM';
  }
}

/** Moves a dead lock aside and removes it. Moving is atomic: of two processes that found the same dead lock one succeeds. If what was moved is
 *  no longer the dead lock, another process was faster by a whole take-over, and its lock goes back. */
function takeAway(lockPath: string, content: string): void {
  const aside = `${lockPath}.${process.pid}`;
  try {
    renameSync(lockPath, aside);
    if (readFileSync(aside, 'latin1') !== content) {
      renameSync(aside, lockPath);
      throw new ResultFileError('locked', lockPath, 'another process has just taken this lock');
    }
    unlinkSync(aside);
  } catch (thrown) {
    if ((thrown as NodeJS.ErrnoException).code === 'ENOENT') return;
    throw resultFileError(lockPath, thrown);
  }
}

function removeIfThere(path: string): void {
  try {
    unlinkSync(path);
  } catch {
    // Already gone, or not removable: a lock of a dead process is taken over, so nothing is lost.
  }
}
