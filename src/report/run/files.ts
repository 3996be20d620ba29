import { nearest } from '../nearest.ts';
import { pngAddress } from '../png.ts';
import { type FigureFile, svgFile } from '../svg-file.ts';
import { FIELDS, type RunSeries, SCALARS } from './data.ts';
import { eventsOf } from './events.ts';
import { PROFILES, pathFigure, profileFigure, timeFigure, timeFigureNames } from './figures.ts';
import { settingOf } from './page.ts';
import type { RunReport } from './report.ts';
import { timeScale } from './time-axis.ts';

/** [px] */
const WIDTH = { time: 900, now: 520 };

/** Every figure of a run: those over time stretched by activity and in the logarithm, profiles at each event and at the end, the path. */
export function runFigures(run: RunReport): FigureFile[] {
  const series = seriesOf(run);
  const files: FigureFile[] = [];
  for (const kind of ['activity', 'log'] as const) {
    const layout = { width: WIDTH.time, scale: timeScale(kind, series), nameMarks: true };
    for (const name of timeFigureNames(series))
      files.push({ name: kind === 'activity' ? name : `${name}-${kind}-time`, svg: svgFile(timeFigure(name, series, layout, pngAddress)) });
  }
  const moments = [...series.events, { name: 'end', time: series.time[series.time.length - 1] }];
  for (const { name: event, time } of moments)
    for (const name of PROFILES)
      files.push({
        name: `${name}-${event.replaceAll(' ', '-')}`,
        svg: svgFile(profileFigure(name, series, nearest(series.time, time), WIDTH.now)),
      });
  files.push({ name: 'path', svg: svgFile(pathFigure(series, null, WIDTH.now)) });
  return files;
}

function seriesOf(run: RunReport): RunSeries {
  const { time, x } = run;
  return {
    time,
    x,
    scalars: Object.fromEntries(SCALARS.map((key) => [key, run.scalars[key]])) as RunSeries['scalars'],
    fields: Object.fromEntries(FIELDS.map((key) => [key, run.fields[key]])) as RunSeries['fields'],
    setting: settingOf(run),
    events: eventsOf(run),
  };
}
