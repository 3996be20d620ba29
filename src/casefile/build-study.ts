import type { Case } from '../case.ts';
import type { Find, ScanSettings, WindowSettings } from '../study.ts';
import type { Programme } from '../supply/settings.ts';
import { DISCHARGE_COEFFICIENT } from '../surroundings/aperture.ts';
import type { BaySettings, OutsideSettings } from '../surroundings/bay.ts';
import { FLOW_GASES, type FlowGas } from '../surroundings/flow-gas.ts';
import type { PressureSettings } from '../surroundings/history.ts';
import type { Rows } from '../surroundings/series.ts';
import { type AxisInput, axisOf, settable } from './axis.ts';
import type { Defaults } from './defaults.ts';
import type { LoadedTable } from './fields.ts';
import { type BayInput, type HistoryInput, lastTime, type OutsideInput } from './history-schema.ts';
import { FIND_RANGE, type FindInput, type ScanInput } from './scan-schema.ts';
import type { CaseSchemas } from './schema.ts';

/** A validated scan with every default filled in. */
export function buildScan(input: ScanInput, run: CaseSchemas['run'], defaults: Defaults): ScanSettings {
  const { vary, find } = input;
  const axes = (vary ?? []).map((entry, k) => {
    if (entry.values === undefined) defaults.or(entry.spacing, `scan.vary.${k}.spacing`, 'linear', 'linear');
    return axisFrom(entry, run);
  });
  const zip = vary === undefined ? false : defaults.or(input.zip, 'scan.zip', false, 'false');
  return { axes, zip, find: find ? findFrom(find, defaults) : null };
}

function axisFrom(entry: AxisInput, run: CaseSchemas['run']): ScanSettings['axes'][number] {
  const leaf = settable(run, entry.path);
  const result = leaf && axisOf(entry, leaf, () => {});
  if (!result?.ok) throw new Error(`scan.vary: ${entry.path} passed validation without values`);
  return result.axis;
}

function findFrom(input: FindInput, defaults: Defaults): Find {
  const { what } = input;
  const [from, to] = [input.from, input.to].map((end) => FIND_RANGE[what].parse(end));
  const tolerance = defaults.or(input.tolerance, 'scan.find.tolerance', 1e-3, '0.1 %');
  if (what !== 'trip-delay') return { what, from, to, tolerance };
  if (input.gap_energy === undefined) throw new Error('scan.find passed validation without gap_energy');
  return { what, gapEnergy: input.gap_energy, from, to, tolerance };
}

/** A validated history with every default filled in. */
export function buildWindow(input: HistoryInput, settings: Case, defaults: Defaults): WindowSettings {
  const { temperature, voltage } = input;
  const { gas, supply } = settings;
  const highest = highestVoltage(supply.programme);
  const end = input.duration ?? lastTime(input) ?? Number.NaN;
  return {
    history: {
      duration: defaults.or(input.duration, 'history.duration', end, `${end} s, the last row`),
      pressure: pressureFrom(input.pressure, gas.name, defaults),
      temperature: constantOrRows(
        defaults.or<typeof temperature>(temperature, 'history.temperature', gas.temperature, 'gas.temperature'),
        gas.temperature,
      ),
    },
    voltage: constantOrRows(
      defaults.or<typeof voltage>(voltage, 'history.voltage', highest, `${highest} V, the largest of supply.voltage`),
      highest,
    ),
    margin: defaults.or(input.margin, 'history.margin', 1.5, '1.5'),
  };
}

function constantOrRows(given: number | { readonly table: LoadedTable } | undefined, fallback: number): number | Rows {
  return typeof given === 'object' ? rowsOf(given.table) : (given ?? fallback);
}

function rowsOf({ columns: [times, values] }: LoadedTable): Rows {
  return { times: Float64Array.from(times.values), values: Float64Array.from(values.values) };
}

function pressureFrom(input: HistoryInput['pressure'], gas: string | null, defaults: Defaults): PressureSettings {
  if (input.table) return { kind: 'table', rows: rowsOf(input.table) };
  if (input.dataset) return { kind: 'dataset', rows: { times: input.dataset.times, values: input.dataset.values } };
  if (input.ascent) return { kind: 'ascent', ascent: input.ascent };
  if (!input.bay) throw new Error('history.pressure passed validation without an arm');
  return { kind: 'bay', bay: bayFrom(input.bay, flowGas(gas, defaults), defaults) };
}

function flowGas(name: string | null, defaults: Defaults): FlowGas {
  const known = Object.values(FLOW_GASES).find((gas) => gas.name === name);
  if (known) return known;
  defaults.note(`history.pressure.bay: flows are those of air, as those of ${name ?? "the case's own gas"} are not known`);
  return FLOW_GASES.air;
}

function bayFrom(input: BayInput, gas: FlowGas, defaults: Defaults): BaySettings {
  const path = 'history.pressure.bay';
  const { volume, start, pump } = input;
  return {
    volume,
    start,
    gas,
    outside: defaults.or<OutsideSettings | null>(input.outside && outsideFrom(input.outside), `${path}.outside`, null, 'none'),
    vents: defaults.or(input.vents, `${path}.vents`, [], 'none').map((vent, i) => ({
      diameter: vent.diameter,
      length: vent.length,
      count: defaults.or(vent.count, `${path}.vents.${i}.count`, 1, '1'),
      dischargeCoefficient: defaults.or(
        vent.discharge_coefficient,
        `${path}.vents.${i}.discharge_coefficient`,
        DISCHARGE_COEFFICIENT.typical,
        `${DISCHARGE_COEFFICIENT.typical}`,
      ),
    })),
    pump: defaults.or<BaySettings['pump']>(
      pump && { speed: pump.speed, basePressure: defaults.or(pump.base_pressure, `${path}.pump.base_pressure`, 0, '0 Pa') },
      `${path}.pump`,
      null,
      'none',
    ),
    gasLoad: defaults.or(input.gas_load, `${path}.gas_load`, 0, '0 Pa m^3/s'),
    outgassing: defaults
      .or(input.outgassing, `${path}.outgassing`, [], 'none')
      .map(({ area, rate_at_1h, exponent }) => ({ area, rateAtOneHour: rate_at_1h, exponent })),
  };
}

function outsideFrom({ pressure, table, ascent }: OutsideInput): OutsideSettings {
  if (table) return { kind: 'table', rows: rowsOf(table) };
  if (ascent) return { kind: 'ascent', ascent };
  if (pressure === undefined) throw new Error('history.pressure.bay.outside passed validation without an arm');
  return { kind: 'fixed', pressure };
}

/** The supply voltage of largest magnitude [V], with its sign: positive makes the left electrode the cathode. */
export function highestVoltage(programme: Programme): number {
  const larger = (a: number, b: number): number => (Math.abs(b) > Math.abs(a) ? b : a);
  switch (programme.kind) {
    case 'step':
      return programme.voltage;
    case 'ramp':
      return larger(programme.from, programme.to);
    case 'table':
      return programme.voltages.reduce(larger);
  }
}
