import type { Case } from '../case.ts';
import type { PlanarGap } from '../gap/geometry.ts';
import type { Gas, GasData } from '../gases/gas.ts';
import type { Programme, SupplySettings } from '../supply/settings.ts';
import type { Surface } from '../surfaces/surface.ts';
import { BOLTZMANN } from '../units/constants.ts';
import { coefficientsOf } from './coefficients.ts';
import type { Defaults } from './defaults.ts';
import { deepFreeze } from './freeze.ts';
import { hashCase } from './hash.ts';
import type { CaseInput, ElectrodeInput } from './schema.ts';

/** The built-in data that a case may name. */
export interface BuiltIns {
  readonly gases: Readonly<Record<string, GasData>>;
  readonly materials: readonly string[];
  /** the surface of a material in a gas (null: the case's own coefficients), or null where its yield is unknown */
  readonly surfaceFor: (material: string, gas: string | null) => Surface | null;
}

/** relative uncertainty of a breakdown voltage where nothing better is known */
const BREAKDOWN_UNCERTAINTY = 0.2;

/** A validated case with every default filled in, frozen. */
export function buildCase(input: CaseInput, fileTitle: string, builtIns: BuiltIns, defaults: Defaults): Case {
  const title = defaults.or(input.title, 'title', fileTitle, fileTitle);
  const left = surfaceOf(input.electrodes.left, input.gas.name ?? null, builtIns);
  if (!input.electrodes.right) defaults.add('electrodes.right', 'same as left');
  const right = input.electrodes.right ? surfaceOf(input.electrodes.right, input.gas.name ?? null, builtIns) : left;
  defaults.or(input.electrons?.closure, 'electrons.closure', 'local-field', 'local-field');
  const withoutHash: Omit<Case, 'sha256'> = {
    title,
    gap: gapOf(input.gap, defaults),
    gas: gasOf(input.gas, builtIns, defaults),
    electrodes: { left, right },
    seed: {
      cathodeCurrent: input.seed.cathode_current,
      electrons: defaults.or(input.seed.electrons, 'seed.electrons', 0, '0'),
    },
    supply: supplyOf(input.supply, defaults),
    observe: {
      until: input.observe.until,
      currents: [...new Set(defaults.or(input.observe.currents, 'observe.currents', [], 'none'))].sort((a, b) => a - b),
    },
    numerics: {
      cells: defaults.or<number | null>(input.numerics?.cells, 'numerics.cells', null, "the program's choice"),
      tolerance: defaults.or(input.numerics?.tolerance, 'numerics.tolerance', 1e-3, '1e-3'),
    },
  };
  return deepFreeze({ ...withoutHash, sha256: hashCase(withoutHash) });
}

function gapOf(input: CaseInput['gap'], defaults: Defaults): PlanarGap {
  return {
    geometry: input.geometry,
    spacing: input.spacing,
    area: input.area,
    longestPath: defaults.or(input.longest_path, 'gap.longest_path', input.spacing, 'gap.spacing'),
    longestPathGiven: input.longest_path !== undefined,
  };
}

function gasOf(input: CaseInput['gas'], builtIns: BuiltIns, defaults: Defaults): Gas {
  const builtIn = input.name === undefined ? null : builtIns.gases[input.name];
  const temperature = defaults.or(input.temperature, 'gas.temperature', 293.15, '293.15 K');
  const own = input.coefficients;
  const coefficients =
    own || !builtIn ? coefficientsOf(own ?? {}, builtIn?.coefficients ?? null, temperature, defaults) : builtIn.coefficients;
  // what was known about a breakdown voltage no longer holds once its ionisation coefficient is replaced
  const uncertainty = builtIn && !own?.ionisation && !own?.attachment ? builtIn.breakdownUncertainty : BREAKDOWN_UNCERTAINTY;
  return {
    name: input.name ?? null,
    pressure: input.pressure,
    temperature,
    density: input.pressure / (BOLTZMANN * temperature),
    coefficients,
    breakdownUncertainty: uncertainty,
    kineticCrossSection: builtIn?.kineticCrossSection ?? null,
  };
}

function surfaceOf(input: ElectrodeInput, gas: string | null, builtIns: BuiltIns): Surface {
  const known = input.material === undefined ? null : builtIns.surfaceFor(input.material, gas);
  if (input.ion_yield === undefined) {
    if (known === null) throw new Error('an electrode passed validation without a yield');
    return known;
  }
  const value = input.ion_yield;
  return {
    material: input.material ?? null,
    ionYield: { typical: value, low: value, high: value, source: 'case file', status: 'given', uncertainty: null },
    workFunction: known?.workFunction ?? null,
  };
}

function supplyOf(input: CaseInput['supply'], defaults: Defaults): SupplySettings {
  const { trip } = input;
  return {
    programme: programmeOf(input.voltage, defaults),
    seriesResistance: input.series_resistance,
    parallelCapacitance: defaults.or(input.parallel_capacitance, 'supply.parallel_capacitance', 0, '0 F'),
    currentLimit: defaults.or<number | null>(input.current_limit, 'supply.current_limit', null, 'none'),
    trip: defaults.or<SupplySettings['trip']>(
      trip && {
        current: trip.current,
        delay: trip.delay,
        senses: defaults.or(trip.senses, 'supply.trip.senses', 'gap', 'gap'),
        action: defaults.or(trip.action, 'supply.trip.action', 'open', 'open'),
      },
      'supply.trip',
      null,
      'none',
    ),
    initialGapVoltage: defaults.or(input.initial_gap_voltage, 'supply.initial_gap_voltage', 0, '0 V'),
  };
}

function programmeOf(voltage: CaseInput['supply']['voltage'], defaults: Defaults): Programme {
  if (voltage.step !== undefined) {
    return { kind: 'step', voltage: voltage.step, riseTime: defaults.or(voltage.rise_time, 'supply.voltage.rise_time', 0, '0 s') };
  }
  if (voltage.ramp) return { kind: 'ramp', ...voltage.ramp };
  const [times, voltages] = voltage.table?.columns ?? [];
  if (!times || !voltages) throw new Error('supply.voltage passed validation without a step, ramp or table');
  return { kind: 'table', times: times.values, voltages: voltages.values };
}
