import type { LoadedCase } from './case-source.ts';
import { quantity } from './quantities.ts';

/** What a case asks beyond one gap, said where a command does not do it: one sentence each. */
export function unusedStudies({ scan, window }: Pick<LoadedCase, 'scan' | 'window'>): string[] {
  const lines: string[] = [];
  if (scan !== null) {
    const lengths = scan.axes.map(({ values }) => values.length);
    const points = scan.zip ? (lengths[0] ?? 1) : lengths.reduce((product, length) => product * length, 1);
    const what = scan.find === null ? '' : `, ${scan.find.what} at each`;
    lines.push(`Its scan (${points} point${points === 1 ? '' : 's'}${what}) is not used here but by gapwake scan.`);
  }
  if (window !== null)
    lines.push(`Its pressure history (${quantity(window.history.duration, 's')}) is not used here but by gapwake window.`);
  return lines;
}
