import { threshold } from '../../theory/breakdown-voltage.ts';
import { multiplicationOf } from '../../theory/multiplication.ts';
import { lowestOverPaths, paschenMinimum } from '../../theory/paschen.ts';
import { BOLTZMANN } from '../../units/constants.ts';
import type { BreakdownCurve, WindowSeries } from './data.ts';
import type { WindowReport } from './report.ts';

/** [K] at which pd is given */
const REFERENCE = 293.15;
const POINTS = 90;

/** What the figures are drawn from. */
export function seriesOf({ outcome, settings }: WindowReport): WindowSeries {
  const { history, windows, margin } = outcome;
  const spacing = settings?.gap.spacing ?? 1;
  const pd = history.map(({ pressure_Pa, temperature_K }) => pressure_Pa * (REFERENCE / temperature_K) * spacing);
  const turnOn = [
    ['earliest turn-on', outcome.earliest_turn_on_s],
    ['latest turn-on', outcome.latest_turn_on_s],
  ] as const;
  return {
    time: history.map(({ time_s }) => time_s),
    pressure_Pa: history.map(({ pressure_Pa }) => pressure_Pa),
    supply_V: history.map(({ supply_V }) => supply_V),
    holdOff_V: history.map(({ hold_off_V }) => hold_off_V),
    holdOffAtHighYield_V: history.map(({ hold_off_at_high_yield_V }) => hold_off_at_high_yield_V),
    lag_s: history.map(({ lag_s }) => lag_s),
    states: history.map(({ state }) => state),
    windows: windows.map(({ from_s, to_s, state, below_paschen_minimum }) => ({
      from: from_s,
      to: to_s,
      state,
      safe: below_paschen_minimum,
    })),
    events: turnOn.flatMap(([name, time]) => (time === null ? [] : [{ name, time }])),
    pd,
    curve: curveOf(settings, pd, outcome.worst?.supply_V ?? history[0]?.supply_V ?? 1),
    margin,
  };
}

/** Theory's breakdown voltage over the densities that the history passes, and a little beyond. */
function curveOf(settings: WindowReport['settings'], pd: readonly number[], supply: number): BreakdownCurve | null {
  if (settings === null || pd.length === 0) return null;
  const { spacing, longestPath } = settings.gap;
  const gas = multiplicationOf(settings, supply < 0 ? -1 : 1);
  // down to the left branch, so that the minimum is seen
  const minimum = paschenMinimum(gas);
  const least = minimum === null ? Number.POSITIVE_INFINITY : (minimum.column * BOLTZMANN * REFERENCE) / 3;
  const lowest = pd.reduce((a, v) => (v > 0 && v < a ? v : a), least);
  const [low, high] = [lowest / 1.3, pd.reduce((a, v) => Math.max(a, v), 0) * 1.3];
  if (!(low > 0 && high > low && high < Number.POSITIVE_INFINITY)) return null;
  const points = Array.from({ length: POINTS }, (_, k) => low * (high / low) ** (k / (POINTS - 1)));
  const density = (v: number): number => v / spacing / (BOLTZMANN * REFERENCE);
  return {
    pd: points,
    spacing: points.map((v) => threshold(gas, density(v), spacing).breakdown),
    paths: longestPath > spacing ? points.map((v) => lowestOverPaths(gas, density(v), spacing, longestPath)?.voltage ?? null) : null,
  };
}
