import type { Case } from '../case.ts';
import { readCase } from '../casefile/index.ts';
import { caseRows, remarks } from './check-text.ts';

export interface Table {
  readonly file: string;
  readonly text: string;
}

/** The case of a result as this program reads it again. */
export interface CaseAgain {
  /** null where this program cannot */
  readonly settings: Case | null;
  /** every value of the case in words */
  readonly assumptions: readonly (readonly [label: string, value: string])[];
  /** how entries were read */
  readonly remarks: readonly string[];
}

/** The case, from the file alone.
 *  @param without  `--set` arguments that take away what does not matter and may name files that are not in the result */
export function caseOf(
  { caseText, title }: { readonly caseText: string; readonly title: string },
  tables: readonly Table[],
  without: readonly string[],
): CaseAgain {
  const result = readCase(
    caseText,
    title,
    (name) => {
      const table = tables.find(({ file }) => file === name);
      return table === undefined ? { ok: false, reason: 'not in the result' } : { ok: true, text: table.text };
    },
    without,
  );
  if (!result.ok) return { settings: null, assumptions: [], remarks: [] };
  const loaded = { ...result, text: caseText };
  return { settings: result.case, assumptions: caseRows(loaded), remarks: remarks(loaded) };
}

/** The tables that a result keeps; null where the text is not what this program writes. */
export function tablesOf(json: string): Table[] | null {
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
