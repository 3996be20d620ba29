import { spawn, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { once } from 'node:events';
import fs, {
  chmodSync,
  existsSync,
  lstatSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  symlinkSync,
  utimesSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { createHdf5 } from '../../src/results/hdf5.ts';
import { claimOutput } from '../../src/results/output.ts';
import { isGapwakeResult, readResultFormat, readRunFile } from '../../src/results/read.ts';
import type { RunWriter } from '../../src/results/write.ts';
import { openRunFile } from '../../src/results/write.ts';
import { folder } from './folder.ts';
import { cellCentres, documents, snapshot } from './snapshots.ts';

const open = (path: string): Promise<RunWriter> => openRunFile(path, { x: cellCentres(4), negativeIons: false });

async function writeRun(path: string, count: number): Promise<void> {
  const writer = await open(path);
  for (let index = 0; index < count; index++) writer.append(snapshot(index, 4, false));
  writer.finish(documents);
}

/** An HDF5 file of another program, or of a later gapwake. */
async function writeOther(path: string, attributes: Readonly<Record<string, string>>): Promise<void> {
  const file = await createHdf5(path);
  for (const [name, text] of Object.entries(attributes)) file.attribute(name, text);
  file.close();
}

const error = (code: string, path: string, message: RegExp): unknown =>
  expect.objectContaining({ name: 'ResultFileError', code, path, message: expect.stringMatching(message) });

describe('what may be overwritten', () => {
  test('a gapwake result is replaced, only when the new one is complete', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    await writeRun(path, 2);
    const writer = await open(path);
    writer.append(snapshot(0, 4, false));
    expect(readdirSync(place).sort()).toEqual(['run.h5', 'run.lock', 'run.part.h5']);
    expect(readRunFile(path).time.length).toBe(2);
    writer.finish(documents);
    expect(readdirSync(place)).toEqual(['run.h5']);
    expect(readRunFile(path).time.length).toBe(1);
  });

  test('an abandoned run leaves the older result as it was', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    await writeRun(path, 2);
    const before = readFileSync(path);
    const writer = await open(path);
    for (let index = 0; index < 200; index++) writer.append(snapshot(index, 4, false));
    writer.abandon();
    writer.abandon();
    expect(readdirSync(place)).toEqual(['run.h5']);
    expect(readFileSync(path).equals(before)).toBe(true);
  });

  test('abandoning after the end does nothing', async () => {
    const path = join(folder(), 'run.h5');
    const writer = await open(path);
    writer.finish(documents);
    writer.abandon();
    expect(readRunFile(path).time.length).toBe(0);
  });

  test.each([
    ['an empty file', ''],
    ['a text', 'my notes, which took weeks'],
    ['a file that begins like HDF5', '\x89HDF\r\n\x1a\n and then does not go on like it'],
  ])('%s is not replaced', async (_, content) => {
    const place = folder();
    const path = join(place, 'notes.h5');
    writeFileSync(path, content, 'latin1');
    await expect(open(path)).rejects.toEqual(error('foreign', path, /exists and is not a gapwake result; it is not replaced/));
    expect(readFileSync(path, 'latin1')).toBe(content);
    expect(readdirSync(place)).toEqual(['notes.h5']);
  });

  test('an HDF5 file of another program is neither replaced nor read', async () => {
    const path = join(folder(), 'other.h5');
    await writeOther(path, { title: 'gapwake.run/1', format: 'something/1' });
    expect(isGapwakeResult(path)).toBe(false);
    await expect(open(path)).rejects.toEqual(error('foreign', path, /not replaced/));
    expect(() => readRunFile(path)).toThrow(error('foreign', path, /^is not a gapwake result$/) as Error);
  });

  test('a file that appears during the run is not replaced either', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    const writer = await open(path);
    writeFileSync(path, 'precious');
    expect(() => writer.finish(documents)).toThrow(error('foreign', path, /not replaced/) as Error);
    expect(readFileSync(path, 'utf8')).toBe('precious');
    expect(readdirSync(place)).toEqual(['run.h5']);
  });

  test('a symbolic link stays one', async () => {
    const place = folder();
    mkdirSync(join(place, 'data'));
    await writeRun(join(place, 'data', 'real.h5'), 1);
    symlinkSync(join(place, 'data', 'real.h5'), join(place, 'link.h5'));
    await writeRun(join(place, 'link.h5'), 3);
    expect(lstatSync(join(place, 'link.h5')).isSymbolicLink()).toBe(true);
    expect(readRunFile(join(place, 'data', 'real.h5')).time.length).toBe(3);
  });

  test('a name without .h5 is kept, and unusual names work', async () => {
    const place = folder();
    await writeRun(join(place, 'Lüftung 1.nc'), 1);
    await writeRun(join(place, '.h5'), 1);
    expect(readdirSync(place).sort()).toEqual(['.h5', 'Lüftung 1.nc']);
    expect(readRunFile(join(place, 'Lüftung 1.nc')).time.length).toBe(1);
  });
});

describe('where nothing can be written', () => {
  test('the folder is missing', async () => {
    const place = folder();
    const path = join(place, 'none', 'run.h5');
    await expect(open(path)).rejects.toEqual(error('missing', path, /there is no folder/));
    expect(readdirSync(place)).toEqual([]);
  });

  test('the folder is a file', async () => {
    const place = folder();
    writeFileSync(join(place, 'file'), '');
    const path = join(place, 'file', 'run.h5');
    await expect(open(path)).rejects.toEqual(error('missing', path, /is not a folder|is a file/));
  });

  test('the target is a folder', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    mkdirSync(path);
    await expect(open(path)).rejects.toEqual(error('not-a-file', path, /^is a folder, not a file$/));
    expect(() => readRunFile(path)).toThrow(error('not-a-file', path, /is a folder/) as Error);
    expect(readdirSync(place)).toEqual(['run.h5']);
  });

  test('the target is a device', async () => {
    await expect(open('/dev/null')).rejects.toEqual(error('not-a-file', '/dev/null', /not a regular file/));
  });

  test('the folder may not be written to', async () => {
    const place = folder();
    chmodSync(place, 0o555);
    const path = join(place, 'run.h5');
    const superuser = process.getuid?.() === 0;
    // The superuser may write anywhere: be nobody for a moment.
    if (superuser) process.seteuid?.(65534);
    try {
      await expect(open(path)).rejects.toEqual(error('system', path, /^cannot be written: permission denied$/));
    } finally {
      if (superuser) process.seteuid?.(0);
      chmodSync(place, 0o755);
    }
    expect(readdirSync(place)).toEqual([]);
  });

  test('there is no such file to read', () => {
    expect(() => readRunFile('/none/run.h5')).toThrow(error('missing', '/none/run.h5', /^there is no such file$/) as Error);
  });
});

describe('other versions', () => {
  test('a newer format is refused by name, and may be replaced', async () => {
    const path = join(folder(), 'run.h5');
    await writeOther(path, { format: 'gapwake.run/2', version: '9.0.0' });
    const message = /^was written by a newer gapwake \(9\.0\.0\): its format is gapwake\.run\/2, this program reads gapwake\.run\/1$/;
    expect(() => readRunFile(path)).toThrow(error('newer', path, message) as Error);
    expect(readResultFormat(path)).toEqual({ kind: 'run', version: 2 });
    await writeRun(path, 1);
    expect(readResultFormat(path)).toEqual({ kind: 'run', version: 1 });
  });

  test('a result of another kind says which', async () => {
    const path = join(folder(), 'scan.h5');
    await writeOther(path, { format: 'gapwake.scan/1' });
    expect(() => readRunFile(path)).toThrow(error('other-kind', path, /^holds a scan, expected a run$/) as Error);
    expect(isGapwakeResult(path)).toBe(true);
  });
});

describe('one writer', () => {
  /** Process id of a process that has ended. */
  const deadProcess = (): number => spawnSync(process.execPath, ['-e', '']).pid;

  test('a second one in this process is refused, and the first goes on', async () => {
    const place = folder();
    const path = join(place, 'run.h5');
    const writer = await open(path);
    await expect(open(path)).rejects.toEqual(error('locked', join(place, 'run.lock'), new RegExp(`process ${process.pid} is writing`)));
    writer.append(snapshot(0, 4, false));
    writer.finish(documents);
    expect(readRunFile(path).time.length).toBe(1);
  });

  test('a live process refuses', async () => {
    const place = folder();
    const lock = join(place, 'run.lock');
    const other = spawn(process.execPath, ['-e', 'setTimeout(() => {}, 60000)']);
    try {
      writeFileSync(lock, `${other.pid}\n`);
      await expect(open(join(place, 'run.h5'))).rejects.toEqual(error('locked', lock, new RegExp(`process ${other.pid} is writing`)));
      expect(readFileSync(lock, 'utf8')).toBe(`${other.pid}\n`);
      expect(readdirSync(place)).toEqual(['run.lock']);
    } finally {
      other.kill();
    }
  });

  test('the lock holds the id of this process', async () => {
    const place = folder();
    const writer = await open(join(place, 'run.h5'));
    expect(readFileSync(join(place, 'run.lock'), 'utf8')).toBe(`${process.pid}\n`);
    writer.abandon();
  });

  test.each([
    ['of a dead process', () => `${deadProcess()}\n`],
    ['of an earlier process with the id of this one', () => `${process.pid}\n`],
  ])('a lock %s is taken over', async (_, content) => {
    const place = folder();
    const path = join(place, 'run.h5');
    writeFileSync(join(place, 'run.lock'), content());
    await writeRun(path, 1);
    expect(readdirSync(place)).toEqual(['run.h5']);
  });

  test('an empty lock is taken over once it is two seconds old: its process was killed while it took it', async () => {
    const place = folder();
    const lock = join(place, 'run.lock');
    writeFileSync(lock, '');
    const start = Date.now();
    await writeRun(join(place, 'run.h5'), 1);
    expect(Date.now() - start).toBeGreaterThan(1500);
    writeFileSync(lock, '');
    utimesSync(lock, 1, 1);
    await writeRun(join(place, 'run.h5'), 1);
    expect(readdirSync(place)).toEqual(['run.h5']);
  });

  test.each(['run.lock', 'run.part.h5'])('a foreign %s is left alone', async (name) => {
    const place = folder();
    const path = join(place, name);
    writeFileSync(path, 'packages:\n  - one 1.2.3\n');
    await expect(open(join(place, 'run.h5'))).rejects.toEqual(error('foreign', path, /is in the way/));
    expect(readdirSync(place)).toEqual([name]);
    expect(readFileSync(path, 'utf8')).toBe('packages:\n  - one 1.2.3\n');
  });

  test('an HDF5 file of another program is no part file', async () => {
    const place = folder();
    await writeOther(join(place, 'run.part.h5'), { program: 'another', note: 'x'.repeat(300) });
    await expect(open(join(place, 'run.h5'))).rejects.toEqual(error('foreign', join(place, 'run.part.h5'), /is in the way/));
  });

  test('a part file is recognised after each of the writes that bring it to the disk: a kill may come between any two', async () => {
    const place = folder();
    const part = join(place, 'run.part.h5');
    const states = new Map<string, Buffer>();
    // the library writes through this object
    const { writeSync } = fs;
    fs.writeSync = ((...given: Parameters<typeof writeSync>): number => {
      const written = writeSync(...given);
      if (existsSync(part)) {
        const state = readFileSync(part);
        states.set(createHash('sha256').update(state).digest('hex'), state);
      }
      return written;
    }) as typeof writeSync;
    try {
      await writeRun(join(place, 'run.h5'), 40);
    } finally {
      fs.writeSync = writeSync;
    }
    expect(states.size).toBeGreaterThan(20);
    let unreadable = 0;
    for (const state of states.values()) {
      writeFileSync(part, state);
      if (!isGapwakeResult(part)) unreadable++;
      claimOutput(join(place, 'run.h5')).discard();
    }
    // the states this is about are among them
    expect(unreadable).toBeGreaterThan(1);
  });

  test.each([0, 300])('what a process killed after %i snapshots left is recognised and replaced', async (count) => {
    const place = folder();
    const path = join(place, 'run.h5');
    const script = fileURLToPath(new URL('killed-writer.ts', import.meta.url));
    const child = spawn(process.execPath, ['--import', 'tsx/esm', script, path, `${count}`], { stdio: ['ignore', 'pipe', 'inherit'] });
    await once(child.stdout, 'data');
    child.kill('SIGKILL');
    await once(child, 'exit');
    expect(readdirSync(place).sort()).toEqual(['run.lock', 'run.part.h5']);
    await writeRun(path, 2);
    expect(readdirSync(place)).toEqual(['run.h5']);
    expect(readRunFile(path).time.length).toBe(2);
  });
});
