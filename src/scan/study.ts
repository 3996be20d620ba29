import { createHash } from 'node:crypto';
import type { Case } from '../case.ts';
import { type DefaultUsed, hashScan, type PointReader, type ReadResult, readCase } from '../casefile/index.ts';
import type { Find } from '../study.ts';
import { type Plan, planOf } from './plan.ts';

/** A scan as the program has read it: what is computed, and what it is read from again in each worker. */
export interface Study {
  /** before anything is varied */
  readonly case: Case;
  readonly plan: Plan;
  /** the case at a point: one SI value for each axis */
  readonly at: PointReader;
  /** paths of the entries that the case leaves to the program, at every point */
  readonly defaults: readonly string[];
  /** SHA-256 over everything that decides the results: two studies with one hash have the same points with the same answers */
  readonly hash: string;
  readonly source: StudySource;
}

/** Text and tables of a case: plain data, so that a worker needs no files and sees what the program saw, whatever happens to them meanwhile. */
export interface StudySource {
  readonly text: string;
  readonly fileName: string;
  readonly overrides: readonly string[];
  /** texts by the names of the files */
  readonly tables: readonly (readonly [file: string, text: string])[];
}

type Read = Extract<ReadResult, { readonly ok: true }>;

/** The scan of a case that was read; null when the case asks for none. */
export function studyOf(read: Read, text: string, fileName: string, overrides: readonly string[]): Study | null {
  const { scan, case: settings, at, tables } = read;
  if (scan === null) return null;
  const plan = planOf(scan);
  const defaults = defaultsOf(read.defaults, plan);
  // title and defaults do not change what is computed, but each outcome says them
  const said = JSON.stringify([hashScan(settings, scan), settings.title, defaults]);
  return {
    case: settings,
    plan,
    at,
    defaults,
    hash: createHash('sha256').update(said).digest('hex'),
    source: { text, fileName, overrides, tables: tables.map(({ file, text: content }) => [file, content]) },
  };
}

/** Reads a study again, in a worker. @throws Error when its text cannot be read, which it could before */
export function studyFrom({ text, fileName, overrides, tables }: StudySource): Study {
  const texts = new Map(tables);
  const reader = (file: string): { ok: true; text: string } | { ok: false; reason: string } => {
    const found = texts.get(file);
    return found === undefined ? { ok: false, reason: 'not among the tables of the scan' } : { ok: true, text: found };
  };
  // a history plays no part in a scan, and may need files
  const read = readCase(text, fileName, reader, [...overrides, 'history=']);
  const study = read.ok ? studyOf(read, text, fileName, overrides) : null;
  if (study === null) throw new Error('the case cannot be read again');
  return study;
}

/** Entries left to the program that no axis gives. */
function defaultsOf(defaults: readonly DefaultUsed[], { axes }: Plan): string[] {
  return defaults.map(({ path }) => path).filter((path) => !/^(scan|history)\./.test(path) && axes.every((axis) => axis.path !== path));
}

/** Identity of a point: the hash of its full case, and of what is searched there. */
export function pointId({ sha256 }: Case, find: Find | null): string {
  return find === null
    ? sha256
    : createHash('sha256')
        .update(JSON.stringify([sha256, find]))
        .digest('hex');
}

/** Identity of a point whose values make no case. */
export function pointIdWithoutCase({ case: settings, plan }: Study, values: readonly number[]): string {
  const paths = plan.axes.map(({ path }) => path);
  return createHash('sha256')
    .update(JSON.stringify([settings.sha256, paths, values, plan.find]))
    .digest('hex');
}
