import { tabulated } from './cross-sections.ts';

/** energy [eV] and cross-section [1e-20 m²] */
export type Row = readonly [energy: number, value: number];

/** A cross-section from rows in 1e-20 m², as tables print them; where a process has a threshold [eV], it starts there from 0. See {@link tabulated}. */
export function fromRows(threshold: number, rows: readonly Row[]): (energy: number) => number {
  const all = threshold > 0 ? [[threshold, 0] as const, ...rows] : rows;
  return tabulated(
    all.map(([energy]) => energy),
    all.map(([, value]) => value * 1e-20),
    threshold,
  );
}
