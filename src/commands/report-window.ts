import { basename } from 'node:path';
import { windowFigures } from '../report/window/files.ts';
import { windowPage } from '../report/window/page.ts';
import type { WindowReport } from '../report/window/report.ts';
import { ResultFileError } from '../results/errors.ts';
import { readWindowFile } from '../results/window-read.ts';
import { VERSION } from '../version.ts';
import type { Report } from './report.ts';
import { caseOf, tablesOf } from './report-case.ts';
import { coefficientsOf } from './report-coefficients.ts';
import { spreadText, turnOnText, verdictOf } from './window-text.ts';

/** The report of a window file. @throws ResultFileError */
export function windowReport(path: string): Report {
  const report = read(path);
  return { page: (script) => windowPage(report, script), figures: () => windowFigures(report) };
}

function read(path: string): WindowReport {
  const file = readWindowFile(path);
  const damaged = (what: string): ResultFileError => new ResultFileError('damaged', path, `the file is damaged: ${what}`);
  if (file.time.length === 0) throw damaged('it holds no instant');
  const tables = tablesOf(file.tablesJson);
  const coefficients = coefficientsOf(file.coefficientsJson);
  if (tables === null || coefficients === null) throw damaged('its tables or coefficients are not understood');
  try {
    return {
      fileName: basename(path),
      title: file.title,
      version: file.version,
      reportVersion: VERSION,
      outcome: file.outcome,
      verdict: verdictOf(file.outcome),
      spread: spreadText(file.outcome),
      turnOn: turnOnText(file.outcome),
      caseText: file.caseText,
      tables,
      coefficients,
      // the history is in the file; what it was made from may lie elsewhere
      ...caseOf(file, tables, ['scan=', 'history=']),
    };
  } catch (thrown) {
    // its reader takes the outcome's shape on trust; a page is made from any file
    if (thrown instanceof TypeError) throw damaged('its outcome is not understood');
    throw thrown;
  }
}
