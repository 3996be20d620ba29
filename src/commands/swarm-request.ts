import { basename } from 'node:path';
import type { CrossSectionSet } from '../kinetics/cross-sections.ts';
import type { Angular } from '../kinetics/scattering.ts';
import { crossSectionSets } from '../kinetics/sets.ts';
import { setOfUser } from '../kinetics/user-set.ts';
import type { SwarmSetup } from '../scan/swarm-job.ts';
import type { SwarmRequest } from '../scan/swarm-session.ts';
import { ELEMENTARY_CHARGE, TOWNSEND } from '../units/constants.ts';
import { clip, type DimensionName, nearestSpelling, parseQuantity } from '../units/index.ts';
import { printable } from '../units/printable.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { readText } from './read-text.ts';
import { readSet } from './swarm-file.ts';

export interface SwarmOptions {
  readonly at?: string;
  readonly from?: string;
  readonly to?: string;
  readonly points?: number;
  readonly crossSections?: string;
  readonly mass?: string;
  readonly ejectedWidth?: string;
  readonly scattering?: Angular;
  readonly temperature?: string;
  readonly accuracy?: string;
  readonly seed?: number;
  readonly workers?: number;
  readonly csv?: string;
  readonly json?: boolean;
  readonly quiet?: boolean;
}

/** What `swarm` is asked to do, read and checked. */
export interface SwarmWish {
  readonly set: CrossSectionSet;
  readonly request: SwarmRequest;
}

const MAX_BYTES = 64e6;
const MOST_FIELDS = 200;
/** gas temperature unless it is said: that of the tables of gases [K] */
const TEMPERATURE = 293.15;
const ACCURACY = 0.005;
const FIELD_LIMITS = { from: 1e-3 * TOWNSEND, to: 1e5 * TOWNSEND } as const;

/** @throws Failure for whatever is wrong (2) or cannot be read (4) */
export function wishOf(gas: string | undefined, options: SwarmOptions): SwarmWish {
  const source = gasOf(gas, options);
  const set = 'own' in source ? setOfUser(source.own) : crossSectionSets[source.builtIn];
  const temperature =
    options.temperature === undefined
      ? (set.temperature ?? TEMPERATURE)
      : within(options.temperature, '--temperature', 'temperature', 0, 1e5);
  const accuracy = options.accuracy === undefined ? ACCURACY : within(options.accuracy, '--accuracy', 'number', 1e-4, 0.1);
  const setup: SwarmSetup = { gas: source, temperature, angular: options.scattering ?? 'isotropic', seed: options.seed ?? 1 };
  return {
    set,
    request: {
      setup,
      fields: fieldsOf(options),
      accuracy,
      ...(options.workers === undefined ? {} : { workers: options.workers }),
    },
  };
}

function gasOf(gas: string | undefined, options: SwarmOptions): SwarmSetup['gas'] {
  const { crossSections, mass, ejectedWidth } = options;
  if (crossSections === undefined) {
    if (gas === undefined) throw refusal('a gas, or --cross-sections FILE.csv --mass "4 u"', 'neither');
    for (const [name, value] of [
      ['--mass', mass],
      ['--ejected-width', ejectedWidth],
    ] as const)
      if (value !== undefined) throw refusal(`${name} only beside --cross-sections`, `${name} with a built-in gas`);
    if (Object.hasOwn(crossSectionSets, gas)) return { builtIn: gas };
    const known = Object.keys(crossSectionSets);
    throw refusal(
      `a gas with built-in cross-sections (${known.join(', ')}), or --cross-sections`,
      clip(gas),
      nearestSpelling(gas, known),
      'unknown-gas',
    );
  }
  if (gas !== undefined) throw refusal('either a gas or --cross-sections', 'both');
  if (mass === undefined) throw refusal('the mass of a molecule, as in --mass "4 u"', '--cross-sections without --mass');
  return {
    own: {
      title: basename(crossSections),
      mass: within(mass, '--mass', 'mass', 1.6e-27, 1e-23),
      ejectedWidth: ejectedWidth === undefined ? null : within(ejectedWidth, '--ejected-width', 'energy', 1e-20, 1e-15) / ELEMENTARY_CHARGE,
      processes: processesOf(crossSections),
    },
  };
}

function processesOf(path: string): Extract<ReturnType<typeof readSet>, { ok: true }>['processes'] {
  const read = readText(path, MAX_BYTES);
  if (!read.ok) {
    const wrongContent = read.reason === 'not UTF-8' || read.reason.includes('MB');
    throw new Failure(
      wrongContent ? EXIT.wrongInput : EXIT.file,
      [`${printable(path)}: cannot be read as cross-sections: ${read.reason}`],
      [problemWithoutPlace('unreadable', path, 'a CSV file (UTF-8, at most 64 MB)', read.reason)],
    );
  }
  const set = readSet(read.text);
  if (set.ok) return set.processes;
  const problems = set.problems.map(({ line, column, expected, found, nearest }) => ({
    ...problemWithoutPlace('table', path, expected, found, nearest),
    line,
    column,
  }));
  const lines = problems.map(({ line, column, expected, found, nearest }) => {
    const place = [path, line, column].filter((part) => part !== null).join(':');
    const meant = nearest === null ? '' : ` (did you mean ${printable(nearest)}?)`;
    return `${printable(place)}: expected ${printable(expected)}, found ${printable(found)}${meant}`;
  });
  const count = lines.length === 1 ? 'One problem' : `${lines.length} problems`;
  throw new Failure(EXIT.wrongInput, [...lines, `${count}; nothing was computed or written.`], problems);
}

/** [V m²] */
function fieldsOf({ at, from, to, points }: SwarmOptions): number[] {
  if (at !== undefined) {
    if (from !== undefined || to !== undefined || points !== undefined) throw refusal('either --at or --from, --to, --points', 'both');
    const fields = at.split(',').map((text) => field(text, '--at'));
    if (fields.length > MOST_FIELDS) throw refusal(`at most ${MOST_FIELDS} fields`, `${fields.length}`);
    return fields;
  }
  if (from === undefined || to === undefined)
    throw refusal('reduced fields: --at "10 Td, 100 Td", or --from and --to', from ?? to ?? 'none');
  const [first, last, count] = [field(from, '--from'), field(to, '--to'), points ?? 10];
  if (first === last) throw refusal('ends that differ', `--from and --to both ${clip(from)}`);
  return Array.from({ length: count }, (_, i) => (i === 0 ? first : i === count - 1 ? last : first * (last / first) ** (i / (count - 1))));
}

function field(text: string, option: string): number {
  const value = within(text, option, 'reducedField', FIELD_LIMITS.from, FIELD_LIMITS.to);
  return value;
}

function within(text: string, option: string, dimension: DimensionName, from: number, to: number): number {
  const read = parseQuantity(text, dimension);
  if (!read.ok) throw refusal(`${option}: ${read.expected}`, read.found, read.nearest);
  if (!(read.value >= from && read.value <= to)) throw refusal(`${option}: ${LIMITS[dimension] ?? 'a possible value'}`, clip(text.trim()));
  return read.value;
}

const LIMITS: Partial<Record<DimensionName, string>> = {
  reducedField: 'a reduced field from 0.001 to 1e5 Td',
  temperature: 'a temperature from 0 to 1e5 K',
  number: 'a relative error from 0.01 % to 10 %',
  mass: 'a mass from 1 u to 6000 u',
  energy: 'an energy from 0.1 eV to 6 keV',
};

function refusal(expected: string, found: string, nearest: string | null = null, code = 'usage'): Failure {
  const meant = nearest === null ? '' : ` (did you mean ${printable(nearest)}?)`;
  return new Failure(
    EXIT.wrongInput,
    [`gapwake: swarm: expected ${printable(expected)}, found ${printable(found)}${meant}`, 'gapwake swarm --help shows what it takes.'],
    [problemWithoutPlace(code, 'arguments', expected, found, nearest)],
  );
}
