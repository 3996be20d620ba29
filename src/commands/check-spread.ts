import type { Case } from '../case.ts';
import type { GasCoefficients, GasData } from '../gases/gas.ts';
import { dataSets, gasData } from '../gases/index.ts';
import { mixtureOf } from '../gases/mixture.ts';
import { withYield, type YieldEnd, type YieldSpread, yieldSpread } from '../onset/cautions/yield-ends.ts';
import { threshold } from '../theory/breakdown-voltage.ts';
import { multiplicationOf } from '../theory/multiplication.ts';
import { prospects } from '../theory/predict.ts';

/** What choices and spreads of the data do to V_s, for `check` and `run`: closed forms, nothing is simulated. */

/** V_s with one set of data of one gas, all else as in the case. */
export interface SetVoltage {
  readonly gas: string;
  readonly set: string;
  readonly used: boolean;
  /** [V], null where no voltage sustains a discharge */
  readonly breakdown: number | null;
}

/** The data that a case takes from a built-in gas or mixture. */
export interface GasUsed {
  readonly set: string;
  readonly reason: string;
  /** every set of every gas, the others of a mixture at their default; empty where the ionisation is the case's own */
  readonly sets: readonly SetVoltage[];
}

/** Which data a case takes, and what V_s the others give; null where it brings all of its own.
 *  @param voltage  [V], its sign says which wall is the cathode */
export function gasUsed(settings: Case, voltage: number): GasUsed | null {
  const { gas } = settings;
  if (gas.mixture === undefined && (gas.name === null || gas.dataSet === undefined)) return null;
  const used = gas.mixture === undefined ? gasData(gas.name ?? '', gas.dataSet) : mixtureOf(partsWith(gas.mixture, null));
  if (used === null) return null;
  const own = gas.coefficients.ionisation.status === 'given';
  return { set: used.set, reason: used.reason, sets: own ? [] : setsOf(settings, voltage) };
}

function setsOf(settings: Case, voltage: number): SetVoltage[] {
  const { gas } = settings;
  const parts = gas.mixture ?? [{ gas: gas.name ?? '', fraction: 1 }];
  return parts.flatMap(({ gas: name }) =>
    dataSets(name).map((set, k) => {
      const data = gas.mixture === undefined ? gasData(name, set) : mixtureOf(partsWith(parts, { name, set }));
      const used = gas.mixture === undefined ? set === gas.dataSet : k === 0;
      return { gas: name, set, used, breakdown: data === null ? null : breakdownWith(settings, voltage, data) };
    }),
  );
}

function partsWith(
  parts: NonNullable<Case['gas']['mixture']>,
  other: { name: string; set: string } | null,
): Parameters<typeof mixtureOf>[0] {
  return parts.flatMap(({ gas, fraction }) => {
    const data = gasData(gas, other?.name === gas ? other.set : undefined);
    return data === null ? [] : [{ gas: data, fraction }];
  });
}

/** V_s with other data, the coefficients that the case itself gives kept. */
function breakdownWith(settings: Case, voltage: number, data: GasData): number | null {
  const given = Object.entries(settings.gas.coefficients).filter(([, coefficient]) => coefficient?.status === 'given');
  const coefficients: GasCoefficients = { ...data.coefficients, ...Object.fromEntries(given) };
  const { density } = settings.gas;
  const there: Case = { ...settings, gas: { ...settings.gas, coefficients } };
  return threshold(multiplicationOf(there, voltage), density, settings.gap.spacing).breakdown;
}

/** The ends of the cathode's yield with what each makes of the case. */
export interface YieldConsequences extends YieldSpread {
  /** [s] from a sudden step to space charge; null at and below threshold or unseeded */
  readonly timeAtLow: number | null;
  readonly timeAtHigh: number | null;
}

/** What the spread of the yield does to V_s, and to the time to space charge at the voltage [V]; null where the yield is one number. */
export function yieldConsequences(settings: Case, voltage: number): YieldConsequences | null {
  const spread = yieldSpread(settings, voltage);
  if (spread === null) return null;
  const timeAt = ({ given }: YieldEnd): number | null =>
    given === 0 ? null : prospects(withYield(settings, spread.side, given), voltage).timeToSpaceCharge;
  return { ...spread, timeAtLow: timeAt(spread.low), timeAtHigh: timeAt(spread.high) };
}

/** The `gas` entry of `check --json`; SI, units in the keys. */
export function gasJson(settings: Case, voltage: number): Record<string, unknown> | null {
  const used = gasUsed(settings, voltage);
  if (used === null) return null;
  const sets = used.sets.map(({ gas, set, used: isUsed, breakdown }) => ({
    gas,
    set,
    used: isUsed,
    static_breakdown_voltage_V: breakdown,
  }));
  return { name: settings.gas.name, mixture: settings.gas.mixture ?? null, set: used.set, reason: used.reason, sets };
}

/** The `ion_yield` entry of `check --json`: that of the cathode. */
export function yieldJson(settings: Case, voltage: number): Record<string, unknown> | null {
  const spread = yieldConsequences(settings, voltage);
  if (spread === null) return null;
  const end = ({ given, atBreakdown, breakdown }: YieldEnd): Record<string, unknown> => ({
    [spread.byLaw ? 'factor' : 'ion_yield']: given,
    at_breakdown: atBreakdown,
    static_breakdown_voltage_V: breakdown,
  });
  return {
    cathode: spread.side,
    low: { ...end(spread.low), time_to_space_charge_s: spread.timeAtLow },
    typical: end(spread.typical),
    high: { ...end(spread.high), time_to_space_charge_s: spread.timeAtHigh },
    verdict_depends_on_it: spread.decides,
  };
}
