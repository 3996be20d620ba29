import { appendFileSync, existsSync, mkdirSync, readFileSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { deleteJournal, type JournalHeader, openJournal, type Span } from '../../src/results/journal.ts';
import { folder } from './folder.ts';

const header: JournalHeader = { kind: 'scan', version: '1.2.3', study: 'a'.repeat(64), part: '10 points' };

/** Entries that a journal holds when it is opened again. */
function entriesOf(path: string, expected: JournalHeader = header): [string, string][] {
  const entries: [string, string][] = [];
  openJournal(path, expected, (key, _, json) => entries.push([key, json()])).close();
  return entries;
}

function write(path: string, count: number, from = 0): Span[] {
  const journal = openJournal(path, header, () => {});
  const spans = Array.from({ length: count }, (_, i) => journal.append(String(from + i), JSON.stringify({ n: from + i, text: 'Ω µ\n' })));
  journal.close();
  return spans;
}

const value = (n: number): string => JSON.stringify({ n, text: 'Ω µ\n' });
const error = (code: string, path: string, message: RegExp): Error =>
  expect.objectContaining({ name: 'ResultFileError', code, path, message: expect.stringMatching(message) }) as unknown as Error;

describe('a journal', () => {
  test('gives back what was appended, in any number of sessions', () => {
    const path = join(folder(), 'run.part');
    write(path, 3);
    write(path, 2, 3);
    expect(entriesOf(path)).toEqual([0, 1, 2, 3, 4].map((n) => [String(n), value(n)]));
  });

  test('reads an entry where it says it lies, before and after it was opened again', () => {
    const path = join(folder(), 'run.part');
    const spans = write(path, 200);
    const known: Span[] = [];
    const journal = openJournal(path, header, (_, span) => known.push(span));
    expect(known).toEqual(spans);
    for (const n of [0, 57, 199]) expect(journal.read(spans[n] as Span)).toBe(value(n));
    const more = journal.append('200', value(200));
    expect(journal.read(more)).toBe(value(200));
    journal.close();
  });

  test('is larger than a block', () => {
    const path = join(folder(), 'run.part');
    const journal = openJournal(path, header, () => {});
    const text = JSON.stringify('x'.repeat(300_000));
    for (let n = 0; n < 12; n++) journal.append(String(n), text);
    journal.close();
    expect(entriesOf(path)).toEqual(Array.from({ length: 12 }, (_, n) => [String(n), text]));
  });

  test('refuses what would not be one line', () => {
    const journal = openJournal(join(folder(), 'run.part'), header, () => {});
    expect(() => journal.append('a key', '1')).toThrow(RangeError);
    expect(() => journal.append('', '1')).toThrow(RangeError);
    expect(() => journal.append('a', '1\n2')).toThrow(RangeError);
    journal.close();
  });

  test('is gone when its results are safe elsewhere', () => {
    const path = join(folder(), 'run.part');
    const journal = openJournal(path, header, () => {});
    journal.remove();
    expect(existsSync(path)).toBe(false);
    journal.close();
  });
});

describe('what a machine leaves that goes down', () => {
  test('a file cut anywhere loses only the line that is cut, and goes on', () => {
    const place = folder();
    const whole = join(place, 'whole.part');
    write(whole, 3);
    const bytes = readFileSync(whole);
    const ends = [...bytes.entries()].filter(([, byte]) => byte === 10).map(([at]) => at + 1);
    for (let length = 0; length < bytes.length; length++) {
      const path = join(place, 'cut.part');
      writeFileSync(path, bytes);
      truncateSync(path, length);
      const left = Math.max(0, ends.filter((end) => end <= length).length - 1);
      expect(entriesOf(path), `cut at ${length}`).toEqual([0, 1, 2].slice(0, left).map((n) => [String(n), value(n)]));
      write(path, 3 - left, left);
      expect(readFileSync(path).equals(bytes), `cut at ${length} and gone on`).toBe(true);
    }
  });

  test('a last line of zeros, or a whole one with another content, is torn too', () => {
    const path = join(folder(), 'run.part');
    write(path, 2);
    appendFileSync(path, Buffer.alloc(700));
    expect(entriesOf(path).length).toBe(2);
    appendFileSync(path, '0123456789abcdef 2 {"n":2}\n');
    expect(entriesOf(path).length).toBe(2);
  });
});

describe('a journal that was changed', () => {
  test('in any byte of any line but the last is refused, and left as it is', () => {
    const place = folder();
    const whole = join(place, 'whole.part');
    write(whole, 3);
    const bytes = readFileSync(whole);
    // without the line end before the last line, both would be one torn line
    const lastLine = bytes.lastIndexOf(10, bytes.length - 2);
    const path = join(place, 'changed.part');
    for (let at = 0; at < lastLine; at++) {
      const changed = Buffer.from(bytes);
      changed[at] = (changed[at] as number) ^ 1;
      writeFileSync(path, changed);
      let thrown: unknown;
      try {
        entriesOf(path);
      } catch (reason) {
        thrown = reason;
      }
      expect(thrown, `byte ${at}`).toMatchObject({ name: 'ResultFileError', code: expect.stringMatching(/^(damaged|foreign)$/) });
      expect(readFileSync(path).equals(changed)).toBe(true);
    }
  });

  test('says which line, and what to do', () => {
    const path = join(folder(), 'run.part');
    write(path, 3);
    writeFileSync(path, readFileSync(path, 'utf8').replace('{"n":1,', '{"n":7,'));
    expect(() => entriesOf(path)).toThrow(error('damaged', path, /line 3 does not match its checksum; --restart deletes it/));
  });
});

describe('unfinished results of something else', () => {
  test.each([
    [{ kind: 'window' as const }, /of another kind \(scan, not window\)/],
    [{ version: '1.2.4' }, /of another version of gapwake \(1\.2\.3; this is 1\.2\.4\)/],
    [{ study: 'b'.repeat(64) }, /of another case/],
    [{ part: 'shard 1 of 2' }, /of another part of this study \(10 points, not shard 1 of 2\)/],
  ])('%j are refused, naming --restart, and left as they are', (change, message) => {
    const path = join(folder(), 'run.part');
    write(path, 2);
    const before = readFileSync(path);
    expect(() => entriesOf(path, { ...header, ...change })).toThrow(error('other-study', path, message));
    expect(() => entriesOf(path, { ...header, ...change })).toThrow(error('other-study', path, /--restart deletes them/));
    expect(readFileSync(path).equals(before)).toBe(true);
  });

  test.each(['my notes, which took weeks\n', 'abx', '\0\0\0', 'deadbeefdeadbeef other.journal/1 {}\n'])(
    'a file that holds %j is no journal, and nothing deletes it',
    (text) => {
      const path = join(folder(), 'run.part');
      writeFileSync(path, text);
      // three hexadecimal digits could be the beginning of a sum
      if (text !== 'abc') {
        expect(() => entriesOf(path)).toThrow(error('foreign', path, /is in the way/));
        expect(() => deleteJournal(path)).toThrow(error('foreign', path, /is in the way/));
        expect(readFileSync(path, 'utf8')).toBe(text);
      }
    },
  );

  test('a folder is not deleted either', () => {
    const path = join(folder(), 'run.part');
    mkdirSync(path);
    expect(() => entriesOf(path)).toThrow(error('foreign', path, /is in the way/));
    expect(() => deleteJournal(path)).toThrow(error('foreign', path, /is in the way/));
  });

  test('a journal is deleted on request, whole or cut short, and nothing needs to be there', () => {
    const path = join(folder(), 'run.part');
    deleteJournal(path);
    write(path, 2);
    deleteJournal(path);
    expect(existsSync(path)).toBe(false);
    write(path, 2);
    truncateSync(path, 20);
    deleteJournal(path);
    expect(existsSync(path)).toBe(false);
  });
});
