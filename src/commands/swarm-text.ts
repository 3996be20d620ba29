import type { CrossSectionSet } from '../kinetics/cross-sections.ts';
import type { Measured } from '../kinetics/statistics.ts';
import type { SwarmPoint } from '../kinetics/swarm.ts';
import type { SwarmRequest, SwarmResult } from '../scan/swarm-session.ts';
import { TOWNSEND } from '../units/constants.ts';
import { printable } from '../units/printable.ts';
import { lengthOf, wrap } from './layout.ts';
import type { SwarmCaution } from './swarm-cautions.ts';
import { caseEntries } from './swarm-csv.ts';
import type { Terminal } from './terminal.ts';

type Column = readonly [title: string, unit: string, value: (point: SwarmPoint) => Measured];

/** What `swarm` prints for people: two tables, each value with its standard error, and what to know about them. */
export function swarmText(
  set: CrossSectionSet,
  { setup, fields }: SwarmRequest,
  results: readonly SwarmResult[],
  cautions: readonly SwarmCaution[],
  csv: string | null,
  terminal: Terminal,
): string {
  const { style, width } = terminal;
  const temperature = setup.temperature === 0 ? 'at rest' : `at ${Number(setup.temperature.toPrecision(5))} K`;
  const lines = [
    ...wrap(`Electrons in ${printable(set.title)}, molecules ${temperature}, scattering ${setup.angular}, seed ${setup.seed}.`, width).map(
      style.strong,
    ),
    ...wrap(`${set.source} (${set.status}).`, width).map(style.faint),
    '',
  ];
  const makes = set.processes.some(({ kind }) => kind === 'ionisation');
  const attaches = set.processes.some(({ kind }) => kind === 'attachment');
  const ionisation: readonly Column[] = makes
    ? [
        ['ionisation', 'm^3/s', ({ ionisationRate }) => ionisationRate],
        ['alpha/N', 'm^2', ({ ionisation }) => ionisation],
      ]
    : [];
  const attachment: readonly Column[] = attaches
    ? [
        ['attachment', 'm^3/s', ({ attachmentRate }) => attachmentRate],
        ['eta/N', 'm^2', ({ attachment }) => attachment],
      ]
    : [];
  const tables: readonly (readonly Column[])[] = [
    [
      ['mean energy', 'eV', ({ meanEnergy }) => meanEnergy],
      ['drift, flux', 'm/s', ({ fluxDrift }) => fluxDrift],
      ['drift, bulk', 'm/s', ({ bulkDrift }) => bulkDrift],
    ],
    [
      ['N D across', '1/(m s)', ({ transverseDiffusion }) => transverseDiffusion],
      ['N D along', '1/(m s)', ({ longitudinalDiffusion }) => longitudinalDiffusion],
      ...ionisation.slice(1),
    ],
    [...ionisation.slice(0, 1), ...attachment],
  ];
  for (const [k, columns] of tables.entries()) {
    if (columns.length === 0) continue;
    if (k > 0) lines.push('');
    lines.push(...tableOf(columns, fields, results).map((line, i) => (i < 2 ? style.faint(line) : line)));
  }
  lines.push(
    '',
    ...wrap(
      'Errors are standard errors of the simulation alone. Flux: mean velocity of the electrons, for a fluid model; bulk: velocity of their centre, as ' +
        'times of flight measure it; N D: bulk. alpha and eta: of a steady stream.',
      width,
    ),
  );
  for (const note of set.notes) lines.push(...wrap(note, width));
  if (cautions.length > 0) {
    lines.push('', style.strong('Cautions'));
    for (const { text } of cautions) lines.push(...wrap(text, width, '  ').map(style.doubt));
  }
  if (csv !== null) {
    lines.push('', ...wrap(`Table: ${printable(csv)}. In a case beside it:`, width), 'gas.coefficients:');
    for (const entry of caseEntries(csv, set)) lines.push(...wrap(printable(entry.trim()), width, '  ', '      '));
  }
  return `${lines.join('\n')}\n`;
}

function tableOf(columns: readonly Column[], fields: readonly number[], results: readonly SwarmResult[]): string[] {
  const rows = [
    ['E/N', ...columns.map(([title]) => title)],
    ['Td', ...columns.map(([, unit]) => unit)],
    ...results.map((result, i) => [
      `${Number(((fields[i] ?? 0) / TOWNSEND).toPrecision(4))}`,
      ...columns.map(([, , value]) => (result.kind === 'point' ? measured(value(result.point)) : '–')),
    ]),
  ];
  const widths = [11, 22, 22, 22];
  return rows.map((row) =>
    row
      .map((cell, i) => cell + ' '.repeat(Math.max(1, widths[i] - lengthOf(cell))))
      .join('')
      .trimEnd(),
  );
}

/** `7.857e4 ± 0.3 %`; a value that is 0 for want of events says nothing of its error. */
function measured(of: Measured): string {
  if (of.value === 0) return '0';
  const size = Math.abs(of.value);
  const value = size >= 1e-3 && size < 1e4 ? of.value.toPrecision(4) : of.value.toExponential(3).replace('e+', 'e');
  return `${value} ± ${Number(((100 * of.error) / size).toPrecision(2))} %`;
}
