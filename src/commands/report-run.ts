import { basename } from 'node:path';
import { runFigures } from '../report/run/files.ts';
import { runPage } from '../report/run/page.ts';
import type { RunReport } from '../report/run/report.ts';
import { ResultFileError } from '../results/errors.ts';
import { type RunResult, readRunFile } from '../results/read.ts';
import { VERSION } from '../version.ts';
import { outcomeOf } from './outcome-shape.ts';
import type { Report } from './report.ts';
import { caseOf, tablesOf } from './report-case.ts';
import { coefficientsOf } from './report-coefficients.ts';

/** The report of a run file. @throws ResultFileError */
export function runReport(path: string): Report {
  const run = read(path);
  return { page: (script) => runPage(run, script), figures: () => runFigures(run) };
}

function read(path: string): RunReport {
  const file = readRunFile(path);
  const damaged = (what: string): ResultFileError => new ResultFileError('damaged', path, `the file is damaged: ${what}`);
  const outcome = outcomeOf(file.outcome);
  if (outcome === null) throw damaged('its outcome is not understood');
  if (file.time.length === 0 || file.x.length === 0) throw damaged('it holds no snapshot');
  const tables = tablesOf(file.tablesJson);
  const coefficients = coefficientsOf(file.coefficientsJson);
  if (tables === null || coefficients === null) throw damaged('its tables or coefficients are not understood');
  return {
    fileName: basename(path),
    title: file.title,
    version: file.version,
    reportVersion: VERSION,
    time: file.time,
    x: file.x,
    scalars: file.scalars,
    fields: fieldsOf(file),
    outcome,
    caseText: file.caseText,
    tables,
    coefficients,
    ...caseOf(file, tables, ['scan=', 'history=']),
  };
}

function fieldsOf({ fields }: RunResult): RunReport['fields'] {
  const { electricField, electronDensity, ionDensity, negativeIonDensity, ionisationRate, electronFlux, ionFlux, negativeIonFlux } = fields;
  const all = { electricField, electronDensity, ionDensity, negativeIonDensity, ionisationRate, electronFlux, ionFlux, negativeIonFlux };
  return Object.fromEntries(Object.entries(all).map(([key, values]) => [key, values === null ? null : values.data])) as RunReport['fields'];
}
