import type { Case } from '../case.ts';
import type { Outcome } from '../onset/outcome.ts';
import { type Answer, answerOf, type Request } from '../search/window/index.ts';
import { SimulationFailure, simulateNow } from '../simulate.ts';
import { Abandoned, type Job } from './serve.ts';

/** Answers the requests of a window; the case is what a worker is prepared with. */
export const windowJob: Job<Case, Request, Answer> = (settings) => (request, interrupted) => {
  let runs = 0;
  const simulate = (each: Case): Outcome => {
    runs++;
    const outcome = simulateNow(each, { interrupted });
    if (outcome.final.stop === 'interrupted') throw new Abandoned();
    return outcome;
  };
  try {
    return answerOf(settings, request, simulate);
  } catch (thrown) {
    // what cannot be completed is an answer too; everything else is a fault and passes
    if (!(thrown instanceof SimulationFailure)) throw thrown;
    return { kind: 'failed', reason: thrown.message, runs };
  }
};
