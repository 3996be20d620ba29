import { pngAddress } from '../png.ts';
import { type FigureFile, svgFile } from '../svg-file.ts';
import { drawable, mainColumn, type ScanView } from './data.ts';
import { curveFigure, quantityMap, verdictMap } from './figures.ts';
import type { ScanReport } from './report.ts';

const WIDTH = 760;
/** What a scan is usually read for; every other quantity is in the page. */
const SHOWN = new Set(['formative_lag', 'peak_current', 'gap_energy', 'onset_gap_voltage', 'found_value']);

/** The figures of a scan: curves over one varied entry; maps over the two longest axes, the others at their middle values. */
export function scanFigures(scan: ScanReport): FigureFile[] {
  const { axes, layout } = scan;
  if (axes.length === 0) return [];
  const middle = axes.map(({ values }) => Math.floor((values.length - 1) / 2));
  const byLength = axes.map((_, k) => k).sort((a, b) => axes[b].values.length - axes[a].values.length);
  const names = drawable(scan)
    .map(({ name }) => name)
    .filter((name) => SHOWN.has(name) || name === mainColumn(scan));
  if (layout === 'list' || axes.length < 2 || axes[byLength[1]].values.length < 2) {
    const view: ScanView = { x: byLength[0], y: null, fixed: middle };
    return names.map((name) => ({ name: name.replaceAll('_', '-'), svg: svgFile(curveFigure(scan, view, name, null, WIDTH)) }));
  }
  const [x, y] = [byLength[0], byLength[1]].sort((a, b) => a - b);
  const view: ScanView = { x, y, fixed: middle };
  return [
    { name: 'verdict', svg: svgFile(verdictMap(scan, view, null, WIDTH, pngAddress)) },
    ...names.map((name) => ({ name: name.replaceAll('_', '-'), svg: svgFile(quantityMap(scan, view, name, null, WIDTH, pngAddress)) })),
  ];
}
