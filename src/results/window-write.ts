import type { WindowOutcome } from '../search/window/outcome.ts';
import { ResultFileError, resultFileError } from './errors.ts';
import { createHdf5, Hdf5Error, type Hdf5Writer } from './hdf5.ts';
import { checkComplete } from './hdf5-reader.ts';
import { readWindowFile } from './window-read.ts';
import { type WindowTexts, windowFormat, windowNumbers, windowState, windowStates, windowTexts, windowTime } from './window-variables.ts';

/** What a window file says beside its history. */
export interface WindowAbout extends Omit<WindowTexts, 'outcomeJson'> {
  readonly outcome: WindowOutcome;
  /** hash of everything that decides the results */
  readonly study: string;
}

const longestTitle = 1000;

/** Writes a whole window file at `path` and reads it back with the other library; what is there already is written over.
 *  @throws ResultFileError */
export async function writeWindowFile(path: string, about: WindowAbout): Promise<void> {
  let file: Hdf5Writer | undefined;
  try {
    file = await createHdf5(path);
    // first and to disk: a part file is recognised as such even if the process is killed
    file.attribute('format', windowFormat);
    file.flush();
    fill(file, about);
    file.flush();
    file.close();
    file = undefined;
    checkComplete(path);
    if (JSON.stringify(readWindowFile(path).outcome) !== JSON.stringify(about.outcome))
      throw new ResultFileError('damaged', path, 'the outcome does not read back as it was written');
  } catch (thrown) {
    if (thrown instanceof Hdf5Error) throw new ResultFileError('system', path, `cannot be written: ${thrown.message}`);
    throw resultFileError(path, thrown);
  } finally {
    closeQuietly(file);
  }
}

function fill(file: Hdf5Writer, about: WindowAbout): void {
  const { outcome, study } = about;
  const { history } = outcome;
  const over = { scales: [windowTime.name], shape: [history.length], chunk: [history.length] };
  const all: readonly (readonly [number, number])[] = [[0, history.length]];
  file.attribute('title', outcome.title.length <= longestTitle ? outcome.title : `${outcome.title.slice(0, longestTitle - 1)}…`);
  file.attribute('program', 'gapwake');
  file.attribute('version', outcome.version);
  file.attribute('study', study);

  file.scale(windowTime.name, { data: Float64Array.from(history, ({ time_s }) => time_s) });
  file.attribute('units', windowTime.units, windowTime.name);
  file.attribute('long_name', windowTime.longName, windowTime.name);
  for (const { key, name, units, longName } of windowNumbers) {
    file.grid(name, { ...over, type: 'float64' });
    file.put(
      name,
      all,
      Float64Array.from(history, ({ [key]: value }) => value ?? Number.NaN),
    );
    file.attribute('units', units, name);
    file.attribute('long_name', longName, name);
  }
  const { name, longName } = windowState;
  file.grid(name, { ...over, type: 'int8' });
  file.put(
    name,
    all,
    Int8Array.from(history, ({ state }) => windowStates.indexOf(state)),
  );
  file.attribute('units', '1', name);
  file.attribute('long_name', longName, name);
  file.numbers('flag_values', Int8Array.from(windowStates.keys()), name);
  file.attribute('flag_meanings', windowStates.join(' '), name);

  const texts: WindowTexts = { ...about, outcomeJson: JSON.stringify(outcome) };
  for (const { key, name: text, longName: words } of windowTexts) {
    file.text(text, texts[key]);
    file.attribute('long_name', words, text);
  }
}

function closeQuietly(file: Hdf5Writer | undefined): void {
  try {
    file?.close();
  } catch {
    // the file is incomplete anyway
  }
}
