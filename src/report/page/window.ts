import { formatQuantity } from '../../units/index.ts';
import { nearest } from '../nearest.ts';
import { pdFigure, STATE_WORDS, windowFigure, windowFigureNames } from '../window/figures.ts';
import type { WindowPageData } from '../window/page.ts';
import { clockText, WINDOW_AXES, type WindowAxisKind, windowTimeScale } from '../window/time-axis.ts';
import { begin, LinkedView } from './linked.ts';

/** The script of window pages. */

void begin<WindowPageData>((data) => {
  const time = Float64Array.from(data.time);
  const volts = (value: number | null): string => (value === null ? '–' : formatQuantity(value, 'V'));
  const lowest = data.holdOff_V.reduce<number>(
    (best, v, i) => (v !== null && v < (data.holdOff_V[best] ?? Number.POSITIVE_INFINITY) ? i : best),
    0,
  );
  const breaks = data.windows.find(({ state }) => state === 'breaks-down');
  const readings: Readonly<Record<string, (i: number) => string>> = {
    pressure: (i) => formatQuantity(data.pressure_Pa[i], 'Pa'),
    supply: (i) => volts(Math.abs(data.supply_V[i])),
    holdOff: (i) => volts(data.holdOff_V[i]),
    holdOffAtHighYield: (i) => volts(data.holdOffAtHighYield_V[i]),
    lag: (i) => (data.lag_s[i] === null ? '–' : formatQuantity(data.lag_s[i] as number, 's')),
  };
  new LinkedView({
    time,
    events: data.events.map((event) => ({ ...event, text: clockText(event.time) })),
    axes: WINDOW_AXES,
    first: breaks === undefined ? lowest : nearest(time, breaks.from),
    scale: (axis) => windowTimeScale(axis as WindowAxisKind, data.time),
    overTime: (scale, width) => windowFigureNames(data).map((name) => ({ name, figure: windowFigure(name, data, { width, scale }) })),
    now: (i, width) => [pdFigure(data, i, width)],
    reading: (key, i) => readings[key]?.(i) ?? '',
    where: (i) =>
      `${clockText(time[i])}: ${formatQuantity(data.pressure_Pa[i], 'Pa')}, ${volts(data.supply_V[i])}, ${STATE_WORDS[data.states[i]]}`,
  });
});
