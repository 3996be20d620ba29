import type { CrossSectionSet } from '../kinetics/cross-sections.ts';
import type { SwarmResult } from '../scan/swarm-session.ts';
import { TOWNSEND } from '../units/constants.ts';

export interface SwarmCaution {
  readonly code: string;
  readonly text: string;
}

/** more than this share of electrons above the energies of the set is worth saying */
const ABOVE = 1e-3;
/** electrons of more than this mean energy are too fast for the non-relativistic engine in their tail [eV] */
const FAST = 2000;

/** What a reader of the values should know. */
export function swarmCautions(set: CrossSectionSet, fields: readonly number[], results: readonly SwarmResult[]): SwarmCaution[] {
  const cautions: SwarmCaution[] = [];
  const at = (chosen: (result: SwarmResult) => boolean): string =>
    results.flatMap((result, i) => (chosen(result) ? [`${Number(((fields[i] ?? 0) / TOWNSEND).toPrecision(4))}`] : [])).join(', ');
  const say = (code: string, chosen: (result: SwarmResult) => boolean, text: (fields: string) => string): void => {
    const where = at(chosen);
    if (where !== '') cautions.push({ code, text: text(where) });
  };
  if (set.status === 'from memory (L)')
    cautions.push({
      code: 'rough-cross-sections',
      text: `The cross-sections of ${set.title.toLowerCase()} are recollected, not read: values to some 20 %.`,
    });
  say(
    'runaway',
    ({ kind }) => kind === 'runaway',
    (where) => `At ${where} Td electrons gain more than they lose: there is no steady state, and no value.`,
  );
  say(
    'too-slow',
    ({ kind }) => kind === 'too-slow',
    (where) => `At ${where} Td electrons did not settle, or were all attached, within what a point may take: no value.`,
  );
  say(
    'outside-range',
    (result) => result.kind === 'point' && result.point.aboveRange > ABOVE,
    (where) =>
      `At ${where} Td more than 0.1 % of the electrons have energies above ${set.range.to} eV, where the cross-sections are continued and not known.`,
  );
  say(
    'fast-electrons',
    (result) => result.kind === 'point' && result.point.meanEnergy.value > FAST,
    (where) => `At ${where} Td electrons are so fast that relativity would count; it is not included.`,
  );
  say(
    'accuracy',
    (result) => result.kind === 'point' && !result.accurate,
    (where) => `At ${where} Td the accuracy asked for was not reached within what a point may take; the errors say how far it came.`,
  );
  return cautions;
}
