import { TABLE_TEMPERATURE } from '../gases/conversions.ts';
import { curveOf } from '../gases/curves.ts';
import type { Coefficient, GasCoefficients, GasData, Provenance } from '../gases/gas.ts';
import { dataSets, gasData, gases } from '../gases/index.ts';
import { cleanYieldFor, surfaces, yieldLawFor } from '../surfaces/index.ts';
import { yieldCurve } from '../surfaces/yield-law.ts';
import { BOLTZMANN, TOWNSEND } from '../units/constants.ts';
import { VERSION } from '../version.ts';
import { type NamedCoefficient, namedCoefficients } from './coefficients.ts';
import { COMMON_CATHODE, grouped, isOutside, minimumOf, yieldRow } from './gas-facts.ts';
import { formulaOf, number } from './gas-formula.ts';
import { columns, lengthOf, NO_BREAK, wrap } from './layout.ts';
import { percent, pressureDistance, quantity, reducedField } from './quantities.ts';
import type { Terminal } from './terminal.ts';

/** What is said once on a page that quotes something nobody has read. */
export const FROM_MEMORY = 'From memory: nobody here has read the text; confidence H high, M medium, L low.';

/** The page of a gas: every coefficient of the set chosen and what the others replace, each with its source, and the yields of cathodes in it. */
export function gasText(gas: GasData, terminal: Terminal): string {
  const { width, style } = terminal;
  const lines = [
    ...opening(gas, terminal),
    ...minimumLines(gas, width),
    ...wrap(`Detachment from negative ions: ${gas.detachment ?? 'none, as no negative ions form'}`, width),
    '',
    style.strong(`Coefficients, data ${gas.set}; x is E/N in Td`),
    ...namedCoefficients(gas.coefficients).flatMap((entry) => coefficientLines(entry, width, style.strong)),
  ];
  for (const name of dataSets(gas.name)) {
    if (name === gas.set) continue;
    const other = gasData(gas.name, name);
    if (other === null) continue;
    lines.push('', style.strong(`Data ${name}${isDefault(other) ? ' (default)' : ''}`), ...wrap(other.reason, width, '  '));
    for (const entry of namedCoefficients(difference(other.coefficients, gas.coefficients)))
      lines.push(...coefficientLines(entry, width, style.strong));
  }
  lines.push('', style.strong('Ion yields: electrons that leave for good, per ion'), ...yieldLines(gas.name, width));
  lines.push('', style.strong('Notes'), ...gas.notes.flatMap((note) => wrap(note, width, '  - ', '    ')));
  if (lines.some((line) => line.includes('from memory ('))) lines.push('', ...wrap(FROM_MEMORY, width));
  return `${lines.join('\n')}\n`;
}

/** Values of everything at some fields [V m²]. */
export function valuesText(gas: GasData, fields: readonly number[], terminal: Terminal): string {
  const { width, style } = terminal;
  const named = namedCoefficients(gas.coefficients);
  const row = (label: string, value: (x: number) => string): string[] => [`  ${label}`, ...fields.map(value)];
  const curveRow = (label: string, coefficient: Coefficient): string[] => {
    const curve = curveOf(coefficient.form);
    return row(label, (x) => `${number(curve.valueAt(x))}${isOutside(coefficient, x) ? '*' : ''}`);
  };
  const speed = (label: string, coefficient: Coefficient | null): string[][] => {
    if (coefficient === null) return [];
    const curve = curveOf(coefficient.form);
    return [row(label, (x) => `${number(curve.valueAt(x) * x)}${isOutside(coefficient, x) ? '*' : ''}`)];
  };
  const { electronMobility, ionMobility, negativeIonMobility } = gas.coefficients;
  const rows = [
    ...named.map(({ label, unit, coefficient }) => curveRow(`${label} [${unit}]`, coefficient)),
    ...speed('drift of electrons [m/s]', electronMobility),
    ...speed('drift of ions [m/s]', ionMobility),
    ...speed('drift of negative ions [m/s]', negativeIonMobility),
    ...dataSets(gas.name).flatMap((name) => {
      const ionisation = name === gas.set ? undefined : gasData(gas.name, name)?.coefficients.ionisation;
      return ionisation === undefined ? [] : [curveRow(`α/N, data ${name} [m^2]`, ionisation)];
    }),
    ...(['clean', 'technical'] as const).flatMap((state) => {
      const data = yieldLawFor(COMMON_CATHODE, gas.name, state);
      if (data === null) return [];
      const curve = yieldCurve(data.law);
      return [row(`yield law, ${state} metal`, (x) => number(curve.valueAt(x)))];
    }),
  ];
  const lines = [...opening(gas, terminal)];
  const label = Math.min(Math.max(...rows.map(([text]) => lengthOf(text))) + 2, width - 12);
  const perBlock = Math.max(1, Math.floor((width - label) / 12));
  for (let first = 0; first < fields.length; first += perBlock) {
    const here = fields.slice(first, first + perBlock);
    const head = ['', ...here.map((x) => `${number(x / TOWNSEND)}${NO_BREAK}Td`)];
    const body = rows.map(([text, ...values]) => [text, ...values.slice(first, first + perBlock)]);
    const [top, ...below] = columns([head, ...body], [label, ...here.slice(1).map(() => 12)], width);
    lines.push('', style.strong(top), ...below);
  }
  if (lines.some((line) => line.includes('*'))) lines.push('', ...wrap('* outside the range of the source, extrapolated', width));
  return `${lines.join('\n')}\n`;
}

const isDefault = (gas: GasData): boolean => gas.set === gases[gas.name].set;

function opening(gas: GasData, { width, style }: Terminal): string[] {
  const others = dataSets(gas.name).filter((name) => name !== gas.set);
  const choice = others.length === 0 ? 'the only data' : `${isDefault(gas) ? 'the default' : 'chosen'}; others: ${others.join(', ')}`;
  return [
    style.strong(gas.title),
    ...wrap(`Data ${gas.set}, ${choice}. gapwake ${VERSION}.`, width),
    ...wrap(`Why ${isDefault(gas) ? 'the default' : 'these'}: ${gas.reason}`, width),
  ];
}

function minimumLines(gas: GasData, width: number): string[] {
  const { typical, low, high } = yieldRow(COMMON_CATHODE, gas.name);
  const [at, least, most] = [typical, high, low].map((ionYield) => minimumOf(gas, ionYield));
  const uncertainty = `uncertain by ${percent(gas.breakdownUncertainty)} at a known yield`;
  if (at === null) return wrap(`Breakdown minimum: none with a yield of ${typical}; V_s ${uncertainty}.`, width);
  const spread =
    least === null || most === null ? '' : `; ${quantity(least.voltage, 'V')} to ${quantity(most.voltage, 'V')} for ${high} to ${low}`;
  const place = `${pressureDistance(at.column * BOLTZMANN * TABLE_TEMPERATURE)} (20${NO_BREAK}°C), ${reducedField(at.reducedField)}`;
  return wrap(
    `Breakdown minimum, closed form: ${quantity(at.voltage, 'V')} at ${place}, with the yield ${typical} of an unspecified metal${spread}. Breakdown voltage ${uncertainty}.`,
    width,
  );
}

/** what the first set has that the second has not */
function difference(a: GasCoefficients, b: GasCoefficients): Partial<GasCoefficients> {
  return Object.fromEntries(Object.entries(a).filter(([key, value]) => value !== null && b[key as keyof GasCoefficients] !== value));
}

function coefficientLines({ label, unit, coefficient }: NamedCoefficient, width: number, strong: (text: string) => string): string[] {
  const { range, referenceTemperature, note } = coefficient;
  const bound = (x: number): string => number(x / TOWNSEND);
  const holds =
    range === null
      ? 'no range stated'
      : range.to / TOWNSEND > 1e12
        ? `from ${bound(range.from)}${NO_BREAK}Td`
        : `${bound(range.from)} to ${bound(range.to)}${NO_BREAK}Td`;
  const temperature =
    referenceTemperature === null || referenceTemperature === undefined
      ? 'no reference temperature'
      : `reference temperature ${referenceTemperature}${NO_BREAK}K`;
  return [
    ...wrap(`${label} [${unit}]`, width, '  ').map(strong),
    ...wrap(formulaOf(coefficient.form), width, '      ', '        '),
    ...wrap(`${holds}; ${standing(coefficient)}; ${temperature}`, width, '      ', '        '),
    ...wrap(coefficient.source, width, '      ', '        '),
    ...(note === undefined ? [] : wrap(note, width, '      ', '        ')),
  ];
}

/** how well something is known */
export function standing({ status, uncertainty }: Provenance): string {
  return `${status}, ${uncertainty === null ? 'uncertainty not stated' : `±${NO_BREAK}${percent(uncertainty)}`}`;
}

function yieldLines(gas: string, width: number): string[] {
  const materials = Object.values(surfaces);
  const rows = materials.map(({ name, workFunction }) => {
    const { typical, low, high } = yieldRow(name, gas);
    const clean = cleanYieldFor(name, gas);
    return [
      `  ${name}`,
      String(typical),
      `${low} to ${high}`,
      clean === null ? '–' : String(Number(clean.typical.toPrecision(2))),
      workFunction === null ? '–' : `${workFunction.value}${NO_BREAK}eV`,
    ];
  });
  const lines = columns([['  material', 'typical', 'low to high', 'atomically clean', 'work function'], ...rows], [19, 10, 17, 18], width);
  for (const { names, value } of grouped(materials.map(({ name }) => [name, yieldRow(name, gas)] as const))) {
    lines.push(...wrap(`${names.join(', ')}: ${value.status}. ${value.source}.`, width, '  ', '    '));
    if (value.note !== undefined) lines.push(...wrap(value.note, width, '    '));
  }
  const clean = materials.flatMap(({ name }) => {
    const found = cleanYieldFor(name, gas);
    return found === null ? [] : [[found.status === 'computed' ? `the others as ${name}` : name, found] as const];
  });
  const computed = clean.find(([, { status }]) => status === 'computed');
  for (const [name, value] of clean)
    if (value.status !== 'computed' || value === computed?.[1])
      lines.push(...wrap(`clean, ${name}: ${standing(value)}. ${value.source}.`, width, '  ', '    '));
  for (const state of ['clean', 'technical'] as const) {
    const law = yieldLawFor(COMMON_CATHODE, gas, state);
    if (law === null) continue;
    const range = law.range === null ? '' : `, ${law.range.from} to ${number(law.range.to)}${NO_BREAK}eV`;
    lines.push(
      ...wrap(
        `law of the ion energy, ${state} metal: ${standing(law)}${range}. ${law.source}.${law.note === undefined ? '' : ` ${law.note}`}`,
        width,
        '  ',
        '    ',
      ),
    );
  }
  return lines;
}
