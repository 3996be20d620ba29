import type { Case } from '../../case.ts';
import type { Caution } from '../../onset/outcome.ts';
import type { CoefficientsUsed } from '../run/report.ts';
import type { ScanTable } from './data.ts';

/** All that a report of a scan is made from: plain data, read by whoever calls. */
export interface ScanReport extends ScanTable {
  readonly fileName: string;
  readonly title: string;
  readonly version: string;
  readonly reportVersion: string;
  /** hash of everything that decides the results */
  readonly study: string;
  /** points of the whole plan; this file may hold a share of them */
  readonly total: number;
  readonly find: string | null;
  /** each caution once, as some point says it, and at how many points */
  readonly cautions: readonly { readonly caution: Caution; readonly points: number }[];
  readonly caseText: string;
  readonly tables: readonly { readonly file: string; readonly text: string }[];
  readonly coefficients: CoefficientsUsed;
  readonly settings: Case | null;
  readonly assumptions: readonly (readonly [label: string, value: string])[];
  readonly remarks: readonly string[];
}
