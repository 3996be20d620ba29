import type { Case } from '../../case.ts';
import type { Prospects, Theory } from '../../theory/predict.ts';
import type { Caution, CautionCode } from '../outcome.ts';
import { ofCathode } from './cathode.ts';
import { defaultsCaution, fallbackYields } from './defaults.ts';
import type { Evidence, Raise, RunFindings } from './evidence.ts';
import { ofGap } from './gap.ts';
import { ofGas } from './gas.ts';
import { ofNumerics } from './numerics.ts';
import { ofSeed } from './seed.ts';

/** What can hurt or mislead first, then what limits the model, then the numbers, then what was assumed. */
const BY_GRAVITY: readonly CautionCode[] = [
  'not-a-clearance',
  'arc-risk',
  'longer-path',
  'few-electrons',
  'yield-spread',
  'seed-lowers-threshold',
  'streamer',
  'field-emission',
  'insulator',
  'edges',
  'left-of-minimum',
  'collisionless',
  'outside-range',
  'double-valued',
  'mixture',
  'short-gap',
  'partly-covered',
  'loaded-by-seed',
  'timescales',
  'tolerance',
  'cathode-cells',
  'undershoot',
  'defaults',
];

/** Every caution of a run, or of a case before it is run (`found` null), safety first.
 *  @param voltage at which theory and prospects were evaluated [V], with its sign */
export function cautionsOf(settings: Case, voltage: number, theory: Theory, prospects: Prospects, found: RunFindings | null): Caution[] {
  const evidence: Evidence = { settings, voltage, theory, prospects, found };
  const list: Caution[] = [];
  const raise: Raise = (code, text, value) => {
    list.push({ code, text, value });
  };
  raise(
    'not-a-clearance',
    'A model is no clearance to approach or certify: discharge stored charge, keep interlocks, test at pressure; local codes and licensed practice decide.',
    null,
  );
  ofCathode(evidence, raise);
  ofGas(evidence, raise);
  ofGap(evidence, raise);
  ofSeed(evidence, raise);
  ofNumerics(evidence, raise);
  return sorted(list);
}

/** The same cautions and the one about the defaults that a case leaves to the program.
 *  @param paths of every default used */
export function withDefaults(cautions: readonly Caution[], settings: Case, paths: readonly string[]): Caution[] {
  const more = defaultsCaution([...paths, ...fallbackYields(settings)]);
  return more === null ? [...cautions] : sorted([...cautions, more]);
}

function sorted(list: readonly Caution[]): Caution[] {
  return [...list].sort((a, b) => BY_GRAVITY.indexOf(a.code) - BY_GRAVITY.indexOf(b.code));
}
