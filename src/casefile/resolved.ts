import type { Case } from '../case.ts';
import type { Form } from '../gases/forms.ts';
import type { Coefficient } from '../gases/gas.ts';
import type { ScanSettings, WindowSettings } from '../study.ts';
import type { Surface } from '../surfaces/surface.ts';
import { hashColumns } from './hash.ts';
import { type ResolvedValue, scanEntries, windowEntries } from './resolved-study.ts';

/** A case as a flat record: the paths of the case file, values in SI, defaults included.
 *
 *  Coefficients are listed only where the case gave them, as used: N-based. Tables appear by hash, the values
 *  of a scan by their number and ends. */
export function resolvedOf(c: Case, scan: ScanSettings | null, window: WindowSettings | null): Record<string, ResolvedValue> {
  const { gap, gas, electrodes, seed, supply, observe, numerics } = c;
  const { programme, trip } = supply;
  return {
    title: c.title,
    'gap.geometry': gap.geometry,
    'gap.spacing': gap.spacing,
    'gap.area': gap.area,
    'gap.longest_path': gap.longestPath,
    'gas.name': gas.name,
    'gas.pressure': gas.pressure,
    'gas.temperature': gas.temperature,
    ...coefficientEntries(c),
    ...surfaceEntries('electrodes.left', electrodes.left),
    ...surfaceEntries('electrodes.right', electrodes.right),
    'seed.cathode_current': seed.cathodeCurrent,
    'seed.electrons': seed.electrons,
    ...(programme.kind === 'step' ? { 'supply.voltage.step': programme.voltage, 'supply.voltage.rise_time': programme.riseTime } : {}),
    ...(programme.kind === 'ramp'
      ? { 'supply.voltage.ramp.from': programme.from, 'supply.voltage.ramp.to': programme.to, 'supply.voltage.ramp.rate': programme.rate }
      : {}),
    ...(programme.kind === 'table' ? { 'supply.voltage.table': `sha256:${hashColumns([programme.times, programme.voltages])}` } : {}),
    'supply.series_resistance': supply.seriesResistance,
    'supply.parallel_capacitance': supply.parallelCapacitance,
    'supply.current_limit': supply.currentLimit,
    ...(trip
      ? {
          'supply.trip.current': trip.current,
          'supply.trip.delay': trip.delay,
          'supply.trip.senses': trip.senses,
          'supply.trip.action': trip.action,
        }
      : { 'supply.trip': null }),
    'supply.initial_gap_voltage': supply.initialGapVoltage,
    'electrons.closure': 'local-field',
    'observe.until': observe.until,
    ...Object.fromEntries(observe.currents.map((level, i) => [`observe.currents.${i}`, level])),
    'numerics.cells': numerics.cells,
    'numerics.tolerance': numerics.tolerance,
    ...(scan ? scanEntries(scan) : {}),
    ...(window ? windowEntries(window) : {}),
  };
}

function surfaceEntries(path: string, surface: Surface): Record<string, ResolvedValue> {
  return { [`${path}.material`]: surface.material, [`${path}.ion_yield`]: surface.ionYield.typical };
}

function coefficientEntries(c: Case): Record<string, ResolvedValue> {
  const { coefficients } = c.gas;
  const named: readonly (readonly [string, Coefficient | null])[] = [
    ['ionisation', coefficients.ionisation],
    ['attachment', coefficients.attachment],
    ['electron_mobility', coefficients.electronMobility],
    ['electron_energy', coefficients.electronEnergy],
    ['ion_mobility', coefficients.ionMobility],
    ['ion_energy', coefficients.ionEnergy],
    ['negative_ion_mobility', coefficients.negativeIonMobility],
    ['negative_ion_energy', coefficients.negativeIonEnergy],
    ['recombination', coefficients.electronIonRecombination],
  ];
  const entries: Record<string, ResolvedValue> = {};
  for (const [name, coefficient] of named) {
    if (coefficient === null || (c.gas.name !== null && coefficient.status !== 'given')) continue;
    const path = `gas.coefficients.${name}`;
    Object.assign(entries, formEntries(path, coefficient.form));
    if (coefficient.range) {
      entries[`${path}.valid_from`] = coefficient.range.from;
      entries[`${path}.valid_to`] = coefficient.range.to;
    }
  }
  return entries;
}

function formEntries(path: string, form: Form): Record<string, ResolvedValue> {
  switch (form.kind) {
    case 'constant':
      return { [path]: form.value };
    case 'exponential':
      return { [`${path}.form`]: form.kind, [`${path}.A`]: form.A, [`${path}.B`]: form.B };
    case 'root':
      return { [`${path}.form`]: form.kind, [`${path}.C`]: form.C, [`${path}.D`]: form.D };
    case 'table':
      return { [`${path}.table`]: `sha256:${hashColumns([form.x, form.y])}` };
    default:
      // the other forms belong to built-in gases, which are listed by name
      return { [`${path}.form`]: form.kind };
  }
}
