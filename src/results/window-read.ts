import type { HistoryEntry, WindowOutcome } from '../search/window/outcome.ts';
import { ResultFileError } from './errors.ts';
import { openHdf5 } from './hdf5-reader.ts';
import { checkFormat } from './read.ts';
import {
  type WindowNumber,
  type WindowTexts,
  windowFormat,
  windowNumbers,
  windowState,
  windowStates,
  windowTexts,
  windowTime,
} from './window-variables.ts';

/** A window read back from its file. */
export interface WindowFile extends WindowTexts {
  readonly path: string;
  readonly title: string;
  /** version of the program that wrote the file */
  readonly version: string;
  /** hash of everything that decides the results */
  readonly study: string;
  /** [s], rising */
  readonly time: Float64Array;
  /** each over (time), NaN where it does not apply */
  readonly numbers: Readonly<Record<WindowNumber['key'], Float64Array>>;
  readonly states: readonly HistoryEntry['state'][];
  /** `outcomeJson`, parsed: windows, turn-on times, spread of the yields, cautions */
  readonly outcome: WindowOutcome;
}

/** Reads a whole window file.
 *  @throws ResultFileError when it is missing, foreign, of another kind, newer, cut short or damaged */
export function readWindowFile(path: string): WindowFile {
  const file = openHdf5(path);
  checkFormat(path, file, windowFormat);
  const damaged = (what: string): ResultFileError => new ResultFileError('damaged', path, `the file is damaged: ${what}`);
  const time = file.float64(windowTime.name, [null]);
  const numbers = Object.fromEntries(windowNumbers.map(({ key, name }) => [key, file.float64(name, [time.length])]));
  const states = Array.from(file.int8(windowState.name, [time.length]), (code) => {
    const word = windowStates[code];
    if (word === undefined) throw damaged(`${windowState.name} has the unknown value ${code}`);
    return word;
  });
  const texts = Object.fromEntries(windowTexts.map(({ key, name }) => [key, file.text(name)])) as unknown as WindowTexts;
  const study = file.attribute('study') ?? '';
  if (!/^[0-9a-f]{64}$/.test(study)) throw damaged('its study is not understood');
  return {
    path,
    title: file.attribute('title') ?? '',
    version: file.attribute('version') ?? '',
    study,
    time,
    numbers: numbers as WindowFile['numbers'],
    states,
    ...texts,
    outcome: outcomeOf(texts.outcomeJson, time.length, damaged),
  };
}

/** The object that the program itself wrote: its shape is taken on trust once it names its format and has as many instants as the file. */
function outcomeOf(json: string, instants: number, damaged: (what: string) => ResultFileError): WindowOutcome {
  try {
    const outcome = JSON.parse(json) as WindowOutcome;
    if (outcome.format === windowFormat && Array.isArray(outcome.windows) && outcome.history?.length === instants) return outcome;
  } catch {
    // the same as any other text that is no outcome
  }
  throw damaged('its outcome is not understood');
}
