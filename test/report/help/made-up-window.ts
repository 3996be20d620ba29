import { readCase } from '../../../src/casefile/index.ts';
import { coefficientsUsed } from '../../../src/commands/coefficients.ts';
import { writeWindowFile } from '../../../src/results/window-write.ts';
import type { HistoryEntry, WindowOutcome } from '../../../src/search/window/index.ts';
import { openCase } from '../../commands/program.ts';

/** A window file with every state, made up over the open case: a pressure that falls by four decades within an hour. */
export async function writeMadeUpWindow(path: string, title: string): Promise<WindowOutcome> {
  const instants = 61;
  const history = Array.from({ length: instants }, (_, i): HistoryEntry => {
    const pressure = 1e5 * 10 ** ((-4.5 * i) / (instants - 1));
    const holdOff = i >= 54 ? null : 200 + (pressure / 400) ** 0.9 * 120;
    const state = holdOff === null ? 'outside-model' : holdOff < 230 ? 'breaks-down' : holdOff < 345 ? 'marginal' : 'holds';
    return {
      time_s: 60 * i,
      pressure_Pa: pressure,
      temperature_K: 295,
      supply_V: 230,
      hold_off_V: holdOff,
      hold_off_at_high_yield_V: holdOff === null ? null : 0.9 * holdOff,
      lag_s: state === 'breaks-down' ? 1e-5 + 1e-7 * i : null,
      state,
      note: null,
    };
  });
  const span = (state: HistoryEntry['state']): [number, number] => {
    const at = history.flatMap((entry, i) => (entry.state === state ? [i] : []));
    return [history[at[0]].time_s, history[Math.min(instants - 1, at[at.length - 1] + 1)].time_s];
  };
  const windows = (['marginal', 'breaks-down', 'outside-model'] as const).map((state) => {
    const [from_s, to_s] = span(state);
    return { from_s, to_s, state, below_paschen_minimum: false, lowest_hold_off_V: 210.125, shortest_lag_s: 1.53e-5 };
  });
  const ofYield = {
    windows,
    lowest_hold_off: { voltage_V: 207.5, time_s: 3180, pressure_Pa: 10.5 },
    earliest_turn_on_s: null,
    latest_turn_on_s: windows[0].from_s,
  };
  const caseText = openCase({ more: 'history: { pressure: { ascent: { from: 0 km, to: 35 km, rate: 5 m/s } }, duration: 1 h }' });
  const read = readCase(caseText, 'made-up.yaml', () => ({ ok: false, reason: 'no tables here' }));
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  const outcome: WindowOutcome = {
    format: 'gapwake.window/1',
    title,
    version: '1.2.3',
    case_sha256: 'a'.repeat(64),
    duration_s: 3600,
    margin: 1.5,
    ...ofYield,
    worst: { time_s: 3180, pressure_Pa: 10.5, supply_V: 230, hold_off_V: 207.5, lag_s: 1.53e-5 },
    yield_spread: { low: { ion_yield: 0.01, ...ofYield, windows: [] }, high: { ion_yield: 0.1, ...ofYield } },
    history,
    notes: [title],
    cautions: [{ code: 'edges', text: title, value: null }],
    numerics: { instants, runs: 12, failures: [] },
  };
  await writeWindowFile(path, {
    outcome,
    study: 'b'.repeat(64),
    caseText,
    coefficientsJson: JSON.stringify(coefficientsUsed(read.case)),
    tablesJson: '[]',
  });
  return outcome;
}
