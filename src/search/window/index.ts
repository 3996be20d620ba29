/** A gap in changing surroundings: when it breaks down, what it holds, from when on turn-on is safe.
 *
 *  follow.ts        the whole: history and schedule → instants, windows, turn-on times
 *  track.ts         pressure, temperature, density and voltage in time
 *  threshold.ts     theory's breakdown voltage against density, and where the model ends
 *  curve.ts         hold-off voltage against density: simulated at some, expected at the others
 *  states.ts        what an instant is judged to be
 *  instants.ts      where in time to look
 *  windows.ts       judged instants → windows and turn-on times
 *  timescales.ts    whether discharges are fast against what changes
 *  request.ts       what is asked of simulations; simulated.ts: how they answer; instant-case.ts: the case that they run
 *  outcome.ts       the answer as it is printed and kept; cautions.ts */
export { type Following, followWindow, HistoryFailure } from './follow.ts';
export { type HistoryEntry, type WindowOfYield, type WindowOutcome, windowOutcome } from './outcome.ts';
export { type Answer, type Evaluate, type Request, requestKey } from './request.ts';
export { answerOf } from './simulated.ts';
