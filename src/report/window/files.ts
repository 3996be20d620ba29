import { type FigureFile, svgFile } from '../svg-file.ts';
import { pdFigure, windowFigure, windowFigureNames } from './figures.ts';
import type { WindowReport } from './report.ts';
import { seriesOf } from './series.ts';
import { windowTimeScale } from './time-axis.ts';

/** [px] */
const WIDTH = { time: 900, pd: 640 };

/** Every figure of a window, those over time on both axes. */
export function windowFigures(report: WindowReport): FigureFile[] {
  const series = seriesOf(report);
  const overTime = (['even', 'log'] as const).flatMap((kind) =>
    windowFigureNames(series).map((name) => ({
      name: kind === 'even' ? name : `${name}-log-time`,
      svg: svgFile(windowFigure(name, series, { width: WIDTH.time, scale: windowTimeScale(kind, series.time) })),
    })),
  );
  return [...overTime, { name: 'pd', svg: svgFile(pdFigure(series, null, WIDTH.pd)) }];
}
