import { type Element, el } from '../element.ts';
import { type Box, type Figure, type Mark, round } from '../figure/frame.ts';
import { type Curve, KEY_WIDTH, type LineSpec, lineFigure } from '../figure/lines.ts';
import { linear, logarithmic, type Scale } from '../figure/scale.ts';
import type { WindowBand, WindowSeries, WindowState } from './data.ts';

/** The figures of a window: what the surroundings do and what the gap holds, in time and against pd. */

export interface WindowLayout {
  readonly width: number;
  readonly scale: (length: number) => Scale;
}

export type WindowFigureName = 'pressure' | 'voltages' | 'lag';

const LEFT = 66;
const TORR_CM = (101325 / 760) * 0.01;

const FILL: Readonly<Record<WindowBand['state'], string>> = {
  'breaks-down': 'fill-alarm',
  marginal: 'fill-doubt',
  'outside-model': 'fill-beyond',
};
const DOT: Readonly<Record<WindowState, string>> = {
  holds: 'dot',
  marginal: 'dot dot-doubt',
  'breaks-down': 'dot dot-alarm',
  'outside-model': 'dot dot-beyond',
};
export const STATE_WORDS: Readonly<Record<WindowState, string>> = {
  holds: 'holds',
  marginal: 'marginal',
  'breaks-down': 'breaks down',
  'outside-model': 'no model',
};

export function windowFigureNames({ lag_s }: WindowSeries): WindowFigureName[] {
  return lag_s.filter((lag) => lag !== null).length > 1 ? ['pressure', 'voltages', 'lag'] : ['pressure', 'voltages'];
}

export function windowFigure(name: WindowFigureName, series: WindowSeries, layout: WindowLayout): Figure {
  const { time } = series;
  const axis = layout.scale(layout.width);
  const marks: Mark[] = series.events
    .map((event) => ({ name: event.name, at: axis.at(event.time) }))
    .filter(({ at }) => at >= 0 && at <= 1);
  const base = {
    id: name,
    width: layout.width,
    height: name === 'voltages' ? 330 : 230,
    left: LEFT,
    right: layout.width < 480 ? 18 : KEY_WIDTH + 24,
    marks,
    areas: areasOf(series.windows),
    under: bands(series.windows, name),
  } satisfies Partial<LineSpec>;
  if (name === 'pressure') {
    const curves: Curve[] = [{ name: 'pressure', style: 's1', x: time, y: series.pressure_Pa, reading: 'pressure' }];
    const [from, to] = positive([series.pressure_Pa]);
    return lineFigure(
      { ...base, title: 'Pressure against time', description: 'Pressure around the gap against time, with the windows shaded', curves },
      layout.scale,
      (length) => logarithmic('Pressure', 'Pa', from, to, { length, apart: 18 }),
    );
  }
  if (name === 'lag') {
    const curves: Curve[] = [{ name: 'lag', style: 's1', ...pointsOf(time, series.lag_s), reading: 'lag' }];
    const [from, to] = positive([curves[0].y]);
    return lineFigure(
      { ...base, title: 'Formative lag against time', description: 'Formative lag at the supply voltage, where it was simulated', curves },
      layout.scale,
      (length) => logarithmic('Formative lag', 's', from / 1.5, to * 1.5, { length, apart: 18 }),
    );
  }
  const supply = series.supply_V.map(Math.abs);
  const highYield = series.holdOffAtHighYield_V.some((v) => v !== null);
  const curves: Curve[] = [
    ...(highYield
      ? [{ name: 'at high yield', style: 's3', ...pointsOf(time, series.holdOffAtHighYield_V), reading: 'holdOffAtHighYield' }]
      : []),
    { name: 'hold-off', style: 's1', ...pointsOf(time, series.holdOff_V), reading: 'holdOff' },
    { name: 'supply', style: 's2', x: time, y: supply, reading: 'supply' },
  ];
  const [from, to] = positive(curves.map(({ y }) => y));
  return lineFigure(
    {
      ...base,
      title: 'Hold-off voltage and supply against time',
      description: 'Highest voltage that holds and voltage of the supply against time',
      curves,
    },
    layout.scale,
    (length) =>
      to > 12 * from
        ? logarithmic('Voltage, magnitude', 'V', from / 1.15, to * 1.15, { length, apart: 18 })
        : linear('Voltage, magnitude', 'V', 0, to, { length, apart: 30 }),
  );
}

/** Hold-off voltage and supply against pd on logarithmic axes, with the history's path drawn through theory's breakdown curve. */
export function pdFigure(series: WindowSeries, index: number | null, width: number): Figure {
  const { curve, states } = series;
  const pd = series.pd.map((v) => v / TORR_CM);
  const supply = series.supply_V.map(Math.abs);
  const simulated = pointsOf(pd, series.holdOff_V);
  const theory = curve === null ? null : curve.pd.map((v) => v / TORR_CM);
  const curves: Curve[] = [
    ...(theory === null || curve === null || curve.paths === null
      ? []
      : [{ name: 'theory, longer paths', style: 's4', ...pointsOf(theory, curve.paths) }]),
    ...(theory === null || curve === null ? [] : [{ name: 'theory, spacing', style: 's3', ...pointsOf(theory, curve.spacing) }]),
    { name: 'supply', style: 's2', x: pd, y: supply },
    { name: 'hold-off', style: 's1', points: true, ...simulated },
  ];
  // theory far above everything else would only press the rest together
  const [from, most] = positive([supply, simulated.y]);
  const theoryMost = positive(curves.map(({ y }) => y))[1];
  const to = Math.min(Math.max(most, theoryMost), most * 10);
  const [left, right] = positive([pd]);
  return lineFigure(
    {
      id: 'pd',
      title: 'Voltages against pd',
      description: 'Hold-off voltage, supply voltage and the theoretical breakdown curve against pressure times gap, on logarithmic axes',
      width,
      height: 380,
      left: LEFT,
      right: 16,
      curves,
      over: (box, x, y) => [
        ...pd.map((v, i) => dot(DOT[states[i]], box, x.at(v), y.at(supply[i]), 3.2)),
        ...(['start', 'end'] as const).map((end) => endText(end, end === 'start' ? 0 : pd.length - 1, pd, supply, box, x, y)),
        index === null ? null : dot('now', box, x.at(pd[index]), y.at(supply[index]), 7),
      ],
    },
    (length) => logarithmic('Pressure × gap, at 20 °C', 'Torr cm', (theory?.[0] ?? left) / 1.05, right * 1.3, { length, apart: 44 }, false),
    (length) => logarithmic('Voltage, magnitude', 'V', from / 1.3, to * 1.3, { length, apart: 18 }),
  );
}

function endText(name: string, i: number, pd: readonly number[], supply: readonly number[], box: Box, x: Scale, y: Scale): Element | null {
  const [sx, sy] = [x.at(pd[i]), y.at(supply[i])];
  if (!Number.isFinite(sx) || !Number.isFinite(sy)) return null;
  const px = box.left + sx * box.width;
  const leftwards = sx > 0.5;
  return el(
    'g',
    { class: 'mark' },
    el(
      'text',
      { x: leftwards ? px - 4 : px + 4, y: box.top + (1 - sy) * box.height + 17, 'text-anchor': leftwards ? 'end' : 'start' },
      name,
    ),
  );
}

function dot(kind: string, box: Box, sx: number, sy: number, r: number): Element | null {
  if (!Number.isFinite(sx) || !Number.isFinite(sy)) return null;
  return el('circle', { class: kind, cx: round(box.left + sx * box.width), cy: round(box.top + (1 - sy) * box.height), r });
}

function areasOf(windows: readonly WindowBand[]): { name: string; fill: string }[] {
  const states = [...new Set(windows.map(({ state }) => state))];
  return states.map((state) => ({ name: STATE_WORDS[state], fill: FILL[state] }));
}

/** Intervals shaded, those outside the model hatched. */
function bands(windows: readonly WindowBand[], id: string): NonNullable<LineSpec['under']> {
  return (box, x) => {
    const hatch = `${id}-hatch`;
    const pattern = el(
      'pattern',
      { id: hatch, width: 9, height: 9, patternUnits: 'userSpaceOnUse' },
      el('path', { class: 'hatch', d: 'M0 9L9 0M-2 2L2 -2M7 11L11 7' }),
    );
    const areas = windows.map(({ from, to, state }) => {
      const [left, right] = [Math.max(0, x.at(from)), Math.min(1, x.at(to))].map((share) => box.left + share * box.width);
      const place = { x: round(left), y: box.top, width: round(Math.max(1, right - left)), height: box.height };
      return state === 'outside-model'
        ? el('rect', { fill: `url(#${hatch})`, ...place })
        : el('rect', { class: `area ${FILL[state]}`, ...place });
    });
    return [pattern, ...areas];
  };
}

/** The points that are known; the curve breaks in between. */
function pointsOf(x: readonly number[], y: readonly (number | null)[]): { x: readonly number[]; y: readonly number[] } {
  return { x, y: y.map((v) => v ?? Number.NaN) };
}

function positive(series: readonly ArrayLike<number>[]): [from: number, to: number] {
  let [from, to] = [Number.POSITIVE_INFINITY, 0];
  for (const values of series)
    for (let i = 0; i < values.length; i++) {
      if (!(values[i] > 0)) continue;
      from = Math.min(from, values[i]);
      to = Math.max(to, values[i]);
    }
  if (!(to > 0)) return [0.1, 1];
  return from < to ? [from, to] : [from / 2, to * 2];
}
