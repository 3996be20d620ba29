import type { NdArray } from 'ndarray';
import ndarray from 'ndarray';
import { ResultFileError } from './errors.ts';
import type { Hdf5Reader } from './hdf5-reader.ts';
import { notAResult, openHdf5 } from './hdf5-reader.ts';
import type { FieldKey, RunTexts, ScalarKey } from './variables.ts';
import { fieldVariables, negativeIonFields, runFormat, scalarVariables, textVariables, timeVariable, xVariable } from './variables.ts';

/** A run read back from its file. */
export interface RunResult extends RunTexts {
  readonly path: string;
  readonly title: string;
  /** version of the program that wrote the file */
  readonly version: string;
  /** [s], never falling */
  readonly time: Float64Array;
  /** [m] cell centres */
  readonly x: Float64Array;
  /** each over (time) */
  readonly scalars: Readonly<Record<ScalarKey, Float64Array>>;
  /** each over (time, x); null for what this gas has not */
  readonly fields: Readonly<Record<FieldKey, NdArray<Float32Array> | null>>;
  /** `outcomeJson`, parsed */
  readonly outcome: Readonly<Record<string, unknown>>;
}

/** Reads a whole run file.
 *  @throws ResultFileError when it is missing, foreign, newer, cut short or damaged */
export function readRunFile(path: string): RunResult {
  const file = openHdf5(path);
  checkFormat(path, file, runFormat);
  const time = file.float64(timeVariable.name, [null]);
  const x = file.float64(xVariable.name, [null]);
  const shape = [time.length, x.length];

  const scalars = Object.fromEntries(scalarVariables.map(({ key, name }) => [key, file.float64(name, [time.length])]));
  const fields = Object.fromEntries(
    fieldVariables.map(({ key, name }) => {
      const absent = negativeIonFields.has(key) && !file.names.has(name);
      return [key, absent ? null : ndarray(file.float32(name, shape), shape)];
    }),
  );
  const texts = Object.fromEntries(textVariables.map(({ key, name }) => [key, file.text(name)])) as unknown as RunTexts;

  return {
    path,
    title: file.attribute('title') ?? '',
    version: file.attribute('version') ?? '',
    time,
    x,
    scalars: scalars as RunResult['scalars'],
    fields: fields as RunResult['fields'],
    ...texts,
    outcome: parseOutcome(path, texts.outcomeJson),
  };
}

/** Kind and version of a result: `gapwake.run/1` → { kind: 'run', version: 1 }. */
export interface ResultFormat {
  readonly kind: string;
  readonly version: number;
}

/** What kind of result a file says it is. @throws ResultFileError when it is missing, foreign, cut short or damaged */
export function readResultFormat(path: string): ResultFormat {
  return formatOf(path, openHdf5(path));
}

/** Whether a file is a gapwake result of any kind and version, and may be replaced by another. False for anything unreadable. */
export function isGapwakeResult(path: string): boolean {
  try {
    readResultFormat(path);
    return true;
  } catch (thrown) {
    if (thrown instanceof ResultFileError) return false;
    throw thrown;
  }
}

function formatOf(path: string, file: Hdf5Reader): ResultFormat {
  const [, kind, version] = /^gapwake\.([a-z]+)\/([0-9]{1,6})$/.exec(file.attribute('format') ?? '') ?? [];
  if (kind === undefined || version === undefined) throw notAResult(path);
  return { kind, version: Number(version) };
}

/** Refuses every other kind and a later version. @throws ResultFileError */
export function checkFormat(path: string, file: Hdf5Reader, format: string): void {
  const { kind, version } = formatOf(path, file);
  const [expectedKind, expectedVersion] = format.slice('gapwake.'.length).split('/') as [string, string];
  if (kind !== expectedKind) throw new ResultFileError('other-kind', path, `holds a ${kind}, expected a ${expectedKind}`);
  if (version > Number(expectedVersion)) {
    const by = file.attribute('version');
    throw new ResultFileError(
      'newer',
      path,
      `was written by a newer gapwake${by === null ? '' : ` (${by})`}: its format is gapwake.${kind}/${version}, this program reads ${format}`,
    );
  }
}

function parseOutcome(path: string, text: string): Readonly<Record<string, unknown>> {
  let outcome: unknown;
  try {
    outcome = JSON.parse(text);
  } catch {
    outcome = undefined;
  }
  if (typeof outcome !== 'object' || outcome === null || Array.isArray(outcome)) {
    throw new ResultFileError('damaged', path, 'the file is damaged: its outcome is not a JSON object');
  }
  return outcome as Record<string, unknown>;
}
