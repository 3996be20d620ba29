import type { ScanSettings, WindowSettings } from '../study.ts';
import type { AscentSettings } from '../surroundings/ascent.ts';
import type { BaySettings, OutsideSettings } from '../surroundings/bay.ts';
import type { PressureSettings } from '../surroundings/history.ts';
import type { Rows } from '../surroundings/series.ts';
import { hashColumns } from './hash.ts';

export type ResolvedValue = number | string | boolean | null;

type Entries = Record<string, ResolvedValue>;

/** A scan as entries of the flat record: the number and the ends of each axis's values, not the values. */
export function scanEntries({ axes, zip, find }: ScanSettings): Entries {
  const entries: Entries = {};
  for (const [k, { path, unit, values }] of axes.entries()) {
    Object.assign(entries, {
      [`scan.vary.${k}.path`]: path,
      [`scan.vary.${k}.unit`]: unit,
      [`scan.vary.${k}.points`]: values.length,
      [`scan.vary.${k}.from`]: values[0],
      [`scan.vary.${k}.to`]: values[values.length - 1],
    });
  }
  entries['scan.zip'] = zip;
  if (find !== null) {
    const { what, from, to, tolerance } = find;
    Object.assign(entries, prefixed('scan.find', { what, from, to, tolerance }));
    if (what === 'trip-delay') entries['scan.find.gap_energy'] = find.gapEnergy;
  }
  return entries;
}

/** A history as entries of the flat record; rows appear by hash. */
export function windowEntries({ history, voltage, margin }: WindowSettings): Entries {
  return {
    'history.duration': history.duration,
    ...pressureEntries('history.pressure', history.pressure),
    ...constantOrRows('history.temperature', history.temperature),
    ...constantOrRows('history.voltage', voltage),
    'history.margin': margin,
  };
}

function pressureEntries(path: string, pressure: PressureSettings): Entries {
  switch (pressure.kind) {
    case 'table':
    case 'dataset':
      return { [`${path}.${pressure.kind}`]: rowsText(pressure.rows) };
    case 'ascent':
      return ascentEntries(`${path}.ascent`, pressure.ascent);
    case 'bay':
      return bayEntries(`${path}.bay`, pressure.bay);
  }
}

function bayEntries(path: string, bay: BaySettings): Entries {
  const { volume, start, gas, outside, vents, pump, gasLoad, outgassing } = bay;
  const entries = prefixed(path, { volume, start, gas: gas.name, gas_load: gasLoad });
  Object.assign(entries, outside === null ? { [`${path}.outside`]: null } : outsideEntries(`${path}.outside`, outside));
  for (const [i, { diameter, length, count, dischargeCoefficient }] of vents.entries())
    Object.assign(entries, prefixed(`${path}.vents.${i}`, { diameter, length, count, discharge_coefficient: dischargeCoefficient }));
  Object.assign(
    entries,
    pump === null ? { [`${path}.pump`]: null } : prefixed(`${path}.pump`, { speed: pump.speed, base_pressure: pump.basePressure }),
  );
  for (const [i, { area, rateAtOneHour, exponent }] of outgassing.entries())
    Object.assign(entries, prefixed(`${path}.outgassing.${i}`, { area, rate_at_1h: rateAtOneHour, exponent }));
  return entries;
}

function outsideEntries(path: string, outside: OutsideSettings): Entries {
  if (outside.kind === 'fixed') return { [`${path}.pressure`]: outside.pressure };
  return outside.kind === 'table' ? { [`${path}.table`]: rowsText(outside.rows) } : ascentEntries(`${path}.ascent`, outside.ascent);
}

function ascentEntries(path: string, { from, to, rate }: AscentSettings): Entries {
  return prefixed(path, { from, to, rate });
}

function constantOrRows(path: string, given: number | Rows): Entries {
  return typeof given === 'number' ? { [path]: given } : { [`${path}.table`]: rowsText(given) };
}

function rowsText({ times, values }: Rows): string {
  return `sha256:${hashColumns([times, values].map((column) => Float64Array.from(column)))}`;
}

function prefixed(path: string, entries: Entries): Entries {
  return Object.fromEntries(Object.entries(entries).map(([key, value]) => [`${path}.${key}`, value]));
}
