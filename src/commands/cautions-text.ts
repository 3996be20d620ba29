import type { Caution, CautionCode } from '../onset/outcome.ts';
import { printable } from '../units/printable.ts';
import { wrap } from './layout.ts';
import type { Terminal } from './terminal.ts';

/** The last line of everything a person reads. */
export const NOT_A_CLEARANCE =
  'Not a clearance: discharge stored charge, keep interlocks, test at pressure; local codes and licensed practice decide.';

/** What can hurt or mislead first, then what limits the model, then the numbers, then what was assumed. */
const ORDER: Readonly<Record<CautionCode, number>> = {
  'not-a-clearance': 0,
  'arc-risk': 1,
  'longer-path': 2,
  'few-electrons': 3,
  'yield-spread': 4,
  'seed-lowers-threshold': 5,
  streamer: 6,
  'field-emission': 7,
  insulator: 8,
  edges: 9,
  'left-of-minimum': 10,
  collisionless: 11,
  'outside-range': 12,
  'double-valued': 13,
  mixture: 14,
  'short-gap': 15,
  'partly-covered': 16,
  'loaded-by-seed': 17,
  timescales: 18,
  tolerance: 19,
  'cathode-cells': 20,
  undershoot: 21,
  defaults: 22,
};

/** The cautions as text, the gravest first. `not-a-clearance` is left to the last line of the output. */
export function cautionLines(cautions: readonly Caution[], terminal: Terminal): string[] {
  return cautions
    .filter((caution) => caution.code !== 'not-a-clearance')
    .sort((a, b) => ORDER[a.code] - ORDER[b.code])
    .flatMap((caution) => wrap(`${printable(caution.text)} [${caution.code}]`, terminal.width, '  ! ', '    '));
}

/** One line, which only a terminal needs folded. */
export function lastLines(terminal: Terminal): string[] {
  return (terminal.seen ? wrap(NOT_A_CLEARANCE, terminal.width) : [NOT_A_CLEARANCE]).map(terminal.style.strong);
}
