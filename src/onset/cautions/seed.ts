import { ELEMENTARY_CHARGE } from '../../units/constants.ts';
import { amperes, percent, seconds } from '../words.ts';
import type { Evidence, Raise } from './evidence.ts';

/** Fewer electrons than this that could each start a discharge: its start is a matter of chance. */
const FEW_ELECTRONS = 10;
/** Share of the open-gap voltage that the seed's current may take in the series resistance. */
const LOADING = 0.01;

/** What few or many seed electrons do. */
export function ofSeed(evidence: Evidence, raise: Raise): void {
  ofFewElectrons(evidence, raise);
  const { settings, found } = evidence;
  const { cathodeCurrent } = settings.seed;
  const seed = cathodeCurrent > 0 ? `a seed as strong as ${amperes(cathodeCurrent)}` : 'so large a starting charge';
  if (found?.broken && found.thresholdTime === null) {
    raise(
      'seed-lowers-threshold',
      `It broke down although the feedback never exceeded ${found.largestFeedback.toPrecision(3)}: ${seed} lowers the threshold by its own space charge.`,
      found.largestFeedback,
    );
  }
  if (found?.held && found.seedDrop > LOADING) {
    raise(
      'loaded-by-seed',
      `The current drawn by the seed drops ${percent(found.seedDrop)} of the voltage in the series resistance: without it the gap would see that much more.`,
      found.seedDrop,
    );
  }
}

function ofFewElectrons({ settings, theory, prospects, found }: Evidence, raise: Raise): void {
  if (!(theory.feedback > 1)) return;
  const { cathodeCurrent, electrons } = settings.seed;
  // the time that electrons have to come in: the lag, or all the time above threshold if nothing came of it
  const time = found === null ? prospects.timeToSpaceCharge : (found.lag ?? found.timeAboveThreshold);
  if (time === null || time === 0) return;
  const expected = ((cathodeCurrent / ELEMENTARY_CHARGE) * time + electrons) * prospects.breakdownProbability;
  if (!(expected < FEW_ELECTRONS)) return;
  const wait = prospects.meanStatisticalLag === null ? '' : `, ${seconds(prospects.meanStatisticalLag)} on average`;
  raise(
    'few-electrons',
    `In ${seconds(time)} above threshold ${expected < 0.01 ? 'hardly any' : expected.toPrecision(2)} seed electrons are expected that could start a discharge: the real delay is the wait for one${wait}, and one test that held proves nothing.`,
    expected,
  );
}
