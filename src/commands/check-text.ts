import type { Case } from '../case.ts';
import type { Coefficient, Provenance } from '../gases/gas.ts';
import type { YieldEnd } from '../onset/cautions/yield-ends.ts';
import type { Caution } from '../onset/outcome.ts';
import type { Surface } from '../surfaces/surface.ts';
import type { CurvePoint, Kinetics } from '../theory/kinetic.ts';
import type { Prospects, Theory } from '../theory/predict.ts';
import { TOWNSEND, VACUUM_PERMITTIVITY } from '../units/constants.ts';
import { printable } from '../units/printable.ts';
import { VERSION } from '../version.ts';
import type { LoadedCase } from './case-source.ts';
import { cautionLines, lastLines } from './cautions-text.ts';
import { gasUsed, type SetVoltage, yieldConsequences } from './check-spread.ts';
import { coefficientsOf, notesOf } from './coefficients.ts';
import { curveLines, kineticRows } from './kinetics-text.ts';
import { columns, NO_BREAK, wrap } from './layout.ts';
import { currentDensity, field, percent, pressure, pressureDistance, quantity, rate, reducedField } from './quantities.ts';
import type { Terminal } from './terminal.ts';
import { unusedStudies } from './unused.ts';

export interface CheckAnswer {
  readonly loaded: LoadedCase;
  readonly path: string;
  /** at which theory was evaluated [V], with its sign */
  readonly voltage: number;
  readonly theory: Theory;
  readonly prospects: Prospects;
  /** null where electrons follow the local field */
  readonly kinetics: Kinetics | null;
  /** the breakdown curve by particles, if it was asked for */
  readonly curve: readonly CurvePoint[] | null;
  readonly cautions: readonly Caution[];
}

type Row = readonly [label: string, value: string];

const LABELS = 28;

/** What `check` prints for people. */
export function checkText(answer: CheckAnswer, terminal: Terminal): string {
  const { loaded, path, voltage } = answer;
  const { style, width } = terminal;
  const settings = loaded.case;
  const section = (title: string, rows: readonly Row[]): string[] => [
    '',
    style.strong(title),
    ...columns(
      rows.map(([label, value]) => [`  ${label}`, value]),
      [LABELS],
      width,
    ),
  ];
  const lines = [
    ...wrap(printable(settings.title), width).map(style.strong),
    ...wrap(`${printable(path)}, case ${settings.sha256.slice(0, 12)}; read by gapwake ${VERSION}, not simulated.`, width).map(style.faint),
    ...section('The case', caseRows(loaded)),
    ...[...remarks(loaded), ...unusedStudies(loaded)].flatMap((note) => wrap(note, width, '  ', '  ').map(style.faint)),
    ...section(theoryTitle(voltage), theoryRows(answer)),
    ...(answer.kinetics === null ? [] : section('Electrons as particles', kineticRows(answer.kinetics))),
    ...(answer.curve === null ? [] : ['', style.strong('Breakdown curve'), ...curveLines(answer.curve, width)]),
    '',
    style.strong('Where the numbers come from'),
    ...sourceLines(settings, voltage, width),
  ];
  const cautions = cautionLines(answer.cautions, terminal);
  if (cautions.length > 0) lines.push('', style.strong('Cautions'), ...cautions);
  return `${[...lines, '', ...lastLines(terminal)].join('\n')}\n`;
}

/** Every value of the case, defaults marked. */
export function caseRows({ case: settings, defaults }: LoadedCase): Row[] {
  const { gap, gas, electrodes, seed, supply, observe, numerics } = settings;
  const used = new Set(defaults.map(({ path }) => path));
  const rows: Row[] = [];
  const row = (label: string, path: string, value: string): void => {
    rows.push([label, used.has(path) ? `${value}  (default)` : value]);
  };
  row('gap', 'gap.geometry', `planar, ${quantity(gap.spacing, 'm')} wide, ${quantity(gap.area, 'm^2')}`);
  row('longest path', 'gap.longest_path', quantity(gap.longestPath, 'm'));
  row('gas', 'gas.name', gas.name === null ? "the case's own coefficients" : gas.mixture ? `mixture: ${gas.name}` : gas.name);
  if (gas.dataSet !== undefined) row('set of data', 'gas.data', gas.dataSet);
  row('pressure', 'gas.pressure', pressure(gas.pressure));
  row('temperature', 'gas.temperature', `${quantity(gas.temperature, 'K', 5)} (${quantity(gas.temperature - 273.15, '°C')})`);
  row('density', 'gas.density', `${quantity(gas.density, '1/m^3')}, computed`);
  row('left electrode', 'electrodes.left', surface(electrodes.left));
  row('right electrode', 'electrodes.right', used.has('electrodes.right') ? 'same as left' : surface(electrodes.right));
  row('cathode current (seed)', 'seed.cathode_current', quantity(seed.cathodeCurrent, 'A'));
  row('starting electrons', 'seed.electrons', quantity(seed.electrons, ''));
  rows.push(...programmeRows(settings, used));
  row('series resistance', 'supply.series_resistance', quantity(supply.seriesResistance, 'ohm'));
  row('parallel capacitance', 'supply.parallel_capacitance', quantity(supply.parallelCapacitance, 'F'));
  row('capacitance of the gap', '', `${quantity((VACUUM_PERMITTIVITY * gap.area) / gap.spacing, 'F')}, computed`);
  row('current limit', 'supply.current_limit', supply.currentLimit === null ? 'none' : quantity(supply.currentLimit, 'A'));
  row(
    'trip',
    'supply.trip',
    supply.trip === null ? 'none' : `${quantity(supply.trip.current, 'A')}, acts after ${quantity(supply.trip.delay, 's')}`,
  );
  if (supply.trip) {
    const senses = { gap: 'the current through the gap', supply: 'the current of the supply, charging included' };
    const action = { open: 'disconnects the gap', zero: 'drives the supply to 0 V' };
    row('trip senses', 'supply.trip.senses', senses[supply.trip.senses]);
    row('trip action', 'supply.trip.action', action[supply.trip.action]);
  }
  row('gap voltage at t = 0', 'supply.initial_gap_voltage', quantity(supply.initialGapVoltage, 'V'));
  row('electrons', 'electrons.closure', settings.electrons === undefined ? 'local-field' : 'kinetic: followed as particles');
  if (settings.electrons !== undefined) {
    row('emission energy', 'electrons.emission_energy', quantity(settings.electrons.emissionEnergy, 'eV'));
    row('particles', 'electrons.particles', `${settings.electrons.particles} for one answer at most`);
    row('seed of random numbers', 'electrons.seed', String(settings.electrons.seed));
  }
  row('observed until', 'observe.until', quantity(observe.until, 's'));
  const levels = observe.currents.map((level) => quantity(level, 'A')).join(', ');
  row('current levels', 'observe.currents', levels === '' ? 'none' : levels);
  row('cells', 'numerics.cells', numerics.cells === null ? "the program's choice" : quantity(numerics.cells, ''));
  row('tolerance', 'numerics.tolerance', quantity(numerics.tolerance, ''));
  return rows;
}

function surface({ material, condition, ionYield }: Surface): string {
  const { typical, low, high, law, status } = ionYield;
  const what = [material, condition === undefined ? null : `${condition} surface`].filter((word) => word !== null);
  const ends = `${quantity(low, '')} to ${quantity(high, '')}`;
  const spread = low === high ? '' : ` (${status === 'given' ? 'given' : 'published'}: ${ends})`;
  const value =
    law === undefined
      ? `${quantity(typical, '')}${spread}`
      : `${law.kind === 'ion-energy' ? 'by the energy of the ions at the wall' : 'by the field at the wall'}${low === high ? '' : `, times ${ends}`}`;
  return [...what, `ion yield ${value}`].join(', ');
}

function programmeRows({ supply: { programme } }: Case, used: ReadonlySet<string>): Row[] {
  switch (programme.kind) {
    case 'step': {
      const rise = programme.riseTime === 0 ? 'at once, at t = 0' : `rising over ${quantity(programme.riseTime, 's')}`;
      const mark = used.has('supply.voltage.rise_time') ? '  (default)' : '';
      return [['supply: step to', `${quantity(programme.voltage, 'V')}, ${rise}${mark}`]];
    }
    case 'ramp':
      return [
        ['supply: ramp', `from ${quantity(programme.from, 'V')} to ${quantity(programme.to, 'V')} at ${quantity(programme.rate, 'V')}/s`],
      ];
    case 'table': {
      const { times, voltages } = programme;
      const last = times.length - 1;
      const [low, high] = [voltages.reduce((a, b) => Math.min(a, b)), voltages.reduce((a, b) => Math.max(a, b))];
      const span = `${quantity(times[0], 's')} to ${quantity(times[last], 's')}`;
      return [['supply: table', `${times.length} rows, ${span}, between ${quantity(low, 'V')} and ${quantity(high, 'V')}`]];
    }
  }
}

/** How entries were read, and the defaults that stand in no row. */
export function remarks({ defaults, notes }: LoadedCase): string[] {
  const coefficients = defaults.filter(({ path }) => path.startsWith('gas.coefficients.'));
  return [...coefficients.map(({ path, value }) => `${path}: ${value}  (default)`), ...notes].map(printable);
}

function theoryTitle(voltage: number): string {
  const cathode = voltage < 0 ? 'right' : 'left';
  return `Theory at ${quantity(voltage, 'V')}, without space charge; the cathode is on the ${cathode}`.replaceAll(NO_BREAK, ' ');
}

function theoryRows({ loaded, voltage, theory, prospects }: CheckAnswer): Row[] {
  const settings = loaded.case;
  const { gas, seed } = settings;
  const threshold = theory.static_breakdown_voltage_V;
  const attached = gas.coefficients.attachment === null ? '' : `, less attachment ${quantity(prospects.streamerIntegral, '')}`;
  const rows: Row[] = [
    [
      'breakdown voltage V_s',
      threshold === null
        ? 'none: up to 1e4 Td nothing sustains itself over this path'
        : `${quantity(threshold, 'V')}, known to ${percent(gas.breakdownUncertainty)}; E/N there ${reducedField(prospects.breakdownReducedField)}`,
    ],
  ];
  rows.push(...setRows(settings, voltage), ...yieldRows(settings, voltage));
  if (theory.upper_breakdown_voltage_V !== null)
    rows.push(['upper V_s', `${quantity(theory.upper_breakdown_voltage_V, 'V')}: above it the gap no longer sustains itself`]);
  if (settings.gap.longestPathGiven)
    rows.push(['lowest over all paths', `${quantity(theory.lowest_over_paths_V, 'V')} along ${quantity(prospects.lowestPath, 'm')}`]);
  rows.push(
    ['pressure × spacing', `${pressureDistance(theory.pd_Pa_m)}${sideOfMinimum(theory)}`],
    [
      'Paschen minimum',
      theory.paschen_minimum_V === null
        ? 'none'
        : `${quantity(theory.paschen_minimum_V, 'V')} at ${pressureDistance(theory.paschen_minimum_pd_Pa_m)}`,
    ],
    ['overvoltage', theory.overvoltage === null ? '–' : `${percent(theory.overvoltage, true)} (against V_s)`],
    ['E/N', quantity(theory.reduced_field_Td, 'Td')],
    ['ionisation αd', `${quantity(theory.alpha_d, '')}${attached}; streamers are expected from 18 to 20`],
    ['feedback q', `${quantity(theory.feedback, '')}; from 1 on, a current sustains itself`],
    ['growth rate', rate(theory.growth_rate_per_s)],
  );
  if (theory.steady_amplification !== null) {
    const current = seed.cathodeCurrent > 0 ? `, ${quantity(seed.cathodeCurrent * theory.steady_amplification, 'A')}` : '';
    rows.push(['steady current', `${quantity(theory.steady_amplification, '')} × the seed${current}`]);
  }
  if (prospects.timeToSpaceCharge !== null)
    rows.push(['time to space charge', `${quantity(prospects.timeToSpaceCharge, 's')} after a sudden step, from the seed's current`]);
  rows.push([
    'transit of the gap',
    `electrons ${quantity(prospects.electronTransit, 's')}, positive ions ${quantity(prospects.ionTransit, 's')}`,
  ]);
  if (settings.electrons === undefined && prospects.breakdownProbability > 0) {
    const wait =
      prospects.meanStatisticalLag === null ? '' : `; mean wait for one from the seed ${quantity(prospects.meanStatisticalLag, 's')}`;
    rows.push(['chance of one electron', `${percent(prospects.breakdownProbability)} lead to breakdown${wait}`]);
  }
  if (prospects.lowCurrentSlope !== null)
    rows.push(['just past the threshold', `the gap voltage ${prospects.lowCurrentSlope} with the current`]);
  const fall = prospects.normalCathodeFall;
  if (fall !== null)
    rows.push([
      'normal cathode fall',
      `${quantity(fall.voltage, 'V')} over ${quantity(fall.thickness, 'm')}, ${field(fall.cathodeField)} at the cathode, ${currentDensity(fall.currentDensity)}`,
    ]);
  return rows;
}

function sideOfMinimum({ pd_Pa_m, paschen_minimum_pd_Pa_m }: Theory): string {
  if (paschen_minimum_pd_Pa_m === null) return '';
  return pd_Pa_m < paschen_minimum_pd_Pa_m ? ', left of the minimum' : ', right of the minimum';
}

/** V_s with the other sets of data of the gas, the lowest first; none where there is no choice. */
function setRows(settings: Case, voltage: number): Row[] {
  const sets = gasUsed(settings, voltage)?.sets ?? [];
  // sets of data are of the local field
  if (sets.length < 2 || settings.electrons !== undefined) return [];
  const mixed = settings.gas.mixture !== undefined;
  const known = sets.flatMap((one) => (one.breakdown === null ? [] : [one.breakdown]));
  const text = ({ gas, set, used, breakdown }: SetVoltage): string =>
    `${mixed ? `${gas} ` : ''}${set} ${breakdown === null ? 'none' : quantity(breakdown, 'V')}${used && !mixed ? ' (used)' : ''}`;
  const ends = known.length === 0 ? 'none' : `${quantity(Math.min(...known), 'V')} to ${quantity(Math.max(...known), 'V')}`;
  const order = sets.toSorted((a, b) => (a.breakdown ?? Number.POSITIVE_INFINITY) - (b.breakdown ?? Number.POSITIVE_INFINITY));
  return [['V_s over the data sets', `${ends}: ${order.map(text).join(', ')}`]];
}

/** What the spread of the cathode's yield does to V_s and to the time to space charge; none where the yield is one number. */
function yieldRows(settings: Case, voltage: number): Row[] {
  const spread = yieldConsequences(settings, voltage);
  if (spread === null) return [];
  const { low, typical, high, byLaw, decides, timeAtLow, timeAtHigh } = spread;
  const at = ({ breakdown }: YieldEnd): string => (breakdown === null ? 'none' : quantity(breakdown, 'V'));
  const ends = `${quantity(high.given, '')} to ${quantity(low.given, '')}`;
  const law = typical.atBreakdown === null ? 'its law' : `its law, ${quantity(typical.atBreakdown, '')} at V_s`;
  const rows: Row[] = [['V_s over the yields', `${at(high)} to ${at(low)} (yield ${byLaw ? `${ends} times ${law}` : ends})`]];
  const time = (seconds: number | null): string => (seconds === null ? 'never' : quantity(seconds, 's'));
  if (timeAtHigh !== null) rows.push(['space charge, by yield', `${time(timeAtHigh)} to ${time(timeAtLow)}`]);
  if (decides) rows.push(['the yield decides', `whether the gap holds ${quantity(Math.abs(voltage), 'V')}: they lie between`]);
  return rows;
}

/** Every coefficient and yield: how well it is known, where it holds, who says so. */
function sourceLines(settings: Case, voltage: number, width: number): string[] {
  const lines: string[] = [];
  const used = gasUsed(settings, voltage);
  if (used !== null) lines.push(...wrap(`Set ${used.set}: ${used.reason}`, width, '  ', '    '));
  const entry = (label: string, provenance: Provenance, holds: string): void => {
    const uncertainty = provenance.uncertainty === null ? 'uncertainty not stated' : `± ${percent(provenance.uncertainty)}`;
    lines.push(...wrap(`${label}: ${provenance.status}, ${uncertainty}${holds}`, width, '  ', '    '));
    if (provenance.status !== 'given') lines.push(...wrap(printable(provenance.source), width, '      '));
  };
  for (const { label, coefficient } of coefficientsOf(settings)) entry(label, coefficient, rangeText(coefficient));
  const { left, right } = settings.electrodes;
  const same = JSON.stringify(left) === JSON.stringify(right);
  entry(same ? 'ion yield of both electrodes' : 'ion yield, left', left.ionYield, '');
  if (!same) entry('ion yield, right', right.ionYield, '');
  if (lines.some((line) => line.includes('from memory (')))
    lines.push(...wrap('From memory: nobody here has read the text; confidence H high, M medium, L low.', width, '  '));
  for (const note of notesOf(settings.gas)) lines.push(...wrap(note, width, '  - ', '    '));
  return lines;
}

function rangeText({ range }: Coefficient): string {
  if (range === null) return '';
  const [from, to] = [range.from / TOWNSEND, range.to / TOWNSEND];
  return to > 1e12 ? `, from ${quantity(from, 'Td')}` : `, ${quantity(from, '')} to ${quantity(to, 'Td')}`;
}
