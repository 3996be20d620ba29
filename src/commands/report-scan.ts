import { basename } from 'node:path';
import type { Case } from '../case.ts';
import { readCase } from '../casefile/index.ts';
import type { ScanColumn, YieldBand } from '../report/scan/data.ts';
import { scanFigures } from '../report/scan/files.ts';
import { scanPage } from '../report/scan/page.ts';
import type { ScanReport } from '../report/scan/report.ts';
import { yieldBand } from '../report/scan/spread.ts';
import { ResultFileError } from '../results/errors.ts';
import { readScanFile, type ScanFile } from '../results/scan-read.ts';
import { VERSION } from '../version.ts';
import type { Report } from './report.ts';
import { caseOf, type Table, tablesOf } from './report-case.ts';
import { coefficientsOf } from './report-coefficients.ts';

/** points up to which theory is evaluated at both ends of the yields */
const MOST_BAND = 400;

/** The report of a scan file. @throws ResultFileError */
export function scanReport(path: string): Report {
  const report = read(path);
  return { page: (script) => scanPage(report, script), figures: () => scanFigures(report) };
}

function read(path: string): ScanReport {
  const file = readScanFile(path);
  const damaged = (what: string): ResultFileError => new ResultFileError('damaged', path, `the file is damaged: ${what}`);
  const tables = tablesOf(file.tablesJson);
  const coefficients = coefficientsOf(file.coefficientsJson);
  if (tables === null || coefficients === null) throw damaged('its tables or coefficients are not understood');
  return {
    fileName: basename(path),
    title: file.title,
    version: file.version,
    reportVersion: VERSION,
    study: file.study,
    total: file.total,
    find: file.find,
    axes: file.axes.map(({ path: of, unit, values }) => ({ path: of, unit, values: Array.from(values) })),
    layout: file.layout,
    count: file.count,
    columns: columnsOf(file),
    ...pointsOf(file, damaged),
    band: bandOf(file, tables),
    caseText: file.caseText,
    tables,
    coefficients,
    ...caseOf(file, tables, ['scan=', 'history=']),
  };
}

function columnsOf(file: ScanFile): ScanColumn[] {
  return file.headlines.map((headline) => ({
    name: headline.name,
    longName: headline.longName,
    units: 'units' in headline ? headline.units : '1',
    kind: headline.kind,
    meanings: 'meanings' in headline ? headline.meanings : [],
    values: Float64Array.from(file.column(headline.name)),
  }));
}

/** One sentence for each point, and each caution once. */
function pointsOf(file: ScanFile, damaged: (what: string) => ResultFileError): Pick<ScanReport, 'reasons' | 'cautions'> {
  const reasons: string[] = [];
  const cautions = new Map<string, { caution: ScanReport['cautions'][number]['caution']; points: number }>();
  for (const { outcome, error, found } of file.points()) {
    const reason = [outcome?.verdict?.reason, error?.text, found?.note].filter((text) => typeof text === 'string').join(' ');
    reasons.push(reason);
    if (outcome === null || outcome === undefined) continue;
    if (!Array.isArray(outcome.cautions)) throw damaged('a point is not understood');
    for (const caution of outcome.cautions) {
      if (typeof caution?.code !== 'string' || typeof caution.text !== 'string') throw damaged('a point is not understood');
      const known = cautions.get(caution.code);
      if (known === undefined) cautions.set(caution.code, { caution, points: 1 });
      else known.points++;
    }
  }
  if (reasons.length !== file.count) throw damaged('it holds another number of points than it says');
  return { reasons, cautions: [...cautions.values()] };
}

/** Theory over the yields, where one entry is varied. */
function bandOf(file: ScanFile, tables: readonly Table[]): YieldBand | null {
  if (file.axes.length !== 1 || file.count > MOST_BAND) return null;
  if (file.find !== null && file.find !== 'hold-off') return null;
  const loaded = readCase(
    file.caseText,
    file.title,
    (name) => {
      const table = tables.find((each) => each.file === name);
      return table === undefined ? { ok: false, reason: 'not in the result' } : { ok: true, text: table.text };
    },
    ['history='],
  );
  if (!loaded.ok || loaded.scan === null) return null;
  const cases = Array.from(file.axes[0].values, (value): Case | null => {
    const point = loaded.at([value]);
    return point.ok ? point.case : null;
  });
  return yieldBand(cases, file.find === null ? 'formative_lag' : 'found_value');
}
