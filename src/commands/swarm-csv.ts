import { closeSync, openSync, readSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { basename, dirname } from 'node:path';
import type { CrossSectionSet, ProcessKind } from '../kinetics/cross-sections.ts';
import type { SwarmPoint } from '../kinetics/swarm.ts';
import { ResultFileError, resultFileError } from '../results/errors.ts';
import type { SwarmRequest, SwarmResult } from '../scan/swarm-session.ts';
import { TOWNSEND } from '../units/constants.ts';
import { printable } from '../units/printable.ts';
import { VERSION } from '../version.ts';

/** Swarms as a table that `gas.coefficients` of a case takes: rows in rising order of the field, coefficients first, then their errors and the rest. */

const COLUMNS: readonly (readonly [header: string, value: (point: SwarmPoint) => number])[] = [
  ['EN [Td]', ({ reducedField }) => reducedField / TOWNSEND],
  ['ionisation [m^2]', ({ ionisation }) => ionisation.value],
  ['attachment [m^2]', ({ attachment }) => attachment.value],
  ['electron_mobility [1/(m V s)]', mobility],
  ['electron_energy [V]', (point) => point.longitudinalDiffusion.value / mobility(point)],
  ['ionisation_error [m^2]', ({ ionisation }) => ionisation.error],
  ['attachment_error [m^2]', ({ attachment }) => attachment.error],
  ['electron_mobility_error [1/(m V s)]', ({ fluxDrift, reducedField }) => fluxDrift.error / reducedField],
  [
    'electron_energy_error [V]',
    (point) =>
      (point.longitudinalDiffusion.value / mobility(point)) *
      Math.hypot(point.longitudinalDiffusion.error / point.longitudinalDiffusion.value, point.fluxDrift.error / point.fluxDrift.value),
  ],
  ['mean_energy [eV]', ({ meanEnergy }) => meanEnergy.value],
  ['bulk_drift [m/s]', ({ bulkDrift }) => bulkDrift.value],
];

/** how every such table begins */
const FIRST_WORDS = 'gapwake swarm';

const HEADER: string = COLUMNS.map(([header]) => header).join(',');

/** μN [1/(m V s)] by the flux drift velocity */
function mobility({ fluxDrift, reducedField }: SwarmPoint): number {
  return fluxDrift.value / reducedField;
}

/** Points without a value are left out, and the second of two at one field. */
export function swarmCsv(set: CrossSectionSet, { setup, accuracy }: SwarmRequest, results: readonly SwarmResult[], path: string): string {
  const points = results.flatMap((result) => (result.kind === 'point' ? [result.point] : []));
  points.sort((a, b) => a.reducedField - b.reducedField);
  const rows = points
    .filter((point, i) => i === 0 || point.reducedField > points[i - 1].reducedField)
    .map((point) => COLUMNS.map(([, value]) => String(Number(value(point).toPrecision(7)))).join(','));
  const comments = [
    `${FIRST_WORDS} ${VERSION}: electrons in ${set.title}, ${set.source} (${set.status})`,
    `${setup.temperature} K, scattering ${setup.angular}, seed ${setup.seed}, accuracy ${accuracy}; errors are standard errors of the simulation`,
    'electron_energy is D/μ along the field. In a case, under gas.coefficients:',
    ...caseEntries(path, set),
  ];
  return `${[...comments.map((comment) => `# ${printable(comment)}`), HEADER, ...rows].join('\n')}\n`;
}

/** What a case says under `gas.coefficients` to use the table. */
export function caseEntries(path: string, { processes }: CrossSectionSet): string[] {
  const file = JSON.stringify(basename(path));
  const has = (kind: ProcessKind): boolean => processes.some((process) => process.kind === kind);
  return [
    ...(has('ionisation') ? ['ionisation'] : []),
    ...(has('attachment') ? ['attachment'] : []),
    'electron_mobility',
    'electron_energy',
  ].map((key) => `${key}: { table: { file: ${file}, reduced_field: EN, coefficient: ${key} } }`);
}

/** Whether a table may be written at `path`: nothing is there, or an older such table. Asked before anything is computed.
 *  @throws ResultFileError */
export function checkSwarmCsvTarget(path: string): void {
  try {
    const status = statSync(path, { throwIfNoEntry: false });
    if (status === undefined) {
      if (statSync(dirname(path), { throwIfNoEntry: false })?.isDirectory()) return;
      throw new ResultFileError('missing', path, `cannot be written: there is no folder ${dirname(path)}`);
    }
    if (!status.isFile()) throw new ResultFileError('not-a-file', path, 'is not a regular file');
    const begins = `# ${FIRST_WORDS}`;
    const head = Buffer.alloc(begins.length);
    const file = openSync(path, 'r');
    try {
      readSync(file, head, 0, head.length, 0);
    } finally {
      closeSync(file);
    }
    if (status.size > 0 && head.toString() !== begins)
      throw new ResultFileError('foreign', path, 'exists and is not a table of a gapwake swarm; it is not replaced');
  } catch (thrown) {
    throw resultFileError(path, thrown);
  }
}

/** @throws ResultFileError */
export function writeSwarmCsv(set: CrossSectionSet, request: SwarmRequest, results: readonly SwarmResult[], path: string): void {
  checkSwarmCsvTarget(path);
  const part = `${path}.part`;
  try {
    writeFileSync(part, swarmCsv(set, request, results, path));
    renameSync(part, path);
  } catch (thrown) {
    rmSync(part, { force: true });
    throw resultFileError(path, thrown);
  }
}
