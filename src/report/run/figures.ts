import { SCALE } from '../colour.ts';
import { el } from '../element.ts';
import { type Box, type Figure, type Mark, round } from '../figure/frame.ts';
import { type Curve, KEY_WIDTH, lineFigure, pathOf } from '../figure/lines.ts';
import { colourBar, colourNumber, mapFigure, type Picture } from '../figure/map.ts';
import { linear, logarithmic, type Scale } from '../figure/scale.ts';
import { nearest } from '../nearest.ts';
import type { Profiles, RunField, RunSeries } from './data.ts';
import type { TimeScale } from './time-axis.ts';

/** The figures of a run. Each is a pure function of the run and of how it is laid out, so that the page and the SVG files show the same. */

/** How figures over time are laid out; all of them alike, so that one moment stands at one place in all. */
export interface TimeLayout {
  readonly width: number;
  readonly scale: TimeScale;
  /** names of the events above the plot, or only their lines */
  readonly nameMarks: boolean;
}

const LEFT = 66;
const RIGHT = KEY_WIDTH + 14;
/** axes never reach further below their largest value than this */
const MOST_DECADES = 13;

const HEIGHT = { line: 250, map: 226, profile: 176, path: 270 };

export type TimeFigureName = 'voltages' | 'currents' | 'energies' | MapName;
export type MapName = 'field-map' | 'electron-map' | 'ion-map' | 'negative-ion-map' | 'ionisation-map';

const MAPS: Readonly<Record<MapName, { readonly field: RunField; readonly name: string; readonly unit: string; readonly factor: number }>> =
  {
    'field-map': { field: 'electricField', name: 'Field strength', unit: 'V/cm', factor: 1e-2 },
    'electron-map': { field: 'electronDensity', name: 'Electron density', unit: 'cm⁻³', factor: 1e-6 },
    'ion-map': { field: 'ionDensity', name: 'Positive ion density', unit: 'cm⁻³', factor: 1e-6 },
    'negative-ion-map': { field: 'negativeIonDensity', name: 'Negative ion density', unit: 'cm⁻³', factor: 1e-6 },
    'ionisation-map': { field: 'ionisationRate', name: 'Ionisation rate', unit: 'cm⁻³ s⁻¹', factor: 1e-6 },
  };

/** The figures over time that this run has. */
export function timeFigureNames(run: RunSeries): TimeFigureName[] {
  const maps = (Object.keys(MAPS) as MapName[]).filter((name) => {
    const values = run.fields[MAPS[name].field];
    return values?.some((v) => v !== 0) ?? false;
  });
  return ['voltages', 'currents', ...maps, 'energies'];
}

/** One figure over time. */
export function timeFigure(name: TimeFigureName, run: RunSeries, layout: TimeLayout, picture: Picture): Figure {
  switch (name) {
    case 'voltages':
      return voltages(run, layout);
    case 'currents':
      return currents(run, layout);
    case 'energies':
      return energies(run, layout);
    default:
      return map(name, run, layout, picture);
  }
}

function common(
  run: RunSeries,
  { width, scale, nameMarks }: TimeLayout,
  id: string,
  title: string,
  description: string,
): Parameters<typeof lineFigure>[0] {
  const axis = scale(width);
  const marks: Mark[] = run.events.map(({ name, time }) => ({ name, at: axis.at(time) })).filter(({ at }) => Number.isFinite(at));
  return { id, title, description, width, height: HEIGHT.line, left: LEFT, right: rightOf(width), marks, nameMarks, curves: [] };
}

/** narrow figures have their keys above the plot, but maps still need room for the colour bar */
function rightOf(width: number): number {
  return width < 480 ? 62 : RIGHT;
}

function voltages(run: RunSeries, layout: TimeLayout): Figure {
  const { time, scalars } = run;
  const curves: Curve[] = [
    { name: 'supply', style: 's2', x: time, y: scalars.supplyVoltage, reading: 'supplyVoltage' },
    { name: 'open gap', style: 's3', x: time, y: scalars.openGapVoltage, reading: 'openGapVoltage' },
    { name: 'gap', style: 's1', x: time, y: scalars.gapVoltage, reading: 'gapVoltage' },
  ];
  const [low, high] = extent(curves.map(({ y }) => y));
  const spec = common(run, layout, 'voltages', 'Voltages against time', 'Supply voltage, open-gap voltage and gap voltage against time');
  return lineFigure({ ...spec, curves }, layout.scale, (length) =>
    linear('Voltage', 'V', Math.min(0, low), Math.max(0, high), { length, apart: 34 }),
  );
}

function currents(run: RunSeries, layout: TimeLayout): Figure {
  const { time, scalars } = run;
  const curves: Curve[] = [
    { name: 'total', style: 's2', x: time, y: scalars.totalCurrent.map(Math.abs), reading: 'totalCurrent' },
    { name: 'conduction', style: 's1', x: time, y: scalars.conductionCurrent.map(Math.abs), reading: 'conductionCurrent' },
  ];
  const spec = common(
    run,
    layout,
    'currents',
    'Currents against time',
    'Magnitudes of conduction and total current through the gap against time',
  );
  const [from, to] = currentExtent(run, curves[1].y, curves[0].y);
  return lineFigure({ ...spec, curves }, layout.scale, (length) => logarithmic('Current, magnitude', 'A', from, to, { length, apart: 18 }));
}

function energies(run: RunSeries, layout: TimeLayout): Figure {
  const { time, scalars } = run;
  const curves: Curve[] = [
    { name: 'from supply', style: 's2', x: time, y: scalars.sourceEnergy, reading: 'sourceEnergy' },
    { name: 'into gap', style: 's1', x: time, y: scalars.gapEnergy, reading: 'gapEnergy' },
  ];
  const spec = common(
    run,
    layout,
    'energies',
    'Energy against time',
    'Energy put into the gas gap and energy delivered by the supply since time 0',
  );
  const most = Math.max(largest(scalars.sourceEnergy), largest(scalars.gapEnergy), 1e-30);
  // what stands below a billionth of the whole interests nobody
  const [from, to] = positiveExtent([scalars.sourceEnergy, scalars.gapEnergy]);
  return lineFigure({ ...spec, curves }, layout.scale, (length) =>
    logarithmic('Energy since t = 0', 'J', Math.max(from, most * 1e-9), to, { length, apart: 18 }),
  );
}

function map(name: MapName, run: RunSeries, layout: TimeLayout, picture: Picture): Figure {
  const { field, name: label, unit, factor } = MAPS[name];
  const values = run.fields[field] as Profiles;
  const { time, x, setting } = run;
  const [from, to] = mapRange(run, field);
  const spec = common(run, layout, name, `${label} over time and position`, `${label} between the electrodes against time, as colours`);
  const axis = layout.scale(layout.width);
  const rows = between(time.map((t) => axis.at(t)));
  const cells = x.length;
  const columns = between(x.map((v) => v / setting.spacing));
  // the field changes its sign: it is interpolated as it is, densities in their logarithm
  const signed = field === 'electricField';
  const low = from / factor / 10;
  const at = (row: number, cell: number): number => {
    const v = values[row * cells + cell];
    return signed ? v : Math.log(Math.max(v, low));
  };
  const valueAt = (sx: number, sy: number): number => {
    const [i, j] = [rows(sx), columns(sy)];
    const before = (1 - j.share) * at(i.first, j.first) + j.share * at(i.first, j.second);
    const after = (1 - j.share) * at(i.second, j.first) + j.share * at(i.second, j.second);
    const mean = (1 - i.share) * before + i.share * after;
    return factor * (signed ? Math.abs(mean) : Math.exp(mean));
  };
  const colour = (length: number): Scale => logarithmic(label, unit, from, to, { length, apart: 20 }, false);
  const colours = colour(HEIGHT.map);
  return mapFigure(
    {
      ...spec,
      height: HEIGHT.map,
      heading: `${label} [${unit}]`,
      yName: 'Position [mm]',
      paint: (sx, sy) => colourNumber(colours, valueAt(sx, sy)),
      palette: SCALE,
      beside: (box) => colourBar(name, box.left + box.width + 10, box.top, box.height, colour(box.height)),
    },
    layout.scale,
    (length) => positionScale(setting.spacing, length, 22),
    picture,
  );
}

/** Between which two places a share of an axis lies, and how far; it remembers where it was last, because pictures are made in order. */
function between(places: Float64Array): (share: number) => { first: number; second: number; share: number } {
  let k = 0;
  const last = places.length - 1;
  return (at) => {
    while (k > 0 && places[k] > at) k--;
    while (k < last - 1 && places[k + 1] <= at) k++;
    const second = Math.min(last, k + 1);
    const width = places[second] - places[k];
    return { first: k, second, share: width > 0 ? Math.min(1, Math.max(0, (at - places[k]) / width)) : 0 };
  };
}

/** The colours of a map: from its largest value down to where its weak stages begin. In the units of the figure. */
export function mapRange(run: RunSeries, field: RunField): [from: number, to: number] {
  const values = run.fields[field] as Profiles;
  const { factor } = Object.values(MAPS).find((m) => m.field === field) ?? { factor: 1 };
  const cells = run.x.length;
  let most = 0;
  const stages: number[] = [];
  for (let i = 0; i < run.time.length; i++) {
    let rowMost = 0;
    for (let k = i * cells; k < (i + 1) * cells; k++) rowMost = Math.max(rowMost, Math.abs(values[k]));
    most = Math.max(most, rowMost);
    if (rowMost > 0) stages.push(rowMost);
  }
  if (!(most > 0)) return [1e-3, 1];
  const decades = field === 'electricField' ? 3 : MOST_DECADES;
  // the first snapshots, while charge only begins to cross the gap, would take most of the scale
  const early = stages.sort((a, b) => a - b)[Math.floor(stages.length / 5)];
  return [Math.min(Math.max(early / 100, most * 10 ** -decades), most / 10) * factor, most * factor];
}

function positionScale(spacing: number, length: number, apart: number): Scale {
  return inMillimetres(linear('Position from the left electrode', 'mm', 0, spacing * 1e3, { length, apart }, false));
}

/** the same axis, taking metres */
function inMillimetres(scale: Scale): Scale {
  return { ...scale, at: (metres) => scale.at(metres * 1e3), from: (share) => scale.from(share) / 1e3 };
}

export type ProfileName = 'field-profile' | 'density-profile' | 'ionisation-profile';
export const PROFILES: readonly ProfileName[] = ['field-profile', 'density-profile', 'ionisation-profile'];

/** Profiles at one snapshot. The axes of densities and rate hold for the whole run; that of the field follows it. */
export function profileFigure(name: ProfileName, run: RunSeries, index: number, width: number): Figure {
  const cells = run.x.length;
  const at = (field: RunField, factor: number): Float64Array | null => {
    const values = run.fields[field];
    return values === null ? null : Float64Array.from(values.subarray(index * cells, (index + 1) * cells), (v) => v * factor);
  };
  const base = { id: name, width, height: HEIGHT.profile, left: LEFT, right: 14 };
  const xScale = (length: number): Scale => positionScale(run.setting.spacing, length, 50);
  const curve = (label: string, style: string, y: Float64Array | null): Curve[] =>
    y === null ? [] : [{ name: label, style, x: run.x, y }];
  if (name === 'field-profile') {
    const field = at('electricField', -1e-2) ?? new Float64Array(cells);
    const [low, high] = extent([field]);
    return lineFigure(
      {
        ...base,
        title: 'Field profile',
        description: 'Field between the electrodes at the linked time',
        curves: curve('field', 's1', field),
      },
      xScale,
      (length) => linear('Field towards the left electrode', 'V/cm', Math.min(0, low), Math.max(0, high), { length, apart: 24 }),
    );
  }
  if (name === 'density-profile') {
    const curves = [
      ...curve('positive ions', 's2', at('ionDensity', 1e-6)),
      ...curve('negative ions', 's4', at('negativeIonDensity', 1e-6)),
      ...curve('electrons', 's1', at('electronDensity', 1e-6)),
    ];
    const ranges = [mapRange(run, 'ionDensity'), mapRange(run, 'electronDensity')];
    const [from, to] = [Math.min(...ranges.map(([f]) => f)), Math.max(...ranges.map(([, t]) => t))];
    return lineFigure(
      { ...base, title: 'Density profiles', description: 'Densities between the electrodes at the linked time', curves },
      xScale,
      (length) => logarithmic('Density', 'cm⁻³', from, to * 3, { length, apart: 20 }, false),
    );
  }
  const [from, to] = mapRange(run, 'ionisationRate');
  return lineFigure(
    {
      ...base,
      title: 'Ionisation profile',
      description: 'Ionisation rate between the electrodes at the linked time',
      curves: curve('ionisation', 's1', at('ionisationRate', 1e-6)),
    },
    xScale,
    (length) => logarithmic('Ionisation rate', 'cm⁻³ s⁻¹', from, to * 3, { length, apart: 20 }, false),
  );
}

/** The way of the gap through current and voltage, with the line of what the supply can feed it. The linked snapshot is a ring. */
export function pathFigure(run: RunSeries, index: number | null, width: number): Figure {
  const { scalars, setting, time } = run;
  const current = scalars.conductionCurrent.map(Math.abs);
  const sign = Math.sign(scalars.gapVoltage.reduce((most, v) => (Math.abs(v) > Math.abs(most) ? v : most), 0)) || 1;
  const voltage = scalars.gapVoltage.map((v) => v * sign);
  const supply = scalars.supplyVoltage.map((v) => v * sign);
  const highest = extent([supply])[1];
  const [from, to] = currentExtent(run, current);
  const load = (volts: number): Pick<Curve, 'x' | 'y'> | null => {
    const resistance = setting.seriesResistance;
    if (resistance === null || !(volts > 0)) return null;
    const end = Math.min(
      resistance > 0 ? volts / resistance : Number.POSITIVE_INFINITY,
      setting.currentLimit ?? Number.POSITIVE_INFINITY,
      to * 30,
    );
    const x = Array.from({ length: 121 }, (_, k) => from * (end / from) ** (k / 120));
    const y = x.map((amps) => volts - amps * resistance);
    if (setting.currentLimit !== null && end === setting.currentLimit) {
      x.push(end);
      y.push(0);
    }
    return { x, y };
  };
  const whole = load(highest);
  const end = whole === null ? to : Math.max(to, Math.min(whole.x[whole.x.length - 1] * 1.2, to * 30));
  const [lowest, most] = extent([voltage]);
  const curves: Curve[] = [
    ...(whole === null ? [] : [{ name: 'load line', style: 's2', ...whole }]),
    { name: 'gap', style: 's1', x: current, y: voltage },
  ];
  const now = index === null || Math.abs(supply[index] - highest) < 1e-3 * highest ? null : load(supply[index]);
  return lineFigure(
    {
      id: 'path',
      title: 'Current and voltage of the gap',
      description: 'The path of the gap through conduction current and voltage, with the load line of the supply',
      width,
      height: HEIGHT.path,
      left: LEFT,
      right: 14,
      curves,
      over: (box, x, y) => [
        now === null ? null : el('path', { class: 'curve s3', d: pathOf(now, box, x, y) }),
        ...eventsOnPath(run, time, current, voltage, box, x, y),
        index === null ? null : ring(box, x.at(current[index]), y.at(voltage[index])),
      ],
    },
    (length) => logarithmic('Conduction current', 'A', from, end, { length, apart: 56 }),
    (length) =>
      linear(sign < 0 ? 'Gap voltage, sign reversed' : 'Gap voltage', 'V', Math.min(0, lowest), Math.max(highest, most), {
        length,
        apart: 34,
      }),
  );
}

function ring(box: Box, sx: number, sy: number): ReturnType<typeof el> | null {
  if (!Number.isFinite(sx) || !Number.isFinite(sy)) return null;
  return el('circle', { class: 'now', cx: round(box.left + sx * box.width), cy: round(box.top + (1 - sy) * box.height), r: 6 });
}

function eventsOnPath(
  run: RunSeries,
  time: Float64Array,
  current: Float64Array,
  voltage: Float64Array,
  box: Box,
  x: Scale,
  y: Scale,
): ReturnType<typeof el>[] {
  const taken: number[] = [];
  return run.events.flatMap(({ name, time: t }) => {
    const i = nearest(time, t);
    const [sx, sy] = [x.at(current[i]), y.at(voltage[i])];
    if (!Number.isFinite(sx) || !Number.isFinite(sy)) return [];
    const [cx, cy] = [box.left + sx * box.width, box.top + (1 - sy) * box.height];
    const leftwards = sx > 0.55;
    let labelY = cy + 16;
    while (taken.some((other) => Math.abs(other - labelY) < 14)) labelY += 14;
    taken.push(labelY);
    return [
      el('circle', { class: 'point', cx: round(cx), cy: round(cy), r: 3.5 }),
      el(
        'g',
        { class: 'mark' },
        el('text', { x: leftwards ? cx - 8 : cx + 8, y: labelY, 'text-anchor': leftwards ? 'end' : 'start' }, name),
      ),
    ];
  });
}

function extent(series: readonly ArrayLike<number>[]): [low: number, high: number] {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const values of series)
    for (let i = 0; i < values.length; i++) {
      if (values[i] < low) low = values[i];
      if (values[i] > high) high = values[i];
    }
  return low <= high ? [low, high] : [0, 1];
}

/** From the least positive value worth showing to the largest. @param upper  counts for the upper end only */
function positiveExtent(series: readonly ArrayLike<number>[], upper: ArrayLike<number> = []): [from: number, to: number] {
  let [from, to] = [Number.POSITIVE_INFINITY, largest(upper)];
  for (const values of series)
    for (let i = 0; i < values.length; i++) {
      if (!(values[i] > 0)) continue;
      from = Math.min(from, values[i]);
      to = Math.max(to, values[i]);
    }
  if (!(to > 0)) return [1e-3, 1]; // nothing flows: an axis all the same
  return [Math.max(Math.min(to / 10, from), to * 10 ** -MOST_DECADES), to];
}

/** What is far below the seed current, in the first instants, is not worth an axis. */
function currentExtent(run: RunSeries, current: ArrayLike<number>, upper: ArrayLike<number> = []): [from: number, to: number] {
  const [from, to] = positiveExtent([current], upper);
  return [Math.min(Math.max(from, (run.setting.seedCurrent ?? 0) / 100), to / 10), to];
}

function largest(values: ArrayLike<number>): number {
  let most = 0;
  for (let i = 0; i < values.length; i++) most = Math.max(most, Math.abs(values[i]));
  return most;
}
