import { basename } from 'node:path';
import { readCase } from '../casefile/index.ts';
import { runFigures } from '../report/run/files.ts';
import { runPage } from '../report/run/page.ts';
import type { RunReport } from '../report/run/report.ts';
import { ResultFileError } from '../results/errors.ts';
import { type RunResult, readRunFile } from '../results/read.ts';
import { VERSION } from '../version.ts';
import { caseRows, remarks } from './check-text.ts';
import { outcomeOf } from './outcome-shape.ts';
import type { Report } from './report.ts';
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
    ...caseOf(file, tables),
  };
}

type Table = RunReport['tables'][number];

/** The case as this program reads it, from the file alone. Scan and history do not matter to a run, and may name files that are not in it. */
function caseOf({ caseText, title }: RunResult, tables: readonly Table[]): Pick<RunReport, 'settings' | 'assumptions' | 'remarks'> {
  const result = readCase(
    caseText,
    title,
    (name) => {
      const table = tables.find(({ file }) => file === name);
      return table === undefined ? { ok: false, reason: 'not in the result' } : { ok: true, text: table.text };
    },
    ['scan=', 'history='],
  );
  if (!result.ok) return { settings: null, assumptions: [], remarks: [] };
  const loaded = { ...result, text: caseText };
  return { settings: result.case, assumptions: caseRows(loaded), remarks: remarks(loaded) };
}

function fieldsOf({ fields }: RunResult): RunReport['fields'] {
  const { electricField, electronDensity, ionDensity, negativeIonDensity, ionisationRate, electronFlux, ionFlux, negativeIonFlux } = fields;
  const all = { electricField, electronDensity, ionDensity, negativeIonDensity, ionisationRate, electronFlux, ionFlux, negativeIonFlux };
  return Object.fromEntries(Object.entries(all).map(([key, values]) => [key, values === null ? null : values.data])) as RunReport['fields'];
}

function tablesOf(json: string): Table[] | null {
  try {
    const tables = JSON.parse(json) as unknown;
    if (!Array.isArray(tables)) return null;
    return tables.map(({ file, text }) => {
      if (typeof file !== 'string' || typeof text !== 'string') throw new TypeError('no table');
      return { file, text };
    });
  } catch {
    return null;
  }
}
