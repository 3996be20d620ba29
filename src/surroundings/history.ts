import { type AscentSettings, outsideAir } from './ascent.ts';
import { type BaySettings, followBay, LEAST_PRESSURE } from './bay.ts';
import { OUTGASSING_HELD_UNTIL } from './outgassing.ts';
import { constant, fromRows, type Rows, type Series } from './series.ts';

/** Where the pressure around a gap comes from; arrays are already read, everything is SI. */
export type PressureSettings =
  /** [Pa] against [s], from a table of the case */
  | { readonly kind: 'table'; readonly rows: Rows }
  /** the same, from a data set of a file */
  | { readonly kind: 'dataset'; readonly rows: Rows }
  | { readonly kind: 'ascent'; readonly ascent: AscentSettings }
  | { readonly kind: 'bay'; readonly bay: BaySettings };

export interface HistorySettings {
  /** [s], > 0 */
  readonly duration: number;
  readonly pressure: PressureSettings;
  /** [K], constant or against time */
  readonly temperature: number | Rows;
}

/** The gas around a gap in time. */
export interface History {
  /** [s] */
  readonly duration: number;
  /** [Pa] at t [s], 0…duration; held outside */
  pressureAt(t: number): number;
  /** [K] */
  temperatureAt(t: number): number;
  /** times within the history at which what is given bends [s], rising: a reader that samples should look there too */
  readonly corners: readonly number[];
  /** what a reader should know of how it was made, one sentence each */
  readonly notes: readonly string[];
}

/** p(t) and T(t) of a history: tables and data sets linear between rows and held at their ends; an ascent by the standard atmosphere; a bay followed in time.
 *  @throws RangeError when the settings make no sense (see `outsideAir`, `followBay`, `fromRows`); Error when a bay cannot be followed */
export function historyOf(settings: HistorySettings): History {
  const { duration } = settings;
  if (!(duration > 0 && duration < Infinity)) throw new RangeError(`a history needs a duration, not ${duration} s`);
  const temperature = typeof settings.temperature === 'number' ? constant(settings.temperature) : fromRows(settings.temperature);
  const pressure = pressureSeries(settings.pressure, temperature, duration);
  const corners = [...new Set([...pressure.corners, ...temperature.corners])].filter((t) => t > 0 && t < duration).sort((a, b) => a - b);
  return {
    duration,
    pressureAt: (t) => pressure.at(t),
    temperatureAt: (t) => temperature.at(t),
    corners,
    notes: [...pressureNotes(settings), ...heldRows(settings)],
  };
}

/** Pressures and temperatures of a history at many times.
 *  @param times  [s] */
export function sampleHistory(history: History, times: ArrayLike<number>): { pressures: Float64Array; temperatures: Float64Array } {
  const pressures = Float64Array.from(times, (t) => history.pressureAt(t));
  const temperatures = Float64Array.from(times, (t) => history.temperatureAt(t));
  return { pressures, temperatures };
}

function pressureSeries(settings: PressureSettings, temperature: Series, duration: number): Series {
  switch (settings.kind) {
    case 'table':
    case 'dataset':
      return fromRows(settings.rows);
    case 'ascent':
      return outsideAir(settings.ascent);
    case 'bay': {
      const bay = followBay(settings.bay, temperature, duration);
      return { at: (t) => bay.pressureAt(t), corners: bay.corners };
    }
  }
}

const ATMOSPHERE_NOTE = 'Outside air: U.S. Standard Atmosphere, 1976; season and latitude change its pressure by some 10 % at 30 km.';

function pressureNotes({ pressure, duration }: HistorySettings): string[] {
  switch (pressure.kind) {
    case 'table':
    case 'dataset':
      return [];
    case 'ascent':
      return [ATMOSPHERE_NOTE, ...arrivalNote(pressure.ascent, duration)];
    case 'bay':
      return bayNotes(pressure.bay, duration);
  }
}

function bayNotes(bay: BaySettings, duration: number): string[] {
  const notes = [`Bay: one pressure and one gas (${bay.gas.name}) inside and out, at the given temperature throughout.`];
  if (bay.outside?.kind === 'ascent') notes.push(ATMOSPHERE_NOTE, ...arrivalNote(bay.outside.ascent, duration));
  if (bay.vents.length > 0)
    notes.push(
      'Vents: bore (Knudsen 1909, turbulent by Blasius) and exit (effusion to choked jet, Sharipov 2004) in series, 10 % in transition; jets as uncertain as the discharge coefficient.',
    );
  if (bay.outgassing.length > 0)
    notes.push(
      `Outgassing: time in vacuum counts from the start of the history; before ${OUTGASSING_HELD_UNTIL} s the rate is held at its value there. Rates of technical surfaces spread over a factor of ten.`,
    );
  const outside = bay.outside;
  const nothing =
    bay.start < LEAST_PRESSURE ||
    (outside?.kind === 'fixed' && outside.pressure < LEAST_PRESSURE) ||
    (outside?.kind === 'table' && Array.from(outside.rows.values).some((p) => p < LEAST_PRESSURE)) ||
    (bay.pump !== null && bay.pump.basePressure < LEAST_PRESSURE);
  if (nothing) notes.push(`Pressures given below ${LEAST_PRESSURE} Pa are taken as that.`);
  return notes;
}

function arrivalNote({ from, to, rate }: AscentSettings, duration: number): string[] {
  const arrival = (to - from) / rate;
  if (from === to) return [];
  if (arrival < duration) return [`The ascent ends at ${Number(arrival.toPrecision(6))} s; the altitude is held from then on.`];
  return arrival > duration ? [`The history ends at ${Number((from + rate * duration).toPrecision(6))} m, before the ascent does.`] : [];
}

/** rows that do not span the history */
function heldRows({ duration, pressure, temperature }: HistorySettings): string[] {
  const given: [string, Rows][] = [];
  if (pressure.kind === 'table' || pressure.kind === 'dataset') given.push(['pressure', pressure.rows]);
  if (pressure.kind === 'bay' && pressure.bay.outside?.kind === 'table') given.push(['outside pressure', pressure.bay.outside.rows]);
  if (typeof temperature !== 'number') given.push(['temperature', temperature]);
  return given.flatMap(([name, { times }]) => {
    const [first, last] = [times[0], times[times.length - 1]];
    if (first <= 0 && last >= duration) return [];
    return [`The rows of the ${name} span ${first} to ${last} s; outside them their end values are held.`];
  });
}
