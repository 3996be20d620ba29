/** α/N of an author against the default data of a gas, which another author measured or computed. */
import { curveOf } from '../../src/gases/curves.ts';
import { gases } from '../../src/gases/index.ts';
import { PER_TORR } from '../help/gas-gap.ts';
import { type Check, type PublishedStatus, within } from './check.ts';

export interface AuthorsAlpha {
  readonly gas: string;
  /** A [1/(cm Torr)] and B [V/(cm Torr)] of α/p = A exp(−B p/E), pressure at 20 °C */
  readonly author: readonly [A: number, B: number];
  /** E/p [V/(cm Torr)] */
  readonly at: number;
  readonly share: number;
  readonly reason?: string;
  readonly status: PublishedStatus;
  /** whose data the gas holds there */
  readonly ours: string;
}

const REASON = 'each author claims some 15 %; the pressure of textbook constants, taken at 20 °C, may mean 0 °C, 7 %: 25 % together';

export function alphaRow({ gas, author: [A, B], at, share, reason, status, ours }: AuthorsAlpha): Check {
  return {
    check: `α/N in ${gas} at ${at} V/(cm Torr), A ${A}, B ${B}`,
    published: Number(((A * 100 * Math.exp(-B / at)) / PER_TORR).toPrecision(4)),
    unit: 'm²',
    allowed: within(share),
    reason: reason ?? REASON,
    status,
    independentOf: `this author: the data there are ${ours}`,
    simulated: false,
    compute: () => curveOf(gases[gas].coefficients.ionisation.form).valueAt((at * 100) / PER_TORR),
  };
}
