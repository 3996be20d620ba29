import { formatQuantity } from '../../units/index.ts';
import { nearest } from '../nearest.ts';
import { FIELDS, type RunField, type RunScalar, type RunSeries } from '../run/data.ts';
import { PROFILES, pathFigure, profileFigure, timeFigure, timeFigureNames } from '../run/figures.ts';
import type { RunPageData } from '../run/page.ts';
import { TIME_AXES, type TimeAxisKind, timeScale } from '../run/time-axis.ts';
import { canvasAddress } from './dom.ts';
import { begin, LinkedView } from './linked.ts';
import { exact, field } from './unpack.ts';

/** The script of run pages: draws the figures and links them in time. */

const UNITS: Readonly<Record<RunScalar, string>> = {
  supplyVoltage: 'V',
  openGapVoltage: 'V',
  gapVoltage: 'V',
  conductionCurrent: 'A',
  totalCurrent: 'A',
  supplyCurrent: 'A',
  gapEnergy: 'J',
  sourceEnergy: 'J',
};

async function unpacked(data: RunPageData): Promise<RunSeries> {
  const entries = async <K extends string, V>(record: Readonly<Record<K, V>>, open: (value: V) => Promise<unknown>): Promise<unknown> =>
    Object.fromEntries(await Promise.all(Object.entries(record).map(async ([key, value]) => [key, await open(value as V)] as const)));
  const [time, x, scalars, fields] = await Promise.all([
    exact(data.time),
    exact(data.x),
    entries(data.scalars, exact) as Promise<RunSeries['scalars']>,
    entries(data.fields as Record<RunField, NonNullable<RunPageData['fields'][RunField]>>, field) as Promise<RunSeries['fields']>,
  ]);
  const absent = Object.fromEntries(FIELDS.map((key) => [key, null]));
  return { time, x, scalars, fields: { ...absent, ...fields }, setting: data.setting, events: data.events };
}

void begin<RunPageData>(async (data) => {
  const run = await unpacked(data);
  const { time, scalars, events } = run;
  const names = timeFigureNames(run);
  new LinkedView({
    time,
    events: events.map((event) => ({ ...event, text: formatQuantity(event.time, 's', 4) })),
    axes: TIME_AXES,
    first: nearest(time, events[events.length - 1]?.time ?? time[time.length - 1]),
    scale: (axis) => timeScale(axis as TimeAxisKind, run),
    overTime: (scale, width) =>
      names.map((name, i) => ({ name, figure: timeFigure(name, run, { width, scale, nameMarks: i % 2 === 0 }, canvasAddress) })),
    now: (i, width) => [...PROFILES.map((name) => profileFigure(name, run, i, width)), pathFigure(run, i, width)],
    reading: (key, i) => formatQuantity(scalars[key as RunScalar][i], UNITS[key as RunScalar]),
    where: (i) =>
      `${formatQuantity(time[i], 's', 5)}: ${formatQuantity(scalars.gapVoltage[i], 'V')}, ${formatQuantity(scalars.conductionCurrent[i], 'A')}`,
  });
});
