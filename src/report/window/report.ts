import type { Case } from '../../case.ts';
import type { WindowOutcome } from '../../search/window/index.ts';
import type { CoefficientsUsed } from '../run/report.ts';

/** All that a report of a window is made from: plain data, read by whoever calls. */
export interface WindowReport {
  readonly fileName: string;
  readonly title: string;
  readonly version: string;
  readonly reportVersion: string;
  readonly outcome: WindowOutcome;
  /** the answer in words */
  readonly verdict: { readonly word: string; readonly text: string };
  /** how the answer depends on the yields; null where it does not */
  readonly spread: string | null;
  readonly turnOn: string;
  readonly caseText: string;
  readonly tables: readonly { readonly file: string; readonly text: string }[];
  readonly coefficients: CoefficientsUsed;
  readonly settings: Case | null;
  readonly assumptions: readonly (readonly [label: string, value: string])[];
  readonly remarks: readonly string[];
}
