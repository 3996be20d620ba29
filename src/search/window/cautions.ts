import type { Case } from '../../case.ts';
import { cautionsOf, withDefaults } from '../../onset/cautions/index.ts';
import type { Caution, CautionCode } from '../../onset/outcome.ts';
import { seconds } from '../../onset/words.ts';
import { predict, prospects } from '../../theory/predict.ts';
import type { FollowedInstant, WindowAnswer } from './follow.ts';
import { atSurroundings } from './instant-case.ts';
import type { Timescales } from './timescales.ts';

/** Instants that are looked at for cautions of their own, at most; they lie evenly. */
const MOST_LOOKS = 60;

/** Every caution of a window: those of the gap at its worst instant; those that only other instants raise, with the time of the first; and the one about
 *  discharges that are not fast against what changes around them.
 *  @param defaults  paths of every default that the case leaves to the program */
export function windowCautions(settings: Case, answer: WindowAnswer, defaults: readonly string[]): Caution[] {
  const { instants, worst, lowest, timescales } = answer;
  const first = worst === null ? instants.find(({ time }) => time === lowest?.time) : instants[worst];
  const raised = new Map<CautionCode, Caution>();
  // where the model says nothing the state says so already
  const modelled = instants.filter(({ holdOff }) => holdOff !== null);
  const some = modelled.filter((_, i) => i % Math.ceil(modelled.length / MOST_LOOKS) === 0);
  for (const instant of first === undefined ? some : [first, ...some]) {
    for (const caution of cautionsAt(settings, instant)) {
      if (raised.has(caution.code)) continue;
      const text = instant === first ? caution.text : `First at ${seconds(instant.time)}: ${caution.text}`;
      raised.set(caution.code, { ...caution, text });
    }
  }
  const list = [...raised.values()];
  if (timescales !== null) list.push(timescalesCaution(timescales));
  if (list.every(({ code }) => code !== 'not-a-clearance')) list.push(...cautionsAt(settings, instants[0]).filter(isClearance));
  return withDefaults(list, settings, defaults);
}

/** What is said of the gas belongs to the path that breaks down, what is said of the hardware to the gap itself. */
const OF_PATH: ReadonlySet<CautionCode> = new Set([
  'yield-spread',
  'few-electrons',
  'outside-range',
  'collisionless',
  'double-valued',
  'streamer',
]);

function cautionsAt(settings: Case, { pressure, temperature, supply, path }: FollowedInstant): Caution[] {
  const gap = atSurroundings(settings, pressure, temperature);
  const along = path === null ? gap : { ...gap, gap: { ...gap.gap, spacing: path, longestPath: path } };
  const of = (each: Case): Caution[] => cautionsOf(each, supply, predict(each, supply), prospects(each, supply), null);
  return [...of(gap).filter(({ code }) => !OF_PATH.has(code)), ...of(along).filter(({ code }) => OF_PATH.has(code))];
}

function isClearance({ code }: Caution): boolean {
  return code === 'not-a-clearance';
}

function timescalesCaution({ time, discharge, surroundings, of }: Timescales): Caution {
  const takes = `a discharge takes about ${seconds(discharge)} to form`;
  const text = {
    pressure: `At ${seconds(time)} the pressure changes by a factor e in ${seconds(surroundings)}, while 1 % above threshold ${takes}: the gap is not at rest, and breaks down later and at a higher voltage than this says, if at all.`,
    voltage: `At ${seconds(time)} the voltage changes by a factor e in ${seconds(surroundings)}, while 1 % above threshold ${takes}: the gap is not at rest; \`run\` follows such a programme in time.`,
    window: `The window of breakdown at ${seconds(time)} lasts ${seconds(surroundings)}, while ${takes}: the gap may pass through it unharmed, which is no reason to rely on it.`,
  }[of];
  return { code: 'timescales', text, value: discharge / surroundings };
}
