import type { Case } from '../case.ts';
import type { Form } from '../gases/forms.ts';
import type { Coefficient } from '../gases/gas.ts';
import type { ScanSettings, WindowSettings } from '../study.ts';
import type { Surface } from '../surfaces/surface.ts';
import { ELEMENTARY_CHARGE } from '../units/constants.ts';
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
    ...gasEntries(c),
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
    'electrons.closure': c.electrons?.closure ?? 'local-field',
    ...(c.electrons
      ? {
          'electrons.emission_energy': c.electrons.emissionEnergy * ELEMENTARY_CHARGE,
          'electrons.particles': c.electrons.particles,
          'electrons.seed': c.electrons.seed,
        }
      : {}),
    'observe.until': observe.until,
    ...Object.fromEntries(observe.currents.map((level, i) => [`observe.currents.${i}`, level])),
    'numerics.cells': numerics.cells,
    'numerics.tolerance': numerics.tolerance,
    ...(scan ? scanEntries(scan) : {}),
    ...(window ? windowEntries(window) : {}),
  };
}

/** A gas by its name and set of data, or a mixture by its fractions. */
function gasEntries({ gas }: Case): Record<string, ResolvedValue> {
  if (gas.mixture) return Object.fromEntries(gas.mixture.map((part) => [`gas.mixture.${part.gas}`, part.fraction]));
  return { 'gas.name': gas.name, ...(gas.dataSet === undefined ? {} : { 'gas.data': gas.dataSet }) };
}

/** One number where the yield is one, or the material's own; else with the ends of its spread. */
function surfaceEntries(path: string, { material, ionYield, condition }: Surface): Record<string, ResolvedValue> {
  const { typical, low, high, law, status } = ionYield;
  const entries: Record<string, ResolvedValue> = { [`${path}.material`]: material };
  if (condition !== undefined) entries[`${path}.surface`] = condition;
  if (law === undefined && (status !== 'given' || low === high)) return { ...entries, [`${path}.ion_yield`]: typical };
  if (law === undefined) entries[`${path}.ion_yield.typical`] = typical;
  else if (law.kind === 'reduced-field' && law.form.kind === 'table')
    entries[`${path}.ion_yield.table`] = `sha256:${hashColumns([law.form.x, law.form.y])}`;
  return { ...entries, [`${path}.ion_yield.low`]: low, [`${path}.ion_yield.high`]: high };
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
